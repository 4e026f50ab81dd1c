"""Sheets: what goes on each, as plain data that every writer can draw."""

from __future__ import annotations

from collections.abc import Callable, Collection, Iterable, Iterator, Mapping
from typing import TYPE_CHECKING

from benchlay.named import NamedTuple

if TYPE_CHECKING:
    from benchlay.checks import Context
    from benchlay.faults import Review as FaultReview
    from benchlay.findings import Severity
    from benchlay.making.parts import Part
    from benchlay.sheets.contents import Mark
    from benchlay.sheets.elevation.contents import Elevation
    from benchlay.sheets.primitives import Sheet
    from benchlay.sheets.shop.listing import Page
    from benchlay.sheets.shop.rows import Rows
    from benchlay.sheets.template import Tile
    from benchlay.tracing.trace import Trace
    from benchlay.zones import Zones


class Subject(NamedTuple):
    """What sheets are drawn from."""

    context: Context
    zones: Zones
    counts: Iterable[tuple[Severity, int]]  # how many findings the review has, for the notes
    sha256: str  # of the layout's bytes, to be written into the files
    state: str | None = None  # the only one that the review speaks of, and so the one drawn
    findings: tuple[Mark, ...] = ()  # of the review
    faults: FaultReview | None = None  # where single faults were reviewed

    @property
    def trace(self) -> Trace:
        """The trace that is drawn."""
        return self.context.trace

    @property
    def variant(self) -> int:
        """The number of the state that is drawn."""
        return 0 if self.state is None else self.trace.scene.variants.index(self.state)


class Planned(NamedTuple):
    """A sheet that is going to be composed once its number in the set is known."""

    name: str  # the file's stem: that of its kind, or kind-NAME
    compose: Callable[[str], Sheet]  # from what the title block says of its number, as "2/7"
    numbered: bool = True  # a sheet of the set; cutting files have no title block, no number
    forms: Collection[str] | None = None  # endings of the files it is written as; None: all
    within: str = ""  # the PDF of several pages that it belongs to, instead of one of its own


class UnknownSheetError(ValueError):
    """A sheet was asked for by a name that none has."""

    def __init__(self, name: str, known: Iterable[str]) -> None:
        self.name, self.known = name, tuple(known)
        super().__init__(f"there is no sheet {name!r}, but {', '.join(self.known)}")


def _plan(subject: Subject) -> Iterator[Planned]:
    from benchlay.sheets.drafting import plan_picture
    from benchlay.sheets.plan import sheets

    picture = plan_picture(
        subject.trace,
        subject.zones,
        variant=subject.variant,
        counts=subject.counts,
        of_all_states=subject.state is None,
        sha256=subject.sha256,
        findings=subject.findings,
        context=subject.context,
    )
    for name, made in sheets(picture):
        yield Planned(name, made)


def _elevations(subject: Subject) -> Iterator[Planned]:
    from benchlay.sheets.drafting.elevations import elevation_of, state_of
    from benchlay.sheets.elevation import compose

    for route, name in enumerate(subject.trace.ways.names):
        variant = subject.variant if subject.state else state_of(subject.trace, route)
        picture = elevation_of(subject.trace, variant, route, subject.sha256)
        if picture is None:
            continue

        def elevation(number: str, picture: Elevation = picture) -> Sheet:
            return compose(picture._replace(fields=picture.fields._replace(sheet=number)))

        yield Planned(f"elevation-{name}", elevation)


def _room(subject: Subject) -> Iterator[Planned]:
    from benchlay.hazards import hazards_of, signs_of
    from benchlay.sheets.room import Subject as RoomSubject
    from benchlay.sheets.room import room_sheet
    from benchlay.zones.controlled import controlled_areas

    layout = subject.trace.placed.base.layout
    room = layout.room
    if room is None:
        return

    def sheet(number: str) -> Sheet:
        states = None if subject.state is None else (subject.state,)
        found = hazards_of(subject.context, subject.zones, states)
        areas, missing = controlled_areas(subject.zones), tuple(subject.zones.not_computed)
        shown = RoomSubject(layout, areas, signs_of(layout, found), missing)
        return room_sheet(shown, room, subject.sha256, number)

    yield Planned("room", sheet)


def _template(subject: Subject) -> Iterator[Planned]:
    from benchlay.sheets.drafting.legs import legs_of
    from benchlay.sheets.template import drawing_of, name_of, template_sheet, tiles
    from benchlay.zones import limits_of

    trace, state = subject.trace, subject.trace.placed.states[subject.variant]
    legs = legs_of(trace, limits_of(trace), subject.variant, ".").legs
    drawing = drawing_of(state, legs)
    cells = tiles(state.layout, drawing)
    for page, tile in enumerate(cells, start=1):

        def sheet(_: str, tile: Tile = tile, number: str = f"{page}/{len(cells)}") -> Sheet:
            return template_sheet(tile, drawing, state.layout, subject.sha256, number)

        yield Planned(name_of(tile), sheet, numbered=False, forms=("pdf",), within="template")


def _panels(subject: Subject) -> Iterator[Planned]:
    from benchlay.making.parts import parts_of
    from benchlay.sheets.shop.panel import panel_sheet

    layout = subject.trace.placed.base.layout
    for part in parts_of(layout):

        def panel(number: str, part: Part = part) -> Sheet:
            return panel_sheet(part, layout, subject.sha256, number)

        yield Planned(f"panel-{part.name}", panel)


def _drilling(subject: Subject) -> Iterator[Planned]:
    from benchlay.sheets.shop.drilling import MOST_BESIDE, drilling_rows, drilling_sheet

    def sheet(number: str) -> Sheet:
        return drilling_sheet(subject.trace.placed.base, subject.sha256, number)

    yield Planned("drilling", sheet)
    rows = drilling_rows(subject.trace.placed.base)
    if len(rows.rows) > MOST_BESIDE:
        table = rows._replace(name="drilling-holes", title=f"{rows.title}, holes")
        yield from _listed(table, subject)


def _setting_out(subject: Subject) -> Iterator[Planned]:
    from benchlay.sheets.shop.setting_out import setting_out

    yield from _listed(setting_out(subject.trace.placed), subject)


def _parts(subject: Subject) -> Iterator[Planned]:
    from benchlay.sheets.shop.parts_list import parts_list

    yield from _listed(parts_list(subject.trace.placed.base), subject)


def _listed(rows: Rows, subject: Subject) -> Iterator[Planned]:
    """Plan the sheets of a table: one, or as many as it takes."""
    from benchlay.sheets.drafting import title_fields
    from benchlay.sheets.shop.listing import listing, pages

    layout = subject.trace.placed.base.layout
    fields = title_fields(layout, rows.title, subject.sha256)
    for n, part in enumerate(pages(rows, layout), start=1):
        name = rows.name if n == 1 else f"{rows.name}-{n}"

        def sheet(number: str, part: Page = part, name: str = name) -> Sheet:
            return listing(rows, part, name, layout, fields._replace(sheet=number))

        yield Planned(name, sheet)


def _cuts(subject: Subject) -> Iterator[Planned]:
    from benchlay.making.parts import parts_of
    from benchlay.sheets.shop.cutting import cut_sheet

    for part in parts_of(subject.trace.placed.base.layout):
        if part.draft.lacks:
            continue  # its shop drawing says what is missing; half of it is not to be cut

        def cut(_: str, part: Part = part) -> Sheet:
            return cut_sheet(part, (("layout sha256", subject.sha256),))

        yield Planned(f"cut-{part.name}", cut, numbered=False, forms=("dxf",))


def _safety(subject: Subject) -> Iterator[Planned]:
    from benchlay.hazards import hazards_of, signs_of
    from benchlay.sheets.drafting.safety import safety_contents
    from benchlay.sheets.safety import compose, name_of

    layout = subject.trace.placed.base.layout
    states = None if subject.state is None else (subject.state,)
    found = hazards_of(subject.context, subject.zones, states)
    contents = safety_contents(layout, found, signs_of(layout, found), subject.sha256)
    for page, made in enumerate(compose(contents), start=1):
        yield Planned(name_of(page), made)


def _faults(subject: Subject) -> Iterator[Planned]:
    from benchlay.sheets.drafting.faults import faults_picture
    from benchlay.sheets.plan import sheets

    if subject.faults is None:
        return
    picture = faults_picture(
        subject.trace,
        subject.zones,
        subject.faults,
        variant=subject.variant,
        sha256=subject.sha256,
        context=subject.context,
    )
    for name, made in sheets(picture) if picture is not None else ():
        yield Planned(name, made)


SHEETS: Mapping[str, Callable[[Subject], Iterable[Planned]]] = {
    "plan": _plan,
    "elevation": _elevations,
    "safety": _safety,
    "faults": _faults,
    "room": _room,
    "panel": _panels,
    "drilling": _drilling,
    "setting-out": _setting_out,
    "parts": _parts,
    "cut": _cuts,
    "template": _template,
}
"""All kinds of sheet there are, by name, in the order of the set.

Each gives the sheets of its kind: one, several (`panel-NAME`), or none where the layout has
nothing for it. Each loads what it draws with when it is called: a check draws nothing.
"""


class Composed(NamedTuple):
    """A sheet with what is known of it in the set."""

    sheet: Sheet
    planned: Planned


def composed_sheets(subject: Subject, only: str | None = None) -> list[Composed]:
    """Compose the sheets of a set, or those that one name stands for.

    Parameters
    ----------
    subject : Subject
    only : str, optional
        The name of one sheet, or of a kind of sheet; all by default. Their numbers are those
        that they have in the whole set.

    Raises
    ------
    UnknownSheetError
        For the name of a sheet that there is not.
    NothingFitsError
        If a sheet fits on no paper.
    """
    planned = [(kind, one) for kind, plan in SHEETS.items() for one in plan(subject)]
    wanted = [pair for pair in planned if only is None or only in (pair[0], pair[1].name)]
    if only is not None and not wanted and only not in SHEETS:
        raise UnknownSheetError(only, dict.fromkeys([*SHEETS, *(one.name for _, one in planned)]))
    numbered = [one.name for _, one in planned if one.numbered]
    numbers = {name: f"{n}/{len(numbered)}" for n, name in enumerate(numbered, start=1)}
    return [Composed(one.compose(numbers.get(one.name, "")), one) for _, one in wanted]


def sheets_of(
    trace: Trace,
    zones: Zones | None = None,
    *,
    only: str | None = None,
    counts: Iterable[tuple[Severity, int]] = (),
    sha256: str = "",
    state: str | None = None,
    findings: tuple[Mark, ...] = (),
    faults: FaultReview | None = None,
    context: Context | None = None,
) -> list[Composed]:
    """Return the sheets of a traced layout, in its state as drawn or in the one named.

    Parameters
    ----------
    trace : Trace
    zones : Zones, optional
        The hazard zones, where they are known already: of all states, or of the one named.
    only, counts, sha256, state, findings, faults
        See `composed_sheets` and `Subject`.
    context : Context, optional
        What the checks know of the trace already.

    Raises
    ------
    UnknownSheetError, NothingFitsError
        See `composed_sheets`.
    """
    if zones is None:
        from benchlay.zones import zones_of

        zones = zones_of(trace, states=None if state is None else (state,))
    if context is None:
        from benchlay.checks import Context, limits_of

        context = Context(trace, limits_of(trace.placed))
    subject = Subject(context, zones, tuple(counts), sha256, state, findings, faults)
    return composed_sheets(subject, only)
