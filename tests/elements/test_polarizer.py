"""Absorbing sheet polarizers."""

from math import radians

import pytest

from benchlay.elements._coating import UNCOATED
from benchlay.elements._kind import Glass


def test_defaults(make):
    made = make("kind: polarizer, diameter: 20, axis: 0")
    assert (made.transmits, made.extinction, made.thickness_mm) == (0.9, 1e-4, 0.0)
    assert (made.front, made.back, made.glass) == (UNCOATED, UNCOATED, Glass(None, 1.5))


def test_extinction_is_relative_to_what_passes(make):
    bulk = (
        make("kind: polarizer, diameter: 20, axis: 90, transmits: 80 %, extinction: 1e-3")
        .geometry()
        .bulk
    )
    assert bulk.kind == "polarizer"
    assert bulk.axis_rad == radians(90.0)
    assert bulk.passes == 0.8
    assert bulk.refused == pytest.approx(8e-4)


def test_a_sheet_has_a_thickness_where_one_is_written(make, face_of):
    geometry = make("kind: polarizer, diameter: 20, axis: 0, thickness: 2").geometry()
    assert face_of(geometry, "back").origin == (-2.0, 0.0, 0.0)
    assert len(geometry.solids) == 1


def test_it_needs_its_axis(complaints):
    assert complaints("kind: polarizer, diameter: 20") == [
        (
            "'axis' is missing",
            "'axis' with an angle in deg or with its unit (deg ° arcmin arcsec mrad rad urad)",
            "add 'axis: 30', with the value that is meant",
        )
    ]


def test_shares_have_no_more_than_all(complaints):
    ((message, _, _),) = complaints("kind: polarizer, diameter: 20, axis: 0, transmits: 101 %")
    assert message == "transmits: '101 %' is too large"
