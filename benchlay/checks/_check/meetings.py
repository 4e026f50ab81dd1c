"""Where working beams meet what they are meant to meet, and what they lose on the way."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from benchlay.checks._check.routes import Routes
from benchlay.elements._kind import Acts
from benchlay.named import NamedTuple
from benchlay.placing.placed import PlacedElement
from benchlay.scene.tables import PARTS, SINK, SINKS, Ints
from benchlay.tracing import Trace
from benchlay.tracing.beams import FACE, SOLID
from benchlay.tracing.front import OUTSIDE

_OWN = (SINK["rim"], SINK["body"])
_OPAQUE = (*_OWN, SINK["screen"], SINK["dump"], SINK["target"], SINK["panel"], SINK["bench"])
_COUNTS = 1e-6  # share of a beam below which it does not matter which side of the end it lands
_FAR_OFF = (SINK["wall"], SINK["escaped"])  # told of a beam only where its chief ray arrives


class Loss(NamedTuple):
    """What a working beam loses on one leg to one thing.

    `own` tells whether the thing is what the beam goes to (or is inside of), `share` is of
    what arrives, `whole` whether the chief ray itself ends there. Of a beam that arrives, what
    lands behind the thing it goes to has missed that thing: `past_w` of the power.
    """

    beam: int
    name: str | None
    sink: str
    part: str | None
    power_w: float
    share: float
    own: bool
    whole: bool
    past_w: float = 0.0


class Mark(NamedTuple):
    """Where a working beam meets an optic, seen from where it is meant to, mm."""

    beam: int
    element: str
    face: int
    left_mm: float
    up_mm: float


class Meetings:
    """Losses and marks of a trace, by state."""

    def __init__(self, trace: Trace, routes: Routes) -> None:
        self._trace = trace
        self._routes = routes

    def losses(self, rows: Ints) -> list[Loss]:
        """Return what the working ones of some beams lose, by beam and name."""
        losses = []
        for beam, groups in sorted(self._landings(rows).items()):
            past_w = self._take_past(beam, groups) if len(groups) > 1 else 0.0
            for number, parts in sorted(groups.items()):
                found = self._loss(beam, self._name(number), parts, past_w)
                if found is not None:
                    losses.append(found)
        return losses

    def _landings(self, rows: Ints) -> dict[int, dict[int, list[tuple[int, float]]]]:
        """Return sinks and powers by working beam and name (its number, -1 for none)."""
        ledger = self._trace.ledger
        wanted = np.zeros(len(self._routes.working), dtype=np.bool_)
        wanted[rows] = self._routes.working[rows]
        found = np.flatnonzero(wanted[ledger.beam] & np.isin(ledger.sink, (*_OPAQUE, *_FAR_OFF)))
        groups: dict[int, dict[int, list[tuple[int, float]]]] = {}
        columns = (ledger.beam[found], ledger.name[found], ledger.sink[found], ledger.power[found])
        for beam, name, sink, power in zip(*(c.tolist() for c in columns), strict=True):
            groups.setdefault(beam, {}).setdefault(name, []).append((sink, power))
        return groups

    def _name(self, number: int) -> str | None:
        return self._trace.scene.names[number] if number >= 0 else None

    def _take_past(self, beam: int, groups: dict[int, list[tuple[int, float]]]) -> float:
        """Take out of a beam's landings what lies behind what it comes to; return its power."""
        met = self._routes.met(beam)
        if met is None or met not in self._routes.wanted(beam):
            return 0.0
        past_w, least = 0.0, _COUNTS * self._arriving_w(beam)
        if sum(power for parts in groups.values() for _, power in parts) < least:
            return 0.0
        for number in sorted(groups):
            if self._name(number) != met and self._behind(beam, number, groups[number]):
                past_w += sum(power for _, power in groups.pop(number))
        own = self._trace.scene.names.index(met)
        if past_w > 0.0:
            groups.setdefault(own, [])
        return past_w

    def _behind(self, beam: int, number: int, parts: list[tuple[int, float]]) -> bool:
        """Whether nothing of a name stands in a beam before its end."""
        s = self._trace.scene.solids
        here = s.present[self._trace.beams.start.variant[beam]] & (s.name == number)
        if number < 0:  # the bench top, or nothing at all
            here &= np.isin(s.sink, [sink for sink, _ in parts])
        solids = np.flatnonzero(here)
        if not len(solids):
            return True
        from benchlay.checks._check.behind import met_before_end

        return not met_before_end(self._trace, beam, solids)

    def _loss(
        self, beam: int, name: str | None, parts: list[tuple[int, float]], past_w: float
    ) -> Loss | None:
        own = name in self._routes.wanted(beam)
        kept = [(sink, power) for sink, power in parts if not own or self._is_loss(sink, name)]
        kept = [(sink, power) for sink, power in kept if sink not in _FAR_OFF]
        past_w = past_w if own and name == self._routes.met(beam) else 0.0
        power = sum(power for _, power in kept) + past_w
        if power <= 0.0:
            return None
        sink = max(kept, key=lambda part: part[1])[0] if kept else SINK["rim"]
        part, whole = self._chief(beam, name, own=own)
        share = min(power / self._arriving_w(beam), 1.0)
        return Loss(beam, name, SINKS[sink], part, power, share, own, whole, past_w)

    def _arriving_w(self, beam: int) -> float:
        coherency = self._trace.beams.end_coherency
        return float(coherency[0, beam] + coherency[1, beam])

    def _is_loss(self, sink: int, name: str | None) -> bool:
        """Whether light on what it was meant for is lost: beside a face, not on it."""
        return sink in _OWN or (sink == SINK["panel"] and name is not None)

    def _chief(self, beam: int, name: str | None, *, own: bool) -> tuple[str | None, bool]:
        """Return the part that the chief ray meets, and whether it ends on that name."""
        beams, scene = self._trace.beams, self._trace.scene
        row = int(beams.end_row[beam])
        if beams.end_kind[beam] == SOLID:
            met = int(scene.solids.name[row])
            here = (scene.names[met] if met >= 0 else None) == name
            return (PARTS[scene.solids.part[row]] if here else None), here
        if beams.end_kind[beam] == FACE:
            here = scene.elements[int(scene.faces.owner[row])] == name
            stops = not own and scene.faces.acts[row] == Acts.OPAQUE
            return None, here and bool(stops or not beams.end_core[beam] > 0.0)
        return None, False

    def aimed(self, beam: int) -> bool:
        """Whether the chief ray of a beam, let through, would meet what it is meant to."""
        return any(self.where_on(beam, face) is not None for face in self.faces_wanted(beam))

    def faces_wanted(self, beam: int) -> list[int]:
        """Return the face rows of what a working beam is meant to meet, in its state."""
        f, scene = self._trace.scene.faces, self._trace.scene
        present = f.present[self._trace.beams.start.variant[beam]]
        names = self._routes.wanted(beam)
        owners = [i for i, name in enumerate(scene.elements) if name in names]
        rows: list[int] = np.flatnonzero(present & np.isin(f.owner, owners)).tolist()
        return rows

    def where_on(self, beam: int, face: int) -> tuple[float, float] | None:
        """Return where a chief ray meets a face's outline (left, up from its middle), mm."""
        f, start = self._trace.scene.faces, self._trace.beams.start
        k, p = start.direction[beam], start.position[beam]
        slope = float(k @ f.normal[face])
        if abs(slope) < 1e-9:  # noqa: PLR2004 (runs along the face)
            return None
        way = float((f.origin[face] - p) @ f.normal[face]) / slope
        at = p + way * k - f.origin[face]
        left = float(at @ f.left[face] - f.middle[face, 0])
        up = float(at @ f.up[face] - f.middle[face, 1])
        a, b = abs(left) / f.radii[face, 0], abs(up) / f.radii[face, 1]
        inside = a * a + b * b <= 1.0 if f.round[face] else max(a, b) <= 1.0
        return (left, up) if inside and way >= 0.0 else None

    def marks(self, variant: int, rows: Ints) -> Iterator[Mark]:
        """Yield where working beams meet optics, each optic once.

        The mark is on the front, so that is where it is measured, from whichever side the
        light comes; light that never meets the front is measured where it enters. Of the
        meetings of a route with one optic, the first is held against the mark: the others of
        a folded path are meant to lie elsewhere.
        """
        beams, scene = self._trace.beams, self._trace.scene
        state = self._trace.placed.states[variant]
        for beam in rows[self._routes.working[rows] & (beams.end_kind[rows] == FACE)].tolist():
            face = int(beams.end_row[beam])
            name = scene.elements[int(scene.faces.owner[face])]
            if name not in self._routes.wanted(beam) or not self._routes.comes_first(beam, name):
                continue
            front = scene.face_names[int(scene.faces.name[face])] in ("front", "opening")
            if not front and (beams.start.within[beam] != OUTSIDE or self._meets_front(beam)):
                continue
            entry = front or scene.face_names[int(scene.faces.name[face])] == "entry.front"
            mark = self._mark(state.elements[name], face) if entry else (0.0, 0.0)
            yield Mark(
                beam,
                name,
                face,
                float(beams.off_left[beam] + scene.faces.middle[face, 0]) - mark[0],
                float(beams.off_up[beam] + scene.faces.middle[face, 1]) - mark[1],
            )

    def _mark(self, item: PlacedElement, face: int) -> tuple[float, float]:
        """Return where on a face (left, up from its middle) its element wants the beam, mm.

        `beam_at` is given in the element's frame, in which the windows of a cell are turned:
        there the mark is where a line along the element's axis meets the face.
        """
        f = self._trace.scene.faces
        left, up = item.element.stand.beam_at_mm
        _, leftwards, upwards = (np.array(axis) for axis in item.pose.axes())
        return left / float(f.left[face] @ leftwards), up / float(f.up[face] @ upwards)

    def _meets_front(self, beam: int) -> bool:
        """Whether light that enters an optic elsewhere meets its front on its way."""
        beams, scene = self._trace.beams, self._trace.scene
        owner = scene.faces.owner[beams.end_row[beam]]
        inside = [beam]
        start = beams.start
        while inside:
            children = np.flatnonzero(
                np.isin(start.parent, inside)
                & (start.within != OUTSIDE)
                & self._routes.working
                & (scene.faces.owner[np.maximum(start.face, 0)] == owner)
            )
            ends = scene.faces.name[beams.end_row[children]]
            if any(scene.face_names[name] == "front" for name in ends):
                return True
            inside = children.tolist()
        return False
