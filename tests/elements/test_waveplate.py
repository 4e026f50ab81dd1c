"""Waveplates."""

from math import radians

import pytest

from benchlay.elements._kind import Glass


def test_defaults(make):
    made = make("kind: waveplate, diameter: 20, retardance: half, axis: 22.5")
    assert (made.thickness_mm, made.design_nm, made.glass) == (0.0, None, Glass("quartz", None))
    assert made.axis_rad == radians(22.5)


@pytest.mark.parametrize(
    ("text", "waves"), [("half", 0.5), ("quarter", 0.25), ("0.31", 0.31), ("2.5", 2.5)]
)
def test_retardance_is_in_waves(make, text, waves):
    bulk = make(f"kind: waveplate, diameter: 20, retardance: {text}, axis: 10").geometry().bulk
    assert (bulk.kind, bulk.waves, bulk.axis_rad) == ("retarder", waves, radians(10.0))
    assert bulk.design_nm is None


def test_a_design_wavelength_is_kept(make):
    bulk = (
        make("kind: waveplate, diameter: 20, retardance: half, axis: 0, design_wavelength: 633")
        .geometry()
        .bulk
    )
    assert bulk.design_nm == 633.0


RETARDANCE = "one of 'half' or 'quarter'; or a ratio above 0, as '0.5', '50 %', '5 ppm' or 'OD 0.3'"


@pytest.mark.parametrize(
    ("text", "problem"),
    [
        (
            "hlaf",
            (
                "retardance: 'hlaf' is not what is read here",
                RETARDANCE,
                "write it in that form, such as 'half'",
            ),
        ),
        (
            "0",
            (
                "retardance: '0' is too small",
                RETARDANCE,
                "write a value within the bounds, such as '50 %'",
            ),
        ),
    ],
)
def test_says_what_is_wrong(complaints, text, problem):
    assert complaints(f"kind: waveplate, diameter: 20, retardance: {text}, axis: 0") == [problem]
