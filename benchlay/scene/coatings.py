"""Which coating figures hold for which wavelength at which face."""

from __future__ import annotations

from collections.abc import Mapping, Sequence

from benchlay.elements._coating import Coating
from benchlay.layout.layout import Layout
from benchlay.layout.routes import Route
from benchlay.named import NamedTuple
from benchlay.scene.tables import Mode


class Figures(NamedTuple):
    """What a face does at one wavelength: mode, shares of s and p, losses, metal index."""

    mode: int
    share_s: float
    share_p: float
    loss_s: float
    loss_p: float
    metal: complex
    unstated: bool


_BARE = Figures(Mode.BARE, 0.0, 0.0, 0.0, 0.0, 0j, unstated=False)


def figures(coating: Coating, wavelength_nm: float, spoken_for: frozenset[float]) -> Figures:
    """Return what a coating does at a wavelength.

    `spoken_for` are the wavelengths of which a reflectance without wavelengths speaks;
    other light meets the bare material, which `unstated` tells.
    """
    if coating.kind == "metal":
        return _metal(coating.metal, wavelength_nm)
    if coating.kind != "stated":
        return _BARE
    band = coating.at(wavelength_nm)
    if band is None:
        band = coating.general() if wavelength_nm in spoken_for else None
    if band is None:
        return _BARE._replace(unstated=True)
    loss_s, loss_p = coating.absorbs
    return Figures(Mode.STATED, band.s, band.p, loss_s, loss_p, 0j, unstated=False)


def before_unknown(figures: Figures) -> Figures:
    """Return what a face does before a medium of unknown index: it swallows what would go in.

    A metal film lets nothing in, and a stated reflectance holds whatever lies behind.
    """
    if figures.mode == Mode.METAL:
        return figures
    lost_s, lost_p = 1.0 - figures.share_s, 1.0 - figures.share_p
    return figures._replace(mode=Mode.STATED, loss_s=lost_s, loss_p=lost_p)


def _metal(name: str, wavelength_nm: float) -> Figures:
    from benchlay.optics.metals import METALS

    index = complex(METALS[name].index_at(wavelength_nm))
    if index != index:  # noqa: PLR0124 (NaN: the table does not cover this wavelength)
        # What the film does is not known: the larger hazard is that it reflects everything.
        return Figures(Mode.STATED, 1.0, 1.0, 0.0, 0.0, 0j, unstated=True)
    return Figures(Mode.METAL, 0.0, 0.0, 0.0, 0.0, index, unstated=False)


def spoken_for(layout: Layout, all_nm: Sequence[float]) -> Mapping[str, frozenset[float]]:
    """Return, by element, the wavelengths of which a plain reflectance speaks.

    Those of the routes that name the element; where none does, those of the source at the
    head of its `after` chain; failing that, every wavelength in the layout.
    """
    found: dict[str, set[float]] = {}
    for route in layout.routes.values():
        lines = _lines_of_route(route, layout)
        for item in route.items[1:]:
            found.setdefault(item.name, set()).update(lines)
            made = _made_by(item.name, layout)
            if made:
                lines = lines | made if item.wavelength_nm is None else {item.wavelength_nm}
    everything = frozenset(all_nm)
    return {
        name: _made_by(name, layout)
        | (found[name] if found.get(name) else _by_chain(name, layout, everything))
        for name in layout.elements
    }


def _made_by(name: str, layout: Layout) -> frozenset[float]:
    element = layout.elements.get(name)
    made = () if element is None else element.record.makes()
    return frozenset(light.wavelength_nm for light in made)


def _lines_of_route(route: Route, layout: Layout) -> set[float]:
    first = route.items[0]
    source = layout.sources.get(first.name)
    if source is None:
        return set()
    lines = {line.wavelength_nm for line in source.lines}
    return {first.wavelength_nm} & lines if first.wavelength_nm else lines


def _by_chain(name: str, layout: Layout, everything: frozenset[float]) -> frozenset[float]:
    seen: set[str] = set()
    made: frozenset[float] = frozenset()
    while name in layout.elements and name not in seen:
        seen.add(name)
        stand = layout.elements[name].stand
        if stand.wavelength_nm is not None:
            return made | {stand.wavelength_nm}
        if not stand.after:
            return everything
        name = stand.after[0].item
        made |= _made_by(name, layout)
    source = layout.sources.get(name)
    if source is None:
        return everything
    return made.union(line.wavelength_nm for line in source.lines)
