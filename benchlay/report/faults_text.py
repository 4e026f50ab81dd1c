"""The review of single faults for people: the gravest first, each fault once over its states."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from benchlay.report.cautions import CAUTIONS
from benchlay.report.details import PanelLoad
from benchlay.report.faults import FaultRow, FaultsResult, OpenedRow, WindowRow
from benchlay.report.numbers import shown
from benchlay.report.words import Ink, listed, tame

PLAIN = Ink()
_WORD = {"escape": "fail", "not evaluated": "fail", "stray": "warn"}
_HOW = {"escape": "out by", "not evaluated": "at", "stray": "unstopped on"}
_HEADINGS = {
    "escape": "light gets out",
    "not evaluated": "not evaluated: no pass",
    "stray": "hazardous light ends where nothing is meant to stop it",
}


def faults_text(result: FaultsResult, *, ink: Ink = PLAIN) -> str:
    """Write the review."""
    lines: list[str] = []
    for outcome, heading in _HEADINGS.items():
        rows = [row for row in result.faults if row.outcome == outcome]
        if rows:
            lines.append(f"{ink.paint(_WORD[outcome])} {heading}:")
            lines += _table(rows)
            lines.append("")
    lines += guard_lines(result)
    lines.append(summary(result))
    lines += _remarks(result)
    lines += [f"caution: {caution}" for caution in CAUTIONS]
    return "\n".join(lines) + "\n"


def summary(result: FaultsResult) -> str:
    """Sum up the review in one line."""
    counts = [f"{result.count(o)} {o}" for o in (*_HEADINGS, "none") if result.count(o)]
    return (
        f"{tame(result.layout)}: {len(result.faults)} single faults "
        f"({', '.join(counts) or 'none credible'}); states: {listed(result.states)}"
    )


def worst_line(result: FaultsResult, ink: Ink = PLAIN) -> str | None:
    """Say in a line what the gravest fault does; None where none does anything."""
    worst = next(iter(result.faults), None)
    if worst is None or worst.outcome not in _WORD:
        return None
    word = ink.paint(_WORD[worst.outcome])
    if worst.through is None:
        return f"{word} {tame(worst.fault)} in {worst.state}: {tame(worst.reason or 'unknown')}"
    return (
        f"{word} {tame(worst.fault)} in {worst.state}: {shown(worst.power_W, 'W')}, "
        f"{shown(worst.times_limit)} times the limit, {_HOW[worst.outcome]} {tame(worst.through)}"
    )


def _table(rows: Sequence[FaultRow]) -> Iterator[str]:
    cells: list[tuple[str, ...]] = [("", "fault", "power", "x limit", "where", "settings", "in")]
    seen: dict[tuple[str, str], list[FaultRow]] = {}
    for row in rows:
        seen.setdefault((row.kind, _family(row)), []).append(row)
    cells += [_cells(same) for same in seen.values()]
    yield from _columns(cells)


def _columns(cells: Sequence[Sequence[str]]) -> Iterator[str]:
    widths = [max(len(line[i]) for line in cells) for i in range(len(cells[0]))]
    for line in cells:
        padded = (cell.ljust(width) for cell, width in zip(line, widths, strict=True))
        yield ("  " + "  ".join(padded)).rstrip()


def _family(row: FaultRow) -> str:
    """Return a fault's name without its setting."""
    return row.fault if row.setting_deg is None else " ".join(row.fault.split()[:-1])


def _cells(same: Sequence[FaultRow]) -> tuple[str, ...]:
    row = same[0]
    low, high = row.range or (0.0, 0.0)
    ranges = f"{low:.4g} to {high:.4g}°" if low != high else f"at {low:.4g}°" if row.range else ""
    if len(row.ranges) > 1:
        ranges += f" (of {len(row.ranges)} ranges)"
    return (
        listed([one.number for one in same if one.number]) if row.number else "",
        tame(row.fault),
        shown(row.power_W, "W"),
        shown(row.times_limit),
        tame(row.reason or "" if row.through is None else row.through),
        ranges,
        listed([one.state for one in same]),
    )


def guard_lines(result: FaultsResult) -> list[str]:
    """Write what panels and windows hold back, and what access panels give access to."""
    lines: list[str] = []
    if result.panels:
        cells: list[tuple[str, ...]] = [
            ("panel", "takes", "for", "withstands", "margin", "governs")
        ]
        cells += [_panel(row) for row in sorted(result.panels, key=_least_margin)]
        lines += ["panels and lids as guards, over states and faults:", *_columns(cells), ""]
    if result.windows:
        cells = [("window", "in", "at", "density", "needed", "for a full beam")]
        cells += [_window(row) for row in result.windows]
        lines += ["viewing windows:", *_columns(cells), ""]
    if result.opened:
        cells = [("open", "in", "access", "lets out", "x limit", "within reach inside")]
        cells += [_opened(row) for row in result.opened]
        lines += ["what is accessible when a panel or lid is open:", *_columns(cells), ""]
    return lines


def _sheet(kind: str, name: str) -> str:
    return tame(name if kind == "panel" else f"{kind} {name}")


def overloaded(result: FaultsResult) -> list[str]:
    """Name the panels and lids that withstand less than they may take, the worst first."""
    rows = [row for row in result.panels if row.margin is not None and row.margin < 1.0]
    return [
        f"{_sheet(row.sheet, row.panel)} (takes {shown(row.value, row.unit or '')}, "
        f"{_governs(row)}; withstands {shown(row.limit, row.unit or '')})"
        for row in sorted(rows, key=_least_margin)
    ]


def _least_margin(row: PanelLoad) -> tuple[bool, bool, float]:
    """Put first what withstands too little, then what is not shown, then the rest by margin."""
    unlit = row.state is None
    short = row.margin is not None and row.margin < 1.0
    return unlit, not short and row.margin is not None, row.margin or 0.0


def _governs(row: PanelLoad) -> str:
    return tame(f"{row.fault or 'as it is'}, in {row.state}")


def _panel(row: PanelLoad) -> tuple[str, ...]:
    unit = row.unit or ""
    margin = shown(row.margin) if row.margin is not None else f"not shown: {row.reason}"
    if row.margin is not None and row.margin < 1.0:
        margin += " (too little)"
    return (
        _sheet(row.sheet, row.panel),
        shown(row.value, unit),
        shown(row.exposed_s, "s"),
        shown(row.limit, unit),
        margin,
        "" if row.state is None else _governs(row),
    )


def _window(row: WindowRow) -> tuple[str, ...]:
    density = "opaque" if row.density is None else shown(row.density)
    needs = [shown(n) for n in (row.needed_density, row.needed_density_full)]
    marks = ["" if ok is not False else " (too little)" for ok in (row.enough, row.enough_for_full)]
    return (
        tame(row.window),
        tame(row.opening),
        shown(row.wavelength_nm, "nm"),
        density,
        *(need + mark for need, mark in zip(needs, marks, strict=True)),
    )


def _opened(row: OpenedRow) -> tuple[str, ...]:
    inside = f"{shown(row.inside_W, 'W')} ({shown(row.inside_times_limit)} x limit)"
    return (
        _sheet(row.sheet, row.panel),
        tame(row.state),
        row.access,
        "no beam" if row.power_W is None else shown(row.power_W, "W"),
        shown(row.times_limit),
        "no beam" if row.inside_W is None else inside,
    )


def _remarks(result: FaultsResult) -> Iterator[str]:
    resolution = result.resolution
    yield (
        f"traced {result.cases} cases; {result.passed_over} faults are of things that no "
        "hazardous light comes near"
    )
    yield (
        f"resolution: rays between settings at most {shown(resolution.step_mm, 'mm')} apart where "
        f"they end; ends of ranges within {shown(resolution.range_deg, '°')} where light gets out, "
        f"{shown(resolution.stray_range_deg, '°')} where it ends inside; gaps narrower than "
        f"{shown(resolution.narrowest_gap_mm, 'mm')} may be passed over"
    )
    yield from (f"assumed: {words}" for words in result.assumed)
