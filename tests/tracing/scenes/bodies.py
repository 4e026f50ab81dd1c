"""Several bodies in one cross-section: rims, mounts, posts, spill, panels, openings, states."""

from itertools import product

import numpy as np

from tests.tracing.bench import Bench, layout, length, power, scene, vectors
from tests.tracing.referee import gauss
from tests.tracing.referee.fresnel import powers
from tests.tracing.scenes.cuts import NM, WALL, _high

C45 = np.cos(np.radians(45))
CONVERGING = "{waist_radius: 0.02, waist_ahead: 800}"


def _width_at(beam, z):
    """Radius of a round beam z behind its source."""
    if "ahead" not in beam:
        return gauss.radius(4, z, NM)
    return gauss.radius(0.02, z + 600 if "-" in beam else 800 - z, NM)


class Overfilled:
    """A round mirror at 45 degrees in its default mount, as the beam sees it (mm)."""

    def __init__(self, w_h, w_v, off=0.0):
        self.w, self.off, self.r, self.c = (w_h, w_v), off, 12.7, 0.9
        self.half = self.r + 14.0 / 2
        edges = (self.half, self.r, self.c * self.r)
        self.breaks = (*edges, *(-edge for edge in edges))

    def optic(self, y, scale=1.0):
        return gauss.ellipse_at(y, scale * self.r * C45, scale * self.r, self.off)

    def box(self, y):
        a = self.half * C45
        return gauss.box_at(y, self.off - a, self.off + a, -self.half, self.half)

    def post(self, y):
        # Half the mount's depth behind the front, 12.7 across, below the mount.
        x = self.off - (6.0 + 12.0) / 2 * C45
        return gauss.box_at(y, x - 6.35, x + 6.35, -1e4, -self.half)

    def share(self, intervals):
        return gauss.strips(intervals, *self.w, self.breaks)

    def shares(self):
        """(clear, rim, mount and post)."""
        clear = self.share(lambda y: self.optic(y, self.c))
        rim = self.share(lambda y: gauss.cut_out(self.optic(y), self.optic(y, self.c)))
        ring = self.share(lambda y: gauss.cut_out(self.box(y), self.optic(y)))
        return clear, rim, ring + self.share(self.post)


def _mirror(x, off=0.0, **keys):
    more = "".join(f", {key}: {value}" for key, value in keys.items())
    return (
        f"  M: {{kind: mirror, at: [{x}, {450 + off}, 1000], facing: 135, diameter: 25.4,"
        f" reflectance: 100 %{more}}}\n"
    )


@scene
def an_overfilled_mirror_in_its_mount():
    for beam, off in (
        ("{waist_radius: 10}", 0),
        ("{waist_radius: 12}", 5),
        ("{waist_radius_h: 6, waist_radius_v: 15}", -3),
    ):
        bench = Bench(_high(_mirror(400, off) + WALL, beam=beam), floor=1e-13)
        radii = (10, 10) if ": 10" in beam else (12, 12) if ": 12" in beam else (6, 15)
        view = Overfilled(*(gauss.radius(w, 300, NM) for w in radii), off=off)
        clear, rim, body = view.shares()
        yield power(f"{beam} reflected", bench.from_("M.front")[0].power, clear)
        yield power(f"{beam} rim", bench.sink("rim", "M"), rim)
        yield power(f"{beam} mount and post", bench.sink("body", "M"), body)
        yield power(f"{beam} past it", bench.sink("target", "T"), 1 - clear - rim - body)


def _along_flow_lines(beam, radius, off):
    """Share of a beam on a disc at 45 degrees, 300 from the source and `off` from its axis."""
    nodes, weights = np.polynomial.legendre.leggauss(120)
    turn = np.arange(256) * 2 * np.pi / 256
    r = radius * (nodes[:, None] + 1) / 2
    a, b = r * np.cos(turn), r * np.sin(turn)
    w, step = _width_at(beam, 300 - a * C45), 1e-3
    slope = (_width_at(beam, 300 - a * C45 + step) - _width_at(beam, 300 - a * C45 - step)) / 2e-3
    y = off - a * C45
    scaled = C45 * np.abs(w - y * slope) / w**3  # of d(y/w) d(z/w) to da db
    density = 2 / np.pi * np.exp(-2 * (y * y + b * b) / w**2)
    return float((weights[:, None] * r * radius / 2 * density * scaled).sum() * 2 * np.pi / 256)


@scene
def a_tilted_mirror_that_the_chief_ray_passes():
    """Its clear region still mirrors what falls there: neither rim nor mount lies before it."""
    mounted = "{width: 26.7, depth: 18, height: 26.7}"
    beams = ("{waist_radius: 4}", "{waist_radius: 0.02, waist_ahead: -600}", CONVERGING)
    for beam, off, mount in product(beams, (6, 14, -14), ("none", mounted)):
        text = _mirror(400, off, mount=mount).replace("25.4", "12.7") + WALL
        bench = Bench(_high(text, beam=beam), floor=1e-15)
        clear = _along_flow_lines(beam, 0.9 * 6.35, off)
        ring = _along_flow_lines(beam, 6.35, off) - clear
        spilled = sum(b.power for b in bench.from_("M.front") if b.event == "spilled")
        yield power(f"{beam} {off} {mount} mirrored", spilled, clear, 1e-8)
        yield power(f"{beam} {off} {mount} rim", bench.sink("rim", "M"), ring, 1e-8)


@scene
def spill_past_a_mirror_on_a_panel_behind():
    enclosure = (
        "materials: {black: {thickness: 2, diffuse: 0.1, specular: 0}}\n"
        "enclosure:\n  material: black\n  from_height: 900\n  to_height: 1200\n"
        "  panels:\n    east: {from: [1200, 0], to: [1200, 900]}\n"
    )
    bench = Bench(
        _high(_mirror(400, 4, mount="none", thickness=0), beam="{waist_radius: 9}", also=enclosure)
    )
    w = gauss.radius(9, 300, NM)
    view = Overfilled(w, w, off=4)
    on_optic = view.share(view.optic)
    yield power("panel", bench.sink("panel", "east"), 1 - on_optic)
    yield power("rim", bench.sink("rim", "M"), on_optic - view.share(lambda y: view.optic(y, 0.9)))


@scene
def spill_past_a_mirror_on_a_further_optic():
    """A spilled beam from the window behind; its own rim takes a share."""
    text = _mirror(400, 6, mount="none", thickness=0) + (
        "  W: {kind: window, at: [600, 450, 1000], facing: 180, size: [40, 40],"
        " glass: {index: 1.5}, thickness: 3, back: 0 %, mount: none}\n" + WALL
    )
    bench = Bench(_high(text, beam="{waist_radius: 10}"), floor=1e-14)
    w = gauss.radius(10, 300, NM)
    view = Overfilled(w, w, off=6)
    # Seen along the flow lines, the window farther on is a little smaller.
    c, o = (half * w / gauss.radius(10, 500, NM) for half in (18, 20))
    view.breaks = (*view.breaks, -c, c, -o, o)
    window = lambda y, half: gauss.box_at(y, -half, half, -half, half)  # noqa: E731
    past = view.share(lambda y: gauss.cut_out(window(y, c), view.optic(y)))
    whole = view.share(lambda y: gauss.cut_out(window(y, o), view.optic(y)))
    beside = view.share(
        lambda y: gauss.cut_out([(-1e3, 1e3)], sorted(window(y, o) + view.optic(y)))
    )
    spilled = [b for b in bench.from_("W.front") if b.event == "spilled"]
    yield power("into the glass", max(b.power for b in spilled), past * 0.96)
    yield power("sent back", min(b.power for b in spilled), past * 0.04)
    yield power("rim", bench.sink("rim", "W"), whole - past)
    yield power("beside both, and through", bench.sink("target", "T"), beside + past * 0.96)


@scene
def a_barrel_met_from_inside():
    """A beam that comes in near the edge of a thick window at 45 degrees."""
    text = (
        "  W: {kind: window, after: laser, distance: 200, incidence: 45, size: [20, 20],"
        " glass: {index: 1.5}, thickness: 10, clear: 100 %, beam_at: [-4, 0], mount: none}\n"
    )
    bench = Bench(_high(text, beam="{waist_radius: 0.5}"), floor=1e-15)
    inside = np.arcsin(np.sin(np.radians(45)) / 1.5)
    # The flow line through the far corner of the back; in glass the beam is wider by K.
    k = np.cos(inside) / C45
    beside = 10 - 4 - 10 * np.tan(inside)
    z = 10 / np.cos(inside) + beside * np.sin(inside)
    b = gauss.beyond(beside * np.cos(inside), k * gauss.radius(0.5, 200 + z / (1.5 * k * k), NM))
    r = powers(1.0, 1.5, np.radians(45))[0]
    # Refraction made the beam widen at another rate in plan than upright; the program's
    # perspective goes by their mean: 5e-6 here.
    yield power("barrel", bench.sink("rim", "W"), (1 - r) * (b + (1 - b) * r), 1e-5)
    yield power("reflected", bench.from_("W.front", "reflected")[0].power, r)
    yield power(
        "through", bench.from_("W.back", "transmitted")[0].power, (1 - r) ** 2 * (1 - b), 1e-5
    )


def _panelled(openings, beam, **more):
    text = (
        "  X: {kind: dump, at: [1400, 100, 1000], facing: 90}\n"
        "materials: {black: {thickness: 2, diffuse: 0.1, specular: 0}}\n"
        "enclosure:\n  material: black\n  from_height: 900\n  to_height: 1100\n"
        "  panels:\n    east:\n      from: [1200, 0]\n      to: [1200, 900]\n"
        f"      openings: {{{openings}}}\n"
    )
    return Bench(_high(text, beam=beam, **more), floor=1e-15)


@scene
def a_panel_with_a_round_opening():
    for along, height in ((450, 1000), (453, 998)):
        bench = _panelled(f"port: {{along: {along}, height: {height}, diameter: 10}}",
                          "{waist_radius: 4}")  # fmt: skip
        inside = gauss.in_circle(5, gauss.radius(4, 1100, NM), np.hypot(along - 450, height - 1000))
        yield power(f"{along} out", bench.sink("escaped"), inside)
        yield power(f"{along} panel", bench.sink("panel", "east"), 1 - inside)


@scene
def a_panel_with_a_square_opening():
    bench = _panelled("port: {along: 447, width: 8, from_height: 995, to_height: 1002}",
                      "{waist_radius: 4}")  # fmt: skip
    w = gauss.radius(4, 1100, NM)
    inside = gauss.between(-3, 5, w) * gauss.between(-5, 2, w)
    yield power("out", bench.sink("escaped"), inside)
    yield power("panel", bench.sink("panel", "east"), 1 - inside)


@scene
def a_pitched_beam_over_a_panel():
    for pitch, height, stopped in ((5, 80, True), (5, 60, False), (10, 80, False), (10, 90, True)):
        panels = (
            "enclosure:\n  from_height: 0\n"
            f"  to_height: {height}\n  panels: {{east: {{from: [300, 0], to: [300, 900]}}}}\n"
        )
        text = layout("  X: {kind: dump, at: [1400, 100], facing: 90}\n", at="[100, 450, 50]",
                      source=f", pitch: {pitch}", also=panels)  # fmt: skip
        bench = Bench(text)
        beam = bench.from_("laser")[0]
        tag = f"{pitch} {height}"
        yield power(f"{tag} panel", bench.sink("panel", "east"), 0.95 if stopped else 0.0, 1e-9)
        if stopped:
            at = 50 + 200 * np.tan(np.radians(pitch))
            yield from vectors(tag, beam.end, (300, 450, at))
        else:
            yield power(f"{tag} out", bench.sink("escaped"), 1.0)


@scene
def a_level_edge_of_a_panel():
    """The upper edge takes the lower part of a beam that passes above it."""
    panels = (
        "materials: {black: {thickness: 2, diffuse: 0.1, specular: 0}}\n"
        "enclosure:\n  from_height: 0\n  material: black\n"
        "  to_height: 998\n  panels: {east: {from: [300, 0], to: [300, 900]}}\n"
    )
    text = _high("  X: {kind: dump, at: [1400, 100, 1000], facing: 90}\n",
                 beam="{waist_radius: 3}", also=panels)  # fmt: skip
    bench = Bench(text)
    share = gauss.beyond(2, gauss.radius(3, 202, NM))
    yield power("panel", bench.sink("panel", "east"), share, 2e-6)


@scene
def mirrors_pitched_and_yawed():
    """2 cos(theta) pitch for small pitches, and the exact vector for a large one."""
    for incidence in (0, 30, 45, 60):
        text = (
            f"  M: {{kind: mirror, after: laser, distance: 300, incidence: {incidence},"
            " size: [80, 80], reflectance: 100 %, pitch_error: 1 urad}\n"
        )
        k = Bench(layout(text)).from_("M.front")[0].k
        yield length(f"{incidence}", k[2], 2 * np.cos(np.radians(incidence)) * 1e-6, 1e-15)
    text = (
        "  M: {kind: mirror, after: laser, distance: 300, facing: 225, pitch: 2, size: [80, 80],"
        " reflectance: 100 %}\n"
    )
    k = Bench(layout(text)).from_("M.front")[0].k
    yield from vectors("table", k, (0.001218, -0.998782, 0.049325), 5e-7)


@scene
def states_in_one_batch():
    """A shutter closed, a mirror out, a mirror moved, less power, an aperture closed down."""
    text = (
        "  S: {kind: shutter, after: laser, distance: 50, opening: 20, mount: none}\n"
        "  A: {kind: aperture, after: laser, distance: 100, opening: 8, mount: none}\n"
        "  M: {kind: mirror, after: A, distance: 100, turn: left 90, size: [30, 30],"
        " reflectance: 90 %, mount: none}\n"
        "  D: {kind: dump, at: [900, 450], facing: 180, mount: none}\n"
        "  T: {kind: target, at: [300, 800], facing: 270, size: [60, 60], mount: none}\n"
        "states:\n"
        "  closed: {elements.S.closed: yes}\n"
        "  away: {elements.M.out: yes}\n"
        "  weak: {sources.laser.power: 2 mW}\n"
        "  small: {elements.A.opening: 1}\n"
        "  moved: {elements.M.offset: [0, 2, 0]}\n"
        "  turned: {elements.M.yaw_error: 1 mrad}\n"
    )
    bench = Bench(layout(text), floor=1e-15)
    yield power("as drawn", bench.sink("target", "T"), 0.9)
    yield power("as drawn, glass", bench.sink("absorbed", "M"), 0.1)
    yield power("closed", bench.sink("screen", "S", state="closed"), 1.0)
    yield power("closed, target", bench.sink("target", "T", state="closed"), 0.0)
    yield power("away", bench.sink("dump", "D", state="away"), 1.0)
    yield power("weak", bench.sink("target", "T", state="weak"), 0.9 * 2e-3)
    w = gauss.radius(0.5, 100, NM)
    yield power("small", bench.sink("rim", "A", state="small"), gauss.outside_circle(0.5, w))
    # Along its own left, in its own plane: nothing moves but where it is met.
    yield power("moved", bench.sink("target", "T", state="moved"), 0.9)
    yield from vectors("moved", bench.reaching("T", "moved")[0].end, (300, 800, 100))
    turned = bench.reaching("T", "turned")[0]
    yield length("turned", 300 - turned.end[0], 350 * np.tan(2e-3))


@scene
def specular_shares_and_bodies():
    """A target's specular share comes back; a mirror met from behind, its mount, a source."""
    text = (
        "bench: {size: [1500, 900], medium: vacuum}\n"
        "sources:\n"
        "  laser: {wavelength: 632.8, power: 1 W, beam: {waist_radius: 0.5}, at: [300, 450],"
        " heading: 0, polarization: vertical, body: {length: 100, width: 50, height: 50}}\n"
        "elements:\n"
        "  T: {kind: target, at: [600, 450], facing: 180, specular: 25 %, diffuse: 50 %,"
        " mount: none}\n"
        "states:\n"
        "  aside: {elements.T.at: [600, 480], elements.T.facing: 0}\n"
    )
    bench = Bench(text)
    yield power("target", bench.sink("target", "T"), 0.75)
    yield power("source", bench.sink("body", "laser"), 0.25)
    back = "  M: {kind: mirror, at: [400, 450], facing: 0, diameter: 25.4, reflectance: 99 %}\n"
    yield power("ground back", Bench(layout(back)).sink("body", "M"), 1.0)
    beside = back.replace("450", "466")
    yield power("its mount", Bench(layout(beside)).sink("body", "M"), 1.0)
    down = Bench(layout("  X: {kind: dump, at: [1400, 100], facing: 90}\n", source=", pitch: -10"))
    yield power("bench top", down.sink("bench"), 1.0)
    yield from vectors("bench top", down.from_("laser")[0].end,
                       (100 + 100 / np.tan(np.radians(10)), 450, 0))  # fmt: skip
    over = Bench(layout("  X: {kind: dump, at: [1400, 100], facing: 90}\n", source=", pitch: -3"))
    yield power("floor", over.sink("wall", "floor"), 1.0)
