"""Routes: items with the meaning of what follows the dot."""

ELEMENTS = (
    "elements:\n"
    "  M1: {kind: mirror, diameter: 25, metal: silver, after: green, distance: 100}\n"
    "  B: {kind: splitter, diameter: 25, reflectance: 50 %, after: M1, distance: 100}\n"
    "  T: {kind: target, after: B.reflected, distance: 100}\n"
    "  east: {kind: window, diameter: 25, after: B.transmitted, distance: 100}\n"
    "enclosure:\n"
    "  panels:\n"
    "    east: {from: [0, 0], to: [9, 0], openings: {port: {along: 4, height: 100, diameter: 3}}}\n"
    "routes:\n"
)


def items(layout):
    return [(i.name, i.branch, i.wavelength_nm, i.opening) for i in layout.routes["r"].items]


def test_branches_lines_and_scattered_light(layout_of, laser):
    layout = layout_of(laser + ELEMENTS + "  r: [green.532, M1, B.reflected, T.scattered, east]\n")
    assert items(layout) == [
        ("green", None, 532.0, None),
        ("M1", None, None, None),
        ("B", "reflected", None, None),
        ("T", "scattered", None, None),
        ("east", None, None, None),
    ]
    assert str(layout.routes["r"].items[2].span) == "b.yaml:13:22"


def test_an_opening_as_last_item_even_if_an_element_has_the_panels_name(layout_of, laser):
    layout = layout_of(laser + ELEMENTS + "  r: [green, M1, east.port]\n")
    assert items(layout)[-1] == ("east", None, None, ("east", "port"))


def test_the_branch_of_the_last_item_may_be_left_out(layout_of, laser):
    assert items(layout_of(laser + ELEMENTS + "  r: [green, M1, B]\n"))[-1][0] == "B"


def test_repeated_runs_are_written_out(layout_of, laser):
    layout = layout_of(
        laser + ELEMENTS + "  r: [green, {times: 3, through: [M1, B.reflected]}, T]\n"
    )
    assert [i.name for i in layout.routes["r"].items] == ["green", *["M1", "B"] * 3, "T"]


def test_a_route_of_exactly_as_many_items_as_allowed(layout_of, laser):
    run = "{times: 1000, through: [" + ", ".join(["M1"] * 9) + "]}, {times: 999, through: [M1]}"
    layout = layout_of(laser + ELEMENTS + f"  r: [green, {run}]\n")
    assert len(layout.routes["r"].items) == 10_000


def test_needs(layout_of, laser):
    needs = (
        "{transmits: 90 %, power: 20 mW, polarization: "
        "{angle: 0, within: 2}, path: {is: 812, within: 2}}"
    )
    layout = layout_of(laser + ELEMENTS + f"  r: {{path: [green, M1], needs: {needs}}}\n")
    found = layout.routes["r"].needs
    assert (found.transmits, found.power_w, found.path.is_mm, found.path.within_mm) == (
        0.9,
        0.02,
        812.0,
        2.0,
    )
    assert layout.not_yet == ()
