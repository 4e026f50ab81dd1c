"""One opening or edge in the cross-section: circles, ellipses, tilts, edges, gratings of edges.

Beams so wide that they do not spread over the bench, unless spreading is the point.
"""

import numpy as np

from tests.tracing.bench import Bench, layout, power, scene
from tests.tracing.referee import gauss

NM = 632.8


def _high(text, **more):
    """A bench whose top and floor are far below the beam, 1 m up, so that they take nothing."""
    return layout(text, at="[100, 450, 1000]", **more)


def _aperture(opening, x=300, y=450, z=1000, size="[60, 60]", **keys):
    name, facing = keys.get("name", "A"), keys.get("facing", 180)
    return (
        f"  {name}: {{kind: aperture, at: [{x}, {y}, {z}], facing: {facing}, opening: {opening},"
        f" size: {size}, mount: none}}\n"
    )


WALL = "  T: {kind: target, at: [900, 450, 1000], facing: 180, size: [200, 200], mount: none}\n"


@scene
def round_opening_met_in_and_off_the_middle():
    w0 = 5.0
    w = gauss.radius(w0, 200, NM)
    for opening, off, up in ((10, 0, 0), (10, 2.5, 0), (4, 0, 5), (10, -3, 4), (18, 6, 2)):
        bench = Bench(
            _high(
                _aperture(opening, y=450 + off, z=1000 + up) + WALL, beam=f"{{waist_radius: {w0}}}"
            ),
            floor=1e-15,
        )
        d = np.hypot(off, up)
        tag = f"{opening} off by {off}, {up}"
        inside = gauss.in_circle(opening / 2, w, d)
        # The plate is 60 x 60: what passes beside it goes on to the target.
        plate = gauss.between(off - 30, off + 30, w) * gauss.between(up - 30, up + 30, w)
        yield power(f"{tag} rim", bench.sink("rim", "A"), plate - inside)
        yield power(f"{tag} target", bench.sink("target", "T"), 1 - plate + inside)


@scene
def the_table_of_decentred_circles():
    for a, w, d, expected in ((5, 5, 2.5, 0.730988), (2, 1, 1, 0.965865), (1, 1, 2, 0.0147235)):
        bench = Bench(
            _high(_aperture(2 * a, x=100.001, y=450 + d) + WALL, beam=f"{{waist_radius: {w}}}"),
        )
        yield power(f"{a} {w} {d}", bench.sink("target", "T"), expected, 4e-6)


@scene
def square_opening_met_off_the_middle():
    bench = Bench(
        _high(_aperture("[6, 3]", y=451, z=999) + WALL, beam="{waist_radius: 3}"), floor=1e-15
    )
    w = gauss.radius(3, 200, NM)
    inside = gauss.between(-2, 4, w) * gauss.between(-2.5, 0.5, w)
    yield power("target", bench.sink("target", "T"), inside)
    yield power("rim", bench.sink("rim", "A"), 1 - inside)


@scene
def elliptical_beam_in_a_round_opening():
    bench = Bench(
        _high(_aperture(6, x=100.001, y=451, z=1000.5) + WALL,
              beam="{waist_radius_h: 2, waist_radius_v: 1}"),
        floor=1e-15,
    )  # fmt: skip
    inside = gauss.strips(lambda y: gauss.ellipse_at(y, 3, 3, 1, 0.5), 2, 1, (-2.5, 3.5))
    yield power("table", inside, 0.971261, 1e-6)
    yield power("target", bench.sink("target", "T"), inside)
    yield power("rim", bench.sink("rim", "A"), 1 - inside)


@scene
def elliptical_beam_with_rotated_axes():
    """A periscope turns the ellipse by 30 degrees; then an opening off the middle."""
    text = (
        "  A: {kind: mirror, at: [400, 450, 1000], facing: 180, pitch: 45, size: [60, 60],"
        " reflectance: 100 %, mount: none}\n"
        "  B: {kind: mirror, at: [400, 450, 1150], facing: 60, pitch: -45, size: [60, 60],"
        " reflectance: 100 %, mount: none}\n"
        "  C: {kind: aperture, at: [MARK], facing: 240, opening: 6, mount: none}\n"
    )
    d = np.radians(60)
    away = np.array([np.cos(d), np.sin(d)])
    left = np.array([-np.sin(d), np.cos(d)])
    for off, up in ((1.0, 0.5), (-0.7, 1.1)):
        spot = np.array([400, 450]) + 100 * away + off * left
        lines = text.replace("MARK", f"{spot[0]:.15g}, {spot[1]:.15g}, {1150 + up}")
        bench = Bench(_high(lines, beam="{waist_radius_h: 2, waist_radius_v: 1}"), floor=1e-15)
        w_h, w_v = gauss.radius(2, 550, NM), gauss.radius(1, 550, NM)
        # Horizontal light leaves a periscope to azimuth 60 turned by 60 degrees towards up.
        c, s = np.cos(d), np.sin(d)
        # In the spot's own axes the opening is a circle off by the rotated offset.
        u, v = c * off + s * up, -s * off + c * up
        inside = gauss.strips(
            lambda y, u=u, v=v: gauss.ellipse_at(y, 3, 3, u, v), w_h, w_v, (v - 3, v + 3)
        )
        yield power(f"{off} {up} rim", bench.sink("rim", "C"), 1 - inside)
        yield power(f"{off} {up} on", bench.sink("escaped"), inside)


@scene
def tilted_round_optic():
    """a = 12.7, w = 8, 45 degrees: shrunk across the axis of tilt only."""
    for beam, pitch, expected in (
        ("{waist_radius: 8}", 0, 0.960892),
        ("{waist_radius_h: 10, waist_radius_v: 4}", 0, 0.923663),
        ("{waist_radius_h: 10, waist_radius_v: 4}", 45, 0.986079),
    ):
        facing = 135 if pitch == 0 else 180
        text = (
            f"  M: {{kind: mirror, at: [300, 450, 1000], facing: {facing}, pitch: {pitch},"
            " diameter: 25.4, clear: 100 %, reflectance: 100 %, thickness: 0.001, mount: none}\n"
        )
        bench = Bench(_high(text, beam=beam), floor=1e-14)
        got = bench.from_("M.front")[0].power
        yield power(f"table {beam} {pitch}", got, expected, 3e-6)
        w_h, w_v = (8, 8) if "radius:" in beam else (10, 4)
        w_h, w_v = gauss.radius(w_h, 200, NM), gauss.radius(w_v, 200, NM)
        a, b = (12.7 * np.cos(np.radians(45)), 12.7) if pitch == 0 else (12.7, 12.7 / np.sqrt(2))
        inside = gauss.strips(lambda y, a=a, b=b: gauss.ellipse_at(y, a, b), w_h, w_v, (-b, b))
        yield power(f"quadrature {beam} {pitch}", got, inside)


@scene
def two_openings_in_line():
    """The second books only what its own share exceeds the first's by."""
    beam = "{waist_radius: 5}"
    w1, w2 = gauss.radius(5, 200, NM), gauss.radius(5, 300, NM)
    for first, second in ((12, 9), (9, 12), (10, 10)):
        text = _aperture(first, size="[100, 100]")
        text += _aperture(second, x=400, name="B", size="[100, 100]")
        bench = Bench(_high(text + WALL, beam=beam), floor=1e-15)
        lost1 = gauss.outside_circle(first / 2, w1)
        lost2 = gauss.outside_circle(second / 2, w2)
        tag = f"{first} then {second}"
        yield power(f"{tag} first", bench.sink("rim", "A"), lost1)
        yield power(f"{tag} second", bench.sink("rim", "B"), max(lost2 - lost1, 0.0))
        yield power(f"{tag} target", bench.sink("target", "T"), 1 - max(lost1, lost2))


def _knife(x, edge, *, to=800, z=1000, kind="obstacle"):
    """A sheet 1 mm thick across the beam, from `edge` (to the left of the axis) outwards."""
    return (
        f"  K: {{kind: {kind}, at: [{x}, {450 + edge}, {z}], facing: 180,"
        f" outline: [[0, 0], [-1, 0], [-1, {-to}], [0, {-to}]], from_height: {z - 500},"
        f" to_height: {z + 500}, mount: none}}\n"
    )


@scene
def knife_edges():
    for edge_over_w, passed in ((0.5, 0.841345), (-1, 0.022750), (1, 0.977250)):
        w = gauss.radius(4, 200, NM)
        bench = Bench(
            _high(_knife(300, edge_over_w * w) + WALL, beam="{waist_radius: 4}"), floor=1e-15
        )
        blocked = gauss.beyond(edge_over_w * w, w)
        yield power(f"table {edge_over_w}", bench.sink("target", "T"), passed, 5e-5)
        yield power(f"body {edge_over_w}", bench.sink("body", "K"), blocked)
        yield power(f"target {edge_over_w}", bench.sink("target", "T"), 1 - blocked)


@scene
def an_edge_that_takes_a_share_at_several_distances():
    """A diverging beam: the same edge farther on takes more."""
    for x in (150, 300, 500, 800):
        for edge in (1.0, 2.5, 4.0):
            bench = Bench(_high(_knife(x, edge) + WALL, beam="{waist_radius: 0.1}"), floor=1e-15)
            # The sheet is 1 mm thick, and its flank catches what widens into it.
            w = gauss.radius(0.1, x - 99, NM)
            blocked = gauss.beyond(edge, w)
            got = bench.sink("body", "K")
            yield power(f"{x} {edge}", got, blocked if blocked > 1e-14 else 0.0)


@scene
def a_screen_that_takes_a_share():
    text = (
        "  K: {kind: screen, at: [500, 478, 1000], facing: 180, size: [50, 75], mount: none}\n"
        + WALL
    )
    bench = Bench(_high(text, beam="{waist_radius: 3}"), floor=1e-15)
    w = gauss.radius(3, 400, NM)
    share = gauss.between(3, 53, w) * gauss.between(-37.5, 37.5, w)
    yield power("screen", bench.sink("screen", "K"), share)
    yield power("target", bench.sink("target", "T"), 1 - share)


@scene
def a_long_wall_beside_a_diverging_beam():
    """A wall along the beam: flow lines x = xi w(z) meet it up to its far end."""
    for far in (400, 800):
        text = (
            f"  K: {{kind: obstacle, at: [200, 452, 1000], facing: 0,"
            f" outline: [[0, 0], [{far - 200}, 0], [{far - 200}, 60], [0, 60]],"
            " from_height: 500, to_height: 1500, mount: none}\n" + WALL
        )
        bench = Bench(_high(text, beam="{waist_radius: 0.1}"), floor=1e-15)
        w = gauss.radius(0.1, far - 100, NM)
        yield power(f"{far}", bench.sink("body", "K"), gauss.beyond(2, w))


@scene
def a_wall_met_at_a_grazing_angle():
    """Turned towards the beam: flow lines above its far corner have met it before."""
    for degrees in (0.4, 1.0):
        text = (
            f"  K: {{kind: obstacle, at: [200, 453, 1000], facing: {-degrees}, outline: [[0, 0],"
            " [300, 0], [300, 40], [0, 40]], from_height: 500, to_height: 1500, mount: none}\n"
            + WALL
        )
        bench = Bench(_high(text, beam="{waist_radius: 0.15}"), floor=1e-15)
        t = np.radians(degrees)
        end_z, end_y = 100 + 300 * np.cos(t), 3 - 300 * np.sin(t)
        w_end = gauss.radius(0.15, end_z, NM)
        yield power(f"{degrees}", bench.sink("body", "K"), gauss.beyond(end_y, w_end))


@scene
def tilted_optics_off_the_middle_of_a_spreading_beam():
    """Each point of the face has the radius of the beam at its own depth."""
    from scipy.integrate import dblquad

    t = np.radians(45)
    for w0, distance, a, off in ((0.5, 500, 0.5, 0.25), (1, 300, 1, -0.5), (0.2, 500, 0.5, 0.25)):
        text = (
            f"  M: {{kind: mirror, at: [{100 + distance}, {450 + off}, 1000], facing: 135,"
            f" diameter: {2 * a}, clear: 100 %, reflectance: 100 %, thickness: 0, mount: none}}\n"
        )
        bench = Bench(_high(text, beam=f"{{waist_radius: {w0}}}"), floor=1e-14)
        zr = gauss.rayleigh(w0, NM)

        def density(v, u, at=(w0, distance, off, zr)):
            w0, distance, off, zr = at
            z, x = distance + u * np.sin(t), off + u * np.cos(t)
            w = w0 * np.hypot(1.0, z / zr)
            widening = w0 * w0 * z / (zr * zr * w)
            area = (np.cos(t) - x / w * widening * np.sin(t)) / (w * w)
            return 2 / np.pi * np.exp(-2 * (x * x + v * v) / (w * w)) * area

        inside = dblquad(
            density, -a, a, lambda u, a=a: -np.sqrt(a * a - u * u),
            lambda u, a=a: np.sqrt(a * a - u * u), epsabs=1e-12, epsrel=1e-10,
        )[0]  # fmt: skip
        yield power(f"{w0} {off}", bench.from_("M.front")[0].power, inside, 1e-7)


@scene
def thin_optics_that_a_beam_nearly_fills():
    """Both faces stand in one place: what the first lets in, the second lets out."""
    for kind, keys, passed in (
        ("lens", "focal: 300", 1.0),
        ("polarizer", "axis: 90, transmits: 80 %, extinction: 0", 0.8),
        ("waveplate", "retardance: half, axis: 20, design_wavelength: 632.8", 1.0),
    ):
        for facing in (180, 0, 217):
            text = (
                f"  L: {{kind: {kind}, at: [300, 451, 1000], facing: {facing}, diameter: 20,"
                f" {keys}, front: 0 %, back: 0 %, mount: none}}\n" + WALL
            )
            # At 37 degrees from square the outline is an ellipse.
            tilt = np.cos(np.radians(min(facing % 180, 180 - facing % 180)))
            bench = Bench(_high(text, beam="{waist_radius: 4}"), floor=1e-14)
            w = gauss.radius(4, 200, NM)
            clear, whole = (
                gauss.strips(lambda y, a=a, b=a * tilt: gauss.ellipse_at(y, b, a, 1), w, w, (-a, a))
                for a in (9, 10)
            )
            # A polarizer aslant passes by an axis that is no longer square to the beam.
            share = passed if kind != "polarizer" or facing != 217 else None
            yield power(f"{kind} {facing} rim", bench.sink("rim", "L"), whole - clear, 2e-6)
            if share is not None:
                got = bench.sink("target", "T") - (1 - whole)
                yield power(f"{kind} {facing} through", got, share * clear, 2e-6)
