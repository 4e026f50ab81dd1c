"""What would keep in the light that single faults send out, tried out before it is offered."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from itertools import islice

from benchlay.faults import Fault, Light, review_faults
from benchlay.named import NamedTuple
from benchlay.remedies.closing import closings
from benchlay.remedies.stops import stops
from benchlay.remedies.trials import Bench, Change, Judged, Judgement, Trial
from benchlay.remedies.ways import way_of_light
from benchlay.report.model import FaultRemedy

# A trial is a whole check, and a review of the faults that send light out.
_FAULTS = 4  # the gravest for which something is sought
_CLOSINGS = 4  # tried for one fault, the way out closed
_STOPS = 6  # tried for one fault, the beam ended before it
_IN_ALL = 20


class FaultOffers(NamedTuple):
    """What was found: remedies, faults that nothing helps, how many more there are, trials."""

    offered: tuple[FaultRemedy, ...] = ()
    without: tuple[str, ...] = ()
    left: int = 0
    tried: int = 0


def fault_offers(
    text: str,
    judged: Judged,
    judge: Judgement,
    faults: Sequence[Fault],
    taken: Sequence[str] = (),
) -> FaultOffers:
    """Return what would keep in the light of the gravest faults.

    Parameters
    ----------
    text : str
        The layout.
    judged : Judged
        What the checks say of it.
    judge : callable
        The same for any other text.
    faults : sequence of Fault
        Of its review, the gravest first.
    taken : sequence of str
        Names that other remedies use: all can be pasted side by side.

    Returns
    -------
    FaultOffers
        For each of the gravest faults that send light out one change that closes its way out and
        one that ends the beam before it: with the change the fault lets nothing out at any of
        its settings, none of the others lets out more than it did, and no check finds anything
        new.
    """
    out = [fault for fault in faults if fault.outcome == "escape"]
    bench = _FaultyBench(Bench(text, judged, judge, _IN_ALL), out, taken)
    offered: list[FaultRemedy] = []
    without: list[str] = []
    covered: set[str] = set()
    sought = 0
    for fault in out:
        if bench.name(fault) in covered:
            continue
        if sought == _FAULTS:
            break
        sought += 1
        found = list(bench.remedies(fault))
        offered += found
        covered |= {bench.name(fault), *(name for one in found for name in one.clears_too)}
        if not found:
            without.append(bench.name(fault))
    left = sum(bench.name(fault) not in covered for fault in out)
    return FaultOffers(tuple(offered), tuple(without), left, bench.bench.tried)


class _FaultyBench:
    """A bench with the faults of it that send light out."""

    def __init__(self, bench: Bench, faults: Sequence[Fault], taken: Sequence[str]) -> None:
        self.bench, self._taken = bench, list(taken)
        self.faults = {fault.family.key: fault for fault in faults}
        self._states = bench.judged.context.trace.scene.variants

    def name(self, fault: Fault) -> str:
        """Name a fault with its state."""
        return f"{fault.name} in {self._states[fault.family.state]}"

    def remedies(self, fault: Fault) -> Iterator[FaultRemedy]:
        """Give a change that closes the way out, and one that ends the beam before it."""
        for changes in (
            islice(self._closings(fault), _CLOSINGS),
            islice(self._stops(fault), _STOPS),
        ):
            found = next(filter(None, (self._tried(fault, change) for change in changes)), None)
            if found is not None:
                yield found

    def _closings(self, fault: Fault) -> Iterator[Change]:
        layout = self.bench.judged.context.layout(fault.family.state)
        told: set[str] = set()
        for light in _farthest(fault):
            for change in closings(way_of_light(layout, light), self._taken):
                if change.yaml not in told:
                    told.add(change.yaml)
                    yield change

    def _stops(self, fault: Fault) -> Iterator[Change]:
        context, light = self.bench.judged.context, fault.worst
        assert light is not None
        layout = context.layout(fault.family.state)
        names = [*layout.sources, *layout.elements, *self._taken]
        yield from stops(context, way_of_light(layout, light), names)

    def _tried(self, fault: Fault, change: Change) -> FaultRemedy | None:
        trial = self.bench.try_out(change)
        if trial is None or self.bench.raised(trial):
            return None
        kept_in = self._kept_in(trial)
        if fault.family.key not in kept_in:
            return None
        too = [self.name(self.faults[key]) for key in kept_in if key != fault.family.key]
        self._taken += change.names
        return FaultRemedy(
            fault.name,
            self._states[fault.family.state],
            change.kind,
            change.words,
            change.yaml,
            tuple(too),
        )

    def _kept_in(self, trial: Trial) -> list[tuple[int, str, str]]:
        """Return the faults that let nothing out any more; none if another lets out more."""
        placed = trial.judged.context.trace.placed
        after = {f.family.key: f for f in review_faults(placed, only=self.faults).faults}
        for key, fault in after.items():
            if not _ways_out(fault) <= _ways_out(self.faults[key]):
                return []
        return [
            key for key, fault in after.items() if fault.outcome not in ("escape", "not evaluated")
        ]


def _ways_out(fault: Fault) -> set[str]:
    return {light.through for light in fault.lights} if fault.outcome == "escape" else set()


def _farthest(fault: Fault) -> list[Light]:
    """Return the light that goes out highest by each way, the gravest way first."""
    found: dict[str, Light] = {light.through: light for light in fault.lights}
    for case in fault.cases:
        for light in case.verdict.escapes:
            known = found.get(light.through)
            if known is not None and light.at[2] > known.at[2]:
                found[light.through] = light
    return list(found.values())
