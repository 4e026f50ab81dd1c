"""The plan of one state as plain data."""

from __future__ import annotations

import re
from collections.abc import Iterable

from benchlay.checks import Context
from benchlay.checks import limits_of as limits_of_states
from benchlay.exposure.cautions import SHORT
from benchlay.findings import Severity
from benchlay.hazards import hazards_of, signs_of
from benchlay.layout.layout import Layout
from benchlay.placing.placed import PlacedState
from benchlay.sheets.contents import BeamEntry, Mark, Picture
from benchlay.sheets.drafting.gaps import opened
from benchlay.sheets.drafting.legs import DrawnLegs, legs_of, limit_words
from benchlay.sheets.drafting.outlines import items_of
from benchlay.sheets.drafting.schedule import zones_drawn
from benchlay.sheets.drafting.surroundings import holes_of, lids_of, panels_of
from benchlay.sheets.drafting.warnings import sign_rows, warning_lines
from benchlay.sheets.layers import WIDTHS_MM, wavelength_words
from benchlay.sheets.scale import PLAN_SIZES, SCALES
from benchlay.sheets.title_block import TitleFields
from benchlay.tracing.front import CONVERTED
from benchlay.tracing.trace import Trace
from benchlay.zones import LimitTable, Zones, limits_of
from benchlay.zones.words import number, with_unit

# How wide a beam is drawn: the limits of the classes for long exposures, roughly. It is a
# matter of ink, and no class is awarded by it.
_STRONG = 5.0  # times the accessible limit
_STRONGEST_W = 0.5


def plan_picture(
    trace: Trace,
    zones: Zones,
    *,
    variant: int = 0,
    counts: Iterable[tuple[Severity, int]] = (),
    of_all_states: bool = True,
    sha256: str = "",
    findings: tuple[Mark, ...] = (),
    context: Context | None = None,
) -> Picture:
    """Return what the plan of a state shows.

    Parameters
    ----------
    trace : Trace
    zones : Zones
        Of at least this state.
    variant : int
        Number of the state.
    counts : iterable of (Severity, int)
        How many findings of each severity a review of the layout has, for the notes; none
        are written if it is empty.
    of_all_states : bool
        Whether these are of all states; if not, of this one.
    sha256 : str
        Of the layout's bytes: which text the sheet was drawn from.
    findings : tuple of Mark
        Of the review.
    context : Context, optional
        What is known of the trace already.
    """
    state = trace.placed.states[variant]
    layout, drawing = state.layout, state.layout.drawing
    decimal = "." if drawing.decimal == "point" else ","
    limits = limits_of(trace)
    legs = legs_of(trace, limits, variant, decimal)
    sheet, scale, unmet = _wishes(layout)
    context = context or Context(trace, limits_of_states(trace.placed))
    gaps = opened(context, variant, decimal)
    (hazards,) = hazards_of(context, zones, (state.name,))
    return Picture(
        name="plan",
        fields=title_fields(layout, "Bench layout, plan", sha256),
        outline=tuple(layout.bench.outline),
        state=state.name,
        holes=holes_of(layout),
        beam_height_mm=layout.bench.beam_height_mm,
        items=items_of(state),
        legs=legs.legs,
        panels=panels_of(layout),
        lids=lids_of(layout),
        gaps=gaps.marks,
        mirror_stretches=gaps.stretches,
        zones=zones_drawn(zones.zones, state.name, decimal),
        used_holes=_used_holes(state),
        findings=findings,
        warning=warning_lines(hazards, decimal),
        signs=sign_rows(signs_of(layout, (hazards,))),
        legend=tuple(_legend(trace, limits, variant, legs, decimal)),
        revisions=tuple((r.rev, r.date, r.what, r.by) for r in layout.revisions),
        notes=(
            _CAUTION,
            *_assumptions(state, zones, legs, decimal),
            *gaps.notes,
            *_findings(counts, "all states" if of_all_states else f"state {state.name} alone"),
            *drawing.notes,
            *unmet,
        ),
        properties=tuple(properties(layout, sha256)),
        sheet=sheet,
        scale=scale,
        decimal=decimal,
    )


def _used_holes(state: PlacedState) -> tuple[tuple[float, float], ...]:
    from benchlay.sheets.shop.drilling import used_holes  # which draws with what stands here

    if state.layout.bench.holes is None:
        return ()
    return tuple(dict.fromkeys(hole.at for hole in used_holes(state)[0]))


_CAUTION = f"{SHORT} Survey stray light on the bench itself, at low power."


def title_fields(layout: Layout, document_type: str, sha256: str = "") -> TitleFields:
    """Return what the title block of a sheet says, but for its scale and its number in the set."""
    d = layout.drawing
    return TitleFields(
        owner=d.owner,
        title=layout.title,
        document_type=document_type,
        number=d.number,
        revision=layout.revision,
        date=d.date,
        drawn_by=d.drawn_by,
        approved_by=d.approved_by,
        projection=d.projection,
        sha256=sha256,
    )


def properties(layout: Layout, sha256: str) -> list[tuple[str, str]]:
    """Return what is written into the file beside the drawing."""
    known = {
        "drawing number": layout.drawing.number,
        "revision": layout.revision,
        "layout sha256": sha256,
    }
    return [(key, value) for key, value in known.items() if value]


def _wishes(layout: Layout) -> tuple[str | None, int | None, list[str]]:
    """Return the sheet and scale that were asked for, and which of it is not to be had."""
    d, unmet = layout.drawing, []
    sheet = None if d.sheet == "auto" else d.sheet
    if sheet is not None and sheet not in PLAN_SIZES:
        unmet.append(f"Sheet {sheet} was asked for; plans are drawn on {', '.join(PLAN_SIZES)}.")
        sheet = None
    scale = None
    if d.scale != "auto":
        match = re.fullmatch(r"1:(\d+)", d.scale)
        scale = int(match[1]) if match and int(match[1]) in SCALES else None
        if scale is None:
            unmet.append(f"Scale {d.scale} was asked for; it is no listed scale of a plan.")
    return sheet, scale, unmet


def _legend(
    trace: Trace, limits: LimitTable, variant: int, legs: DrawnLegs, decimal: str
) -> list[BeamEntry]:
    state, scene = trace.placed.states[variant], trace.scene
    made = _made(trace, limits, variant)
    out = []
    for wave, nm in enumerate(scene.wavelengths_nm.tolist()):
        emits = [
            (name, line.power_w, float(limits.accessible_w[variant, number_, wave]))
            for number_, name in enumerate(scene.sources)
            for line in state.sources[name].source.lines
            if line.wavelength_nm == nm and not state.sources[name].source.stand.out
        ]
        names = [name for name, wavelength in legs.working if wavelength == nm]
        span = (
            f": {names[0]} to {names[-1]}" if len(names) > 1 else "".join(f": {n}" for n in names)
        )
        emits += made.get(wave, [])
        who = ", ".join(f"{name} {with_unit(p, 'W', decimal=decimal)}" for name, p, _ in emits)
        words = f"{wavelength_words(nm, decimal)}, {who or 'not emitted'}{span}"
        out.append(
            BeamEntry(nm, max((_width(p, lim) for _, p, lim in emits), default=_THIN), words)
        )
    return out


def _made(
    trace: Trace, limits: LimitTable, variant: int
) -> dict[int, list[tuple[str, float, float]]]:
    """Return by number of a wavelength what makes it, how much of it, and the lowest limit."""
    s, scene = trace.beams.start, trace.scene
    rows = trace.of_variant(variant)
    rows = rows[s.event[rows] == CONVERTED]
    sums: dict[tuple[int, int], tuple[float, float]] = {}
    for beam, allowed in zip(rows.tolist(), limits.of(trace, rows)[0].tolist(), strict=True):
        key = int(s.wave[beam]), int(s.owner[beam])
        power, least = sums.get(key, (0.0, allowed))
        sums[key] = power + float(s.power[beam]), min(least, allowed)
    found: dict[int, list[tuple[str, float, float]]] = {}
    for (wave, owner), (power, least) in sorted(sums.items()):
        found.setdefault(wave, []).append((f"made by {scene.elements[owner]}", power, least))
    return found


_THIN = WIDTHS_MM[0]


def _width(power_w: float, limit_w: float) -> float:
    if power_w > _STRONGEST_W:
        return WIDTHS_MM[2]
    return WIDTHS_MM[1] if power_w > _STRONG * limit_w else WIDTHS_MM[0]


def _assumptions(state: PlacedState, zones: Zones, legs: DrawnLegs, decimal: str) -> list[str]:
    out = []
    own = [zone for zone in zones.zones if zone.state == state.name]
    if own:
        limit = limit_words(own[0].limit_w, own[0].aperture_mm, own[0].time_base_s, decimal)
        which = f" ({limit})" if len({z.limit_w for z in own}) == 1 else ""
        out.append(
            "Hazard zones: where an eye's aperture could take more than the exposure limit"
            f"{which} of one beam alone, to the first opaque thing, in plan whatever the height; "
            "scattered light where an eye up to the top of its bands sees the spot."
        )
    out.append(_strays(legs, decimal))
    out += [f"Not computed: {words}." for words in zones.not_computed]
    if any(item.out for item in state.elements.values()):
        taken = ", ".join(name for name, item in sorted(state.elements.items()) if item.out)
        out.append(f"Taken out in this state: {taken}.")
    return out


def _strays(legs: DrawnLegs, decimal: str) -> str:
    percent = number(100.0 * legs.left_out_below, 3, decimal)
    if not (legs.strays or legs.weak or legs.left_out):
        return "No stray light outside optics was traced above the power floor."
    out = f"Stray beams above the limit: {legs.strays}"
    out += (
        ", each tagged."
        if legs.tags == legs.strays
        else f", under {legs.tags} {'tag' if legs.tags == 1 else 'tags'}."
    )
    if legs.weak:
        out += f" Below it, {_legs(legs.weak)} from {percent} % of the limit up without tags."
    if legs.left_out:
        out += f" Not drawn: {_legs(legs.left_out)} below {percent} % of the limit."
    return out


def _legs(count: int) -> str:
    return "1 leg" if count == 1 else f"{count} legs"


def _findings(counts: Iterable[tuple[Severity, int]], states: str) -> list[str]:
    known = dict(counts)
    if not known:
        return []
    words = ", ".join(f"{known.get(s, 0)} {s.word}" for s in sorted(Severity, reverse=True))
    return [f"Findings of the review, {states}: {words}; each stands in the report."]
