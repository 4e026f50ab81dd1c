"""Polarization: sheets, waveplates, metals, periscopes, cubes, films."""

import numpy as np

from tests.tracing.bench import Bench, below, layout, length, power, scene, vectors
from tests.tracing.referee import stack
from tests.tracing.referee.fresnel import Ray, acted, amplitudes, horizontal, powers, stokes, tensor
from tests.tracing.scenes.plates import ALONG, START, STATES

TARGET = "  T: {kind: target, at: [900, 450], facing: 180, size: [60, 60], mount: none}\n"


def _sheet(name, x, keys, kind="polarizer"):
    return (
        f"  {name}: {{kind: {kind}, at: [{x}, 450], facing: 180, size: [60, 60], {keys},"
        " mount: none}\n"
    )


def _compare_stack(bench, layers, names, polarization):
    """Compare what goes on, what returns and what each sheet swallows with the iteration."""
    result = stack.run(layers, np.array(STATES[polarization], dtype=float))
    yield power("passed", bench.sink("target", "T"), result.on[0])
    yield power("returned", bench.sink("escaped"), result.returned[0])
    for i, name in enumerate(names):
        swallowed = sum(result.absorbed[3 * i : 3 * i + 3])
        yield power(f"swallowed in {name}", bench.sink("absorbed", name), swallowed)
    arriving = bench.reaching("T")
    state = sum(stokes(beam.field_at_end, beam.k) for beam in arriving)
    yield from vectors("state", state, result.on, 1e-6 * result.on[0])


@scene
def two_polarizers_without_reflections():
    for angle in (0, 20, 45, 70, 90):
        none = "front: 0 %, back: 0 %, transmits: 88 %, extinction: 0"
        text = _sheet("P", 300, f"axis: 90, {none}") + _sheet("A", 500, f"axis: {angle}, {none}")
        bench = Bench(layout(text + TARGET))
        got = bench.sink("target", "T")
        yield power(f"cos2 {angle}", got, 0.88**2 * np.cos(np.radians(90 - angle)) ** 2)


@scene
def crossed_polarizers_pass_by_their_extinction():
    text = _sheet("P", 300, "axis: 0, front: 0 %, back: 0 %, transmits: 88 %, extinction: 2e-3")
    bench = Bench(layout(text + TARGET))
    yield power("passed", bench.sink("target", "T"), 0.88 * 2e-3)


@scene
def two_polarizers_with_their_faces():
    for polarization in ("vertical", "{angle: 30}", "none"):
        text = _sheet("P", 300, "axis: 75") + _sheet("A", 500, "axis: 20, transmits: 80 %")
        bench = Bench(layout(text + TARGET, polarization=polarization), floor=1e-11)
        layers = stack.sheet(stack.polarizer(np.radians(75), 0.9, 0.9e-4))
        layers += stack.sheet(stack.polarizer(np.radians(20), 0.8, 0.8e-4))
        yield from _compare_stack(bench, layers, "PA", polarization)


@scene
def unpolarized_light_through_a_polarizer_at_any_angle():
    for angle in (0, 13, 45, 90, 200):
        keys = f"axis: {angle}, front: 0 %, back: 0 %, transmits: 100 %, extinction: 0"
        bench = Bench(layout(_sheet("P", 300, keys) + TARGET, polarization="none"))
        yield power(f"half at {angle}", bench.sink("target", "T"), 0.5)
        yield power(f"other half at {angle}", bench.sink("absorbed", "P"), 0.5)
        beam = bench.reaching("T")[0]
        two = np.radians(2 * angle)
        yield from vectors(
            "its state", stokes(beam.field_at_end, beam.k), [0.5, 0.5 * np.cos(two),
            0.5 * np.sin(two), 0], 1e-9)  # fmt: skip


@scene
def waveplates_from_the_front_and_from_the_back():
    for facing, sense in ((180, 1), (0, -1)):
        for keys, waves, axis in (
            ("retardance: half, axis: 22.5", 0.5, 22.5),
            ("retardance: quarter, axis: 45", 0.25, 45),
            ("retardance: 0.31, axis: -17", 0.31, -17),
        ):
            for polarization in ("horizontal", "{angle: 30}", "{circular: right}"):
                text = (
                    f"  Q: {{kind: waveplate, at: [300, 450], facing: {facing}, size: [60, 60],"
                    f" {keys}, front: 0 %, back: 0 %, design_wavelength: 632.8}}\n"
                )
                bench = Bench(layout(text + TARGET, polarization=polarization))
                layers = [stack.retarder(waves, sense * np.radians(axis))]
                expected = stack.run(layers, np.array(STATES[polarization], dtype=float)).on
                beam = bench.reaching("T")[0]
                yield from vectors(
                    f"{keys} {polarization} {facing}", stokes(beam.field_at_end, beam.k),
                    expected, 1e-9)  # fmt: skip


@scene
def half_and_quarter_by_hand():
    """Figures that need no matrix: 22.5 degrees turns H to 45, a quarter at 45 makes it right."""
    for keys, expected in (
        ("retardance: half, axis: 22.5", (1, 0, 1, 0)),
        ("retardance: quarter, axis: 45", (1, 0, 0, 1)),
    ):
        text = _sheet("Q", 300, f"{keys}, front: 0 %, back: 0 %", "waveplate")
        bench = Bench(layout(text + TARGET, polarization="horizontal"))
        beam = bench.reaching("T")[0]
        yield from vectors(keys, stokes(beam.field_at_end, beam.k), expected)


@scene
def waveplate_with_its_faces_and_a_polarizer_behind():
    text = _sheet("Q", 300, "retardance: 0.31, axis: 20, glass: {index: 1.5},"
                  " design_wavelength: 500", "waveplate")  # fmt: skip
    text += _sheet("A", 500, "axis: -30, extinction: 1e-2")
    bench = Bench(layout(text + TARGET, polarization="{angle: 30}"), floor=1e-11)
    layers = stack.sheet(stack.retarder(0.31 * 500 / 632.8, np.radians(20)))
    layers += stack.sheet(stack.polarizer(np.radians(-30), 0.9, 0.9e-2))
    yield from _compare_stack(bench, layers, "QA", "{angle: 30}")


GOLD = 0.21 + 3.272j  # at 616.8 nm: Johnson and Christy 1972
SILVER = 0.06 + 4.152j


def _mirror(keys, polarization, **more):
    text = (
        f"  M: {{kind: mirror, after: laser, distance: 300, {keys}, size: [80, 80], mount: none}}\n"
    )
    return Bench(layout(text, polarization=polarization, **more))


@scene
def metal_mirrors():
    """Turned right, 45 and 75 degrees, all states; also pitched, where S2 and S3 mix."""
    for metal, index in (("gold", GOLD), ("silver", SILVER)):
        for polarization in STATES:
            for incidence, pitch in ((45, 0), (75, 0), (0, 0), (30, 6)):
                bench = _mirror(
                    f"incidence: {incidence}, side: right, metal: {metal}, pitch: {pitch}",
                    polarization, wavelength=616.8,
                )  # fmt: skip
                facing, tilt = np.radians(180 + incidence), np.radians(pitch)
                normal = np.array([np.cos(tilt) * np.cos(facing), np.cos(tilt) * np.sin(facing),
                                   np.sin(tilt)])  # fmt: skip
                k = ALONG - 2 * (ALONG @ normal) * normal
                s = np.cross(ALONG, normal)
                s = s / np.linalg.norm(s) if np.linalg.norm(s) > 1e-9 else np.array([0, 0, 1.0])
                rs, rp, *_ = amplitudes(1.0, index, abs(ALONG @ normal))
                field = acted(tensor(ALONG, STATES[polarization]), ALONG, k, s, (rs, rp))
                beam = bench.from_("M.front")[0]
                tag = f"{metal} {polarization} {incidence} {pitch}"
                yield from vectors(tag, stokes(beam.field, beam.k), stokes(field, k), 1e-9)
                swallowed = 1.0 - np.trace(field).real
                yield power(tag, bench.sink("absorbed", "M"), swallowed)


@scene
def circular_light_off_aluminium():
    """Right circular comes back left; at 45 degrees within the spread of published constants."""
    bench = _mirror("turn: right 90, metal: aluminium", "{circular: right}", wavelength=632.8)
    beam = bench.from_("M.front")[0]
    expected = (0.90333, -0.03078, 0.16151, -0.88824)
    yield from vectors("Al 45", stokes(beam.field, beam.k), expected, 2e-3)
    straight = _mirror("incidence: 0, reflectance: 100 %", "{circular: right}")
    beam = straight.from_("M.front")[0]
    yield from vectors("perfect", stokes(beam.field, beam.k), (1, 0, 0, -1))


@scene
def periscopes():
    for azimuth, given, expected in (
        (90, "horizontal", (1, -1, 0, 0)),
        (90, "vertical", (1, 1, 0, 0)),
        (30, "horizontal", (1, 0.5, np.sqrt(0.75), 0)),
        (180, "horizontal", (1, 1, 0, 0)),
        (0, "horizontal", (1, 1, 0, 0)),
        (30, "{circular: right}", (1, 0, 0, 1)),
    ):
        x, y = 400 + 200 * np.cos(np.radians(azimuth)), 450 + 200 * np.sin(np.radians(azimuth))
        text = (
            "  A: {kind: mirror, after: laser, distance: 300, turn: up 90, size: [60, 60],"
            " reflectance: 100 %}\n"
            "  B: {kind: mirror, after: A, distance: 150, size: [60, 60], reflectance: 100 %,"
            f" aim: [{x}, {y}, 250]}}\n"
        )
        bench = Bench(layout(text, polarization=given))
        rising, leaving = bench.from_("A.front")[0], bench.from_("B.front")[0]
        tag = f"azimuth {azimuth} {given}"
        yield from vectors(f"{tag} up", rising.k, (0, 0, 1))
        k = (np.cos(np.radians(azimuth)), np.sin(np.radians(azimuth)), 0)
        yield from vectors(f"{tag} away", leaving.k, k)
        yield from vectors(f"{tag} state", stokes(leaving.field, leaving.k), expected)


@scene
def cube_both_ways():
    """A dividing cube with bare faces left out: shares of s and p, directions, path in glass."""
    for sends, side in (("left", 1), ("right", -1)):
        text = (
            "  C: {kind: cube, after: laser, distance: 300, side: 20, glass: {index: 1.5},"
            f" reflectance: {{s: 90 %, p: 5 %}}, faces: 0 %, sends: {sends}}}\n" + TARGET
        )
        for polarization, weights in (("vertical", (1, 0)), ("horizontal", (0, 1)),
                                      ("none", (0.5, 0.5))):  # fmt: skip
            bench = Bench(layout(text, polarization=polarization))
            away = weights[0] * 0.9 + weights[1] * 0.05
            tag = f"{sends} {polarization}"
            yield power(f"{tag} on", bench.sink("target", "T"), 1 - away)
            beam = bench.from_(f"C.{'right' if side > 0 else 'left'}")[0]
            yield power(f"{tag} aside", beam.power, away)
            yield from vectors(f"{tag} aside", beam.k, (0, side, 0))
            yield from vectors(f"{tag} leaves", beam.start, (400, 450 + side * 10, 100))
            yield length(f"{tag} path", beam.path, 290 + 1.5 * 20)


@scene
def cube_from_behind_sends_to_the_same_side_of_its_diagonal():
    text = (
        "  C: {kind: cube, at: [400, 450], facing: 0, side: 20, glass: {index: 1.5},"
        " reflectance: {s: 90 %, p: 5 %}, faces: 0 %, sends: left}\n"
    )
    beam = Bench(layout(text)).from_("C.left")[0]
    # Light into the back meets the other side of the diagonal: it goes where the front's
    # light would not, that is to the left of itself as well.
    yield from vectors("aside", beam.k, (0, 1, 0))


@scene
def bare_faces_of_a_cube():
    """One pass of the strongest parts through two bare faces and the diagonal."""
    text = (
        "  C: {kind: cube, after: laser, distance: 300, side: 20, glass: {index: 1.5},"
        " reflectance: 50 %}\n" + TARGET
    )
    bench = Bench(layout(text))
    yield power("back at once", bench.from_("C.front", "reflected")[0].power, 0.04)
    yield power("on", bench.from_("C.back", "transmitted")[0].power, 0.96**2 * 0.5)
    yield power("aside", bench.from_("C.right", "transmitted")[0].power, 0.96**2 * 0.5)


@scene
def plate_polarizer_at_brewster():
    for polarization, weights in (("vertical", (1, 0)), ("horizontal", (0, 1))):
        text = (
            "  P: {kind: plate-polarizer, after: laser, distance: 300, incidence: brewster,"
            " glass: {index: 1.5}, size: [80, 80], reflects: 98 %, extinction: 5e-3, mount: none}\n"
        )
        bench = Bench(layout(text, polarization=polarization))
        front = bench.from_("P.front", "reflected")[0].power if weights[0] else 0.0
        yield power(f"{polarization} sent back", front, weights[0] * 0.98)
        rs, rp = powers(1.0, 1.5, np.arctan(1.5))
        behind = weights[0] * 5e-3 * (1 - rs) + weights[1] * (1 - rp)
        yield power(f"{polarization} on", bench.from_("P.back")[0].power, behind)
        # Light that the bare back sends to the film again is swallowed there in part.
        first = weights[0] * (1 - 0.98 - 5e-3)
        yield below("p is not swallowed", bench.sink("absorbed", "P") - first, 1e-4 * weights[0]
                    + 1e-12)  # fmt: skip


@scene
def splitter_with_a_wedge():
    """Stated front, bare wedged back, s and p: the referee's rays one by one."""
    from tests.tracing.referee.plate import plate, through
    from tests.tracing.scenes.plates import _compare_rays

    text = (
        "  W: {kind: splitter, after: laser, distance: 300, turn: left 90, size: [80, 80],"
        " reflectance: {s: 55 %, p: 40 %}, thickness: 5, wedge: 1, wedge_towards: right,"
        " glass: {index: 1.52}, mount: none}\n"
    )
    bench = Bench(layout(text, polarization="{angle: 30}"))
    p = plate(np.radians(135), START + 300 * ALONG, 5.0, 1.0, 1.52,
              slope=(np.tan(np.radians(1)), 0.0), front_share=(0.55, 0.4))  # fmt: skip
    left = through(Ray(START, ALONG, tensor(ALONG, STATES["{angle: 30}"])), p)
    for face, expected in (("W.front", left.front), ("W.back", left.back)):
        got = sorted((b for b in bench.outside("W") if b.left == face), key=lambda b: -b.power)
        yield from _compare_rays(face, got, expected, 3)
    e1, e2 = horizontal(ALONG)
    yield from vectors("left and up", np.stack((e1, e2)), [[0, 1, 0], [0, 0, 1]])
