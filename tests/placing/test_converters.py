"""Behind a crystal the line that is meant is named."""

import pytest

CRYSTAL = (
    "  X: {kind: converter, after: laser, distance: 100, incidence: 10, diameter: 20, length: 10,"
    " glass: SF10, produces: [{wavelength: 422, share: 10 %}]}\n"
)


def test_light_of_two_wavelengths_leaves_a_tilted_crystal_by_two_ways(complaints):
    (problem,) = complaints(CRYSTAL + "  T: {kind: target, after: X, distance: 100}\n")
    assert "wavelength: 422; wavelength: 633" in problem


@pytest.mark.parametrize(("nm", "bends"), [(633, False), (422, True)])
def test_the_one_that_is_meant_is_chosen(standing, nm, bends):
    after = f"after: X, wavelength: {nm}, distance: 100"
    placed = standing(CRYSTAL + f"  T: {{kind: target, {after}}}\n")
    _, direction = placed.ray("T")
    assert (abs(direction[1]) > 1e-3) == bends
    assert placed.placed.arrivals["T"].wavelength_nm == nm
