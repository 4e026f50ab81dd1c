"""Runs faults through their settings, more closely where what happens changes.

The first settings are traced, then what lies between neighbours is looked at (`between`). Where
light meets something else on the way, that is traced too: the middle of what is met, and, where
light gets out on one side only, the settings just before and after. What remains is halved where
neighbours differ in what gets out, until they are `CLOSE_RAD` apart.
"""

from __future__ import annotations

from bisect import insort
from collections.abc import Callable, Mapping, Sequence
from itertools import pairwise

from benchlay.faults.batches import Tracer, Variant
from benchlay.faults.between import Change, Looked, Looker, moving
from benchlay.faults.families import Family
from benchlay.faults.guards import Loads, loads_of
from benchlay.faults.legs import Labels, Legs, chains_at_rest, legs_of
from benchlay.faults.panes import Arriving, arriving_w, in_openings
from benchlay.faults.verdicts import Judge, Verdict
from benchlay.named import NamedTuple
from benchlay.scene.tables import Ints

CLOSE_RAD = 5e-6  # a third of a thousandth of a degree: 0.01 mm a metre, below any beam
MOST_ROUNDS = 20
MOST_SETTINGS = 400  # of one fault

Progress = Callable[[int, int], None]


class Case(NamedTuple):
    """One variant: a setting of a fault, and what becomes of it."""

    setting_rad: float
    verdict: Verdict
    legs: Legs
    loads: Loads
    arriving: Arriving


class Swept(NamedTuple):
    """All settings of a fault that were traced, in order.

    `open_rad` is the widest distance between neighbours that differ in what gets out,
    `step_mm` the widest step in which rays between settings were held against the bench.
    """

    family: Family
    seeds: Ints | None
    cases: tuple[Case, ...]
    open_rad: float
    step_mm: float


class _Growing:
    """The cases of one fault so far."""

    def __init__(self, family: Family, seeds: Ints | None) -> None:
        self.family, self.seeds = family, seeds
        self.cases: list[Case] = []
        self.settings: list[float] = []
        self.looked: set[tuple[float, float]] = set()
        self.step_mm = 0.0

    def first(self) -> list[float]:
        """Return the settings to begin with."""
        return [0.0] if self.family.sweep is None else self.family.sweep.first()

    def add(self, case: Case) -> None:
        """Take in a case; later ones go between."""
        insort(self.settings, case.setting_rad)
        insort(self.cases, case, key=lambda one: one.setting_rad)

    def pairs(self) -> list[tuple[Case, Case]]:
        """Return neighbours that nobody has looked between, far enough apart to matter."""
        found = []
        for a, b in pairwise(self.cases):
            ends = (a.setting_rad, b.setting_rad)
            if ends[1] - ends[0] > CLOSE_RAD and ends not in self.looked:
                self.looked.add(ends)
                found.append((a, b))
        return found

    def wants(self, setting: float) -> bool:
        """Whether a setting is new, and not one too many."""
        if len(self.settings) >= MOST_SETTINGS:
            return False
        return all(abs(setting - known) > CLOSE_RAD / 4 for known in self.settings)

    def done(self) -> Swept:
        """Return what has been traced."""
        wide = [
            b.setting_rad - a.setting_rad for a, b in pairwise(self.cases) if _ways(a) != _ways(b)
        ]
        return Swept(
            self.family, self.seeds, tuple(self.cases), max(wide, default=0.0), self.step_mm
        )


def _ways(case: Case) -> frozenset[object]:
    return frozenset(light.key for light in case.verdict.escapes)


def run(
    tracer: Tracer,
    families: Sequence[tuple[Family, Ints | None]],
    bases: Mapping[int, Verdict],
    progress: Progress,
) -> list[Swept]:
    """Trace all settings of faults, coarsely.

    Parameters
    ----------
    tracer : Tracer
        Of the layout in its own states.
    families : sequence of (Family, (N,) ndarray of int or None)
        The faults, each with the legs at rest that it is traced from (None: all emitted).
    bases : mapping of int to Verdict
        What becomes of each state without a fault.
    progress : callable
        Told how many variants are done and how many there are so far.
    """
    labels, judge = Labels(), Judge()
    looker = Looker(tracer.placed, labels)
    at_rest = chains_at_rest(tracer.rest, labels)
    own = len(tracer.placed.states)
    windows = in_openings(tracer.placed)
    growing = [_Growing(*family) for family in families]
    wanted = [(one, setting) for one in growing for setting in one.first()]
    done = 0
    for _ in range(MOST_ROUNDS):
        if not wanted:
            break
        variants = [Variant(one.family.made(setting), one.seeds) for one, setting in wanted]
        for which, context in tracer.contexts(variants, coarse=True):
            legs = legs_of(context, labels, range(own, own + len(which)), at_rest)
            for number, some in zip(which, legs, strict=True):
                one, setting = wanted[number]
                verdict = judge.verdict(context, own + number - which.start)
                verdict = verdict.beside(bases[one.family.state])
                variant = own + number - which.start
                loads = loads_of(context, variant)
                one.add(Case(setting, verdict, some, loads, arriving_w(context, variant, windows)))
            done += len(which)
            progress(done, done + len(wanted) - which.stop)
        wanted = _next(growing, looker)
    return [one.done() for one in growing]


def finely(
    tracer: Tracer,
    settings: Sequence[tuple[Family, Ints | None, float]],
    bases: Mapping[int, Verdict],
) -> list[Verdict]:
    """Return what becomes of single settings, with light followed as far down as it may matter."""
    judge, own = Judge(), len(tracer.placed.states)
    variants = [Variant(family.made(setting), seeds) for family, seeds, setting in settings]
    found = []
    for which, context in tracer.contexts(variants):
        for number in which:
            verdict = judge.verdict(context, own + number - which.start)
            found.append(verdict.beside(bases[settings[number][0].state]))
    return found


def _next(growing: Sequence[_Growing], looker: Looker) -> list[tuple[_Growing, float]]:
    """Return the settings to be traced next."""
    sweeps = [one for one in growing if one.family.sweep is not None]
    asked: list[tuple[_Growing, Case, Case]] = [
        (one, *pair) for one in sweeps for pair in one.pairs()
    ]
    if not asked:
        return []
    pairs = [(i, a.legs, b.legs) for i, (_, a, b) in enumerate(asked)]
    legs = moving(pairs, [one.family.state for one, _, _ in asked])
    seen = Looked([], [], 0.0) if legs is None else looker.look(legs)
    by_pair: dict[int, list[float]] = {}
    for change in seen.changes:
        by_pair.setdefault(change.pair, []).extend(_edges(change))
    for pair, share in seen.middles:
        by_pair.setdefault(pair, []).append(share)
    found: list[tuple[_Growing, float]] = []
    for number, (one, a, b) in enumerate(asked):
        shares = sorted(set(by_pair.get(number, ())))
        one.step_mm = max(one.step_mm, seen.step_mm)
        chosen = _chosen(one, a, b, shares)
        if not chosen and _ways(a) != _ways(b):
            chosen = _chosen(one, a, b, [0.5])
        found += [(one, setting) for setting in chosen]
    return found


def _chosen(one: _Growing, a: Case, b: Case, shares: Sequence[float]) -> list[float]:
    """Return the settings at shares of the way between two cases that are worth tracing."""
    width = b.setting_rad - a.setting_rad
    chosen: list[float] = []
    for share in shares:
        setting = a.setting_rad + share * width
        apart = all(abs(setting - other) > CLOSE_RAD / 4 for other in chosen)
        if apart and one.wants(setting):
            chosen.append(setting)
    return chosen


def _edges(change: Change) -> list[float]:
    return [change.before, change.after] if change.edge else []
