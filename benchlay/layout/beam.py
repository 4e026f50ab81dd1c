"""The shape of a beam at its source, in the three ways it may be stated."""

from __future__ import annotations

from math import log, pi, sqrt
from typing import Any

from benchlay.document.form import Reader
from benchlay.document.forms import Quantity, Words
from benchlay.document.quantity import Dimension
from benchlay.document.record import Record, key
from benchlay.layout._forms import LENGTH, POSITIVE
from benchlay.named import NamedTuple

_M2 = Quantity(Dimension.RATIO, at_least=1.0, at_most=1e6)
# Beyond a quarter turn in full no beam is paraxial, and its moments say nothing.
_WIDEST_RAD = pi / 2
_DIVERGENCE = Quantity(Dimension.ANGLE, above=0.0, below=_WIDEST_RAD)
# Quoted figures have two or three digits: a quotient a little under 1 is their rounding.
_LEAST_M2 = 0.99
_NM_IN_MM = 1e-6

# Widths are quoted where irradiance is a share of its peak; I = exp(-2 r²/w²) turns them
# into w: 1/e at r = w/√2, half at r = w·√(ln 2 / 2).
TO_1_E2 = {"1/e2": 1.0, "1/e": sqrt(2.0), "fwhm": 1.0 / sqrt(log(2.0) / 2.0)}

_ROUND = ("waist_radius", "waist_ahead", "m2")
_EXIT = ("diameter", "divergence")
_ASTIGMATIC = (
    "waist_radius_h",
    "waist_radius_v",
    "waist_ahead_h",
    "waist_ahead_v",
    "m2_h",
    "m2_v",
)
_WAYS = (_ROUND, _EXIT, _ASTIGMATIC)
_NEEDED = (("waist_radius",), _EXIT, ("waist_radius_h", "waist_radius_v"))
_EXPECTED = (
    "'waist_radius' (with 'waist_ahead' and 'm2'), or 'diameter' and 'divergence', "
    "or 'waist_radius_h' and 'waist_radius_v' (with their own 'waist_ahead' and 'm2')"
)


class Waists(NamedTuple):
    """Waist radius, its distance ahead of the exit and M², horizontally (1) and vertically (2)."""

    radius_1_mm: float
    radius_2_mm: float
    ahead_1_mm: float
    ahead_2_mm: float
    m2_1: float
    m2_2: float


def _radius(name: str, meaning: str) -> Any:  # noqa: ANN401 - a key stands for its value
    return key(POSITIVE, default=None, name=name, meaning=meaning)


def _ahead(name: str, meaning: str) -> Any:  # noqa: ANN401 - a key stands for its value
    return key(LENGTH, default=0.0, name=name, meaning=meaning)


def _quality(name: str, meaning: str) -> Any:  # noqa: ANN401 - a key stands for its value
    return key(_M2, default=1.0, name=name, meaning=meaning)


class BeamShape(Record):
    """A beam's shape as written; `waists` gives it in one form for a wavelength."""

    radius_mm: float | None = _radius("waist_radius", "1/e² radius at the waist")
    ahead_mm: float = _ahead("waist_ahead", "distance of the waist ahead of the exit")
    m2: float = _quality("m2", "beam propagation ratio M²")
    diameter_mm: float | None = _radius("diameter", "1/e² diameter at the exit")
    divergence_rad: float | None = key(
        _DIVERGENCE, default=None, name="divergence", meaning="full angle at 1/e²"
    )
    radius_h_mm: float | None = _radius("waist_radius_h", "the same, horizontally")
    radius_v_mm: float | None = _radius("waist_radius_v", "the same, vertically")
    ahead_h_mm: float = _ahead("waist_ahead_h", "the same, horizontally")
    ahead_v_mm: float = _ahead("waist_ahead_v", "the same, vertically")
    m2_h: float = _quality("m2_h", "the same, horizontally")
    m2_v: float = _quality("m2_v", "the same, vertically")
    to_1_e2: float = key(
        Words(TO_1_E2),
        default=1.0,
        name="widths",
        meaning="at which share of the peak radii, diameters and divergences were quoted",
    )

    def after_read(self, reader: Reader) -> None:
        """Ask for one way of stating it, whole."""
        used = [k for k, way in enumerate(_WAYS) if any(map(self.written, way))]
        names = [next(filter(self.written, _WAYS[k])) for k in used]
        if len(used) > 1:
            reader.complain(
                self.spans[names[1]],
                f"'{names[0]}' and '{names[1]}' belong to different ways of stating a beam",
                expected=_EXPECTED,
                remedy=f"remove '{names[0]}' or '{names[1]}'",
            )
            return
        needed = _NEEDED[used[0]] if used else _NEEDED[0]
        missing = [n for n in needed if not self.written(n)]
        if missing:
            reader.complain(
                self.span,
                f"'{missing[0]}' is missing",
                expected=_EXPECTED,
                remedy=f"add '{missing[0]}'",
            )

    def measured_m2(self, wavelength_nm: float, index: float = 1.0) -> float | None:
        """Return M² as exit diameter and divergence fix it; None where they are not given.

        M² = π d n θ / (4 λ) with the full divergence θ in a medium of index n, the waist at
        the exit and λ in vacuum (ISO 11146-1).
        """
        if self.diameter_mm is None or self.divergence_rad is None:
            return None
        product = self.diameter_mm * self.divergence_rad * self.to_1_e2**2
        return pi * index * product / (4.0 * wavelength_nm * _NM_IN_MM)

    def waists(self, wavelength_nm: float, index: float = 1.0) -> Waists:
        """Return the waists of the line of a vacuum wavelength, in mm, in a medium of an index."""
        scale = self.to_1_e2
        m2 = self.measured_m2(wavelength_nm, index)
        if m2 is not None:
            w = scale * (self.diameter_mm or 0.0) / 2
            return Waists(w, w, 0.0, 0.0, max(m2, 1.0), max(m2, 1.0))
        if self.radius_mm is not None:
            w = scale * self.radius_mm
            return Waists(w, w, self.ahead_mm, self.ahead_mm, self.m2, self.m2)
        w_h, w_v = scale * (self.radius_h_mm or 0.0), scale * (self.radius_v_mm or 0.0)
        return Waists(w_h, w_v, self.ahead_h_mm, self.ahead_v_mm, self.m2_h, self.m2_v)

    def _refuse_specks(self, wavelength_nm: float, reader: Reader) -> None:
        """Refuse waists from which light would spread over more than a quarter turn.

        The full divergence from a waist w is 4 M² λ / (π d) with d = 2 w (ISO 11146-1).
        """
        radii = (
            ("waist_radius", self.radius_mm, self.m2),
            ("waist_radius_h", self.radius_h_mm, self.m2_h),
            ("waist_radius_v", self.radius_v_mm, self.m2_v),
        )
        for name, radius, m2 in radii:
            least = 2.0 * m2 * wavelength_nm * _NM_IN_MM / (pi * _WIDEST_RAD * self.to_1_e2)
            if radius is not None and radius <= least:
                reader.complain(
                    self.spans[name],
                    f"from a waist of {radius:.3g} mm light of {wavelength_nm:g} nm would spread "
                    "over more than 90°",
                    expected=f"a radius above {least:.3g} mm for this wavelength and M²",
                    remedy="check the unit: a bare number is in mm",
                )

    def check_line(self, wavelength_nm: float, reader: Reader) -> None:
        """Refuse a beam that diverges less than light of this wavelength can, or too much."""
        self._refuse_specks(wavelength_nm, reader)
        m2 = self.measured_m2(wavelength_nm)
        if m2 is None or m2 >= _LEAST_M2:
            return
        least = (self.divergence_rad or 0.0) / m2
        reader.complain(
            self.spans["divergence"],
            f"no beam of {wavelength_nm:g} nm this wide diverges so little: M² would be {m2:.3g}",
            expected=f"a full divergence of at least {least * 1e3:.4g} mrad for this diameter",
            remedy="check that 'divergence' is the full angle and 'diameter' is not a radius, "
            "or state 'widths'",
        )
