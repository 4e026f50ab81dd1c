"""Which hazardous light could notice what happens to a thing on the bench."""

from __future__ import annotations

import numpy as np

from benchlay.checks import Context
from benchlay.faults.batches import floors_of, makes_light
from benchlay.optics import moments
from benchlay.placing.placed import PlacedElement
from benchlay.scene.tables import Flags, Ints
from benchlay.tracing.beams import FACE, SOLID
from benchlay.tracing.front import OUTSIDE

_WIDTHS = 3.0  # in 1/e² radii: beyond are 2e-8 of a beam


class Nearby:
    """The legs of a state at rest whose power could be hazardous, outside optics."""

    def __init__(self, context: Context, variant: int) -> None:
        beams = context.trace.beams
        rows = context.beams_of(variant)
        start = beams.start
        limit = context.limit_w[rows]
        if makes_light(context.trace.placed):
            limit = np.fmin(limit, min(floors_of(context.trace.placed, 1.0).values()))
        with np.errstate(invalid="ignore"):
            strong = (start.power[rows] > limit) | np.isnan(limit)
        self._context = context
        self._every = rows
        self._rows = rows[strong & (start.within[rows] == OUTSIDE)]
        near, _, _ = moments.radii(beams.start.moments[:, self._rows])
        far, _, _ = moments.radii(beams.end_moments[:, self._rows])
        self._radius = np.maximum(near, far)

    def of_element(self, item: PlacedElement) -> Ints:
        """Return the first legs that come as near as the element could, however it is turned."""
        beams, rows = self._context.trace.beams, self._rows
        start, along = beams.start.position[rows], beams.start.direction[rows]
        away = np.array(item.pose.at) - start
        foot = np.clip(np.einsum("ij,ij->i", away, along), 0.0, beams.length[rows])
        gap = np.sqrt(((away - foot[:, None] * along) ** 2).sum(axis=1))
        close = gap < _sphere_mm(item) + _WIDTHS * self._radius
        return self._first(close | self._touch(item.element.name))

    def of_sheet(self, name: str) -> Ints:
        """Return the first legs of which anything lands on a panel or lid."""
        return self._first(self._touch(name))

    def _touch(self, name: str) -> Flags:
        """Tell which legs end on a thing or leave some light there."""
        trace, rows = self._context.trace, self._rows
        beams, scene, ledger = trace.beams, trace.scene, trace.ledger
        kind, row = beams.end_kind[rows], beams.end_row[rows]
        found = np.zeros(len(rows), dtype=np.bool_)
        if name in scene.elements:
            on_face = kind == FACE
            found[on_face] |= scene.faces.owner[row[on_face]] == scene.elements.index(name)
        if name in scene.names:
            number = scene.names.index(name)
            on_solid = kind == SOLID
            found[on_solid] |= scene.solids.name[row[on_solid]] == number
            found |= np.isin(rows, ledger.beam[ledger.name == number])
        return found

    def _first(self, touched: Flags) -> Ints:
        """Return those of some legs that come of no other of them."""
        parent = self._context.trace.beams.start.parent
        mine = set(self._rows[touched].tolist())
        after: set[int] = set()
        first = []
        for beam in self._every.tolist():  # parents come first
            before = int(parent[beam])
            if before in mine or before in after:
                after.add(beam)
            elif beam in mine:
                first.append(beam)
        return np.array(first, dtype=np.int64)


def _sphere_mm(item: PlacedElement) -> float:
    """Return how far an element and its mount could reach from its reference point, turned."""
    back, front, width, height = item.geometry.extent
    corners = [(x, y, z) for x in (back, front) for y in (-width, width) for z in (-height, height)]
    box = item.holder.box
    solids = [*item.geometry.solids, *(() if box is None else (box,))]
    corners += [p for solid in solids if not solid.upright for p in solid.points]
    reach = float(np.sqrt((np.array(corners) ** 2).sum(axis=1)).max())
    # Put in back to front it stands its own thickness aside; a disc's rim is given by two radii.
    return 1.5 * reach
