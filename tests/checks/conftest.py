"""Layouts as text to the context of all checks."""

import textwrap

import pytest

from benchlay.checks import Context, floors_w, limits_of
from benchlay.layout import read_layout
from benchlay.placing import place
from benchlay.tracing import trace


def context_of(text):
    layouts, problems = read_layout(text, "example.yaml")
    assert layouts is not None, [str(p) for p in problems.sorted()]
    placed = place(layouts, problems)
    assert placed is not None, [str(p) for p in problems.sorted()]
    limits = limits_of(placed)
    return Context(trace(placed, floors_w(placed, limits)), limits)


@pytest.fixture(scope="session")
def make_context():
    """Make the context of a layout."""
    return context_of


@pytest.fixture(scope="session")
def example():
    """Return the layout that a check's papers give under a heading."""

    def layout(module, heading):
        text = module.__doc__.split(f"\n{heading}\n")[1].split(".. code-block:: yaml\n\n")[1]
        lines = []
        for line in text.splitlines():
            if line and not line.startswith("   "):
                break
            lines.append(line)
        return textwrap.dedent("\n".join(lines))

    return layout
