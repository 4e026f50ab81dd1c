"""The form that is one of several others."""

from __future__ import annotations

from typing import Any, TypeAlias

from benchlay.document.form import Form, Reader, show_plainly
from benchlay.document.nodes import Mapping, Node, Scalar
from benchlay.document.problems import Problem, Problems
from benchlay.document.scalars import Quantity, Whole

_NUMBERS = (Quantity, Whole)
_Trial: TypeAlias = tuple[Form[Any], list[Problem]]


class OneOf(Form[Any]):
    """One of several forms: chosen by the node's shape, then by which of them succeeds."""

    def __init__(self, *forms: Form[Any]) -> None:
        self.forms = forms

    def read(self, node: Node, reader: Reader) -> Any:  # noqa: ANN401 - the union of the forms' values
        """Read with the form that fits; one message where none does."""
        fitting = [form for form in self.forms if form.takes(node)]
        if len(fitting) == 1 and not isinstance(node, Scalar):
            return fitting[0].read(node, reader)
        trials: list[_Trial] = []
        kept, noted = reader.problems, len(reader.not_yet)
        for form in fitting:
            reader.problems = Problems()
            value = form.read(node, reader)
            trial, reader.problems = reader.problems, kept
            if value is not None or not trial:
                return value
            del reader.not_yet[noted:]
            trials.append((form, trial.sorted()))
        self._refuse(node, reader, trials)
        return None

    def _refuse(self, node: Node, reader: Reader, trials: list[_Trial]) -> None:
        """Report what the form found that was most likely meant, otherwise all choices."""
        empty = isinstance(node, Scalar) and not node.text.strip()
        meant = None if empty else self._meant(node, trials)
        if meant is None:
            reader.refuse(node, self)
            return
        for problem in meant:
            # A single value was judged by one form, but any of them may be written.
            expected = self.text() if isinstance(node, Scalar) else problem.expected
            reader.problems.add(
                problem.span, problem.message, expected=expected, remedy=problem.remedy
            )

    @staticmethod
    def _meant(node: Node, trials: list[_Trial]) -> list[Problem] | None:
        """Choose the trial that speaks, or None if it cannot be told which was meant.

        For a number that is the one form that reads numbers; for a table the form that knows
        most of its keys; for a list one that found fault only with its items.
        """
        if isinstance(node, Scalar):
            numeric = node.text.strip()[:1] in set("+-.0123456789")
            likely = [t for form, t in trials if numeric and isinstance(form, _NUMBERS)]
        elif isinstance(node, Mapping):
            known = [form.kinship(node) for form, _ in trials]
            best = max(known, default=0)
            likely = [t for (_, t), k in zip(trials, known, strict=True) if best > 0 and k == best]
        else:
            likely = [t for _, t in trials if t[0].span != node.span]
            return min(likely, key=len, default=None)
        return likely[0] if len(likely) == 1 else None

    def text(self) -> str:
        """List what may be written."""
        return "; or ".join(form.text() for form in self.forms)

    def example(self) -> str:
        """Give the first form's example."""
        return self.forms[0].example()

    def takes(self, node: Node) -> bool:
        """Take what any of the forms takes."""
        return any(form.takes(node) for form in self.forms)

    def schema(self) -> dict[str, Any]:
        """Allow any of the forms."""
        return {"anyOf": [form.schema() for form in self.forms]}

    def show(self, value: object) -> str:
        """Write the value as the first form that has words for it does."""
        plain = show_plainly(value)
        shown = (form.show(value) for form in self.forms)
        return next((text for text in shown if text != plain), plain)
