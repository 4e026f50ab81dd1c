"""What every test of the language needs: reading, and the problems as text."""

import pytest

from benchlay.layout import AS_DRAWN, read_layout


@pytest.fixture
def complaints():
    def read(text):
        source, problems = read_layout(text, "b.yaml")
        assert (source is None) == bool(problems)
        return [str(problem) for problem in problems.sorted()]

    return read


@pytest.fixture
def layout_of():
    def read(text, state=AS_DRAWN):
        source, problems = read_layout(text, "b.yaml")
        assert [str(problem) for problem in problems.sorted()] == []
        return source.layouts[state]

    return read


@pytest.fixture
def laser():
    """A bench with one green laser, to which a test adds what it is about."""
    return (
        "bench: {size: [1500, 900]}\n"
        "sources:\n"
        "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5},"
        " at: [100, 450], heading: 0}\n"
    )
