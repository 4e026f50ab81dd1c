"""What is said of mistakes in enclosure: every message in full, with its place."""

import pytest

CASES = [
    pytest.param(
        ("bench: {size: [1500, 900]}\nenclosure:\n  panels: {south: {from: [0, 0], to: [0, 0]}}\n"),
        [
            (
                "b.yaml:3:38: error: enclosure.panels.south: the panel starts and ends in the "
                "same point\n"
                "  expected: two different points\n"
                "  to mend: move one of the two"
            ),
        ],
        id="no-length",
    ),
    pytest.param(
        ("bench: {size: [1500, 900]}\nenclosure:\n  from_height: 400\n"),
        [
            (
                "b.yaml:3:16: error: enclosure: its upper edge (300 mm) is not above its lower "
                "edge (400 mm)\n"
                "  expected: 'to_height' above 'from_height'\n"
                "  to mend: set 'to_height' above 400"
            ),
        ],
        id="upside-down",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "enclosure:\n"
            "  panels: {south: {from: [0, 0], to: [9, 0], to_height: -10}}\n"
        ),
        [
            (
                "b.yaml:3:57: error: enclosure.panels.south: its upper edge (-10 mm) is not "
                "above its lower edge (0 mm)\n"
                "  expected: 'to_height' above 'from_height'\n"
                "  to mend: set 'to_height' above 0"
            ),
        ],
        id="panel-upside-down",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "enclosure:\n"
            "  panels:\n"
            "    south:\n"
            "      from: [0, 0]\n"
            "      to: [100, 0]\n"
            "      openings: {a: {along: 80, width: 30, from_height: 0, to_height: 20}}\n"
        ),
        [
            (
                "b.yaml:7:29: error: enclosure.panels.south.openings.a: the opening runs from "
                "80 mm to 110 mm along the panel, which is 100 mm long\n"
                "  expected: an opening between 0 and 100 mm\n"
                "  to mend: move it, or make it smaller"
            ),
        ],
        id="beyond-end",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "enclosure:\n"
            "  panels:\n"
            "    south:\n"
            "      from: [0, 0]\n"
            "      to: [100, 0]\n"
            "      openings: {a: {along: 50, height: 295, diameter: 20}}\n"
        ),
        [
            (
                "b.yaml:7:41: error: enclosure.panels.south.openings.a: the opening reaches "
                "from height 285 mm to 305 mm, the panel from 0 mm to 300 mm\n"
                "  expected: an opening between 0 and 300 mm\n"
                "  to mend: move it, or make it smaller"
            ),
        ],
        id="above-top",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "enclosure:\n"
            "  panels:\n"
            "    south:\n"
            "      from: [0, 0]\n"
            "      to: [100, 0]\n"
            "      openings: {a: {along: 50, height: 95, diameter: 20, width: 4}}\n"
        ),
        [
            (
                "b.yaml:7:66: error: enclosure.panels.south.openings.a: 'width' is not for a "
                "round opening\n"
                "  expected: 'along', 'width', 'from_height' and 'to_height', or 'along', "
                "'height' and 'diameter'\n"
                "  to mend: remove 'width'"
            ),
        ],
        id="mixed-shapes",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "enclosure:\n"
            "  panels:\n"
            "    south:\n"
            "      from: [0, 0]\n"
            "      to: [100, 0]\n"
            "      openings: {a: {along: 50, width: 20, to_height: 20}}\n"
        ),
        [
            (
                "b.yaml:7:21: error: enclosure.panels.south.openings.a: 'from_height' is "
                "missing for a rectangular opening\n"
                "  expected: 'along', 'width', 'from_height' and 'to_height', or 'along', "
                "'height' and 'diameter'\n"
                "  to mend: add 'from_height'"
            ),
        ],
        id="half-a-rectangle",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "enclosure:\n"
            "  panels:\n"
            "    south:\n"
            "      from: [0, 0]\n"
            "      to: [100, 0]\n"
            "      openings: {a: {along: 50, width: 20, from_height: 20, to_height: 20}}\n"
        ),
        [
            (
                "b.yaml:7:72: error: enclosure.panels.south.openings.a: its upper edge is not "
                "above its lower edge\n"
                "  expected: 'to_height' above 'from_height'\n"
                "  to mend: set 'to_height' above 20"
            ),
        ],
        id="flat-opening",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "enclosure:\n"
            "  panels: {south: {from: [0, 0], to: [9, 0], access: key}}\n"
        ),
        [
            (
                "b.yaml:3:54: error: enclosure.panels.south.access: 'key' is not known here\n"
                "  expected: one of 'none', 'tool' or 'interlocked'\n"
                "  to mend: write one of 'none', 'tool' or 'interlocked'"
            ),
        ],
        id="access",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "enclosure:\n"
            "  lids: {main: {height: 300, outline: [[0, 0], [5, 0], [0, 0]]}}\n"
        ),
        [
            (
                "b.yaml:3:39: error: enclosure.lids.main.outline: the outline crosses or "
                "touches itself, or encloses nothing\n"
                "  expected: corners in order round an area, each of them once\n"
                "  to mend: put the corners in order; do not repeat the first one at the end"
            ),
        ],
        id="lid",
    ),
    pytest.param(
        ("bench: {size: [1500, 900]}\nenclosure:\n  material: blck\nmaterials: {black: {}}\n"),
        [
            (
                "b.yaml:3:13: error: enclosure: there is no material named 'blck'\n"
                "  expected: the name of a material: 'black'\n"
                "  to mend: write 'black'"
            ),
        ],
        id="material",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "enclosure:\n"
            "  panels: {south: {from: [0, 0], to: [9, 0], material: steel}}\n"
        ),
        [
            (
                "b.yaml:3:56: error: enclosure.panels.south: there is no material named "
                "'steel'\n"
                "  expected: the name of a material: there is none in this layout\n"
                "  to mend: correct the name, or add the material"
            ),
        ],
        id="panel-material",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "enclosure: {panels: {east: {from: [1500, 0], to: [1500, 900], fix: {hole: "
            "5, pitch: 5, inset: 9}}}}\n"
        ),
        [
            (
                "b.yaml:2:85: error: enclosure.panels.east.fix: holes of 5 mm every 5 mm ru"
                "n into one another\n"
                "  expected: a pitch above 5 mm\n"
                "  to mend: make the pitch larger, or the holes smaller"
            ),
        ],
        id="holes-run-together",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "enclosure: {panels: {east: {from: [1500, 0], to: [1500, 900], fix: {hole: "
            "0.05, pitch: 0.15, inset: 9}}}}\n"
        ),
        [
            (
                "b.yaml:2:88: error: enclosure.panels.east: a hole every 0.15 mm makes 6000"
                " holes in a row\n"
                "  expected: at most 1000 holes in a row\n"
                "  to mend: make the pitch larger; a bare number is in mm"
            ),
        ],
        id="endless-row",
    ),
    pytest.param(
        (
            "bench: {size: [1500, 900]}\n"
            "enclosure: {panels: {east: {from: [1500, 0], to: [1500, 900], fold: {flange: 1.5}}}}\n"
        ),
        [
            (
                "b.yaml:2:78: error: enclosure.panels.east.fold: a flange of 1.5 mm has no room "
                "for a bend of 2 mm\n"
                "  expected: a flange wider than 2 mm and the sheet together\n"
                "  to mend: make the flange wider, or the radius smaller"
            ),
        ],
        id="flange-all-bend",
    ),
]


@pytest.mark.parametrize(("text", "messages"), CASES)
def test_mistakes_are_told_in_full(complaints, text, messages):
    assert complaints(text) == messages
