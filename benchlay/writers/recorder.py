"""A writer that writes nothing: it keeps what it was given, for tests."""

from __future__ import annotations

import json

from benchlay.named import NamedTuple
from benchlay.sheets.primitives import (
    Arc,
    BlockUse,
    Circle,
    Dimension,
    Fill,
    Line,
    Polyline,
    Primitive,
    Sheet,
    Space,
    Text,
)
from benchlay.writers.backend import checked_fill, checked_polyline, send


class Record(NamedTuple):
    """One primitive and the space it lay in."""

    space: Space
    primitive: Primitive


class Recorder:
    """Keeps every primitive, in the order in which a writer would draw it."""

    def __init__(self) -> None:
        """Start with nothing recorded."""
        self.records: list[Record] = []
        self._space = Space.MODEL

    def enter(self, space: Space) -> None:
        """See `Backend`."""
        self._space = space

    def _keep(self, primitive: Primitive) -> None:
        self.records.append(Record(self._space, primitive))

    def line(self, line: Line) -> None:
        """See `Backend`."""
        self._keep(line)

    def arc(self, arc: Arc) -> None:
        """See `Backend`."""
        self._keep(arc)

    def circle(self, circle: Circle) -> None:
        """See `Backend`."""
        self._keep(circle)

    def polyline(self, polyline: Polyline) -> None:
        """See `Backend`."""
        self._keep(checked_polyline(polyline))

    def fill(self, fill: Fill) -> None:
        """See `Backend`."""
        checked_fill(fill)
        self._keep(fill)

    def text(self, text: Text) -> None:
        """See `Backend`."""
        self._keep(text)

    def dimension(self, dimension: Dimension) -> None:
        """See `Backend`."""
        self._keep(dimension)

    def block_use(self, use: BlockUse) -> None:
        """See `Backend`."""
        self._keep(use)

    def finish(self) -> bytes:
        """Return one line of JSON a primitive."""
        lines = [
            json.dumps([space, type(primitive).__name__, *primitive])
            for space, primitive in self.records
        ]
        return ("\n".join(lines) + "\n").encode()


def record(sheet: Sheet) -> list[Record]:
    """Return what a writer would be given for a sheet."""
    recorder = Recorder()
    send(sheet, recorder)
    return recorder.records
