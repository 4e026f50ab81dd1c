"""A filter: a window that weakens light inside, everywhere or by wavelength.

.. code-block:: yaml

   F1: {kind: filter, after: laser, distance: 90, diameter: 25.4, density: OD 1, incidence: 4}

`density` (an optical density: `2` and `OD 2` both let 1 % pass) and `bands` are internal, at
normal incidence, and grow with the path inside; outside every band nothing passes. With
`reflective: yes` the front face sends the refused share back instead.
"""

from __future__ import annotations

from math import inf
from typing import ClassVar

from benchlay.document.form import Reader
from benchlay.document.forms import ListOf, RecordForm, YesNo
from benchlay.document.record import key
from benchlay.elements._coating import (
    COATING,
    UNCOATED,
    Band,
    BandKeys,
    Coating,
    everywhere,
    refuse_overlap,
)
from benchlay.elements._glass import GLASS
from benchlay.elements._kind import CLEAR, Branches, Bulk, ElementKind, Geometry, Glass
from benchlay.elements._shares import SHARE, DensityForm
from benchlay.elements._sized import (
    LENGTH_OR_ZERO,
    PlateShape,
    Wedged,
    plate_geometry,
)
from benchlay.elements._through import PASSING_PLATE


class PassBand(BandKeys):
    """A share passed between two wavelengths."""

    transmits: float = key(SHARE, meaning="internal share passed at normal incidence")


class Filter(Wedged, ElementKind):
    """A filter: a window that weakens light inside."""

    KIND = "filter"
    BRANCHES: ClassVar[Branches] = PASSING_PLATE
    DEFAULT_BRANCH = "transmitted"
    TURNS_FRONT = True

    density: float | None = key(
        DensityForm(), default=None, meaning="internal optical density, the same at all wavelengths"
    )
    bands: tuple[PassBand, ...] | None = key(
        ListOf(RecordForm(PassBand), min=1),
        default=None,
        meaning="internal share passed by wavelength; nothing outside",
    )
    reflective: bool = key(
        YesNo(), default=False, meaning="the front face sends the refused share back"
    )
    thickness_mm: float = key(
        LENGTH_OR_ZERO, default=2.0, name="thickness", meaning="thickness at the centre"
    )
    glass: Glass = key(GLASS, default=Glass("BK7", None), meaning="the plate")
    front: Coating = key(COATING, default=UNCOATED, meaning="coating of the front face")
    back: Coating = key(COATING, default=UNCOATED, meaning="coating of the back face")

    def after_read(self, reader: Reader) -> None:
        """Ask for exactly one way of weakening, and for a sensible front."""
        super().after_read(reader)
        if (self.density is None) == (self.bands is None):
            both = self.bands is not None
            reader.complain(
                self.span_of("bands"),
                "both a density and bands are given"
                if both
                else "neither a density nor bands are given",
                expected="either 'density: OD 1' or 'bands: [{from: 500, to: 560, "
                "transmits: 90 %}]'",
                remedy="remove 'density' or 'bands'"
                if both
                else "add 'density: OD 1', with the density that is meant",
            )
        refuse_overlap(self.bands or (), reader)
        if self.reflective and self.written("front"):
            reader.complain(
                self.span_of("front"),
                "the front of a reflective filter follows from its density or bands",
                expected="no 'front' beside 'reflective: yes'",
                remedy="remove 'front'",
            )

    def passes(self) -> float:
        """Return the internal share that the density passes at normal incidence."""
        return float(10.0 ** -(self.density or 0.0))

    def _front(self) -> Coating:
        if not self.reflective:
            return self.front
        if self.density is not None:
            refused = 1.0 - self.passes()
            return everywhere(refused, refused)
        return _mirror_outside(self.bands or ())

    def _bulk(self) -> Bulk:
        if self.reflective:
            return CLEAR
        if self.density is not None:
            return Bulk("absorber", passes=self.passes(), thickness_mm=self.thickness_mm)
        bands = tuple((band.from_nm, band.to_nm, band.transmits) for band in self.bands or ())
        return Bulk("absorber", passes=0.0, thickness_mm=self.thickness_mm, bands=bands)

    def geometry(self) -> Geometry:
        """Return front, back and edge, and what happens inside."""
        outline = self.outline()
        shape = PlateShape(outline, outline.scaled(self.clear), self.thickness_mm, self.slope())
        coated = "front" if self.reflective or self.front != UNCOATED else ""
        faces = shape.faces(self._front(), self.back)
        return plate_geometry(shape, faces, self.glass, coated=coated, bulk=self._bulk())

    def glass_of(self) -> Glass:
        """Return the glass of the plate."""
        return self.glass


def _mirror_outside(bands: tuple[PassBand, ...]) -> Coating:
    """Return a coating that reflects what the bands refuse, and everything between them.

    The bands come first, so that light at their very ends belongs to them.
    """
    ordered = sorted(bands, key=lambda band: band.from_nm)
    passing = [
        Band(band.from_nm, band.to_nm, 1.0 - band.transmits, 1.0 - band.transmits)
        for band in ordered
    ]
    starts = [0.0, *(band.to_nm for band in ordered)]
    ends = [*(band.from_nm for band in ordered), inf]
    between = [Band(low, high, 1.0, 1.0) for low, high in zip(starts, ends, strict=True)]
    return Coating("stated", bands=(*passing, *between))
