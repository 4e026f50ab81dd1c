"""Where a beam is cut: gathers the bodies in a cross-section and shares the power out.

Runs only for the beams beside which a body comes near, or whose optic does not cover them.
Everything is worked out in the beam's scaled coordinates, in which its flow lines are
points; `optics.shares` divides them.
"""

from __future__ import annotations

import numpy as np

from benchlay.named import NamedTuple
from benchlay.optics.shares import partition
from benchlay.scene.tables import PART, SINK, Flags, Floats, Ints, Scene
from benchlay.tracing.bodies import crossed
from benchlay.tracing.front import OUTSIDE, Front
from benchlay.tracing.handing import this_side
from benchlay.tracing.hidden import worthwhile
from benchlay.tracing.hits import FACE, HANDED, NOTHING, SOLID, Hits
from benchlay.tracing.outlines import CORE, HOLE, OPTIC, Outlines, joined
from benchlay.tracing.plates import plate_outlines
from benchlay.tracing.silhouettes import (
    cylinder_sides,
    disc_plates,
    face_plates,
    hole_plates,
    patch_outlines,
)


class Landings(NamedTuple):
    """Power that lands beside the core: one row a beam and body."""

    beam: Ints  # (K,) in the front
    sink: Ints  # (K,) number in SINKS
    name: Ints  # (K,) number in Scene.names
    power: Floats  # (K,) W


class Spills(NamedTuple):
    """Power that passes beside one optic and lands inside the clear region of another."""

    beam: Ints
    face: Ints
    power: Floats


class Cut(NamedTuple):
    """What the cross-sections of a generation give.

    `core` is the power that is left to the chief ray's own hit, `kept` the share of the
    unclipped beam that this is.
    """

    core: Floats  # (N,)
    kept: Floats  # (N,)
    landings: Landings
    spills: Spills


def uncut(power: Floats, kept: Floats) -> Cut:
    """Return beams of which nothing is cut away."""
    return Cut(power, kept, _no_landings(), Spills(*_nothing()))


def cut_after(whole: int, front: Front, scene: Scene, hits: Hits, reach: Floats) -> Cut:
    """Share out the power of all beams but the first so many, of which nothing is cut away."""
    if not whole:
        return cut(front, scene, hits, reach)
    rest = slice(whole, None)
    core, kept, landings, spills = cut(front.take(rest), scene, hits.take(rest), reach[rest])
    return Cut(
        np.concatenate((front.power[:whole], core)),
        np.concatenate((front.kept[:whole], kept)),
        landings._replace(beam=landings.beam + whole),
        spills._replace(beam=spills.beam + whole),
    )


def cut(front: Front, scene: Scene, hits: Hits, reach: Floats) -> Cut:
    """Share out the power of beams among all that stands in their cross-sections.

    Parameters
    ----------
    front, hits : Front, Hits
        Beams, after what happens inside optics on the way, and what their chief rays meet.
    reach : (N,) ndarray of float64
        Radius in scaled coordinates outside which the share does not count.
    """
    count = len(reach)
    outlines = gather(front, scene, hits, reach)
    divided = partition(outlines.shapes(), count)
    share = divided.share
    whole = front.power / front.kept
    is_core = outlines.role == CORE
    mine = np.bincount(outlines.problem[is_core], share[is_core], minlength=count)
    nothing_met = (hits.kind == NOTHING) | (hits.kind == HANDED)
    mine = np.where(nothing_met, mine + divided.free, mine)
    beside = ~is_core & (outlines.role != HOLE)
    blocked = np.bincount(outlines.problem[beside], share[beside], minlength=count)
    blocked = np.where(nothing_met, blocked, blocked + divided.free)
    gone = 1.0 - front.kept
    # A beam cut before: only what exceeds the earlier loss is lost now, since the power
    # beside the edges that cut it is not there any more.
    factor = np.where(blocked > gone, (blocked - gone) / np.where(blocked > 0.0, blocked, 1.0), 0.0)
    kept = np.where(blocked > gone, mine, front.kept)
    power = share * (factor * whole)[outlines.problem]
    free = np.where(nothing_met, 0.0, divided.free * factor * whole)
    landings = _landings(outlines, power, free, beside, front, scene=scene)
    return Cut(kept * whole, kept, landings, _spills(outlines, power))


def _nothing() -> tuple[Ints, Ints, Floats]:
    none = np.zeros(0, dtype=np.int64)
    return none, none, np.zeros(0)


def _no_landings() -> Landings:
    none, _, power = _nothing()
    return Landings(none, none, none, power)


def _landings(
    outlines: Outlines, power: Floats, free: Floats, beside: Flags, front: Front, *, scene: Scene
) -> Landings:
    rows = np.flatnonzero(beside & (outlines.role != OPTIC) & (power > 0.0))
    passing = np.flatnonzero(free > 0.0)
    # Inside an optic what misses the clear region meets the barrel; outside it goes on for good.
    inside = front.within[passing] != OUTSIDE
    sink = np.full(len(passing), SINK["escaped"])
    sink[inside] = scene.bulks.barrel[front.within[passing[inside]]]
    name = np.where(inside, outlines.inside_name[passing], -1)
    return Landings(
        np.concatenate((outlines.problem[rows], passing)),
        np.concatenate((outlines.sink[rows], sink)),
        np.concatenate((outlines.name[rows], name)),
        np.concatenate((power[rows], free[passing])),
    )


def _spills(outlines: Outlines, power: Floats) -> Spills:
    rows = np.flatnonzero((outlines.role == OPTIC) & (power > 0.0))
    return Spills(outlines.problem[rows], outlines.face[rows], power[rows])


def gather(front: Front, scene: Scene, hits: Hits, reach: Floats) -> Outlines:
    """Return all outlines that matter in the cross-sections of beams."""
    target = hits.owner(scene)
    inside = front.within != OUTSIDE
    bound = _radius_bound(front, reach)
    faces = _faces_in_reach(front, scene, hits, bound, inside)
    solids = _solids_in_reach(front, scene, bound) & ~inside[:, None]
    own = np.where(hits.kind == SOLID, hits.row, -1)
    solids, ringed = _counted(scene, solids, target)
    patches = patch_outlines(front, scene, solids, ringed, own, reach=reach, stop_mm=hits.distance)
    sets = [face_plates(front, scene, faces, hits), disc_plates(front, scene, solids, own)]
    sets.append(cylinder_sides(front, scene, solids, own))
    if len(scene.solids.hole_solid) and len(patches.row):
        sets.append(hole_plates(scene, patches))
    on_faces, others = plate_outlines(front, sets, reach)
    outlines = joined([on_faces, patches, others], 1, scene, front)
    if (hits.kind == HANDED).any():
        outlines = outlines.take(this_side(outlines, front, hits, scene))
    return worthwhile(outlines, reach)


def _radius_bound(part: Front, reach: Floats) -> Floats:
    """Return (n, 3): coefficients of a bound c0 + c1 z + c2 z² of the squared radius at z, mm²."""
    m = part.moments
    scale = 4.0 * reach * reach
    return np.stack(
        (
            scale * (m[0] + m[2]),
            scale * 2.0 * (m[3] + m[6]) / part.index,
            scale * (m[7] + m[9]) / part.index**2,
        ),
        axis=1,
    )


def _in_reach(part: Front, centre: Floats, size: Floats, bound: Floats) -> tuple[Flags, Floats]:
    """Tell which spheres come within reach of which beams, and how far (mm) those reach there."""
    away = centre - part.position[:, None, :]
    z = np.einsum("nmi,ni->nm", away, part.direction)
    square = np.einsum("nmi,nmi->nm", away, away) - z * z
    far = np.maximum(z + size, 0.0)
    near = np.maximum(z - size, 0.0)
    radius2 = np.maximum(
        bound[:, :1] + bound[:, 1:2] * far + bound[:, 2:] * far * far,
        bound[:, :1] + bound[:, 1:2] * near + bound[:, 2:] * near * near,
    )
    apart = np.sqrt(np.maximum(square, 0.0)) - size
    radius = np.sqrt(np.maximum(radius2, 0.0))
    return (apart < radius) & (z + size > 0.0), radius


def _faces_in_reach(part: Front, scene: Scene, hits: Hits, bound: Floats, inside: Flags) -> Flags:
    f = scene.faces
    if not len(f.owner):
        return np.zeros((len(inside), 0), dtype=np.bool_)
    size = np.sqrt(np.einsum("ij,ij->i", f.radii, f.radii)) + np.abs(f.middle).sum(axis=1)
    close = _in_reach(part, f.origin, size, bound)[0] & scene.fixed.enterable[part.variant]
    entering = (part.direction @ f.normal.T < 0.0) | scene.fixed.passes
    same = f.owner == part.owner[:, None]
    close &= entering & ~same & ~inside[:, None]
    chosen = np.flatnonzero(hits.kind == FACE)
    close[chosen, hits.row[chosen]] = True
    return close


def _solids_in_reach(part: Front, scene: Scene, bound: Floats) -> Flags:
    s = scene.solids
    close, radius = _in_reach(part, s.centre, s.reach, bound)
    close &= s.present[part.variant]
    close &= ~(scene.close & (s.owner == part.owner[:, None]))
    left = np.flatnonzero(part.body >= 0)
    close[left, part.body[left]] = False
    # Spheres round panels hold most of a bench: their planes tell more.
    beam, solid = close.nonzero()
    met = crossed(part, scene, beam, solid, radius[beam, solid])
    close[beam, solid] = (met.enter <= met.leave) & (met.leave > 0.0)
    return close


def _counted(scene: Scene, solids: Flags, met: Ints) -> tuple[Flags, Flags]:
    """Return which solids (B, S) count beside what is met (B,), and of which only the ring."""
    s = scene.solids
    mine = s.owner == met[:, None]
    # Whether light passes the optic that it goes to is judged at its face: not at its edge, and
    # of the plate round an opening the outline of the face tells all.
    judged = (s.part == PART["plate"]) | (s.part == PART["edge"])
    # Of the mount of the optic that the light goes to only the ring in the front plane counts.
    return solids & ~(mine & judged), mine & (s.part == PART["mount"])
