"""What stands in the way of scattered light, as convex solids given by their corners."""

from __future__ import annotations

import math
from itertools import pairwise

import numpy as np

from benchlay.elements._kind import Acts
from benchlay.layout.enclosure import Enclosure, Opening, Panel
from benchlay.named import NamedTuple
from benchlay.placing.placed import PlacedState
from benchlay.scene.surroundings import material_of
from benchlay.scene.tables import BULKS, PART, Faces, Flags, Floats, Ints, Scene, Solids
from benchlay.tracing.trace import Trace

_UPRIGHT = [PART[part] for part in ("post", "foot")]
_PASSING = [Acts.INTERFACE, Acts.PASSES, Acts.LENS]
_ABSORBER = BULKS.index("absorber")
_RIM = 2.0 * np.pi * np.arange(16) / 16  # of posts: the polygon lies within the round
_ROUND = 64  # sides about a round opening: wider than it by 0.12 %
# Pieces of one panel overlap by this, so that no light passes between them.
_OVERLAP_MM = 1e-4


class Shone(NamedTuple):
    """Light that something may stop: its wavelength, and what share of it may pass unharmful."""

    wave: int  # number of the wavelength
    share: float  # of all of the light, that an aperture may take


def blockers(trace: Trace, variant: int, shone: Shone) -> list[Floats]:
    """Return the corners, (N, 3) in mm, of each convex solid that is opaque in a state.

    Parameters
    ----------
    trace : Trace
    variant : int
        Number of the state.
    shone : Shone
        A filter counts as opaque where all the light that it passes is within the limit.
    """
    return _bodies(trace, variant, shone) + _panels(trace.placed.states[variant])


def _bodies(trace: Trace, variant: int, shone: Shone) -> list[Floats]:
    s = trace.scene.solids
    taken = s.present[variant] & (s.part != PART["panel"]) & ~_passed(trace, shone)
    return [_corners(s, row) for row in np.flatnonzero(taken).tolist()]


def _passed(trace: Trace, shone: Shone) -> Flags:
    """Return which solids hold something that light may pass, such as a lens or an opening.

    They are boxes round it without its bore, so they are taken to shade nothing, which is the
    larger hazard; posts and feet of the same elements do.
    """
    scene = trace.scene
    passing: Flags = np.zeros(len(scene.elements) + len(scene.sources) + 1, dtype=np.bool_)
    through = np.flatnonzero(np.isin(scene.faces.acts, _PASSING))
    passing[scene.faces.owner[through[~_dark(scene, through, shone)]]] = True
    found: Flags = passing[scene.solids.owner] & ~np.isin(scene.solids.part, _UPRIGHT)
    return found


def _dark(scene: Scene, faces: Ints, shone: Shone) -> Flags:
    """Return which of some faces are those of a filter that passes no more than may pass.

    What passes is that of the shortest way through, straight across where it is thinnest; the
    reflection of its faces is left aside.
    """
    dark: Flags = np.zeros(len(faces), dtype=np.bool_)
    volumes = scene.behind[faces]
    for volume in np.unique(volumes[volumes >= 0]).tolist():
        thick = float(scene.bulks.thickness[volume])
        if int(scene.bulks.kind[volume]) != _ABSORBER:
            continue
        mine = faces[volumes == volume]
        part = _thinnest_mm(scene.faces, mine) / thick if thick > 0.0 else 1.0
        passes = float(scene.bulks.passes[volume, shone.wave]) ** part if part > 0.0 else 1.0
        dark[volumes == volume] = passes <= shone.share
    return dark


def _thinnest_mm(f: Faces, faces: Ints) -> float:
    """Return how thin a plate between two faces is at the least; 0 for what is no such plate."""
    if len(faces) != 2:  # noqa: PLR2004 - front and back
        return 0.0
    front, back = faces.tolist()
    middle, half = f.middle[back], f.radii[back]
    corners = middle + half * np.array([(-1, -1), (-1, 1), (1, -1), (1, 1)])
    points = f.origin[back] + corners[:, :1] * f.left[back] + corners[:, 1:] * f.up[back]
    return float(((f.origin[front] - points) @ f.normal[front]).min())


def _corners(s: Solids, row: int) -> Floats:
    mine = np.flatnonzero(s.patch_solid == row)
    found = [s.patch_points[i, : s.patch_corners[i]] for i in mine.tolist()]
    for i in np.flatnonzero(s.disc_solid == row).tolist():
        first, second = s.disc_axes[i]
        found.append(
            s.disc_centre[i] + np.outer(np.cos(_RIM), first) + np.outer(np.sin(_RIM), second)
        )
    return np.unique(np.concatenate(found), axis=0)


def _panels(state: PlacedState) -> list[Floats]:
    enclosure = state.layout.enclosure
    if enclosure is None:
        return []
    closed = [name for name in sorted(enclosure.panels) if not enclosure.panels[name].open]
    return [piece for name in closed for piece in _pieces(state, enclosure, enclosure.panels[name])]


def _pieces(state: PlacedState, enclosure: Enclosure, panel: Panel) -> list[Floats]:
    """Return a panel as convex pieces round its openings: strips of it, each in parts."""
    low, high = enclosure.heights_mm(panel)
    thick = material_of(state.layout, enclosure.material_of(panel)).thickness_mm
    cuts = {0.0, panel.length_mm}
    for opening in panel.openings.values():
        cuts.update(min(max(x, 0.0), panel.length_mm) for x in _cuts(opening))
    found = []
    for start, end in pairwise(sorted(cuts)):
        holes = sorted(
            gap for o in panel.openings.values() if (gap := _gap(o, start, end)) is not None
        )
        under = (low, low)  # heights at start and end of the strip, up to which all is done
        for bottom, top in [*holes, ((high, high), (high, high))]:
            if max(bottom[0] - under[0], bottom[1] - under[1]) > 0.0:
                strip = (start - _OVERLAP_MM, end + _OVERLAP_MM)
                found.append(_piece(panel, strip, under, bottom, thick))
            under = (max(under[0], top[0]), max(under[1], top[1]))
    return found


def _cuts(opening: Opening) -> list[float]:
    if opening.diameter_mm is None:
        return list(opening.box_mm()[:2])
    radius = 0.5 * opening.diameter_mm / math.cos(math.pi / _ROUND)
    angles = [2.0 * math.pi * i / _ROUND for i in range(_ROUND // 2 + 1)]
    return [opening.along_mm + radius * math.cos(angle) for angle in angles]


_Ends = tuple[float, float]


def _gap(opening: Opening, start: float, end: float) -> tuple[_Ends, _Ends] | None:
    """Return lower and upper edge of an opening at both ends of a strip of its panel."""
    left, right, bottom, top = opening.box_mm()
    if opening.diameter_mm is None:
        if end <= left or start >= right:
            return None
        return (bottom, bottom), (top, top)
    radius = 0.5 * opening.diameter_mm / math.cos(math.pi / _ROUND)
    middle, height = 0.5 * (left + right), 0.5 * (bottom + top)
    if end <= middle - radius or start >= middle + radius:
        return None
    half = [math.sqrt(max(radius**2 - (x - middle) ** 2, 0.0)) for x in (start, end)]
    return (height - half[0], height - half[1]), (height + half[0], height + half[1])


def _piece(panel: Panel, strip: _Ends, low: _Ends, high: _Ends, thick: float) -> Floats:
    start = np.array(panel.from_mm)
    along = (np.array(panel.to_mm) - start) / panel.length_mm
    outward = np.array(panel.outward)
    corners = []
    for way, bottom, top in zip(strip, low, high, strict=True):
        for out in (0.0, thick):
            x, y = start + way * along + out * outward
            corners += [(x, y, bottom), (x, y, top)]
    return np.array(corners)
