"""Sinks that the other scenes leave out, each with a share beside the chief ray or a loss."""

import numpy as np

from tests.tracing.bench import Bench, layout, power, scene
from tests.tracing.referee import gauss
from tests.tracing.scenes.cuts import NM, WALL, _high
from tests.tracing.scenes.plates import N

BLACK = "materials: {black: {thickness: 2, diffuse: 0.1, specular: 0}}\n"
FAR = "  X: {kind: dump, at: [1400, 100, 1000], facing: 90}\n"


@scene
def lossy_mirror():
    """What the coating swallows, what leaks into the ground back, what is reflected."""
    for polarization in ("vertical", "horizontal"):
        text = (
            "  M: {kind: mirror, after: laser, distance: 300, turn: left 90, size: [80, 80],"
            " reflectance: 70 %, absorbs: 10 %, glass: {index: 1.5}, mount: none}\n"
        )
        bench = Bench(layout(text, polarization=polarization))
        yield power("reflected", bench.from_("M.front", "reflected")[0].power, 0.7)
        yield power("leaks", bench.from_("M.front", "transmitted")[0].power, 0.2)
        yield power("swallowed and ground", bench.sink("absorbed", "M"), 0.3)
    polished = text.replace("mount", "back: polished, mount")
    bench = Bench(layout(polished + "  X: {kind: dump, at: [900, 100], facing: 90}\n"))
    from tests.tracing.referee.fresnel import powers

    rs, _ = powers(1.0, 1.5, np.radians(45))
    # Bounces inside: the back sends rs, the front 0.7 of that and swallows 0.1.
    yield power("behind", sum(b.power for b in bench.outside("M") if b.left == "M.back"),
                0.2 * (1 - rs) / (1 - 0.7 * rs))  # fmt: skip
    yield power("swallowed", bench.sink("absorbed", "M"), 0.1 + 0.2 * rs * 0.1 / (1 - 0.7 * rs))


@scene
def shine_of_a_panel():
    text = (
        "materials: {steel: {thickness: 1, diffuse: 0.3, specular: 0.2}}\n"
        "enclosure:\n  material: steel\n  from_height: 900\n  to_height: 1100\n"
        "  panels:\n    east: {from: [1200, 0], to: [1200, 900]}\n"
        "    west: {from: [50, 900], to: [50, 0]}\n"
    )
    bench = Bench(_high(FAR, also=text), floor=1e-15)
    # To and fro between two panels: 0.8 of what meets each lands there.
    yield power("east", bench.sink("panel", "east"), 0.8 / (1 - 0.04))
    yield power("west", bench.sink("panel", "west"), 0.8 * 0.2 / (1 - 0.04))


@scene
def a_target_beside_the_beam():
    text = "  K: {kind: target, at: [500, 472, 1000], facing: 180, size: [40, 40], mount: none}\n"
    bench = Bench(_high(text + WALL, beam="{waist_radius: 3}"), floor=1e-15)
    w = gauss.radius(3, 400, NM)
    share = gauss.between(2, 42, w) * gauss.between(-20, 20, w)
    yield power("beside", bench.sink("target", "K"), share)
    yield power("behind", bench.sink("target", "T"), 1 - share)


@scene
def a_dump_beside_the_beam():
    """Its round opening takes its own, the face of its box the rest of the square."""
    text = "  K: {kind: dump, at: [500, 461, 1000], facing: 180, opening: 20, mount: none}\n"
    bench = Bench(_high(text + WALL, beam="{waist_radius: 3}"), floor=1e-15)
    w = gauss.radius(3, 400, NM)
    hole = gauss.in_circle(10, w, 11)
    square = gauss.between(11 - 15, 11 + 15, w) * gauss.between(-15, 15, w)
    # The chief ray goes into the box, 1 mm past the opening: core and share are one square.
    yield power("opening", bench.sink("dump", "K"), hole)
    yield power("box", bench.sink("body", "K"), square - hole)
    yield power("past", bench.sink("target", "T"), 1 - square)


@scene
def a_dump_that_takes_a_wing():
    text = "  K: {kind: dump, at: [500, 469, 1000], facing: 180, opening: 36, mount: none}\n"
    text = text.replace("mount", "length: 30, mount")
    bench = Bench(_high(text + WALL, beam="{waist_radius: 12}"), floor=1e-15)
    w = gauss.radius(12, 400, NM)
    hole = gauss.in_circle(18, w, 19)
    yield power("opening", bench.sink("dump", "K"), hole)


@scene
def the_bench_under_a_wide_beam():
    """Flow lines that come down to the top before its end at 1400 mm."""
    text = "  K: {kind: target, at: [1495, 450], facing: 180, size: [190, 190], mount: none}\n"
    bench = Bench(layout(text, beam="{waist_radius: 0.005}"), floor=1e-15)
    w = gauss.radius(0.005, 1395, NM)
    under = gauss.beyond(100, gauss.radius(0.005, 1400, NM))
    yield power("bench", bench.sink("bench"), under)
    yield power("target", bench.sink("target", "K"), gauss.between(-95, 95, w) ** 2)


@scene
def a_wall_behind_a_target():
    room = "room: {outline: [[-500, -500], [3000, -500], [3000, 1500], [-500, 1500]]}\n"
    text = "  K: {kind: target, at: [500, 450, 1000], facing: 180, size: [20, 10], mount: none}\n"
    bench = Bench(_high(text, beam="{waist_radius: 6}", also=room), floor=1e-15)
    w = gauss.radius(6, 400, NM)
    on = gauss.between(-10, 10, w) * gauss.between(-5, 5, w)
    yield power("target", bench.sink("target", "K"), on)
    yield power("wall", bench.sink("wall", "wall"), 1 - on)
    up = Bench(_high(FAR, source=", pitch: 85", also=room))
    yield power("ceiling", up.sink("wall", "ceiling"), 1.0)


@scene
def a_lid_over_the_beam():
    lid = BLACK + (
        "enclosure:\n  material: black\n  lids:\n"
        "    main: {height: 300, outline: [[0, 0], [1500, 0], [1500, 900], [0, 900]]}\n"
    )
    up = Bench(layout("  X: {kind: dump, at: [1400, 100], facing: 90}\n",
                      source=", pitch: 30", also=lid))  # fmt: skip
    yield power("lid", up.sink("panel", "main"), 1.0)
    opened = Bench(layout("  X: {kind: dump, at: [1400, 100], facing: 90}\n", source=", pitch: 30",
                          also=lid.replace("main: {", "main: {open: yes, ")))  # fmt: skip
    yield power("open", opened.sink("escaped"), 1.0)


@scene
def what_is_left_below_the_floor():
    text = (
        "  W: {kind: window, after: laser, distance: 300, size: [80, 80],"
        f" glass: {{index: {N}}}, mount: none}}\n"
    )
    bench = Bench(layout(text), floor=0.05)
    r = ((N - 1) / (N + 1)) ** 2
    yield power("below", bench.sink("below-floor"), r + (1 - r) * r)
    yield power("on", bench.sink("escaped"), (1 - r) ** 2)
