r"""A beam in the open, round or not, and the stretch of it that exceeds a limit.

The matrix of squared 1/e^2 radii follows :math:`W^2(z) = A + 2zB + z^2C` for every beam,
with its foci wherever they lie and its axes however they turn, because second moments do
(ISO 11146-2). The radii are the roots of its eigenvalues.
"""

from __future__ import annotations

import math
from collections.abc import Callable

from benchlay.exposure.apertures import circle_area_m2
from benchlay.exposure.averaging import elliptical_fraction
from benchlay.exposure.distances import Span
from benchlay.exposure.errors import OutOfRange
from benchlay.named import NamedTuple

_MM_PER_M = 1e3
# Samples between the two foci of an astigmatic beam, where the share through a circle may
# rise and fall; halved towards each focus, at which it is highest.
_EVEN_SAMPLES = 48
_HALVINGS = 24
_BISECTIONS = 60  # below the last bit of a double
_FARTHEST_M = 1e12  # no lamp of the earth is dangerous there: the beam does not spread
_PARALLEL = 1e-14


class Axis(NamedTuple):
    """One principal axis of a beam.

    Attributes
    ----------
    waist_w_mm : float
        1/e^2 radius at the waist, mm.
    half_angle_86_rad : float
        1/e^2 half angle of divergence, rad.
    waist_at_m : float
        Where the waist lies, m ahead of the point that distances are counted from.
    """

    waist_w_mm: float
    half_angle_86_rad: float
    waist_at_m: float = 0.0


class Symmetric(NamedTuple):
    """A symmetric matrix of two rows."""

    xx: float
    xy: float
    yy: float

    @property
    def determinant(self) -> float:
        """Product of the eigenvalues."""
        return self.xx * self.yy - self.xy * self.xy

    @property
    def trace(self) -> float:
        """Sum of the eigenvalues."""
        return self.xx + self.yy


class OpenBeam(NamedTuple):
    """A beam from a point on, with nothing in its way.

    Attributes
    ----------
    square : Symmetric
        A: squared radii at the point, mm2.
    turn : Symmetric
        B: half of how they change there, mm2/m.
    spread : Symmetric
        C: squared half angles, mrad2, which is mm2/m2.
    """

    square: Symmetric
    turn: Symmetric
    spread: Symmetric

    def radii_mm(self, distance_m: float) -> tuple[float, float]:
        """Return the 1/e^2 radii along the principal axes, mm, the smaller first."""
        z = distance_m
        parts = zip(self.square, self.turn, self.spread, strict=True)
        here = Symmetric(*(a + z * (2.0 * b + z * c) for a, b, c in parts))
        middle, apart = 0.5 * here.trace, math.hypot(0.5 * (here.xx - here.yy), here.xy)
        large = middle + apart
        # The small eigenvalue as a quotient keeps its digits where the large one is far away.
        small = max(here.determinant, 0.0) / large if large > 0.0 else 0.0
        return math.sqrt(small), math.sqrt(large)

    def share(self, aperture_mm: float, distance_m: float) -> float:
        """Share of the power through a centred circle at a distance."""
        small, large = self.radii_mm(distance_m)
        return elliptical_fraction(0.5 * aperture_mm, small, large)

    def foci_m(self) -> tuple[float, float] | None:
        """Where the beam begins to narrow no more: before the first it only narrows, after
        the second it only spreads. None for a parallel beam.
        """  # noqa: D205 - one sentence on two lines
        b, c = self.turn, self.spread
        if c.trace <= 0.0:
            return None
        if c.determinant <= _PARALLEL * c.trace**2:
            one = -b.trace / c.trace  # one axis is parallel: the other one's waist
            return one, one
        # The roots of det(B + zC).
        half = -0.5 * (b.xx * c.yy + b.yy * c.xx - 2.0 * b.xy * c.xy) / c.determinant
        apart = math.sqrt(max(0.0, half * half - b.determinant / c.determinant))
        return half - apart, half + apart


def from_axes(first: Axis, second: Axis | None = None) -> OpenBeam:
    """Make a beam from its waists along two axes; round if there is one.

    Raises
    ------
    OutOfRange
        If a waist is not positive, an angle negative, or either not finite.
    """
    ax, bx, cx = _axis(first)
    ay, by, cy = (ax, bx, cx) if second is None else _axis(second)
    return OpenBeam(Symmetric(ax, 0.0, ay), Symmetric(bx, 0.0, by), Symmetric(cx, 0.0, cy))


def _axis(axis: Axis) -> tuple[float, float, float]:
    if not (
        0.0 < axis.waist_w_mm < math.inf
        and 0.0 <= axis.half_angle_86_rad < math.inf
        and math.isfinite(axis.waist_at_m)
    ):
        msg = f"no beam has a waist of {axis.waist_w_mm:g} mm, a half angle of "
        msg += f"{axis.half_angle_86_rad:g} rad and a focus at {axis.waist_at_m:g} m"
        raise OutOfRange(msg)
    spread = (axis.half_angle_86_rad * _MM_PER_M) ** 2
    turn = -spread * axis.waist_at_m
    return axis.waist_w_mm**2 - turn * axis.waist_at_m, turn, spread


def from_moments(
    position: tuple[float, float, float],
    coupled: tuple[float, float, float, float],
    angle: tuple[float, float, float],
    *,
    index: float = 1.0,
) -> OpenBeam:
    """Make a beam from its second moments, as `benchlay.optics.moments` has them.

    Parameters
    ----------
    position : tuple of float
        xx, xy, yy, mm2.
    coupled : tuple of float
        xu, xv, yu, yv, mm rad.
    angle : tuple of float
        uu, uv, vv, rad2; the angles are times the index of the medium.
    index : float, keyword-only
        That index.
    """
    xu, xv, yu, yv = coupled
    # w^2 is four times the variance; per metre and by the plain angle.
    once, twice = 4.0 * _MM_PER_M / index, 4.0 * (_MM_PER_M / index) ** 2
    return OpenBeam(
        Symmetric(*(4.0 * value for value in position)),
        Symmetric(*(once * value for value in (xu, 0.5 * (xv + yu), yv))),
        Symmetric(*(twice * value for value in angle)),
    )


def hazardous_stretch(
    beam: OpenBeam, power: float, limit_per_m2: float, aperture_mm: float
) -> Span | None:
    """Stretch in which a limiting aperture takes more than the limit allows.

    Parameters
    ----------
    beam : OpenBeam
        Counted from its point on, forwards.
    power, limit_per_m2 : float
        Power and limit, W and W/m2; or energy and limit of a pulse, J and J/m2.
    aperture_mm : float
        Diameter of the limiting aperture, mm.

    Returns
    -------
    Span or None
        From the first place to the last at which the limit is exceeded, so that what
        lies between two foci is inside; the end is infinite for a beam that does not
        spread. None if it is exceeded nowhere.
    """
    if not (0.0 <= power < math.inf and 0.0 < limit_per_m2 < math.inf):
        msg = f"no distance follows from {power:g} and a limit of {limit_per_m2:g}"
        raise OutOfRange(msg)
    allowed = limit_per_m2 * circle_area_m2(aperture_mm)
    if power <= allowed:  # however narrow the beam
        return None

    def over(z: float) -> bool:
        return power * beam.share(aperture_mm, z) > allowed

    places = _places(beam)
    while over(places[-1]) and places[-1] < _FARTHEST_M:
        places.append(2.0 * places[-1] + 1.0)
    found = [i for i, z in enumerate(places) if over(z)]
    if not found:
        return None
    first, last = found[0], found[-1]
    start = _edge(over, places[first], places[first - 1]) if first > 0 else places[0]
    if last == len(places) - 1:
        return Span(start, math.inf)
    return Span(start, _edge(over, places[last], places[last + 1]))


def _places(beam: OpenBeam) -> list[float]:
    """Where to look: between any two, the share through a circle does not rise and fall."""
    foci = beam.foci_m()
    if foci is None:
        return [0.0]
    low, high = foci
    gap = high - low
    inside = [low + gap * i / _EVEN_SAMPLES for i in range(1, _EVEN_SAMPLES)]
    for n in range(1, _HALVINGS):
        part = gap / _EVEN_SAMPLES * 0.5**n
        inside += [low + part, high - part]
    return sorted({0.0, *(z for z in (low, high, *inside) if z > 0.0)})


def _edge(over: Callable[[float], bool], inside: float, outside: float) -> float:
    for _ in range(_BISECTIONS):
        middle = 0.5 * (inside + outside)
        if over(middle):
            inside = middle
        else:
            outside = middle
    return outside


def far_field_m(beam: OpenBeam, power: float, limit_per_m2: float) -> float:
    r"""Distance of the far-field formula, from the point on, m: for a look beside.

    .. math:: \sqrt{2P/(\pi E\,\theta_1\theta_2)}

    The peak of a beam that spreads from a point with the 1/e^2 half angles; it knows no
    aperture and no focus. Infinite for a beam that does not spread both ways.
    """
    angles = math.sqrt(max(0.0, beam.spread.determinant)) / _MM_PER_M**2
    reached = 2.0 * power / (math.pi * limit_per_m2)
    return math.sqrt(reached / angles) if angles > 0.0 else math.inf
