"""Running dimensions from the datum: what they measure, where their figures stand."""

import itertools
from io import StringIO

import ezdxf
import pytest
import trial_bench

from benchlay.sheets.contents import Item
from benchlay.sheets.dimensions import figure_box
from benchlay.sheets.plan import compose
from benchlay.sheets.plan.setting_out import _apart
from benchlay.sheets.primitives import Axis, Dimension, label_of, measured
from benchlay.writers import dxf
from benchlay.writers.dimension_lines import running_figure, take_apart

DATUM = (25.0, 25.0)


def running(sheet):
    return [p for p in sheet.model if isinstance(p, Dimension) and p.running]


@pytest.fixture(scope="module")
def sheet():
    return compose(trial_bench.picture(legs=(), panels=(), zones=()))


def test_every_place_of_an_element_is_measured_from_the_datum(sheet):
    for axis, n in ((Axis.HORIZONTAL, 0), (Axis.VERTICAL, 1)):
        found = [measured(d) for d in running(sheet) if d.axis is axis]
        places = {round(item.at[n] - DATUM[n], 6) for item in trial_bench.items()} - {0.0}
        assert sorted(found) == pytest.approx(sorted(places), abs=1e-9)


def test_a_reader_of_dxf_measures_the_same_to_a_millionth(sheet):
    doc = ezdxf.read(StringIO(dxf.write(sheet).decode()))
    read = sorted(d.get_measurement() for d in doc.modelspace().query("DIMENSION"))
    drawn = sorted(measured(d) for d in sheet.model if isinstance(d, Dimension))
    assert read == pytest.approx(drawn, abs=1e-6)
    assert not doc.audit().errors


def test_figures_keep_apart(sheet):
    boxes = [figure_box(d, sheet) for d in running(sheet)]
    for a, b in itertools.combinations(boxes, 2):
        assert not (a.left < b.right and b.left < a.right and a.low < b.high and b.low < a.high)


def test_figures_stay_in_order_and_as_near_as_the_others_let_them():
    assert _apart([0.0, 10.0, 20.0]) == [0.0, 10.0, 20.0]
    assert _apart([10.0, 10.0]) == pytest.approx([8.2, 11.8])
    spread = _apart([0.0, 10.0, 10.1, 10.2, 13.0])
    assert all(b - a >= 3.6 - 1e-9 for a, b in itertools.pairwise(spread))
    assert spread[0] == 0.0


def test_a_place_before_the_datum_says_so():
    early = Item("X1", "obstacle", (5.0, 300.0, 100.0), 0.0)
    drawn = compose(trial_bench.picture(items=(early,), legs=(), panels=(), zones=()))
    assert "-20" in {label_of(d, ",") for d in running(drawn)}


def test_the_figure_stands_square_to_the_line_beyond_it():
    dimension = Dimension(
        "DIMENSIONS",
        Axis.HORIZONTAL,
        (0.0, 0.0),
        (100.0, 0.0),
        (0.0, 50.0),
        running=True,
        figure_aside_mm=2.0,
    )
    parts = take_apart(dimension, 5.0, ",")
    assert (parts.text.text, parts.text.rotation_deg) == ("100", 90.0)
    # 2 mm along and 4 mm beyond the line's end on paper, five times that in the model.
    assert parts.text.at == running_figure(dimension, 5.0) == (110.0, 70.0)
    assert len(parts.arrows) == 1


def test_where_there_is_no_room_there_are_none():
    many = tuple(Item(f"P{n}", "obstacle", (30.0 + n, 300.0, 100.0), 0.0) for n in range(200))
    drawn = compose(trial_bench.picture(items=many, legs=(), panels=(), zones=()))
    assert [d.axis for d in running(drawn)] == [Axis.VERTICAL]
