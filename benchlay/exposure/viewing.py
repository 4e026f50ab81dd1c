r"""From how far away a lit matt surface may be looked at, its size taken into account.

The spot is an extended source: nearer to it, it fills a larger angle, and the limit of the
retina rises with the angle. So the distance is where the two curves last meet. The light
is :math:`\rho P/(\pi r^2)` seen along the surface's normal (Lambert), with no credit for an
oblique view. Nearer than 100 mm no eye can focus, so the size of the spot never brings the
distance below that; a point whose own distance is shorter keeps it.
"""

from __future__ import annotations

import math
from collections.abc import Callable, Iterator

from benchlay.exposure.accessible import Pulse
from benchlay.exposure.distances import diffuse_distance_m
from benchlay.exposure.errors import OutOfRange
from benchlay.exposure.factors import alpha_max_mrad, is_retinal
from benchlay.exposure.limits import eye_limit
from benchlay.exposure.trains import Train, eye_rules

NEAREST_M = 0.1
_BISECTIONS = 100  # below the last bit of a double
# Angles at which a rule of the limits begins or ends, mrad; alpha_max comes with the times.
_ANGLES_MRAD = (1.5, 5.0, 82.0, 100.0)
LimitOf = Callable[[float], float]


def viewing_distance_m(
    wavelength_nm: float,
    exposure_s: float,
    light: float | Pulse,
    *,
    spot_d63_mm: float = 0.0,
    reflectance: float = 1.0,
) -> float:
    """Distance from a lit matt surface at which the eye's limit is met, m.

    Parameters
    ----------
    wavelength_nm, exposure_s : float
        Vacuum wavelength, nm, and duration of the exposure, s.
    light : float or Pulse
        Power of continuous light on the surface, W; or its pulses.
    spot_d63_mm : float, keyword-only
        Diameter that holds 63 % of the power on the surface, mm; 0 is a point, the
        larger hazard.
    reflectance : float, keyword-only
        Diffuse reflectance, 0 to 1.

    Raises
    ------
    OutOfRange
        If no limit exists, or an argument cannot be one.

    Examples
    --------
    5 W of green light for a quarter of a second, from a point and from a spot of 2 mm:

    >>> round(viewing_distance_m(514.5, 0.25, 5.0), 3)
    0.25
    >>> round(viewing_distance_m(514.5, 0.25, 5.0, spot_d63_mm=2.0), 4)
    0.1
    """
    emitted, limit_of, times_s = _question(wavelength_nm, exposure_s, light)
    if not 0.0 <= spot_d63_mm < math.inf:
        msg = f"the spot's diameter must be finite and not negative, got {spot_d63_mm:g} mm"
        raise OutOfRange(msg)

    def reach(alpha_mrad: float) -> float:
        return diffuse_distance_m(emitted, limit_of(alpha_mrad), reflectance=reflectance)

    point_m = reach(0.0)
    if not is_retinal(wavelength_nm):
        return point_m
    for near_m, far_m, alpha_near, alpha_far in _intervals(spot_d63_mm, times_s):
        # Within an interval the excess only grows towards the spot.
        if reach(alpha_far) >= far_m:
            return far_m
        if reach(alpha_near) > near_m:
            # From the farthest interval the spot is a point, whose limit is one number.
            far = math.isinf(far_m)
            return point_m if far else _meeting(reach, spot_d63_mm, near_m, far_m)
    return min(point_m, NEAREST_M)


def _question(
    wavelength_nm: float, exposure_s: float, light: float | Pulse
) -> tuple[float, LimitOf, tuple[float, ...]]:
    """Return what is emitted, its limit by angle, and the times whose largest angles matter."""
    if not isinstance(light, Pulse):
        return (
            light,
            lambda a: eye_limit(wavelength_nm, exposure_s, alpha_mrad=a).irradiance_w_m2,
            (exposure_s,),
        )
    train = Train(light.duration_s, light.rate_hz)

    def per_pulse(alpha_mrad: float) -> float:
        found = eye_rules(wavelength_nm, exposure_s, train, alpha_mrad=alpha_mrad)
        return min(rule.per_pulse for rule in found)

    return light.energy_j, per_pulse, (light.duration_s, exposure_s)


def _intervals(
    d63_mm: float, times_s: tuple[float, ...]
) -> Iterator[tuple[float, float, float, float]]:
    """Yield near and far end, m, and the angles there, mrad, from the farthest inwards."""
    widest = d63_mm / NEAREST_M  # mm/m is mrad
    breaks = {*_ANGLES_MRAD, *(alpha_max_mrad(t) for t in times_s)}
    far_m, from_mrad = math.inf, 0.0
    for alpha in sorted(a for a in breaks if a < widest):
        yield d63_mm / alpha, far_m, alpha, from_mrad
        far_m, from_mrad = d63_mm / alpha, math.nextafter(alpha, math.inf)
    yield NEAREST_M, far_m, widest, from_mrad


def _meeting(reach: LimitOf, d63_mm: float, near_m: float, far_m: float) -> float:
    """Bisect for the place where light of the spot's angle just reaches."""
    for _ in range(_BISECTIONS):
        middle = 0.5 * (near_m + far_m)
        if reach(d63_mm / middle) > middle:
            near_m = middle
        else:
            far_m = middle
    return far_m
