"""Sources of several lines, and light that leaves backwards."""

import numpy as np

from tests.tracing.bench import Bench, layout, length, power, scene, vectors
from tests.tracing.referee import gauss
from tests.tracing.referee.fresnel import stokes

ENDS = (
    "  T: {kind: target, at: [900, 450], facing: 180, size: [60, 60], mount: none}\n"
    "  B: {kind: target, at: [50, 450], facing: 0, size: [60, 60], mount: none}\n"
)
BODY = "body: {length: 200, width: 60, height: 60}"


def _leaking(polarization, body=BODY, leak="3 mW", at="[400, 450]"):
    text = layout(ENDS, polarization=polarization, at=at, source=f", rear_leak: {leak}")
    return Bench(text.replace("body: none", body))


@scene
def a_rear_leak_leaves_by_the_back_of_the_body():
    for body, start in ((BODY, 200), ("body: none", 400)):
        bench = _leaking("vertical", body)
        yield power("main", bench.sink("target", "T"), 1.0)
        yield power("leak", bench.sink("target", "B"), 3e-3)
        yield power("emitted", bench.emitted(), 1.003)
        (beam,) = bench.reaching("B")
        yield from vectors("start", beam.start, [start, 450, 100])
        yield from vectors("direction", beam.k, [-1, 0, 0])
        w = gauss.radius(0.5, start - 50, 632.8)
        yield length("w", 2 * np.sqrt(beam.moments_at_end[0]), w, 1e-9)


@scene
def a_rear_leak_has_the_main_beam_s_field():
    """Seen from behind, an angle runs the other way, and so does a hand."""
    c, s = 0.5, np.sqrt(0.75)
    for state, expected in (
        ("horizontal", (1, 1, 0, 0)),
        ("{angle: 30}", (1, c, -s, 0)),
        ("{circular: right}", (1, 0, 0, -1)),
        ("none", (1, 0, 0, 0)),
    ):
        (beam,) = _leaking(state).reaching("B")
        got = stokes(beam.field_at_end, beam.k)
        yield from vectors(state, got, 3e-3 * np.array(expected), 1e-12)


@scene
def several_lines_each_go_their_way_and_share_the_leak():
    lines = "lines: [{wavelength: 532, power: 3 W}, {wavelength: 1064, power: 1 W}]"
    filters = (
        "  F: {kind: mirror, at: [600, 450], facing: 180, size: [60, 60], mount: none,"
        " thickness: 0, back: polished,"
        " reflectance: [{from: 500, to: 600, is: 90 %}, {from: 1000, to: 1100, is: 20 %}]}\n"
    )
    text = layout(filters + ENDS, at="[400, 450]", source=", rear_leak: 8 mW")
    text = text.replace("wavelength: 632.8, power: 1 W", lines).replace("body: none", BODY)
    bench = Bench(text)
    for nm, share in ((532.0, 0.75), (1064.0, 0.25)):
        sinks = bench.sinks(wavelength_nm=nm)
        yield power(f"leak at {nm}", sinks["target", "B"], 8e-3 * share)
        emitted = sum(sinks.values())
        yield power(f"emitted at {nm}", emitted, (4 + 8e-3) * share)
