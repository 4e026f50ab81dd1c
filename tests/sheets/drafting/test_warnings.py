"""What a plan says in large letters, against the layouts' own hazards."""

from types import SimpleNamespace

from benchlay.hazards.model import Sign
from benchlay.sheets.drafting.warnings import sign_rows, warning_lines


def row(where, wavelength_nm, density):
    return SimpleNamespace(where=where, wavelength_nm=wavelength_nm, optical_density=density)


def hazards(name, statement, *rows):
    reached = SimpleNamespace(class_as_modelled=name, statement=statement)
    return SimpleNamespace(accessible=reached, eyewear=rows)


def test_densities_are_rounded_up_side_by_side():
    rows = (row("inside", 532.0, 2.31), row("inside", 1064.0, 5.0), row("outside", 532.0, 0.0))
    lines = warning_lines(hazards("4", "above the limit of class 3B as modelled", *rows), ",")
    assert lines == (
        "LASER LIGHT IN REACH: above the limit of class 3B as modelled",
        "Eyewear inside: 532 nm OD 2,4 or more, 1064 nm OD 5 or more",
        "Eyewear outside: none asked for by the model",
    )


def test_what_is_not_known_is_not_left_out():
    lines = warning_lines(hazards(None, "", row("inside", 10.6, None)), ".")
    assert "NO CLASS COULD BE MODELLED" in lines[0]
    assert lines[1] == "Eyewear inside: 10.6 nm OD not known"


def test_signs_are_listed_with_size_and_place():
    sign = Sign(
        "LB1", "panel", "on panel west", "4", ("laser light when open",), 50.0, (148.0, 74.0)
    )
    assert sign_rows([sign]) == (("LB1", "148×74", "laser light when open: on panel west"),)
