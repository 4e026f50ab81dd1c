"""Reading one element, as the layout reads it."""

import pytest

from benchlay.document.form import Reader
from benchlay.document.nodes import parse
from benchlay.document.problems import Problems
from benchlay.layout.elements import read_element


def _read(text):
    problems = Problems()
    node = parse(text, "b.yaml", problems)
    assert not problems, [str(p) for p in problems.sorted()]
    ((name, entry),) = node.pairs
    element = read_element(name, entry, Reader(problems))
    return element, problems.sorted()


@pytest.fixture
def read_text():
    """Read `NAME: {keys}`; return the element and the problems."""
    return _read


@pytest.fixture
def make():
    """Return the record of an element with these keys, which must be without problems."""

    def record(keys, stand="at: [0, 0], facing: 0"):
        element, problems = _read(f"E1: {{{keys}, {stand}}}")
        assert [str(problem) for problem in problems] == []
        return element.record

    return record


@pytest.fixture
def complaints():
    """Return (message, expected, remedy) of all that is wrong with an element of these keys."""

    def found(keys, stand="at: [0, 0], facing: 0"):
        element, problems = _read(f"E1: {{{keys}, {stand}}}")
        assert (element is None) == bool(problems)
        return [tuple(problem[1:]) for problem in problems]

    return found


@pytest.fixture
def face_of():
    """Return a face of a geometry by its name."""

    def find(geometry, name):
        (face,) = (face for face in geometry.faces if face.name == name)
        return face

    return find
