"""The light of a state for people: a table of beams, then where the power went."""

from __future__ import annotations

from collections.abc import Sequence

from benchlay.report.cautions import CAUTIONS
from benchlay.report.details import BeamRow, Ledger, TraceResult
from benchlay.report.numbers import settled, shown
from benchlay.report.words import tame

_HEADINGS = (
    "beam", "of", "from", "to", "made by", "ends on", "route", "nm", "W", "path mm", "w mm",
)  # fmt: skip


def trace_text(result: TraceResult) -> str:
    """Write the beams in their order, then each source's ledger, then the cautions."""
    blocks = [f"{tame(result.layout)}: {len(result.beams)} beams in state {result.state}"]
    blocks.append(_table([_HEADINGS, *(_beam_cells(beam) for beam in result.beams)]))
    blocks += [_ledger_text(entry) for entry in result.ledger]
    blocks.append("\n".join(f"caution: {caution}" for caution in CAUTIONS))
    return "\n\n".join(blocks) + "\n"


def _beam_cells(beam: BeamRow) -> tuple[str, ...]:
    return (
        str(beam.beam),
        "-" if beam.parent is None else str(beam.parent),
        f"{beam.from_}.{beam.from_face}",
        _where_to(beam),
        beam.event,
        beam.ends,
        beam.route or "stray",
        shown(beam.wavelength_nm),
        shown(beam.power_W),
        f"{beam.optical_path_mm:.3f}",
        f"{beam.w_end_mm[0]:.3f} x {beam.w_end_mm[1]:.3f}",
    )


def _where_to(beam: BeamRow) -> str:
    if beam.to is None:
        return "-"
    return f"{beam.to}.{beam.to_face}" if beam.to_face else beam.to


def _ledger_text(entry: Ledger) -> str:
    rows = [
        (sink.kind, sink.name or "-", shown(sink.wavelength_nm, "nm"), shown(sink.power_W, "W"))
        for sink in entry.sinks
    ]
    head = f"{entry.source} emits {shown(entry.emitted_W, 'W')}, which ends on:"
    missing = settled(entry.unaccounted_W, entry.emitted_W)
    foot = f"  not accounted for: {shown(missing, 'W')}"
    return "\n".join([head, _table(rows), foot] if rows else [head, foot])


def _table(rows: Sequence[Sequence[str]]) -> str:
    widths = [max(map(len, column)) for column in zip(*rows, strict=True)]
    return "\n".join(
        ("  " + "  ".join(cell.ljust(w) for cell, w in zip(row, widths, strict=True))).rstrip()
        for row in rows
    )
