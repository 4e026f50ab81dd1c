"""Forms of words and dates."""

from __future__ import annotations

import re
from typing import Any

from benchlay.document.form import Form, Reader
from benchlay.document.nodes import Node, Scalar
from benchlay.document.scalars import Single
from benchlay.document.words import quote

NAME_PATTERN = "[A-Za-z][A-Za-z0-9_-]*"
NAME_LENGTH = 64
_NAME = re.compile(NAME_PATTERN)
_DATE = re.compile(r"([0-9]{4})-([0-9]{2})-([0-9]{2})")
_DEVICES = frozenset(
    ["con", "prn", "aux", "nul"]
    + [f"{device}{k}" for device in ("com", "lpt") for k in range(1, 10)]
)
_FEBRUARY = 2


class Text(Single[str]):
    """Free text on one line (or, with `lines`, on several)."""

    def __init__(
        self,
        max_length: int = 200,
        pattern: str | None = None,
        *,
        lines: bool = False,
        what: str = "text",
        sample: str = "text",
    ) -> None:
        self.max_length = max_length
        self.pattern = pattern
        self.lines = lines
        self.what = what
        self.sample = sample

    def value(self, node: Scalar, reader: Reader) -> str | None:
        """Return the text, without spaces around it."""
        text = node.text.strip()
        if len(text) > self.max_length:
            what = f"this text is {len(text)} characters long"
            remedy = f"shorten it to {self.max_length} characters"
        elif not self.lines and ("\n" in text or "\r" in text):
            what, remedy = "this text has more than one line", "write it on one line"
        elif self.pattern is not None and not re.fullmatch(self.pattern, text):
            what = f"{quote(text)} is not {self.what}"
            remedy = f"write {self.what}, such as '{self.sample}'"
        else:
            return text
        reader.complain(node, what, expected=self.text(), remedy=remedy)
        return None

    def text(self) -> str:
        """Name what it is and how long it may be."""
        lines = "" if self.lines else " on one line"
        return f"{self.what}{lines}, at most {self.max_length} characters"

    def example(self) -> str:
        """Return the sample."""
        return f"'{self.sample}'"

    def schema(self) -> dict[str, Any]:
        """Give length and pattern."""
        found: dict[str, Any] = {"type": "string", "maxLength": self.max_length}
        if self.pattern is not None:
            found["pattern"] = f"^(?:{self.pattern})$"
        return found


class Name(Single[str]):
    """A name for something: it becomes part of file names, so the rule is narrow."""

    def __init__(self, what: str = "a name") -> None:
        self.what = what

    def value(self, node: Scalar, reader: Reader) -> str | None:
        """Hold the text against the rule."""
        text = node.text
        if len(text) > NAME_LENGTH:
            problem, remedy = "is too long for a name", "shorten it"
        elif text.lower() in _DEVICES:
            problem = "is reserved by some systems and cannot be a file's name"
            remedy = f"write another name, such as '{text}-1'"
        elif not _NAME.fullmatch(text):
            problem = "cannot be a name"
            remedy = self._mend(text)
        else:
            return text
        reader.complain(node, f"{quote(text)} {problem}", expected=self.text(), remedy=remedy)
        return None

    @staticmethod
    def _mend(text: str) -> str:
        """Propose the nearest name that would do."""
        tried = re.sub(r"[^A-Za-z0-9_-]+", "-", text).strip("-")
        if tried and not tried[0].isalpha():
            tried = f"N{tried}"
        return f"write '{tried}'" if tried else "write a name, such as 'M1'"

    def text(self) -> str:
        """Say the rule."""
        return f"{self.what} of letters, digits, '-' and '_', a letter first, at most {NAME_LENGTH}"

    def example(self) -> str:
        """Return a name."""
        return "'M1'"

    def schema(self) -> dict[str, Any]:
        """Give the rule as a pattern."""
        return {
            "type": "string",
            "pattern": f"^{NAME_PATTERN}$",
            "maxLength": NAME_LENGTH,
        }


class Date(Single[str]):
    """A day, written YYYY-MM-DD; kept as text, which sorts as the days do."""

    def value(self, node: Scalar, reader: Reader) -> str | None:
        """Check that there is such a day."""
        match = _DATE.fullmatch(node.text.strip())
        if match is not None and _exists(*map(int, match.groups())):
            return match[0]
        wrong = "is not a date" if match is None else "is a day no calendar has"
        reader.complain(
            node,
            f"{quote(node.text)} {wrong}",
            expected=self.text(),
            remedy=f"write {self.text()}, such as {self.example()}",
        )
        return None

    def text(self) -> str:
        """Say how a date is written."""
        return "a date as YYYY-MM-DD"

    def example(self) -> str:
        """Return a date."""
        return "'2027-06-30'"

    def schema(self) -> dict[str, Any]:
        """Give the form of a date."""
        return {"type": "string", "format": "date"}


def _exists(year: int, month: int, day: int) -> bool:
    """Tell whether the Gregorian calendar has the day."""
    if year < 1 or not 1 <= month <= 12:  # noqa: PLR2004 - months of a year
        return False
    days = 30 + (month + month // 8) % 2
    if month == _FEBRUARY:
        days = 28 + (year % 4 == 0 and (year % 100 != 0 or year % 400 == 0))
    return 1 <= day <= days


class Deferred(Form[Node]):
    """Anything at all, kept as a node for someone else to read."""

    def __init__(self, text: str) -> None:
        self._text = text

    def read(self, node: Node, reader: Reader) -> Node | None:
        """Return the node itself."""
        return node

    def text(self) -> str:
        """Say what the text given says."""
        return self._text

    def schema(self) -> dict[str, Any]:
        """Allow everything."""
        return {}
