"""Beam tubes and cells: openings, walls from inside and outside, windows, fillings."""

import numpy as np

from tests.tracing.bench import Bench, layout, length, power, scene, vectors
from tests.tracing.referee import gauss, stack
from tests.tracing.referee.fresnel import Ray, at_face, onto, powers, tensor
from tests.tracing.scenes.plates import ALONG, START, STATES

NM = 632.8
TARGET = "  T: {kind: target, at: [1300, 450], facing: 180, size: [300, 150], mount: none}\n"


@scene
def a_tube_takes_what_its_bore_does_not():
    """Entry ring, what the beam widens by inside, and what passes beside the tube."""
    tube = "  B: {kind: tube, at: [300, 450], to: [1200, 450], bore: 2.4, mount: none}\n"
    for waist in (0.9, 0.5):
        beam = f"{{waist_radius: {waist}}}"
        bench = Bench(layout(tube + TARGET, beam=beam), floor=1e-15)
        entry, leave = gauss.radius(waist, 200, NM), gauss.radius(waist, 1100, NM)
        inside = gauss.in_circle(1.2, leave)
        beside = gauss.outside_circle(3.2, entry)
        ring = gauss.in_circle(3.2, entry) - gauss.in_circle(1.2, entry)
        wall = gauss.in_circle(1.2, entry) - inside
        yield power(f"through, w {waist}", bench.sink("target", "T"), inside + beside)
        yield power(f"on the tube, w {waist}", bench.sink("body", "B"), ring + wall)


@scene
def what_meets_a_tube_s_wall_ends_on_it():
    lean = np.radians(10)
    x, y = 300 + 200 * np.cos(lean), 450 + 200 * np.sin(lean)
    askew = f"  B: {{kind: tube, at: [300, 450], to: [{x}, {y}], bore: 20, mount: none}}\n"
    across = "  B: {kind: tube, at: [500, 300], to: [480, 600], bore: 20, mount: none}\n"
    # Out by the exit and in again from behind: the nearer wall stops it all the same.
    behind = "  B: {kind: tube, at: [900, 510], to: [400, 440], bore: 20, mount: none}\n"
    for what, tube in (("from inside", askew), ("from outside", across), ("behind", behind)):
        bench = Bench(layout(tube + TARGET))
        yield power(what, bench.sink("body", "B"), 1.0)


@scene
def a_tube_is_passed_both_ways_and_straight():
    tube = "  B: {kind: tube, at: [600, 450], to: laser, bore: 20, mount: none}\n"
    bench = Bench(layout(tube.replace("laser", "[200, 450]") + TARGET))
    (beam,) = bench.reaching("T")
    yield from vectors("end", beam.end, [1300, 450, 100])
    yield length("path", beam.path, 500.0)
    yield power("power", bench.sink("target", "T"), 1.0)


def _cell(keys, x=300, facing=180):
    return (
        f"  C: {{kind: cell, at: [{x}, 450], facing: {facing}, length: 200, bore: 20, {keys},"
        " mount: none}\n"
    )


@scene
def a_filled_cell_squarely_met_with_all_its_bounces():
    windows = "windows: {glass: {index: 1.5}}"
    for fill, n in (("", 1.0), (", fill: {index: 1.33}", 1.33)):
        bench = Bench(layout(_cell(windows + fill) + TARGET), floor=1e-13)
        outer, inner = (0.5 / 2.5) ** 2, ((1.5 - n) / (1.5 + n)) ** 2
        layers = [stack.face(share) for share in (outer, inner, inner, outer)]
        result = stack.run(layers, np.array(STATES["vertical"], dtype=float))
        yield power(f"on, {n}", bench.sink("target", "T"), result.on[0])
        yield power(f"back, {n}", bench.sink("escaped"), result.returned[0])


def _planes(tilt, thickness, mirrored, x=300.0, span=200.0):
    """Points and normals of the four faces that light along +x meets, one after the other."""
    first = np.array([-np.cos(tilt), np.sin(tilt), 0.0])
    last = first * [1, -1, 1] if mirrored else first
    a, b = np.array([x, 450.0, 100.0]), np.array([x + span, 450.0, 100.0])
    return (
        (a, first),
        (a - thickness * first, first),
        (b + thickness * last, last),
        (b, last),
    )


@scene
def the_main_beam_goes_through_tilted_windows_and_a_filling():
    for tilt, mirrored, n, state in (
        (5.0, True, 1.0, "vertical"),
        (5.0, False, 1.0, "{angle: 30}"),
        (20.0, True, 1.0, "none"),
        (4.0, True, 1.33, "{circular: right}"),
        (3.0, False, 1.33, "horizontal"),
    ):
        way = "mirrored" if mirrored else "parallel"
        keys = f"windows: {{incidence: {tilt}, glass: {{index: 1.5}}, thickness: 4, set: {way}}}"
        keys += f", fill: {{index: {n}}}"
        bench = Bench(layout(_cell(keys) + TARGET, polarization=state))
        ray = Ray(START, ALONG, tensor(ALONG, STATES[state]))
        indices = (1.0, 1.5, n, 1.5, 1.0)
        for i, (point, normal) in enumerate(_planes(np.radians(tilt), 4.0, mirrored)):
            ray = onto(ray, point, normal, indices[i])
            ray = at_face(ray, normal, indices[i], indices[i + 1])[1]
        beam = bench.from_("C.exit.back", "transmitted")[0]
        what = f"{tilt} {way} {n}"
        yield from vectors(f"{what} start", beam.start, ray.point)
        yield from vectors(f"{what} direction", beam.k, ray.k)
        yield power(f"{what} power", beam.power, ray.power)
        yield length(f"{what} path", beam.path, ray.path)
        yield from vectors(f"{what} field", beam.field.real, ray.field.real, 1e-9)


@scene
def brewster_windows_stand_at_their_glass_s_angle():
    n = 1.5
    theta = np.arctan(n)
    shift = 3.0 * np.sin(theta) * (1 - np.cos(theta) / np.sqrt(n * n - np.sin(theta) ** 2))
    r_s, _ = powers(1.0, n, theta)
    for way, moved in (("mirrored", 0.0), ("parallel", 2 * shift)):
        keys = f"windows: {{incidence: brewster, glass: {{index: {n}}}, set: {way}}}"
        cell = _cell(keys).replace("at: [300, 450], facing: 180", "after: laser, distance: 200")
        bench = Bench(layout(cell + TARGET, polarization="horizontal"))
        yield power(f"horizontal, {way}", bench.sink("target", "T"), 1.0)
        (beam,) = bench.reaching("T")
        yield from vectors(f"place, {way}", beam.end, [1300, 450 - moved, 100])
        bench = Bench(layout(cell + TARGET, polarization="vertical"))
        main = bench.from_("C.exit.back", "transmitted")[0]
        yield power(f"vertical, {way}", main.power, (1 - r_s) ** 4)
        first = bench.from_("C.entry.front", "reflected")[0]
        yield power(f"first reflection, {way}", first.power, r_s)
        # Light along +x has its left at +y.
        out = [np.cos(np.pi - 2 * theta), np.sin(np.pi - 2 * theta), 0]
        yield from vectors(f"where it goes, {way}", first.k, out)


@scene
def inside_a_cell_the_wall_is_body_and_in_a_window_rim():
    none = "windows: {front: 0 %, back: 0 %, glass: {index: 1.5}}"
    bench = Bench(layout(_cell(none, facing=170) + TARGET))
    yield power("on the wall", bench.sink("body", "C"), 1.0)
    # Beside the bore but within the window: the glass's own barrel.
    wide = "windows: {front: 0 %, back: 0 %, diameter: 60, glass: {index: 1.5}}"
    bench = Bench(layout(_cell(wide).replace("300, 450]", "300, 435]") + TARGET))
    yield power("on the barrel", bench.sink("rim", "C"), 1.0)
    beside = Bench(layout(_cell(wide).replace("300, 450]", "300, 422]") + TARGET))
    yield power("on the unused annulus", beside.sink("rim", "C"), 1.0)
    narrow = _cell("windows: {diameter: 20}").replace("300, 450]", "300, 439]")
    missed = Bench(layout(narrow + TARGET, beam="{waist_radius: 0.2}"))
    yield power("outside, on the tube", missed.sink("body", "C"), 1.0)


@scene
def the_bore_of_a_cell_clips_a_wide_beam():
    none = "windows: {front: 0 %, back: 0 %, glass: {index: 1.5}, diameter: 60}"
    beam = "{waist_radius: 8}"
    bench = Bench(layout(_cell(none) + TARGET, beam=beam), floor=1e-15)
    # In glass the path counts for less: 6 mm of 1.5 are 4 mm for the spreading.
    at_exit = gauss.radius(8, 397 - 1, NM)
    yield power("through", bench.sink("target", "T"), gauss.in_circle(10, at_exit))
    rest = bench.sink("rim", "C") + bench.sink("body", "C")
    yield power("stopped", rest, gauss.outside_circle(10, at_exit))
