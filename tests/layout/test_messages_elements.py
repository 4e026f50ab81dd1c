"""What is said of mistakes in elements: every message in full, with its place."""

import pytest

CASES = [
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M1: {at: [1, 1], facing: 0}\n"
        ),
        [
            (
                "b.yaml:5:7: error: elements.M1: 'kind' is missing\n"
                "  expected: 'kind' with one of 'mirror', 'splitter', 'cube', 'window', "
                "'filter', 'polarizer', 'plate-polarizer', 'waveplate', 'rotator', 'lens', "
                "'aperture', 'grating', 'prism', 'parabola', 'retroreflector', 'cell', "
                "'converter', 'dump', 'target', 'screen', 'shutter', 'tube' or 'obstacle'\n"
                "  to mend: add 'kind: mirror', with the kind that is meant"
            ),
        ],
        id="no-kind",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M1: {kind: miror, at: [1, 1], facing: 0}\n"
        ),
        [
            (
                "b.yaml:5:14: error: elements.M1: 'miror' is not a kind of element\n"
                "  expected: one of 'mirror', 'splitter', 'cube', 'window', 'filter', "
                "'polarizer', 'plate-polarizer', 'waveplate', 'rotator', 'lens', 'aperture', "
                "'grating', 'prism', 'parabola', 'retroreflector', 'cell', 'converter', "
                "'dump', 'target', 'screen', 'shutter', 'tube' or 'obstacle'\n"
                "  to mend: write 'mirror'"
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
            "  M1: mirror\n"
        ),
        [
            (
                "b.yaml:5:7: error: elements.M1: 'mirror' is not what is read here\n"
                "  expected: a table with 'kind' and the keys of that kind\n"
                "  to mend: write it in that form, such as {kind: mirror}"
            ),
        ],
        id="not-a-table",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M1: {part: half-inch, at: [1, 1]}\n"
        ),
        [
            (
                "b.yaml:5:14: error: elements.M1: not yet: parts are not put together by this "
                "version\n"
                "  expected: a layout without 'part'\n"
                "  to mend: write the keys of the part here"
            ),
        ],
        id="part",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  L1: {kind: lens, focal: 100, diameter: 25, after: green, distance: 9, turn"
            ": left 90}\n"
        ),
        [
            (
                "b.yaml:5:79: error: elements.L1: 'turn' is for fronts that reflect the beam "
                "on; a lens does not\n"
                "  expected: 'incidence', 'facing', or 'sends' where the kind has it\n"
                "  to mend: write 'incidence: 0' or 'facing' instead of 'turn'"
            ),
        ],
        id="turn-of-a-lens",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M1: {kind: mirror, diameter: 25.4, reflectance: 99 %, after: green, distan"
            "ce: 10, reflectence: 3 %}\n"
        ),
        [
            (
                "b.yaml:5:85: error: elements.M1: 'reflectence' is not a key here\n"
                "  expected: the keys 'diameter', 'size', 'clear', 'reflectance', 'absorbs', "
                "'metal', 'radius', 'thickness', 'glass', 'back', 'hole', 'at', 'in', "
                "'height', 'offset', 'yaw_error', 'pitch_error', 'facing', 'pitch', 'out', "
                "'after', 'distance', 'wavelength', 'turn', 'aim', 'incidence', 'side', "
                "'beam_at', 'mount', 'withstands', 'kind' or 'part'\n"
                "  to mend: write 'reflectance', or remove the key"
            ),
        ],
        id="unknown-key",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M1: {kind: mirror, diameter: -3, after: green, distance: x, mount: nne}\n"
        ),
        [
            (
                "b.yaml:5:32: error: elements.M1.diameter: '-3' is too small\n"
                "  expected: a length above 0 mm, in mm or with its unit (nm um mm m cm in ft)\n"
                "  to mend: write a value within the bounds, such as '25'"
            ),
            (
                "b.yaml:5:60: error: elements.M1.distance: 'x' is not a number\n"
                "  expected: a length of at least 0 mm, in mm or with its unit (nm um mm m cm "
                "in ft)\n"
                "  to mend: write a length, such as '25'"
            ),
            (
                "b.yaml:5:70: error: elements.M1.mount: 'nne' is not what is read here\n"
                "  expected: 'none'; or a table with the keys 'width', 'depth', 'height', "
                "'post', 'post_diameter', 'foot', 'slots', 'optic_height', 'adjusters' and "
                "'range'\n"
                "  to mend: write it in that form, such as 'none'"
            ),
        ],
        id="several-mistakes",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  R1: {kind: grating, size: [9, 9], lines: 600, orders: {0: 1}, after: green,"
            " distance: 9}\n"
        ),
        [
            (
                "b.yaml:5:14: error: elements.R1: not yet: this kind is read but cannot be "
                "traced by this version\n"
                "  expected: a kind that this version traces\n"
                "  to mend: take the element out of the layout; nothing is computed as if it "
                "were not there"
            ),
        ],
        id="pending",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  K1: {kind: screen, at: [1, 1], facing: 0, material: black}\n"
            "materials: {blak: {}}\n"
        ),
        [
            (
                "b.yaml:5:55: error: elements.K1: there is no material named 'black'\n"
                "  expected: the name of a material: 'blak'\n"
                "  to mend: write 'blak'"
            ),
        ],
        id="material",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  C1: {kind: cube, reflectance: 50 %, side: lft, after: green, distance: 10}\n"
        ),
        [
            (
                "b.yaml:5:45: error: elements.C1.side: 'lft' is not a number\n"
                "  expected: a length above 0 mm, in mm or with its unit (nm um mm m cm in ft)\n"
                "  to mend: write a length, such as '25'"
            ),
        ],
        id="side-of-a-cube",
    ),
]


@pytest.mark.parametrize(("text", "messages"), CASES)
def test_mistakes_are_told_in_full(complaints, text, messages):
    assert complaints(text) == messages
