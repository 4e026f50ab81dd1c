"""What the safety sheets say: tables of all states, then labels, assumptions, cautions.

Rows that are the same in several states stand once, with the names of the states.
"""

from __future__ import annotations

import re
from collections.abc import Iterable, Iterator, Sequence

from benchlay.exposure.cautions import CAUTIONS
from benchlay.exposure.viewing import NEAREST_M
from benchlay.hazards import words
from benchlay.hazards.model import Eyewear, Sign, StateHazards
from benchlay.layout.layout import Layout
from benchlay.sheets.drafting.picture import title_fields
from benchlay.sheets.safety import COLUMN_MM, Block, SafetyContents
from benchlay.sheets.tables import Column, Table

_MOST = 6  # beams and surfaces a state; the rest is counted, and stands in findings.json
_WHERE = "findings.json"
_LINES = 12  # to a cell; nothing that a layout can hold fills them

_POINT = re.compile(r"(?<=\d)\.(?=\d)")  # names have no points between figures

_Row = tuple[str, ...]


def safety_contents(
    layout: Layout, states: Sequence[StateHazards], signs: Sequence[Sign], sha256: str = ""
) -> SafetyContents:
    """Return what the safety sheets of a layout say of some states.

    Parameters
    ----------
    layout : Layout
        As drawn.
    states : sequence of StateHazards
    signs : sequence of Sign
        The schedule of labels and signs.
    sha256 : str
        Of the layout's bytes.
    """
    decimal = "." if layout.drawing.decimal == "point" else ","
    tables = (
        _eyewear(states, decimal),
        _in_reach(states),
        _who(states, decimal),
        _numbered("Until when", "This holds", _shared(states, [s.holds for s in states])),
        _sources(states, decimal),
        _distances(states, decimal),
        _diffuse(states, decimal),
        _numbered("Assumed", "Taken for granted", _shared(states, [s.assumptions for s in states])),
        _numbered("Not computed", "Missing", _shared(states, [s.not_computed for s in states])),
        signs_block(signs),
        _numbered("Cautions", "To be read with all of it", CAUTIONS),
    )
    return SafetyContents(
        fields=title_fields(layout, "Safety sheet", sha256),
        blocks=tuple(_with_sign(block, decimal) for block in tables if block.table.rows),
        states=tuple(state.state for state in states),
        properties=(("layout sha256", sha256),) if sha256 else (),
        decimal=decimal,
    )


def _with_sign(block: Block, decimal: str) -> Block:
    """Return a block whose sentences too have the sheet's decimal sign."""
    if decimal == ".":
        return block
    rows = tuple(tuple(_POINT.sub(decimal, cell) for cell in row) for row in block.table.rows)
    return block._replace(table=block.table._replace(rows=rows))


def _columns(*named: tuple[str, float]) -> tuple[Column, ...]:
    """Return columns of some widths, mm; the last one has the rest."""
    *first, (last, _) = named
    used = sum(width for _, width in first)
    return (*(Column(*one) for one in first), Column(last, COLUMN_MM - used))


def _merged(
    states: Sequence[StateHazards], of_states: Sequence[Sequence[_Row]]
) -> tuple[_Row, ...]:
    """Return rows once each, before them the states that they hold in."""
    found: dict[_Row, list[str]] = {}
    for state, rows in zip(states, of_states, strict=True):
        for row in dict.fromkeys(rows):
            found.setdefault(row, []).append(state.state)
    return tuple((_states(names, len(states)), *row) for row, names in found.items())


def _states(names: Sequence[str], count: int) -> str:
    return "all states" if len(names) == count > 1 else ", ".join(names)


def _shared(states: Sequence[StateHazards], of_states: Sequence[Sequence[str]]) -> list[str]:
    """Return sentences once each, before those that hold in some states only their names."""
    rows = _merged(states, [[(line,) for line in lines] for lines in of_states])
    every = {_states([s.state for s in states], len(states))}
    return [line if where in every else f"{where}: {line}" for where, line in rows]


_EYEWEAR = _columns(
    ("State", 28.0),
    ("Where", 36.0),
    ("Wavelength", 25.0),
    ("OD", 11.0),
    ("Scale number, EN 207", 50.0),
    ("Worst light from", 0.0),
)


def _eyewear(states: Sequence[StateHazards], decimal: str) -> Block:
    rows = _merged(states, [list(_eyewear_rows(state, decimal)) for state in states])
    several = any(len({row.wavelength_nm for row in s.eyewear}) > 1 for s in states)
    one = ": one set must do for all wavelengths of its state and place" if several else ""
    return Block(Table(f"Eyewear{one}", _EYEWEAR, rows, _WHERE, most_lines=_LINES))


def _eyewear_rows(state: StateHazards, decimal: str) -> Iterator[_Row]:
    """Yield a row for each place and wavelength; one for all where none is exceeded."""
    by_place: dict[str, list[Eyewear]] = {}
    for row in state.eyewear:
        by_place.setdefault(row.where, []).append(row)
    for where, rows in by_place.items():
        place = words.place(where, state)
        if all(row.optical_density == 0.0 for row in rows):
            waves = ", ".join(words.wavelength(row.wavelength_nm, decimal) for row in rows)
            yield place, waves, "-", words.NOT_EXCEEDED, "-"
            continue
        for row in rows:
            yield (
                place,
                words.wavelength(row.wavelength_nm, decimal),
                words.density(row, decimal),
                words.scale(row, decimal),
                words.beam_of(row),
            )


_REACH = _columns(("State", 28.0), ("People can reach", 78.0), ("On the other side", 0.0))


def _in_reach(states: Sequence[StateHazards]) -> Block:
    rows = _merged(states, [[_reached(state)] for state in states])
    return Block(Table("In reach", _REACH, rows, _WHERE, most_lines=_LINES))


def _reached(state: StateHazards) -> _Row:
    found = state.accessible
    why = ", ".join(found.because) if found.because else "the enclosure is whole and shut"
    if found.outside is None:
        return f"({why}) {words.reached(found.inside)}", "-"
    shut = found.counts == "outside"
    counted, kept = (found.outside, found.inside) if shut else (found.inside, found.outside)
    where = "inside" if shut else "outside the enclosure"
    return f"({why}) {words.reached(counted)}", f"{where}: {words.reached(kept)}"


_WHO = _columns(("State", 28.0), ("Controlled area", 27.0), ("Who may stand where", 0.0))


def _who(states: Sequence[StateHazards], decimal: str) -> Block:
    found = []
    for state in states:
        lines = [words.entry(state), *words.others(state, decimal)]
        found.append([(words.area(state, decimal), "; ".join(lines))])
    heading = "Who may stand where"
    return Block(Table(heading, _WHO, _merged(states, found), _WHERE, most_lines=_LINES))


_SOURCES = _columns(
    ("State", 28.0),
    ("Source", 20.0),
    ("Wavelength", 25.0),
    ("Output", 36.0),
    ("Limit, as modelled", 29.0),
    ("Eye's limit exceeded (formula)", 0.0),
)


def _sources(states: Sequence[StateHazards], decimal: str) -> Block:
    rows = _merged(
        states,
        [
            [
                (
                    source.source,
                    words.wavelength(source.wavelength_nm, decimal),
                    words.output(source, decimal),
                    words.short_class(source.class_as_modelled),
                    words.short_span(source.span, decimal),
                )
                for source in state.sources
            ]
            for state in states
        ],
    )
    edition = states[0].edition if states else ""
    return Block(Table(f"Sources, after {edition}", _SOURCES, rows, _WHERE, most_lines=_LINES))


_DISTANCES = _columns(
    ("State", 28.0),
    ("Beam in reach", 34.0),
    ("Wavelength", 25.0),
    ("Exceeded if nothing stops it (formula)", 55.0),
    ("Stopped in the model at", 0.0),
)


def _distances(states: Sequence[StateHazards], decimal: str) -> Block:
    rows = [
        [
            (
                words.beam_of(row) + (f", {row.alike} alike" if row.alike else ""),
                words.wavelength(row.wavelength_nm, decimal),
                words.short_span(words.span_of(row), decimal),
                words.stopped(row, decimal),
            )
            for row in state.distances[:_MOST]
        ]
        for state in states
    ]
    heading = _headed("Beams in reach above the limit", [len(s.distances) for s in states])
    return Block(Table(heading, _DISTANCES, _merged(states, rows), _WHERE, most_lines=_LINES))


_DIFFUSE = _columns(
    ("State", 28.0),
    ("Scatters", 34.0),
    ("Wavelength", 25.0),
    ("Light on it", 22.0),
    ("Do not look at it from nearer than", 0.0),
)


def _diffuse(states: Sequence[StateHazards], decimal: str) -> Block:
    rows = [list(_diffuse_rows(state, decimal)) for state in states]
    heading = "Scattered light"
    return Block(Table(heading, _DIFFUSE, _merged(states, rows), _WHERE, most_lines=_LINES))


def _diffuse_rows(state: StateHazards, decimal: str) -> Iterator[_Row]:
    """Yield the surfaces that matter at a distance; the others are counted."""
    far = [row for row in state.diffuse if row.distance_m >= NEAREST_M]
    for row in far[:_MOST]:
        yield (
            row.surface,
            words.wavelength(row.wavelength_nm, decimal),
            words.power(row.power_W, decimal),
            words.viewing(row, decimal),
        )
    if len(far) > _MOST:
        least = words.viewing(far[_MOST], decimal)
        yield f"{len(far) - _MOST} more, in {_WHERE}", "-", "-", f"at most {least}"
    near = len(state.diffuse) - len(far)
    if near:
        yield (
            "all others" if far else words.counted(near, "surface"),
            "-",
            "-",
            words.metres(NEAREST_M, decimal),
        )


def _headed(heading: str, counts: Sequence[int]) -> str:
    if max(counts, default=0) <= _MOST:
        return heading
    return f"{heading}: the worst {_MOST} a state, the rest in {_WHERE}"


def _numbered(heading: str, column: str, lines: Iterable[str]) -> Block:
    rows = tuple((str(n), line) for n, line in enumerate(lines, start=1))
    columns = _columns(("No.", 9.0), (column, 0.0))
    return Block(Table(heading, columns, rows, _WHERE, most_lines=_LINES))


_SIGNS = _columns(
    ("Sign", 20.0),
    ("Where", 38.0),
    ("Words, to be confirmed by the laser safety officer", 99.0),
    ("Size, mm", 0.0),
)


def signs_block(signs: Sequence[Sign]) -> Block:
    """Return the schedule of labels and signs as a table."""
    rows = tuple(
        (
            # The mark that is drawn there bears the number.
            "" if sign.triangle_mm else sign.number,
            sign.place,
            "; ".join(sign.words),
            _size(sign),
        )
        for sign in signs
    )
    marks = tuple(sign.number if sign.triangle_mm else "" for sign in signs)
    heading = "Labels and signs"
    return Block(Table(heading, _SIGNS, rows, _WHERE, most_lines=_LINES), marks)


def _size(sign: Sign) -> str:
    width, height = sign.size_mm
    words_ = f"{width:g} x {height:g}"
    return f"{words_}, triangle {sign.triangle_mm:g}" if sign.triangle_mm else words_
