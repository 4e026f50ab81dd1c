"""Where one mirror could throw a beam out: closed forms, and a referee that throws mirrors in.

The referee holds flat mirrors at random points of the beam, each turned at random, reflects the
beam there by the law of reflection, and follows the reflected ray in small steps against the
boxes that the enclosure is made of. It shares no geometry with what is tested. Set
BENCHLAY_MIRRORS=100000 for as many mirrors as one likes.
"""

import math
import os

import numpy as np
import pytest
from boxes import box, context_of, enclosed, gap_named, opening

from benchlay.checks import opening_mirror
from benchlay.coverage.mirrors import Leg, guilty, stretches, within
from benchlay.findings import identify, merge_states
from benchlay.report.model import reported
from benchlay.results.stretches import _stretches

MIRRORS = int(os.environ.get("BENCHLAY_MIRRORS", "5000"))
BEAM = Leg((300.0, 400.0, 100.0), (1.0, 0.0, 0.0), 0.0, 400.0)


def found_on(text, through, leg=BEAM):
    whole = enclosed(text)
    return stretches(whole, gap_named(whole, through), leg)


# ---------------------------------------------------------------------- closed forms


def test_a_thin_slot_is_seen_from_all_of_the_beam():
    """10 wide in a sheet of 2: every point sees it, since the slot looks 78 degrees aside."""
    hole = opening("north", "{along: 500, width: 10, from_height: 50, to_height: 150}")
    assert found_on(box(north=hole), "north.hole") == [(0.0, 400.0)]


def test_a_duct_is_seen_where_its_walls_leave_off():
    """The slot lies at 490 to 500; 100 deep it looks aside by 10 in 100, so by 40 in 400."""
    hole = opening("north", "{along: 500, width: 10, from_height: 50, to_height: 150, depth: 100}")
    ((start, end),) = found_on(box(north=hole), "north.hole")
    # From 400 away the far mouth's farther edge is seen past the near mouth's nearer one.
    assert 300 + start == pytest.approx(490 - 400 * 10 / 100, abs=1e-3)
    assert 300 + end == pytest.approx(500 + 400 * 10 / 100, abs=1e-3)


def test_two_overlapping_sheets_hide_what_is_steep():
    """A sheet 20 inside a slot (490 to 500) from 486 to 540 is passed at its nearer end only."""
    hole = opening("north", "{along: 500, width: 10, from_height: 0, to_height: 300}")
    text = box(north=hole, cover="{from: [540, 778], to: [486, 778]}")
    ((start, end),) = found_on(text, "north.hole")
    assert start == 0.0
    # Past the corner (486, 780) of its outer face to the slot's edge (490, 800): 4 aside in 20.
    assert 300 + end == pytest.approx(490 - 400 * 4 / 20, abs=1e-3)


def test_height_matters():
    """A sheet of 120 before a slot from 0 to 40: over it, from 100 at 400 away, nothing is seen."""
    hole = opening("north", "{along: 0, width: 1000, from_height: 0, to_height: 40}")
    high = box(north=hole, cover="{from: [1000, 778], to: [0, 778], to_height: 120}")
    assert found_on(high, "north.hole") == []
    # The ray from 100 to 40 at the panel is at 43.3 over the sheet.
    low = high.replace("to_height: 120", "to_height: 42")
    assert found_on(low, "north.hole") == [(0.0, 400.0)]


def test_only_what_runs_inside_counts():
    whole = enclosed(box())
    (leg,) = within(whole, (-200.0, 400.0, 100.0), (1.0, 0.0, 0.0), 1500.0)
    assert (leg.from_mm, leg.to_mm) == (200.0, 1200.0)
    slope = math.radians(45)
    (leg,) = within(whole, (300.0, 400.0, 100.0), (math.cos(slope), 0, math.sin(slope)), 900.0)
    assert leg.to_mm == pytest.approx(200 * math.sqrt(2))


# ---------------------------------------------------------------------- the referee


class Boxes:
    """Boxes along the axes, with boxes cut out of them, met in small steps."""

    def __init__(self, solid, holes=()):
        self.solid, self.holes = np.array(solid, dtype=float), np.array(holes, dtype=float)

    def hit(self, points):
        inside = self._any(self.solid, points)
        if len(self.holes):
            inside &= ~self._any(self.holes, points)
        return inside

    @staticmethod
    def _any(boxes, points):
        low, high = boxes[:, ::2], boxes[:, 1::2]
        return ((points[:, None] > low) & (points[:, None] < high)).all(axis=2).any(axis=1)


def thrown_out(boxes, leg, count, seed, towards):
    """Return from where along the beam random mirrors threw it out of the box.

    Half of the mirrors are turned so that they send the light roughly `towards` a place; the
    others send it anywhere.
    """
    dice = np.random.default_rng(seed)
    ways = dice.uniform(leg.from_mm, leg.to_mm, count)
    points = np.array(leg.start) + ways[:, None] * np.array(leg.direction)
    normal = dice.normal(size=(count, 3))
    aimed = np.arange(count) % 2 == 0
    goal = np.array(towards) + dice.normal(size=(count, 3)) * (25.0, 5.0, 40.0) - points
    goal /= np.linalg.norm(goal, axis=1)[:, None]
    normal[aimed] = (goal - np.array(leg.direction))[aimed]
    normal /= np.linalg.norm(normal, axis=1)[:, None]
    k = np.array(leg.direction)
    way = k - 2.0 * (normal @ k)[:, None] * normal
    alive, out = np.arange(count), np.zeros(count, dtype=bool)
    at = points.copy()
    for _ in range(2000):
        at = at[:] + 0.7 * way[alive]
        stopped = boxes.hit(at)
        gone = ((at < (-60, -60, -40)) | (at > (1060, 860, 340))).any(axis=1) & ~stopped
        out[alive[gone]] = True
        keep = ~(stopped | gone)
        alive, at = alive[keep], at[keep]
        if not len(alive):
            break
    return ways[out]


# x, y, z from and to: bench, lid, four panels. All but the one with the slot are thicker outwards
# than they are, and reach round the corners: steps would slip through where edges only touch.
SHELL = [
    (-30, 1030, -30, 830, -30, 0),
    (-30, 1030, -30, 830, 300, 330),
    (-30, 1030, -30, 0, -30, 330),
    (1000, 1030, -30, 830, -30, 330),
    (-30, 1030, 800, 802, -30, 330),
    (-30, 0, -30, 830, -30, 330),
]
CASES = {
    "a slot of 10": (
        {"north": opening("north", "{along: 500, width: 10, from_height: 50, to_height: 150}")},
        SHELL,
        [(490, 500, 799, 803, 50, 150)],
    ),
    "a slot of 10 behind a sheet that overlaps on one side": (
        {
            "north": opening("north", "{along: 500, width: 10, from_height: 0, to_height: 300}"),
            "cover": "{from: [540, 778], to: [486, 778]}",
        },
        [*SHELL, (486, 540, 778, 780, 0, 300)],
        [(490, 500, 799, 803, 0, 300)],
    ),
    "a slot of 10 in a full labyrinth": (
        {
            "north": opening("north", "{along: 500, width: 10, from_height: 0, to_height: 300}"),
            "cover": "{from: [640, 788], to: [350, 788]}",
        },
        [*SHELL, (350, 640, 788, 790, 0, 300)],
        [(490, 500, 799, 803, 0, 300)],
    ),
}


@pytest.mark.parametrize("what", CASES)
def test_the_referee_agrees(what):
    panels, solid, holes = CASES[what]
    mine = found_on(box(**panels), "north.hole")
    thrown = thrown_out(Boxes(solid, holes), BEAM, MIRRORS, 20261201, (495.0, 801.0, 100.0))
    slack = 2.0  # mm: the referee's steps of 0.7 cut corners
    for way in thrown.tolist():
        assert any(start - slack <= way <= end + slack for start, end in mine), way
    # and it finds what is claimed: some throw from every tenth of every stretch of 20 or more
    for start, end in mine:
        if end - start >= 20.0:
            for n in range(10):
                low, high = (start + (end - start) * m / 10 for m in (n, n + 1))
                assert ((thrown >= low - slack) & (thrown <= high + slack)).any(), (low, high)


# ---------------------------------------------------------------------- the check

SLOT = opening("north", "{along: 500, width: 10, from_height: 50, to_height: 150}")


def fired(text, variant=0):
    return list(opening_mirror.check(context_of(text), variant))


def test_a_seeded_gap_of_10_is_found_and_a_labyrinth_passes():
    (finding,) = fired(box(north=SLOT))
    assert (finding.element, finding.key) == ("north", ("north.hole",))
    assert finding.value == pytest.approx(0.05)
    assert fired(box()) == []


def test_the_remedy_names_an_overlap_that_is_enough():
    (finding,) = fired(box(north=SLOT))
    spacing, overlap = (
        float(finding.remedy.split(before)[1].split(" mm")[0])
        for before in ("a sheet ", "overlaps it by ")
    )
    y = 800 - spacing - 2  # its outer face is that far from the panel
    low, high, top = 490 - overlap, 500 + overlap, 150 + overlap

    def cover(by):
        return f"{{from: [{high - by!r}, {y}], to: [{low + by!r}, {y}], to_height: {top!r}}}"

    assert fired(box(north=SLOT, cover=cover(0.0))) == []
    assert fired(box(north=SLOT, cover=cover(4.0)))


TUBED = (
    "  B1: {kind: tube, at: [300, 400], to: [690, 400], bore: 20}\n"
    "  T1: {kind: target, after: B1, distance: 0.5}\n"
)


def test_a_beam_in_a_tube_is_exempt():
    """What is left outside of the tube is half a millimetre before the target."""
    duct = opening("north", "{along: 500, width: 10, from_height: 50, to_height: 150, depth: 100}")
    routes = "routes: {main: [red, B1, T1]}\n"
    assert fired(box(north=duct, elements=TUBED, routes=routes)) == []
    assert fired(box(north=duct))


@pytest.mark.parametrize(("power", "fires"), [("4.99 mW", False), ("5.01 mW", True)])
def test_it_is_for_beams_above_class_3r(power, fires):
    """5 mW is the limit of class 3R in the visible."""
    assert bool(fired(box(north=SLOT, power=power))) == fires


def test_a_body_in_the_way_counts():
    block = (
        "  T1: {kind: target, after: red, distance: 400}\n"
        "  K: {kind: obstacle, at: [500, 700], facing: 0, from_height: 0, to_height: 290,\n"
        "      outline: [[-400, -5], [400, -5], [400, 5], [-400, 5]]}\n"
    )
    assert fired(box(north=SLOT, elements=block)) == []
    assert fired(box(north=SLOT, elements=block.replace("to_height: 290", "to_height: 20")))


PORT = opening("north", "{along: 500, height: 100, diameter: 25}")
PLAIN = "  T1: {kind: target, after: red, distance: 400}\n"


@pytest.mark.parametrize(
    ("element", "fires"),
    [
        ("{kind: screen, in: north.hole, size: [26, 26]}", False),
        ("{kind: screen, in: north.hole, size: [26, 20], mount: none}", True),  # does not fill it
        ("{kind: window, in: north.hole, diameter: 25.4, mount: none}", True),
        ("{kind: filter, in: north.hole, diameter: 25.4, density: 1.1, mount: none}", True),
        ("{kind: filter, in: north.hole, diameter: 25.4, density: 2.2, mount: none}", False),
        ("{kind: filter, in: north.hole, diameter: 24, density: 2.2, mount: none}", True),
    ],
)
def test_what_fills_an_opening(element, fires):
    """50 mW and a limit of 385 uW for looking on: a density of 2.11 is needed."""
    assert bool(fired(box(north=PORT, elements=f"{PLAIN}  W: {element}\n"))) == fires


def test_what_glass_lets_through_is_told():
    dim = "  W: {kind: filter, in: north.hole, diameter: 25.4, density: 1, mount: none}\n"
    (finding,) = fired(box(north=PORT, elements=PLAIN + dim))
    assert finding.value == pytest.approx(5e-3, rel=1e-9)
    assert finding.limit == pytest.approx(3.85e-4, rel=1e-3)
    assert "through 'north.hole' and 'W' in it" in finding.message


def test_the_stretches_of_a_finding():
    duct = opening("north", "{along: 500, width: 10, from_height: 50, to_height: 150, depth: 100}")
    context = context_of(box(north=duct))
    (merged,) = merge_states(identify(opening_mirror.check(context, 0)))
    (stretch,) = _stretches(context, reported(merged))
    assert stretch.from_ == pytest.approx((450, 400, 100), abs=1e-3)
    assert stretch.to == pytest.approx((540, 400, 100), abs=1e-3)


def test_a_slit_between_two_bodies():
    """Two blocks, y 695 to 705, leave x 500 to 503; the slot in the wall is 490 to 500."""
    blocks = "".join(
        f"  {name}: {{kind: obstacle, at: [{x}, 700], facing: 0, to_height: 299, from_height: 0,\n"
        f"      outline: [[0, -5], [{width}, -5], [{width}, 5], [0, 5]]}}\n"
        for name, x, width in (("K1", 10, 490), ("K2", 503, 490))
    )
    plain = "  T1: {kind: target, after: red, distance: 400}\n"
    context = context_of(box(north=SLOT, elements=plain + blocks))
    (merged,) = merge_states(identify(opening_mirror.check(context, 0)))
    (stretch,) = _stretches(context, reported(merged))
    # Straight through at 500; and by the corners (503, 695) and (490, 802) at the most.
    assert stretch.from_ == pytest.approx((500, 400, 100), abs=1e-3)
    assert stretch.to == pytest.approx((503 + 295 * 13 / 107, 400, 100), abs=1e-3)


def test_no_leg_of_no_length_is_guilty():
    whole = enclosed(box(north=SLOT))
    assert guilty(whole, gap_named(whole, "north.hole"), BEAM)
    assert within(whole, (300.0, 900.0, 100.0), (1.0, 0.0, 0.0), 50.0) == []
