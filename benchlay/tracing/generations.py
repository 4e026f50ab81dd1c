"""Traces generation by generation: all live beams meet their faces in one batch."""

from __future__ import annotations

from typing import NamedTuple

import numpy as np

from benchlay.elements._kind import Acts, Inside
from benchlay.optics import coherency, moments
from benchlay.optics.rays import cross, dot
from benchlay.scene.tables import SINK, Flags, Floats, Ints, Scene
from benchlay.tracing.beams import Beams, Ledger, gathered
from benchlay.tracing.bulk import passage
from benchlay.tracing.faces import Child, Meeting, divide, plane_of_incidence
from benchlay.tracing.front import OUTSIDE, REFLECTED, SPILLED, TRANSMITTED, Front, join
from benchlay.tracing.hits import FACE, NOTHING, SOLID, Hits, near, nearest
from benchlay.tracing.section import Cut, cut, uncut
from benchlay.tracing.ways import Ways

MOST_GENERATIONS = 4000
MOST_BEAMS = 400_000
# Bodies are looked for out to where what lies beyond is this share of the power floor.
_TAIL = 0.01
_PARALLEL = 1e-9  # squared sine below which two planes count as parallel


class Traced(NamedTuple):
    """Beams, ledger, and how the trace ended."""

    beams: Beams
    ledger: Ledger
    bounded: Flags  # (V,) variants in which a bound on generations or beams was met


class _Run:
    """What grows while a trace runs."""

    def __init__(self, scene: Scene, ways: Ways, floor_w: Floats) -> None:
        self.scene = scene
        self.ways = ways
        self.floor_w = floor_w  # (L,)
        self.fronts: list[Front] = []
        self.ends: list[tuple[np.ndarray, ...]] = []
        self.landings: list[tuple[Ints, Ints, Ints, Floats]] = []
        self.count = 0
        self.bounded = np.zeros(len(scene.variants), dtype=np.bool_)

    def book(self, beam: Ints, sink: Ints | int, name: Ints | int, power: Floats) -> None:
        """Book power where it lands; beams are numbered within the generation."""
        if len(beam):
            shape = beam.shape
            self.landings.append(
                (
                    beam + self.count,
                    np.broadcast_to(sink, shape),
                    np.broadcast_to(name, shape),
                    power,
                )
            )


def run(front: Front, scene: Scene, ways: Ways, floor_w: Floats) -> Traced:
    """Trace beams until all power has landed or lies under the floor.

    Dividing cross-sections has a high price a call and a low one a beam. Beams that must be
    cut therefore wait until no others are left, and are then cut together.

    Parameters
    ----------
    front : Front
        The beams that sources send out.
    scene : Scene
        What they may meet.
    ways : Ways
        What they are meant to do.
    floor_w : (L,) ndarray of float64
        Power below which a beam is booked and not followed, W, by wavelength.
    """
    state = _Run(scene, ways, floor_w)
    waiting: list[Front] = []
    for _ in range(MOST_GENERATIONS):
        cutting = not len(front.variant)
        if (cutting and not waiting) or state.count > MOST_BEAMS:
            break
        if cutting:
            front, waiting = join(waiting), []
        front, uncut = _generation(front, state, cutting=cutting)
        if len(uncut.variant):
            waiting.append(uncut)
    rest = join([front, *waiting])
    if len(rest.variant):
        state.bounded[np.unique(rest.variant)] = True
        _book_rest(rest, state)
    return _finished(state)


def _book_rest(front: Front, state: _Run) -> None:
    """Book beams that a bound kept from being followed, with the beam they came from."""
    parents = np.maximum(front.parent - state.count, -state.count)
    state.book(parents, SINK["below-floor"], -1, front.power)


def _finished(state: _Run) -> Traced:
    start = join(state.fronts) if state.fronts else None
    assert start is not None
    ends = gathered(state.ends, last_axis=(4, 5))
    if state.landings:
        ledger = Ledger(*gathered(state.landings))
    else:
        none = np.zeros(0, dtype=np.int64)
        ledger = Ledger(none, none, none, np.zeros(0))
    return Traced(Beams(start, *ends), ledger, state.bounded)


def _generation(front: Front, state: _Run, *, cutting: bool) -> tuple[Front, Front]:
    """Bring live beams to what they meet, book what lands, return their children.

    Also returns the beams that must be cut, untouched, unless this is their turn.
    """
    scene = state.scene
    hits = nearest(front, scene)
    length = np.where(hits.kind == NOTHING, scene.reach_mm, hits.distance)
    # A beam inside glass that meets no face of its optic within the outline ends on the
    # barrel; how far away does not matter, since nothing goes on from there.
    length[(front.within != OUTSIDE) & (hits.kind == NOTHING)] = 0.0
    end_moments = moments.propagate(front.moments, length, front.index)
    wanted, reach = _to_be_cut(front, scene, hits, end_moments, state.floor_w)
    if not cutting and wanted.any():
        uncut, kept = front.take(wanted), np.flatnonzero(~wanted)
        children = _advance(
            front.take(kept), hits.take(kept), length[kept], end_moments[:, kept], None, state
        )
        return children, uncut
    sections = (np.flatnonzero(wanted), reach[wanted]) if cutting else None
    none = front.take(np.zeros(0, dtype=np.int64))
    return _advance(front, hits, length, end_moments, sections, state), none


def _advance(
    front: Front,
    hits: Hits,
    length: Floats,
    end_moments: Floats,
    sections: tuple[Ints, Floats] | None,
    state: _Run,
) -> Front:
    """Take beams to the end of their legs and return what leaves there."""
    scene = state.scene
    arrived = front
    rows = np.flatnonzero(front.within != OUTSIDE)
    if len(rows) and scene.bulks.kind[front.within[rows]].any():
        j, lost = passage(front.take(rows), scene, length[rows])
        whole = front.coherency.copy()
        whole[:, rows] = j
        arrived = front._replace(coherency=whole)
        state.book(rows, SINK["absorbed"], scene.face_owner_name[front.face[rows]], lost)
    power = arrived.power
    if sections is None:
        divided = uncut(power, front.kept)
        coherent = arrived.coherency
    else:
        divided = cut(arrived, scene, hits, *sections)
        landed = divided.landings
        state.book(landed.beam, landed.sink, landed.name, landed.power)
        coherent = arrived.coherency * _ratio(divided.core, power)
    end = front.position + length[:, None] * front.direction
    core = arrived._replace(
        position=end,
        moments=end_moments,
        kept=divided.kept,
        optical_path=front.optical_path + front.index * length,
        coherency=coherent,
        parent=np.arange(len(length)) + state.count,
    )
    _record(front, arrived, hits, end, length, end_moments, divided, state)
    children = _children(core, hits, divided, state)
    state.count += len(length)
    return children


def _ratio(part: Floats, whole: Floats) -> Floats:
    return np.divide(part, whole, out=np.zeros_like(part), where=whole > 0.0)


def _to_be_cut(
    front: Front, scene: Scene, hits: Hits, end_moments: Floats, floor_w: Floats
) -> tuple[Flags, Floats]:
    """Tell which beams something may cut, and how far out in w one has to look."""
    power = front.power
    tail = _TAIL * floor_w[front.wave]
    share = np.clip(tail / np.maximum(power / front.kept, tail), 1e-18, 1.0)
    reach = np.sqrt(-0.5 * np.log(share))
    start, stop = _radius(front.moments), _radius(end_moments)
    widest = reach * np.maximum(start, stop)
    wanted = near(front, scene, hits, widest) | ~_covered(scene, hits, front, reach * stop)
    wanted &= ~front.lump
    return wanted, np.maximum(reach, 0.5)


def _radius(m: Floats) -> Floats:
    """Return the larger principal 1/e² radius."""
    half, differ = 0.5 * (m[0] + m[2]), 0.5 * (m[0] - m[2])
    radius: Floats = 2.0 * np.sqrt(half + np.sqrt(differ * differ + m[1] * m[1]))
    return radius


def _covered(scene: Scene, hits: Hits, front: Front, radius: Floats) -> Flags:
    """Tell which chief hits take the whole beam out to a radius (mm)."""
    f, s = scene.faces, scene.solids
    beams = np.arange(len(radius))
    face = np.where(hits.kind == FACE, hits.row, 0)
    h = hits.faces
    covered = np.ones(len(radius), dtype=np.bool_)
    if len(f.owner):
        spread = radius / np.maximum(np.abs(h.slope[beams, face]), 1e-9)
        left, up = np.abs(h.along_left[beams, face]), np.abs(h.along_up[beams, face])
        a, b = f.clear[face, 0], f.clear[face, 1]
        as_round = np.hypot(left, up) + spread <= np.minimum(a, b)
        as_box = (left + spread <= a) & (up + spread <= b)
        on_face = np.where(f.clear_round[face], as_round, as_box)
        covered = np.where(hits.kind == FACE, on_face, covered)
    at_solid = hits.kind == SOLID
    if at_solid.any():
        rows = np.flatnonzero(at_solid)
        covered[rows] = _solid_covers(scene, hits, front, rows, radius)
    return covered


def _solid_covers(scene: Scene, hits: Hits, front: Front, rows: Ints, radius: Floats) -> Flags:
    """Tell which beams land wholly on the flat side of the solid that their chief ray meets.

    On that side the distance to another bounding plane is the gap to it over the sine of the
    angle between the two; planes parallel to the side bound nothing of it.
    """
    s = scene.solids
    solid, plane = hits.row[rows], np.maximum(hits.plane[rows], 0)
    normals = s.plane_normal
    sine2 = 1.0 - (normals[plane] @ normals.T) ** 2
    depth = hits.distance[rows]
    gap = hits.solids.gap[rows] - depth[:, None] * hits.solids.slope[rows]
    bounds = (s.plane_solid == solid[:, None]) & (sine2 > _PARALLEL)
    room2 = np.where(bounds, gap * np.abs(gap), np.inf) / np.where(bounds, sine2, 1.0)
    spread = radius[rows] / np.maximum(np.abs(hits.solids.slope[rows, plane]), 1e-9)
    covers: Flags = (hits.plane[rows] >= 0) & (room2.min(axis=1) >= spread * spread)
    covers &= ~np.isin(solid, s.axis_solid)
    if len(s.hole_solid):
        point = front.position[rows] + depth[:, None] * front.direction[rows]
        size = np.sqrt(np.einsum("hki,hki->h", s.hole_axes, s.hole_axes))
        near_side = _apart(point, s.hole_centre), _apart(point, s.hole_centre + s.hole_through)
        touched = np.minimum(*near_side) < size + spread[:, None]
        covers &= ~(touched & (s.hole_solid == solid[:, None])).any(axis=1)
    return covers


def _apart(point: Floats, centre: Floats) -> Floats:
    away = point[:, None, :] - centre
    apart: Floats = np.sqrt(np.einsum("bhi,bhi->bh", away, away))
    return apart


def _record(
    front: Front,
    arrived: Front,
    hits: Hits,
    end: Floats,
    length: Floats,
    end_moments: Floats,
    divided: Cut,
    state: _Run,
) -> None:
    beams = np.arange(len(length))
    on_face = hits.kind == FACE
    row = np.where(on_face, hits.row, 0)
    f = state.scene.faces
    nan = np.full(len(length), np.nan)
    if len(f.owner):
        left = np.where(on_face, hits.faces.along_left[beams, row], np.nan)
        up = np.where(on_face, hits.faces.along_up[beams, row], np.nan)
        cosine = np.where(on_face, np.abs(hits.faces.slope[beams, row]), np.nan)
        unstated = on_face & f.unstated[row, front.wave]
    else:
        left, up, cosine, unstated = nan, nan, nan, np.zeros(len(length), dtype=np.bool_)
    state.fronts.append(front)
    state.ends.append(
        (
            hits.kind,
            hits.row,
            end,
            length,
            arrived.coherency,
            end_moments,
            divided.kept,
            divided.core,
            left,
            up,
            cosine,
            unstated,
        )
    )


def _children(core: Front, hits: Hits, divided: Cut, state: _Run) -> Front:
    scene = state.scene
    power = core.power
    lost = np.flatnonzero(hits.kind == NOTHING)
    inside = core.within[lost] != OUTSIDE
    barrel, free = lost[inside], lost[~inside]
    state.book(barrel, SINK["rim"], scene.face_owner_name[core.face[barrel]], power[barrel])
    state.book(free, SINK["escaped"], -1, power[free])
    born = [*_from_solids(core, hits, state)]
    at_face = np.flatnonzero(hits.kind == FACE)
    spills = divided.spills
    if len(at_face):
        born += _from_faces(core.take(at_face), hits.row[at_face], at_face, state)
    if len(spills.beam):
        lumps = _lumps(core, spills.beam, spills.face, spills.power, scene)
        born += _from_faces(lumps, spills.face, spills.beam, state, spilled=True)
    return _living(born, core, state)


def _lumps(core: Front, beam: Ints, face: Ints, power: Floats, scene: Scene) -> Front:
    """Return what falls on further optics, as lumps where the chief ray crosses their plane."""
    lump = core.take(beam)
    f = scene.faces
    slope = dot(lump.direction, f.normal[face])
    ahead = dot(f.origin[face] - lump.position, f.normal[face]) / np.where(
        slope == 0.0, 1e-12, slope
    )
    own = lump.power
    even = np.stack((0.5 * power, 0.5 * power, 0.0 * power, 0.0 * power))
    whole = np.where(own > 0.0, lump.coherency * (power / np.where(own > 0.0, own, 1.0)), even)
    return lump._replace(
        position=lump.position + ahead[:, None] * lump.direction,
        optical_path=lump.optical_path + ahead * lump.index,
        moments=moments.propagate(lump.moments, ahead, lump.index),
        coherency=whole,
        kept=np.ones(len(beam)),
        lump=np.ones(len(beam), dtype=np.bool_),
    )


def _from_solids(core: Front, hits: Hits, state: _Run) -> list[Front]:
    s = state.scene.solids
    rows = np.flatnonzero(hits.kind == SOLID)
    if not len(rows):
        return []
    solid = hits.row[rows]
    power = core.power[rows]
    # A round side has no plane to reflect from; those bodies state no specular share.
    specular = np.where(hits.plane[rows] >= 0, s.specular[solid], 0.0)
    state.book(rows, s.sink[solid], s.name[solid], power * (1.0 - specular))
    shiny = np.flatnonzero(specular > 0.0)
    if not len(shiny):
        return []
    beam = core.take(rows[shiny])
    normal = s.plane_normal[hits.plane[rows[shiny]]]
    mirrored = _mirrored(beam, normal, specular[shiny])
    none = np.full(len(shiny), -1)
    return [
        mirrored._replace(
            face=none,
            body=solid[shiny],
            owner=s.owner[solid[shiny]],
            node=none,
            splits=beam.splits + 1,
            event=np.full(len(shiny), REFLECTED),
        )
    ]


def _mirrored(beam: Front, normal: Floats, share: Floats) -> Front:
    """Return the specular share of light on an opaque surface: an ideal mirror's phases."""
    s, cos, sin = plane_of_incidence(beam.direction, normal, beam.axis)
    j = coherency.rotate(beam.coherency, cos, sin)
    m = moments.rotate(beam.moments, cos, sin)
    root = np.sqrt(share)
    direction = beam.direction - (2.0 * dot(beam.direction, normal))[:, None] * normal
    return beam._replace(
        direction=direction,
        axis=s,
        coherency=coherency.diagonal(j, -root, root),
        moments=moments.scale_second(m, -1.0),
    )


def _from_faces(
    core: Front, face: Ints, rows: Ints, state: _Run, *, spilled: bool = False
) -> list[Front]:
    """Return the children of beams at faces, and book what the faces swallow."""
    f = state.scene.faces
    acts = f.acts[face]
    name = state.scene.face_owner_name[face]
    opaque = np.flatnonzero(acts == Acts.OPAQUE)
    born: list[Front] = []
    if len(opaque):
        born += _opaque(core.take(opaque), face[opaque], rows[opaque], state)
    passing = np.flatnonzero(acts == Acts.PASSES)
    if len(passing):
        born.append(_passed(core.take(passing), face[passing], state, spilled=spilled))
    optic = np.flatnonzero((acts == Acts.INTERFACE) | (acts == Acts.LENS))
    if len(optic):
        beam, at = core.take(optic), face[optic]
        divided, meeting = _divided(beam, at, state.scene)
        state.book(rows[optic], SINK["absorbed"], name[optic], divided.absorbed)
        event = SPILLED if spilled else None
        born.append(_child(beam, at, divided.reflected, meeting, state, REFLECTED, event))
        born.append(_child(beam, at, divided.transmitted, meeting, state, TRANSMITTED, event))
    return born


def _opaque(core: Front, face: Ints, rows: Ints, state: _Run) -> list[Front]:
    f = state.scene.faces
    inside = core.within != OUTSIDE
    specular = np.where(inside, 0.0, f.specular[face])
    sink = np.where(inside, SINK["absorbed"], f.sink[face])
    state.book(rows, sink, state.scene.face_owner_name[face], core.power * (1.0 - specular))
    shiny = np.flatnonzero(specular > 0.0)
    if not len(shiny):
        return []
    beam, at = core.take(shiny), face[shiny]
    mirrored = _mirrored(beam, f.normal[at], specular[shiny])
    count = len(shiny)
    return [
        mirrored._replace(
            face=at,
            body=np.full(count, -1),
            owner=f.owner[at],
            node=np.full(count, -1),
            splits=beam.splits + 1,
            event=np.full(count, REFLECTED),
        )
    ]


def _passed(core: Front, face: Ints, state: _Run, *, spilled: bool) -> Front:
    f = state.scene.faces
    node = state.ways.follow(core.node, f.owner[face], f.name[face], TRANSMITTED)
    count = len(face)
    return core._replace(
        face=face,
        body=np.full(len(face), -1),
        owner=f.owner[face],
        node=np.full(count, -1) if spilled else node,
        event=np.full(count, SPILLED if spilled else TRANSMITTED),
    )


def _divided(core: Front, face: Ints, scene: Scene) -> tuple[object, Meeting]:
    f = scene.faces
    slope = dot(core.direction, f.normal[face])
    normal = np.where(slope < 0.0, -1.0, 1.0)[:, None] * f.normal[face]
    s, cos, sin = plane_of_incidence(core.direction, normal, core.axis)
    both = f.inside[face] == Inside.BOTH
    outside = scene.index_outside[core.wave]
    beyond = np.where(core.within == OUTSIDE, scene.index_inside[face, core.wave], outside)
    away = core.position - f.origin[face]
    meeting = Meeting(
        face,
        core.wave,
        normal,
        np.abs(slope),
        s,
        core.index,
        np.where(both, core.index, beyond),
        slope < 0.0,
        core.direction,
        np.stack((dot(away, f.left[face]), dot(away, f.up[face])), axis=-1),
        coherency.rotate(core.coherency, cos, sin),
        moments.rotate(core.moments, cos, sin),
    )
    return divide(meeting, scene), meeting


def _child(
    core: Front,
    face: Ints,
    child: Child,
    meeting: Meeting,
    state: _Run,
    event: int,
    shown: int | None,
) -> Front:
    scene = state.scene
    f = scene.faces
    through = (event == TRANSMITTED) & (f.inside[face] == Inside.BEHIND)
    outside = core.within == OUTSIDE
    within = np.where(through, np.where(outside, scene.bulk_of_face[face], OUTSIDE), core.within)
    node = state.ways.follow(core.node, f.owner[face], f.name[face], event)
    if shown is not None:
        node = np.full(len(face), -1)
    meant = (node >= 0) | state.ways.main[face, 0 if event == REFLECTED else 1]
    return core._replace(
        face=face,
        body=np.full(len(face), -1),
        owner=f.owner[face],
        within=within,
        index=np.where(through, meeting.n_out, core.index),
        direction=child.direction,
        axis=meeting.s,
        coherency=child.coherency,
        moments=child.moments,
        node=node,
        splits=core.splits + ~meant,
        event=np.full(len(face), event if shown is None else shown),
    )


def _living(born: list[Front], core: Front, state: _Run) -> Front:
    """Book children under the floor; return the others, by parent and event."""
    if not born:
        return core.take(np.zeros(0, dtype=np.int64))
    children = join(born)
    power = children.power
    alive = power >= state.floor_w[children.wave]
    dead = np.flatnonzero(~alive & (power > 0.0))
    state.book(children.parent[dead] - state.count, SINK["below-floor"], -1, power[dead])
    rows = np.flatnonzero(alive)
    order = np.lexsort((children.face[rows], children.event[rows], children.parent[rows]))
    return children.take(rows[order])


__all__ = ["Traced", "cross", "run"]
