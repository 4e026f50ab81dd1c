"""A black panel added makes no zone larger outside it, and an opening makes none smaller."""

import shapely
from hypothesis import given, settings
from hypothesis import strategies as st
from test_sampled import L_ROOM, LID, STEPS, bench
from traced import area_of, traced

from benchlay.zones import controlled_areas, zones_of

# A zone may differ by what the widths of slits and the clearances over edges are: thousandths
# of a millimetre along edges of some metres, and sharp corners are cut where they are closed.
_ROUNDING_MM = 0.05
_BLACK = "    materials: {black: {thickness: 2, diffuse: 0, specular: 0}}\n"
_SIDES = {
    "s": ((0, 0), (1000, 0)),
    "e": ((1000, 0), (1000, 600)),
    "n": ((1000, 600), (0, 600)),
    "w": ((0, 600), (0, 0)),
}


def area(panels, more):
    written = "".join(f"        {name}: {panel}\n" for name, panel in panels.items())
    text = f"{_BLACK}    enclosure:\n      material: black\n"
    text += f"      panels:\n{written}" if panels else ""
    text += LID if more == "lid" else STEPS if more == "steps" else ""
    text += L_ROOM if more == "room" else ""
    found = zones_of(traced(bench("").rstrip(" ") + text, floor=1e-6))
    # Whatever the kind: what is inside an enclosure and what is over it change with its line.
    polygons = [shapely.Polygon(a.polygon[0], a.polygon[1:]) for a in controlled_areas(found)]
    both = shapely.union_all(polygons)
    assert shapely.symmetric_difference(both, area_of(found)).area < 1.0
    return both


def written(ends, high, opening=""):
    (ax, ay), (bx, by) = ends
    return f"{{from: [{ax}, {ay}], to: [{bx}, {by}], to_height: {high}{opening}}}"


def larger(first, second):
    """Whether the first area has a part that the second has not, for more than rounding."""
    beyond = shapely.difference(first, shapely.buffer(second, _ROUNDING_MM))
    return beyond.area > 1.0


_whole = st.integers
_end = st.tuples(_whole(-300, 1400), _whole(-300, 1000))
_sides = st.dictionaries(st.sampled_from(sorted(_SIDES)), _whole(130, 900))
_more = st.sampled_from(["", "lid", "steps", "room"])


@settings(max_examples=25, deadline=None, derandomize=True)
@given(_sides, _more, st.tuples(_end, _end), st.tuples(_whole(0, 10), _whole(20, 1500)))
def test_a_black_panel_makes_nothing_larger(sides, more, ends, heights):
    (start, end), (low, high) = ends, heights
    if start == end:
        return
    panels = {name: written(_SIDES[name], top) for name, top in sides.items()}
    added = {**panels, "x": written((start, end), high + low, f", from_height: {low}")}
    sheet = shapely.LineString([start, end]).buffer(3.0)
    assert not larger(area(added, more).difference(sheet), area(panels, more))


@settings(max_examples=25, deadline=None, derandomize=True)
@given(
    _sides.filter(bool),
    _more,
    st.booleans(),
    st.tuples(_whole(10, 450), _whole(10, 90), _whole(0, 95)),
)
def test_an_opening_makes_nothing_smaller(sides, more, is_round, place):
    along, size, low = place
    name = min(sides)
    panels = {side: written(_SIDES[side], top) for side, top in sides.items()}
    shape = (
        f"{{along: {along + size}, height: {low + 15}, diameter: {min(size, 2 * low + 30)}}}"
        if is_round
        else f"{{along: {along}, width: {size}, from_height: {low}, to_height: {low + 30}}}"
    )
    hole = f", openings: {{hole: {shape}}}"
    opened = {**panels, name: written(_SIDES[name], sides[name], hole)}
    assert not larger(area(panels, more), area(opened, more))


@settings(max_examples=20, deadline=None, derandomize=True)
@given(_sides.filter(bool), _more)
def test_a_panel_that_stands_open_makes_nothing_smaller(sides, more):
    panels = {side: written(_SIDES[side], top) for side, top in sides.items()}
    name = min(sides)
    opened = {**panels, name: written(_SIDES[name], sides[name], ", open: yes")}
    assert not larger(area(panels, more), area(opened, more))
