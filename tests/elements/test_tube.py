"""Beam tubes."""

import pytest

from benchlay.elements._kind import Inside


def test_its_ends_are_openings_of_its_bore(make, face_of):
    geometry = make("kind: tube, bore: 20, to: [300, 0]", stand="at: [0, 0]").geometry()
    for name, way in (("front", 1.0), ("back", -1.0)):
        face = face_of(geometry, name)
        assert (face.normal, face.inside, face.beside) == ((way, 0.0, 0.0), Inside.BEHIND, "body")
        assert (face.outline.radii, face.clear.radii) == ((12.0, 12.0), (10.0, 10.0))
    assert [(v.glass, v.barrel) for v in geometry.volumes()] == [(None, "body")]


def test_it_is_as_long_as_it_is_to_its_end(make):
    record = make("kind: tube, bore: 20, to: M1", stand="at: [0, 0]")

    class Around:
        def distance_mm(self, goal):
            return {"M1": 345.0}[goal]

    geometry = record.geometry_on(Around())
    assert geometry.faces[1].origin == (-345.0, 0.0, 0.0)
    assert geometry.extent == (-345.0, 0.0, 12.0, 12.0)
    assert record.leads_to() == "M1"


def test_needs_its_end(complaints):
    messages = [m for m, _, _ in complaints("kind: tube, bore: 20", stand="at: [0, 0]")]
    assert messages == ["'to' is missing"]


def test_stops_strays_and_may_stay_dark(make):
    record = make("kind: tube, bore: 5, to: [1, 2]", stand="at: [0, 0]")
    assert record.BLOCKS
    assert not record.DARK_MATTERS
    assert record.geometry().extent[2] == pytest.approx(4.5)
