"""Thin lenses."""

from math import hypot

import numpy as np
import pytest

from benchlay.elements._coating import UNCOATED, reflecting
from benchlay.elements._kind import Acts, Glass

FOCAL = "'focal' with a length other than 0; negative for a diverging lens"


def test_defaults(make):
    made = make("kind: lens, diameter: 25.4, focal: 200")
    assert (made.thickness_mm, made.acts, made.glass) == (4.0, "both", Glass("BK7", None))
    assert (made.front, made.back) == (UNCOATED, UNCOATED)
    assert not made.TURNS_FRONT


def test_it_has_two_bending_faces_in_one_place_and_no_body(make, face_of):
    geometry = make("kind: lens, diameter: 20, focal: -50, front: 1 %").geometry()
    for name, normal in (("front", (1.0, 0.0, 0.0)), ("back", (-1.0, 0.0, 0.0))):
        face = face_of(geometry, name)
        assert np.abs(face.origin).max() == 0.0
        assert face.normal == normal
        assert face.acts is Acts.LENS
        assert face.focal_mm == -50.0
        assert face.clear.radii == (9.0, 9.0)
    assert face_of(geometry, "front").coating == reflecting(0.01, 0.01)
    assert geometry.solids == ()
    assert geometry.extent == (-4.0, 0.0, 10.0, 10.0)


def section(make, keys):
    (stroke,) = make(f"kind: lens, {keys}").geometry().strokes
    assert stroke.closed
    points = np.array(stroke.points)
    front, back = points[: len(points) // 2], points[len(points) // 2 :]
    assert back[::-1] == pytest.approx(front * (-1.0, 1.0))
    return front


@pytest.mark.parametrize(("focal", "sign"), [(100.0, 1.0), (-100.0, -1.0)])
def test_it_is_drawn_with_its_thickness_in_the_middle(make, focal, sign):
    front = section(make, f"diameter: 20, focal: {focal}")
    middle, edge = front[len(front) // 2], front[0]
    assert middle == pytest.approx((2.0, 0.0))
    sag = 100.0 - (100.0**2 - 10.0**2) ** 0.5  # of index 1.5, both radii are the focal length
    assert edge == pytest.approx((2.0 - sign * sag, -10.0))
    for x, y in front:
        assert hypot(x - (2.0 - sign * 100.0), y) == pytest.approx(100.0)


def test_a_strong_lens_keeps_an_edge(make):
    front = section(make, "diameter: 20, focal: 12")
    assert front[0][0] == pytest.approx(0.4)
    assert front[len(front) // 2][0] > 2.0


def test_the_strongest_is_drawn_all_the_same(make):
    front = section(make, "diameter: 20, focal: 5")
    assert np.isfinite(front).all()
    assert (front[:, 0] > 0.0).all()


@pytest.mark.parametrize(
    ("keys", "problem"),
    [
        (
            "glass: BK7",
            ("'focal' is missing", FOCAL, "add 'focal: 200', with the length that is meant"),
        ),
        (
            "focal: 0",
            (
                "a focal length of 0 mm",
                "a length other than 0; negative for a diverging lens",
                "write the focal length, such as 'focal: 200'",
            ),
        ),
        (
            "focal: -4.99",
            (
                "no lens this wide has a focal length of -4.99 mm",
                "at least 5 mm, a quarter of its width",
                "check the unit: a bare number is in mm",
            ),
        ),
        (
            "focal: 100, acts: across",
            ("acts: not yet: cylindrical lenses", "a layout without 'acts' here", "remove 'acts'"),
        ),
        (
            "radii: [51.5 CX, flat]",
            (
                "radii: not yet: lenses given by radii",
                "a layout without 'radii' here",
                "remove 'radii'",
            ),
        ),
    ],
)
def test_says_what_is_wrong(complaints, keys, problem):
    assert complaints(f"kind: lens, diameter: 20, {keys}") == [problem]
