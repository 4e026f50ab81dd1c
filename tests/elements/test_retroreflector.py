"""Corner cubes."""

from benchlay.elements._kind import Acts, Inside


def test_its_front_sends_light_back(make, face_of):
    geometry = make("kind: retroreflector, diameter: 20, clear: 80 %").geometry()
    front = face_of(geometry, "front")
    assert (front.acts, front.inside, front.beside) == (Acts.RETURNS, Inside.NOWHERE, "rim")
    assert (front.outline.radii, front.clear.radii) == ((10.0, 10.0), (8.0, 8.0))


def test_it_has_the_default_mount_of_round_optics(make):
    record = make("kind: retroreflector, diameter: 20")
    assert record.is_round()
    assert record.geometry().extent == (-14.0, 0.0, 10.0, 10.0)


def test_it_cannot_be_turned_as_a_mirror(complaints):
    ((message, _, _),) = complaints(
        "kind: retroreflector, diameter: 20, turn: left 90", stand="after: M, distance: 5"
    )
    assert message == "'turn' is for fronts that reflect the beam on; a retroreflector does not"
