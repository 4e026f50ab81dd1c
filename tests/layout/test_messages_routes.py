"""What is said of mistakes in routes: every message in full, with its place."""

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
            "  B: {kind: splitter, diameter: 25, reflectance: 50 %, after: M1, distance: "
            "10}\n"
            "  D: {kind: dump, after: B.reflected, distance: 10}\n"
            "  T: {kind: target, after: B.transmitted, distance: 10}\n"
            "routes: {r: [green]}\n"
        ),
        [
            (
                "b.yaml:9:13: error: routes.r: a list of 1 is not what is read here\n"
                "  expected: a list of at least 2 items, [source, element, …, element]\n"
                "  to mend: write it in that form, such as [green, M1]"
            ),
        ],
        id="too-short",
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
            "routes: {r: [M1, B.reflected]}\n"
        ),
        [
            (
                "b.yaml:9:14: error: routes.r: the route starts at 'M1', which is no source\n"
                "  expected: a source first: 'green'\n"
                "  to mend: put the source before it"
            ),
        ],
        id="no-source",
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
            "routes: {r: [gren, M1]}\n"
        ),
        [
            (
                "b.yaml:9:14: error: routes.r: there is no source named 'gren'\n"
                "  expected: the name of a source: 'green'\n"
                "  to mend: write 'green'"
            ),
        ],
        id="unknown-source",
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
            "routes: {r: [green, M2]}\n"
        ),
        [
            (
                "b.yaml:9:21: error: routes.r: there is no element named 'M2'\n"
                "  expected: the name of an element: 'M1', 'B', 'D' or 'T'\n"
                "  to mend: write 'M1'"
            ),
        ],
        id="unknown-element",
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
            "routes: {r: [green, M1, B.reflect, D]}\n"
        ),
        [
            (
                "b.yaml:9:25: error: routes.r: 'B' has no branch 'reflect'\n"
                "  expected: one of 'B.transmitted' or 'B.reflected'\n"
                "  to mend: write 'B.reflected'"
            ),
        ],
        id="unknown-branch",
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
            "routes: {r: [green, M1, B, D]}\n"
        ),
        [
            (
                "b.yaml:9:25: error: routes.r: 'B' does not say by which branch the beam goes "
                "on\n"
                "  expected: one of 'B.transmitted' or 'B.reflected'\n"
                "  to mend: write 'B.transmitted', or whichever is meant"
            ),
        ],
        id="no-branch",
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
            "routes: {r: [green, M1, D, M1]}\n"
        ),
        [
            (
                "b.yaml:9:25: error: routes.r: no beam goes on from 'D': a dump has no "
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
            "routes: {r: [green, M1, D.reflected]}\n"
        ),
        [
            (
                "b.yaml:9:25: error: routes.r: no beam goes on from 'D': a dump has no "
                "branches\n"
                "  expected: an item that sends light on\n"
                "  to mend: end the route here, or name another item"
            ),
        ],
        id="branch-of-a-dump",
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
            "routes: {r: [green, M1, green]}\n"
        ),
        [
            (
                "b.yaml:9:25: error: routes.r: 'green' is a source: only the first item of a "
                "route can be one\n"
                "  expected: elements after the first item\n"
                "  to mend: remove it, or start a route of its own with it"
            ),
        ],
        id="second-source",
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
            "routes: {r: [green.1064, M1]}\n"
        ),
        [
            (
                "b.yaml:9:14: error: routes.r: 'green' has no line '1064'\n"
                "  expected: one of 'green.532'\n"
                "  to mend: write 'green.532'"
            ),
        ],
        id="line",
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
            "routes: {r: [green, east.port, M1]}\n"
            "enclosure: {panels: {east: {from: [0, 0], to: [100, 0], openings: {port: {al"
            "ong: 50, height: 100, diameter: 30}}}}}\n"
        ),
        [
            (
                "b.yaml:9:21: error: routes.r: the beam is handed over at 'east.port': nothing "
                "follows\n"
                "  expected: an opening only as the last item\n"
                "  to mend: end the route here"
            ),
        ],
        id="opening-not-last",
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
            "routes: {r: [green, east.prt]}\n"
            "enclosure: {panels: {east: {from: [0, 0], to: [100, 0], openings: {port: {al"
            "ong: 50, height: 100, diameter: 30}}}}}\n"
        ),
        [
            (
                "b.yaml:9:21: error: routes.r: there is no opening of panel 'east' named 'prt'\n"
                "  expected: the name of an opening of panel 'east': 'port'\n"
                "  to mend: write 'port'"
            ),
        ],
        id="unknown-opening",
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
            "routes: {r: [green, {times: 0, through: [M1]}]}\n"
        ),
        [
            (
                "b.yaml:9:29: error: routes.r[2].times: '0' is out of range\n"
                "  expected: a whole number from 1 to 1000\n"
                "  to mend: write a whole number from 1 to 1000, such as '1'"
            ),
        ],
        id="times",
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
            "routes: {r: [green, {times: 1000, through: [M1, M1, M1, M1, M1, M1, M1, M1, "
            "M1, M1, M1]}]}\n"
        ),
        [
            (
                "b.yaml:9:21: error: routes.r[2]: the route has more than 10000 items\n"
                "  expected: at most 10000 items, repeated ones counted\n"
                "  to mend: shorten the route, or lower 'times'"
            ),
        ],
        id="too-many",
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
            "routes: {r: {path: [green, M1], needs: {transmit: 3 %}}}\n"
        ),
        [
            (
                "b.yaml:9:41: error: routes.r.needs: 'transmit' is not a key here\n"
                "  expected: the keys 'transmits', 'power', 'polarization' or 'path'\n"
                "  to mend: write 'transmits', or remove the key"
            ),
        ],
        id="needs",
    ),
]


@pytest.mark.parametrize(("text", "messages"), CASES)
def test_mistakes_are_told_in_full(complaints, text, messages):
    assert complaints(text) == messages
