"""What faces nowhere is told in the same run as what cannot be read."""

import pytest

BROKEN = "  X: {kind: mirrr, at: [1, 1]}\n"
NOWHERE = (
    "b.yaml:5:3: error: elements.W: nothing says which way it faces, and no beam is known to "
    "arrive\n"
    "  expected: 'facing', or 'after' with the item the beam comes from\n"
    "  to mend: add 'facing: 90', or 'after'"
)


def test_together_with_other_mistakes(complaints, laser):
    window = "elements:\n  W: {kind: window, at: [400, 450], diameter: 25}\n"
    first, second = complaints(laser + window + BROKEN)
    assert first == NOWHERE
    assert "'mirrr' is not a kind of element" in second


@pytest.mark.parametrize("way", ["turn: left 90", "aim: [1, 2]", "incidence: 30"])
def test_what_is_turned_by_a_beam_needs_one(complaints, laser, way):
    keys = f"kind: mirror, metal: gold, at: [400, 450], diameter: 25, {way}"
    (problem,) = complaints(f"{laser}elements:\n  M: {{{keys}}}\n")
    key, _, value = way.partition(": ")
    where = len("  M: {" + keys) - len(value) + 1
    assert problem == (
        f"b.yaml:5:{where}: error: elements.M: '{key}' needs to know which beam arrives\n"
        "  expected: 'after' with the item the beam comes from\n"
        "  to mend: add 'after', or use 'facing'"
    )


PANEL = (
    "enclosure: {panels: {p: {from: [0, 0], to: [9, 0], "
    "openings: {o: {along: 2, height: 9, diameter: 2}}}}}\n"
)


@pytest.mark.parametrize(
    "keys",
    [
        "kind: window, at: [400, 450], diameter: 25, facing: 0",
        "kind: window, after: green, distance: 90, diameter: 25",
        "kind: window, in: p.o, diameter: 25",
        "kind: tube, at: [400, 450], bore: 5, to: [500, 450]",
    ],
)
def test_one_of_them_is_enough(complaints, laser, keys):
    assert complaints(f"{laser}elements:\n  W: {{{keys}}}\n{PANEL}") == []


def test_a_route_does_not_say_which_way_its_items_face(complaints, laser):
    window = "elements:\n  W: {kind: window, at: [400, 450], diameter: 25}\n"
    found = complaints(f"{laser}{window}routes: {{r: [green, W]}}\n")
    assert len([problem for problem in found if "faces" in problem]) == 1
