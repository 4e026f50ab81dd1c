"""How far a beam, or what a surface scatters of it, exceeds an exposure limit.

Three formulas for a beam in the open: the exact one for a Gaussian beam averaged over
the limiting aperture, and the two of the standards, which know the beam by its exit
diameter and its full angle *at 1/e of the peak* (63 % of the power). Feeding 1/e^2
numbers into those understates the distance by the square root of two, so every
argument says which it is.

References
----------
.. [1] IEC TR 60825-14, Safety of laser products, part 14: a user's guide (the linear
   formula; from memory).
.. [2] ANSI Z136.1, Safe use of lasers, from the edition of 2000 (the quadratic
   formula; from memory).
.. [3] A. E. Siegman (1986). Lasers. University Science Books, section 17.1.
"""

from __future__ import annotations

import math

from benchlay.exposure.apertures import circle_area_m2
from benchlay.exposure.broadcast import broadcast
from benchlay.exposure.errors import OutOfRange
from benchlay.named import NamedTuple


class Span(NamedTuple):
    """Stretch of a beam in which the limit is exceeded, m from the exit."""

    start_m: float
    end_m: float


def _positive(name: str, value: float) -> float:
    if not 0.0 < value < math.inf:
        msg = f"{name} must be positive and finite, got {value:g}"
        raise OutOfRange(msg)
    return value


def _not_negative(name: str, value: float) -> float:
    if not 0.0 <= value < math.inf:
        msg = f"{name} must be finite and not negative, got {value:g}"
        raise OutOfRange(msg)
    return value


def _finite(name: str, value: float) -> float:
    if not math.isfinite(value):
        msg = f"{name} must be finite, got {value:g}"
        raise OutOfRange(msg)
    return value


@broadcast
def gaussian_fraction(aperture_radius: float, w: float) -> float:
    """Share of a Gaussian beam's power through a centred circle, 1 - exp(-2 a^2/w^2).

    Parameters
    ----------
    aperture_radius, w : float
        Radius of the circle and 1/e^2 radius of the beam, in one unit.

    >>> round(gaussian_fraction(1.0, 1.0), 3)
    0.865
    """
    ratio = _not_negative("the aperture's radius", aperture_radius) / _positive("w", w)
    return -math.expm1(-2.0 * ratio * ratio)


@broadcast
def mean_irradiance_w_m2(power_w: float, diameter_mm: float) -> float:
    """Power over the area of a circle, W/m2."""
    return power_w / circle_area_m2(_positive("the diameter", diameter_mm))


@broadcast
def nohd_linear_m(
    power_w: float,
    mpe_w_m2: float,
    *,
    divergence_full_63_rad: float,
    exit_diameter_63_m: float = 0.0,
) -> float:
    r"""Hazard distance by the linear formula, m: the less cautious one.

    .. math:: (\sqrt{4P/(\pi E)} - a) / \varphi

    Parameters
    ----------
    power_w, mpe_w_m2 : float
        Power, W, and limit, W/m2.
    divergence_full_63_rad, exit_diameter_63_m : float
        Full angle, rad, and diameter, m, both at 1/e of the peak. A parallel beam
        (angle 0) has no end: infinity, if it exceeds the limit at all.
    """
    wide = _required_diameter_m(power_w, mpe_w_m2)
    start = _not_negative("the exit diameter", exit_diameter_63_m)
    phi = _not_negative("the divergence", divergence_full_63_rad)
    if wide <= start:
        return 0.0
    return (wide - start) / phi if phi > 0.0 else math.inf


@broadcast
def nohd_quadratic_m(
    power_w: float,
    mpe_w_m2: float,
    *,
    divergence_full_63_rad: float,
    exit_diameter_63_m: float = 0.0,
) -> float:
    r"""Hazard distance by the quadratic formula, m; never less than the linear one.

    .. math:: \sqrt{4P/(\pi E) - a^2} / \varphi

    Parameters are those of `nohd_linear_m`.
    """
    wide = _required_diameter_m(power_w, mpe_w_m2)
    start = _not_negative("the exit diameter", exit_diameter_63_m)
    phi = _not_negative("the divergence", divergence_full_63_rad)
    if wide <= start:
        return 0.0
    across = math.sqrt((wide - start) * (wide + start))
    return across / phi if phi > 0.0 else math.inf


def _required_diameter_m(power_w: float, mpe_w_m2: float) -> float:
    power = _not_negative("the power", power_w)
    return math.sqrt(4.0 * power / (math.pi * _positive("the limit", mpe_w_m2)))


def hazardous_span(
    power_w: float,
    mpe_w_m2: float,
    *,
    aperture_mm: float,
    waist_w_mm: float,
    half_angle_86_rad: float,
    waist_at_m: float = 0.0,
) -> Span | None:
    """Stretch of a Gaussian beam in which a limiting aperture takes too much.

    The beam's radius follows w^2 = w0^2 + theta^2 (z - z0)^2; the aperture is centred.

    Parameters
    ----------
    power_w, mpe_w_m2 : float
        Power, W, and limit, W/m2.
    aperture_mm : float
        Diameter of the limiting aperture, mm.
    waist_w_mm : float
        1/e^2 radius at the waist, mm.
    half_angle_86_rad : float
        1/e^2 half angle of divergence, rad.
    waist_at_m : float
        Where the waist lies, m from the exit; negative behind it.

    Returns
    -------
    Span or None
        Start (never before the exit) and end, m; the end is infinite for a parallel
        beam. None if the limit is nowhere exceeded beyond the exit.
    """
    allowed = _positive("the limit", mpe_w_m2) * circle_area_m2(
        _positive("the aperture", aperture_mm)
    )
    power = _not_negative("the power", power_w)
    w0 = _positive("the waist", waist_w_mm) * 1e-3
    theta = _not_negative("the half angle", half_angle_86_rad)
    waist_at = _finite("the place of the waist", waist_at_m)
    if power <= allowed:
        return None
    w_squared = -2.0 * (aperture_mm * 0.5e-3) ** 2 / math.log1p(-allowed / power)
    excess = w_squared - w0 * w0
    if excess <= 0.0:
        return None
    reach = math.sqrt(excess) / theta if theta > 0.0 else math.inf
    if waist_at + reach <= 0.0:
        return None
    return Span(max(0.0, waist_at - reach), waist_at + reach)


@broadcast
def nohd_exact_m(
    power_w: float,
    mpe_w_m2: float,
    *,
    aperture_mm: float,
    waist_w_mm: float,
    half_angle_86_rad: float,
    waist_at_m: float = 0.0,
) -> float:
    """End of `hazardous_span`, m, or 0 if there is none. Parameters as there."""
    span = hazardous_span(
        power_w,
        mpe_w_m2,
        aperture_mm=aperture_mm,
        waist_w_mm=waist_w_mm,
        half_angle_86_rad=half_angle_86_rad,
        waist_at_m=waist_at_m,
    )
    return 0.0 if span is None else span.end_m


@broadcast
def diffuse_distance_m(
    power_w: float,
    mpe_w_m2: float,
    *,
    reflectance: float = 1.0,
    angle_rad: float = 0.0,
    spot_radius_m: float = 0.0,
) -> float:
    r"""Distance at which light scattered by a matt surface falls to the limit, m.

    .. math:: r^2 = \rho P \cos\theta / (\pi E) - R^2

    Parameters
    ----------
    power_w, mpe_w_m2 : float
        Power on the surface, W, and limit, W/m2; the limit of a point source is the
        larger hazard.
    reflectance : float
        Diffuse reflectance, 0 to 1.
    angle_rad : float
        Between the surface's normal and the line of sight, rad.
    spot_radius_m : float
        Radius of the evenly lit disc, m; seen along its normal (0: a point).
    """
    if not 0.0 <= reflectance <= 1.0:
        msg = f"the reflectance must lie between 0 and 1, got {reflectance:g}"
        raise OutOfRange(msg)
    power = _not_negative("the power", power_w)
    radius = _not_negative("the spot's radius", spot_radius_m)
    towards = max(0.0, math.cos(_finite("the angle", angle_rad)))
    squared = reflectance * power * towards / (math.pi * _positive("the limit", mpe_w_m2))
    return math.sqrt(max(0.0, squared - radius * radius))
