"""One beam by itself: limits, class, distances and eyewear, with what was taken for granted.

No layout and no bench: the light leaves its exit into the open, and the eye may be anywhere
in it, the exit included.
"""

from __future__ import annotations

from benchlay.exposure.accessible import Pulse
from benchlay.exposure.apertures import circle_area_m2
from benchlay.exposure.assumed import assumptions
from benchlay.exposure.classes import (
    Classification,
    GaussianExit,
    classify_continuous,
    classify_pulsed,
)
from benchlay.exposure.distances import (
    Span,
    hazardous_span,
    nohd_linear_m,
    nohd_quadratic_m,
)
from benchlay.exposure.eyewear import (
    Scale,
    continuous_scale,
    optical_density,
    pulsed_scale,
)
from benchlay.exposure.limits import Limit, eye_limit, skin_limit
from benchlay.exposure.questions import D86_PER_D63, Exit, Held, Question, question
from benchlay.exposure.trains import Rule, Train, as_limit, eye_rules, skin_rules
from benchlay.exposure.viewing import viewing_distance_m
from benchlay.named import NamedTuple

__all__ = ["Assessment", "Exit", "Held", "Question", "Reach", "assess", "question"]


class Reach(NamedTuple):
    """How far the beam exceeds the eye's limit, m from the exit.

    Attributes
    ----------
    span : Span or None
        By the exact formula; None if it is nowhere exceeded.
    linear_m, quadratic_m : float
        By the two far-field formulas, for comparison.
    """

    span: Span | None
    linear_m: float
    quadratic_m: float


class Assessment(NamedTuple):
    """All that is said of one beam.

    `eye` and `skin` list every rule with the smallest limit first; `reach` is None where no
    beam was described.
    """

    question: Question
    eye: tuple[Held, ...]
    skin: tuple[Held, ...]
    classification: Classification
    reach: Reach | None
    density: float
    scale: Scale
    diffuse_m: float
    assumptions: tuple[str, ...]

    @property
    def strictest(self) -> Held:
        """The rule for the eye that this beam exceeds most."""
        return max(self.eye, key=lambda held: held.ratio)


def assess(asked: Question) -> Assessment:
    """Answer a question.

    Parameters
    ----------
    asked : Question
        As `question` gives it.

    Examples
    --------
    >>> beam = Exit(diameter_mm=1.0, divergence_rad=1e-3)
    >>> found = assess(question(532.0, 1.0, 0.25, beam))
    >>> round(found.reach.span.end_m, 1), found.scale.text, round(found.density, 2)
    (316.2, 'D LB6', 3.01)
    """
    eye, skin = _eye(asked), _skin(asked)
    classification = _classification(asked)
    scale = _scale(asked, eye[0].limit.aperture_mm)
    strictest = max(eye, key=lambda held: held.ratio)
    return Assessment(
        question=asked,
        eye=eye,
        skin=skin,
        classification=classification,
        reach=_reach(asked, eye),
        density=optical_density(strictest.exposure, strictest.limit.value),
        scale=scale,
        diffuse_m=viewing_distance_m(
            asked.wavelength_nm,
            asked.exposure_s,
            asked.light,
            spot_d63_mm=0.0 if asked.beam is None else asked.beam.d63_mm,
        ),
        assumptions=assumptions(asked, eye, skin, classification, scale),
    )


def _emitted(asked: Question) -> float:
    return asked.light.energy_j if isinstance(asked.light, Pulse) else asked.light


def _eye(asked: Question) -> tuple[Held, ...]:
    wl, time_s, light = asked.wavelength_nm, asked.exposure_s, asked.light
    if not isinstance(light, Pulse):
        return (_held_continuous(asked, eye_limit(wl, time_s)),)
    found = eye_rules(wl, time_s, Train(light.duration_s, light.rate_hz))
    return _held_pulses(asked, found, [eye_limit(wl, rule.duration_s) for rule in found])


def _skin(asked: Question) -> tuple[Held, ...]:
    wl, time_s, light = asked.wavelength_nm, asked.exposure_s, asked.light
    if not isinstance(light, Pulse):
        return (_held_continuous(asked, skin_limit(wl, time_s)),)
    found = skin_rules(wl, time_s, Train(light.duration_s, light.rate_hz))
    return _held_pulses(asked, found, [skin_limit(wl, rule.duration_s) for rule in found])


def _held_continuous(asked: Question, limit: Limit) -> Held:
    as_irradiance = limit._replace(value=limit.irradiance_w_m2, unit="W/m2")
    return Held("single exposure", as_irradiance, _averaged(asked, limit.aperture_mm))


def _held_pulses(asked: Question, found: tuple[Rule, ...], bases: list[Limit]) -> tuple[Held, ...]:
    held = [
        Held(rule.name, as_limit(base, rule), _averaged(asked, base.aperture_mm))
        for rule, base in zip(found, bases, strict=True)
    ]
    return tuple(sorted(held, key=lambda one: one.limit.value))


def _averaged(asked: Question, aperture_mm: float) -> float:
    """Return the exposure at the exit, where a beam with its waist there is narrowest."""
    beam = _gaussian(asked)
    share = 1.0 if beam is None else beam.share(aperture_mm, 0.0)
    return _emitted(asked) * share / circle_area_m2(aperture_mm)


def _gaussian(asked: Question) -> GaussianExit | None:
    if asked.beam is None:
        return None
    return GaussianExit(0.5 * asked.beam.diameter_mm, 0.5 * asked.beam.divergence_rad)


def _classification(asked: Question) -> Classification:
    beam = _gaussian(asked)
    if isinstance(asked.light, Pulse):
        return classify_pulsed(asked.wavelength_nm, asked.light, beam)
    return classify_continuous(asked.wavelength_nm, asked.light, beam)


def _reach(asked: Question, eye: tuple[Held, ...]) -> Reach | None:
    beam = _gaussian(asked)
    if beam is None or asked.beam is None:
        return None
    emitted = _emitted(asked)
    spans = [
        hazardous_span(
            emitted,
            held.limit.value,
            aperture_mm=held.limit.aperture_mm,
            waist_w_mm=beam.waist_w_mm,
            half_angle_86_rad=beam.half_angle_86_rad,
        )
        for held in eye
    ]
    angle = asked.beam.divergence_rad / D86_PER_D63
    least = eye[0].limit.value
    wide_m = asked.beam.d63_mm * 1e-3
    return Reach(
        span=max((s for s in spans if s is not None), key=lambda s: s.end_m, default=None),
        linear_m=nohd_linear_m(
            emitted, least, divergence_full_63_rad=angle, exit_diameter_63_m=wide_m
        ),
        quadratic_m=nohd_quadratic_m(
            emitted, least, divergence_full_63_rad=angle, exit_diameter_63_m=wide_m
        ),
    )


def _scale(asked: Question, aperture_mm: float) -> Scale:
    wide_mm = aperture_mm if asked.beam is None else asked.beam.d63_mm
    light = asked.light
    if not isinstance(light, Pulse):
        return continuous_scale(asked.wavelength_nm, light, wide_mm)
    return pulsed_scale(
        asked.wavelength_nm, light.energy_j, light.duration_s, light.rate_hz, wide_mm
    )
