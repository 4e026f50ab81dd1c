"""Beam dumps."""

import pytest

from benchlay.elements._kind import Acts
from benchlay.geometry.outline import circle
from tests.geometry.solid_checks import volume


def test_defaults(make):
    made = make("kind: dump")
    assert (made.opening_mm, made.length_mm, made.returns) == (20.0, 60.0, 1e-4)
    assert made.SQUARE
    assert made.BLOCKS
    assert not made.MOUNTED
    assert not made.DARK_MATTERS


def test_its_opening_is_in_the_front_of_a_box_behind_it(make):
    geometry = make("kind: dump, opening: 30, length: 80").geometry()
    (opening,) = geometry.faces
    assert (opening.name, opening.acts, opening.sink) == ("opening", Acts.OPAQUE, "dump")
    assert (opening.origin, opening.normal) == ((0.0, 0.0, 0.0), (1.0, 0.0, 0.0))
    assert opening.outline == circle(15.0)
    (body,) = geometry.solids
    assert volume(body) == pytest.approx(40.0 * 40.0 * 80.0)
    assert max(x for x, _, _ in body.points) == 0.0
    assert geometry.extent == (-80.0, 0.0, 20.0, 20.0)
    assert geometry.post_at == (-40.0, 0.0)


def test_it_returns_no_more_than_all(complaints):
    ((message, _, _),) = complaints("kind: dump, returns: 2")
    assert message == "returns: '2' is too large"


def test_a_rating_may_be_written(read_text):
    element, problems = read_text(
        "D1: {kind: dump, at: [0, 0], facing: 0, withstands: {power: 5 W}}"
    )
    assert problems == []
    assert element.withstands.power_w == 5.0
