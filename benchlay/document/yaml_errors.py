"""Syntax errors of the YAML parser, in words that say what to do.

The C parser and the Python one word their errors differently; known ones get the same
wording from here, so that messages do not depend on how PyYAML was built.
"""

from __future__ import annotations

from typing import Any

import yaml

from benchlay.document.problems import Problems
from benchlay.document.span import Span

# Words in the parsers' own texts -> what is wrong, what was expected, how to mend it.
_KNOWN: tuple[tuple[str, str, str, str], ...] = (
    (
        "mapping values are not allowed",
        "a second ': ' stands where a value is read already",
        "one 'key: value' a line",
        "begin a new line, or put the value in quotes",
    ),
    (
        "expected ',' or ']'",
        "a list in brackets is not closed or lacks a comma",
        "[item, item]",
        "add the missing ',' or ']' at or before this place",
    ),
    (
        "expected ',' or '}'",
        "a table in braces is not closed or lacks a comma",
        "{key: value, key: value}",
        "add the missing ',' or '}' at or before this place",
    ),
    (
        "unexpected end of stream",
        "a quote is opened and never closed",
        "text between two quotes of one kind",
        "add the closing quote",
    ),
    (
        "could not find expected ':'",
        "a key has no colon",
        "'key: value'",
        "add ': ' after the key of the line before this place",
    ),
    (
        "did not find expected key",
        "this does not fit into the table around it",
        "keys of one table indented alike, or a comma between keys in braces",
        "indent the line like the other keys, or close the bracket or quote before it",
    ),
    (
        "expected <block end>",
        "this does not fit into the table around it",
        "keys of one table indented alike, or a comma between keys in braces",
        "indent the line like the other keys, or close the bracket or quote before it",
    ),
    (
        "did not find expected '-' indicator",
        "this does not fit into the list around it",
        "every item of the list begun with '- ', indented alike",
        "begin the line with '- ', or indent it further",
    ),
    (
        "cannot start any token",
        "a value cannot begin with this character",
        "a value, or text in quotes",
        "put the value in quotes",
    ),
    (
        "unknown escape character",
        "a backslash in double quotes is followed by a letter it has no meaning for",
        "text in double quotes without backslashes",
        "use single quotes",
    ),
    (
        "did not find expected node content",
        "a value is missing here, or a bracket closes what is not open",
        "a value",
        "remove the comma or bracket that is too many, or put the text in quotes",
    ),
    (
        "expected the node content",
        "a value is missing here, or a bracket closes what is not open",
        "a value",
        "remove the comma or bracket that is too many, or put the text in quotes",
    ),
    (
        "expected alphabetic or numeric",
        "a value cannot begin with '*' or '&'",
        "a value, or text in quotes",
        "put the value in quotes",
    ),
)


def too_deep(most: int) -> tuple[str, str, str]:
    """Return message, expectation and mend for too many brackets in one another."""
    return (
        f"values are nested more than {most} deep",
        f"at most {most} lists and tables inside one another",
        "check the brackets before this place",
    )


def explain(error: yaml.YAMLError, file: str, problems: Problems, most_deep: int) -> None:
    """Add the problem that an error of the parser stands for."""
    mark = getattr(error, "problem_mark", None) or getattr(error, "context_mark", None)
    span = _span(mark, file)
    raw = str(getattr(error, "problem", None) or error).splitlines()[0]
    if "maximum nesting depth" in raw:
        message, expected, remedy = too_deep(most_deep)
    else:
        message, expected, remedy = _explained(raw)
    opening = getattr(error, "context_mark", None)
    if "closed" in message and opening is not None:
        opened = _span(opening, file)
        message += f"; it begins in line {opened.line}, column {opened.column}"
    problems.add(span, message, expected=expected, remedy=remedy)


def _span(mark: Any, file: str) -> Span:  # noqa: ANN401 - either parser's own class
    return Span(file, mark.line + 1, mark.column + 1) if mark else Span(file, 1, 1)


def _explained(raw: str) -> tuple[str, str, str]:
    for words, message, expected, remedy in _KNOWN:
        if words in raw:
            return message, expected, remedy
    return f"this is not YAML: {raw}", "YAML", "correct the line, or put the text in quotes"
