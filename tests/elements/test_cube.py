"""Beam-splitter cubes."""

import numpy as np
import pytest

from benchlay.elements._coating import UNCOATED, reflecting
from benchlay.elements._kind import Glass, Inside
from tests.geometry.solid_checks import volume

NORMALS = {"front": (1, 0, 0), "back": (-1, 0, 0), "left": (0, 1, 0), "right": (0, -1, 0)}


def test_defaults(make):
    cube = make("kind: cube, reflectance: 50 %")
    assert (cube.side_mm, cube.sends, cube.faces) == (25.4, "left", UNCOATED)
    assert cube.glass == Glass("BK7", None)
    assert not cube.TURNS_FRONT
    assert cube.DEFAULT_BRANCH is None


def test_its_middle_is_the_reference_point(make, face_of):
    geometry = make("kind: cube, reflectance: 50 %, side: 20, faces: 0.5 %").geometry()
    for name, normal in NORMALS.items():
        face = face_of(geometry, name)
        assert face.normal == normal
        assert face.origin == tuple(10.0 * x for x in normal)
        assert face.outline.radii == (10.0, 10.0)
        assert face.clear.radii == (9.0, 9.0)
        assert face.coating == reflecting(0.005, 0.005)
    (block,) = geometry.solids
    assert volume(block) == pytest.approx(8000.0)
    assert geometry.extent == (-10.0, 10.0, 10.0, 10.0)


@pytest.mark.parametrize("sends", ["left", "right"])
def test_the_diagonal_reaches_from_edge_to_edge_inside_the_glass(make, face_of, sends):
    cube = make(f"kind: cube, reflectance: {{s: 99 %, p: 1 %}}, side: 20, sends: {sends}")
    diagonal = face_of(cube.geometry(), "diagonal")
    assert diagonal.inside is Inside.BOTH
    assert diagonal.coating == reflecting(0.99, 0.01)
    assert diagonal.outline.radii == pytest.approx((10.0 * 2**0.5, 10.0))
    assert np.linalg.norm(diagonal.normal) == pytest.approx(1.0)


@pytest.mark.parametrize("sends", ["left", "right"])
@pytest.mark.parametrize("entry", NORMALS)
def test_reflected_ways_follow_the_diagonal(make, face_of, sends, entry):
    cube = make(f"kind: cube, reflectance: 50 %, sends: {sends}")
    (way,) = (w for w in cube.branches()["reflected"] if w[0][0] == entry)
    assert [event for _, event in way] == ["transmitted", "reflected", "transmitted"]
    geometry = cube.geometry()
    arriving = -np.array(NORMALS[entry])
    normal = np.array(face_of(geometry, "diagonal").normal)
    leaving = arriving - 2.0 * (arriving @ normal) * normal
    assert leaving.tolist() == pytest.approx(NORMALS[way[2][0]], abs=1e-12)


@pytest.mark.parametrize(("sends", "leaves"), [("left", (0, -1, 0)), ("right", (0, 1, 0))])
def test_it_sends_the_way_that_arriving_light_sees(make, face_of, sends, leaves):
    """Light into the front looks along -x with z up: its left is z × (-x) = -y."""
    cube = make(f"kind: cube, reflectance: 50 %, sends: {sends}")
    (way,) = (w for w in cube.branches()["reflected"] if w[0][0] == "front")
    assert face_of(cube.geometry(), way[2][0]).normal == leaves


@pytest.mark.parametrize("entry", NORMALS)
def test_transmitted_ways_go_straight_on(make, entry):
    ways = make("kind: cube, reflectance: 50 %").branches()["transmitted"]
    (way,) = (w for w in ways if w[0][0] == entry)
    assert NORMALS[way[2][0]] == tuple(-x for x in NORMALS[entry])


@pytest.mark.parametrize("sends", ["left", "right"])
def test_the_drawn_diagonal_is_the_traced_one(make, face_of, sends):
    geometry = make(f"kind: cube, reflectance: 50 %, side: 20, sends: {sends}").geometry()
    square, cut = geometry.strokes
    assert set(square.points) == {(10.0, 10.0), (10.0, -10.0), (-10.0, 10.0), (-10.0, -10.0)}
    assert square.closed
    assert not cut.closed
    along = np.subtract(cut.points[1], cut.points[0])
    assert along @ face_of(geometry, "diagonal").normal[:2] == pytest.approx(0.0)
    assert np.linalg.norm(along) == pytest.approx(20.0 * 2**0.5)


def test_sends_is_left_or_right(complaints):
    assert complaints("kind: cube, reflectance: 50 %, sends: up") == [
        (
            "sends: 'up' is not known here",
            "one of 'left' or 'right'",
            "write one of 'left' or 'right'",
        )
    ]


@pytest.mark.parametrize("way", ["turn: left 90", "aim: [10, 10]"])
def test_it_is_not_turned_by_its_front(complaints, way):
    ((message, expected, _),) = complaints(
        "kind: cube, reflectance: 50 %", f"after: L1, distance: 9, {way}"
    )
    assert (
        message
        == f"'{way.partition(':')[0]}' is for fronts that reflect the beam on; a cube does not"
    )
    assert expected == "'incidence', 'facing', or 'sends' where the kind has it"


def test_its_length_may_be_given_as_edge(make):
    cube = make("kind: cube, reflectance: 50 %, edge: 12.7")
    assert cube.length_mm() == 12.7
    assert cube.geometry().extent == (-6.35, 6.35, 6.35, 6.35)


def test_two_lengths_are_refused(complaints):
    assert complaints("kind: cube, reflectance: 50 %, side: 20, edge: 12.7") == [
        (
            "the length of the cube's edges is given twice",
            "a number as 'side' or as 'edge'",
            "remove one of them",
        )
    ]
