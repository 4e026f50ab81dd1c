"""The top of a layout: every key that is not a section of named entries."""

from __future__ import annotations

from typing import Any

from benchlay.document.form import Reader
from benchlay.document.forms import Deferred, Entries, ListOf, RecordForm, Table, Text
from benchlay.document.record import Record, key
from benchlay.layout.accept import Accept
from benchlay.layout.bench import Bench
from benchlay.layout.drawing import Drawing, Revision
from benchlay.layout.limits import Limits
from benchlay.layout.materials import Material
from benchlay.layout.paths import Cavity, Matched
from benchlay.layout.room import Room
from benchlay.layout.tolerances import NO_TOLERANCES, Tolerances, TolerancesForm

SECTIONS = ("sources", "elements", "routes", "enclosure", "states")


class Header(Record):
    """A layout but for its sections."""

    title: str = key(Text(200), default="", meaning="what the bench is for")
    revision: str = key(Text(10, sample="A"), default="", meaning="revision index")
    bench: Bench = key(RecordForm(Bench), meaning="the bench")
    room: Room | None = key(
        RecordForm(Room),
        default=None,
        meaning="the room round it",
    )
    materials: Entries[Material] = key(
        Table(RecordForm(Material)), default=Entries(), meaning="materials by name"
    )
    matched: tuple[Matched, ...] = key(
        ListOf(RecordForm(Matched)),
        default=(),
        meaning="routes that are meant to be equally long",
        not_yet="optical paths are compared by a later version",
        not_yet_is_note=True,
    )
    cavities: Entries[Cavity] = key(
        Table(RecordForm(Cavity)),
        default=Entries(),
        meaning="open cavities by name",
        not_yet="cavities are examined by a later version",
        not_yet_is_note=True,
    )
    limits: Limits = key(RecordForm(Limits), default=Limits(), meaning="what checks hold against")
    tolerances: Tolerances = key(
        TolerancesForm(),
        default=NO_TOLERANCES,
        meaning="how far things may be off, by kind or name",
        not_yet="tolerances are sampled by a later version",
        not_yet_is_note=True,
    )
    accept: tuple[Accept, ...] = key(
        ListOf(RecordForm(Accept)), default=(), meaning="findings that are accepted"
    )
    drawing: Drawing = key(RecordForm(Drawing), default=Drawing(), meaning="the title block")
    revisions: tuple[Revision, ...] = key(
        ListOf(RecordForm(Revision), max=100), default=(), meaning="the revision table"
    )
    include: Any = key(
        Deferred("a list of files below the layout's own folder"),
        default=None,
        meaning="files with parts",
        not_yet="other files are not read by this version",
    )
    parts: Any = key(
        Deferred("a table of parts"),
        default=None,
        meaning="elements to be used several times, by name",
        not_yet="parts are not put together by this version",
    )

    def after_read(self, reader: Reader) -> None:
        """Hold the room against the bench."""
        if self.room is not None:
            reader.path += ["room"]
            self.room.hold(self.bench, reader)
            del reader.path[-1:]
