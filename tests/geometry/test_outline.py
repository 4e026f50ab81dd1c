"""Outlines of faces and openings."""

from benchlay.geometry.outline import circle, rectangle
from benchlay.geometry.polygon import signed_area


def test_a_circle_has_radii_and_no_corners():
    outline = circle(12.7)
    assert outline.round
    assert outline.corners == ()
    assert outline.radii == (12.7, 12.7)
    assert outline.centre == (0.0, 0.0)


def test_a_rectangle_goes_round_anticlockwise():
    outline = rectangle(20.0, 30.0)
    assert not outline.round
    assert outline.corners == ((-10.0, -15.0), (10.0, -15.0), (10.0, 15.0), (-10.0, 15.0))
    assert signed_area(outline.corners) == 600.0
    assert outline.radii == (10.0, 15.0)


def test_a_rectangle_may_have_its_middle_elsewhere():
    outline = rectangle(2.0, 4.0, (5.0, -1.0))
    assert outline.corners == ((4.0, -3.0), (6.0, -3.0), (6.0, 1.0), (4.0, 1.0))
    assert outline.radii == (1.0, 2.0)


def test_scaling_keeps_the_middle():
    outline = rectangle(2.0, 4.0, (5.0, -1.0)).scaled(0.5)
    assert outline == rectangle(1.0, 2.0, (5.0, -1.0))
    assert circle(10.0).scaled(0.9) == circle(9.0)


def test_stretching_takes_left_and_up_apart():
    outline = rectangle(2.0, 4.0, (5.0, -1.0)).stretched((3.0, 0.5))
    assert outline == rectangle(6.0, 2.0, (5.0, -1.0))
    ellipse = circle(10.0).stretched((2.0, 1.0))
    assert ellipse.round
    assert ellipse.radii == (20.0, 10.0)
