"""Thin-film plate polarizers."""

import pytest

from benchlay.elements._coating import UNCOATED
from benchlay.elements._kind import Glass


def test_defaults(make):
    made = make("kind: plate-polarizer, size: [30, 50]")
    assert (made.extinction, made.reflects, made.thickness_mm) == (1e-3, 0.99, 3.0)
    assert (made.back, made.glass) == (UNCOATED, Glass("fused-silica", None))
    assert made.DEFAULT_BRANCH is None
    assert made.TURNS_FRONT


def test_the_film_reflects_s_and_passes_p(make, face_of):
    geometry = make(
        "kind: plate-polarizer, diameter: 20, reflects: 98 %, extinction: 0.5 %"
    ).geometry()
    film = face_of(geometry, "front").coating
    band = film.at(532.0)
    assert (band.s, band.p) == (0.98, 0.0)
    assert 1.0 - band.s - film.absorbs[0] == pytest.approx(0.005)  # the extinction passes
    assert film.absorbs[1] == 0.0
    assert face_of(geometry, "back").coating == UNCOATED


@pytest.mark.parametrize("extinction", [0.01, 0.43, 0.05])
def test_a_film_without_loss_gives_no_light(make, face_of, extinction):
    reflects = round(1.0 - extinction, 2)
    geometry = make(
        f"kind: plate-polarizer, diameter: 20, reflects: {reflects}, extinction: {extinction}"
    ).geometry()
    assert face_of(geometry, "front").coating.absorbs[0] >= 0.0


def test_a_film_may_not_give_more_than_it_gets(complaints):
    assert complaints("kind: plate-polarizer, diameter: 20, extinction: 2 %") == [
        (
            "'reflects' and 'extinction' add up to 1.01",
            "at most 1 together",
            "set 'extinction' to 0.01 or less",
        )
    ]
