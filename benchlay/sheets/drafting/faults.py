"""The plan of single faults: the bench, and the fan of the light that each fault sends out."""

from __future__ import annotations

from collections.abc import Sequence
from itertools import pairwise
from math import degrees

import shapely

from benchlay.checks import Context
from benchlay.faults import Fan, Review, fans_of
from benchlay.sheets.contents import Picture, Zone, ZoneWords
from benchlay.sheets.drafting.picture import plan_picture, title_fields
from benchlay.sheets.layers import wavelength_words
from benchlay.tracing.trace import Trace
from benchlay.zones import Zones
from benchlay.zones.words import above_words, number, with_unit

MOST = 40  # fans on a sheet; the gravest come first, and all stand in the table of the report
_HALF_WIDTH_MM = 2.0  # of a ray on the plan, where a fan is as narrow as that
_WORDS = ZoneWords(
    "ESCAPE FANS", "Fault, and what gets out", "escape fan: where a fault sends light out"
)


def faults_picture(
    trace: Trace,
    zones: Zones,
    review: Review,
    *,
    variant: int = 0,
    sha256: str = "",
    context: Context | None = None,
) -> Picture | None:
    """Return what the plan of faults shows; None where no fault sends light out."""
    fans = fans_of(review.faults)
    if not fans:
        return None
    plain = plan_picture(trace, zones, variant=variant, sha256=sha256, context=context)
    names = trace.scene.variants
    layout = trace.placed.states[variant].layout
    return plain._replace(
        name="faults",
        fields=title_fields(layout, "Single faults, escape fans", sha256),
        legs=tuple(leg._replace(words="", radii_mm=()) for leg in plain.legs if not leg.stray),
        gaps=(),
        findings=(),
        warning=(),
        signs=(),
        mirror_stretches=(),
        zones=tuple(_zone(fan, names, plain.decimal) for fan in fans[:MOST]),
        zones_are=_WORDS,
        set_out=False,  # fans would run through the figures, which stand on the plan
        notes=_notes(fans, review, plain.decimal),
    )


def _zone(fan: Fan, states: Sequence[str], decimal: str) -> Zone:
    fault, worst = fan.fault, fan.fault.worst
    assert worst is not None
    settings = [] if fault.range_of_worst is None else [_settings(fan, decimal)]
    power = with_unit(worst.power_w, "W", decimal=decimal)
    light = wavelength_words(worst.wavelength_nm, decimal)
    return Zone(
        fan.number,
        "direct",
        _outline(fan),
        (worst.through,),
        (
            f"{fault.name}, in {states[fault.family.state]}",
            f"{power} of {light} by {worst.through}",
            above_words(worst.times, decimal),
            *settings,
            f"{worst.at[2]:.0f} mm up where it goes out",
        ),
    )


def _settings(fan: Fan, decimal: str) -> str:
    about = fan.fault.range_of_worst
    assert about is not None
    low, high = (number(round(degrees(r), 3), 4, decimal) for r in about)
    return f"from {low} to {high} deg"


def _outline(fan: Fan) -> tuple[tuple[tuple[float, float], ...], ...]:
    """Return what a fan covers in plan: outer ring, then holes."""
    parts = []
    for strand in fan.strands:
        rays = [(origin[:2], end[:2]) for origin, end in strand]
        parts += [shapely.LineString([*ray]) for ray in rays]
        for (a, b), (c, d) in pairwise(rays):
            parts.append(shapely.convex_hull(shapely.MultiPoint([a, b, c, d])))
    area = shapely.union_all(shapely.buffer(parts, _HALF_WIDTH_MM, cap_style="flat"))
    # Light that leaves several things has several fans: the plan shows the largest.
    largest = max(shapely.get_parts(area), key=lambda part: float(part.area))
    rings = (largest.exterior, *largest.interiors)
    return tuple(tuple((float(x), float(y)) for x, y in ring.coords[:-1]) for ring in rings)


def _notes(fans: Sequence[Fan], review: Review, decimal: str) -> tuple[str, ...]:
    out = [
        "Each fan holds the light that one single fault sends out, over the settings that do: "
        "one fault at a time, in the state named, above the accessible limit. Numbers are those "
        "of the table of faults.",
        "Seen from above, whatever the height; what a fan meets beyond the enclosure is not "
        "shown to stop it but where its rays end.",
        f"Rays between settings were held against the bench at most "
        f"{number(review.step_mm, 2, decimal)} mm apart.",
        "A model of the layout as written: survey the bench itself, at low power. The laser "
        "safety officer decides.",
    ]
    if len(fans) > MOST:
        out.append(f"Not drawn: {len(fans) - MOST} lesser fans; they stand in the table.")
    return tuple(out)
