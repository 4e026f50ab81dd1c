"""What a check or a kind of element means, from the pages that stand with their code."""

from __future__ import annotations

import sys
from inspect import getdoc
from textwrap import dedent

from benchlay.checks import CHECKS
from benchlay.document.words import nearest
from benchlay.elements import KINDS

_BLOCK = ".. code-block:: yaml"


def explain(name: str) -> str | None:
    """Return the page of a check or of a kind; None where there is no such name."""
    for check in CHECKS:
        if name == check.NAME:
            return f"check {name}\n\n{_readable(getdoc(check) or '')}"
    if name not in KINDS:
        return None
    # Loaded here: the tables of the whole language are not needed for a check.
    from benchlay.layout.reference import kind_text

    page = getdoc(sys.modules[KINDS[name].__module__]) or ""
    return f"kind {name}\n\n{_readable(page)}\nIts own keys:\n\n{_rows(kind_text(name))}"


def listing() -> str:
    """Return every name that can be explained, with the first line of its page."""
    checks = [f"  {c.NAME:<20} {_first(getdoc(c) or '')}" for c in CHECKS]
    kinds = [
        f"  {name:<20} {_first(getdoc(sys.modules[kind.__module__]) or '')}"
        for name, kind in KINDS.items()
    ]
    return "\n".join(["checks", *checks, "", "kinds of element", *kinds]) + "\n"


def unknown(name: str) -> str:
    """Return what to tell someone who asked for a name that there is not."""
    near = nearest(name, [*(check.NAME for check in CHECKS), *KINDS])
    hint = f"write {near!r}" if near else "give no name for a list of all"
    return (
        f"benchlay explain: there is no check or kind {name!r}\n"
        f"  expected: the name of a check or of a kind of element\n  to mend: {hint}\n"
    )


def _first(page: str) -> str:
    return page.partition("\n")[0]


def _readable(page: str) -> str:
    """Return a page without the marks that only a typesetter reads."""
    lines = [line for line in page.splitlines() if line.strip() != _BLOCK]
    return dedent("\n".join(lines)).replace("``", "'") + "\n"


def _rows(table: str) -> str:
    """Return a table of keys as text: a key and its default, what to write, what it means."""
    out = []
    for line in table.splitlines():
        if not line.startswith("| `"):
            continue
        name, form, default, meaning = (cell.strip() for cell in line.strip("| ").split(" | "))
        out += [f"  {name.strip('`')} (default {default}): {meaning}", f"      {form}"]
    note = [line for line in table.splitlines() if line.startswith("Not yet")]
    return "\n".join([*out, *note]) + "\n"
