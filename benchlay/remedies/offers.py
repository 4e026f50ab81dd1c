"""Which changes are offered for which finding."""

from __future__ import annotations

from collections.abc import Callable, Iterable, Iterator, Mapping
from itertools import islice

from benchlay.named import NamedTuple
from benchlay.remedies.closing import closings
from benchlay.remedies.ghosts import coatings, tilts, wedges
from benchlay.remedies.stops import stops
from benchlay.remedies.trials import Bench, Change, Judged, Judgement, Trial
from benchlay.remedies.ways import Way, way_of_beam
from benchlay.report.model import Remedies, Remedy, Reported

MENDED = ("escape", "stray-unstopped")
"""The checks whose findings are dealt with here."""

# A trial is a whole check. These bound what one finding and one layout may cost.
_EACH = 8  # changes of one sort tried for one finding
_FOLLOWING = 4  # stops tried for light that a tilt or a wedge has sent elsewhere
_PER_FINDING = 24
_IN_ALL = 160
_FOLLOWED = 2  # beams that one turned optic sends elsewhere


class _Case(NamedTuple):
    """A finding with the beam that it is about, in what it was found in.

    `taken` are names that remedies of other findings use: all can be pasted side by side.
    """

    bench: Bench
    finding: Reported
    beam: int
    taken: list[str]


def offers(text: str, judged: Judged, judge: Judgement) -> Remedies:
    """Return what would clear each escape and each unstopped stray of a layout.

    Parameters
    ----------
    text : str
        The layout.
    judged : Judged
        What the checks say of it.
    judge : callable
        The same for any other text.

    Returns
    -------
    Remedies
        Of each sort (a stop; panel or lid; coating; tilt; wedge) the first that clears the
        finding and raises no other, in any state; a wedge only where neither of the two before
        it does.
    """
    bench = Bench(text, judged, judge, 0)
    offered: list[Remedy] = []
    without = []
    known: list[tuple[str, Trial]] = []
    for finding in judged.findings:
        if finding.check not in MENDED or finding.accepted or finding.beam is None:
            continue
        bench.left = min(_PER_FINDING, _IN_ALL - bench.tried)
        taken = [name for _, trial in known for name in trial.change.names]
        found = list(_remedies(_case(bench, finding, taken), known))
        offered += [_remedy(bench, finding, trial) for trial in found]
        if not found:
            without.append(finding.id)
    return Remedies(tuple(offered), tuple(without), bench.tried)


def _remedies(case: _Case, known: list[tuple[str, Trial]]) -> Iterator[Trial]:
    """Give a trial of each sort that clears a finding: one of those known, or a new one."""
    clears: set[str] = set()
    for name, find in _SORTS.items():
        # A wedge is a new optic: it is looked for where nothing simpler removes the ghost.
        if name == "wedge" and clears & {"coating", "tilt"}:
            continue
        trial = next((t for n, t in known if n == name and _clears(case, t)), None)
        if trial is None:
            trial = find(case)
            if trial is not None:
                known.append((name, trial))
        if trial is not None:
            clears.add(name)
            yield trial


def _clears(case: _Case, trial: Trial) -> bool:
    return case.bench.clears(trial, case.finding.id)


def _case(bench: Bench, finding: Reported, taken: list[str]) -> _Case:
    return _Case(bench, finding, _row(bench.judged, finding), taken)


def _row(judged: Judged, finding: Reported) -> int:
    """Return the row of the beam that a finding is about."""
    context = judged.context
    variant = context.trace.scene.variants.index(finding.worst_state)
    return int(context.beams_of(variant)[finding.beam])


def _way(judged: Judged, beam: int) -> Way:
    return way_of_beam(judged.context, beam)


def _names(judged: Judged) -> list[str]:
    layout = judged.context.layout(0)
    return [*layout.sources, *layout.elements]


def _stop(case: _Case) -> Trial | None:
    judged = case.bench.judged
    return _first(
        case, stops(judged.context, _way(judged, case.beam), [*_names(judged), *case.taken])
    )


def _closing(case: _Case) -> Trial | None:
    if case.finding.check != "escape":
        return None
    return _first(case, closings(_way(case.bench.judged, case.beam), case.taken))


def _coating(case: _Case) -> Trial | None:
    return _first(case, coatings(case.bench.judged.context, case.beam, case.finding))


def _tilt(case: _Case) -> Trial | None:
    return _first(case, tilts(case.bench.judged.context, case.beam), settle=True)


def _wedge(case: _Case) -> Trial | None:
    return _first(case, wedges(case.bench.judged.context, case.beam), settle=True)


_SORTS: Mapping[str, Callable[[_Case], Trial | None]] = {
    "stop": _stop,
    "closing": _closing,
    "coating": _coating,
    "tilt": _tilt,
    "wedge": _wedge,
}


def _first(case: _Case, changes: Iterable[Change], *, settle: bool = False) -> Trial | None:
    """Return the first change that does it; with stops where its light goes then, if asked."""
    for change in islice(changes, _EACH):
        trial = case.bench.try_out(change)
        if trial is None:
            continue
        if settle:
            trial = _settled(case, trial)
        elif not _clears(case, trial):
            trial = None
        if trial is not None:
            return trial
    return None


def _settled(case: _Case, trial: Trial) -> Trial | None:
    """Add stops for light that a change sends elsewhere, until nothing is left of it."""
    bench, finding = case.bench, case.finding
    for _ in range(_FOLLOWED + 1):
        if bench.clears(trial, finding.id):
            return trial
        open_ones = {finding.id, *bench.raised(trial)}
        strays = [f for f in trial.judged.findings if f.id in open_ones]
        if any(f.check not in MENDED or f.beam is None for f in strays) or not strays:
            return None
        following = _stopped(case, trial, strays[0])
        if following is None:
            return None
        trial = following
    return None


def _stopped(case: _Case, trial: Trial, stray: Reported) -> Trial | None:
    """Return a change with a stop more that ends one stray."""
    taken = [*_names(trial.judged), *case.taken]
    before = len(case.bench.raised(trial))
    way = _way(trial.judged, _row(trial.judged, stray))
    for stop in islice(stops(trial.judged.context, way, taken), _FOLLOWING):
        both = Change(
            trial.change.kind,
            f"{trial.change.words}; {stop.words}",
            (*trial.change.edits, *stop.edits),
        )
        tried = case.bench.try_out(both)
        if tried is None or stray.id in tried.judged.weights():
            continue
        if len(case.bench.raised(tried)) <= before:
            return tried
    return None


def _remedy(bench: Bench, finding: Reported, trial: Trial) -> Remedy:
    gone = set(bench.judged.weights()) - set(trial.judged.weights()) - {finding.id}
    change = trial.change
    return Remedy(
        finding.id, change.kind, change.words, change.yaml, tuple(sorted(gone)), change.names
    )
