"""What a zone says of itself: who makes it, how far above the limit, where it ends and why."""

from __future__ import annotations

from collections.abc import Iterable

from benchlay.named import NamedTuple
from benchlay.zones.words import above_words, number, with_unit

DIRECT, DIFFUSE, OVER = "direct", "diffuse", "over"
_NAMED = 3  # of what makes a zone, named in its reason


class Maker(NamedTuple):
    """What makes a zone: in which way, and which of them."""

    how: str  # with the words before what it names
    names: tuple[str, ...]


class Measure(NamedTuple):
    """The strongest of a zone, and what it is held against."""

    power_w: float
    limit_w: float
    aperture_mm: float
    time_base_s: float
    ratio: float  # to the limit, where it is highest; infinite where there is none


class Bounds(NamedTuple):
    """What of a zone is to be known where it ends."""

    cut_off_m: float | None  # `limits.reach`, where the limit is still exceeded there
    eyes_m: float  # up to which height above the floor eyes are
    beyond: bool  # whether scattered light gets out of the enclosure


def reason(kind: str, makers: tuple[str, ...], measure: Measure, bounds: Bounds) -> str:
    """Say who makes a zone, how far it is above the limit, and where it ends."""
    power, limit, aperture, time_s, ratio = measure
    above = (
        f"limit {with_unit(limit, 'W')} through {number(aperture)} mm in {number(time_s)} s, "
        f"{above_words(ratio)}"
        if limit > 0.0
        else "no limit is known, so that any light counts"
    )
    where = _WHERE[kind].format(eyes=number(bounds.eyes_m))
    if bounds.beyond:
        where += "; beyond the enclosure over its edges or through openings"
    if bounds.cut_off_m is not None:
        where += (
            f"; cut off at `limits.reach` ({number(bounds.cut_off_m)} m), still above the limit"
        )
    return f"{'; '.join(makers)}: up to {with_unit(power, 'W')}, {above}; {where}"


_WHERE = {
    DIRECT: "to the first opaque thing, seen in plan whatever the height",
    DIFFUSE: (
        "where an eye sees the spot from too near, at some height from the spot's own "
        "to {eyes} m above the floor"
    ),
    OVER: "beyond the top of the enclosure, seen in plan whatever the height",
}


def makers_in_words(makers: Iterable[Maker]) -> tuple[str, ...]:
    """Return what makes a zone, each way of making it once."""
    found: dict[str, dict[str, None]] = {}
    for maker in makers:
        found.setdefault(maker.how, {}).update(dict.fromkeys(maker.names))
    return tuple(f"{how} {_listed(list(names))}" for how, names in found.items())


def _listed(names: list[str]) -> str:
    if len(names) > _NAMED:
        return f"{', '.join(names[:_NAMED])} and {len(names) - _NAMED} more"
    return " and ".join([", ".join(names[:-1]), names[-1]] if len(names) > 1 else names)
