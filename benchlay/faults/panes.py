"""Windows in openings of panels: how dense they are, beside what comes to them."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from math import inf, log10
from typing import TypeAlias

import numpy as np

from benchlay.checks import Context
from benchlay.named import NamedTuple
from benchlay.placing.placed import Placed, PlacedElement
from benchlay.scene.tables import Floats, Mode, Scene
from benchlay.tracing.beams import FACE

Arriving: TypeAlias = Mapping[tuple[str, float], tuple[float, float]]
"""By element and wavelength (nm) the strongest beam that comes to it, W, and its limit."""


class Pane(NamedTuple):
    """An element in a panel's opening, at one wavelength: how dense it is at normal incidence.

    `density` is None where it lets nothing through.
    """

    element: str
    opening: str
    wavelength_nm: float
    density: float | None


def panes(placed: Placed, scene: Scene) -> list[Pane]:
    """Return the elements that stand in openings of panels, at every wavelength there is."""
    found = []
    for name in sorted(in_openings(placed)):
        opening = placed.base.elements[name].element.stand.in_opening
        assert opening is not None
        through = _transmission(scene, scene.elements.index(name))
        for nm, share in zip(scene.wavelengths_nm.tolist(), through.tolist(), strict=True):
            density = None if share <= 0.0 else max(0.0, -log10(share))
            found.append(Pane(name, f"{opening.panel}/{opening.opening}", nm, density))
    return found


def _passes(item: PlacedElement) -> bool:
    """Whether it has an inside with faces round it: what is opaque is no window."""
    return item.geometry.glass is not None


def _transmission(scene: Scene, owner: int) -> Floats:
    """Return the share (L,) that passes an element at normal incidence, its faces in turn.

    Of a polarizing inside it is the larger share; light that goes to and fro is left out, which
    adds less than a hundredth to that of bare glass.
    """
    share = np.ones(len(scene.wavelengths_nm))
    rows = np.flatnonzero(scene.faces.present[0] & (scene.faces.owner == owner))
    for row in rows.tolist():
        bare = (
            (scene.index_inside[row] - scene.index_outside)
            / (scene.index_inside[row] + scene.index_outside)
        ) ** 2
        f = scene.faces
        stated = np.minimum(f.share_s[row] + f.loss_s[row], f.share_p[row] + f.loss_p[row])
        lost = np.where(f.mode[row] == Mode.BARE, bare, stated)
        share *= np.where(f.mode[row] == Mode.METAL, 0.0, 1.0 - lost)
    for volume in sorted(set(scene.behind[rows].tolist()) - {-1}):
        share *= scene.bulks.passes[volume]
    return np.nan_to_num(share, nan=1.0)


def in_openings(placed: Placed) -> frozenset[str]:
    """Return the elements that stand in openings of panels and let light through."""
    return frozenset(
        name
        for name, item in placed.base.elements.items()
        if item.element.stand.in_opening is not None and _passes(item)
    )


def arriving_w(context: Context, variant: int, names: frozenset[str]) -> Arriving:
    """Return the strongest beam that comes to each of some elements, by wavelength."""
    if not names:
        return {}
    beams, scene = context.trace.beams, context.trace.scene
    rows = context.beams_of(variant)
    rows = rows[(beams.end_kind[rows] == FACE) & context.outside[rows]]
    owner = scene.faces.owner[beams.end_row[rows]]
    found: dict[tuple[str, float], tuple[float, float]] = {}
    for name in sorted(names):
        for beam in rows[owner == scene.elements.index(name)].tolist():
            key = (name, context.wavelength_nm(beam))
            one = (float(context.accessible_w[beam]), float(context.limit_w[beam]))
            found[key] = max(found.get(key, one), one)
    return found


class Window(NamedTuple):
    """A pane beside what it must hold back: densities that leave the accessible limit behind it.

    `needed` is for the strongest beam that comes to it, in `state` and by `fault` (None: as it
    is); None where none does. `needed_full` is for all that a source emits at the wavelength, as
    a mirror held in the wrong place may send there.
    """

    pane: Pane
    arriving_w: float | None
    state: str | None
    fault: str | None
    needed: float | None
    needed_full: float | None


def windows(context: Context, cases: Iterable[tuple[str, str | None, Arriving]]) -> list[Window]:
    """Return every pane over cases: state, fault (or None) and what arrives."""
    told = list(cases)
    full = _full(context)
    found = []
    for pane in panes(context.trace.placed, context.trace.scene):
        key = (pane.element, pane.wavelength_nm)
        mine = [(light[key], state, fault) for state, fault, light in told if key in light]
        all_of_it = full.get(pane.wavelength_nm)
        needed_full = None if all_of_it is None else _density(*all_of_it)
        if not mine:
            found.append(Window(pane, None, None, None, None, needed_full))
            continue
        (power, limit), state, fault = max(mine, key=lambda one: (one[0][0], one[2] is None))
        needed = _density(power, limit)
        found.append(Window(pane, power, state, fault, needed, needed_full))
    return found


def _density(power_w: float, limit_w: float) -> float | None:
    """Return the density that brings a power down to its limit; None without a limit."""
    if not limit_w > 0.0:
        return None
    return max(0.0, log10(power_w / limit_w)) if power_w > 0.0 else 0.0


def _full(context: Context) -> dict[float, tuple[float, float]]:
    """Return by wavelength the most that a source emits in any state, W, and its lowest limit."""
    start, scene = context.trace.beams.start, context.trace.scene
    waves = scene.wavelengths_nm.tolist()
    found: dict[float, tuple[float, float]] = {}
    for (variant, source, nm), line in context.limits.items():
        power = context.source_power_w(variant, source, nm)
        if not power > 0.0:  # light that is made elsewhere: the most of it there is at rest
            own = (start.source == scene.sources.index(source)) & (start.wave == waves.index(nm))
            power = float(start.power[own].max(initial=0.0))
        if line.limit is None or not power > 0.0:
            continue
        most, least = found.get(nm, (0.0, inf))
        found[nm] = (max(most, power), min(least, line.limit.accessible_w))
    return found
