"""The probe of 12 mm diameter and 80 mm length."""

import pytest
from boxes import PANELS, box, context_of, opening

from benchlay.checks import probe_access


def reaches(text):
    return list(probe_access.check(context_of(text), 0))


def slot(width, depth=0, y=730):
    """A slot in the north panel, upright, before the middle of a beam that runs along y."""
    hole = f"{{along: 500, width: {width}, from_height: 20, to_height: 180, depth: {depth}}}"
    return box(north=opening("north", hole), at=(300, y))


@pytest.mark.parametrize(("width", "fires"), [(11, False), (11.999, False), (12, True), (13, True)])
def test_the_width_of_a_slot(width, fires):
    assert bool(reaches(slot(width))) == fires


# Straight in, from the outer mouth: the beam's axis is 800 - y inside and the sheet 2 thick.
@pytest.mark.parametrize(("y", "fires"), [(722.001, True), (721.999, False), (700, False)])
def test_a_beam_farther_than_the_probe_is_long_passes(y, fires):
    assert bool(reaches(slot(13, y=y))) == fires


# 50 inside: with a duct of 30 the probe is just long enough.
@pytest.mark.parametrize(("depth", "fires"), [(29.99, True), (30, True), (30.01, False)])
def test_the_depth_of_the_opening_counts(depth, fires):
    assert bool(reaches(slot(13, depth, 750))) == fires


def test_the_value_is_the_length_that_is_needed():
    (finding,) = reaches(slot(13, 25, 750))
    assert (finding.value, finding.limit, finding.unit) == (pytest.approx(75.0), 80.0, "mm")


def test_a_round_opening():
    for diameter, fires in ((11.9, False), (12.1, True)):
        hole = opening("north", f"{{along: 500, height: 100, diameter: {diameter}}}")
        assert bool(reaches(box(north=hole, at=(300, 750)))) == fires


@pytest.mark.parametrize(("aside", "fires"), [(500, True), (440, False)])
def test_a_beam_that_ends_beside_the_slot(aside, fires):
    """The beam ends on a target short of the slot (490 to 503), 30 inside."""
    target = f"  T1: {{kind: target, after: red, distance: {aside - 300}}}\n"
    hole = "{along: 497, width: 13, from_height: 90, to_height: 110, depth: 40}"
    text = box(north=opening("north", hole), at=(300, 770), elements=target)
    assert bool(reaches(text)) == fires


@pytest.mark.parametrize(("height", "fires"), [(11, False), (13, True)])
def test_a_gap_under_a_panel(height, fires):
    under = f"{PANELS['north'][:-1]}, from_height: {height}}}"
    text = box(north=under, at=(300, 760)).replace("at: [300, 760]", "at: [300, 760, 20]")
    assert bool(reaches(text)) == fires


def test_light_within_the_limit_is_let_be():
    assert not reaches(slot(13).replace("50 mW", "0.3 mW"))


def test_a_tube_keeps_the_probe_out():
    tube = (
        "  B1: {kind: tube, at: [300, 730], to: [690, 730], bore: 20}\n"
        "  T1: {kind: target, after: B1, distance: 0.5}\n"
    )
    hole = "{along: 500, width: 13, from_height: 20, to_height: 180}"
    text = box(
        north=opening("north", hole),
        at=(300, 730),
        elements=tube,
        routes="routes: {main: [red, B1, T1]}\n",
    )
    assert reaches(text) == []
