"""What each beam ends on, in words, and what arrives there."""

from __future__ import annotations

import numpy as np

from benchlay.elements._kind import Acts
from benchlay.named import NamedTuple
from benchlay.scene.tables import PART, SINK, SINKS, Flags, Floats, Ints, Scene
from benchlay.tracing import Trace
from benchlay.tracing.beams import FACE, HANDED, NOTHING, SOLID
from benchlay.tracing.front import OUTSIDE

OPTIC = -1
"""In place of a sink: the beam reaches an optic's clear region, which acts on it."""

_NAMELESS_PARTS = ("edge", "mount", "post", "foot")


class Ends(NamedTuple):
    """How N beams end.

    `sink` is a number in SINKS, or OPTIC; `power_w` is what arrives there before it acts,
    and `taken_w` what of this a sink books (all but its specular share).
    """

    sink: Ints  # (N,)
    power_w: Floats  # (N,)
    taken_w: Floats  # (N,)
    to: list[str | None]
    to_face: list[str | None]

    @property
    def word(self) -> list[str]:
        """The word of each end: ``optic``, or the kind of sink."""
        return ["optic" if sink == OPTIC else SINKS[sink] for sink in self.sink.tolist()]


def ends_of(trace: Trace, rows: Ints) -> Ends:
    """Return how some beams of a trace (`rows`, ascending) end."""
    kind, row = trace.beams.end_kind[rows], trace.beams.end_row[rows]
    within = trace.beams.start.within[rows]
    inside = within != OUTSIDE
    sink = np.full(len(rows), OPTIC)
    sink[kind == NOTHING] = SINK["escaped"]
    sink[kind == HANDED] = SINK["handed-over"]
    barrel = (kind == NOTHING) & inside
    sink[barrel] = trace.scene.bulks.barrel[within[barrel]]
    solid = kind == SOLID
    sink[solid] = trace.scene.solids.sink[row[solid]]
    rims = _at_faces(trace, rows, inside, sink)
    core = trace.beams.end_core[rows]
    on_rim = _on_rims(trace, rows, sink, rims)
    taken = core * (1.0 - _specular(trace, rows, inside))
    taken[sink == OPTIC] = 0.0
    taken[rims] = on_rim[rims]
    names = [
        _named(trace.scene, *end)
        for end in zip(
            kind.tolist(),
            row.tolist(),
            inside.tolist(),
            trace.beams.start.face[rows].tolist(),
            strict=True,
        )
    ]
    return Ends(
        sink, core + on_rim, taken, [name for name, _ in names], [face for _, face in names]
    )


def _at_faces(trace: Trace, rows: Ints, inside: Flags, sink: Ints) -> Ints:
    """Put in the sinks of faces; return the beams whose chief ray ends on a rim."""
    f, beams = trace.scene.faces, trace.beams
    met = np.flatnonzero(beams.end_kind[rows] == FACE)
    face = beams.end_row[rows[met]]
    opaque = f.acts[face] == Acts.OPAQUE
    swallowed = np.where(inside[met], SINK["absorbed"], f.sink[face])
    sink[met[opaque]] = swallowed[opaque]
    # Beside the clear region the rim is met, unless enough of the beam reaches the region.
    faint = beams.end_core[rows[met]] < trace.floor_w[beams.start.wave[rows[met]]]
    rim = faint & ~_clear(trace, rows[met], face)
    sink[met[rim]] = f.beside[face[rim]]
    return met[rim]


def _specular(trace: Trace, rows: Ints, inside: Flags) -> Floats:
    """Return the share that what a beam ends on throws back as a mirror would."""
    kind, row = trace.beams.end_kind[rows], trace.beams.end_row[rows]
    share = np.zeros(len(rows))
    solid, face = kind == SOLID, (kind == FACE) & ~inside
    share[solid] = trace.scene.solids.specular[row[solid]]
    share[face] = trace.scene.faces.specular[row[face]]
    return share


def _clear(trace: Trace, rows: Ints, face: Ints) -> Flags:
    """Tell which chief rays meet their face inside its clear region."""
    f, beams = trace.scene.faces, trace.beams
    left = np.abs(beams.off_left[rows]) / f.clear[face, 0]
    up = np.abs(beams.off_up[rows]) / f.clear[face, 1]
    within: Flags = np.where(f.clear_round[face], left**2 + up**2, np.maximum(left, up)) <= 1.0
    return within


def _on_rims(trace: Trace, rows: Ints, sink: Ints, rims: Ints) -> Floats:
    """Return (N,) what lands on the rim that a chief ray meets; 0 for all other beams."""
    beams, ledger, scene = trace.beams, trace.ledger, trace.scene
    if not len(rims):
        return np.zeros(len(rows))
    place = np.full(len(beams.length), -1)
    place[rows[rims]] = rims
    at = place[ledger.beam]
    landings = np.flatnonzero(at >= 0)
    at = at[landings]
    name = scene.face_owner_name[beams.end_row[rows[at]]]
    there = (ledger.sink[landings] == sink[at]) & (ledger.name[landings] == name)
    landed = np.bincount(at[there], ledger.power[landings][there], minlength=len(rows))
    return landed.astype(np.float64)


def _named(
    scene: Scene, kind: int, row: int, inside: bool, left: int
) -> tuple[str | None, str | None]:
    """Return the name and the face of what a beam ends on."""
    if kind == FACE:
        faces = scene.faces
        return scene.elements[int(faces.owner[row])], scene.face_names[int(faces.name[row])]
    if kind == NOTHING:
        return (scene.elements[int(scene.faces.owner[left])], None) if inside else (None, None)
    if kind == HANDED:
        return scene.names[int(scene.solids.hole_name[row])], None
    name = int(scene.solids.name[row])
    if name < 0:
        return None, None
    part = int(scene.solids.part[row])
    nameless = part in (PART[word] for word in _NAMELESS_PARTS)
    return scene.names[name], None if nameless else "front"
