"""Crystals that turn light of one wavelength into another."""

import pytest

from benchlay.elements._kind import Made
from benchlay.elements._polarization import Polarization
from benchlay.scene.conversions import makers

KEYS = "kind: converter, diameter: 8, length: 12"


def test_what_it_makes(make):
    record = make(f"{KEYS}, produces: [{{wavelength: 532, share: 35 %, polarization: horizontal}}]")
    made = Made(532.0, 0.35, Polarization("angle", 0.0))
    assert record.makes() == (made,)
    assert record.geometry().bulk.makes == (made,)
    assert [face.origin[0] for face in record.geometry().faces] == [0.0, -12.0]


@pytest.mark.parametrize(
    ("products", "said"),
    [
        (
            "{wavelength: 532, share: 60 %}, {wavelength: 355, share: 50 %}",
            "the shares add up to 1.1",
        ),
        (
            "{wavelength: 532, share: 20 %}, {wavelength: 532, share: 5 %}",
            "one wavelength is produced twice",
        ),
    ],
)
def test_says_what_cannot_be(complaints, products, said):
    assert [message for message, _, _ in complaints(f"{KEYS}, produces: [{products}]")] == [said]


@pytest.mark.parametrize(
    ("product", "lines", "which"),
    [
        (532.0, {633.0, 1064.0}, {1064.0}),
        (355.0, {633.0, 1064.0, 532.0}, {1064.0}),
        (1550.0, {1064.0}, {1064.0}),
        (532.0, set(), set()),
    ],
)
def test_which_light_makes_it(product, lines, which):
    assert makers(product, frozenset(lines)) == which
