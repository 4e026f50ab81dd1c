"""The gaps of every state's enclosure, and the light that could be sent to them."""

from __future__ import annotations

from typing import TYPE_CHECKING, TypeAlias

import numpy as np

from benchlay.coverage.enclosed import Enclosed, enclosed_of
from benchlay.coverage.filled import filled_openings
from benchlay.coverage.gaps import EDGE, OPENING, OVER, SHEET, SIDE, UNDER, Gap, gaps_of
from benchlay.coverage.places import Astray, standpoints, strongest
from benchlay.document.span import Span
from benchlay.layout.layout import Layout
from benchlay.named import NamedTuple

if TYPE_CHECKING:
    from benchlay.checks._check.context import Context
    from benchlay.checks._check.inside import Inside


_Open: TypeAlias = tuple[Enclosed | None, list[Gap]]
_ENCLOSING = ("enclosure", "bench", "room", "materials")  # parts of a layout that gaps hang on


def _gaps(layout: Layout, closed: frozenset[str]) -> _Open:
    enclosed = enclosed_of(layout, closed)
    return enclosed, [] if enclosed is None else gaps_of(enclosed)


class Thrown(NamedTuple):
    """A gap with the stretches of beams that might be thrown there, and the glass in its way."""

    gap: Gap
    legs: list[Inside]
    glass: str | None = None


class Stretch(NamedTuple):
    """A part of a leg that sees a gap, from where to where along it, mm."""

    of: Inside
    from_mm: float
    to_mm: float


class Gaps:
    """What is open in each state; worked out when first asked for."""

    def __init__(self, context: Context) -> None:
        self._context = context
        self._known: dict[int, _Open] = {}
        self._fillings: dict[int, dict[str, str]] = {}
        self._among: dict[int, Enclosed] = {}
        self._stretches: dict[tuple[int, object], tuple[Stretch, ...]] = {}

    def of(self, variant: int) -> _Open:
        """Return the enclosure of a state (None without one) and its gaps."""
        if variant not in self._known:
            layout, scene = self._context.layout(variant), self._context.trace.scene
            self._fillings[variant] = filled_openings(layout, scene, variant)
            closed = frozenset(self._fillings[variant])
            self._known[variant] = self._alike(layout, closed) or _gaps(layout, closed)
        return self._known[variant]

    def _alike(self, layout: Layout, closed: frozenset[str]) -> _Open | None:
        """Return what is known of a state whose enclosure is the very same."""
        for enclosed, gaps in self._known.values():
            if enclosed is None or enclosed.closed != closed:
                continue
            own = enclosed.layout
            if all(getattr(own, name) is getattr(layout, name) for name in _ENCLOSING):
                return enclosed._replace(layout=layout), gaps
        return None

    def thrown(self, variant: int) -> list[Thrown]:
        """Return by gap what of the beams of class 3B and 4 a mirror might throw there.

        The top of an enclosure without a lid is left out. An opening that glass fills counts for
        what the glass lets through, as far as that is still above the accessible limit.
        """
        from benchlay.checks._check.inside import strong

        enclosed, gaps = self.of(variant)
        sought = [gap for gap in gaps if not gap.roofless]
        glazed = self._glazed(variant)
        if enclosed is None or not enclosed.line.enclosed or not (sought or glazed):
            return []
        legs = strong(self._context, variant, enclosed)
        found = [Thrown(gap, legs) for gap in sought]
        for gap, element in glazed:
            found.append(Thrown(gap, self._let_through(element, legs), element))
        return [one for one in found if one.legs]

    def _glazed(self, variant: int) -> list[tuple[Gap, str]]:
        """Return the openings that an element of glass fills."""
        enclosed, _ = self.of(variant)
        if enclosed is None or not enclosed.closed:
            return []
        fillings, elements = self._fillings[variant], self._context.state(variant).elements
        glass = {
            name: element
            for name, element in fillings.items()
            if elements[element].element.record.glass_of() is not None
            and "transmitted" in elements[element].element.record.branches()
        }
        whole = gaps_of(enclosed._replace(closed=frozenset())) if glass else []
        return [(gap, glass[gap.through]) for gap in whole if gap.through in glass]

    def _let_through(self, element: str, legs: list[Inside]) -> list[Inside]:
        """Return what the glass of an element leaves of beams: its faces are taken to pass all."""
        context, scene = self._context, self._context.trace.scene
        faces = scene.faces.owner == scene.elements.index(element)
        volumes = np.unique(scene.behind[faces & (scene.behind >= 0)])
        found = []
        for one in legs:
            wave = int(context.trace.beams.start.wave[one.beam])
            share = float(scene.bulks.passes[volumes, wave].min()) if len(volumes) else 1.0
            if one.power_w * share > float(context.limit_w[one.beam]):
                found.append(one._replace(power_w=one.power_w * share))
        return found

    def among_bodies(self, variant: int) -> Enclosed:
        """Return the enclosure of a state with the bodies on the bench; its sides if roofless."""
        from benchlay.coverage.mirrors import among_bodies, upright_only

        if variant not in self._among:
            enclosed, _ = self.of(variant)
            assert enclosed is not None
            trace = self._context.trace
            state = trace.placed.states[variant]
            self._among[variant] = among_bodies(upright_only(enclosed), state, trace.scene, variant)
        return self._among[variant]

    def stretches(self, variant: int, one: Thrown) -> tuple[Stretch, ...]:
        """Return from where to where a mirror on each leg could throw light out through a gap.

        Findings and plans ask for the same, and it takes longer than all else about a gap.
        """
        from benchlay.coverage.mirrors import stretches

        key = (variant, one.gap.key)
        if key not in self._stretches:
            among = self.among_bodies(variant)
            self._stretches[key] = tuple(
                Stretch(leg, start, end)
                for leg in one.legs
                for start, end in stretches(among, one.gap, leg.leg)
            )
        return self._stretches[key]

    def astray(self, variant: int) -> list[Astray]:
        """Return the places of a state that hazardous light comes to, the strongest first."""
        context = self._context
        found = strongest(context.trace, variant, context.limit_w)
        places = [p for p in standpoints(context.state(variant)) if p.name in found]
        astray = [Astray(p.name, p.at, found[p.name].beam, found[p.name].power_w) for p in places]
        return sorted(astray, key=lambda one: (-one.power_w, one.name))


def span_of(gap: Gap, enclosed: Enclosed) -> Span | None:
    """Return where the panel or lid of a gap is written, or the table of all panels."""
    enclosure, one = enclosed.enclosure, gap.sheets[0]
    if gap.roofless:
        return enclosure.span_of("panels")
    if one in enclosure.lids and (gap.through == f"lid {one}" or one not in enclosure.panels):
        return enclosure.lids.spans.get(one)
    return enclosure.panels.spans.get(one)


def named(gap: Gap) -> str:
    """Name a gap within a sentence."""
    if gap.kind == SIDE:
        return f"the {gap.through}"
    if gap.kind in (OVER, UNDER):
        return f"the gap {gap.through.split()[0]} '{gap.sheets[0]}'"
    if gap.kind == SHEET:
        lid = gap.through.startswith("lid ")
        return f"the open {'lid' if lid else 'panel'} '{gap.sheets[0]}'"
    return f"'{gap.through}'"


def said(gap: Gap) -> str:
    """Say what is open."""
    width = f"{round(gap.width_mm, 2):.10g} mm"
    one = gap.sheets[0]
    if gap.roofless:
        return "the enclosure has no lid"
    if gap.kind == EDGE:
        return "the bench has fewer than two panels and is open all round"
    if gap.kind == OPENING:
        return f"opening '{gap.through}' is open, {width} at its narrowest"
    if gap.kind == SHEET:
        return f"{'lid' if gap.through.startswith('lid ') else 'panel'} '{one}' stands open"
    if gap.kind == SIDE:
        return f"the {gap.through} is open, {width} wide"
    return f"it is open {gap.through.split()[0]} panel '{one}', {width} wide"


def closing(gap: Gap, enclosed: Enclosed) -> str:
    """Say what would close a gap."""
    one = gap.sheets[0]
    if gap.kind == SIDE:
        side = enclosed.line.sides[gap.sides[0]]
        ends = " to ".join(f"[{x:.10g}, {y:.10g}]" for x, y in (side.start, side.end))
        return f"close it with a panel from {ends}, or let '{one}' and '{gap.sheets[1]}' meet"
    if gap.kind == OVER and not gap.roofless:
        low, top = gap.heights_mm
        raised = f"raise '{one}' to {top:.10g} mm" if top > low else ""
        lid = _LID if enclosed.roofless else ""
        return ", and ".join(filter(None, (raised, lid)))
    known = {
        EDGE: "put panels all round, and a lid on top",
        OPENING: (
            f"close '{gap.through}', stand an element in it that fills it (`in: {gap.through}`), "
            "or put a sheet before it that overlaps it on every side"
        ),
        SHEET: f"keep '{one}' shut in this state, or bring no more than the limit there",
        OVER: _LID,
        UNDER: f"bring '{one}' down to the bench, and stand it on the bench top",
    }
    return known[gap.kind]


_LID = "put a lid on it that reaches every panel"
