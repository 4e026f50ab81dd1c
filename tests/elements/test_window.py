"""Plane windows."""

from benchlay.elements._coating import UNCOATED, reflecting
from benchlay.elements._kind import CLEAR, Glass


def test_defaults(make):
    window = make("kind: window, diameter: 20")
    assert (window.thickness_mm, window.wedge_rad) == (5.0, 0.0)
    assert (window.front, window.back) == (UNCOATED, UNCOATED)
    assert window.glass == Glass("BK7", None)
    assert window.DEFAULT_BRANCH == "transmitted"
    assert window.TURNS_FRONT


def test_each_face_has_its_own_coating_and_the_glass_is_clear(make, face_of):
    geometry = make("kind: window, diameter: 20, front: 1 %, back: {metal: gold}").geometry()
    assert face_of(geometry, "front").coating == reflecting(0.01, 0.01)
    assert face_of(geometry, "back").coating.metal == "gold"
    assert geometry.bulk == CLEAR


def test_it_reflects_outside_from_either_face(make):
    ways = make("kind: window, diameter: 20").branches()["reflected"]
    assert ways == ((("front", "reflected"),), (("back", "reflected"),))


def test_unknown_keys_are_refused_with_the_nearest(complaints):
    ((message, _, remedy),) = complaints("kind: window, diameter: 20, thicknes: 3")
    assert (message, remedy) == (
        "'thicknes' is not a key here",
        "write 'thickness', or remove the key",
    )
