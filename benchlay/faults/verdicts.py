"""What becomes of hazardous light in a variant: what gets out, and what ends unstopped inside."""

from __future__ import annotations

from typing import TypeAlias

import numpy as np

from benchlay.checks import Context, exits_of, place_of, way_out
from benchlay.named import NamedTuple
from benchlay.scene.tables import SINK, SINKS, Ints
from benchlay.zones.enclosure_line import EnclosureLine, enclosure_line

Vector: TypeAlias = tuple[float, float, float]
Key: TypeAlias = tuple[object, ...]

# Where stray light ends that nothing is meant to stop. What gets out is told as such; light on
# rims and inside optics stays there; a target stops what its own routes bring, which the state
# without the fault shows.
_UNSTOPPED = (SINK["target"], SINK["bench"], SINK["body"])
_MORE = 1.0 + 1e-3  # of what already got out: less is the change of a share, not another beam


class Light(NamedTuple):
    """A hazardous beam that gets out, or lands where nothing stops strays.

    `through` is the way out, or the thing that it lands on; `at` is where it goes beyond the
    line, or lands. The leg runs from `origin` to `end`.
    """

    source: str
    wavelength_nm: float
    left: str  # the element, source or panel that it left last
    through: str
    power_w: float
    limit_w: float
    at: Vector
    direction: Vector
    origin: Vector
    end: Vector

    @property
    def times(self) -> float:
        """How many times the accessible limit it is."""
        return self.power_w / self.limit_w

    @property
    def key(self) -> Key:
        """What stays the same while a fault grows."""
        return (self.source, self.wavelength_nm, self.left, self.through)


class Verdict(NamedTuple):
    """What becomes of a variant; `reasons` say why something in it could not be judged."""

    escapes: tuple[Light, ...]
    strays: tuple[Light, ...]
    reasons: tuple[str, ...] = ()

    @property
    def outcome(self) -> str:
        """Return the gravest of what is known."""
        if self.escapes:
            return "escape"
        if self.reasons:
            return "not evaluated"
        return "stray" if self.strays else "none"

    def beside(self, base: Verdict) -> Verdict:
        """Return what is new beside the state without the fault."""
        # Where light of a line ends at rest already, more of it is no new stray.
        there = {light.key for light in base.strays}
        strays = tuple(light for light in self.strays if light.key not in there)
        return Verdict(_new(self.escapes, base.escapes), strays, self.reasons)

    def worst(self) -> Light | None:
        """Return the gravest light."""
        lights = self.escapes or self.strays
        return max(lights, key=lambda light: light.times) if lights else None


def _new(lights: tuple[Light, ...], known: tuple[Light, ...]) -> tuple[Light, ...]:
    before = {light.key: light.power_w for light in known}
    return tuple(li for li in lights if li.power_w > _MORE * before.get(li.key, 0.0))


class Judge:
    """Judges the variants of traces; what hangs on a layout alone is worked out once."""

    def __init__(self) -> None:
        self._lines: dict[int, tuple[object, EnclosureLine]] = {}

    def line(self, context: Context, variant: int) -> EnclosureLine:
        """Return the enclosure's line of a variant."""
        layout = context.layout(variant)
        # Kept beside its line, a layout lives as long as its number stands for it.
        found = self._lines.get(id(layout))
        if found is None:
            found = self._lines[id(layout)] = layout, enclosure_line(layout)
        return found[1]

    def verdict(self, context: Context, variant: int) -> Verdict:
        """Return what becomes of hazardous light in a variant."""
        reasons = [
            f"light of {nm:g} nm from '{source}' has no accessible limit ({why})"
            for (source, nm), why in context.unjudged(variant).items()
        ]
        if context.trace.bounded[variant]:
            reasons.append("the trace met its bound on beams")
        return Verdict(self._escapes(context, variant), _strays(context, variant), tuple(reasons))

    def _escapes(self, context: Context, variant: int) -> tuple[Light, ...]:
        line = self.line(context, variant)
        exits = list(exits_of(context, variant, line))
        if not exits:
            return ()
        beams = np.array([found.beam for found in exits])
        powers = context.beyond_w(beams, np.array([found.way_mm for found in exits]))
        worst: dict[Key, Light] = {}
        for found, power in zip(exits, powers.tolist(), strict=True):
            limit = float(context.limit_w[found.beam])
            if not power > limit * (1.0 + 1e-9):
                continue
            at = place_of(context, found)
            through = way_out(context, variant, line, found, at).words()
            _keep(worst, _light(context, found.beam, through, power, at))
        return tuple(worst.values())


def _light(context: Context, beam: int, through: str, power_w: float, at: Vector) -> Light:
    return Light(
        context.source_of(beam),
        context.wavelength_nm(beam),
        context.left_name(beam),
        through,
        power_w,
        float(context.limit_w[beam]),
        at,
        context.point(context.trace.beams.start.direction[beam]),
        context.point(context.trace.beams.start.position[beam]),
        context.end_at(beam),
    )


def _keep(worst: dict[Key, Light], light: Light) -> None:
    known = worst.get(light.key)
    if known is None or light.power_w > known.power_w:
        worst[light.key] = light


def _strays(context: Context, variant: int) -> tuple[Light, ...]:
    trace = context.trace
    ledger, scene = trace.ledger, trace.scene
    rows = _rows_of(context, variant)
    beams = ledger.beam[rows]
    power = np.minimum(ledger.power[rows], context.accessible_w[beams])
    mine = np.isin(ledger.sink[rows], _UNSTOPPED) & context.hazardous[beams]
    with np.errstate(invalid="ignore"):
        mine &= power > context.limit_w[beams] * (1.0 + 1e-9)
    worst: dict[Key, Light] = {}
    for row, beam, watts in zip(
        rows[mine].tolist(), beams[mine].tolist(), power[mine].tolist(), strict=True
    ):
        name = scene.names[int(ledger.name[row])] if ledger.name[row] >= 0 else None
        if not _stops(context, variant, int(ledger.sink[row]), name):
            light = _light(context, beam, name or "bench", watts, context.end_at(beam))
            _keep(worst, light._replace(left=""))  # one entry a place, whatever came there last
    return tuple(worst.values())


def _rows_of(context: Context, variant: int) -> Ints:
    return context.trace.landings_of(variant)


def _stops(context: Context, variant: int, sink: int, name: str | None) -> bool:
    """Whether a body is there to stop strays: a tube."""
    item = context.state(variant).elements.get(name or "")
    if item is None or SINKS[sink] != "body":
        return False
    return item.element.record.BLOCKS and item.geometry.barrel == "body"
