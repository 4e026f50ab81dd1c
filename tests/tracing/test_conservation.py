"""What must stay true of any bench: made-up benches, turned, shifted, reordered, reversed."""

import numpy as np
import pytest
from hypothesis import example, given, settings
from hypothesis import strategies as st

from benchlay.tracing import generations
from tests.tracing.bench import Bench

GLASSES = ("BK7", "fused-silica", "{index: 1.5}")


def tenths(low, high):
    """Numbers with one decimal, so that a found case is short."""
    return st.integers(round(low * 10), round(high * 10)).map(lambda n: n / 10)


@st.composite
def element(draw):
    """One element as (kind, own keys, x, y, z, facing, pitch)."""
    kind, keys = draw(
        st.sampled_from(
            (
                ("window", "diameter: 25, thickness: 5, glass: BK7"),
                ("window", "size: [30, 20], thickness: 4, wedge: 1, wedge_towards: left"),
                ("splitter", "diameter: 25, reflectance: {s: 60 %, p: 40 %}"),
                ("mirror", "diameter: 25, metal: silver"),
                ("mirror", "size: [20, 20], reflectance: 98 %, absorbs: 1 %, back: polished"),
                ("polarizer", "diameter: 25, axis: 30"),
                ("waveplate", "diameter: 25, retardance: quarter, axis: 20"),
                ("lens", "diameter: 25, focal: 60"),
                ("lens", "diameter: 12, focal: -25"),
                ("filter", "diameter: 25, density: OD 0.5"),
                ("cube", "side: 20, reflectance: {s: 90 %, p: 10 %}"),
                ("plate-polarizer", "size: [30, 20]"),
                ("aperture", "opening: 2"),
                ("shutter", "opening: [3, 5]"),
                ("dump", "opening: 6"),
                ("target", "specular: 30 %, diffuse: 40 %"),
                ("screen", "size: [20, 30]"),
            )
        )
    )
    mount = draw(st.sampled_from(("", ", mount: none")))
    place = (draw(tenths(0, 40)), draw(tenths(200, 300)), draw(tenths(95, 105)))
    turn = (draw(st.integers(0, 359)), draw(st.integers(-20, 20)))
    return kind, keys + mount, *place, *turn


@st.composite
def bench(draw):
    """Two sources and up to six elements; the first few stand on the beam."""
    elements = draw(st.lists(element(), min_size=2, max_size=6))
    # Each has its own stretch of the bench: two optics in one place have no order.
    elements = [
        (k, keys, 150 + 100 * i + x, 250 + draw(tenths(-3, 3)) if i < 2 else y, z, a, p)
        for i, (k, keys, x, y, z, a, p) in enumerate(elements)
    ]
    beam = draw(
        st.sampled_from(
            ("waist_radius: 0.5", "waist_radius: 3, m2: 1.5",
             "waist_radius_h: 0.05, waist_radius_v: 1, waist_ahead_h: 200")
        )
    )  # fmt: skip
    state = draw(st.sampled_from(("vertical", "none", "{angle: 30}", "{circular: left}")))
    return elements, beam, state


def written(made, *, turn=0.0, shift=(0.0, 0.0), names=None, also=""):
    """The layout's text, the whole scene turned about the origin and then shifted."""
    elements, beam, state = made
    c, s = np.cos(np.radians(turn)), np.sin(np.radians(turn))

    def at(x, y):
        return f"{c * x - s * y + shift[0]:.15g}, {s * x + c * y + shift[1]:.15g}"

    corners = ", ".join(f"[{at(x, y)}]" for x, y in ((0, 0), (900, 0), (900, 500), (0, 500)))
    lines = [
        f"  {name}: {{kind: {kind}, at: [{at(x, y)}, {z}], facing: {a + turn}, pitch: {p},"
        f" {keys}}}\n"
        for name, (kind, keys, x, y, z, a, p) in zip(
            names or (f"E{i}" for i in range(len(elements))), elements, strict=False
        )
    ]
    return (
        f"bench: {{outline: [{corners}]}}\n"
        "sources:\n"
        f"  red: {{wavelength: 633, power: 1 W, beam: {{{beam}}}, polarization: {state},"
        f" at: [{at(100, 250)}], heading: {turn}, body: {{length: 50, width: 30, height: 30}}}}\n"
        f"  blue: {{wavelength: 488, power: 200 mW, beam: {{waist_radius: 0.4}},"
        f" at: [{at(300, 50)}], heading: {90 + turn}, body: none}}\n"
        "elements:\n" + "".join(lines) + also
    )


STATES = "states:\n  less: {elements.E0.out: yes}\n  aside: {elements.E1.offset: [0, 1, -0.5]}\n"


PLATE = "diameter: 25, thickness: 5, glass: BK7"
SLIVERS = (
    [
        ("window", PLATE, 150.0, 250.0, 95.0, 0, 0),
        ("window", PLATE, 250.0, 251.2, 95.0, 154, 5),
        ("window", PLATE + ", mount: none", 350.0, 235.1, 95.1, 2, 1),
    ],
    "waist_radius: 0.5",
    "{angle: 30}",
)
"""Outlines come near enough to be looked at, and no ray of the cross-section meets any."""


@settings(max_examples=40)
@given(bench())
@example(SLIVERS)
def test_every_state_closes_without_nonsense(made):
    seen = Bench(written(made, also=STATES), floor=1e-7)
    for state in seen.states:
        sinks = seen.sinks(state)
        assert sum(sinks.values()) == pytest.approx(seen.emitted(state), rel=1e-9)
        assert min(sinks.values()) >= 0.0
    beams = seen.trace.beams
    assert np.isfinite(beams.start.coherency).all()
    assert np.isfinite(beams.start.moments).all()
    assert (seen.trace.ledger.power >= 0.0).all()
    k, e = beams.start.direction, beams.start.axis
    assert np.abs(np.einsum("ij,ij->i", k, k) - 1).max() < 1e-12
    assert np.abs(np.einsum("ij,ij->i", e, e) - 1).max() < 1e-12
    assert np.abs(np.einsum("ij,ij->i", k, e)).max() < 1e-12
    j = beams.start.coherency
    assert (j[0] * j[1] - j[2] ** 2 - j[3] ** 2 >= -1e-12 * (j[0] + j[1]) ** 2).all()


@settings(max_examples=15)
@given(bench())
def test_the_same_layout_gives_the_same_bits(made):
    first, second = (Bench(written(made, also=STATES), floor=1e-7) for _ in range(2))
    for a, b in zip(first.trace.ledger, second.trace.ledger, strict=True):
        assert (a == b).all()


@settings(max_examples=15)
@given(bench())
def test_the_order_of_the_file_changes_nothing(made):
    elements, *rest = made
    names = [f"E{i}" for i in range(len(elements))]
    plain = Bench(written(made), floor=1e-7)
    mixed = Bench(written((elements[::-1], *rest), names=names[::-1]), floor=1e-7)
    for a, b in zip(plain.trace.ledger, mixed.trace.ledger, strict=True):
        assert (a == b).all()


def _without_horizon(seen):
    """Sinks, the floor counted as escaped: how far it reaches goes by the bench's box."""
    sinks = seen.sinks()
    sinks["escaped", None] = sinks.get(("escaped", None), 0.0) + sinks.pop(("wall", "floor"), 0.0)
    return sinks


@settings(max_examples=25)
@given(bench(), st.sampled_from((90.0, 37.0, 200.0)), st.sampled_from(((0, 0), (331.5, -78.25))))
def test_turning_and_shifting_the_bench_changes_no_power_and_no_length(made, turn, shift):
    plain = Bench(written(made), floor=1e-6)
    turned = Bench(written(made, turn=turn, shift=shift), floor=1e-6)
    there = _without_horizon(turned)
    for key, watts in _without_horizon(plain).items():
        assert there.get(key, 0.0) == pytest.approx(watts, rel=1e-6, abs=2e-6), key
    assert turned.trace.beams.length[:2] == pytest.approx(plain.trace.beams.length[:2], abs=1e-8)


def test_a_black_thing_far_away_changes_nothing():
    elements = [
        ("splitter", "diameter: 25, reflectance: 50 %, mount: none", 300, 250, 100, 135, 0),
        ("target", "size: [30, 30], mount: none", 600, 250, 100, 180, 0),
    ]
    made = (elements, "waist_radius: 0.5", "vertical")
    plain = Bench(written(made))
    far = (
        "  K: {kind: obstacle, at: [800, 30], facing: 0, outline: [[0, 0], [20, 0], [20, 20],"
        " [0, 20]], to_height: 150}\n"
    )
    more = Bench(written(made, also=far))
    assert more.sinks() == plain.sinks()


def test_two_mirrors_that_lose_nothing_meet_the_bound_and_say_so(monkeypatch):
    monkeypatch.setattr(generations, "MOST_BATCHES", 150)
    mirror = "kind: mirror, size: [20, 20], reflectance: 100 %, mount: none"
    text = (
        "bench: {size: [900, 500]}\n"
        "sources:\n"
        "  red: {wavelength: 633, power: 1 W, beam: {waist_radius: 2}, polarization: none,"
        " at: [250, 250], heading: 0, body: none}\n"
        "elements:\n"
        f"  A: {{{mirror}, at: [300, 250], facing: 180}}\n"
        f"  B: {{{mirror}, at: [200, 250], facing: 0}}\n"
    )
    seen = Bench(text, floor=1e-9)
    assert seen.trace.bounded.all()
    assert sum(seen.sinks().values()) == pytest.approx(seen.emitted(), rel=1e-9)
    assert seen.sink("below-floor") == pytest.approx(1.0, rel=1e-6)


def _towards(k):
    """The keys that send a source along a unit vector."""
    heading = np.degrees(np.arctan2(k[1], k[0]))
    return f"heading: {heading:.17g}, pitch: {np.degrees(np.arcsin(k[2])):.17g}"


def _folds(reverse):
    """A route through windows and mirrors, or the same met from its far end."""
    text = (
        "  A: {kind: mirror, at: [400, 250], facing: 135, size: [40, 40], reflectance: 90 %,"
        " mount: none}\n"
        "  W: {kind: window, at: [400, 320], facing: 250, size: [40, 40], thickness: 5, wedge: 2,"
        " wedge_towards: right, glass: BK7, mount: none}\n"
        "  F: {kind: window, at: [401, 380], facing: 290, size: [40, 40], thickness: 5, pitch: 4,"
        " glass: SF10, mount: none}\n"
    )
    head = (
        "bench: {{size: [900, 600]}}\nsources:\n"
        "  red: {{wavelength: 633, power: 1 W, beam: {{waist_radius: 1}}, polarization: none,"
        " at: [{0:.17g}, {1:.17g}, {2:.17g}], {3}, body: none}}\n"
        "elements:\n"
    )
    forth = Bench(head.format(100, 250, 100, "heading: 0") + text, floor=1e-4)
    out = next(b for b in forth.from_("F.back") if b.event == "transmitted")
    if not reverse:
        return forth, out
    far = out.start + 100 * out.k
    back = Bench(head.format(*far, _towards(-out.k)) + text, floor=1e-4)
    return back, back.from_("A.front", "reflected")[0]


def test_a_route_reversed_has_the_same_path_and_transmission():
    _, out = _folds(reverse=False)
    _, back = _folds(reverse=True)
    assert back.k == pytest.approx([-1, 0, 0], abs=1e-9)
    assert back.start == pytest.approx([400, 250, 100], abs=1e-7)
    # Light starts 300 mm before A; backwards 100 mm before F.
    n = out.index
    assert back.path - 100 * n == pytest.approx(out.path - 300 * n, abs=1e-7)


@pytest.mark.parametrize("polarization", ["vertical", "horizontal"])
def test_transmission_is_the_same_both_ways(polarization):
    """In plan s and p do not mix, so one polarization has one transmission."""
    text = (
        "  W: {kind: window, at: [400, 250], facing: 220, size: [60, 60], thickness: 5, wedge: 3,"
        " wedge_towards: right, glass: SF11, mount: none}\n"
    )
    head = (
        "bench: {{size: [900, 600]}}\nsources:\n"
        "  red: {{wavelength: 633, power: 1 W, beam: {{waist_radius: 1}}, polarization: {4},"
        " at: [{0:.17g}, {1:.17g}, {2:.17g}], {3}, body: none}}\n"
        "elements:\n"
    )
    forth = Bench(head.format(100, 250, 100, "heading: 0", polarization) + text, floor=1e-4)
    out = next(b for b in forth.from_("W.back") if b.event == "transmitted")
    far = out.start + 100 * out.k
    back = Bench(head.format(*far, _towards(-out.k), polarization) + text, floor=1e-4)
    returned = next(b for b in back.from_("W.front") if b.event == "transmitted")
    assert returned.k == pytest.approx([-1, 0, 0], abs=1e-9)
    assert returned.power == pytest.approx(out.power, rel=1e-12)
