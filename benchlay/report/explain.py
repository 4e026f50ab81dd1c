"""What a check, a kind of element or a part of a layout means, from what stands with the code."""

from __future__ import annotations

import sys
from inspect import getdoc
from textwrap import dedent

from benchlay.checks import CHECKS
from benchlay.document.words import nearest
from benchlay.elements import KINDS

_BLOCK = ".. code-block:: yaml"


def explain(name: str) -> str | None:
    """Return the page of a check, a kind or a part; None where there is no such name."""
    for check in CHECKS:
        if name == check.NAME:
            return f"check {name}\n\n{_readable(getdoc(check) or '')}"
    # Loaded here: the tables of the whole language are not needed for a check.
    from benchlay.layout.reference import kind_text, sections

    if name not in KINDS:
        parts = [f"{path}\n\n{_part(page)}" for path, page in sections(name)]
        return "\n".join(parts) or None
    page = getdoc(sys.modules[KINDS[name].__module__]) or ""
    return f"kind {name}\n\n{_readable(page)}\nIts own keys:\n\n{_rows(kind_text(name))}"


def listing() -> str:
    """Return every name that can be explained, with the first line of its page."""
    from benchlay.layout.reference import words

    checks = [f"  {c.NAME:<20} {_first(getdoc(c) or '')}" for c in CHECKS]
    kinds = [
        f"  {name:<20} {_first(getdoc(sys.modules[kind.__module__]) or '')}"
        for name, kind in KINDS.items()
    ]
    parts = [f"  {name:<20} {_readable(first).strip()}" for name, first in words().items()]
    blocks = (["checks", *checks], ["kinds of element", *kinds], ["parts of a layout", *parts])
    return "\n\n".join("\n".join(block) for block in blocks) + "\n"


def unknown(name: str) -> str:
    """Return what to tell someone who asked for a name that there is not."""
    from benchlay.layout.reference import words

    near = nearest(name, [*(check.NAME for check in CHECKS), *KINDS, *words()])
    hint = f"write {near!r}" if near else "give no name for a list of all"
    return (
        f"benchlay explain: there is no check, kind or part of a layout {name!r}\n"
        "  expected: the name of a check, of a kind of element or of a part of a layout\n"
        f"  to mend: {hint}\n"
    )


def _first(page: str) -> str:
    return page.partition("\n")[0]


def _readable(page: str) -> str:
    """Return a page without the marks that only a typesetter reads."""
    lines = [line for line in page.splitlines() if line.strip() != _BLOCK]
    return dedent("\n".join(lines)).replace("``", "'") + "\n"


def _part(page: str) -> str:
    """Return a part as text: what it is, then its keys; a page without keys as it is."""
    what, mark, table = page.partition("\n\n| key |")
    return f"{_readable(what)}\n{_rows(table)}" if mark else page


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
