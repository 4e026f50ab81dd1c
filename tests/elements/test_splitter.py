"""Plate beam splitters."""

from benchlay.elements._coating import UNCOATED, reflecting
from benchlay.elements._kind import Glass


def test_defaults(make):
    splitter = make("kind: splitter, diameter: 25.4, reflectance: 50 %")
    assert (splitter.thickness_mm, splitter.wedge_rad, splitter.back) == (5.0, 0.0, UNCOATED)
    assert splitter.glass == Glass("BK7", None)
    assert splitter.TURNS_FRONT


def test_the_front_divides_and_the_back_is_bare(make, face_of):
    geometry = make("kind: splitter, diameter: 20, reflectance: {s: 60 %, p: 40 %}").geometry()
    assert face_of(geometry, "front").coating == reflecting(0.6, 0.4)
    assert face_of(geometry, "back").coating == UNCOATED


def test_where_its_beam_goes_on_must_be_said(make):
    splitter = make("kind: splitter, diameter: 20, reflectance: 50 %")
    assert splitter.DEFAULT_BRANCH is None
    assert set(splitter.branches()) == {"reflected", "transmitted"}


def test_a_bare_pick_off_is_a_splitter(make, face_of):
    geometry = make("kind: splitter, diameter: 20, reflectance: uncoated").geometry()
    assert face_of(geometry, "front").coating == UNCOATED


def test_it_needs_its_reflectance(complaints):
    assert complaints("kind: splitter, diameter: 20") == [
        (
            "'reflectance' is missing",
            "'reflectance' with 'uncoated', a reflectance, as '0.5 %' or '{s: 2 %, p: 1 %}', "
            "or a list by wavelength, as '[{from: 520, to: 545, is: 99.5 %}]'",
            "add 'reflectance: uncoated', with the value that is meant",
        )
    ]


def test_a_wedge_needs_its_direction(complaints):
    ((message, _, _),) = complaints("kind: splitter, diameter: 20, reflectance: 50 %, wedge: 1")
    assert message == "a wedge without its direction"
