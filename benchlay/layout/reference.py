"""Reference text (Markdown) of the whole language, made from the tables that read it."""

from __future__ import annotations

from inspect import getdoc

from benchlay.document.describe import reference_text
from benchlay.document.record import Record
from benchlay.elements import KINDS
from benchlay.elements.mount import Mount
from benchlay.layout.accept import Accept, Bound
from benchlay.layout.beam import BeamShape
from benchlay.layout.bench import Bench, Holes, Index
from benchlay.layout.drawing import Drawing, Revision
from benchlay.layout.elements import Shared
from benchlay.layout.enclosure import Enclosure, Ends, Fix, Fold, Lid, Opening, Panel
from benchlay.layout.header import Header
from benchlay.layout.light import LineKeys, PulseTrain
from benchlay.layout.limits import Driver, Eyes, Limits
from benchlay.layout.materials import Material, Withstands
from benchlay.layout.paths import Cavity, Matched
from benchlay.layout.room import Door, Person, Room, Window
from benchlay.layout.routes import Needs, RouteKeys
from benchlay.layout.sources import Body, FedBy, SourceKeys
from benchlay.layout.tolerances import Tolerance

SECTIONS: tuple[tuple[str, type[Record]], ...] = (
    ("a layout", Header),
    ("bench", Bench),
    ("bench.holes", Holes),
    ("bench.medium", Index),
    ("room", Room),
    ("room.doors.NAME", Door),
    ("room.windows.NAME", Window),
    ("room.people.NAME", Person),
    ("sources.NAME", SourceKeys),
    ("sources.NAME.lines[]", LineKeys),
    ("sources.NAME.pulse", PulseTrain),
    ("sources.NAME.beam", BeamShape),
    ("sources.NAME.body", Body),
    ("sources.NAME.fed_by", FedBy),
    ("elements.NAME, whatever its kind", Shared),
    ("elements.NAME.mount", Mount),
    ("withstands", Withstands),
    ("routes.NAME", RouteKeys),
    ("routes.NAME.needs", Needs),
    ("materials.NAME", Material),
    ("enclosure", Enclosure),
    ("enclosure.panels.NAME", Panel),
    ("enclosure.panels.NAME.openings.NAME", Opening),
    ("enclosure.panels.NAME.ends", Ends),
    ("enclosure.panels.NAME.fix", Fix),
    ("enclosure.panels.NAME.fold", Fold),
    ("enclosure.lids.NAME", Lid),
    ("limits", Limits),
    ("limits.eyes", Eyes),
    ("limits.driver", Driver),
    ("tolerances.NAME", Tolerance),
    ("accept[]", Accept),
    ("accept[].bound.NAME", Bound),
    ("matched[]", Matched),
    ("cavities.NAME", Cavity),
    ("drawing", Drawing),
    ("revisions[]", Revision),
)
"""Every table of keys of the language, by the path at which it is written."""


def reference() -> str:
    """Return the reference: a table of keys for every part and every kind."""
    parts = ["# Reference of the layout language\n"]
    parts += [f"## {path}\n\n{_page(cls)}" for path, cls in SECTIONS]
    parts += [f"## kind {name}\n\n{kind_text(name)}" for name in KINDS]
    return "\n".join(parts)


def kind_text(name: str) -> str:
    """Return the keys of one kind of element, but for those that all kinds share."""
    cls = KINDS[name]
    later = f"\nNot yet: {cls.PENDING}.\n" if cls.PENDING else ""
    return _page(cls) + later


def _page(cls: type[Record]) -> str:
    first = (getdoc(cls) or "").partition("\n")[0]
    return f"{first}\n\n{reference_text(cls)}"
