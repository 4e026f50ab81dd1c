"""What a text may not hold: characters that cannot be seen, and tabs as indentation."""

from __future__ import annotations

import re

from benchlay.document.problems import Problems
from benchlay.document.span import Span

# What no layout needs and what can make a text look other than it is: control characters,
# marks that turn the direction of reading, odd line ends, surrogates, tags.
UNSEEN = re.compile(
    "[\x00-\x08\x0b\x0c\x0e-\x1f\x7f-\x9f\u061c\u200e\u200f\u2028-\u202e\u2066-\u2069"
    "\ud800-\udfff\ufeff\ufff9-\ufffb\ufffe\uffff\U000e0000-\U000e007f]"
)
_TAB_INDENT = re.compile(r"^ *\t[ \t]*(?=[^\s#])", re.MULTILINE)


def place(text: str, position: int, file: str) -> Span:
    """Return line and column of a position; a line may end in any of the three ways."""
    head = text[:position]
    line = head.count("\n") + head.count("\r") - head.count("\r\n")
    return Span(file, line + 1, position - max(head.rfind("\n"), head.rfind("\r")))


def without_unseen(text: str, file: str, problems: Problems) -> str:
    """Report unseen characters, and put a visible one in their place so that reading goes on."""
    if not UNSEEN.search(text):
        return text
    for found in UNSEEN.finditer(text):
        if problems.full:
            break
        problems.add(
            place(text, found.start(), file),
            f"the character U+{ord(found[0]):04X} cannot be seen",
            expected="characters that can be seen, spaces and line ends",
            remedy="delete it",
        )
    return UNSEEN.sub("\ufffd", text)


def has_tabs(text: str, file: str, problems: Problems) -> bool:
    """Tell whether lines are indented with tabs, having reported each."""
    if "\t" not in text:
        return False
    found = False
    for tab in _TAB_INDENT.finditer(text):
        found = True
        if problems.full:
            break
        problems.add(
            place(text, text.index("\t", tab.start()), file),
            "this line is indented with a tab",
            expected="indentation by spaces",
            remedy="replace each tab at the start of the line by spaces",
        )
    return found
