"""What is said of mistakes in names: every message in full, with its place."""

import pytest

CASES = [
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M1: {kind: mirror, diameter: 25.4, reflectance: 99 %, after: green, distan"
            "ce: 10}\n"
            "  m1: {kind: mirror, diameter: 25.4, reflectance: 99 %, after: green, distan"
            "ce: 20}\n"
        ),
        [
            (
                "b.yaml:6:3: error: elements: 'm1' differs only in capitals from 'M1' in line "
                "5\n"
                "  expected: names that differ in more than capitals; sources and elements "
                "share one set\n"
                "  to mend: give one of the two another name, such as 'm1-2'"
            ),
        ],
        id="capitals",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  Green: {kind: mirror, diameter: 25.4, reflectance: 99 %, after: green, dis"
            "tance: 10}\n"
        ),
        [
            (
                "b.yaml:5:3: error: elements: 'Green' differs only in capitals from 'green' in "
                "line 3\n"
                "  expected: names that differ in more than capitals; sources and elements "
                "share one set\n"
                "  to mend: give one of the two another name, such as 'Green-2'"
            ),
        ],
        id="source-and-element",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  con: {kind: mirror, diameter: 25.4, reflectance: 99 %, after: green, dista"
            "nce: 10}\n"
        ),
        [
            (
                "b.yaml:5:3: error: elements: 'con' is reserved by some systems and cannot be "
                "a file's name\n"
                "  expected: a name of letters, digits, '-' and '_', a letter first, at most "
                "64\n"
                "  to mend: write another name, such as 'con-1'"
            ),
        ],
        id="device",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M 1: {kind: mirror, diameter: 25.4, reflectance: 99 %, after: green, dista"
            "nce: 10}\n"
        ),
        [
            (
                "b.yaml:5:3: error: elements: 'M 1' cannot be a name\n"
                "  expected: a name of letters, digits, '-' and '_', a letter first, at most "
                "64\n"
                "  to mend: write 'M-1'"
            ),
        ],
        id="letters",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "enclosure:\n"
            "  panels: {a: {from: [0, 0], to: [9, 0]}, A: {from: [0, 0], to: [9, 0]}}\n"
        ),
        [
            (
                "b.yaml:3:43: error: enclosure.panels: 'A' differs from 'a' only in capitals; "
                "that one stands in line 3, column 12\n"
                "  expected: names that differ in more than capitals\n"
                "  to mend: give one of the two another name, such as 'A-2'"
            ),
        ],
        id="panels",
    ),
]


@pytest.mark.parametrize(("text", "messages"), CASES)
def test_mistakes_are_told_in_full(complaints, text, messages):
    assert complaints(text) == messages
