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
from benchlay.layout.limits import Driver, Eyes, Faults, Limits
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
    ("limits.faults", Faults),
    ("tolerances.NAME", Tolerance),
    ("accept[]", Accept),
    ("accept[].bound.NAME", Bound),
    ("matched[]", Matched),
    ("cavities.NAME", Cavity),
    ("drawing", Drawing),
    ("revisions[]", Revision),
)
"""Every table of keys of the language, by the path at which it is written."""


_STATES = """Keys that are set otherwise for a while: alignment, loading, service.

states:
  alignment:
    sources.green.power: 1 mW
    enclosure.panels.south.open: yes
    elements.S1.closed: no
    limits.time_base: 0.25 s

A state may set any key of a source, element, panel, lid or limit but 'kind' and 'after'. A key
of place or turn places that one element anew. What stands in the layout itself is the state
'as drawn'; every check runs in every state.
"""


def words() -> dict[str, str]:
    """Return what can be asked for: the last name of each path, and what is there in a line."""
    found = {_word(path): _first(cls) for path, cls in SECTIONS}
    return found | {"states": _STATES.partition("\n")[0]}


def sections(word: str) -> list[tuple[str, str]]:
    """Return the parts of the language at and below a word of `words`: path and page each."""
    if word == "states":
        return [("states.NAME", _STATES)]
    paths = [path for path, _ in SECTIONS if _word(path) == word]
    return [
        (path, _page(cls))
        for path, cls in SECTIONS
        if path in paths or any(path.startswith(f"{above}") for above in paths)
    ]


def _word(path: str) -> str:
    """Return the last name in a path that is written as it stands."""
    plain = path.partition(",")[0].removeprefix("a ").replace("[]", "")
    return [name for name in plain.split(".") if name != "NAME"][-1]


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
    return f"{_first(cls)}\n\n{reference_text(cls)}"


def _first(cls: type[Record]) -> str:
    return (getdoc(cls) or "").partition("\n")[0]
