"""What a limiting aperture takes of a beam: the average that limits are compared with.

A limit is compared with the power through its aperture over the aperture's area, never
with the peak of a beam that is smaller, and never over less than the aperture.
"""

from __future__ import annotations

import math

from benchlay.exposure.apertures import circle_area_m2
from benchlay.exposure.broadcast import broadcast
from benchlay.exposure.distances import gaussian_fraction
from benchlay.exposure.errors import OutOfRange

# Radii that differ by less are round: the share changes by the square of it.
_ROUND = 1e-7
_SETTLED = 1e-13
_FEWEST, _MOST = 16, 2**16


@broadcast
def elliptical_fraction(aperture_radius: float, w_first: float, w_second: float) -> float:
    r"""Share of an elliptical Gaussian beam's power through a centred circle.

    .. math:: 1 - \frac{2}{\pi}\int_0^{\pi/2}
              \exp\frac{-2a^2}{w_1^2\cos^2\psi + w_2^2\sin^2\psi}\,d\psi

    Parameters
    ----------
    aperture_radius, w_first, w_second : float or array_like
        Radius of the circle and the 1/e^2 radii along the two axes, in one unit. The
        centre is where a circle takes most.

    Raises
    ------
    OutOfRange
        If the circle's radius is negative, or one of the beam's is not positive.

    Notes
    -----
    The inner integral over the distance from the axis is done in the coordinates x/w1,
    y/w2, in which the beam is round. What remains is smooth and periodic, so that the
    trapezoid rule converges faster than any power of its step; the step is halved until
    nothing changes. `benchlay.optics.special` has the same share of many beams at once; for
    one beam this is thirty times quicker, and a test holds the two together.

    Examples
    --------
    >>> elliptical_fraction(1.0, 1.0, 1.0) == gaussian_fraction(1.0, 1.0)
    True
    >>> round(elliptical_fraction(3.5, 0.5, 10.0), 4)
    0.515
    """
    short, wide = sorted((w_first, w_second))
    if not 0.0 < short <= wide < math.inf:
        msg = f"the radii of a beam must be positive, got {w_first:g} and {w_second:g}"
        raise OutOfRange(msg)
    if wide - short <= _ROUND * wide:
        return gaussian_fraction(aperture_radius, math.sqrt(short * wide))
    long_sq, short_sq, a_sq = wide * wide, short * short, aperture_radius * aperture_radius

    def missed(psi: float) -> float:
        cosine = math.cos(psi)
        return math.exp(-2.0 * a_sq / (short_sq + (long_sq - short_sq) * cosine * cosine))

    steps = _FEWEST
    step = 0.5 * math.pi / steps
    total = 0.5 * (missed(0.0) + missed(0.5 * math.pi))
    total += math.fsum(missed(i * step) for i in range(1, steps))
    before, now = math.inf, total / steps
    while abs(now - before) > _SETTLED and steps < _MOST:
        total += math.fsum(missed((i + 0.5) * step) for i in range(steps))
        steps, step = 2 * steps, 0.5 * step
        before, now = now, total / steps
    # A rounder beam of the longer radius can only lose more.
    return max(gaussian_fraction(aperture_radius, wide), 1.0 - now)


@broadcast
def averaged_exposure(
    emitted: float, aperture_mm: float, w_first_mm: float, w_second_mm: float
) -> float:
    """Exposure to compare with a limit, per m2.

    Parameters
    ----------
    emitted : float or array_like
        Power, W, or energy, J; the result is W/m2 or J/m2.
    aperture_mm : float or array_like
        Diameter of the limiting aperture, mm.
    w_first_mm, w_second_mm : float or array_like
        1/e^2 radii of the beam, mm.

    Examples
    --------
    A beam of 0.3 mm is judged by its 1 mW over 7 mm, not by its peak of 28 300 W/m2:

    >>> round(averaged_exposure(1e-3, 7.0, 0.15, 0.15), 2)
    25.98
    """
    share = elliptical_fraction(0.5 * aperture_mm, w_first_mm, w_second_mm)
    return emitted * share / circle_area_m2(aperture_mm)
