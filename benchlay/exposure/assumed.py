"""What the answer about one beam takes for granted, in sentences to be printed with it."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from benchlay.exposure.accessible import Pulse
from benchlay.exposure.classes import Classification, time_base_s
from benchlay.exposure.emission import Level
from benchlay.exposure.eyewear import Scale, diameter_factor_applies
from benchlay.exposure.factors import is_retinal, is_visible
from benchlay.exposure.questions import Held, Question

_LONG_S = 10.0
_LEAST_M2 = 0.99  # two figures of three digits each may miss one by this much


def assumptions(
    asked: Question,
    eye: Sequence[Held],
    skin: Sequence[Held],
    classification: Classification,
    scale: Scale,
) -> tuple[str, ...]:
    """List them, each once, those of the limits first.

    Parameters
    ----------
    asked : Question
        What was asked.
    eye, skin : sequence of Held
        The light held against every rule, the smallest limit first.
    classification : Classification
        With its own assumptions.
    scale : Scale
        The eyewear's scale numbers.
    """
    found = [
        *(f"eye: {note}" for note in eye[0].limit.assumptions),
        *(f"skin: {note}" for note in skin[0].limit.assumptions),
        *_time(asked),
        *_strictest(eye),
        *_beam(asked),
        *(f"class: {note}" for note in classification.assumptions),
        _time_bases(asked.wavelength_nm),
        _surface(asked),
        *_eyewear(asked, scale),
    ]
    return tuple(dict.fromkeys(found))


def _time(asked: Question) -> Iterator[str]:
    time_s = asked.exposure_s
    if asked.time_by_default:
        yield f"no exposure given: {time_s:g} s, the time base for light of this wavelength"
    if time_s >= _LONG_S or _is_single(asked):
        return
    if is_visible(asked.wavelength_nm):
        yield (
            f"an exposure of {time_s:g} s holds only for accidental viewing of visible light, "
            "never for looking on purpose or for alignment; the aversion response is not reliable"
        )
    else:
        yield (
            f"the source or a shutter ends the exposure after {time_s:g} s: nothing makes an "
            "eye turn away from light that it does not see"
        )


def _is_single(asked: Question) -> bool:
    return isinstance(asked.light, Pulse) and asked.light.rate_hz == 0.0


def _strictest(eye: Sequence[Held]) -> Iterator[str]:
    worst = max(eye, key=lambda held: held.ratio)
    if worst.limit.aperture_mm != eye[0].limit.aperture_mm and worst.ratio > eye[0].ratio:
        yield (
            f"eye: this beam exceeds the rule {worst.rule!r} most, {worst.limit.value:.4g} "
            f"{worst.limit.unit} through {worst.limit.aperture_mm:.3g} mm, although another "
            "limit is the smaller number; the density follows from it"
        )


def _beam(asked: Question) -> Iterator[str]:
    if asked.beam is None:
        yield "no beam size given: all light is taken through the limiting apertures"
        yield (
            "the hazard distance cannot be computed without the beam's diameter and "
            "divergence: take the beam as hazardous at any distance"
        )
        return
    yield "a round, centred Gaussian beam with its waist at the exit, in clear air, undisturbed"
    m2 = asked.beam.m2(asked.wavelength_nm)
    if m2 < _LEAST_M2:
        yield (
            f"no beam of this wavelength that is this wide diverges so little (M² would be "
            f"{m2:.3g}): check that the diameter is none at 1/e or half maximum and the "
            "divergence is the full angle; the distance is computed as written"
        )


def _time_bases(wavelength_nm: float) -> str:
    bases = [
        f"{level}: {time_base_s(level, wavelength_nm):g} s"
        for level in Level
        if level is not Level.TWO or is_visible(wavelength_nm)
    ]
    return f"class: time bases of the classes' own ({', '.join(bases)})"


def _surface(asked: Question) -> str:
    seen = "seen along its normal"
    if asked.beam is None or not is_retinal(asked.wavelength_nm):
        return f"matt surface: it scatters all of the light, from a point, {seen}"
    return (
        "matt surface: it scatters all of the light, from a spot as wide as the beam at its "
        f"exit, {seen}; what is focused onto it reaches farther"
    )


def _eyewear(asked: Question, scale: Scale) -> Iterator[str]:
    yield (
        "eyewear: scale numbers after EN 207:2017, whose table rests on older exposure limits: "
        "the density must be reached too"
    )
    if asked.beam is None:
        yield (
            "eyewear: the scale number is that of a beam as wide as the limiting aperture; a "
            "narrower one asks for a higher number"
        )
    if isinstance(asked.light, Pulse):
        yield (
            "eyewear: pulses are raised by N^(1/4), their number in 5 s; filters must bear the "
            "pulse and the mean power both"
        )
        power_w = asked.light.energy_j * asked.light.rate_hz
    else:
        power_w = asked.light
    if scale.text is None:
        yield "eyewear: nothing up to LB10 suffices; there is no scale number for this beam"
    if diameter_factor_applies(power_w, scale.d63_mm):
        yield "eyewear: the factor for wide beams is applied to the mean power (from memory)"
