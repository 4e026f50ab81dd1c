"""Targets."""

import pytest

from benchlay.elements._kind import Acts
from benchlay.geometry.outline import rectangle


def test_defaults(make):
    made = make("kind: target")
    assert (made.size_mm, made.diffuse, made.specular) == ((40.0, 40.0), 0.9, 0.0)
    assert made.SQUARE
    assert not made.MOUNTED
    assert made.DARK_MATTERS


def test_its_face_ends_light_but_for_the_specular_share(make):
    geometry = make("kind: target, size: [30, 20], diffuse: 50 %, specular: 5 %").geometry()
    (front,) = geometry.faces
    assert (front.acts, front.sink, front.specular) == (Acts.OPAQUE, "target", 0.05)
    assert front.outline == rectangle(30.0, 20.0)
    assert geometry.extent == (-5.0, 0.0, 15.0, 10.0)
    assert geometry.post_at == (-2.5, 0.0)


@pytest.mark.parametrize(
    ("keys", "total", "room"),
    [("specular: 20 %", "1.1", "0.8"), ("diffuse: 0.95, specular: 6 %", "1.01", "0.94")],
)
def test_a_face_may_not_give_more_than_it_gets(complaints, keys, total, room):
    assert complaints(f"kind: target, {keys}") == [
        (
            f"'specular' and 'diffuse' add up to {total}",
            "at most 1 together",
            f"set 'diffuse' to {room} or less",
        )
    ]


def test_exactly_all_may_be_given(make):
    make("kind: target, diffuse: 94 %, specular: 6 %")
