"""What is said of one beam, for programs and for people."""

from __future__ import annotations

from collections.abc import Sequence
from math import ceil
from textwrap import fill
from typing import Any, TypeAlias

from benchlay.exposure.accessible import Pulse
from benchlay.exposure.assessment import Assessment, Held, Question, Reach
from benchlay.exposure.cautions import CAUTIONS
from benchlay.exposure.classes import Classification
from benchlay.exposure.limits import EDITION
from benchlay.report.numbers import rounded
from benchlay.zones.words import number, with_unit

Json: TypeAlias = Any
_WIDTH = 96  # the same everywhere: the bytes must not hang on the terminal
_EYEWEAR_EDITION = "EN 207:2017"


def beam_document(found: Assessment) -> dict[str, Json]:
    """Return the document of ``exposure --json``: what the contract names, then the rest.

    Irradiances are W/m2, radiant exposures of one pulse J/m2; what cannot be computed is
    null, and the assumptions say why.
    """
    asked, classed = found.question, found.classification
    return {
        "wavelength_nm": rounded(asked.wavelength_nm),
        "exposure_s": rounded(asked.exposure_s),
        "mpe_eye": _limit(found.eye[0]),
        "mpe_skin": _limit(found.skin[0]),
        "class": classed.name,
        "ael": {
            **{name: _number(limit) for name, limit in classed.limits.items()},
            "unit": classed.unit,
        },
        "nohd_m": _nohd(found.reach),
        "eyewear_od": rounded(found.density),
        "eyewear_scale": found.scale.text,
        "diffuse_distance_m": rounded(found.diffuse_m),
        "source": found.eye[0].limit.source,
        "assumptions": list(found.assumptions),
        "cautions": list(CAUTIONS),
        "edition": EDITION,
        "light": _light(asked),
        "rules": {
            "eye": [_held(held) for held in found.eye],
            "skin": [_held(held) for held in found.skin],
        },
        "class_statement": classed.statement,
        "class_source": classed.source,
        "collected": {
            "naked_eye": rounded(classed.naked_eye),
            "binoculars": rounded(classed.binoculars),
            "unit": classed.unit,
        },
        "hazardous_span_m": _span(found.reach),
        "nohd_far_field_m": _far_field(found.reach),
        "eyewear_levels": [
            {"mode": str(mode), "level": level} for mode, level in found.scale.levels
        ],
        "eyewear_edition": _EYEWEAR_EDITION,
    }


def _limit(held: Held) -> dict[str, Json]:
    limit = held.limit
    return {
        "value": rounded(limit.value),
        "unit": limit.unit,
        "governs": limit.governs,
        "aperture_mm": rounded(limit.aperture_mm),
        "source": limit.source,
    }


def _held(held: Held) -> dict[str, Json]:
    return {
        "rule": held.rule,
        **_limit(held),
        "exposure": rounded(held.exposure),
        "ratio": rounded(held.ratio),
    }


def _number(value: float | None) -> float | None:
    return None if value is None else rounded(value)


def _nohd(reach: Reach | None) -> float | None:
    if reach is None:
        return None
    return 0.0 if reach.span is None else rounded(reach.span.end_m)


def _span(reach: Reach | None) -> list[float | None] | None:
    if reach is None or reach.span is None:
        return None
    return [rounded(reach.span.start_m), rounded(reach.span.end_m)]


def _far_field(reach: Reach | None) -> dict[str, float | None] | None:
    if reach is None:
        return None
    return {"linear": rounded(reach.linear_m), "quadratic": rounded(reach.quadratic_m)}


def _light(asked: Question) -> dict[str, Json]:
    light, beam = asked.light, asked.beam
    pulse = light if isinstance(light, Pulse) else None
    return {
        "power_W": None if isinstance(light, Pulse) else rounded(light),
        "pulse_energy_J": None if pulse is None else rounded(pulse.energy_j),
        "pulse_duration_s": None if pulse is None else rounded(pulse.duration_s),
        "rate_Hz": None if pulse is None else rounded(pulse.rate_hz),
        "diameter_mm": None if beam is None else rounded(beam.diameter_mm),
        "divergence_mrad": None if beam is None else rounded(beam.divergence_rad * 1e3),
    }


def beam_text(found: Assessment) -> str:
    """Write it for a person: what was asked, the limits, the class, distances, eyewear.

    Every number stands with its edition or formula; what was assumed and the cautions come
    last.
    """
    blocks = [
        _head(found.question),
        _limits(found),
        _class(found.classification),
        _distances(found),
        _eyewear(found),
        _listed("assumed", found.assumptions),
        _listed("cautions", CAUTIONS),
    ]
    return "\n\n".join(blocks) + "\n"


def _head(asked: Question) -> str:
    light, beam = asked.light, asked.beam
    if isinstance(light, Pulse):
        rate = f"at {_shown(light.rate_hz, 'Hz')}" if light.rate_hz else "once"
        what = f"pulses of {_shown(light.energy_j, 'J')} and {_seconds(light.duration_s)}, {rate}"
    else:
        what = f"continuous light of {_shown(light, 'W')}"
    wide = "no beam size given"
    if beam is not None:
        wide = (
            f"beam {number(beam.diameter_mm, 4) + ' mm'} wide at its exit, "
            f"{number(beam.divergence_rad * 1e3, 4) + ' mrad'} full divergence, both at 1/e²"
        )
    seen = f"exposure of {_seconds(asked.exposure_s)}"
    return f"{_nm(asked)}: {what}; {seen}\n{wide}"


_HEADINGS: tuple[str, ...] = ("", "limit", "governed by", "over", "at the exit", "ratio")


def _limits(found: Assessment) -> str:
    rows = [_HEADINGS]
    for name, rules in (("eye", found.eye), ("skin", found.skin)):
        rows += [_rule_cells(name if i == 0 else "", rule) for i, rule in enumerate(rules)]
    worst = found.strictest
    return "\n".join(
        [
            f"exposure limits, {EDITION}",
            *_table(rows),
            f"  at the exit: {number(worst.ratio, 4)} times the eye's limit ({worst.rule})",
            f"    eye: {found.eye[0].limit.source}",
            f"    skin: {found.skin[0].limit.source}",
        ]
    )


def _rule_cells(name: str, held: Held) -> tuple[str, ...]:
    limit = held.limit
    return (
        name,
        _per_area(limit.value, limit.unit),
        limit.governs,
        f"{number(limit.aperture_mm)} mm",
        _per_area(held.exposure, limit.unit),
        number(held.ratio, 4),
    )


def _class(classed: Classification) -> str:
    unit = "W" if classed.unit == "W" else "J a pulse"
    limits = [
        (f"class {name}", "does not exist here" if limit is None else _shown(limit, unit))
        for name, limit in classed.limits.items()
    ]
    collected = [
        ("naked eye", f"takes {_shown(classed.naked_eye, unit)}"),
        ("binoculars", f"take {_shown(classed.binoculars, unit)}"),
    ]
    return "\n".join(
        [f"class: {classed.statement}", *_table([*limits, *collected]), f"    {classed.source}"]
    )


def _distances(found: Assessment) -> str:
    matt = ("from a matt surface", _metres(found.diffuse_m), "all scattered, along its normal")
    if found.reach is None:
        none = ("in the beam", "cannot be computed", "without its diameter and divergence")
        return "\n".join(["hazard distances", *_table([none, matt])])
    reach = found.reach
    if reach.span is None:
        exact = ("in the beam", "0 m", "the limit is nowhere exceeded, averaged over its aperture")
    else:
        exact = (
            "in the beam",
            _metres(reach.span.end_m),
            f"exceeded from {_metres(reach.span.start_m)} on; averaged over the aperture",
        )
    beside = (
        ("far-field formula", _metres(reach.quadratic_m), "quadratic, of the peak at 1/e"),
        ("", _metres(reach.linear_m), "linear, of the peak at 1/e: the less cautious one"),
    )
    return "\n".join(["hazard distances", *_table([exact, *beside, matt])])


def _eyewear(found: Assessment) -> str:
    rows = [
        (
            "optical density",
            _rounded_up(found.density),
            f"at {_nm(found.question)}",
        ),
        ("scale number", found.scale.text or "none suffices", _EYEWEAR_EDITION),
    ]
    return "\n".join(["eyewear (the last measure, for accidental exposure only)", *_table(rows)])


def _shown(value: float, unit: str) -> str:
    return with_unit(value, unit, digits=4)


def _per_area(value: float, unit: str) -> str:
    """Write a limit as the standard's tables do, without prefixes; powers of ten if large."""
    return f"{value:.4g} {unit}"


def _metres(value: float) -> str:
    return f"{number(value, 4)} m"


def _rounded_up(density: float) -> str:
    """Write a density to two decimals, none of them less than is needed."""
    return f"{ceil(density * 100.0 - 1e-9) / 100.0:.2f}"


def _seconds(value: float) -> str:
    return f"{value:g} s" if value >= 1.0 else _shown(value, "s")


def _nm(asked: Question) -> str:
    return f"{number(asked.wavelength_nm, 7)} nm"


def _listed(title: str, sentences: Sequence[str]) -> str:
    wrapped = (
        fill(sentence, _WIDTH, initial_indent="  - ", subsequent_indent="    ")
        for sentence in sentences
    )
    return "\n".join([title, *wrapped])


def _table(rows: Sequence[Sequence[str]]) -> list[str]:
    widths = [max(map(len, column)) for column in zip(*rows, strict=True)]
    return [
        ("  " + "  ".join(cell.ljust(w) for cell, w in zip(row, widths, strict=True))).rstrip()
        for row in rows
    ]
