"""Kinds that are read and not traced yet."""

import pytest

from benchlay.elements import KINDS

PENDING_KINDS = [kind for kind in KINDS.values() if kind.PENDING is not None]

GOOD = {
    "grating": "size: [30, 30], lines: 1200, orders: {-1: 70 %, 0: 15 %}",
    "prism": "outline: [[0, 0], [20, 0], [0, 20]], glass: SF10",
    "parabola": "focal: 50, off_axis: 90, diameter: 25, metal: gold",
}
NOT_YET = (
    "not yet: this kind is read but cannot be traced by this version",
    "a kind that this version traces",
    "take the element out of the layout; nothing is computed as if it were not there",
)


def test_every_one_is_tried():
    assert set(GOOD) == {kind.KIND for kind in PENDING_KINDS}


@pytest.mark.parametrize("name", GOOD)
def test_good_keys_leave_only_the_kind_itself_to_refuse(complaints, name):
    assert complaints(f"kind: {name}, {GOOD[name]}") == [NOT_YET]


@pytest.mark.parametrize("name", GOOD)
def test_bad_keys_are_refused_besides(complaints, name):
    messages = [message for message, _, _ in complaints(f"kind: {name}, {GOOD[name]}, colour: red")]
    assert messages == [NOT_YET[0], "'colour' is not a key here"]


def test_the_language_s_defaults():
    kinds = {kind.KIND: kind for kind in PENDING_KINDS}

    def default(name, attribute):
        return kinds[name].KEYS[attribute].default

    assert default("prism", "depth_mm") == 25.0
    assert default("grating", "transmissive") is False
