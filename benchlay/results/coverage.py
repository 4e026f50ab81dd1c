"""What is open round every place of a state, as rows of the review."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from math import degrees

from benchlay.checks import open_side
from benchlay.coverage.gaps import Gap as DrawnGap
from benchlay.coverage.places import strongest
from benchlay.coverage.rows import OUTSIDE, Seen, coverage_of
from benchlay.findings import make_id
from benchlay.report.details import Angles, Coverage, Gap
from benchlay.report.model import Reported
from benchlay.tracing import Trace


def coverage_rows(trace: Trace, variant: int, findings: Sequence[Reported]) -> Iterator[Coverage]:
    """Yield the coverage of the places of a state; a gap's id is that of its finding."""
    ids = frozenset(f.id for f in findings if f.check == open_side.NAME)
    powers = strongest(trace, variant)
    for row in coverage_of(trace, variant):
        power_w = powers[row.place].power_w if row.place in powers else 0.0
        gaps = tuple(_gap(one, ids, power_w) for one in row.seen)
        yield Coverage(trace.scene.variants[variant], row.place, row.covered, gaps)


def _gap(seen: Seen, ids: frozenset[str], power_w: float) -> Gap:
    gap, found = seen
    return Gap(
        id=_id(gap, ids),
        azimuth=_degrees(found.azimuth),
        elevation=_degrees(found.elevation),
        solid_angle_sr=found.solid_angle_sr,
        through=OUTSIDE if gap is None else gap.through,
        width_mm=0.0 if gap is None else gap.width_mm,
        at=None if gap is None else gap.at,
        power_W=power_w,
    )


def is_about(known: str, check: str, gap: DrawnGap) -> bool:
    """Whether an id is that of a check's finding about a gap.

    Where two short ids agreed, those of the findings were made longer.
    """
    element, name = gap.key
    return known == make_id(check, element, (name,), len(known.rpartition("/")[2]))


def _id(gap: DrawnGap | None, ids: frozenset[str]) -> str:
    """Return the id of the gap's finding, or the one that it would have."""
    if gap is None:
        return make_id(open_side.NAME, None, (OUTSIDE,))
    found = sorted(known for known in ids if is_about(known, open_side.NAME, gap))
    element, name = gap.key
    return found[0] if found else make_id(open_side.NAME, element, (name,))


def _degrees(angles: Angles) -> Angles:
    return degrees(angles[0]), degrees(angles[1])
