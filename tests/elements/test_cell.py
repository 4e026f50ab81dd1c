"""Cells."""

from math import atan, cos, radians, sin

import pytest

from benchlay.elements._kind import Glass, Inside


def test_defaults(make):
    cell = make("kind: cell, length: 200, bore: 20")
    w = cell.windows
    assert (w.incidence, w.glass, w.thickness_mm) == (0.0, Glass("fused-silica", None), 3.0)
    assert (w.set, w.diameter_mm, cell.fill, cell.clear) == ("mirrored", None, None, 0.9)


@pytest.mark.parametrize(("way", "lean"), [("mirrored", -1), ("parallel", 1)])
def test_windows_are_tilted_in_plan(make, face_of, way, lean):
    keys = (
        f"kind: cell, length: 200, bore: 20, windows: {{incidence: 10, thickness: 4, set: {way}}}"
    )
    geometry = make(keys).geometry()
    c, s = cos(radians(10)), sin(radians(10))
    assert face_of(geometry, "entry.front").normal == pytest.approx((c, -s, 0))
    assert face_of(geometry, "exit.back").normal == pytest.approx((-c, lean * s, 0))
    assert face_of(geometry, "entry.back").origin == pytest.approx((-4 * c, 4 * s, 0))
    assert face_of(geometry, "exit.front").origin == pytest.approx((4 * c - 200, -4 * lean * s, 0))


def test_glass_fill_and_glass(make, face_of):
    fill = "fill: water, windows: {glass: BK7}"
    geometry = make(f"kind: cell, length: 200, bore: 20, {fill}").geometry()
    names = [(v.glass.name, v.barrel) for v in geometry.volumes()]
    assert names == [("BK7", "rim"), ("water", "body"), ("BK7", "rim")]
    for name, inside, volumes in (
        ("entry.front", Inside.BEHIND, (0, 0)),
        ("entry.back", Inside.BOTH, (0, 1)),
        ("exit.front", Inside.BOTH, (2, 1)),
        ("exit.back", Inside.BEHIND, (2, 2)),
    ):
        face = face_of(geometry, name)
        assert (face.inside, face.volumes) == (inside, volumes)


def test_by_default_the_usable_part_of_a_window_covers_the_bore(make, face_of):
    geometry = make("kind: cell, length: 200, bore: 18, windows: {incidence: 30}").geometry()
    across = 9 / cos(radians(30))
    assert face_of(geometry, "entry.front").clear.radii == pytest.approx((across, across))
    assert face_of(geometry, "entry.back").clear.radii == pytest.approx((across, 9.0))


def test_brewster_asks_for_the_index(make):
    record = make("kind: cell, length: 200, bore: 18, windows: {incidence: brewster}")

    class Around:
        def relative_index(self, glass):
            return {"fused-silica": 1.457}[glass.name]

    normal = record.geometry_on(Around()).faces[0].normal
    assert normal == pytest.approx((cos(atan(1.457)), -sin(atan(1.457)), 0))
    assert record.needs_line()


@pytest.mark.parametrize(
    ("keys", "said"),
    [
        (
            "length: 100, bore: 20, windows: {diameter: 20, incidence: 30}",
            "windows of 20 mm do not cover a bore of 20 mm",
        ),
        ("length: 5, bore: 20", "the two windows would meet inside"),
        ("length: 30, bore: 20, windows: {incidence: 56}", "the two windows would meet inside"),
    ],
)
def test_says_what_does_not_fit(complaints, keys, said):
    assert [message for message, _, _ in complaints(f"kind: cell, {keys}")] == [said]
