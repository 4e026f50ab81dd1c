"""Within the limit of which class is what people can reach, and what stays inside."""

from __future__ import annotations

import math

from benchlay.checks import Context
from benchlay.exposure.classes import Classification
from benchlay.hazards.classes import classify, name_of, statement, together, worst
from benchlay.hazards.lines import aperture_mm, by_line, lit, of_line
from benchlay.hazards.matt import Struck, met_at_m, met_w
from benchlay.hazards.model import Accessible, LineReached, Reached, Scattered
from benchlay.hazards.reach import INSIDE, OUTSIDE, Reach, Way, strongest
from benchlay.named import NamedTuple


class _Collected(NamedTuple):
    """Some beams as a classification asks of them: what apertures take at the worst place.

    No distance is allowed for: people can come as near as the light can be reached at all.
    """

    context: Context
    way: Way
    power_w: float

    def share(self, aperture_mm: float, distance_m: float) -> float:
        """Share of `power_w` through a circle, at the worst place of the worst beam."""
        del distance_m
        return strongest(self.context, self.way, aperture_mm)[1] / self.power_w


def accessible(context: Context, reach: Reach, struck: tuple[Struck, ...]) -> Accessible:
    """Return what can be reached in a state, by where.

    Parameters
    ----------
    context : Context
    reach : Reach
        Which light of the state can be met.
    struck : tuple of Struck
        The surfaces that scatter it.
    """
    within = _reached(context, reach.variant, reach.within, struck, where=INSIDE)
    beyond = None
    if reach.beyond is not None:
        beyond = _reached(context, reach.variant, reach.beyond, struck, where=OUTSIDE)
    counted = beyond if beyond is not None and reach.counts == OUTSIDE else within
    return Accessible(
        reach.counts,
        reach.because,
        counted.class_as_modelled,
        counted.statement,
        beyond,
        within,
    )


def _reached(
    context: Context, variant: int, way: Way, struck: tuple[Struck, ...], *, where: str
) -> Reached:
    lines, classified = [], []
    for key in by_line(context, way):
        line, found = _line(context, of_line(context, way, key))
        lines.append(line)
        classified.append(found)
    scattered = _scattered(context, variant, struck, where)
    direct = together(classified)
    of_scatter = "1" if scattered is None else scattered.class_as_modelled
    name = worst([direct, of_scatter])
    words, governs = statement(name), _governs(lines)
    if scattered is not None and (not lines or worst([direct]) != name):
        governs = (
            f"{scattered.wavelength_nm:.10g} nm scattered from {scattered.surface}, "
            f"met at {scattered.distance_m:.2g} m"
        )
    elif not lines:
        words = f"no light that was followed gets there: {words}"
    return Reached(name, words, governs, tuple(lines), scattered)


def _governs(lines: list[LineReached]) -> str:
    """Say which of some lines is the worst, and whether there are others."""
    if not lines:
        return ""
    ratios = [math.inf if line.ratio is None else line.ratio for line in lines]
    strongest_ = lines[ratios.index(max(ratios))]
    other = " with all other lines" if len(lines) > 1 else ""
    return f"{strongest_.wavelength_nm:.10g} nm from {strongest_.from_}{other}"


def _line(context: Context, way: Way) -> tuple[LineReached, Classification | str]:
    found_lit = lit(context, way)
    most = float(context.trace.beams.start.power[way.beams].max())
    found = classify(
        found_lit.wavelength_nm, most, found_lit.told.pulse, _Collected(context, way, most)
    )
    name, limit = name_of(found), found_lit.told.limit
    line = LineReached(
        found_lit.source,
        found_lit.wavelength_nm,
        name,
        statement(name),
        found_lit.power_w,
        None if limit is None else limit.accessible_w,
        None if limit is None else found_lit.ratio,
        None if found_lit.beam is None else int(context.numbers[found_lit.beam]),
        found_lit.from_,
        found_lit.at,
    )
    return line, found


def _scattered(
    context: Context, variant: int, struck: tuple[Struck, ...], where: str
) -> Scattered | None:
    """Return the strongest scattered light, as it meets an eye's aperture at the least distance."""
    found = []
    for one in struck:
        distance = met_at_m(one, where)
        if distance is None:
            continue
        told = context.limits[variant, one.source, one.wavelength_nm]
        power = met_w(one, distance, aperture_mm(told))
        name = name_of(classify(one.wavelength_nm, power, told.pulse))
        ratio = math.inf if told.limit is None else power / told.limit.accessible_w
        found.append((ratio, Scattered(one.surface, one.wavelength_nm, distance, power, name)))
    return max(found, key=lambda pair: pair[0])[1] if found else None
