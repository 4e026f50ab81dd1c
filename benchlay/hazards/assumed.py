"""What the figures of a state take for granted, in sentences."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from benchlay.checks import Context
from benchlay.hazards.reach import OUTSIDE, Reach
from benchlay.tracing.beams import FACE, HANDED

_ALWAYS = (
    "an eye is taken to stand with its aperture centred on the beam, at the worst place in "
    "reach; each beam is taken alone, except that the lines in reach together are added up "
    "for the class",
    "classes have their own time bases: 0.25 s for classes 2, 2M and visible 3R, else 100 s "
    "from 400 nm up and 30 000 s below; sources and beams count as points seen in full",
    "hazard distances are those of the beam going on in the open, without mirrors or lenses "
    "in the way and without weakening by air; what stops it in the model stands beside them",
    "nobody looks through binoculars or lenses but where a class says so (condition 1)",
    "beams below the power floor (at most 1 % of the limit unless the layout says otherwise) "
    "are not followed",
    "scattered light is followed from its first surface to where eyes may be (the bands of eye "
    "height); a filter that passes no more of it than the limit, as the layout states, stops it",
    "matt surfaces scatter as the layout states (all of it where nothing is stated); for the "
    "class their light is met at 0.1 m, and the size of a spot is no reason to come nearer",
    "scale numbers are of EN 207:2017 as public copies print it, 5 s or the pulses of 5 s; "
    "the factor for the diameter is from memory and is used for continuous light and the mean; "
    "where none of them reaches the density, the highest is raised to it",
)


def assumptions(context: Context, reach: Reach) -> tuple[str, ...]:
    """Return what must hold for the figures of a state to apply, each once."""
    variant = reach.variant
    lines = [
        *_time_base(context, variant),
        *_overridden(context, variant),
        *_of_limits(context, variant),
        *_ALWAYS,
        *_coatings(context, variant),
        *_enclosure(reach),
        *_handed(context, variant),
    ]
    return tuple(dict.fromkeys(lines))


def holds(context: Context, variant: int) -> tuple[str, ...]:
    """Return until when the figures of a state hold."""
    layout = context.layout(variant)
    lines = [
        "while the bench stands as in this revision of the layout, in this state: "
        "any change of either ends it",
        *_exposures(context, variant),
        "eyewear of these numbers is tried for 5 s or 50 pulses (EN 207): it is no leave to "
        "stay in the beam",
    ]
    dates = sorted(entry.until for entry in layout.accept)
    if dates:
        lines.append(f"findings that were accepted lapse from {dates[0]} on")
    return tuple(lines)


def _exposures(context: Context, variant: int) -> Iterator[str]:
    start, scene = context.trace.beams.start, context.trace.scene
    rows = context.beams_of(variant)
    pairs = sorted(set(zip(start.source[rows].tolist(), start.wave[rows].tolist(), strict=True)))
    times: dict[float, set[float]] = {}
    for source, wave in pairs:
        nm = float(scene.wavelengths_nm[wave])
        limit = context.limits[variant, scene.sources[source], nm].limit
        if limit is not None:
            times.setdefault(limit.time_base_s, set()).add(nm)
    for time_s, waves in sorted(times.items()):
        yield f"for exposures of up to {time_s:g} s in all ({_listed(sorted(waves))})"


def unjudged(context: Context, variant: int) -> tuple[str, ...]:
    """Return which light could not be judged, and why."""
    return tuple(
        f"{nm:.10g} nm of {source} has no exposure limit: {why}"
        for (source, nm), why in context.unjudged(variant).items()
    )


def _time_base(context: Context, variant: int) -> Iterator[str]:
    base_s = context.layout(variant).limits.time_base_s
    if base_s is None:
        yield "time base: the default, 100 s from 400 nm up and 30 000 s below"
    else:
        yield f"time base: {base_s:g} s, set by the layout"


def _overridden(context: Context, variant: int) -> Iterator[str]:
    keys = [k for k in context.layout(variant).limits.overridden if k != "time_base"]
    if keys:
        yield f"limits that the layout sets itself: {', '.join(keys)}"


def _of_limits(context: Context, variant: int) -> Iterator[str]:
    """Yield what the limits of the light that there is take for granted."""
    start, scene = context.trace.beams.start, context.trace.scene
    rows = context.beams_of(variant)
    pairs = sorted(set(zip(start.source[rows].tolist(), start.wave[rows].tolist(), strict=True)))
    by_words: dict[str, set[float]] = {}
    for source, wave in pairs:
        nm = float(scene.wavelengths_nm[wave])
        limit = context.limits[variant, scene.sources[source], nm].limit
        for words in () if limit is None else limit.assumptions:
            by_words.setdefault(words, set()).add(nm)
    for words, waves in by_words.items():
        yield f"{_listed(sorted(waves))}: {words}"


def _listed(waves: Sequence[float]) -> str:
    return f"{', '.join(f'{nm:.10g}' for nm in waves)} nm"


def _coatings(context: Context, variant: int) -> Iterator[str]:
    """Yield which optics meet light of which their coatings say nothing."""
    beams, scene = context.trace.beams, context.trace.scene
    rows = context.beams_of(variant)
    rows = rows[beams.unstated[rows] & (beams.end_kind[rows] == FACE)]
    found: dict[float, set[str]] = {}
    for beam in rows.tolist():
        owner = scene.elements[int(scene.faces.owner[beams.end_row[beam]])]
        found.setdefault(context.wavelength_nm(beam), set()).add(owner)
    for nm, names in sorted(found.items()):
        yield (
            f"coatings of {', '.join(sorted(names))} say nothing of {nm:.10g} nm: "
            "taken as bare material there"
        )


def _enclosure(reach: Reach) -> Iterator[str]:
    if reach.counts == OUTSIDE:
        yield (
            "the enclosure is whole and shut as drawn: joints are light-tight, and nobody "
            "reaches in through its openings"
        )


def _handed(context: Context, variant: int) -> Iterator[str]:
    beams, scene = context.trace.beams, context.trace.scene
    rows = context.beams_of(variant)
    rows = rows[(beams.end_kind[rows] == HANDED) & (beams.start.power[rows] > 0.0)]
    names = {scene.names[int(scene.solids.hole_name[row])] for row in beams.end_row[rows].tolist()}
    if names:
        yield (
            f"light handed over at {', '.join(sorted(names))} is taken to go on within closed "
            "ducts, and is not counted as reached beyond"
        )
