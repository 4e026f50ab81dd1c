"""Widths and directions: free beams, lenses, tilted plates, several lines."""

import numpy as np

from tests.tracing.bench import Bench, layout, length, power, scene, vectors
from tests.tracing.referee import gauss, indices
from tests.tracing.referee.fresnel import powers
from tests.tracing.scenes.plates import N
from tests.tracing.scenes.states import TARGET


def widths(moments):
    """Radii along the beam's axes (mm), from the second moments."""
    return 2 * np.sqrt(moments[0]), 2 * np.sqrt(moments[2])


@scene
def widths_of_free_beams():
    for text, w, ahead, m2 in (
        ("{waist_radius: 0.3}", (0.3, 0.3), (0, 0), (1, 1)),
        ("{waist_radius: 0.3, waist_ahead: -150, m2: 1.7}", (0.3, 0.3), (-150, -150), (1.7, 1.7)),
        (
            "{waist_radius_h: 0.2, waist_radius_v: 0.5, waist_ahead_h: 300, waist_ahead_v: -40,"
            " m2_h: 1.2, m2_v: 3}",
            (0.2, 0.5), (300, -40), (1.2, 3),
        ),
    ):  # fmt: skip
        for medium, index in (("vacuum", 1.0), ("{index: 1.33}", 1.33)):
            bench = Bench(layout(TARGET, beam=text, medium=medium))
            beam = bench.reaching("T")[0]
            for axis in (0, 1):
                expected = gauss.radius(w[axis], 800 - ahead[axis], 632.8, m2[axis], index)
                got = widths(beam.moments_at_end)[axis]
                yield length(f"{text} {medium} {axis}", got, expected, 1e-9)


@scene
def exit_diameter_and_divergence():
    bench = Bench(layout(TARGET, beam="{diameter: 1.2, divergence: 2 mrad}"))
    yield length("w", widths(bench.reaching("T")[0].moments_at_end)[0],
                 np.hypot(0.6, 0.8), 1e-9)  # fmt: skip
    scaled = Bench(layout(TARGET, beam="{diameter: 1.2, divergence: 2 mrad, widths: 1/e}"))
    yield length("1/e", widths(scaled.reaching("T")[0].moments_at_end)[0],
                 np.sqrt(2) * np.hypot(0.6, 0.8), 1e-9)  # fmt: skip


def _lens(focal, beam, target_x, **more):
    text = (
        f"  L: {{kind: lens, at: [350, 450], facing: 180, diameter: 40, focal: {focal},"
        f" glass: {{index: {N}}}, mount: none}}\n"
        f"  T: {{kind: target, at: [{target_x}, 450], facing: 180, size: [80, 80], mount: none}}\n"
    )
    return Bench(layout(text, beam=beam, **more))


@scene
def waists_that_a_lens_makes():
    for focal, m2 in ((200, 1), (150, 1.5), (-300, 1)):
        beam = f"{{waist_radius: 0.4, m2: {m2}}}"
        bench = _lens(focal, beam, 950)
        w0, at = gauss.imaged_waist(0.4, 250, focal, 632.8, m2)
        expected = gauss.radius(w0, 600 - at, 632.8, m2)
        main = bench.reaching("T")[0]
        yield length(f"f {focal} M2 {m2}", widths(main.moments_at_end)[0], expected)
        yield length(f"f {focal} M2 {m2} up", widths(main.moments_at_end)[1], expected)
    # Figures of the table: waist .4 at 1000 before f = 200 gives .0709615 at 225.178 behind.
    w0, at = gauss.imaged_waist(0.4, 1000, 200, 632.8)
    yield length("table", w0, 0.0709615, 1e-7)
    yield length("table", at, 225.178, 1e-3)


@scene
def decentred_lenses_bend_the_chief_ray():
    for focal in (120, -200):
        for off, up in ((3, 0), (0, -2), (4, 5)):
            text = (
                f"  L: {{kind: lens, at: [350, {450 + off}, {100 + up}], facing: 180,"
                f" size: [40, 40], focal: {focal}, mount: none}}\n"
            )
            beam = Bench(layout(text)).from_("L.back")[0]
            expected = (off / focal, up / focal)
            got = (beam.k[1] / beam.k[0], beam.k[2] / beam.k[0])
            yield from vectors(f"f {focal} off {off} {up}", got, expected, 1e-12)


@scene
def slanting_beam_through_a_lens():
    """m' = m - x/f of tangents, whatever the slope; through the middle it goes straight on."""
    text = (
        "  L: {kind: lens, at: [350, 460], facing: 180, size: [60, 60], focal: 250, mount: none}\n"
    )
    bench = Bench(layout(text, heading="3"))
    m = np.tan(np.radians(3))
    x = 250 * m - 10
    beam = bench.from_("L.back")[0]
    yield length("tangent", beam.k[1] / beam.k[0], m - x / 250, 1e-12)
    straight = Bench(layout(text.replace("460", f"{450 + 250 * m:.15g}"), heading="3"))
    yield length("middle", straight.from_("L.back")[0].k[1], np.sin(np.radians(3)), 1e-12)


@scene
def faces_of_a_lens():
    """Two bare faces: the same powers as a plate's; the first reflection comes to its focus."""
    bench = _lens(200, "{waist_radius: 0.5}", 950)
    r = ((N - 1) / (N + 1)) ** 2
    yield power("on", bench.from_("L.back", "transmitted")[0].power, (1 - r) ** 2)
    back = bench.from_("L.front", "reflected")[0]
    yield power("back", back.power, r)
    # Equi-convex: R = 2 (n - 1) f; a convex mirror of that radius makes f' = -R/2.
    mirror = -(N - 1) * 200
    w0, at = gauss.imaged_waist(0.5, 250, mirror, 632.8)
    expected = gauss.radius(w0, 250 - at, 632.8)
    end = moments_at(back.moments, 250.0)
    yield length("width of what comes back", widths(end)[0], expected)
    total = bench.sink("target", "T")
    yield power("all that arrives", total, (1 - r) / (1 + r))


def moments_at(m, z):
    """Second moments a distance on in vacuum."""
    out = np.array(m)
    out[0] = m[0] + 2 * z * m[3] + z * z * m[7]
    out[2] = m[2] + 2 * z * m[6] + z * z * m[9]
    return out


@scene
def tilted_plate_is_astigmatic():
    """t = 6, BK7, 45 degrees: the reduced lengths 2.85642 along the tilt, 4.47129 across."""
    text = (
        "  W: {kind: window, after: laser, distance: 300, incidence: 45, size: [80, 80],"
        f" glass: {{index: {N}}}, thickness: 6, mount: none}}\n" + TARGET
    )
    bench = Bench(layout(text, beam="{waist_radius: 0.02}"))
    main = bench.reaching("T")[0]
    inside = np.arcsin(np.sin(np.radians(45)) / N)
    glass = 6 / np.cos(inside)
    along = 300 + glass / N * (np.cos(np.radians(45)) / np.cos(inside)) ** 2
    across = 300 + glass / N
    rest = 900 - main.start[0]
    yield length("reduced along", along - 300, 2.85642, 1e-5)
    yield length("reduced across", across - 300, 4.47129, 1e-5)
    # The beam's first axis is s = up or down, across the tilt.
    got = _by_direction(main)
    yield length("in the plane", got[0], gauss.radius(0.02, along + rest, 632.8))
    yield length("upright", got[1], gauss.radius(0.02, across + rest, 632.8))


def _by_direction(beam):
    """Radii in plan and upright, wherever the beam's own axes lie."""
    xx, xy, yy = beam.moments_at_end[:3]
    tensor = np.einsum("ij,ia,jb->ab", np.array([[xx, xy], [xy, yy]]), beam.axes, beam.axes)
    level = np.cross([0, 0, 1.0], beam.k)
    return 2 * np.sqrt(level @ tensor @ level), 2 * np.sqrt(tensor[2, 2])


@scene
def mirror_turns_the_spot_over():
    """Long axis at 120 degrees before a flat mirror at 45 degrees, at 60 behind it."""
    text = (
        "  A: {kind: mirror, after: laser, distance: 200, turn: up 90, size: [80, 80],"
        " reflectance: 100 %}\n"
        "  B: {kind: mirror, after: A, distance: 150, size: [80, 80], reflectance: 100 %,"
        " aim: [400, 623.2050807568877, 250]}\n"
        "  C: {kind: mirror, after: B, distance: 100, turn: left 90, size: [80, 80],"
        " reflectance: 100 %}\n"
    )
    beam = "{waist_radius_h: 3, waist_radius_v: 1}"
    bench = Bench(layout(text, beam=beam, size="[1500, 1500]"))
    for name, sense in (("B", 1), ("C", -1)):
        seen = bench.from_(f"{name}.front")[0]
        xx, xy, yy = seen.moments[:3]
        tensor = np.einsum("ij,ia,jb->ab", np.array([[xx, xy], [xy, yy]]), seen.axes, seen.axes)
        level = np.cross([0, 0, 1.0], seen.k)
        up = np.cross(seen.k, level)
        # The periscope to azimuth 60 turns horizontal by 60 degrees towards up.
        angle = 0.5 * np.arctan2(2 * level @ tensor @ up, level @ tensor @ level - up @ tensor @ up)
        yield length(f"{name} long axis", np.degrees(angle), sense * 60.0, 1e-4)


@scene
def several_lines_from_one_source():
    text = (
        "bench: {size: [1500, 900], medium: air}\n"
        "sources:\n"
        "  laser: {lines: [{wavelength: 532, power: 2 W}, {wavelength: 1064, power: 5 W}],"
        " beam: {waist_radius: 0.5}, polarization: horizontal, at: [100, 450], heading: 0,"
        " body: none}\n"
        "elements:\n"
        "  W: {kind: window, at: [400, 450], facing: 140, size: [60, 60], thickness: 5,"
        " glass: SF10, mount: none}\n" + TARGET
    )
    bench = Bench(text)
    for nm, watts in ((532, 2.0), (1064, 5.0)):
        n = indices.INDEX["SF10"](nm / 1000)
        _, rp = powers(1.0, n, np.radians(40))
        yield power(f"{nm} on", bench.sink("target", "T", wavelength_nm=nm),
                    watts * (1 - rp) / (1 + rp))  # fmt: skip
        yield power(f"{nm} away", bench.sink("escaped", wavelength_nm=nm),
                    watts * 2 * rp / (1 + rp))  # fmt: skip
        main = next(b for b in bench.reaching("T") if b.wavelength_nm == nm)
        inside = np.arcsin(np.sin(np.radians(40)) / n)
        shift = 5 * np.sin(np.radians(40) - inside) / np.cos(inside)
        yield length(f"{nm} shift", abs(main.end[1] - 450), shift)


@scene
def a_strong_decentred_lens_holds_no_light_for_ever():
    """What its faces throw beyond the critical angle ends on its barrel, at once."""
    text = (
        "  L: {kind: lens, at: [350, 453], facing: 180, size: [12, 12], focal: 10,"
        f" glass: {{index: {N}}}, mount: none}}\n"
    )
    bench = Bench(layout(text, beam="{waist_radius: 0.1}"), floor=1e-9)
    assert not bench.trace.bounded.any()
    # Tangents inside: m = -x P / n from the front, and 2 C x more at each reflection.
    x, power_of_face, bend = -3.0, 1 / 20, 1 / (2 * (N - 1) * 10)
    slope = -x * power_of_face / N
    held = 1.0 - ((N - 1) / (N + 1)) ** 2
    while slope / np.hypot(1, slope) < 1 / N:
        held *= powers(N, 1.0, np.arctan(slope))[0]  # the lens bends in plan, the light is s
        slope -= 2 * bend * x
    yield power("rim", bench.sink("rim", "L"), held)
