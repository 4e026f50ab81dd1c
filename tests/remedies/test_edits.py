import pytest
import yaml

from benchlay.remedies.edits import Edit, apply, pasted

BLOCK = """\
title: a bench   # of ours
elements:
  M1: {kind: mirror, diameter: 25.4}   # the first

  W1:
    kind: window
    front: 1 %   # a poor one
    note: |
      two
      lines
  # what stands behind

routes: {main: [red, M1]}
"""


@pytest.mark.parametrize(
    "edit",
    [
        Edit(("elements",), "S1", "{kind: screen, at: [1, 2]}"),
        Edit(("elements", "M1"), "back", "0.1 %"),
        Edit(("elements", "M1"), "diameter", "50"),
        Edit(("elements", "W1"), "front", "0.25 %"),
        Edit(("elements", "W1"), "wedge", "1"),
        Edit(("routes",), "other", "[red, W1]"),
        Edit(("enclosure", "panels"), "east", "{from: [0, 0], to: [1, 0]}"),
    ],
)
def test_an_edit_changes_what_it_says_and_nothing_else(edit):
    changed = apply(BLOCK, [edit])
    expected = yaml.safe_load(BLOCK)
    node = expected
    for key in edit.path:
        node = node.setdefault(key, {})
    node[edit.key] = yaml.safe_load(edit.value)
    assert yaml.safe_load(changed) == expected
    for comment in ("# of ours", "# the first", "# a poor one", "# what stands behind"):
        assert comment in changed


def test_what_is_pasted_is_what_was_edited():
    edits = [Edit(("elements", "F1"), "incidence", "2"), Edit(("elements", "F1"), "side", "left")]
    edits.append(Edit(("elements",), "S1", "{kind: screen}"))
    assert pasted(edits) == (
        "elements:\n  F1:\n    incidence: 2\n    side: left\n  S1: {kind: screen}"
    )
    assert yaml.safe_load(pasted(edits)) == {
        "elements": {"F1": {"incidence": 2, "side": "left"}, "S1": {"kind": "screen"}}
    }


@pytest.mark.parametrize(
    "text",
    ["elements: {}\n", "elements: {M1: {kind: mirror},}\n", "elements:\n  M1: {kind: mirror}"],
)
def test_odd_ends_of_mappings(text):
    changed = apply(text, [Edit(("elements",), "S1", "{kind: screen}")])
    expected = yaml.safe_load(text)
    expected["elements"]["S1"] = {"kind": "screen"}
    assert yaml.safe_load(changed) == expected


@pytest.mark.parametrize("text", ["[1, 2]\n", "elements: [M1]\n", "elements: 3\n"])
def test_what_is_no_mapping_is_left_alone(text):
    assert apply(text, [Edit(("elements",), "S1", "{kind: screen}")]) is None
