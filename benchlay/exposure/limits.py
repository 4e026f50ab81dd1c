"""Exposure limits of the eye and the skin for one exposure or one pulse.

The maximum permissible exposures of IEC 60825-1:2014 from 180 nm to 1 mm and from
1e-13 s to 30000 s. Where two limits apply (heat and photochemistry on the retina; the
retina and the front of the eye from 1250 to 1400 nm) the smaller is taken and named.
Nothing is extrapolated: `OutOfRange` is raised instead.

The limits guard against acute harm to normal eyes. They are no line between safe and
dangerous; the standard, local rules and the laser safety officer decide.
"""

from __future__ import annotations

import math
from typing import TYPE_CHECKING

from benchlay.exposure.apertures import eye_aperture_mm, skin_aperture_mm
from benchlay.exposure.broadcast import broadcast, broadcast_as
from benchlay.exposure.errors import OutOfRange
from benchlay.exposure.factors import (
    ALPHA_MIN_MRAD,
    RETINA_NM,
    check_alpha,
    check_duration,
    check_wavelength,
    gamma_ph_mrad,
    is_retinal,
)
from benchlay.exposure.tables import (
    DOSE,
    IRRADIANCE,
    Cell,
    Unit,
    infrared,
    retina_photochemical,
    retina_thermal,
    skin,
    ultraviolet,
)
from benchlay.named import NamedTuple

if TYPE_CHECKING:
    from benchlay.exposure.broadcast import Floats, Words

EDITION = "IEC 60825-1:2014"
ANTERIOR_FROM_NM = 1250.0
_LARGE_AREA_FROM_S = 10.0


class Limit(NamedTuple):
    """A limit and what it rests on.

    Attributes
    ----------
    value : float
        The limit, in `unit`.
    unit : {"W/m2", "J/m2"}
        As the standard's table writes it.
    governs : str
        ``thermal``, ``photochemical``, ``anterior`` (the cap for the front of the
        eye) or ``skin``.
    wavelength_nm, duration_s : float
        What the limit was looked up for.
    aperture_mm : float
        Diameter of the limiting aperture over which the exposure is averaged.
    source : str
        Edition and table, and whether the number was recalled.
    assumptions : tuple of str
        What must hold for the number to apply.
    """

    value: float
    unit: Unit
    governs: str
    wavelength_nm: float
    duration_s: float
    aperture_mm: float
    source: str
    assumptions: tuple[str, ...]

    @property
    def dose_j_m2(self) -> float:
        """The limit as a radiant exposure over its duration, J/m2."""
        return self.value if self.unit == DOSE else self.value * self.duration_s

    @property
    def irradiance_w_m2(self) -> float:
        """The limit as an irradiance, even over its duration, W/m2."""
        return self.value if self.unit == IRRADIANCE else self.value / self.duration_s


class Limits(NamedTuple):
    """Limits of arrays of questions: the fields of `Limit` as arrays of one shape.

    `assumptions` lists what applies to any of them.
    """

    value: Floats
    unit: Words
    governs: Words
    wavelength_nm: Floats
    duration_s: Floats
    aperture_mm: Floats
    source: Words
    assumptions: tuple[str, ...]

    @property
    def dose_j_m2(self) -> Floats:
        """The limits as radiant exposures over their durations, J/m2."""
        over_time: Floats = 1.0 * (self.unit == IRRADIANCE)
        return self.value * self.duration_s**over_time

    @property
    def irradiance_w_m2(self) -> Floats:
        """The limits as irradiances, even over their durations, W/m2."""
        return self.dose_j_m2 / self.duration_s


def _source(table: str, cell: Cell) -> str:
    number = "this value from memory" if cell.from_memory else "value as in public texts"
    return f"{EDITION}, table {table} (table number from memory; {number})"


@broadcast_as(Limits)
def eye_limit(
    wavelength_nm: float, duration_s: float, *, alpha_mrad: float = ALPHA_MIN_MRAD
) -> Limit:
    """Maximum permissible exposure of the eye, at the cornea.

    Parameters
    ----------
    wavelength_nm : float
        Vacuum wavelength, nm, 180 nm to 1 mm.
    duration_s : float
        Exposure or pulse duration, s, 1e-13 s to 30000 s.
    alpha_mrad : float, keyword-only
        Angle that the source subtends at the eye, mrad; it is not the divergence of
        the beam. The default, 1.5 mrad, is the point source, the strictest case.

    Raises
    ------
    OutOfRange
        If no limit exists for these values.

    Notes
    -----
    From 1250 to 1400 nm the retina's limit is capped by the skin's limit, as ICNIRP
    (2013) recommends; the two numbers are compared directly, although the skin's is
    defined for 3.5 mm and the eye's for 7 mm.

    Examples
    --------
    >>> limit = eye_limit(532.0, 100.0)
    >>> limit.value, limit.unit, limit.governs
    (10.0, 'W/m2', 'thermal')
    """
    wl, t = check_wavelength(wavelength_nm), check_duration(duration_s)
    alpha = check_alpha(alpha_mrad)
    cell, notes = _governing(wl, t, alpha)
    table = "A.2" if is_retinal(wl) and alpha > ALPHA_MIN_MRAD else "A.1"
    if cell.governs == "anterior":
        table = "A.5"
    return Limit(
        value=cell.value,
        unit=cell.unit,
        governs=cell.governs,
        wavelength_nm=wl,
        duration_s=t,
        aperture_mm=eye_aperture_mm(wl, t),
        source=_source(table, cell),
        assumptions=notes,
    )


def _governing(wl: float, t: float, alpha: float) -> tuple[Cell, tuple[str, ...]]:
    if not is_retinal(wl):
        return (ultraviolet if wl < RETINA_NM[0] else infrared)(wl, t), ("a single exposure",)
    thermal = retina_thermal(wl, t, alpha)
    candidates = [thermal]
    notes = ["a single exposure"]
    if alpha <= ALPHA_MIN_MRAD:
        notes.append("a point source: the source subtends 1.5 mrad or less")
    else:
        notes.append(f"a source that subtends {alpha:g} mrad at the eye, one value both ways")
    photochemical = retina_photochemical(wl, t, alpha)
    if photochemical is not None:
        candidates.append(photochemical)
        if alpha > gamma_ph_mrad(t):
            notes.append(
                f"the photochemical limit counts all light, not only that inside "
                f"{gamma_ph_mrad(t):g} mrad"
            )
    if wl >= ANTERIOR_FROM_NM:
        candidates.append(skin(wl, t)._replace(governs="anterior"))
        notes.append(
            "the front of the eye is held to the limit of the skin, averaged over 7 mm "
            "(ICNIRP 2013; the standard uses a Class 3B cap for products)"
        )
    # min keeps the first of equals, so heat is named where the two limits coincide.
    return min(candidates, key=lambda c: c.dose_j_m2(t)), tuple(notes)


@broadcast
def eye_thermal_limit_j_m2(
    wavelength_nm: float, duration_s: float, *, alpha_mrad: float = ALPHA_MIN_MRAD
) -> float:
    """Thermal limit of the retina alone, as a dose, J/m2 (400 to 1400 nm).

    Raises
    ------
    OutOfRange
        If no such limit exists.
    """
    wl, t = check_wavelength(wavelength_nm), check_duration(duration_s)
    return retina_thermal(wl, t, check_alpha(alpha_mrad)).dose_j_m2(t)


@broadcast
def eye_photochemical_limit_j_m2(
    wavelength_nm: float, duration_s: float, *, alpha_mrad: float = ALPHA_MIN_MRAD
) -> float:
    """Photochemical limit of the retina alone, as a dose, J/m2; infinite where there is none.

    Raises
    ------
    OutOfRange
        If no limit of any kind exists.
    """
    wl, t = check_wavelength(wavelength_nm), check_duration(duration_s)
    cell = retina_photochemical(wl, t, check_alpha(alpha_mrad))
    return math.inf if cell is None else cell.dose_j_m2(t)


@broadcast_as(Limits)
def skin_limit(
    wavelength_nm: float, duration_s: float, *, exposed_area_m2: float | None = None
) -> Limit:
    """Maximum permissible exposure of the skin.

    Parameters
    ----------
    wavelength_nm, duration_s : float
        As for `eye_limit`.
    exposed_area_m2 : float, optional
        Skin exposed, m2. From 1400 nm and 10 s up a large area bears less: 1000 W/m2
        up to 0.01 m2, then 10/A, then 100 W/m2 above 0.1 m2 (from memory). Without
        it a small area is assumed, and said so.

    Raises
    ------
    OutOfRange
        If no limit exists for these values, or the area is not positive.

    Examples
    --------
    >>> skin_limit(633.0, 100.0).value
    2000.0
    """
    wl, t = check_wavelength(wavelength_nm), check_duration(duration_s)
    cell, notes = skin(wl, t), ["a single exposure"]
    if exposed_area_m2 is not None and not exposed_area_m2 > 0.0:
        msg = f"the exposed area must be positive, got {exposed_area_m2:g} m2"
        raise OutOfRange(msg)
    if wl >= RETINA_NM[1] and t >= _LARGE_AREA_FROM_S:
        if exposed_area_m2 is None:
            notes.append("an exposed area of 0.01 m2 or less; a larger one bears less")
        else:
            value = min(1000.0, max(100.0, 10.0 / exposed_area_m2))
            cell = Cell(value, IRRADIANCE, "thermal", from_memory=True)
    return Limit(
        value=cell.value,
        unit=cell.unit,
        governs=cell.governs,
        wavelength_nm=wl,
        duration_s=t,
        aperture_mm=skin_aperture_mm(wl),
        source=_source("A.5", cell),
        assumptions=tuple(notes),
    )
