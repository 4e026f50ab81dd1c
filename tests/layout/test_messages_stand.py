"""What is said of mistakes in stand: every message in full, with its place."""

import pytest

CASES = [
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M1: {kind: mirror, diameter: 25.4, reflectance: 99 %, facing: 3}\n"
        ),
        [
            (
                "b.yaml:5:7: error: elements.M1: nothing says where it stands\n"
                "  expected: 'at', 'hole' or 'in', or 'after' with 'distance'\n"
                "  to mend: add 'at: [x, y]', or 'after' and 'distance'"
            ),
        ],
        id="nowhere",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M1: {kind: mirror, diameter: 25.4, reflectance: 99 %, at: [1, 1], hole: [1"
            ", 1], facing: 0}\n"
        ),
        [
            (
                "b.yaml:5:75: error: elements.M1: it stands in two places: 'at' (line 5) and "
                "'hole'\n"
                "  expected: one of 'at', 'hole' or 'in', or 'after' with 'distance'\n"
                "  to mend: remove 'at' or 'hole'"
            ),
        ],
        id="two-places",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M1: {kind: mirror, diameter: 25.4, reflectance: 99 %, distance: 10, facing"
            ": 0}\n"
        ),
        [
            (
                "b.yaml:5:67: error: elements.M1: a distance needs the item it is counted from\n"
                "  expected: 'after' beside 'distance'\n"
                "  to mend: add 'after' with the name of the item the beam comes from"
            ),
        ],
        id="distance-alone",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M1: {kind: mirror, diameter: 25.4, reflectance: 99 %, after: green, distan"
            "ce: 10, at: [1, 1]}\n"
        ),
        [
            (
                "b.yaml:5:81: error: elements.M1: it stands where both 'at' and 'distance' say\n"
                "  expected: 'after' with 'distance', or 'at' (where 'after' only says which "
                "beam arrives)\n"
                "  to mend: remove 'distance' or 'at'"
            ),
        ],
        id="distance-and-at",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M1: {kind: mirror, diameter: 25.4, reflectance: 99 %, after: green}\n"
        ),
        [
            (
                "b.yaml:5:64: error: elements.M1: 'after' does not say how far along the beam\n"
                "  expected: 'distance' beside 'after', or 'at', 'hole' or 'in'\n"
                "  to mend: add 'distance: 100', with the length that is meant"
            ),
        ],
        id="after-alone",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M1: {kind: mirror, diameter: 25.4, reflectance: 99 %, after: green, distan"
            "ce: 10, turn: left 90, facing: 3}\n"
        ),
        [
            (
                "b.yaml:5:108: error: elements.M1: it is turned by 'turn' (line 5) and by "
                "'facing'\n"
                "  expected: at most one of 'turn', 'aim', 'incidence' and 'facing'\n"
                "  to mend: remove 'turn' or 'facing'"
            ),
        ],
        id="turned-twice",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M1: {kind: mirror, diameter: 25.4, reflectance: 99 %, after: green, distan"
            "ce: 10, side: left}\n"
        ),
        [
            (
                "b.yaml:5:91: error: elements.M1: 'side' says nothing without 'incidence'\n"
                "  expected: 'side' only beside 'incidence'\n"
                "  to mend: remove 'side', or add 'incidence'"
            ),
        ],
        id="side-alone",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M1: {kind: mirror, diameter: 25.4, reflectance: 99 %, after: green, distan"
            "ce: 10, aim: [3, 3], pitch: 2}\n"
        ),
        [
            (
                "b.yaml:5:105: error: elements.M1: 'aim' (line 5) fixes the pitch already\n"
                "  expected: 'aim' without 'pitch'\n"
                "  to mend: remove 'pitch'; a small deviation is an 'offset' or 'pitch_error'"
            ),
        ],
        id="pitch-and-aim",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M1: {kind: mirror, diameter: 25.4, reflectance: 99 %, after: green, distan"
            "ce: 10, turn: 90}\n"
        ),
        [
            (
                "b.yaml:5:91: error: elements.M1.turn: '90' is not what is read here\n"
                "  expected: a turn of the beam, 'left', 'right', 'up' or 'down' and an angle "
                "up to 180 deg\n"
                "  to mend: write it in that form, such as 'left 90'"
            ),
        ],
        id="turn-words",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M1: {kind: mirror, diameter: 25.4, reflectance: 99 %, after: green, distan"
            "ce: 10, turn: left 200}\n"
        ),
        [
            (
                "b.yaml:5:91: error: elements.M1.turn: '200' is too large\n"
                "  expected: an angle above 0 deg and of at most 180 deg, in deg or with its "
                "unit (deg ° arcmin arcsec mrad rad urad)\n"
                "  to mend: write a value within the bounds, such as '30'"
            ),
        ],
        id="turn-angle",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M1: {kind: mirror, diameter: 25.4, reflectance: 99 %, after: green, distan"
            "ce: 10, incidence: 90}\n"
        ),
        [
            (
                "b.yaml:5:96: error: elements.M1.incidence: '90' is too large\n"
                "  expected: 'brewster'; or an angle of at least 0 deg and below 90 deg, in "
                "deg or with its unit (deg ° arcmin arcsec mrad rad urad)\n"
                "  to mend: write a value within the bounds, such as '30'"
            ),
        ],
        id="incidence",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M1: {kind: mirror, diameter: 25.4, reflectance: 99 %, after: green, distan"
            "ce: 10, incidence: brewter}\n"
        ),
        [
            (
                "b.yaml:5:96: error: elements.M1.incidence: 'brewter' is not what is read here\n"
                "  expected: 'brewster'; or an angle of at least 0 deg and below 90 deg, in "
                "deg or with its unit (deg ° arcmin arcsec mrad rad urad)\n"
                "  to mend: write it in that form, such as 'brewster'"
            ),
        ],
        id="incidence-word",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M1: {kind: mirror, diameter: 25.4, reflectance: 99 %, after: green., dista"
            "nce: 10}\n"
        ),
        [
            (
                "b.yaml:5:64: error: elements.M1.after: 'green.' is not an item of a path\n"
                "  expected: an item of a path, as 'M1' or 'BS1.reflected'\n"
                "  to mend: write an item of a path, as 'M1' or 'BS1.reflected'"
            ),
        ],
        id="empty-branch",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M1: {kind: mirror, diameter: 25.4, reflectance: 99 %, hole: [0, 3], facing"
            ": 0}\n"
        ),
        [
            (
                "b.yaml:5:64: error: elements.M1.hole[1]: '0' is out of range\n"
                "  expected: a whole number from 1 to 10000\n"
                "  to mend: write a whole number from 1 to 10000, such as '1'"
            ),
        ],
        id="hole",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M1: {kind: mirror, diameter: 25.4, reflectance: 99 %, in: east, facing: 0}\n"
        ),
        [
            (
                "b.yaml:5:61: error: elements.M1.in: 'east' is not a panel and its opening\n"
                "  expected: a panel and its opening, as 'east.port'\n"
                "  to mend: write a panel and its opening, as 'east.port'"
            ),
        ],
        id="in",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M1: {kind: mirror, diameter: 25.4, reflectance: 99 %, at: [1, 1], facing: "
            "[1]}\n"
        ),
        [
            (
                "b.yaml:5:77: error: elements.M1.facing: a list of 1 is not what is read here\n"
                "  expected: a list of 2, each a length in mm or with its unit (nm um mm m cm "
                "in ft)\n"
                "  to mend: write it in that form, such as [25, 25]"
            ),
        ],
        id="facing",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M1: {kind: mirror, diameter: 25.4, reflectance: 99 %, at: [1, 1], facing: "
            "M2}\n"
        ),
        [
            (
                "b.yaml:5:77: error: elements.M1: there is no source or element named 'M2'\n"
                "  expected: the name of a source or element: 'green' or 'M1'\n"
                "  to mend: write 'M1'"
            ),
        ],
        id="facing-nothing",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M1: {kind: mirror, diameter: 25.4, reflectance: 99 %, after: green, distan"
            "ce: 10, aim: M1}\n"
        ),
        [
            (
                "b.yaml:5:90: error: elements.M1: 'aim' names 'M1' itself\n"
                "  expected: another source or element, or a point\n"
                "  to mend: name what it is to look at"
            ),
        ],
        id="aim-itself",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "sources:\n"
            "  green: {wavelength: 532, power: 1 mW, beam: {waist_radius: 0.5}, at: [100,"
            " 450], heading: 0}\n"
            "elements:\n"
            "  M1: {kind: mirror, diameter: 25.4, reflectance: 99 %, at: [1], facing: 0}\n"
        ),
        [
            (
                "b.yaml:5:61: error: elements.M1.at: a list of 1 is not what is read here\n"
                "  expected: a list of 2 to 3, each item a length in mm or with its unit (nm "
                "um mm m cm in ft)\n"
                "  to mend: write it in that form, such as [25, 25]"
            ),
        ],
        id="at",
    ),
]


@pytest.mark.parametrize(("text", "messages"), CASES)
def test_mistakes_are_told_in_full(complaints, text, messages):
    assert complaints(text) == messages
