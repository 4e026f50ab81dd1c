"""What is said of mistakes in materials: every message in full, with its place."""

import pytest

CASES = [
    pytest.param(
        ("bench: {size: [1500, 900]}\nmaterials: {m: {diffuse: 0.9, specular: 0.2}}\n"),
        [
            (
                "b.yaml:2:41: error: materials.m: diffuse and specular shares add up to 1.1\n"
                "  expected: at most 1 together\n"
                "  to mend: lower one of the two; the rest is absorbed"
            ),
        ],
        id="too-bright",
    ),
    pytest.param(
        ("bench: {size: [1500, 900]}\nmaterials: {m: {withstands: {for: 10 s}}}\n"),
        [
            (
                "b.yaml:2:29: error: materials.m.withstands: it rates nothing\n"
                "  expected: one of 'irradiance' (with 'for'), 'power' or 'fluence' (with "
                "'at')\n"
                "  to mend: add 'irradiance: 20 W/cm2'"
            ),
        ],
        id="rates-nothing",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "materials: {m: {withstands: {power: 5 W, fluence: 1 J/cm2}}}\n"
        ),
        [
            (
                "b.yaml:2:51: error: materials.m.withstands: 'power' and 'fluence' are given "
                "together\n"
                "  expected: one of 'irradiance' (with 'for'), 'power' or 'fluence' (with "
                "'at')\n"
                "  to mend: keep 'power' or 'fluence'"
            ),
        ],
        id="two-ratings",
    ),
    pytest.param(
        ("bench: {size: [1500, 900]}\nmaterials: {m: {withstands: {power: 5 W, for: 10 s}}}\n"),
        [
            (
                "b.yaml:2:47: error: materials.m.withstands: 'for' says nothing beside 'power'\n"
                "  expected: 'for' only with 'irradiance'\n"
                "  to mend: remove 'for'"
            ),
        ],
        id="stray-time",
    ),
    pytest.param(
        ("bench: {size: [1500, 900]}\nmaterials: {m: {withstands: {irradiance: 5 W}}}\n"),
        [
            (
                "b.yaml:2:42: error: materials.m.withstands.irradiance: '5 W' is a power, not "
                "an irradiance\n"
                "  expected: an irradiance above 0 W/m2, with its unit (W/cm2 mW/cm2 kW/cm2 "
                "uW/cm2 MW/cm2 GW/cm2 W/mm2 mW/mm2 kW/mm2 uW/mm2 MW/mm2 GW/mm2 W/m2 mW/m2 "
                "kW/m2 uW/m2 MW/m2 GW/m2)\n"
                "  to mend: write an irradiance, such as '20 W/cm2'"
            ),
        ],
        id="wrong-dimension",
    ),
]


@pytest.mark.parametrize(("text", "messages"), CASES)
def test_mistakes_are_told_in_full(complaints, text, messages):
    assert complaints(text) == messages
