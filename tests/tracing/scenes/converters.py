"""Light of another wavelength made in a crystal: power, ghosts, width, direction, polarization."""

import numpy as np

from tests.tracing.bench import Bench, layout, length, power, scene, vectors
from tests.tracing.referee import gauss
from tests.tracing.referee.fresnel import Ray, at_face, onto, stokes, tensor
from tests.tracing.referee.indices import INDEX, air
from tests.tracing.scenes.plates import ALONG, START, STATES

TARGET = "  T: {kind: target, at: [900, 450], facing: 180, size: [90, 90], mount: none}\n"


def _crystal(keys, product="wavelength: 532, share: 40 %", facing=180):
    return (
        f"  X: {{kind: converter, at: [300, 450], facing: {facing}, diameter: 20, length: 10,"
        f" {keys}, produces: [{{{product}}}], mount: none}}\n"
    )


def _bench(keys, polarization="vertical", **more):
    return Bench(
        layout(_crystal(keys, **more) + TARGET, wavelength=1064, polarization=polarization)
    )


@scene
def a_share_becomes_the_other_wavelength_and_the_rest_goes_on():
    for facing in (180, 0):
        bench = _bench("front: 0 %, back: 0 %", facing=facing)
        yield power("made", bench.sinks(wavelength_nm=532.0)["target", "T"], 0.4)
        yield power("left", bench.sinks(wavelength_nm=1064.0)["target", "T"], 0.6)
    (made,) = _bench("front: 0 %, back: 0 %").from_("X.front", "converted")
    yield from vectors("made in the middle", made.start, [305, 450, 100])
    yield length("path", made.path, 200 + 1.6 * 5)


@scene
def what_is_thrown_back_inside_makes_nothing_more():
    n, share = 1.6, 0.4
    r = ((n - 1) / (n + 1)) ** 2
    t = 1 - r
    out = t / (1 - r * r)  # of what goes about inside, by the exit
    bench = _bench(f"glass: {{index: {n}}}")
    for nm, inside, thrown in ((1064.0, t * (1 - share), r), (532.0, t * share, 0.0)):
        sinks = bench.sinks(wavelength_nm=nm)
        yield power(f"{nm} on", sinks["target", "T"], inside * out)
        yield power(f"{nm} back", sinks["escaped", None], thrown + inside * r * out)


@scene
def light_that_comes_back_makes_more_and_what_was_made_makes_nothing():
    """A mirror behind the crystal: what is left is converted once more on its way back."""
    text = _crystal("front: 0 %, back: 0 %") + (
        "  M: {kind: mirror, at: [700, 450], facing: 180, size: [60, 60],"
        " reflectance: 100 %, mount: none}\n"
    )
    bench = Bench(layout(text, wavelength=1064))
    yield power("made", bench.sinks(wavelength_nm=532.0)["escaped", None], 0.4 + 0.6 * 0.4)
    yield power("left", bench.sinks(wavelength_nm=1064.0)["escaped", None], 0.6 * 0.6)


@scene
def light_that_makes_no_harmonic_passes():
    """Of two lines on one way only the one of twice the product's wavelength makes it."""
    text = layout(_crystal("front: 0 %, back: 0 %") + TARGET).replace(
        "wavelength: 632.8, power: 1 W",
        "lines: [{wavelength: 633, power: 1 W}, {wavelength: 1064, power: 2 W}]",
    )
    text += "routes: {a: [laser.633, X.633, T], b: [laser.1064, X.532, T]}\n"
    bench = Bench(text)
    for nm, expected in ((633.0, 1.0), (1064.0, 1.2), (532.0, 0.8)):
        yield power(f"{nm}", bench.sinks(wavelength_nm=nm)["target", "T"], expected)
    on_route = [b for b in bench.reaching("T") if bench.trace.beams.start.node[b.number] >= 0]
    yield length("on routes", sum(b.power for b in on_route), 1.8, 1e-12)


@scene
def its_polarization_is_the_stated_one_or_that_of_what_makes_it():
    for state, stated in (
        ("{angle: 30}", None),
        ("{circular: right}", None),
        ("vertical", "horizontal"),
        ("none", "{angle: 30}"),
        ("horizontal", "{circular: right}"),
        ("vertical", "none"),
    ):
        product = "wavelength: 532, share: 40 %"
        product += f", polarization: {stated}" if stated else ""
        bench = _bench("front: 0 %, back: 0 %", state, product=product)
        (made,) = (b for b in bench.reaching("T") if b.wavelength_nm == 532.0)
        wanted = {"horizontal": (1, 1, 0, 0), **STATES}[stated or state]
        got = stokes(made.field_at_end, made.k)
        yield from vectors(f"{state} {stated}", got, 0.4 * np.array(wanted, float), 1e-12)


@scene
def its_spot_and_quality_are_kept_and_its_spread_goes_with_its_wavelength():
    for beam, w0, z0, m2 in (
        ("{waist_radius: 0.2, waist_ahead: 205}", 0.2, 0.0, 1.0),
        ("{waist_radius: 0.2, waist_ahead: 205, m2: 1.7}", 0.2, 0.0, 1.7),
    ):
        text = _crystal("front: 0 %, back: 0 %, glass: {index: 1.0}") + TARGET
        bench = Bench(layout(text, wavelength=1064, beam=beam))
        for nm in (1064.0, 532.0):
            (seen,) = (b for b in bench.reaching("T") if b.wavelength_nm == nm)
            expected = gauss.radius(w0, 595 - z0, nm, m2)
            yield length(f"{nm} w", 2 * np.sqrt(seen.moments_at_end[0]), expected, 1e-9)
            yield length(f"{nm} w up", 2 * np.sqrt(seen.moments_at_end[2]), expected, 1e-9)
    # Where it spreads already the curvature stays: the same spot, R, and M².
    text = _crystal("front: 0 %, back: 0 %, glass: {index: 1.0}") + TARGET
    bench = Bench(layout(text, wavelength=1064, beam="{waist_radius: 0.2}"))
    (seen,) = (b for b in bench.reaching("T") if b.wavelength_nm == 532.0)
    w = gauss.radius(0.2, 205, 1064)
    zr = gauss.rayleigh(0.2, 1064)
    curvature = 205 / (205**2 + zr**2)
    lam = 532e-6
    w_end = np.hypot(w * (1 + 595 * curvature), 595 * lam / (np.pi * w))
    yield length("spreading w", 2 * np.sqrt(seen.moments_at_end[0]), w_end, 1e-9)


@scene
def it_leaves_a_tilted_crystal_by_its_own_index():
    infra, green = (INDEX["BK7"](um) * air(um) for um in (1.064, 0.532))
    text = (
        "  X: {kind: converter, after: laser, distance: 200, incidence: 20, diameter: 30,"
        " length: 10, glass: BK7, produces: [{wavelength: 532, share: 40 %}], mount: none}\n"
        "  T: {kind: target, after: X, wavelength: 532, distance: 400, mount: none}\n"
    )
    bench = Bench(layout(text, wavelength=1064))
    scene_ = bench.trace.scene
    made = bench.from_("X.back", "transmitted")
    (made,) = [b for b in made if b.wavelength_nm == 532.0 and b.met == "T"][:1]
    row = scene_.elements.index("X")
    front = int(np.flatnonzero(scene_.faces.owner == row)[0])
    n = dict(zip(scene_.wavelengths_nm.tolist(), scene_.index_inside[front], strict=True))
    yield length("index 1064", n[1064.0], infra, 1e-8)
    yield length("index 532", n[532.0], green, 1e-8)
    normal = np.array([np.cos(np.radians(160)), np.sin(np.radians(160)), 0])
    at = START + 200 * ALONG
    ray = Ray(START, ALONG, tensor(ALONG, STATES["vertical"]))
    ray = onto(ray, at, normal, 1.0)
    ray = at_face(ray, normal, 1.0, n[1064.0])[1]
    ray = onto(ray, at - 10 * normal, normal, n[1064.0])
    ray = at_face(ray, normal, n[532.0], 1.0)[1]
    yield from vectors("direction", made.k, ray.k)
    yield from vectors("start", made.start, ray.point)
    yield from vectors("where the target stands", made.end, ray.point + 400 * ray.k)
