"""Glasses and media: Brewster's angle, dispersion, total reflection, coloured glass."""

import numpy as np

from tests.tracing.bench import Bench, below, layout, length, power, scene, vectors
from tests.tracing.referee import indices
from tests.tracing.referee.fresnel import Ray, at_face, onto, powers, stokes, tensor
from tests.tracing.referee.plate import plate, through
from tests.tracing.scenes.plates import ALONG, START, STATES, _compare_rays, _open, _window


def _brewster(polarization):
    keys = "glass: fused-silica, thickness: 2, incidence: brewster"
    return _window(keys, polarization, wavelength="633", medium="air")


@scene
def brewster_window_the_right_way():
    bench = _brewster("horizontal")
    front = sum(beam.power for beam in _open(bench, "W.front"))
    yield below("reflected", front, 1e-6)
    yield power("passed", bench.sink("escaped"), 1.0)
    n = indices.INDEX["fused-silica"](0.633)
    main = _open(bench, "W.back")[0]
    theta, inside = np.arctan(n), np.pi / 2 - np.arctan(n)
    yield length("shift", 450 - main.start[1], 2.0 / np.cos(inside) * np.sin(theta - inside))


@scene
def brewster_window_the_wrong_way():
    bench = _brewster("vertical")
    n = indices.INDEX["fused-silica"](0.633)
    r = ((n * n - 1) / (n * n + 1)) ** 2
    yield power("one face reflects 12.9 %", round(r, 3), 0.129)
    yield power("front", _open(bench, "W.front")[0].power, r)
    yield power("passed", _open(bench, "W.back")[0].power, (1 - r) ** 2)
    yield power("sum", sum(b.power for b in _open(bench, "W.back")), (1 - r) / (1 + r))


@scene
def dispersion_of_every_glass():
    for name, index in indices.INDEX.items():
        for nm in (543.5, 1064.0) if name == "ZnSe" else (441.6, 632.8, 1064.0):
            bench = _window(
                f"glass: {name}, thickness: 6, incidence: 30",
                "horizontal", wavelength=nm, medium="air",
            )  # fmt: skip
            n = index(nm / 1000)
            facing = np.radians(150)
            air = indices.air(nm / 1000)
            p = plate(facing, START + 300 * ALONG, 6.0, air, n * air)
            ray = Ray(START, ALONG, tensor(ALONG, STATES["horizontal"]))
            left = through(ray, p)
            main, expected = _open(bench, "W.back")[0], left.back[0]
            yield power(f"{name} {nm}", main.power, expected.power)
            yield from vectors(f"{name} {nm}", main.start, expected.point)
            # Ciddor's formula for air to 1e-9 of the index: 1e-6 mm over 300 mm.
            yield length(f"{name} {nm} optical path", main.path, expected.path, 1e-6)


@scene
def water_in_air_in_vacuum_and_round_the_glass():
    n = indices.water(0.6328)
    for medium, outside in (("vacuum", 1.0), ("air", indices.air(0.6328)), ("{index: 1.2}", 1.2)):
        bench = _window("glass: water, thickness: 6, incidence: 45", "vertical", medium=medium)
        rs, _ = powers(outside, n, np.radians(45))
        yield power(f"{medium} reflected", _open(bench, "W.front")[0].power, rs)
        p = plate(np.radians(135), START + 300 * ALONG, 6.0, outside, n)
        left = through(Ray(START, ALONG, tensor(ALONG, STATES["vertical"])), p)
        # The index of air is the referee's to 1e-9.
        yield from vectors(medium, _open(bench, "W.back")[0].start, left.back[0].point, 1e-7)
        yield length(f"{medium} path", _open(bench, "W.back")[0].path, left.back[0].path, 1e-6)
    ratio = _window("glass: {index: 1.5}, incidence: 45", "vertical", medium="{index: 1.33}")
    rs, _ = powers(1.0, 1.5, np.radians(45))
    yield power("an index is relative to the medium", _open(ratio, "W.front")[0].power, rs)
    yield length("absolute path", _open(ratio, "W.front")[0].path, 300 * 1.33)


@scene
def total_reflection_in_a_thick_wedge():
    """Inside a wedge of 20 degrees the back is met beyond the critical angle."""
    keys = (
        "glass: {index: 1.5168}, thickness: 30, wedge: 20, wedge_towards: left,"
        " incidence: 50, side: left, clear: 100 %"
    )
    for side in ("left", "right"):
        for polarization in ("{angle: 30}", "{circular: right}"):
            bench = _window(keys.replace("side: left", f"side: {side}"), polarization)
            facing = np.radians(180 - 50 if side == "left" else 180 + 50)
            p = plate(facing, START + 300 * ALONG, 30.0, 1.0, 1.5168,
                      slope=(-np.tan(np.radians(20)), 0.0))  # fmt: skip
            ray = Ray(START, ALONG, tensor(ALONG, STATES[polarization]))
            ray = onto(ray, p.front, p.front_normal, 1.0)
            inside = at_face(ray, p.front_normal, 1.0, 1.5168)[1]
            met = onto(inside, p.back, p.back_normal, 1.5168)
            kept, out = at_face(met, p.back_normal, 1.5168, 1.0)
            tag = f"{side} {polarization}"
            assert (out is None) == (side == "left"), "one side is met beyond the angle"
            got = bench.from_("W.back", "reflected")[0]
            yield power(f"{tag} power kept", got.power, kept.power)
            yield from vectors(f"{tag} direction", got.k, kept.k)
            scale = 1e-6 * kept.power
            yield from vectors(f"{tag} phase", stokes(got.field, got.k),
                               stokes(kept.field, kept.k), scale)  # fmt: skip
            if out is None:
                yield power(f"{tag} nothing leaves",
                            sum(b.power for b in bench.from_("W.back", "transmitted")
                                if b.parent == got.parent), 0.0)  # fmt: skip


def _filter(keys, **more):
    text = f"  W: {{kind: filter, after: laser, distance: 300, size: [80, 80], {keys}}}\n"
    return Bench(layout(text, **more))


@scene
def density_grows_with_the_path_inside():
    for incidence in (0, 40):
        bench = _filter(
            f"density: OD 0.7, thickness: 3, glass: {{index: 1.52}}, incidence: {incidence}",
            polarization="{angle: 30}",
        )
        p = plate(np.radians(180 - incidence), START + 300 * ALONG, 3.0, 1.0, 1.52,
                  passes=10**-0.7)  # fmt: skip
        left = through(Ray(START, ALONG, tensor(ALONG, STATES["{angle: 30}"])), p)
        yield from _compare_rays("back", _open(bench, "W.back"), left.back, 2)
        yield power("swallowed", bench.sink("absorbed", "W"), left.absorbed)
        yield power("the rest", bench.sink("escaped"),
                    sum(ray.power for ray in left.front + left.back))  # fmt: skip


@scene
def bands_of_a_filter():
    bands = "bands: [{from: 500, to: 560, transmits: 80 %}, {from: 600, to: 640, transmits: 3 %}]"
    for nm, share in ((532, 0.8), (632.8, 0.03), (580, 0.0)):
        bench = _filter(
            f"{bands}, thickness: 3, glass: {{index: 1.5}}, front: 0 %, back: 0 %, incidence: 30",
            wavelength=nm,
        )
        inside = np.cos(np.arcsin(0.5 / 1.5))
        passed = share ** (1 / inside)
        yield power(f"{nm} passed", bench.sink("escaped"), passed)
        yield power(f"{nm} swallowed", bench.sink("absorbed", "W"), 1 - passed)


@scene
def a_reflective_filter_sends_the_rest_back():
    bench = _filter(
        "density: OD 0.3, reflective: yes, back: 0 %, incidence: 20",
        also="  T: {kind: target, at: [700, 450], facing: 180, size: [60, 60]}\n",
    )
    yield power("passed", bench.sink("target", "T"), 10**-0.3)
    yield power("sent back", _open(bench, "W.front")[0].power, 1 - 10**-0.3)
    yield power("nothing swallowed", bench.sink("absorbed", "W"), 0.0)
