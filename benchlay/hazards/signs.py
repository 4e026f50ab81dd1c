"""Labels and signs: which, where, with which words, how large.

The words are our own, after what clause 7 of IEC 60825-1:2014 asks a label to say (from
memory): the class, what to avoid, the wavelength, the greatest output, the pulses, and the
edition. The laser safety officer confirms them. A drawing shows a plain triangle with the
number of the sign; the sign itself is the one of ISO 7010 (W004).
"""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Sequence
from types import MappingProxyType

from benchlay.exposure import EDITION
from benchlay.exposure.factors import is_visible
from benchlay.hazards.classes import worst
from benchlay.hazards.model import Reached, Sign, SourceHazard, StateHazards
from benchlay.hazards.reach import OUTSIDE
from benchlay.hazards.words import density_up
from benchlay.layout.layout import Layout
from benchlay.zones.words import with_unit

_ORDER = ("1", "1M", "2", "2M", "3R", "3B", "4")
_HIGHEST = "4"
_WITHOUT_AREA = frozenset({"1", "2"})
_WITH_APERTURE = frozenset({"3R", "3B", "4"})

# What each class asks of people, in our own words.
_AVOID = MappingProxyType(
    {
        "1": "keep the housing closed while the laser is on",
        "1M": "do not look at the beam through optics",
        "2": "do not keep looking into the beam",
        "2M": "do not keep looking into the beam, nor look at it through optics",
        "3R": "keep the beam out of the eyes",
        "3B": "keep out of the beam",
        "4": "keep eyes and skin out of the beam and of its scattered light",
    }
)

# Triangles are read from about 40 times their height (ISO 3864, from memory).
_NEAR_MM, _AT_PANEL_MM, _AT_DOOR_MM = 25.0, 50.0, 200.0
_LABEL_MM = (105.0, 52.0)
_SMALL_MM = (52.0, 26.0)
_PANEL_MM = (148.0, 74.0)
_DOOR_MM = (297.0, 210.0)


def signs_of(layout: Layout, states: Sequence[StateHazards]) -> tuple[Sign, ...]:
    """Return the schedule of labels and signs for a bench in all of some states.

    Parameters
    ----------
    layout : Layout
        As drawn.
    states : sequence of StateHazards
        Each label bears the worst of them.
    """
    found = [*_at_sources(states), *_at_panels(layout, states), *_at_doors(layout, states)]
    return tuple(sign._replace(number=f"LB{n}") for n, sign in enumerate(found, start=1))


def _at_sources(states: Sequence[StateHazards]) -> Iterator[Sign]:
    by_source: dict[str, list[SourceHazard]] = {}
    for state in states:
        for line in state.sources:
            by_source.setdefault(line.source, []).append(line)
    for source, lines in sorted(by_source.items()):
        strongest = _strongest(lines)
        name = worst([line.class_as_modelled for line in strongest])
        light = _light(line.wavelength_nm for line in strongest)
        yield _sign(
            "source",
            f"on the housing of {source}",
            name,
            (light, _class_words(name), *_outputs(strongest), EDITION),
            (0.0 if name == "1" else _NEAR_MM, _LABEL_MM),
        )
        if name is None or name in _WITH_APERTURE:
            words = (f"{light} leaves here", _class_words(name))
            yield _sign("aperture", f"at the exit of {source}", name, words, (0.0, _SMALL_MM))


def _at_panels(layout: Layout, states: Sequence[StateHazards]) -> Iterator[Sign]:
    """Yield labels for what may be opened, where what is inside is above class 1."""
    enclosure = layout.enclosure
    name = worst([state.accessible.inside.class_as_modelled for state in states])
    if enclosure is None or name == "1":
        return
    sheets = [
        *(("panel", key, enclosure.panels[key].access) for key in sorted(enclosure.panels)),
        *(("lid", key, enclosure.lids[key].access) for key in sorted(enclosure.lids)),
    ]
    # What crystals and the like make counts too, and only it where it is all there is.
    light = _light_of([state.accessible.inside for state in states])
    for kind, key, access in sheets:
        if access == "none":
            continue
        opened = "when open"
        if access == "interlocked":
            opened += " and the interlock is defeated"
        words = (f"{light} {opened}", _class_words(name))
        yield _sign(kind, f"on {kind} {key}", name, words, (_AT_PANEL_MM, _PANEL_MM))


def _at_doors(layout: Layout, states: Sequence[StateHazards]) -> Iterator[Sign]:
    """Yield the signs of the room's doors, where people can reach light that asks for them.

    Below class 1M that is where the limit is exceeded, for the time base of the state.
    """
    room = layout.room
    name = worst([state.accessible.class_as_modelled for state in states])
    low = name in _WITHOUT_AREA and not any(_exceeded_in_reach(state) for state in states)
    if room is None or low:
        return
    light = _light_of([_counted(state) for state in states])
    for key in sorted(room.doors):
        reached = [
            state.state for state in states for p in state.passages if p.reached and p.name == key
        ]
        words = [
            "laser controlled area: no entry while the warning light is on",
            f"{light}, {_class_words(name)}",
            *_eyewear(states),
        ]
        if reached:
            words.append(f"the controlled area reaches this door: {', '.join(reached)}")
        size = (_AT_DOOR_MM, _DOOR_MM)
        yield _sign("door", f"at door {key}, outside", name, tuple(words), size)


def _sign(
    kind: str,
    place: str,
    name: str | None,
    words: tuple[str, ...],
    size: tuple[float, tuple[float, float]],
) -> Sign:
    return Sign("", kind, place, name, words, *size)


def _class_words(name: str | None) -> str:
    known = _HIGHEST if name is None else name
    doubt = " (no limit is known)" if name is None else ""
    return f"class {known}{doubt}: {_AVOID[known]}"


def _strongest(lines: Iterable[SourceHazard]) -> list[SourceHazard]:
    """Return the strongest of the lines of one source and wavelength, over all states."""
    found: dict[tuple[str, float], SourceHazard] = {}
    for line in lines:
        key = line.source, line.wavelength_nm
        if key not in found or line.power_W > found[key].power_W:
            found[key] = line
    return [found[key] for key in sorted(found)]


def _counted(state: StateHazards) -> Reached:
    """Return what people can reach."""
    found = state.accessible
    shut = found.counts == OUTSIDE and found.outside is not None
    return found.outside if shut and found.outside is not None else found.inside


def _exceeded_in_reach(state: StateHazards) -> bool:
    outside = state.controlled_area_outside_m2
    shut = state.accessible.counts == OUTSIDE and outside is not None
    return ((outside or 0.0) if shut else state.controlled_area_m2) > 0.0


def _light_of(reached: Sequence[Reached]) -> str:
    """Return which light is meant: what is above class 1, or all of it where nothing is."""
    found = [(one.wavelength_nm, one.class_as_modelled) for r in reached for one in r.lines]
    found += [
        (r.scattered.wavelength_nm, r.scattered.class_as_modelled)
        for r in reached
        if r.scattered is not None
    ]
    above = [nm for nm, name in found if name != "1"]
    return _light(above or [nm for nm, _ in found])


def _light(wavelengths_nm: Iterable[float]) -> str:
    seen = {is_visible(nm) for nm in wavelengths_nm}
    if seen == {True}:
        return "laser light"
    return "invisible laser light" if seen == {False} else "visible and invisible laser light"


def _outputs(lines: Sequence[SourceHazard]) -> Iterator[str]:
    for line in lines:
        words = f"{line.wavelength_nm:.10g} nm, at most {with_unit(line.power_W, 'W')}"
        if line.pulses is not None:
            energy, lasts = line.pulses.energy_J, line.pulses.duration_s
            words += (
                f" in the mean, {with_unit(energy, 'J')} in {with_unit(lasts, 's')} "
                f"at {with_unit(line.pulses.rate_Hz, 'Hz')}"
            )
        yield words


def _eyewear(states: Sequence[StateHazards]) -> Iterator[str]:
    """Yield the density that is enough in every state, by wavelength."""
    most: dict[float, float] = {}
    for state in states:
        for row in state.eyewear:
            density = row.optical_density
            if row.where == state.accessible.counts and density is not None and density > 0.0:
                most[row.wavelength_nm] = max(most.get(row.wavelength_nm, 0.0), density)
    if most:
        listed = ", ".join(
            f"OD {density_up(density):.1f} at {nm:.10g} nm" for nm, density in sorted(most.items())
        )
        yield f"eyewear: {listed}"
