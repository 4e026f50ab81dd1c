"""Apertures."""

import pytest

from benchlay.elements._kind import Acts, Inside
from benchlay.geometry.outline import circle, rectangle
from tests.geometry.solid_checks import volume


def test_defaults(make):
    made = make("kind: aperture, opening: 3")
    assert (made.size_mm, made.thickness_mm) == ((50.0, 50.0), 2.0)
    assert made.DEFAULT_BRANCH == "transmitted"


def test_light_passes_the_opening_and_lands_beside_it(make):
    geometry = make("kind: aperture, opening: 3, size: [40, 30], thickness: 1.5").geometry()
    (front,) = geometry.faces
    assert (front.origin, front.normal) == ((0.0, 0.0, 0.0), (1.0, 0.0, 0.0))
    assert (front.acts, front.inside) == (Acts.PASSES, Inside.NOWHERE)
    assert (front.outline, front.clear) == (rectangle(40.0, 30.0), circle(1.5))
    assert front.beside == "rim"
    (plate,) = geometry.solids
    assert plate.part == "plate"
    assert volume(plate) == pytest.approx(40.0 * 30.0 * 1.5)
    assert geometry.extent == (-1.5, 0.0, 20.0, 15.0)


@pytest.mark.parametrize(
    ("keys", "problem"),
    [
        (
            "size: [40, 30]",
            (
                "'opening' is missing",
                "'opening' with a diameter, a length above 0 mm, in mm or with its unit "
                "(nm um mm m cm in ft); or '[width, height]'",
                "add 'opening: 5', with the value that is meant",
            ),
        ),
        (
            "opening: 50",
            (
                "the opening is 50 mm in width, its plate 50 mm",
                "an opening smaller than its plate",
                "write a larger 'size', or an 'opening' below 50",
            ),
        ),
        (
            "opening: [20, 31], size: [40, 30]",
            (
                "the opening is 31 mm in height, its plate 30 mm",
                "an opening smaller than its plate",
                "write a larger 'size', or an 'opening' below 30",
            ),
        ),
    ],
)
def test_says_what_is_wrong(complaints, keys, problem):
    assert complaints(f"kind: aperture, {keys}") == [problem]


def test_an_opening_just_smaller_than_its_plate_is_one(make):
    make("kind: aperture, opening: 49.99")
