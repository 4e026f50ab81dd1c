"""What leaves the end of each leg: reflected, refracted, passed, spilled, or nothing more."""

from __future__ import annotations

import numpy as np

from benchlay.elements._kind import Acts
from benchlay.optics import coherency, moments
from benchlay.optics.rays import dot
from benchlay.optics.turning import turn
from benchlay.scene.tables import SINK, Floats, Ints, Scene
from benchlay.tracing.faces import MIRRORED, Meeting, divide, plane_of_incidence
from benchlay.tracing.front import OUTSIDE, REFLECTED, SPILLED, TRANSMITTED, Front
from benchlay.tracing.handing import hand_over
from benchlay.tracing.hits import FACE, NOTHING, SOLID, Hits
from benchlay.tracing.run_state import RunState
from benchlay.tracing.section import Spills

_FLAT = 1e-12
# Plain numbers and a table: an array is compared with an enumerator five times more slowly.
_OPAQUE, _PASSES, _RETURNS = int(Acts.OPAQUE), int(Acts.PASSES), int(Acts.RETURNS)
_OPTIC = np.array([kind in {Acts.INTERFACE, Acts.LENS} for kind in sorted(Acts)])


def children(core: Front, hits: Hits, spills: Spills, state: RunState) -> Front:
    """Book what ends here, and return the beams that go on."""
    born: list[Front] = []
    kind = hits.kind
    at_face = (kind == FACE).nonzero()[0]
    if len(at_face) == len(kind):
        born += _from_faces(core, hits.row, at_face, state)
    else:
        _end_nowhere(core, (kind == NOTHING).nonzero()[0], state)
        if state.handing is not None:
            hand_over(core, hits, state)
        born += _from_solids(core, hits, (kind == SOLID).nonzero()[0], state)
        if len(at_face):
            born += _from_faces(core.take(at_face), hits.row[at_face], at_face, state)
    if len(spills.beam):
        lumps = _lumps(core, spills.beam, spills.face, spills.power, state.scene)
        born += _from_faces(lumps, spills.face, spills.beam, state, spilled=True)
    return _living(born, core, state)


def _end_nowhere(core: Front, rows: Ints, state: RunState) -> None:
    """Book what meets nothing: inside an optic it ends on the barrel, outside it is gone."""
    if not len(rows):
        return
    inside = core.within[rows] != OUTSIDE
    power = core.power
    barrel, free = rows[inside], rows[~inside]
    scene = state.scene
    sink = scene.bulks.barrel[core.within[barrel]]
    state.book(barrel, sink, scene.face_owner_name[core.face[barrel]], power[barrel])
    state.book(free, SINK["escaped"], -1, power[free])


def _lumps(core: Front, beam: Ints, face: Ints, power: Floats, scene: Scene) -> Front:
    """Return what falls on further optics, as lumps where the chief ray crosses their plane."""
    lump = core.take(beam)
    f = scene.faces
    slope = dot(lump.direction, f.normal[face])
    safe = np.where(np.abs(slope) < _FLAT, _FLAT, slope)
    ahead = dot(f.origin[face] - lump.position, f.normal[face]) / safe
    own = lump.power
    even = np.stack((0.5 * power, 0.5 * power, 0.0 * power, 0.0 * power))
    whole = np.where(own > 0.0, lump.coherency * (power / np.where(own > 0.0, own, 1.0)), even)
    return lump.changed(
        position=lump.position + ahead[:, None] * lump.direction,
        optical_path=lump.optical_path + ahead * lump.index,
        moments=moments.propagate(lump.moments, ahead, lump.index),
        coherency=whole,
        kept=1.0,
        lump=1,
    )


def _from_solids(core: Front, hits: Hits, rows: Ints, state: RunState) -> list[Front]:
    s = state.scene.solids
    if not len(rows):
        return []
    solid = hits.row[rows]
    # A round side has no plane to reflect from; those bodies state no specular share.
    specular = np.where(hits.plane[rows] >= 0, s.specular[solid], 0.0)
    state.book(rows, s.sink[solid], s.name[solid], core.power[rows] * (1.0 - specular))
    shiny = specular.nonzero()[0]
    if not len(shiny):
        return []
    at = rows[shiny]
    mirrored = _mirrored(core.take(at), s.plane_normal.take(hits.plane[at], 0), specular[shiny])
    mirrored.set(face=-1, body=solid[shiny], owner=s.owner[solid[shiny]])
    return [mirrored]


def _mirrored(beam: Front, normal: Floats, share: Floats) -> Front:
    """Return the specular share of light on an opaque surface: an ideal mirror's phases."""
    s, cos, sin = plane_of_incidence(beam.direction, normal, beam.axis)
    light = turn(beam.light, cos, sin)
    root = np.sqrt(share)
    return beam.changed(
        direction=beam.direction - (2.0 * dot(beam.direction, normal))[:, None] * normal,
        axis=s,
        coherency=coherency.diagonal(light[:4], -root, root),
        moments=light[4:] * MIRRORED,
        node=-1,
        splits=beam.splits + 1,
        event=REFLECTED,
    )


def _from_faces(
    core: Front, face: Ints, rows: Ints, state: RunState, *, spilled: bool = False
) -> list[Front]:
    """Return the children of beams at faces, and book what the faces swallow."""
    acts = state.scene.faces.acts.take(face)
    optic = _OPTIC.take(acts)
    if np.count_nonzero(optic) == len(optic):
        return [_divided(core, face, rows, state, spilled=spilled)]
    born: list[Front] = []
    for kind, work in (
        (acts == _OPAQUE, _opaque),
        (acts == _PASSES, _passed),
        (acts == _RETURNS, _returned),
        (optic, _divided),
    ):
        some = kind.nonzero()[0]
        if len(some):
            born.append(work(core.take(some), face[some], rows[some], state, spilled=spilled))
    return born


def _opaque(core: Front, face: Ints, rows: Ints, state: RunState, *, spilled: bool) -> Front:
    f = state.scene.faces
    inside = core.within != OUTSIDE
    specular = np.where(inside, 0.0, f.specular[face])
    sink = np.where(inside, SINK["absorbed"], f.sink[face])
    state.book(rows, sink, state.scene.face_owner_name[face], core.power * (1.0 - specular))
    shiny = specular.nonzero()[0]
    at = face[shiny]
    mirrored = _mirrored(core.take(shiny), f.normal.take(at, 0), specular[shiny])
    mirrored.set(face=at, body=-1, owner=f.owner[at])
    if spilled:
        mirrored.set(event=SPILLED)
    return mirrored


def _passed(core: Front, face: Ints, rows: Ints, state: RunState, *, spilled: bool) -> Front:
    del rows  # nothing is swallowed
    f, beyond = state.scene.faces, _beyond(core, face, state.scene)
    node = state.ways.follow(core.node, f.owner[face], f.name[face], TRANSMITTED)
    return core.changed(
        face=face,
        body=-1,
        owner=f.owner[face],
        within=beyond,
        node=-1 if spilled else node,
        event=SPILLED if spilled else TRANSMITTED,
    )


def _returned(core: Front, face: Ints, rows: Ints, state: RunState, *, spilled: bool) -> Front:
    from benchlay.tracing.returning import returned

    return returned(core, face, rows, state, spilled=spilled)


def _divided(core: Front, face: Ints, rows: Ints, state: RunState, *, spilled: bool) -> Front:
    """Return the reflected children, then the transmitted ones."""
    scene = state.scene
    f, count = scene.faces, len(face)
    meeting = _meeting(core, face, scene)
    parts = divide(meeting, scene)
    if parts.absorbed is not None:
        state.book(rows, SINK["absorbed"], scene.face_owner_name[face], parts.absorbed)
    both = core.twice()
    faces = np.concatenate((face, face))
    owner = f.owner[faces]
    event = np.full(2 * count, REFLECTED)
    event[count:] = TRANSMITTED
    meant = np.concatenate((state.ways.main[face, 0], state.ways.main[face, 1]))
    node: Ints | int = -1
    if not spilled and np.count_nonzero(core.node >= 0):
        node = state.ways.follow(both.node, owner, f.name[faces], event)
        meant |= node >= 0
    beyond = slice(count, None)
    both.within[beyond] = meeting.beyond
    both.index[beyond] = meeting.n_out
    both.set(
        face=faces,
        body=-1,
        owner=owner,
        event=SPILLED if spilled else event,
        node=node,
        splits=both.splits + ~meant,
    )
    for child, columns in ((parts.reflected, slice(0, count)), (parts.transmitted, beyond)):
        half = both.take(columns)
        half.set(
            direction=child.direction,
            axis=child.axis,
            coherency=child.coherency,
            moments=child.moments,
        )
    return both


def _beyond(core: Front, face: Ints, scene: Scene) -> Ints:
    """Return the volumes on the other sides of faces, `OUTSIDE` for none."""
    before = scene.before[face]
    beyond: Ints = np.where(core.within == before, scene.behind[face], before)
    return beyond


def _meeting(core: Front, face: Ints, scene: Scene) -> Meeting:
    f = scene.faces
    direction, normal = core.direction, f.normal.take(face, 0)
    slope = dot(direction, normal)
    outward = slope < 0.0
    normal = np.where(outward, -1.0, 1.0)[:, None] * normal
    s, cos, sin = plane_of_incidence(direction, normal, core.axis)
    light = turn(core.light, cos, sin)
    wave = core.wave
    beyond, lens = _beyond(core, face, scene), scene.fixed.lens.take(face)
    return Meeting(
        face,
        wave,
        normal,
        np.abs(slope),
        s,
        core.index,
        scene.indices[beyond, wave],
        beyond,
        outward,
        lens if np.count_nonzero(lens) else None,
        direction,
        core.position,
        light[:4],
        light[4:],
    )


def _living(born: list[Front], core: Front, state: RunState) -> Front:
    """Book children under the floor; return the others."""
    if not born:
        return core.take(np.zeros(0, dtype=np.int64))
    all_born = Front.joined(born)
    power = all_born.power
    alive = power >= state.floor_w[all_born.wave]
    dead = (~alive & (power > 0.0)).nonzero()[0]
    state.book(all_born.parent[dead] - state.count, SINK["below-floor"], -1, power[dead])
    return all_born.take(alive.nonzero()[0])
