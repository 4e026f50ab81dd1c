"""The hazardous legs of a variant, named by what they met on their way so far.

A leg's chain is the same in two variants if its light left the same faces of the same things
by the same events; only then can one leg be seen as the other, moved.
"""

from __future__ import annotations

from collections.abc import Hashable

import numpy as np

from benchlay.checks import Context
from benchlay.faults.batches import seed_of
from benchlay.named import NamedTuple
from benchlay.optics import moments
from benchlay.scene.tables import SINK, Floats, Ints, Scene
from benchlay.tracing.beams import FACE, HANDED, SOLID

_NOTHING = ("nothing",)


class Legs(NamedTuple):
    """N hazardous legs outside optics, in the order of their making."""

    chain: Ints  # (N,)
    position: Floats  # (N, 3) mm
    direction: Floats  # (N, 3)
    owner: Ints  # (N,) what they left: as in `Front`
    wave: Ints  # (N,)
    source: Ints  # (N,)
    end: Ints  # (N,) label of what is met
    length: Floats  # (N,) mm
    radius: Floats  # (N,) lesser 1/e² radius at the end, mm
    medium: Floats  # (N,) absolute index of refraction


class Labels:
    """Numbers for things and chains, the same in all blocks of a review."""

    def __init__(self) -> None:
        self._numbers: dict[Hashable, int] = {}

    def number(self, thing: Hashable) -> int:
        """Return the number of a thing or a chain."""
        return self._numbers.setdefault(thing, len(self._numbers))

    def of_scene(self, scene: Scene) -> tuple[Ints, Ints, Ints]:
        """Return labels of the faces, solids and openings of a scene."""
        f, s = scene.faces, scene.solids
        faces = [("face", o, scene.face_names[n]) for o, n in zip(f.owner, f.name, strict=True)]
        solids = [
            ("solid", int(o), scene.names[n] if n >= 0 else "", int(part), lost_to(sink))
            for o, n, part, sink in zip(s.owner, s.name, s.part, s.sink, strict=True)
        ]
        holes = [("hole", scene.names[n]) for n in s.hole_name]
        tables = ([self.number(thing) for thing in things] for things in (faces, solids, holes))
        face, solid, hole = (np.array(table, dtype=np.int64) for table in tables)
        return face, solid, hole

    @property
    def nothing(self) -> int:
        """The label of what meets nothing."""
        return self.number(_NOTHING)


def lost_to(sink: int) -> bool:
    """Whether a solid stands round the bench, not on it."""
    return bool(sink == SINK["wall"])


def ends(kind: Ints, row: Ints, tables: tuple[Ints, Ints, Ints], nothing: int) -> Ints:
    """Return the labels of what is met."""
    found = np.full(len(kind), nothing)
    for which, table in zip((FACE, SOLID, HANDED), tables, strict=True):
        here = kind == which
        found[here] = table[row[here]]
    return found


def legs_of(context: Context, labels: Labels, variants: range, rest: Ints) -> list[Legs]:
    """Return the hazardous legs of some variants; `rest` are the chains of the legs at rest."""
    beams, scene = context.trace.beams, context.trace.scene
    tables = labels.of_scene(scene)
    end = ends(beams.end_kind, beams.end_row, tables, labels.nothing)
    chain = _chains(context, labels, tables, rest)
    start = beams.start
    w1, w2, _ = moments.radii(beams.end_moments)
    found = []
    for variant in variants:
        rows = context.beams_of(variant)
        rows = rows[context.hazardous[rows]]
        found.append(
            Legs(
                chain[rows],
                start.position[rows],
                start.direction[rows],
                start.owner[rows],
                start.wave[rows],
                start.source[rows],
                end[rows],
                beams.length[rows],
                np.minimum(w1, w2)[rows],
                start.index[rows],
            )
        )
    return found


def chains_at_rest(context: Context, labels: Labels) -> Ints:
    """Return the chains of all legs of a trace from the sources on."""
    none = np.zeros(0, dtype=np.int64)
    return _chains(context, labels, labels.of_scene(context.trace.scene), none)


def _chains(context: Context, labels: Labels, tables: tuple[Ints, Ints, Ints], rest: Ints) -> Ints:
    """Return the number of the chain of each beam whose power is above its limit; else -1."""
    start = context.trace.beams.start
    with np.errstate(invalid="ignore"):
        rows = np.flatnonzero(start.power > context.limit_w).tolist()
    chain = np.full(len(start.variant), -1)
    faces, solids, _ = tables
    columns = (start.parent, start.source, start.wave, start.event, start.face, start.body)
    for row, parent, source, wave, event, face, body in zip(
        rows, *(column[rows].tolist() for column in columns), strict=True
    ):
        if (seed := seed_of(parent)) is not None:
            chain[row] = rest[seed]
            continue
        left = int(faces[face]) if face >= 0 else int(solids[body]) if body >= 0 else -1
        before = int(chain[parent]) if parent >= 0 else -1
        chain[row] = labels.number((before, source, wave, event, left))
    return chain
