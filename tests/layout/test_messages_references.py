"""What is said of mistakes in references: every message in full, with its place."""

import pytest

CASES = [
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M1: {kind: mirror, diameter: 25.4, reflectance: 99 %, after: gren, distanc"
            "e: 10}\n"
        ),
        [
            (
                "b.yaml:5:64: error: elements.M1: there is no source or element named 'gren'\n"
                "  expected: the name of a source or element: 'green' or 'M1'\n"
                "  to mend: write 'green'"
            ),
        ],
        id="after-nothing",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M1: {kind: mirror, diameter: 25.4, reflectance: 99 %, after: green.532, di"
            "stance: 10}\n"
        ),
        [
            (
                "b.yaml:5:64: error: elements.M1: 'green' is a source: it has no branches\n"
                "  expected: 'green', with 'wavelength' where a line must be chosen\n"
                "  to mend: write 'after: green'"
            ),
        ],
        id="after-branch-of-source",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M1: {kind: mirror, diameter: 25.4, reflectance: 99 %, after: green, distan"
            "ce: 10}\n"
            "  B: {kind: splitter, diameter: 25, reflectance: 50 %, after: M1, distance: "
            "10}\n"
            "  D: {kind: dump, after: B.reflected, distance: 10}\n"
            "  T: {kind: target, after: B.transmitted, distance: 10}\n"
            "  M3: {kind: mirror, diameter: 25.4, reflectance: 99 %, after: B, distance: "
            "10}\n"
        ),
        [
            (
                "b.yaml:9:64: error: elements.M3: 'B' does not say by which branch the beam "
                "goes on\n"
                "  expected: one of 'B.transmitted' or 'B.reflected'\n"
                "  to mend: write 'B.transmitted', or whichever is meant"
            ),
        ],
        id="after-no-branch",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M1: {kind: mirror, diameter: 25.4, reflectance: 99 %, after: green, distan"
            "ce: 10}\n"
            "  B: {kind: splitter, diameter: 25, reflectance: 50 %, after: M1, distance: "
            "10}\n"
            "  D: {kind: dump, after: B.reflected, distance: 10}\n"
            "  T: {kind: target, after: B.transmitted, distance: 10}\n"
            "  M3: {kind: mirror, diameter: 25.4, reflectance: 99 %, after: B.transmited,"
            " distance: 10}\n"
        ),
        [
            (
                "b.yaml:9:64: error: elements.M3: 'B' has no branch 'transmited'\n"
                "  expected: one of 'B.transmitted' or 'B.reflected'\n"
                "  to mend: write 'B.transmitted'"
            ),
        ],
        id="after-unknown-branch",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M1: {kind: mirror, diameter: 25.4, reflectance: 99 %, after: green, distan"
            "ce: 10}\n"
            "  B: {kind: splitter, diameter: 25, reflectance: 50 %, after: M1, distance: "
            "10}\n"
            "  D: {kind: dump, after: B.reflected, distance: 10}\n"
            "  T: {kind: target, after: B.transmitted, distance: 10}\n"
            "  M3: {kind: mirror, diameter: 25.4, reflectance: 99 %, after: D, distance: "
            "10}\n"
        ),
        [
            (
                "b.yaml:9:64: error: elements.M3: no beam goes on from 'D': a dump has no "
                "branches\n"
                "  expected: an item that sends light on\n"
                "  to mend: end the route here, or name another item"
            ),
        ],
        id="after-a-dump",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M1: {kind: mirror, diameter: 25.4, reflectance: 99 %, after: green, distan"
            "ce: 10}\n"
            "  B: {kind: splitter, diameter: 25, reflectance: 50 %, after: M1, distance: "
            "10}\n"
            "  D: {kind: dump, after: B.reflected, distance: 10}\n"
            "  T: {kind: target, after: B.transmitted, distance: 10}\n"
            "  M3: {kind: mirror, diameter: 25.4, reflectance: 99 %, in: est.port}\n"
            "enclosure: {panels: {east: {from: [0, 0], to: [100, 0], openings: {port: {al"
            "ong: 50, height: 100, diameter: 30}}}}}\n"
        ),
        [
            (
                "b.yaml:9:61: error: elements.M3: there is no panel named 'est'\n"
                "  expected: the name of a panel: 'east'\n"
                "  to mend: write 'east'"
            ),
        ],
        id="in-unknown-panel",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M1: {kind: mirror, diameter: 25.4, reflectance: 99 %, after: green, distan"
            "ce: 10}\n"
            "  B: {kind: splitter, diameter: 25, reflectance: 50 %, after: M1, distance: "
            "10}\n"
            "  D: {kind: dump, after: B.reflected, distance: 10}\n"
            "  T: {kind: target, after: B.transmitted, distance: 10}\n"
            "  M3: {kind: mirror, diameter: 25.4, reflectance: 99 %, in: east.prt}\n"
            "enclosure: {panels: {east: {from: [0, 0], to: [100, 0], openings: {port: {al"
            "ong: 50, height: 100, diameter: 30}}}}}\n"
        ),
        [
            (
                "b.yaml:9:61: error: elements.M3: there is no opening of panel 'east' named "
                "'prt'\n"
                "  expected: the name of an opening of panel 'east': 'port'\n"
                "  to mend: write 'port'"
            ),
        ],
        id="in-unknown-opening",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M1: {kind: mirror, diameter: 25.4, reflectance: 99 %, after: green, distan"
            "ce: 10}\n"
            "  B: {kind: splitter, diameter: 25, reflectance: 50 %, after: M1, distance: "
            "10}\n"
            "  D: {kind: dump, after: B.reflected, distance: 10}\n"
            "  T: {kind: target, after: B.transmitted, distance: 10}\n"
            "routes: {r: [green, M1]}\n"
            "matched: [{routes: [r, s], within: 5}]\n"
        ),
        [
            (
                "b.yaml:10:24: error: matched[1]: there is no route named 's'\n"
                "  expected: the name of a route: 'r'\n"
                "  to mend: correct the name, or add the route"
            ),
        ],
        id="matched",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M1: {kind: mirror, diameter: 25.4, reflectance: 99 %, after: green, distan"
            "ce: 10}\n"
            "  B: {kind: splitter, diameter: 25, reflectance: 50 %, after: M1, distance: "
            "10}\n"
            "  D: {kind: dump, after: B.reflected, distance: 10}\n"
            "  T: {kind: target, after: B.transmitted, distance: 10}\n"
            "cavities: {c: {between: [M1, M9]}}\n"
        ),
        [
            (
                "b.yaml:9:30: error: cavities.c: there is no element named 'M9'\n"
                "  expected: the name of an element: 'M1', 'B', 'D' or 'T'\n"
                "  to mend: write 'M1'"
            ),
        ],
        id="cavities",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M1: {kind: mirror, diameter: 25.4, reflectance: 99 %, after: green, distan"
            "ce: 10}\n"
            "  B: {kind: splitter, diameter: 25, reflectance: 50 %, after: M1, distance: "
            "10}\n"
            "  D: {kind: dump, after: B.reflected, distance: 10}\n"
            "  T: {kind: target, after: B.transmitted, distance: 10}\n"
            "tolerances: {mirrr: {yaw: 1 mrad}}\n"
        ),
        [
            (
                "b.yaml:9:14: error: tolerances: there is no kind or element named 'mirrr'\n"
                "  expected: the name of a kind or element: 'mirror', 'splitter', 'cube', "
                "'window', 'filter', 'polarizer', 'plate-polarizer', 'waveplate', 'rotator', "
                "'lens', 'aperture', 'grating', 'prism', 'parabola', 'retroreflector', "
                "'cell', 'converter', 'dump', 'target', 'screen', 'shutter', 'tube', "
                "'obstacle', 'M1', 'B', 'D' or 'T'\n"
                "  to mend: write 'mirror'"
            ),
        ],
        id="tolerances",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M1: {kind: mirror, diameter: 25.4, reflectance: 99 %, after: green, distan"
            "ce: 10}\n"
            "  B: {kind: splitter, diameter: 25, reflectance: 50 %, after: M1, distance: "
            "10}\n"
            "  D: {kind: dump, after: B.reflected, distance: 10}\n"
            "  T: {kind: target, after: B.transmitted, distance: 10}\n"
            "accept: [{finding: x, reason: y, by: z, until: 2027-01-01, bound: {M9: {at: "
            "[1, 1], within: 1}}}]\n"
        ),
        [
            (
                "b.yaml:9:68: error: accept[1].bound: there is no source or element named 'M9'\n"
                "  expected: the name of a source or element: 'green', 'M1', 'B', 'D' or 'T'\n"
                "  to mend: write 'M1'"
            ),
        ],
        id="bound",
    ),
]


@pytest.mark.parametrize(("text", "messages"), CASES)
def test_mistakes_are_told_in_full(complaints, text, messages):
    assert complaints(text) == messages
