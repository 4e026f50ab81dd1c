"""Plates of glass: displacement, ghosts, wedges, Brewster, dispersion, total reflection."""

import numpy as np

from tests.tracing.bench import Bench, layout, length, power, scene, vectors
from tests.tracing.referee.fresnel import Ray, powers, tensor
from tests.tracing.referee.plate import plate, through

N = 1.5168
START = np.array([100.0, 450.0, 100.0])
ALONG = np.array([1.0, 0.0, 0.0])
STATES = {
    "vertical": (1, -1, 0, 0),
    "horizontal": (1, 1, 0, 0),
    "none": (1, 0, 0, 0),
    "{angle: 30}": (1, 0.5, np.sqrt(0.75), 0),
    "{circular: right}": (1, 0, 0, 1),
}


def _arriving(polarization):
    return Ray(START, ALONG, tensor(ALONG, STATES[polarization]))


def _compare_rays(what, got, expected, count):
    """Compare the strongest rays that leave a face: place, direction, power, polarization."""
    expected = sorted(expected, key=lambda ray: -ray.power)
    for i, (beam, ray) in enumerate(zip(got[:count], expected[:count], strict=True)):
        yield power(f"{what} {i} power", beam.power, ray.power)
        yield from vectors(f"{what} {i} direction", beam.k, ray.k)
        yield from vectors(f"{what} {i} start", beam.start, ray.point)
        yield length(f"{what} {i} optical path", beam.path, ray.path)
        near = 1e-6 * ray.power
        yield from vectors(f"{what} {i} field", beam.field.real, ray.field.real, near)
        yield from vectors(f"{what} {i} turning", beam.field.imag, ray.field.imag, near)


def _whole_plate(bench, left, count=4):
    yield from _compare_rays("front", _open(bench, "W.front"), left.front, count)
    yield from _compare_rays("back", _open(bench, "W.back"), left.back, count)


def _open(bench, face):
    beams = [beam for beam in bench.outside("W") if beam.left == face]
    return sorted(beams, key=lambda beam: -beam.power)


def _window(keys, polarization="vertical", **more):
    text = f"  W: {{kind: window, after: laser, distance: 300, size: [80, 80], {keys}}}\n"
    return Bench(layout(text, polarization=polarization, **more))


def _tilted(polarization, pitch=0.0):
    keys = f"incidence: 45, glass: {{index: {N}}}, thickness: 6, pitch: {pitch}"
    bench = _window(keys, polarization)
    facing = np.radians(180 - 45)
    p = plate(facing, START + 300 * ALONG, 6.0, 1.0, N, pitch=np.radians(pitch))
    yield from _whole_plate(bench, through(_arriving(polarization), p))


@scene
def plate_at_45_s():
    yield from _tilted("vertical")


@scene
def plate_at_45_p():
    yield from _tilted("horizontal")


@scene
def plate_at_45_unpolarized():
    yield from _tilted("none")


@scene
def plate_at_45_slanting_polarization():
    yield from _tilted("{angle: 30}")


@scene
def plate_at_45_and_pitched_circular():
    yield from _tilted("{circular: right}", pitch=7)


@scene
def plate_sums_where_they_land():
    """Every beam through the plate lands on T, every one off it on D: the closed sums."""
    text = (
        f"  W: {{kind: window, after: laser, distance: 300, size: [80, 80], incidence: 45,"
        f" glass: {{index: {N}}}, thickness: 6}}\n"
        "  T: {kind: target, at: [700, 450], facing: 180, size: [150, 60]}\n"
        "  D: {kind: screen, at: [400, 800], facing: 270, size: [150, 60]}\n"
    )
    for polarization, (_, s1, _, _) in list(STATES.items())[:3]:
        bench = Bench(layout(text, polarization=polarization), floor=1e-14)
        rs, rp = powers(1.0, N, np.radians(45))
        weights = (0.5 * (1 - s1), 0.5 * (1 + s1))
        through_sum = sum(w * (1 - r) / (1 + r) for w, r in zip(weights, (rs, rp), strict=True))
        back_sum = sum(w * 2 * r / (1 + r) for w, r in zip(weights, (rs, rp), strict=True))
        yield power(f"{polarization} target", bench.sink("target", "T"), through_sum)
        yield power(f"{polarization} screen", bench.sink("screen", "D"), back_sum)
        main, *ghosts = bench.reaching("T")
        inside = np.arcsin(np.sin(np.radians(45)) / N)
        shift = 6.0 * np.sin(np.radians(45) - inside) / np.cos(inside)
        yield length("displacement", 450.0 - main.end[1], shift)
        step = 2 * 6.0 * np.sin(inside) / np.cos(inside) * np.cos(np.radians(45))
        yield length("first ghost beside it", ghosts[0].end[1] - main.end[1], step)


@scene
def plate_straight_on():
    """Ghost powers at normal incidence, one by one, and the front given a coating."""
    bench = _window(f"glass: {{index: {N}}}")
    r = ((N - 1) / (N + 1)) ** 2
    t = 1 - r
    back = [beam.power for beam in _open(bench, "W.back")]
    front = [beam.power for beam in _open(bench, "W.front")]
    for m in range(3):
        yield power(f"through {m}", back[m], t * t * r ** (2 * m))
    yield power("first back", front[0], r)
    for m in range(2):
        yield power(f"back {m + 1}", front[m + 1], t * t * r ** (2 * m + 1))
    coated = _window(f"glass: {{index: {N}}}, front: 0.5 %, back: 2 %")
    yield power("coated", _open(coated, "W.back")[0].power, 0.995 * 0.98)


def _wedged(towards, slope, incidence):
    keys = (
        f"glass: {{index: {N}}}, thickness: 6, wedge: 30 arcmin, wedge_towards: {towards},"
        f" incidence: {incidence}"
    )
    bench = _window(keys, "{angle: 30}")
    rise = np.tan(np.radians(0.5))
    facing = np.radians(180 - incidence)
    tilted = plate(facing, START + 300 * ALONG, 6.0, 1.0, N,
                   slope=(slope[0] * rise, slope[1] * rise))  # fmt: skip
    yield from _whole_plate(bench, through(_arriving("{angle: 30}"), tilted))
    if incidence == 0:
        alpha = np.radians(0.5)
        turned = np.arcsin(N * np.sin(alpha)) - alpha
        ghost = np.arcsin(N * np.sin(3 * alpha)) - alpha
        main, first = _open(bench, "W.back")[:2]
        component = 1 if slope[1] == 0 else 2
        towards_thick = {"left": 1, "right": -1, "up": 1, "down": -1}[towards]
        yield length("deviation", np.arcsin(main.k[component]), towards_thick * turned)
        yield length("ghost", np.arcsin(first.k[component]), towards_thick * ghost)


# Light that arrives at the front sees the element's right (-left) on its own left.
@scene
def wedge_left():
    yield from _wedged("left", (-1, 0), 0)


@scene
def wedge_right():
    yield from _wedged("right", (1, 0), 0)


@scene
def wedge_up():
    yield from _wedged("up", (0, 1), 0)


@scene
def wedge_down():
    yield from _wedged("down", (0, -1), 0)


@scene
def wedge_left_at_45():
    yield from _wedged("left", (-1, 0), 45)


@scene
def wedge_up_at_45():
    yield from _wedged("up", (0, 1), 45)
