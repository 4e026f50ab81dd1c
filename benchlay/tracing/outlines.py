"""Outlines in the cross-sections of beams: a row a shape, and what it stands for."""

from __future__ import annotations

import numpy as np

from benchlay.named import NamedTuple
from benchlay.optics.shares import Shapes
from benchlay.scene.tables import Flags, Floats, Ints, Scene
from benchlay.tracing.clipping import padded
from benchlay.tracing.front import Front

CORE, BESIDE, OPTIC, BODY, HOLE = range(5)


class Outlines(NamedTuple):
    """A table of S shapes in cross-sections (`problem`), in scaled coordinates."""

    problem: Ints  # (S,)
    corners: Ints  # (S,) 0 for an ellipse
    vertices: Floats  # (S, V, 2)
    centre: Floats  # (S, 2)
    axes: Floats  # (S, 2, 2)
    depth: Floats  # (S, 3)
    order: Ints  # (S,)
    hole_of: Ints  # (S,) row of the outline it is a hole in, -1 for none
    role: Ints  # (S,)
    sink: Ints  # (S,)
    name: Ints  # (S,)
    face: Ints  # (S,) for optics
    row: Ints  # (S,) patch row, for holes to find their host
    inside_name: Ints  # (problems,) name of the optic the chief ray is inside of

    def shapes(self) -> Shapes:
        """Return what is needed to divide the cross-sections."""
        return Shapes(*self[:8])

    def take(self, kept: Flags) -> Outlines:
        """Return some of the outlines; the hosts of all holes must be among them."""
        if kept.all():
            return self
        return self._picked(kept.nonzero()[0], np.cumsum(kept) - 1)

    def _picked(self, rows: Ints, place: Ints) -> Outlines:
        """Return rows in a new order; `place` tells where each old row has gone."""
        picked = Outlines._make((*(column.take(rows, 0) for column in self[:-1]), self.inside_name))
        hosts = np.where(picked.hole_of >= 0, place[picked.hole_of], -1)
        return picked._replace(hole_of=hosts)

    def by_problem(self) -> Outlines:
        """Return the outlines sorted by problem, else in their order."""
        order = np.argsort(self.problem, kind="stable")
        place = np.empty(len(order), dtype=np.int64)
        place[order] = np.arange(len(order))
        return self._picked(order, place)


def joined(pieces: list[Outlines], hosts: int, scene: Scene, part: Front) -> Outlines:
    """Return pieces together, sorted by problem; piece number `hosts` has all holes in it."""
    widest = max(piece.vertices.shape[1] for piece in pieces)
    shift = sum(len(piece.problem) for piece in pieces[:hosts])
    fitted = [
        piece._replace(
            vertices=padded(piece.vertices, widest),
            hole_of=np.where(piece.hole_of >= 0, piece.hole_of + shift, -1),
        )
        for piece in pieces
    ]
    columns = zip(*(piece[:-1] for piece in fitted), strict=True)
    together = Outlines._make((*map(np.concatenate, columns), _names_inside(scene, part)))
    return together.by_problem()


def _names_inside(scene: Scene, part: Front) -> Ints:
    """Return the names of the optics that beams are inside of, -1 for none."""
    names = np.full(len(part.within), -1)
    within = np.flatnonzero(part.within >= 0)
    names[within] = scene.face_owner_name[part.face[within]]
    return names


class Labels(NamedTuple):
    """What outlines stand for; columns of `Outlines`."""

    role: Ints
    sink: Ints
    name: Ints
    face: Ints
    row: Ints


_NO_INTS = np.zeros(0, dtype=np.int64)
NO_OUTLINES = Outlines(
    _NO_INTS,
    _NO_INTS,
    np.zeros((0, 3, 2)),
    np.zeros((0, 2)),
    np.zeros((0, 2, 2)),
    np.zeros((0, 3)),
    *[_NO_INTS] * 8,
)
