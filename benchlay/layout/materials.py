"""Materials of sheets and bodies, and what anything withstands."""

from __future__ import annotations

from benchlay.document.form import Reader
from benchlay.document.forms import Quantity, RecordForm
from benchlay.document.quantity import Dimension
from benchlay.document.record import Record, key
from benchlay.layout._forms import POSITIVE, SHARE

_IRRADIANCE = Quantity(Dimension.IRRADIANCE, above=0.0)
_FLUENCE = Quantity(Dimension.FLUENCE, above=0.0)
_POWER = Quantity(Dimension.POWER, above=0.0)
_MASS_DENSITY = Quantity(Dimension.MASS_DENSITY, above=0.0)
_DURATION = Quantity(Dimension.DURATION, above=0.0)


class Withstands(Record):
    """A rating: an irradiance for a time, a power, or a fluence at a pulse duration."""

    irradiance_w_m2: float | None = key(
        _IRRADIANCE, default=None, name="irradiance", meaning="irradiance it withstands"
    )
    for_s: float | None = key(
        _DURATION, default=None, name="for", meaning="how long it withstands the irradiance"
    )
    power_w: float | None = key(_POWER, default=None, name="power", meaning="power it withstands")
    fluence_j_m2: float | None = key(
        _FLUENCE, default=None, name="fluence", meaning="fluence of one pulse it withstands"
    )
    at_s: float | None = key(
        _DURATION, default=None, name="at", meaning="pulse duration the fluence holds for"
    )

    def after_read(self, reader: Reader) -> None:
        """Ask for one rating, with the time that belongs to it."""
        given = [n for n in ("irradiance", "power", "fluence") if self.written(n)]
        if len(given) != 1:
            listed = " and ".join(f"'{n}'" for n in given)
            reader.complain(
                self.span_of(given[1]) if given else self.span,
                f"{listed} are given together" if given else "it rates nothing",
                expected="one of 'irradiance' (with 'for'), 'power' or 'fluence' (with 'at')",
                remedy=f"keep '{given[0]}' or '{given[1]}'"
                if given
                else "add 'irradiance: 20 W/cm2'",
            )
            return
        for time, rating in (("for", "irradiance"), ("at", "fluence")):
            if self.written(time) and rating not in given:
                reader.complain(
                    self.spans[time],
                    f"'{time}' says nothing beside '{given[0]}'",
                    expected=f"'{time}' only with '{rating}'",
                    remedy=f"remove '{time}'",
                )


class Material(Record):
    """An opaque sheet or body."""

    thickness_mm: float = key(
        POSITIVE, default=2.0, name="thickness", meaning="thickness of a sheet of it"
    )
    diffuse: float = key(SHARE, default=0.1, meaning="share scattered in all directions")
    specular: float = key(SHARE, default=0.05, meaning="share reflected as by a mirror")
    withstands: Withstands | None = key(
        RecordForm(Withstands), default=None, meaning="its rating; without one none is assumed"
    )
    density_kg_m3: float | None = key(
        _MASS_DENSITY,
        default=None,
        name="density",
        meaning="its density, for what sheets of it weigh; without one that is not computed",
    )

    def after_read(self, reader: Reader) -> None:
        """Refuse a surface that gives more than it gets."""
        total = self.diffuse + self.specular
        if total > 1.0:
            name = "specular" if self.written("specular") else "diffuse"
            reader.complain(
                self.spans[name],
                f"diffuse and specular shares add up to {total:.6g}",
                expected="at most 1 together",
                remedy="lower one of the two; the rest is absorbed",
            )


SHEET = Material()
"""Panels and lids without a material: thickness 2, diffuse 0.1, specular 0.05, no rating."""

BODY = Material(specular=0.0)
"""Bodies, mounts, apertures and shutters without a material: diffuse 0.1, specular 0."""
