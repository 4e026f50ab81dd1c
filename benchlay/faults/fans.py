"""Escape fans: where the light goes that a fault sends out, over all its settings."""

from __future__ import annotations

from collections.abc import Sequence
from math import asin, atan2, dist, pi

from benchlay.faults.review import Fault
from benchlay.faults.verdicts import Light, Vector
from benchlay.named import NamedTuple

_LEAST = 1e-9  # horizontal part below which a direction has no azimuth


class Fan(NamedTuple):
    """What one fault sends out, in one state: rays by their settings, from origin to end, mm.

    `strands` are the rays of one way out each, at settings that follow one another;
    `azimuth_rad` and `elevation_rad` hold all of them, the azimuth anticlockwise from the first
    to the second.
    """

    number: str  # #1: the same in the table and on the plan; no name begins like it
    fault: Fault
    strands: tuple[tuple[tuple[Vector, Vector], ...], ...]
    azimuth_rad: tuple[float, float]
    elevation_rad: tuple[float, float]
    reach_mm: float


def fans_of(faults: Sequence[Fault]) -> tuple[Fan, ...]:
    """Return the fans of the faults that send light out, in their order."""
    out = [fault for fault in faults if fault.outcome == "escape"]
    return tuple(_fan(f"#{n}", fault) for n, fault in enumerate(out, start=1))


def _fan(number: str, fault: Fault) -> Fan:
    strands = _strands(fault)
    lights = [light for way in strands for light in way]
    directions = [light.direction for light in lights]
    elevations = [asin(max(-1.0, min(1.0, k[2]))) for k in directions]
    return Fan(
        number,
        fault,
        tuple(tuple((light.origin, light.end) for light in way) for way in strands),
        _around([atan2(k[1], k[0]) for k in directions if abs(k[0]) + abs(k[1]) > _LEAST]),
        (min(elevations), max(elevations)),
        max(dist(light.origin, light.end) for light in lights),
    )


def _strands(fault: Fault) -> list[list[Light]]:
    """Return the light of one way out each, at settings that follow one another."""
    found: list[list[Light]] = []
    open_ones: dict[object, list[Light]] = {}
    for case in fault.cases:
        there = {light.key: light for light in case.verdict.escapes}
        open_ones = {key: strand for key, strand in open_ones.items() if key in there}
        for key, light in there.items():
            if key not in open_ones:
                open_ones[key] = []
                found.append(open_ones[key])
            open_ones[key].append(light)
    return found


def _around(angles: list[float]) -> tuple[float, float]:
    """Return the shortest stretch of azimuths, anticlockwise, that holds all of some."""
    if not angles:
        return (0.0, 2.0 * pi)  # straight up: no azimuth of its own
    ordered = sorted(angles)
    following = [*ordered[1:], ordered[0] + 2.0 * pi]
    gaps = [b - a for a, b in zip(ordered, following, strict=True)]
    widest = gaps.index(max(gaps))
    start = ordered[(widest + 1) % len(ordered)]
    return (start, start + 2.0 * pi - gaps[widest])
