"""What routes follow: diffuse light, folded paths met many times, light that is handed over."""

import numpy as np

from tests.tracing.bench import Bench, layout, length, power, scene, vectors

CAMERA = """\
  S: {kind: target, after: laser, distance: 300, facing: 135, mount: none}
  W: {kind: window, after: S.scattered, at: [300, 650, 120], incidence: 30, diameter: 60,
    thickness: 8, glass: {index: 1.5}, mount: none}
  C: {kind: target, after: W, distance: 200, mount: none}
"""


@scene
def diffuse_light_on_a_route_is_a_ray_without_power():
    text = layout(CAMERA, also="routes: {view: [laser, S.scattered, W, C]}\n")
    bench = Bench(text)
    (ray,) = bench.from_("S.front", "scattered")
    at, to = np.array([400, 450, 100.0]), np.array([300, 650, 120.0])
    yield from vectors("start", ray.start, at)
    yield from vectors("end", ray.end, to)
    yield length("optical path", ray.path, 300.0)
    (last,) = bench.from_("W.back", "transmitted")
    yield from vectors("direction", last.k, (to - at) / np.linalg.norm(to - at))
    (place,) = (item.pose.at for item in [bench.placed.base.elements["C"]])
    yield from vectors("it comes to the camera's middle", last.end, place)
    yield length("no power", sum(b.power for b in (ray, last)), 0.0)
    yield length("rays", len(bench.beams()), 4)  # neither ghosts nor what the camera would send
    yield power("all is booked at the sample", bench.sink("target", "S"), 1.0)
    diffuse = bench.trace.diffuse()
    yield length("told apart", sum(diffuse), 3)


@scene
def a_folded_path_is_followed_bounce_by_bounce():
    """Two facing mirrors 200 mm apart, met twelve times each on a slant of 20 mm a pass."""
    count, step, apart = 12, 20.0, 200.0
    slope = np.degrees(np.arctan2(step, apart))
    mirrors = (
        "  A: {kind: mirror, at: [700, 400], facing: 180, size: [600, 60], clear: 1,"
        " reflectance: 99 %,"
        " mount: none}\n"
        "  B: {kind: mirror, at: [500, 357.5], facing: 0, size: [485, 60], clear: 1,"
        " reflectance: 98 %,"
        " mount: none}\n"
        "  T: {kind: target, at: [300, 630], facing: 0, size: [60, 60], mount: none}\n"
    )
    text = layout(mirrors, at="[400, 80]", heading=slope)
    route = f"routes: {{long: [laser, {{times: {count}, through: [A, B]}}, A, T]}}\n"
    bench = Bench(text + route)
    on_route = [b for b in bench.beams() if bench.trace.beams.start.node[b.number] >= 0]
    mirror_legs = [b for b in on_route if b.event == "reflected"]
    yield length("bounces on the route", len(mirror_legs), 2 * count + 1)
    last = mirror_legs[-1]
    yield power("power", last.power, 0.99 ** (count + 1) * 0.98**count)
    yield length("where it leaves", last.start[1], 80 + step * (1.5 + 2 * count), 1e-9)
    leg = np.hypot(step, apart)
    yield length("path", last.path, leg * (1.5 + 2 * count), 1e-9)
