"""Sizes, wedges and plates, by the plainest kind that has them."""

from math import radians, tan

import numpy as np
import pytest

from benchlay.elements._coating import UNCOATED
from benchlay.elements._kind import Acts, Inside
from benchlay.elements._sized import PlateShape, opaque_front, opening_front
from benchlay.geometry.outline import circle, rectangle
from tests.geometry.solid_checks import planes, rim_of

WEDGE = radians(2.0)
# Light that arrives at the front looks along -x, with z up: left is z × (-x) = -y.
SEEN = {"left": (0, -1, 0), "right": (0, 1, 0), "up": (0, 0, 1), "down": (0, 0, -1)}


def test_a_diameter_makes_it_round(make):
    window = make("kind: window, diameter: 1 in")
    assert window.outline() == circle(12.7)
    assert window.is_round()


def test_a_size_makes_it_rectangular(make):
    window = make("kind: window, size: [20, 30]")
    assert window.outline() == rectangle(20.0, 30.0)
    assert not window.is_round()


def test_one_size_is_needed(complaints):
    assert complaints("kind: window") == [
        (
            "no size is given",
            "either 'diameter' or 'size: [width, height]'",
            "add 'diameter: 25.4' or 'size: [25, 36]', with the size that is meant",
        )
    ]


def test_two_sizes_are_one_too_many(complaints):
    assert complaints("kind: window, diameter: 20, size: [20, 20]") == [
        (
            "both a diameter and a size are given",
            "either 'diameter' or 'size: [width, height]'",
            "remove 'diameter' or 'size'",
        )
    ]


def test_every_base_speaks_at_once(complaints):
    messages = [message for message, _, _ in complaints("kind: filter, wedge: 1")]
    assert sorted(messages) == [
        "a wedge without its direction",
        "neither a density nor bands are given",
        "no size is given",
    ]


def test_nine_tenths_are_clear_unless_said_otherwise(make):
    front = make("kind: window, diameter: 20").geometry().faces[0]
    assert (front.outline, front.clear) == (circle(10.0), circle(9.0))
    front = make("kind: window, size: [20, 30], clear: 80 %").geometry().faces[0]
    assert front.clear == rectangle(16.0, 24.0)


def test_a_wedge_needs_its_direction(complaints):
    assert complaints("kind: window, diameter: 20, wedge: 1") == [
        (
            "a wedge without its direction",
            "'wedge_towards' with 'left', 'right', 'up' or 'down': where the thick edge is, "
            "as seen by light that arrives at the front",
            "add 'wedge_towards: right', with the side that is meant",
        )
    ]


def test_beyond_twenty_degrees_it_is_no_wedge(complaints, make):
    make("kind: window, diameter: 20, wedge: 20, wedge_towards: up")
    assert complaints("kind: window, diameter: 20, wedge: 20.1, wedge_towards: up") == [
        (
            "wedge: '20.1' is too large",
            "an angle of at least 0 deg and of at most 20 deg, in deg or with its unit "
            "(deg ° arcmin arcsec mrad rad urad)",
            "write a value within the bounds, such as '1'",
        )
    ]


def test_the_back_may_not_come_through_the_front(complaints, make):
    keys = "kind: window, size: [20, 50], wedge: 10"
    make(f"{keys}, thickness: 1.8, wedge_towards: left")  # 10 mm × tan 10° = 1.763 mm
    assert complaints(f"{keys}, thickness: 1.7, wedge_towards: left") == [
        (
            "at the thin edge its thickness would be -0.0633 mm",
            "a thickness above 1.763 mm at the centre for this wedge",
            "set 'thickness' to 1.9 or more",
        )
    ]
    make(f"{keys}, thickness: 1.9, wedge_towards: right")
    ((message, _, remedy),) = complaints(f"{keys}, thickness: 1.8, wedge_towards: down")
    assert message == "at the thin edge its thickness would be -2.61 mm"  # 25 mm × tan 10° = 4.408
    assert remedy == "set 'thickness' to 4.6 or more"
    make(f"{keys}, thickness: 4.6, wedge_towards: down")


@pytest.mark.parametrize("towards", SEEN)
@pytest.mark.parametrize("size", ["diameter: 20", "size: [20, 20]"])
def test_the_thick_edge_is_where_it_is_seen(make, face_of, towards, size):
    keys = f"kind: window, {size}, thickness: 5, wedge: 2, wedge_towards: {towards}"
    geometry = make(keys).geometry()
    front, back = face_of(geometry, "front"), face_of(geometry, "back")
    assert (front.origin, front.normal) == ((0.0, 0.0, 0.0), (1.0, 0.0, 0.0))
    assert back.origin == (-5.0, 0.0, 0.0)
    assert np.array(back.normal) @ (1.0, 0.0, 0.0) == pytest.approx(-np.cos(WEDGE))
    for way, side in SEEN.items():
        expected = {towards: 1.0, _opposite(towards): -1.0}.get(way, 0.0) * 10.0 * tan(WEDGE)
        assert _thickness(back, 10.0 * np.array(side)) == pytest.approx(5.0 + expected)


@pytest.mark.parametrize("towards", SEEN)
@pytest.mark.parametrize("size", ["diameter: 20", "size: [20, 24]"])
def test_the_edge_ends_where_the_inclined_back_is(make, face_of, towards, size):
    keys = f"kind: window, {size}, thickness: 9, wedge: 15, wedge_towards: {towards}"
    geometry = make(keys).geometry()
    back = face_of(geometry, "back")
    (edge,) = geometry.solids
    assert any(np.allclose(normal, back.normal) for normal, _ in planes(edge))
    width, height = back.outline.radii
    stretch = 1.0 / np.cos(radians(15.0))
    wide = towards in ("left", "right")
    front = face_of(geometry, "front").outline.radii
    assert width == pytest.approx(front[0] * (stretch if wide else 1.0))
    assert height == pytest.approx(front[1] * (1.0 if wide else stretch))
    assert back.clear.radii == pytest.approx((0.9 * width, 0.9 * height))


def test_a_round_edge_meets_the_rim_of_its_back(make, face_of):
    geometry = make(
        "kind: window, diameter: 20, thickness: 9, wedge: 15, wedge_towards: left"
    ).geometry()
    back = face_of(geometry, "back")
    (edge,) = geometry.solids
    reach = [np.linalg.norm(p - back.origin) for p in rim_of(edge, edge.discs[1])]
    assert max(reach) == pytest.approx(max(back.outline.radii))
    assert min(reach) == pytest.approx(min(back.outline.radii))


def test_the_section_is_true_to_scale(make):
    keys = "kind: window, size: [20, 30], thickness: 5, wedge: 2, wedge_towards: left"
    (outline,) = make(keys).geometry().strokes
    tilt = 10.0 * tan(WEDGE)
    assert outline.closed
    assert np.array(outline.points) == pytest.approx(
        np.array([(0, -10), (0, 10), (-5 + tilt, 10), (-5 - tilt, -10)])
    )


def test_the_coated_side_is_marked(make):
    keys = "kind: window, diameter: 20, thickness: 5"
    assert len(make(keys).geometry().strokes) == 1
    front = make(f"{keys}, front: 1 %, back: 1 %").geometry().strokes[1]
    assert (front.points, front.closed, front.role) == (
        ((0.0, -10.0), (0.0, 10.0)),
        False,
        "coated",
    )
    back = make(f"{keys}, back: 1 %").geometry().strokes[1]
    assert back.points == ((-5.0, 10.0), (-5.0, -10.0))


def test_thickness_nought_keeps_two_faces_in_one_place(make, face_of):
    geometry = make("kind: window, diameter: 20, thickness: 0").geometry()
    assert face_of(geometry, "front").origin == (0.0, 0.0, 0.0)
    assert np.abs(face_of(geometry, "back").origin).max() == 0.0
    assert face_of(geometry, "back").normal[0] == -1.0
    assert geometry.solids == ()
    (line,) = geometry.strokes
    assert (line.points, line.closed) == (((0.0, -10.0), (0.0, 10.0)), False)


def test_plate_faces_refract_into_the_glass_behind_them():
    shape = PlateShape(circle(10.0), circle(9.0), 4.0)
    front, back = shape.faces(UNCOATED, UNCOATED)
    assert {front.acts, back.acts} == {Acts.INTERFACE}
    assert {front.inside, back.inside} == {Inside.BEHIND}
    assert {front.beside, back.beside} == {"rim"}
    assert shape.extent() == (-4.0, 0.0, 10.0, 10.0)


def test_opaque_and_open_fronts_have_nothing_inside():
    wall = opaque_front(circle(10.0), "dump", specular=0.1, material="felt")
    assert (wall.name, wall.acts, wall.inside) == ("front", Acts.OPAQUE, Inside.NOWHERE)
    assert (wall.sink, wall.specular, wall.material) == ("dump", 0.1, "felt")
    assert wall.clear == wall.outline
    gap = opening_front(circle(10.0), circle(2.0), "rim")
    assert (gap.acts, gap.inside, gap.beside) == (Acts.PASSES, Inside.NOWHERE, "rim")
    assert (gap.outline, gap.clear) == (circle(10.0), circle(2.0))


def _opposite(side):
    return {"left": "right", "right": "left", "up": "down", "down": "up"}[side]


def _thickness(back, at):
    """Return how far behind the front the back's plane lies, at a point of the front."""
    normal = np.array(back.normal)
    x = (normal @ back.origin - normal[1] * at[1] - normal[2] * at[2]) / normal[0]
    return -x
