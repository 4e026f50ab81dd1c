"""Which single faults a layout could have: generated from what stands on it.

A fault that has a setting (a knock, a roll, a turn) is a `Family` of many variants; any other is
a family of one. Settings are in rad.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator
from math import degrees, pi

from benchlay.elements.mount import DEFAULT_MOUNT, Mount
from benchlay.faults import changes
from benchlay.layout.limits import Faults
from benchlay.named import NamedTuple
from benchlay.placing.placed import Placed, PlacedElement, PlacedState

KINDS = (
    "knocked", "out", "reversed", "turned", "rolled", "stuck", "missing", "opened", "wavelength",
)  # fmt: skip
"""Kinds of fault, in the order of the tables."""

# First settings of sweeps. A knocked mirror turns its beam by twice as much, so that from one
# to the next the path of the beam's end departs from a straight line by 0.04 mm a metre; what
# is met between them is looked for along that line, and then traced at the place itself.
_KNOCKS_RAD = pi / 360.0  # half a degree
_ROLLS_RAD = pi / 72.0  # 2.5 degrees
_TURNS_RAD = pi / 36.0  # power goes with the sine of four times this: worst within 3 %


class Sweep(NamedTuple):
    """The settings that a fault runs through, and how one is written, as in ``yaw {:+g}°``."""

    low_rad: float
    high_rad: float
    step_rad: float
    words: str

    def first(self) -> list[float]:
        """Return the first settings, both ends included, rest in the middle."""
        count = max(2, 2 * round((self.high_rad - self.low_rad) / (2.0 * self.step_rad) + 0.499))
        width = self.high_rad - self.low_rad
        return [self.low_rad + width * i / count for i in range(count + 1)]


class Family(NamedTuple):
    """A fault of one thing in one state, with all its settings.

    `made` returns the state with the fault at a setting (0 where there is none), `near` the
    element whose surroundings decide whether light could notice (None: it always could).
    """

    kind: str
    element: str
    words: str  # "M1 out", or the beginning of a sweep's name, "M1"
    state: int
    made: Callable[[float], PlacedState]
    near: PlacedElement | None
    sweep: Sweep | None = None
    sheet: tuple[str, str] | None = None  # panel or lid, and its name, of what is opened

    @property
    def key(self) -> tuple[int, str, str]:
        """What stays the same where something else on the bench is changed."""
        return self.state, self.kind, self.name(0.0 if self.sweep is None else self.sweep.high_rad)

    def name(self, setting_rad: float = 0.0) -> str:
        """Return the name of the fault at a setting."""
        if self.sweep is None:
            return self.words
        return f"{self.words} {self.sweep.words.format(round(degrees(setting_rad), 3) + 0.0)}"


def _always(state: PlacedState) -> Callable[[float], PlacedState]:
    """Return what gives a state whatever the setting."""
    return lambda _: state


def families(placed: Placed, states: tuple[int, ...]) -> list[Family]:
    """Return all credible single faults of some states, by state, kind and name."""
    found: list[Family] = []
    for number in states:
        state = placed.states[number]
        settings = state.layout.limits.faults
        own: list[Family] = []
        for name in sorted(state.elements):
            own += _of_element(placed, number, name, settings)
        own += _of_sources(placed, number, settings)
        own += _of_sheets(state, number, settings)
        wanted = [one for one in own if getattr(settings, one.kind)]
        found += sorted(wanted, key=lambda one: KINDS.index(one.kind))
    return found


def _of_element(placed: Placed, number: int, name: str, settings: Faults) -> Iterator[Family]:
    state = placed.states[number]
    item = state.elements[name]

    def put(kind: str, words: str, changed: PlacedElement) -> Family:
        made = _always(changes.with_element(state, changed))
        return Family(kind, name, f"{name} {words}", number, made, changed)

    if item.out:
        base = placed.base.elements[name]
        if not base.out:
            yield put("stuck", "stuck in", base)
        return
    can = item.element.record.FAULTS
    yield from _knocks(state, number, item, settings)
    for word, taken in (("out", changes.out), ("missing", changes.out)):
        if word in can:
            yield put(word, word, taken(item))._replace(near=item)
    if "reversed" in can:
        yield put("reversed", "reversed", changes.reversed_(item))
    for word, shape in item.element.record.stuck() if "stuck" in can else ():
        yield put("stuck", f"stuck {word}", changes.reshaped(item, shape))
    if "wavelength" in can and (stripped := changes.bare(item)) is not None:
        yield put("wavelength", "met by light its coatings are not for", stripped)
    yield from _about_beam(placed, number, item)


def _knocks(
    state: PlacedState, number: int, item: PlacedElement, settings: Faults
) -> Iterator[Family]:
    mount = item.element.mount
    if item.holder.box is None or item.pose.rolled is not None:
        return
    own = (mount if isinstance(mount, Mount) else DEFAULT_MOUNT).range_rad
    reach = max(own, settings.range_rad)
    if reach <= 0.0:
        return

    def yawed(setting: float) -> PlacedState:
        return changes.with_element(state, changes.knocked(item, setting, 0.0))

    def pitched(setting: float) -> PlacedState:
        return changes.with_element(state, changes.knocked(item, 0.0, setting))

    name = item.element.name
    for words, made in (("yaw {:+g}°", yawed), ("pitch {:+g}°", pitched)):
        sweep = Sweep(-reach, reach, _KNOCKS_RAD, words)
        yield Family("knocked", name, name, number, made, item, sweep)


def _about_beam(placed: Placed, number: int, item: PlacedElement) -> Iterator[Family]:
    state, name = placed.states[number], item.element.name
    can = item.element.record.FAULTS

    def turned(setting: float) -> PlacedState:
        return changes.with_element(state, changes.turned(item, setting))

    def rolled(setting: float) -> PlacedState:
        return changes.with_element(state, changes.rolled(item, placed.arrivals.get(name), setting))

    if "turned" in can:  # an axis comes back to itself after half a turn
        sweep = Sweep(-pi / 2, pi / 2, _TURNS_RAD, "turned {:+g}°")
        yield Family("turned", name, name, number, turned, item, sweep)
    if "rolled" in can:
        sweep = Sweep(-pi, pi, _ROLLS_RAD, "rolled {:+g}°")
        yield Family("rolled", name, name, number, rolled, item, sweep)


def _of_sources(placed: Placed, number: int, settings: Faults) -> Iterator[Family]:
    """Yield sources that emit all they do in any state."""
    del settings
    state = placed.states[number]
    for name in sorted(state.sources):
        own = state.sources[name].source
        most = max(
            (other.sources[name].source for other in placed.states),
            key=lambda source: 0.0 if source.stand.out else source.emitted_w(),
        )
        if own.stand.out or most.emitted_w() > own.emitted_w() * (1.0 + 1e-9):
            made = changes.with_source(
                state,
                own._replace(lines=most.lines, rear_leak_w=most.rear_leak_w, stand=most.stand),
            )
            words = f"{name} at full power"
            yield Family("stuck", name, words, number, _always(made), None)


def _of_sheets(state: PlacedState, number: int, settings: Faults) -> Iterator[Family]:
    del settings
    enclosure = state.layout.enclosure
    if enclosure is None:
        return
    for kind, sheets in (("panel", enclosure.panels), ("lid", enclosure.lids)):
        for name in sorted(sheets):
            access = sheets[name].access
            if access == "none" or sheets[name].open:
                continue
            made = _always(changes.opened(state, (kind, name)))
            called = name if kind == "panel" else f"lid {name}"
            how = "left open" if access == "tool" else "open, its interlock failed"
            yield Family("opened", name, f"{called} {how}", number, made, None, sheet=(kind, name))
