"""Faraday rotators: one way, there and back, between polarizers, with all their ghosts."""

import numpy as np

from tests.tracing.bench import Bench, layout, power, scene, vectors
from tests.tracing.referee import stack
from tests.tracing.referee.fresnel import stokes
from tests.tracing.scenes.states import TARGET, _compare_stack, _sheet

NONE = "front: 0 %, back: 0 %"
PERFECT = f"{NONE}, transmits: 100 %, extinction: 0"


@scene
def a_rotator_turns_the_field_the_same_way_from_either_side():
    """Horizontal light along +x; anticlockwise to a viewer who looks at the back."""
    for facing, sense in ((180, 1), (0, -1)):
        for angle in (45, 30, -20):
            text = _sheet("F", 300, f"angle: {angle}, {NONE}", kind="rotator")
            text = text.replace("facing: 180", f"facing: {facing}")
            bench = Bench(layout(text + TARGET, polarization="horizontal"))
            (beam,) = bench.reaching("T")
            two = np.radians(2 * sense * angle)
            state = [1, np.cos(two), np.sin(two), 0]
            yield from vectors(f"{facing} {angle}", stokes(beam.field_at_end, beam.k), state, 1e-12)


@scene
def a_double_pass_turns_by_twice_the_angle():
    """Back through the rotator from a mirror: what an analyzer at the entry lets through."""
    for angle in (45, 30, 22.5):
        text = _sheet("P", 300, f"axis: 0, {PERFECT}")
        text += _sheet("F", 400, f"angle: {angle}, {NONE}", kind="rotator")
        text += (
            "  M: {kind: mirror, at: [600, 450], facing: 180, size: [60, 60],"
            " reflectance: 100 %, mount: none}\n"
        )
        bench = Bench(layout(text, polarization="horizontal"))
        back = np.cos(np.radians(2 * angle)) ** 2
        yield power(f"let through at {angle}", bench.sink("escaped"), back)
        yield power(f"refused at {angle}", bench.sink("absorbed", "P"), 1 - back)


@scene
def an_isolator_passes_forwards_and_blocks_backwards():
    """Sheets at 0 and 45 degrees (as light along +x sees them) with 45 between."""
    for polarization, forward in (("horizontal", 1.0), ("vertical", 0.0), ("none", 0.5)):
        text = _isolator()
        bench = Bench(layout(text + TARGET, polarization=polarization))
        yield power(f"forward {polarization}", bench.sink("target", "T"), forward)
        yield power(f"in P, {polarization}", bench.sink("absorbed", "P"), 1 - forward)
    # From the other end: light at 45 degrees to +x is at 135 to -x.
    back = TARGET.replace("900, 450], facing: 180", "100, 450], facing: 0")
    source = {"at": "[900, 450]", "heading": 180, "polarization": "{angle: 135}"}
    bench = Bench(layout(_isolator() + back, **source))
    yield power("backward", bench.sink("target", "T"), 0.0)
    yield power("refused at the exit", bench.sink("absorbed", "A"), 0.0)
    yield power("refused at the entry", bench.sink("absorbed", "P"), 1.0)


def _isolator():
    return (
        _sheet("P", 300, f"axis: 0, {PERFECT}")
        + _sheet("F", 400, f"angle: 45, {NONE}", kind="rotator")
        + _sheet("A", 500, f"axis: 45, {PERFECT}")
    )


@scene
def an_isolator_with_its_faces_and_all_bounces():
    glass = "glass: {index: 1.5}"
    for polarization in ("{angle: 30}", "none"):
        text = _sheet("P", 300, "axis: 0") + _sheet("A", 500, "axis: 45, transmits: 80 %")
        text += _sheet("F", 400, f"angle: 45, {glass}", kind="rotator")
        bench = Bench(layout(text + TARGET, polarization=polarization), floor=1e-12)
        layers = stack.sheet(stack.polarizer(0.0, 0.9, 0.9e-4))
        layers += stack.sheet(stack.rotator(np.radians(45)))
        layers += stack.sheet(stack.polarizer(np.radians(45), 0.8, 0.8e-4))
        yield from _compare_stack(bench, layers, "PFA", polarization)
