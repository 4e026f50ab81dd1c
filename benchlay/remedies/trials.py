"""Trials: a layout with a change, read, placed, traced and checked again."""

from __future__ import annotations

from collections.abc import Callable, Mapping, Sequence
from typing import TypeAlias

from benchlay.checks import Context
from benchlay.findings import Severity
from benchlay.named import NamedTuple
from benchlay.remedies.edits import Edit, apply, pasted
from benchlay.report.model import Reported

_NAMED = (("elements",), ("enclosure", "panels"), ("enclosure", "lids"))


class Judged(NamedTuple):
    """What the checks say of a text: the findings, and what they were found in."""

    findings: tuple[Reported, ...]
    context: Context

    def weights(self) -> Mapping[str, tuple[Severity, frozenset[str]]]:
        """Return the severity of each finding and the states in which it holds, by id."""
        return {f.id: (Severity[f.severity.upper()], frozenset(f.states)) for f in self.findings}


Judgement: TypeAlias = Callable[[str], Judged | None]
"""Judges a text as `check` would; None for one that cannot be read or placed."""


class Change(NamedTuple):
    """A way to clear a finding: what is to be written, and why in a sentence."""

    kind: str  # screen, dump, panel, lid, coating, wedge, tilt
    words: str
    edits: tuple[Edit, ...]

    @property
    def yaml(self) -> str:
        """What is to be pasted."""
        return pasted(self.edits)

    @property
    def names(self) -> tuple[str, ...]:
        """What it adds to the layout, by name."""
        return tuple(edit.key for edit in self.edits if edit.path in _NAMED)


class Trial(NamedTuple):
    """A change and what the checks say of the layout with it."""

    change: Change
    text: str
    judged: Judged


class Bench:
    """A layout's text with what was found in it; tries changes, each text once.

    `left` is how many more may be tried, so that a bench with many findings is reviewed in
    bounded time.
    """

    def __init__(self, text: str, judged: Judged, judge: Judgement, left: int) -> None:
        self.text = text
        self.judged = judged
        self.left = left
        self.tried = 0
        self._judge = judge
        self._known: dict[str, Judged | None] = {}

    def try_out(self, change: Change) -> Trial | None:
        """Return what becomes of the bench with a change; None if it cannot be made."""
        text = apply(self.text, change.edits)
        if text is None:
            return None
        if text not in self._known:
            if self.left <= 0:
                return None
            self.left -= 1
            self.tried += 1
            self._known[text] = self._judge(text)
        judged = self._known[text]
        return None if judged is None else Trial(change, text, judged)

    def raised(self, trial: Trial) -> list[str]:
        """Return the findings that a change brings, or makes graver or wider, by id."""
        before, after = self.judged.weights(), trial.judged.weights()
        return [
            name
            for name, (severity, states) in after.items()
            if name not in before or severity > before[name][0] or not states <= before[name][1]
        ]

    def clears(self, trial: Trial, finding: str) -> bool:
        """Whether a change clears a finding and raises no other."""
        return finding not in trial.judged.weights() and not self.raised(trial)


def unused_name(stem: str, taken: Sequence[str]) -> str:
    """Return the first of ``stem1``, ``stem2``, … that nothing is called, whatever its case."""
    known = {name.lower() for name in taken}
    number = 1
    while f"{stem}{number}".lower() in known:
        number += 1
    return f"{stem}{number}"
