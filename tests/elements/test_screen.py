"""Beam blocks."""

from benchlay.elements._kind import Acts
from benchlay.geometry.outline import rectangle
from tests.geometry.solid_checks import volume


def test_defaults(make):
    made = make("kind: screen")
    assert (made.size_mm, made.material) == ((50.0, 75.0), None)
    assert made.BLOCKS
    assert not made.SQUARE
    assert not made.DARK_MATTERS
    assert made.branches() == {}


def test_its_front_ends_light_as_a_screen(make):
    geometry = make("kind: screen, size: [40, 60], material: felt").geometry()
    (front,) = geometry.faces
    assert (front.acts, front.sink, front.material) == (Acts.OPAQUE, "screen", "felt")
    assert front.outline == front.clear == rectangle(40.0, 60.0)
    assert geometry.material == "felt"
    (body,) = geometry.solids
    assert body.part == "body"
    assert volume(body) == 40.0 * 60.0 * 2.0
    (stroke,) = geometry.strokes
    assert stroke.points == ((0.0, -20.0), (0.0, 20.0), (-2.0, 20.0), (-2.0, -20.0))


def test_a_diameter_is_no_key_of_a_screen(complaints):
    ((message, _, _),) = complaints("kind: screen, diameter: 20")
    assert message == "'diameter' is not a key here"
