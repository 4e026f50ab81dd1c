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


FIBRE = (
    "  far: {wavelength: 632.8, beam: {waist_radius: 0.3}, at: [300, 200], heading: 0,"
    " body: none, fed_by: {target: T, share: 60 %}}\n"
)
FURTHER = (
    "  last: {wavelength: 632.8, beam: {waist_radius: 0.3}, at: [300, 700], heading: 0,"
    " body: none, fed_by: {target: C, share: 50 %}}\n"
)


def _fed(more="", also="", target=", specular: 0, diffuse: 0.9"):
    text = (
        "  W: {kind: window, after: laser, distance: 100, diameter: 30, glass: {index: 1.5},"
        " mount: none}\n"
        f"  T: {{kind: target, at: [900, 450], facing: 180{target}, mount: none}}\n"
        "  C: {kind: target, at: [900, 200], facing: 180, mount: none}\n"
    )
    text = layout(text, also=also)
    return Bench(text.replace("elements:\n", f"{FIBRE}{more}elements:\n", 1), floor=1e-13)


def _by_source(bench, state=None):
    """Power by (source, sink, name)."""
    ledger, scene_ = bench.trace.ledger, bench.trace.scene
    variant = bench.states.index(state) if state else 0
    found = {}
    for row in bench.trace.landings_of(variant):
        beam = ledger.beam[row]
        source = scene_.sources[bench.trace.beams.start.source[beam]]
        name = scene_.names[ledger.name[row]] if ledger.name[row] >= 0 else None
        found[source, name] = found.get((source, name), 0.0) + float(ledger.power[row])
    return found


@scene
def a_fed_source_gives_a_share_of_what_lands_on_its_target():
    r = 0.04
    passed = (1 - r) / (1 + r)  # of a bare plate, all bounces
    states = "states: {low: {sources.laser.power: 1 mW}, off: {sources.laser.out: yes}}\n"
    bench = _fed(also=states)
    for state, source in (("as drawn", 1.0), ("low", 1e-3), ("off", 0.0)):
        got = _by_source(bench, state)
        number = bench.states.index(state)
        emitted = bench.trace.emitted_w(number)
        yield power(f"{state}: at the near end", got.get(("laser", "T"), 0), source * passed)
        yield power(f"{state}: out of the far end", got.get(("far", "C"), 0), 0.6 * source * passed)
        yield power(f"{state}: its ledger", emitted["far"], 0.6 * source * passed)


@scene
def fed_sources_may_feed_others_and_their_own_target():
    """Out of T by far to C, half of that out of last; far also looks at its own target."""
    bench = _fed(FURTHER)
    passed = 0.96 / 1.04
    yield power("last", bench.trace.emitted_w(0)["last"], 0.5 * 0.6 * passed)
    text = layout("  T: {kind: target, at: [900, 450], facing: 180, mount: none}\n")
    own = FIBRE.replace("[300, 200]", "[300, 440]")
    ring = Bench(text.replace("elements:\n", f"{own}elements:\n", 1), floor=1e-13)
    yield power("round and round", ring.trace.emitted_w(0)["far"], 0.6 / (1 - 0.6), 1e-9)
    yield power("all lands", ring.sink("target", "T"), 1 / (1 - 0.6), 1e-9)


@scene
def a_fed_source_that_states_its_power_gives_that():
    stated = FIBRE.replace("wavelength: 632.8,", "wavelength: 632.8, power: 2 mW,")
    text = layout("  T: {kind: target, at: [900, 450], facing: 180, mount: none}\n")
    bench = Bench(text.replace("elements:\n", f"{stated}elements:\n", 1))
    yield power("far", bench.trace.emitted_w(0)["far"], 2e-3)
