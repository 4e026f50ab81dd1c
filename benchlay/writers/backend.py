"""What a writer is, and how a sheet is handed to it."""

from __future__ import annotations

from collections.abc import Iterable
from typing import Protocol

from benchlay.sheets.primitives import (
    Arc,
    BlockUse,
    Circle,
    Dimension,
    Fill,
    Line,
    Point,
    Polyline,
    Primitive,
    Shape,
    Sheet,
    Space,
    Text,
)


class Backend(Protocol):
    """Every writer: told the space, then what lies in it, then asked for the file.

    There is one method a primitive, and no default: a writer that cannot draw something
    does not type-check, and none is left out unsaid.
    """

    def enter(self, space: Space) -> None:
        """Say to which space the primitives that follow belong."""
        ...

    def line(self, line: Line) -> None:
        """Draw a straight line."""
        ...

    def arc(self, arc: Arc) -> None:
        """Draw a circular arc."""
        ...

    def circle(self, circle: Circle) -> None:
        """Draw a circle."""
        ...

    def polyline(self, polyline: Polyline) -> None:
        """Draw a chain of straight and curved pieces."""
        ...

    def fill(self, fill: Fill) -> None:
        """Draw a filled triangle or quadrilateral."""
        ...

    def text(self, text: Text) -> None:
        """Draw a line of lettering."""
        ...

    def dimension(self, dimension: Dimension) -> None:
        """Draw a dimension with its figure."""
        ...

    def block_use(self, use: BlockUse) -> None:
        """Draw a block in its place."""
        ...

    def finish(self) -> bytes:
        """Return the whole file."""
        ...


def send(sheet: Sheet, backend: Backend) -> bytes:
    """Hand a sheet to a writer, in the order of inking, and return the file.

    Raises
    ------
    ValueError
        If a primitive names a layer or a block that the sheet has not got.
    """
    rank = {layer.name: n for n, layer in enumerate(sheet.layers)}
    blocks = {block.name: block for block in sheet.blocks}
    for block in sheet.blocks:
        _ranked(block.primitives, rank)
    for space, primitives in ((Space.MODEL, sheet.model), (Space.PAPER, sheet.paper)):
        backend.enter(space)
        for primitive in _ranked(primitives, rank):
            if isinstance(primitive, BlockUse) and primitive.block not in blocks:
                msg = f"the sheet has no block {primitive.block!r}"
                raise ValueError(msg)
            _send_one(primitive, backend)
    return backend.finish()


def _ranked(primitives: Iterable[Primitive], rank: dict[str, int]) -> list[Primitive]:
    primitives = list(primitives)
    for primitive in primitives:
        if primitive.layer not in rank:
            msg = f"the sheet has no layer {primitive.layer!r}"
            raise ValueError(msg)
    return sorted(primitives, key=lambda primitive: rank[primitive.layer])


def _send_one(primitive: Primitive, backend: Backend) -> None:
    match primitive:
        case Text():
            backend.text(primitive)
        case Dimension():
            backend.dimension(primitive)
        case BlockUse():
            backend.block_use(primitive)
        case _:
            send_shape(primitive, backend)


def send_shape(shape: Shape, backend: Backend) -> None:
    """Hand on one of the primitives that blocks are made of."""
    match shape:
        case Line():
            backend.line(shape)
        case Arc():
            backend.arc(shape)
        case Circle():
            backend.circle(shape)
        case Polyline():
            backend.polyline(shape)
        case Fill():
            backend.fill(shape)


def checked_polyline(polyline: Polyline) -> Polyline:
    """Return a polyline unchanged, or say what is wrong with it.

    Raises
    ------
    ValueError
        With fewer than two points, or with bulges that do not go with the points.
    """
    if len(polyline.points) < 2:  # noqa: PLR2004 (a line)
        msg = f"a polyline needs two points or more, got {len(polyline.points)}"
        raise ValueError(msg)
    if polyline.bulges and len(polyline.bulges) != len(polyline.points):
        msg = f"{len(polyline.points)} points have {len(polyline.bulges)} bulges"
        raise ValueError(msg)
    return polyline


def checked_fill(fill: Fill) -> tuple[Point, ...]:
    """Return the corners of a filled path, or say what is wrong with them.

    Raises
    ------
    ValueError
        With other than three or four corners; no more goes into DXF's own solid.
    """
    if len(fill.points) not in (3, 4):
        msg = f"a filled path has three or four corners, got {len(fill.points)}"
        raise ValueError(msg)
    return fill.points
