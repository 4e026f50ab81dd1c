"""What is said of mistakes in states: every message in full, with its place."""

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
            "states: {as drawn: {elements.M1.out: yes}}\n"
        ),
        [
            (
                "b.yaml:9:10: error: states: 'as drawn' is the layout itself\n"
                "  expected: another name for a state\n"
                "  to mend: set these keys where they belong, or give the state another name"
            ),
        ],
        id="as-drawn",
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
            "enclosure: {panels: {east: {from: [0, 0], to: [100, 0], openings: {port: {al"
            "ong: 50, height: 100, diameter: 30}}}}}\n"
            "states: {s: {element.M1.out: yes}}\n"
        ),
        [
            (
                "b.yaml:10:14: error: states.s: a state cannot set 'element.M1.out'\n"
                "  expected: a path of keys that begins with 'sources', 'elements', "
                "'enclosure' or 'limits'\n"
                "  to mend: write 'elements.M1.out'"
            ),
        ],
        id="root",
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
            "enclosure: {panels: {east: {from: [0, 0], to: [100, 0], openings: {port: {al"
            "ong: 50, height: 100, diameter: 30}}}}}\n"
            "states: {s: {elements.M9.out: yes}}\n"
        ),
        [
            (
                "b.yaml:10:14: error: states.s: there is no element named 'M9'\n"
                "  expected: the name of an element: 'M1', 'B', 'D' or 'T'\n"
                "  to mend: write 'M1'"
            ),
        ],
        id="name",
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
            "enclosure: {panels: {east: {from: [0, 0], to: [100, 0], openings: {port: {al"
            "ong: 50, height: 100, diameter: 30}}}}}\n"
            "states: {s: {elements.M1.kind: window}}\n"
        ),
        [
            (
                "b.yaml:10:14: error: states.s: a state cannot set 'kind'\n"
                "  expected: any key but 'kind' and 'after'\n"
                "  to mend: make a second element, and set 'out: yes' for one of the two in "
                "each state"
            ),
        ],
        id="kind",
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
            "enclosure: {panels: {east: {from: [0, 0], to: [100, 0], openings: {port: {al"
            "ong: 50, height: 100, diameter: 30}}}}}\n"
            "states: {s: {elements.M1.after: green}}\n"
        ),
        [
            (
                "b.yaml:10:14: error: states.s: a state cannot set 'after'\n"
                "  expected: any key but 'kind' and 'after'\n"
                "  to mend: make a second element, and set 'out: yes' for one of the two in "
                "each state"
            ),
        ],
        id="after",
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
            "enclosure: {panels: {east: {from: [0, 0], to: [100, 0], openings: {port: {al"
            "ong: 50, height: 100, diameter: 30}}}}}\n"
            "states: {s: {elements.M1.ot: yes}}\n"
        ),
        [
            (
                "b.yaml:10:30: error: elements.M1: 'ot' is not a key here\n"
                "  expected: the keys 'diameter', 'size', 'clear', 'reflectance', 'absorbs', "
                "'metal', 'radius', 'thickness', 'glass', 'back', 'hole', 'at', 'in', "
                "'height', 'offset', 'yaw_error', 'pitch_error', 'facing', 'pitch', 'out', "
                "'after', 'distance', 'wavelength', 'turn', 'aim', 'incidence', 'side', "
                "'beam_at', 'mount', 'withstands', 'kind' or 'part'\n"
                "  to mend: write 'at', or remove the key"
            ),
        ],
        id="key",
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
            "enclosure: {panels: {east: {from: [0, 0], to: [100, 0], openings: {port: {al"
            "ong: 50, height: 100, diameter: 30}}}}}\n"
            "states: {s: {elements.M1.out: maybe}}\n"
        ),
        [
            (
                "b.yaml:10:31: error: elements.M1.out: 'maybe' is not known here\n"
                "  expected: 'yes' or 'no'\n"
                "  to mend: write 'yes' or 'no'"
            ),
        ],
        id="value",
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
            "enclosure: {panels: {east: {from: [0, 0], to: [100, 0], openings: {port: {al"
            "ong: 50, height: 100, diameter: 30}}}}}\n"
            "states: {s: {elements.M1: yes}}\n"
        ),
        [
            (
                "b.yaml:10:14: error: states.s: 'elements.M1' is not the path of a key that a "
                "state may set\n"
                "  expected: elements.NAME.KEY\n"
                "  to mend: write the whole path, as 'elements.M1.facing' or 'limits.time_base'"
            ),
        ],
        id="short",
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
            "enclosure: {panels: {east: {from: [0, 0], to: [100, 0], openings: {port: {al"
            "ong: 50, height: 100, diameter: 30}}}}}\n"
            "states: {s: {limits.clp: 2 %}}\n"
        ),
        [
            (
                "b.yaml:10:26: error: limits: 'clp' is not a key here\n"
                "  expected: the keys 'time_base', 'eyes', 'clip', 'off_height', 'off_centre', "
                "'clearance', 'driver', 'reach', 'floor', 'back_reflection' or 'faults'\n"
                "  to mend: write 'clip', or remove the key"
            ),
        ],
        id="limit",
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
            "enclosure: {panels: {east: {from: [0, 0], to: [100, 0], openings: {port: {al"
            "ong: 50, height: 100, diameter: 30}}}}}\n"
            "states: {s: {limits: 3}}\n"
        ),
        [
            (
                "b.yaml:10:14: error: states.s: 'limits' is not the path of a key that a state "
                "may set\n"
                "  expected: limits.KEY\n"
                "  to mend: write the whole path, as 'elements.M1.facing' or 'limits.time_base'"
            ),
        ],
        id="limits-alone",
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
            "enclosure: {panels: {east: {from: [0, 0], to: [100, 0], openings: {port: {al"
            "ong: 50, height: 100, diameter: 30}}}}}\n"
            "states: {s: {enclosure.panels.est.open: yes}}\n"
        ),
        [
            (
                "b.yaml:10:14: error: states.s: there is no panel named 'est'\n"
                "  expected: the name of a panel: 'east'\n"
                "  to mend: write 'east'"
            ),
        ],
        id="panel",
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
            "enclosure: {panels: {east: {from: [0, 0], to: [100, 0], openings: {port: {al"
            "ong: 50, height: 100, diameter: 30}}}}}\n"
            "states: {s: {enclosure.to_height: 3}}\n"
        ),
        [
            (
                "b.yaml:10:14: error: states.s: 'enclosure.to_height' is not the path of a key "
                "that a state may set\n"
                "  expected: enclosure.panels.NAME.KEY or enclosure.lids.NAME.KEY\n"
                "  to mend: write the whole path, as 'elements.M1.facing' or 'limits.time_base'"
            ),
        ],
        id="enclosure-key",
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
            "enclosure: {panels: {east: {from: [0, 0], to: [100, 0], openings: {port: {al"
            "ong: 50, height: 100, diameter: 30}}}}}\n"
            "states: {s: {sources.green.power.x: 3}}\n"
        ),
        [
            (
                "b.yaml:10:14: error: states.s: 'sources.green.power.x' leads into a value "
                "that has no keys\n"
                "  expected: a path no longer than 'sources.green.power'\n"
                "  to mend: set 'sources.green.power' as a whole"
            ),
        ],
        id="into-a-scalar",
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
            "states: {s: [1]}\n"
        ),
        [
            (
                "b.yaml:9:13: error: states.s: a list of 1 is not what is read here\n"
                "  expected: a table of key paths and the values they take\n"
                "  to mend: write it in that form, such as {elements.M1.out: yes}"
            ),
        ],
        id="no-table",
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
            "enclosure: {panels: {east: {from: [0, 0], to: [100, 0], openings: {port: {al"
            "ong: 50, height: 100, diameter: 30}}}}}\n"
            "states: {s: {elements.M1.turn: left 90, elements.M1.facing: 3}}\n"
        ),
        [
            (
                "b.yaml:10:61: error: elements.M1: it is turned by 'turn' (line 10) and by "
                "'facing'\n"
                "  expected: at most one of 'turn', 'aim', 'incidence' and 'facing'\n"
                "  to mend: remove 'turn' or 'facing'"
            ),
        ],
        id="conflict",
    ),
]


@pytest.mark.parametrize(("text", "messages"), CASES)
def test_mistakes_are_told_in_full(complaints, text, messages):
    assert complaints(text) == messages
