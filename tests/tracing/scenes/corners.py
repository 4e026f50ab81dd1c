"""Corner cubes: place, direction, path, power, polarization and shape of what they return."""

import numpy as np

from benchlay.optics.metals import METALS
from tests.tracing.bench import Bench, layout, length, power, scene, vectors
from tests.tracing.referee import gauss
from tests.tracing.referee.fresnel import Ray, mirrored, onto, powers, tensor
from tests.tracing.scenes.plates import ALONG, START, STATES

NM = 632.8


def _corner(keys="", at="[600, 453, 98]", facing=180):
    return (
        f"  R: {{kind: retroreflector, at: {at}, facing: {facing}, diameter: 40{keys},"
        " mount: none}\n"
    )


def _three_mirrors(ray, apex, turn):
    """The ray off three ideal mirrors at right angles through the apex, turned about the axis."""
    a, b, c = np.array([[2, -1, -1], [0, 3**0.5, -(3**0.5)], [2**0.5] * 3]) / 6**0.5
    cos, sin = np.cos(turn), np.sin(turn)
    normals = np.stack((-c, cos * a - sin * b, sin * a + cos * b), axis=1)
    left = [0, 1, 2]
    for _ in range(3):  # whichever mirror is met next
        ahead = {i: onto(ray, apex, normals[i], 1.0) for i in left if ray.k @ normals[i] < -1e-9}
        i = min(ahead, key=lambda i: ahead[i].path)
        ray = mirrored(ahead[i], normals[i], -1.0, 1.0)
        left.remove(i)
    return ray


@scene
def a_corner_sends_light_back_as_three_mirrors_do():
    apex = np.array([600.0, 453.0, 98.0])
    for state in STATES:
        for facing, turn in ((180, 0.3), (170, 1.0)):
            bench = Bench(layout(_corner(facing=facing), polarization=state))
            (beam,) = bench.from_("R.front", "reflected")
            ray = Ray(START, ALONG, tensor(ALONG, STATES[state]))
            ray = _three_mirrors(ray, apex, turn)
            what = f"{state} {facing}"
            yield from vectors(f"{what} direction", beam.k, -ALONG)
            yield from vectors(f"{what} direction of three", ray.k, -ALONG)
            ray = onto(ray, beam.start, ALONG, 1.0)
            yield from vectors(f"{what} place", beam.start, ray.point)
            yield length(f"{what} path", beam.path, ray.path)
            yield from vectors(f"{what} field", beam.field.real, ray.field.real)
            yield from vectors(f"{what} turning", beam.field.imag, ray.field.imag)


@scene
def its_mirrors_take_their_share_three_times():
    for keys, each in (("", 1.0), (", reflectance: 98 %", 0.98), (", glass: BK7", 1.0)):
        bench = Bench(layout(_corner(keys)))
        yield power(f"back {keys}", bench.sink("escaped"), each**3)
        yield power(f"taken {keys}", bench.sink("absorbed", "R"), 1 - each**3)
    bench = Bench(layout(_corner(", reflectance: {s: 99 %, p: 95 %}")))
    yield power("back, s and p", bench.sink("escaped"), 0.97**3)


@scene
def what_it_returns_spreads_on_and_is_turned_about_the_apex():
    beam = "{waist_radius_h: 0.3, waist_radius_v: 0.6}"
    target = "  T: {kind: target, at: [100, 456, 96], facing: 0, size: [9, 9], mount: none}\n"
    bench = Bench(layout(_corner() + target, beam=beam))
    (beam,) = bench.reaching("T")
    for row, w0 in ((0, 0.3), (2, 0.6)):
        got = 2 * np.sqrt(beam.moments_at_end[row])
        yield length(f"w {w0}", got, gauss.radius(w0, 1000, NM), 1e-9)
    yield from vectors("end", beam.end, [100, 456, 96])
    yield length("path", beam.path + 500, 1000)


@scene
def beside_its_clear_opening_is_its_rim():
    bench = Bench(
        layout(_corner(at="[600, 469, 100]"), beam="{waist_radius: 0.2, waist_ahead: 500}")
    )
    yield power("rim", bench.sink("rim", "R"), 1.0)
    bench = Bench(layout(_corner(at="[600, 468, 100]")))
    w = gauss.radius(0.5, 500, NM)
    inside = gauss.in_circle(18, w, 18)
    yield power(
        "half on the rim", bench.sink("rim", "R"), gauss.in_circle(20, w, 18) - inside, 1e-5
    )
    yield power("half back", bench.sink("escaped"), inside + gauss.outside_circle(20, w, 18), 1e-5)


@scene
def a_metal_film_is_met_at_the_corner_s_angle():
    bench = Bench(layout(_corner(", reflectance: {metal: aluminium}")))
    index = complex(METALS["aluminium"].index_at(NM))
    r_s, r_p = powers(1.0, index, np.arccos(1 / np.sqrt(3)))
    yield power("back", bench.sink("escaped"), (0.5 * (r_s + r_p)) ** 3)
