"""Scattered light against eyes on a grid that were each looked at, see `sampler.py`."""

from pathlib import Path

import numpy as np
import pytest
import shapely
from sampler import visible
from traced import traced

from benchlay import pipeline
from benchlay.zones import limits_of
from benchlay.zones.diffuse import eye_band, spots

_LAYOUTS = Path(__file__).parents[2] / "layouts"
_GRID = 25  # eyes a side
_HEIGHTS = 361
_FEW = 11, 61  # of either, where there are many spots

# Scattered light of a spot at [300, 250, 100] that is hazardous out to 1.5 m.
BENCH = """
    bench: {size: [1000, 600]}
    sources:
      ir:
        wavelength: 1064
        pulse: {energy: 235 mJ, duration: 8 ns, rate: 10 Hz}
        beam: {waist_radius: 2}
        at: [700, 250]
        heading: 180
        body: none
    elements:
      S: {kind: target, at: [300, 250], facing: 0, size: [60, 60], diffuse: 60 %, mount: none}
      MORE
    limits: {reach: 4 m}
    """
RING = """
    enclosure:
      to_height: HIGH
      panels:
        s: {from: [0, 0], to: [1000, 0]SOUTH}
        e: {from: [1000, 0], to: [1000, 600]EAST}
        n: {from: [1000, 600], to: [0, 600]}
        w: {from: [0, 600], to: [0, 0]}
"""
SLOT = ", openings: {slot: {along: 500, width: 80, from_height: 60, to_height: 180}}"
TWO = (
    ", openings: {port: {along: 250, height: 110, diameter: 50}, "
    "view: {along: 400, width: 90, from_height: 150, to_height: 250}}"
)
LOW_SLOT = ", openings: {slot: {along: 300, width: 300, from_height: 0, to_height: 130}}"


def ring(high=300, south="", east=""):
    return RING.replace("HIGH", str(high)).replace("SOUTH", south).replace("EAST", east)


LID = "      lids: {main: {height: 300, outline: [[0, 0], [1000, 0], [1000, 600], [0, 600]]}}\n"
STEPS = """      lids:
        low: {height: 220, outline: [[0, 0], [500, 0], [500, 600], [0, 600]]}
        high: {height: 300, outline: [[500, 0], [1000, 0], [1000, 600], [500, 600]]}
"""
HALF = "      lids: {main: {height: 300, outline: [[0, 0], [700, 0], [700, 600], [0, 600]]}}\n"
L_ROOM = """
    room:
      outline: [[-500, -600], [1700, -600], [1700, 400], [900, 400], [900, 1500], [-500, 1500]]
      doors: {way: {from: [1700, -300], to: [1700, 300]}}
"""
TALL = (
    "O: {kind: obstacle, at: [650, 380], facing: 0, to_height: 900, "
    "outline: [[-40, -90], [60, -30], [20, 80]]}"
)
ARCH = (
    "O: {kind: obstacle, at: [600, 180], facing: 0, from_height: 160, to_height: 1500, "
    "outline: [[-30, -80], [30, -80], [30, 80], [-30, 80]]}"
)

SCENES = {
    "nothing": "",
    "low walls": ring(130),
    "walls": ring(300),
    "walls and a slot": ring(300, east=SLOT),
    "lid": ring(300) + LID,
    "lid and slot": ring(300, east=SLOT) + LID,
    "lid and two openings": ring(300, south=TWO, east=SLOT) + LID,
    "lid and a low slot": ring(300, south=LOW_SLOT) + LID,
    "lifted panel": ring(300, east=", from_height: 120") + LID,
    "steps between lids": ring(300) + STEPS,
    "half a lid": ring(300) + HALF,
    "open lid": ring(300) + LID.replace("height: 300,", "height: 300, open: yes,"),
    "lid above the panels": ring(250) + LID,
    "open panel": ring(300, south=", open: yes") + LID,
    "near a long wall": (
        "",
        """
    enclosure: {to_height: 900, panels: {p: {from: [-3000, 290], to: [4000, 290]}}}\n""",
    ),
    "room": L_ROOM,
    "room, lid and slot": L_ROOM + ring(300, east=SLOT) + LID,
    "bodies": (TALL, ""),
    "under an arch": (ARCH, ring(200)),
}


def bench(scene):
    element, more = scene if isinstance(scene, tuple) else ("", scene)
    return BENCH.replace("      MORE\n", f"      {element}\n" if element else "") + more


def filters_that_pass_nothing(trace, variant, wave):
    """Names of filters by bands none of which has this wavelength."""
    nm = trace.scene.wavelengths_nm[wave]
    return [
        name
        for name, item in trace.placed.states[variant].elements.items()
        if getattr(item.element.record, "bands", None)
        and not any(b.from_nm <= nm <= b.to_nm for b in item.element.record.bands)
    ]


def compared(trace, variant=0, many=(_GRID, _HEIGHTS)):
    """Of each spot: eyes that see it and lie in no zone; eyes in a zone that see nothing."""
    limits = limits_of(trace)
    band = eye_band(trace.placed.states[variant])
    for wave in range(len(trace.scene.wavelengths_nm)):
        for spot in spots(trace, limits, variant, wave):
            view, radius = spot.view, spot.radius_mm
            zone = spot.area
            offsets = 0.999 * radius * np.linspace(-1.0, 1.0, many[0]) + 0.0137
            grid = np.meshgrid(view.at[0] + offsets, view.at[1] + offsets)
            plan = np.stack(grid, axis=-1).reshape(-1, 2)
            z = float(view.at[2])
            low, high = min(band[0], z), max(band[1], z)
            heights = np.linspace(max(low, z - radius), min(high, z + radius), many[1])
            heights = np.append(heights, z)
            dark = filters_that_pass_nothing(trace, variant, wave)
            sees = visible(trace, variant, view[:2], radius, (plan, heights), dark=dark)
            points = shapely.points(plan)
            # The polygon goes round the circle, by 1/cos(pi/64); between two heights that were
            # tried a gap may open; on the line itself either may be right.
            clear = shapely.distance(shapely.boundary(zone), points) > max(1.0, 4e-3 * radius)
            inside = shapely.contains(zone, points)
            assert zone.is_valid
            yield spot, plan[sees & ~inside & clear], plan[inside & ~sees & clear], sees.sum()


@pytest.mark.parametrize("name", SCENES)
def test_the_zone_is_where_an_eye_sees_the_spot(name):
    found = list(compared(traced(bench(SCENES[name]))))
    assert found
    for spot, missed, invented, sees in found:
        assert sees > 0
        assert len(missed) == 0, (spot.name, missed[:5])
        assert len(invented) == 0, (spot.name, invented[:5])


@pytest.mark.parametrize("pitch", [-50, -20, 20, 50])
@pytest.mark.parametrize("name", ["nothing", "walls and a slot", "room, lid and slot"])
def test_the_same_from_a_tilted_surface(name, pitch):
    text = bench(SCENES[name]).replace("facing: 0, size", f"facing: 0, pitch: {pitch}, size")
    for spot, missed, invented, _ in compared(traced(text)):
        assert len(missed) == 0, (spot.name, missed[:5])
        assert len(invented) == 0, (spot.name, invented[:5])


@pytest.mark.parametrize("name", ["walls and a slot", "bodies", "under an arch"])
def test_the_same_from_above_the_lower_end_of_the_bands(name):
    text = bench(SCENES[name]).replace("250]", "250, 500]")
    for spot, missed, invented, sees in compared(traced(text)):
        assert sees > 0
        assert len(missed) == 0, (spot.name, missed[:5])
        assert len(invented) == 0, (spot.name, invented[:5])


@pytest.mark.parametrize("name", ["stone-cleaning", "fluorescence", "hologram", "bad"])
def test_the_benches_of_the_workshop(name):
    trace = pipeline.trace(pipeline.place(pipeline.read(_LAYOUTS / f"{name}.yaml")))
    for variant in range(len(trace.scene.variants)):
        for spot, missed, invented, sees in compared(trace, variant, _FEW):
            assert sees > 0
            assert len(missed) == 0, (spot.name, missed[:5])
            assert len(invented) == 0, (spot.name, invented[:5])
