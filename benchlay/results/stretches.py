"""Which stretches of the beams a mirror could throw out through each gap, for the findings."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from math import dist

from benchlay.checks import Context, opening_mirror
from benchlay.report.model import Reported, Stretch
from benchlay.results.coverage import is_about


def with_stretches(findings: Sequence[Reported], context: Context) -> tuple[Reported, ...]:
    """Return findings, those of `opening-mirror` with what is guilty in their worst state.

    What the check found says only that there is some stretch: to find where each begins and
    ends takes longer than a plain check may.
    """
    return tuple(
        _with_stretch(finding, tuple(_stretches(context, finding)))
        if finding.check == opening_mirror.NAME and finding.at is not None
        else finding
        for finding in findings
    )


def _with_stretch(finding: Reported, stretches: tuple[Stretch, ...]) -> Reported:
    own = [one for one in stretches if one.beam == finding.beam]
    longest = max(own, key=lambda one: dist(one.from_, one.to), default=None)
    stretch = None if longest is None else (longest.from_, longest.to)
    return finding._replace(stretch=stretch, stretches=stretches)


def _stretches(context: Context, finding: Reported) -> Iterator[Stretch]:
    variant = context.trace.scene.variants.index(finding.worst_state)
    for thrown in context.gaps.thrown(variant):
        if not is_about(finding.id, opening_mirror.NAME, thrown.gap):
            continue
        found = context.gaps.stretches(variant, thrown)
        for (beam, _, leg), start, end in sorted(found, key=lambda one: one.of.beam):
            yield Stretch(int(context.numbers[beam]), leg.at(start), leg.at(end))
