"""Filters."""

from math import inf

import pytest

from benchlay.elements._coating import Band, everywhere, reflecting
from benchlay.elements._kind import CLEAR, Bulk, Glass

BANDS = "bands: [{from: 600, to: 650, transmits: 80 %}, {from: 500, to: 560, transmits: 90 %}]"


def test_defaults(make):
    made = make("kind: filter, diameter: 20, density: 1")
    assert (made.thickness_mm, made.reflective, made.glass) == (2.0, False, Glass("BK7", None))


@pytest.mark.parametrize("density", ["2", "OD 2"])
def test_a_density_of_two_lets_a_hundredth_pass(make, density):
    made = make(f"kind: filter, diameter: 20, thickness: 3, density: {density}")
    assert made.density == 2.0
    assert made.geometry().bulk == Bulk("absorber", passes=0.01, thickness_mm=3.0)


def test_outside_its_bands_nothing_passes(make):
    bulk = make(f"kind: filter, diameter: 20, {BANDS}").geometry().bulk
    assert bulk == Bulk(
        "absorber",
        passes=0.0,
        thickness_mm=2.0,
        bands=((600.0, 650.0, 0.8), (500.0, 560.0, 0.9)),
    )


def test_an_absorbing_filter_keeps_its_own_front(make, face_of):
    geometry = make("kind: filter, diameter: 20, density: 1, front: 1 %").geometry()
    assert face_of(geometry, "front").coating == reflecting(0.01, 0.01)


def test_a_reflective_density_sends_the_refused_share_back(make, face_of):
    geometry = make("kind: filter, diameter: 20, density: 1, reflective: yes").geometry()
    assert face_of(geometry, "front").coating == everywhere(0.9, 0.9)
    assert geometry.bulk == CLEAR


def test_reflective_bands_send_back_what_they_refuse_and_all_between(make, face_of):
    geometry = make(f"kind: filter, diameter: 20, {BANDS}, reflective: yes").geometry()
    coating = face_of(geometry, "front").coating
    refused = {nm: coating.at(nm).s for nm in (499.9, 500.0, 560.0, 560.1, 599.9, 600.0, 650.0)}
    assert refused == pytest.approx(
        {499.9: 1.0, 500.0: 0.1, 560.0: 0.1, 560.1: 1.0, 599.9: 1.0, 600.0: 0.2, 650.0: 0.2}
    )
    assert coating.at(1e6) == Band(650.0, inf, 1.0, 1.0)
    assert coating.at(1.0).p == 1.0
    assert geometry.bulk == CLEAR


@pytest.mark.parametrize(
    ("keys", "problem"),
    [
        (
            "thickness: 2",
            (
                "neither a density nor bands are given",
                "either 'density: OD 1' or 'bands: [{from: 500, to: 560, transmits: 90 %}]'",
                "add 'density: OD 1', with the density that is meant",
            ),
        ),
        (
            f"density: 1, {BANDS}",
            (
                "both a density and bands are given",
                "either 'density: OD 1' or 'bands: [{from: 500, to: 560, transmits: 90 %}]'",
                "remove 'density' or 'bands'",
            ),
        ),
        (
            "density: 10 %",
            (
                "density: '10 %' is a share, not an optical density",
                "an optical density of at least 0, as '2' or 'OD 2'",
                "write 'OD 1', which lets 10 % of the light pass",
            ),
        ),
        (
            "density: 1, reflective: yes, front: 1 %",
            (
                "the front of a reflective filter follows from its density or bands",
                "no 'front' beside 'reflective: yes'",
                "remove 'front'",
            ),
        ),
        (
            "bands: []",
            (
                "bands: a list of 0 is not what is read here",
                "a list of at least 1, each item a table with the keys 'from', 'to' and "
                "'transmits'",
                "write it in that form, such as [{from: 532, to: 532, transmits: 50 %}]",
            ),
        ),
        (
            "bands: [{from: 500, to: 600, transmits: 1}, {from: 599, to: 700, transmits: 1}]",
            (
                "this band begins at 599 nm, inside the one from 500 nm to 600 nm",
                "bands that do not overlap",
                "begin it at 600, or end the other one at 599",
            ),
        ),
        (
            "bands: [{from: 600, to: 500, transmits: 1}]",
            (
                "bands[1]: the band runs backwards, from 600 nm to 500 nm",
                "'from' at or below 'to'",
                "write 'from: 500' and 'to: 600'",
            ),
        ),
    ],
)
def test_says_what_is_wrong(complaints, keys, problem):
    assert complaints(f"kind: filter, diameter: 20, {keys}") == [problem]


def test_a_wedge_needs_its_direction(complaints):
    ((message, _, _),) = complaints("kind: filter, diameter: 20, density: 1, wedge: 1")
    assert message == "a wedge without its direction"
