"""What is said of mistakes in sources: every message in full, with its place."""

import pytest

CASES = [
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {power: 1 mW, beam: {waist_radius: 0.5}, at: [100, 450], heading: 0}\n"
        ),
        [
            (
                "b.yaml:3:10: error: sources.green: 'wavelength' is missing\n"
                "  expected: 'wavelength' with 'power' or 'pulse', or 'lines'\n"
                "  to mend: add 'wavelength: 532'"
            ),
        ],
        id="no-wavelength",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, beam: {waist_radius: 0.5}, at: [100, 450], headin"
            "g: 0}\n"
        ),
        [
            (
                "b.yaml:3:10: error: sources.green: nothing says how much it emits\n"
                "  expected: either 'power' or 'pulse'\n"
                "  to mend: add 'power: 150 mW', or 'pulse: {energy: 2 mJ, duration: 8 ns, "
                "rate: 10 Hz}'"
            ),
        ],
        id="no-power",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0, pulse: {energy: 1 mJ, duration: 8 ns, rate: 10 Hz}}\n"
        ),
        [
            (
                "b.yaml:3:103: error: sources.green: both power and pulse are given\n"
                "  expected: either 'power' or 'pulse'\n"
                "  to mend: remove one of the two"
            ),
        ],
        id="power-and-pulse",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 5, beam: {waist_radius: 0.5}, at: [100, 45"
            "0], heading: 0}\n"
        ),
        [
            (
                "b.yaml:3:35: error: sources.green.power: '5' has no unit\n"
                "  expected: a power above 0 W, with its unit (mW W kW uW nW pW MW GW)\n"
                "  to mend: write '5 mW', or whichever unit is meant"
            ),
        ],
        id="bare-power",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, at: [100, 450], heading: 0}\n"
        ),
        [
            (
                "b.yaml:3:10: error: sources.green: 'beam' is missing\n"
                "  expected: 'beam' with a table with the keys 'waist_radius', 'waist_ahead', "
                "'m2', 'diameter', 'divergence', 'waist_radius_h', 'waist_radius_v', "
                "'waist_ahead_h', 'waist_ahead_v', 'm2_h', 'm2_v' and 'widths'\n"
                "  to mend: add 'beam: {waist_radius: 25}', with the value that is meant"
            ),
        ],
        id="no-beam",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, heading: 0}\n"
        ),
        [
            (
                "b.yaml:3:10: error: sources.green: nothing says where it stands\n"
                "  expected: 'at', 'hole' or 'in'\n"
                "  to mend: add 'at: [x, y]'"
            ),
        ],
        id="no-place",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0, hole: [1, 1]}\n"
        ),
        [
            (
                "b.yaml:3:102: error: sources.green: it stands in two places: 'at' (line 3) "
                "and 'hole'\n"
                "  expected: one of 'at', 'hole' or 'in'\n"
                "  to mend: remove 'at' or 'hole'"
            ),
        ],
        id="two-places",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [1, 1]}\n"
        ),
        [
            (
                "b.yaml:3:10: error: sources.green: nothing says where the beam goes\n"
                "  expected: either 'heading' (an angle) or 'facing' (an angle, a name or a "
                "point)\n"
                "  to mend: add 'heading: 0'"
            ),
        ],
        id="no-heading",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0, facing: 20}\n"
        ),
        [
            (
                "b.yaml:3:104: error: sources.green: both heading and facing are given\n"
                "  expected: either 'heading' (an angle) or 'facing' (an angle, a name or a "
                "point)\n"
                "  to mend: remove one of the two"
            ),
        ],
        id="two-headings",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {power: 1 mW, lines: [{wavelength: 532, power: 1 mW}], beam: {waist"
            "_radius: 0.5}, at: [100, 450], heading: 0}\n"
        ),
        [
            (
                "b.yaml:3:18: error: sources.green: 'lines' states every 'power' itself\n"
                "  expected: 'lines' without 'power'\n"
                "  to mend: move 'power' into 'lines'"
            ),
        ],
        id="lines-and-power",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {lines: [{wavelength: 532, power: 1 mW}, {wavelength: 0.532 um, pow"
            "er: 2 mW}], beam: {waist_radius: 0.5}, at: [100, 450], heading: 0}\n"
        ),
        [
            (
                "b.yaml:3:51: error: sources.green: two lines have the wavelength 532 nm; the "
                "other stands in line 3\n"
                "  expected: lines of different wavelengths\n"
                "  to mend: put their powers together in one line"
            ),
        ],
        id="equal-lines",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {lines: [], beam: {waist_radius: 0.5}, at: [100, 450], heading: 0}\n"
        ),
        [
            (
                "b.yaml:3:18: error: sources.green.lines: a list of 0 is not what is read here\n"
                "  expected: a list of 1 to 100, each item a table with the keys 'power', "
                "'pulse' and 'wavelength'\n"
                "  to mend: write it in that form, such as [{wavelength: 532}]"
            ),
        ],
        id="empty-lines",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, pulse: {energy: 1 mJ, duration: 1 s, rate: 10 Hz}"
            ", beam: {waist_radius: 0.5}, at: [100, 450], heading: 0}\n"
        ),
        [
            (
                "b.yaml:3:60: error: sources.green.pulse: the pulses last longer than the time "
                "between them\n"
                "  expected: a duration of at most 0.1 s at this rate\n"
                "  to mend: check duration and rate, or state continuous 'power'"
            ),
        ],
        id="overlapping-pulses",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0, fed_by: {target: T1, share: 60 %}}\n"
        ),
        [
            (
                "b.yaml:3:113: error: sources.green: there is no element named 'T1'\n"
                "  expected: the name of an element: there is none in this layout\n"
                "  to mend: correct the name, or add the element"
            ),
        ],
        id="fed-by-nothing",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0, polarization: vertcal}\n"
        ),
        [
            (
                "b.yaml:3:110: error: sources.green.polarization: 'vertcal' is not what is "
                "read here\n"
                "  expected: one of 'horizontal', 'vertical' or 'none'; or a table with the "
                "key 'angle'; or a table with the key 'circular'\n"
                "  to mend: write it in that form, such as 'horizontal'"
            ),
        ],
        id="polarization",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0, polarization: {circular: up}}\n"
        ),
        [
            (
                "b.yaml:3:121: error: sources.green.polarization.circular: 'up' is not known "
                "here\n"
                "  expected: one of 'left' or 'right'\n"
                "  to mend: write one of 'left' or 'right'"
            ),
        ],
        id="polarization-hand",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [1, 1"
            "], facing: green}\n"
        ),
        [
            (
                "b.yaml:3:88: error: sources.green: 'facing' names 'green' itself\n"
                "  expected: another source or element, or a point\n"
                "  to mend: name what it is to look at"
            ),
        ],
        id="facing-itself",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0, heding: 3}\n"
        ),
        [
            (
                "b.yaml:3:96: error: sources.green: 'heding' is not a key here\n"
                "  expected: the keys 'at', 'hole', 'in', 'height', 'offset', 'yaw_error', "
                "'pitch_error', 'facing', 'pitch', 'out', 'power', 'pulse', 'wavelength', "
                "'lines', 'beam', 'polarization', 'linewidth', 'line', 'rear_leak', "
                "'pointing', 'acceptance', 'fed_by', 'body' or 'heading'\n"
                "  to mend: write 'heading', or remove the key"
            ),
        ],
        id="unknown-key",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0, after: M1}\n"
        ),
        [
            (
                "b.yaml:3:96: error: sources.green: 'after' is not a key here\n"
                "  expected: the keys 'at', 'hole', 'in', 'height', 'offset', 'yaw_error', "
                "'pitch_error', 'facing', 'pitch', 'out', 'power', 'pulse', 'wavelength', "
                "'lines', 'beam', 'polarization', 'linewidth', 'line', 'rear_leak', "
                "'pointing', 'acceptance', 'fed_by', 'body' or 'heading'\n"
                "  to mend: remove the key"
            ),
        ],
        id="after",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources: {red: {wavelength: 633, power: 1 mW, beam: {waist_radius: 0.2 um,"
            " m2: 1.1}, at: [1, 1], heading: 0}}\n"
        ),
        [
            (
                "b.yaml:2:68: error: sources.red: from a waist of 0.0002 mm light of 633 nm"
                " would spread over more than 90°\n"
                "  expected: a radius above 0.000282 mm for this wavelength and M²\n"
                "  to mend: check the unit: a bare number is in mm"
            ),
        ],
        id="waist-too-small",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources: {red: {wavelength: 633, power: 1 mW, beam: {waist_radius_h: 0.5, "
            "waist_radius_v: 0.5 nm}, at: [1, 1], heading: 0}}\n"
        ),
        [
            (
                "b.yaml:2:91: error: sources.red: from a waist of 5e-07 mm light of 633 nm "
                "would spread over more than 90°\n"
                "  expected: a radius above 0.000257 mm for this wavelength and M²\n"
                "  to mend: check the unit: a bare number is in mm"
            ),
        ],
        id="waist-too-small-upright",
    ),
]


@pytest.mark.parametrize(("text", "messages"), CASES)
def test_mistakes_are_told_in_full(complaints, text, messages):
    assert complaints(text) == messages
