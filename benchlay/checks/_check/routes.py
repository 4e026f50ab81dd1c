"""What became of every route: how far its beam went, and what cut it short.

A break has a first cause. It is not held against the layout where a state brings it about
on purpose: by its own keys, by an element drawn closed or taken out, or where another
state's keys are what lets the beam through.
"""

from __future__ import annotations

from collections.abc import Set
from functools import cached_property

import numpy as np

from benchlay.named import NamedTuple
from benchlay.optics.rays import dot
from benchlay.placing.placed import PlacedState
from benchlay.placing.solve import POSE_KEYS
from benchlay.scene.tables import Flags, Floats
from benchlay.tracing import Trace
from benchlay.tracing.beams import FACE, HANDED, SOLID
from benchlay.tracing.front import OUTSIDE

# Keys by which a state moves something; and by which it also takes it away, opens or closes it.
_POSES = POSE_KEYS | {"offset", "yaw_error", "pitch_error"}
_MOVING = _POSES | {"out", "closed", "open"}


class Leg(NamedTuple):
    """How far a route's beam went in a state.

    `beam` is its last one (None if nothing was emitted), `reached` the number of the last
    item met. `arrives` tells whether that is the whole route, `excused` whether the state
    cuts it short on purpose.
    """

    route: int
    variant: int
    beam: int | None
    reached: int
    arrives: bool
    excused: bool

    @property
    def broken(self) -> bool:
        """Whether the beam is lost without anyone having meant it."""
        return not self.arrives and not self.excused


class Routes:
    """The routes of a trace, in every state."""

    def __init__(self, trace: Trace) -> None:
        self._trace = trace

    @cached_property
    def _of_node(self) -> list[dict[int, int]]:
        """By node the routes that pass it, each with its leg."""
        return [dict(place.routes) for place in self._trace.ways.places]

    @cached_property
    def _diffuse(self) -> Flags:
        return self._trace.diffuse()

    @cached_property
    def working(self) -> Flags:
        """Which beams follow a route (N,)."""
        working: Flags = self._trace.beams.start.node >= 0
        return working

    def apart(self, spot: Floats, beam: int | None) -> float:
        """Return how far a place is from the nearest leg but one that a route needs, mm.

        Legs of all states count: what is put on the bench stands there in every one.
        """
        beams = self._trace.beams
        rows = np.flatnonzero(self.working)
        if beam is not None:
            rows = rows[rows != beam]
        if not len(rows):
            return float("inf")
        away = spot - beams.start.position[rows]
        along = np.clip(dot(away, beams.start.direction[rows]), 0.0, beams.length[rows])
        off = away - along[:, None] * beams.start.direction[rows]
        return float(np.sqrt(dot(off, off).min()))

    def wanted(self, beam: int) -> tuple[str, ...]:
        """Return the items that the routes of a working beam have next.

        Inside an optic that is the optic itself.
        """
        start, scene = self._trace.beams.start, self._trace.scene
        if start.within[beam] != OUTSIDE:
            return (scene.elements[int(scene.faces.owner[start.face[beam]])],)
        node = int(start.node[beam])
        found = (self._trace.ways.expected(node, route) for route in self._of_node[node])
        return tuple(sorted({name for name in found if name is not None}))

    def routes_of(self, beam: int) -> tuple[str, ...]:
        """Return the names of the routes that a working beam follows."""
        node = int(self._trace.beams.start.node[beam])
        return tuple(self._trace.ways.names[route] for route in sorted(self._of_node[node]))

    def comes_first(self, beam: int, name: str) -> bool:
        """Whether a working beam meets an item (or is in it) for the first time on some route."""
        for route, leg in self._of_node[int(self._trace.beams.start.node[beam])].items():
            items = self._trace.ways.routes[route].items
            if not any(item.name == name for item in items[: leg + 1]):
                return True
        return False

    @cached_property
    def legs(self) -> dict[tuple[int, int], Leg]:
        """What became of every route, by state and route."""
        bare = {
            (variant, route): self._followed(variant, route)
            for variant in range(len(self._trace.placed.states))
            for route in range(len(self._trace.ways.names))
        }
        return {key: leg._replace(excused=self._excused(leg, bare)) for key, leg in bare.items()}

    def of_state(self, variant: int) -> list[Leg]:
        """Return the routes of a state, in name order."""
        return [leg for (v, _), leg in self.legs.items() if v == variant]

    def lost_on_purpose(self, beam: int) -> bool:
        """Whether a beam is the last of routes which the state all cuts short on purpose."""
        return beam in self._ended and all(leg.excused for leg in self._ended[beam])

    def interrupted(self, variant: int) -> list[int]:
        """Return the beams of a state that go on where a state cuts all their routes short."""
        start = self._trace.beams.start
        return [
            beam
            for beam in sorted(self._ended)
            if start.variant[beam] == variant and self.lost_on_purpose(beam)
        ]

    @cached_property
    def _ended(self) -> dict[int, list[Leg]]:
        """The routes that end too early with a beam."""
        found: dict[int, list[Leg]] = {}
        for leg in self.legs.values():
            if leg.beam is not None and not leg.arrives:
                found.setdefault(leg.beam, []).append(leg)
        return found

    def downstream(self, variant: int) -> frozenset[str]:
        """Return the items of routes that the light of a state does not come to any more.

        A break explains them, whoever caused it.
        """
        found: set[str] = set()
        for leg in self.of_state(variant):
            if not leg.arrives:
                items = self._trace.ways.routes[leg.route].items
                found.update(item.name for item in items[leg.reached + 1 :])
        return frozenset(found)

    # ------------------------------------------------------------------ how far

    @cached_property
    def _members(self) -> dict[tuple[int, int], list[tuple[int, int]]]:
        """By state and route its beams, each with its leg, in the order of their making."""
        start = self._trace.beams.start
        found: dict[tuple[int, int], list[tuple[int, int]]] = {}
        for beam in np.flatnonzero(self.working).tolist():
            for route, leg in self._of_node[int(start.node[beam])].items():
                found.setdefault((int(start.variant[beam]), route), []).append((beam, leg))
        return found

    def _followed(self, variant: int, route: int) -> Leg:
        members = self._members.get((variant, route), [])
        if not members:
            return Leg(route, variant, None, 0, arrives=False, excused=False)
        beam, reached = max(members, key=lambda m: (m[1], m[0]))
        last = len(self._trace.ways.routes[route].items) - 1
        arrives = reached + 1 == last and self._arrived(beam, route)
        if arrives:
            reached = last
        return Leg(route, variant, beam, reached, arrives, excused=False)

    def _arrived(self, beam: int, route: int) -> bool:
        """Whether a beam on a route's last leg comes to the last item."""
        item = self._trace.ways.routes[route].items[-1]
        if item.opening is not None:
            return self.handed_at(beam) == ".".join(item.opening)
        some = self._trace.beams.end_core[beam] > 0.0 or self._diffuse[beam]
        return self.met(beam) == item.name and bool(some)

    def met(self, beam: int) -> str | None:
        """Return the element whose optical face the chief ray of a beam meets."""
        beams, scene = self._trace.beams, self._trace.scene
        if beams.end_kind[beam] != FACE:
            return None
        return scene.elements[int(scene.faces.owner[beams.end_row[beam]])]

    def opening_wanted(self, beam: int) -> str | None:
        """Return the opening that a route of a working beam has next."""
        for route, leg in sorted(self._of_node[int(self._trace.beams.start.node[beam])].items()):
            items = self._trace.ways.routes[route].items
            if leg + 2 == len(items) and items[-1].opening is not None:
                return ".".join(items[-1].opening)
        return None

    def handed_at(self, beam: int) -> str | None:
        """Return the opening at which a beam is handed over."""
        beams, scene = self._trace.beams, self._trace.scene
        if beams.end_kind[beam] != HANDED:
            return None
        return scene.names[int(scene.solids.hole_name[beams.end_row[beam]])]

    # ------------------------------------------------------------------ on purpose or not

    def _excused(self, leg: Leg, all_legs: dict[tuple[int, int], Leg]) -> bool:
        if leg.arrives:
            return False
        state = self._trace.placed.states[leg.variant]
        if self._stopped_by_drawing(leg, state):
            return True
        items = {item.name for item in self._trace.ways.routes[leg.route].items[: leg.reached + 2]}
        blocker = None if leg.beam is None else self._blocker(leg.beam)
        others = {blocker} - items - {None}
        # Items of the route that are out or closed were looked at above; brought in or opened
        # by the state they do not excuse anything.
        if _sets(state, items, _POSES) or _sets(state, others, _MOVING):
            return True
        states = self._trace.placed.states
        return any(
            other.arrives and _sets(states[other.variant], items | others, _MOVING)
            for (_, route), other in all_legs.items()
            if route == leg.route and other.variant != leg.variant
        )

    def _stopped_by_drawing(self, leg: Leg, state: PlacedState) -> bool:
        """Whether an element of the route is closed or out, or one closed stands in the way."""
        items = self._trace.ways.routes[leg.route].items
        source = state.sources[items[0].name].source
        if source.stand.out or leg.beam is None:
            return True
        upcoming = items[leg.reached + 1 : leg.reached + 2]
        names = {item.name for item in upcoming}
        blocker = self._blocker(leg.beam)
        if blocker is not None:
            names.add(blocker)
        placed = (state.elements[name] for name in names if name in state.elements)
        return any(item.out or item.element.record.interrupts() for item in placed)

    def _blocker(self, beam: int) -> str | None:
        """Return the name of what the chief ray of a beam meets."""
        beams, scene = self._trace.beams, self._trace.scene
        if beams.end_kind[beam] == SOLID:
            name = int(scene.solids.name[beams.end_row[beam]])
            return scene.names[name] if name >= 0 else None
        return self.met(beam)


def _sets(state: PlacedState, names: Set[str | None], keys: frozenset[str]) -> bool:
    """Whether a state sets one of these keys of one of these items."""
    over = state.layout.overridden
    return any(
        over.get(f"{section}.{name}", frozenset()) & keys
        for name in names
        for section in ("elements", "sources", "enclosure.panels", "enclosure.lids")
    )
