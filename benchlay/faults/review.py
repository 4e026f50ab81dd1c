"""The review of single faults: every credible one, in every state, against that state without."""

from __future__ import annotations

from collections.abc import Callable, Collection, Iterator, Mapping, Sequence
from itertools import groupby, pairwise

from benchlay.faults.batches import Tracer, whole_benches
from benchlay.faults.between import CLOSEST_MM
from benchlay.faults.families import KINDS, Family, families
from benchlay.faults.guarding import Opened, arriving_in, loads_in, opened
from benchlay.faults.guards import Budget, budgets
from benchlay.faults.nearby import Nearby
from benchlay.faults.panes import Window, windows
from benchlay.faults.sweeps import CLOSE_RAD, Case, Progress, Swept, finely, run
from benchlay.faults.verdicts import Judge, Light, Verdict
from benchlay.named import NamedTuple
from benchlay.placing.placed import Placed
from benchlay.scene.tables import Ints

_RIGHT_ROUND = 1.5  # rad: waveplates turn by a quarter of a turn both ways, cubes by half a one

OUTCOMES = ("escape", "not evaluated", "stray", "none")
"""What may become of a fault, the gravest first."""


class Range(NamedTuple):
    """A stretch of settings."""

    low_rad: float
    high_rad: float


class Fault(NamedTuple):
    """One fault in one state.

    `worst` is the gravest light that the fault sends out, or astray inside; `lights` are the
    gravest by their way out or the place where they end, at any setting. `ranges` are all
    settings with this outcome, none for a fault without a setting, and `range_of_worst` those
    round the worst at which light goes the same way; `open_rad` is within how much ends of
    ranges are known.
    """

    family: Family
    name: str
    outcome: str
    worst: Light | None
    lights: tuple[Light, ...]
    setting_rad: float
    ranges: tuple[Range, ...]
    range_of_worst: Range | None
    reasons: tuple[str, ...]
    cases: tuple[Case, ...]
    open_rad: float

    @property
    def kind(self) -> str:
        """Return the kind of fault."""
        return self.family.kind


class Review(NamedTuple):
    """All faults, the gravest first.

    `cases` counts the variants that were traced, `passed_over` the faults of things that no
    hazardous light comes near. `step_mm` is the widest step in which rays between settings
    were held against the bench (and `narrowest_mm` the closest they were laid), `open_rad` the
    widest doubt about an end of a range in which light gets out, `stray_open_rad` of one in
    which it ends astray inside.
    """

    faults: tuple[Fault, ...]
    cases: int
    passed_over: int
    step_mm: float
    open_rad: float
    stray_open_rad: float
    narrowest_mm: float
    states: tuple[str, ...]
    budgets: tuple[Budget, ...]
    windows: tuple[Window, ...]
    opened: tuple[Opened, ...]


def _silent(done: int, total: int) -> None:
    del done, total


def review_faults(
    placed: Placed,
    states: Sequence[str] | None = None,
    progress: Progress = _silent,
    only: Collection[tuple[int, str, str]] | None = None,
) -> Review:
    """Review every credible single fault of a placed layout.

    Parameters
    ----------
    placed : Placed
        The layout in its states.
    states : sequence of str, optional
        The states to speak of; all of them by default.
    progress : callable, optional
        Told how many variants are traced and how many are known to be due.
    only : collection, optional
        The keys of the families to review; all of them by default.
    """
    names = [state.name for state in placed.states]
    spoken_of = tuple(names if states is None else states)
    numbers = tuple(names.index(name) for name in spoken_of)
    tracer, judge = Tracer(placed), Judge()
    bases = {number: judge.verdict(tracer.rest, number) for number in numbers}
    near = {number: Nearby(tracer.rest, number) for number in numbers}
    # Where light of one place makes other light elsewhere, no leg can be followed by itself.
    alone = not whole_benches(placed)
    live: list[tuple[Family, Ints | None]] = []
    untouched: list[Family] = []
    for family in families(placed, numbers):
        if only is not None and family.key not in only:
            continue
        seeds = _seeds(family, near[family.state])
        if seeds is None or len(seeds) or not alone:
            live.append((family, seeds if alone else None))
        else:
            untouched.append(family)
    swept = run(tracer, live, bases, progress)
    found = [*_judged(tracer, swept, bases), *map(_untouched, untouched)]
    return Review(
        tuple(sorted(found, key=_gravity)),
        sum(len(one.cases) for one in swept),
        len(untouched),
        max((one.step_mm for one in swept), default=0.0),
        max((fault.open_rad for fault in found if fault.outcome != "stray"), default=0.0),
        max((fault.open_rad for fault in found if fault.outcome == "stray"), default=0.0),
        CLOSEST_MM,
        spoken_of,
        tuple(budgets(placed.base.layout, loads_in(tracer, numbers, swept))),
        tuple(windows(tracer.rest, arriving_in(tracer, numbers, swept))),
        tuple(
            opened(tracer, [(f.family, f.worst if f.outcome == "escape" else None) for f in found])
        ),
    )


def _seeds(family: Family, near: Nearby) -> Ints | None:
    """Return the legs at rest that could notice a fault; None where a source has it."""
    if family.near is not None:
        return near.of_element(family.near)
    return near.of_sheet(family.element) if family.sheet is not None else None


def _gravity(fault: Fault) -> tuple[object, ...]:
    times = 0.0 if fault.worst is None else fault.worst.times
    kind = KINDS.index(fault.kind)
    return (OUTCOMES.index(fault.outcome), -times, fault.family.state, kind, fault.name)


def _untouched(family: Family) -> Fault:
    return Fault(family, _general(family), "none", None, (), 0.0, (), None, (), (), 0.0)


def _general(family: Family) -> str:
    """Name a fault by its worst setting where none is worse: the end of its range."""
    return family.name(0.0 if family.sweep is None else family.sweep.high_rad)


def _judged(
    tracer: Tracer, swept: Sequence[Swept], bases: Mapping[int, Verdict]
) -> Iterator[Fault]:
    """Yield the faults, the worst setting of each traced again as finely as it may matter."""
    outcomes = [_outcome(one.cases) for one in swept]
    worst = [_worst_case(one.cases, how) for one, how in zip(swept, outcomes, strict=True)]
    picked = [i for i, case in enumerate(worst) if case is not None]
    settings = [(swept[i].family, swept[i].seeds, _setting(worst[i])) for i in picked]
    finer = dict(zip(picked, finely(tracer, settings, bases), strict=True))
    for number, one in enumerate(swept):
        case, fine = worst[number], finer.get(number)
        cases = one.cases
        if case is not None and fine is not None and fine.outcome == outcomes[number]:
            better = case._replace(verdict=fine)
            cases = tuple(better if known is case else known for known in cases)
        elif one.family.sweep is None and fine is not None:
            cases = tuple(known._replace(verdict=fine) for known in cases)
        yield _fault(one._replace(cases=cases), _setting(case))


def _setting(case: Case | None) -> float:
    return 0.0 if case is None else case.setting_rad


def _outcome(cases: Sequence[Case]) -> str:
    return min((case.verdict.outcome for case in cases), key=OUTCOMES.index)


def _fault(swept: Swept, setting: float) -> Fault:
    family, cases = swept.family, swept.cases
    outcome = _outcome(cases)
    reasons = tuple(dict.fromkeys(r for case in cases for r in case.verdict.reasons))
    case = next((c for c in cases if c.setting_rad == setting), None)
    light = None if case is None or outcome == "none" else case.verdict.worst()
    ranges: tuple[Range, ...] = ()
    about = None
    if family.sweep is not None and light is not None:
        ranges = _ranges(cases, lambda case: case.verdict.outcome == outcome)
        own = _ranges(cases, lambda case: light.through in _ways(case))
        about = next(r for r in own if r.low_rad <= setting <= r.high_rad)
    return Fault(
        family,
        _general(family) if light is None else family.name(setting),
        outcome,
        light,
        _lights(cases, outcome),
        setting,
        ranges,
        about,
        reasons,
        cases,
        _open_rad(swept, outcome),
    )


def _open_rad(swept: Swept, outcome: str) -> float:
    """Return within how much the ends of a fault's ranges are known.

    What gets out is followed to its edges; where light that stays inside ends is known at the
    settings that were traced, and no nearer.
    """
    if swept.family.sweep is None:
        return 0.0
    widths = [swept.open_rad, CLOSE_RAD]
    if outcome == "stray":
        widths += [
            b.setting_rad - a.setting_rad for a, b in pairwise(swept.cases) if _ways(a) != _ways(b)
        ]
    return max(widths)


def _worst_case(cases: Sequence[Case], outcome: str) -> Case | None:
    """Return the case of the gravest light.

    Of equals it is the one farthest from rest, where a mount stands at the end of its range; of
    what is turned right round, the nearest: so little is enough.
    """
    there = [case for case in cases if case.verdict.outcome == outcome and case.verdict.worst()]
    if not there:
        return None
    most = max(_times(case) for case in there)
    # A hundredth is what a beam gains and loses where the edge of an opening stands in it.
    near = [case for case in there if _times(case) > 0.99 * most]
    if max(case.setting_rad for case in cases) > _RIGHT_ROUND:
        return min(near, key=lambda case: (abs(case.setting_rad), -case.setting_rad))
    return max(near, key=lambda case: (abs(case.setting_rad), case.setting_rad))


def _times(case: Case) -> float:
    light = case.verdict.worst()
    return 0.0 if light is None else light.times


def _ways(case: Case) -> set[str]:
    return {light.through for light in case.verdict.escapes or case.verdict.strays}


def _ranges(cases: Sequence[Case], holds: Callable[[Case], bool]) -> tuple[Range, ...]:
    """Return the stretches of neighbouring settings for which something holds."""
    found = []
    for there, run_ in groupby(cases, key=holds):
        if there:
            own = list(run_)
            found.append(Range(own[0].setting_rad, own[-1].setting_rad))
    return tuple(found)


def _lights(cases: Sequence[Case], outcome: str) -> tuple[Light, ...]:
    """Return the gravest light by its key, over all settings with the outcome."""
    worst: dict[object, Light] = {}
    for case in cases:
        if case.verdict.outcome != outcome:
            continue
        for light in case.verdict.escapes or case.verdict.strays:
            known = worst.get(light.key)
            if known is None or light.times > known.times:
                worst[light.key] = light
    return tuple(sorted(worst.values(), key=lambda light: (-light.times, str(light.key))))
