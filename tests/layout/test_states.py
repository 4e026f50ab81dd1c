"""States: what they set, what is read again, and what stays the same object."""

import pytest

REST = (
    "elements:\n"
    "  M1: {kind: mirror, diameter: 25, metal: silver, "
    "after: green, distance: 100, turn: left 90}\n"
    "  S1: {kind: shutter, after: M1, distance: 50, opening: 8}\n"
    "enclosure:\n"
    "  panels: {south: {from: [0, 0], to: [9, 0]}, west: {from: [0, 9], to: [0, 0]}}\n"
    "  lids: {top: {height: 300, outline: [[0, 0], [9, 0], [9, 9]]}}\n"
    "limits: {clip: 2 %}\n"
)


@pytest.fixture
def state(layout_of, laser):
    def read(keys):
        return layout_of(laser + REST + f"states: {{s: {{{keys}}}}}\n", "s")

    return read


def test_as_drawn_comes_first(laser):
    from benchlay.layout import read_layout

    source, _ = read_layout(laser + "states: {b: {}, a: {}}\n", "b.yaml")
    assert list(source.layouts) == ["as drawn", "b", "a"]
    assert source.as_drawn.state == "as drawn"


def test_keys_of_every_item(state):
    found = state(
        "sources.green.power: 2 mW, sources.green.beam.m2: 2, elements.S1.closed: yes, "
        "elements.M1.out: yes, enclosure.panels.south.open: yes, enclosure.lids.top.open: yes, "
        "limits.time_base: 0.25 s"
    )
    assert found.state == "s"
    assert found.sources["green"].lines[0].power_w == 0.002
    assert found.sources["green"].beam.waists(532.0).m2_1 == 2.0
    assert found.elements["S1"].record.closed
    assert found.elements["M1"].stand.out
    assert found.enclosure.panels["south"].open
    assert not found.enclosure.panels["west"].open
    assert found.enclosure.lids["top"].open
    assert (found.limits.time_base_s, found.limits.clip) == (0.25, 0.02)
    assert found.limits.overridden == ("time_base", "clip")
    assert found.overridden == {
        "sources.green": {"power", "beam"},
        "elements.S1": {"closed"},
        "elements.M1": {"out"},
        "enclosure.panels.south": {"open"},
        "enclosure.lids.top": {"open"},
        "limits": {"time_base"},
    }


def test_what_a_state_leaves_alone_is_not_read_again(laser):
    from benchlay.layout import read_layout

    source, _ = read_layout(laser + REST + "states: {s: {elements.M1.out: yes}}\n", "b.yaml")
    drawn, changed = source.as_drawn, source.layouts["s"]
    assert changed.elements["S1"] is drawn.elements["S1"]
    assert changed.sources["green"] is drawn.sources["green"]
    assert changed.enclosure is drawn.enclosure
    assert not drawn.elements["M1"].stand.out


def test_one_way_of_turning_takes_the_place_of_another(state):
    stand = state("elements.M1.facing: 30").elements["M1"].stand
    assert stand.turn is None
    assert stand.facing is not None


def test_one_place_takes_the_place_of_another(state):
    stand = state("elements.M1.at: [3, 4]").elements["M1"].stand
    assert (stand.at_mm, stand.distance_mm) == ((3.0, 4.0), None)
    assert stand.after[0].item == "green"


def test_pulses_take_the_place_of_power(state):
    found = state("sources.green.pulse: {energy: 1 mJ, duration: 8 ns, rate: 10 Hz}")
    assert found.sources["green"].lines[0].pulse.energy_j == 1e-3


def test_a_table_and_a_key_in_it_whatever_their_order(state):
    keys = ["sources.green.beam.m2: 3", "sources.green.beam: {waist_radius: 1, m2: 2}"]
    for order in (keys, keys[::-1]):
        waists = state(", ".join(order)).sources["green"].beam.waists(532.0)
        assert (waists.radius_1_mm, waists.m2_1) == (1.0, 3.0)


def test_places_point_into_the_state(state):
    spans = state("elements.M1.out: yes").elements["M1"].spans
    assert str(spans["out"]) == "b.yaml:11:31"
    assert str(spans["turn"]) == "b.yaml:5:86"


def test_limits_may_be_set_where_the_layout_states_none(layout_of, laser):
    layout = layout_of(laser + "states: {s: {limits.time_base: 0.25 s}}\n", "s")
    assert layout.limits.time_base_s == 0.25


def test_references_of_changed_items_are_checked(complaints, laser):
    text = (
        laser
        + REST
        + "states: {s: {elements.M1.facing: M9, enclosure.panels.south.material: steel}}\n"
    )
    assert [c.splitlines()[0] for c in complaints(text)] == [
        "b.yaml:11:34: error: elements.M1: there is no source or element named 'M9'",
        "b.yaml:11:71: error: enclosure.panels.south: there is no material named 'steel'",
    ]
