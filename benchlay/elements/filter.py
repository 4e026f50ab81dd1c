"""A filter: a window that weakens light inside, everywhere or by wavelength.

.. code-block:: yaml

   F1: {kind: filter, after: laser, distance: 90, diameter: 25.4, density: OD 1, incidence: 4}

`density` and `bands` are internal, at normal incidence, and grow with the path inside;
outside every band nothing passes. With `reflective: yes` the front face sends the refused
share back instead.
"""

from __future__ import annotations

from typing import ClassVar

from benchlay.document.form import Reader
from benchlay.document.forms import ListOf, Quantity, RecordForm, YesNo
from benchlay.document.quantity import Dimension
from benchlay.document.record import Record, key
from benchlay.elements._coating import (
    COATING,
    SHARE,
    UNCOATED,
    Band,
    Coating,
    everywhere,
)
from benchlay.elements._kind import CLEAR, Branches, Bulk, ElementKind, Geometry, Glass
from benchlay.elements._sized import (
    GLASS,
    LENGTH,
    PlateShape,
    Sized,
    Wedged,
    plate_geometry,
)
from benchlay.elements._through import PASSING_PLATE

_WAVELENGTH = Quantity(Dimension.WAVELENGTH, above=0.0)


class PassBand(Record):
    """A share passed between two wavelengths."""

    from_nm: float = key(_WAVELENGTH, name="from", meaning="lowest wavelength of the band")
    to_nm: float = key(_WAVELENGTH, name="to", meaning="highest wavelength of the band")
    transmits: float = key(SHARE, meaning="internal share passed at normal incidence")

    def after_read(self, reader: Reader) -> None:
        """Refuse a band that runs backwards."""
        if self.from_nm > self.to_nm:
            reader.complain(
                self.spans["from"],
                f"the band runs backwards: from {self.from_nm:g} nm to {self.to_nm:g} nm",
                expected="`from` at or below `to`",
                remedy="swap the two",
            )


class Filter(Sized, Wedged, ElementKind):
    """A filter: a window that weakens light inside."""

    KIND = "filter"
    BRANCHES: ClassVar[Branches] = PASSING_PLATE
    DEFAULT_BRANCH = "transmitted"
    TURNS_FRONT = True

    density: float | None = key(
        SHARE,
        default=None,
        meaning="internal share passed (`OD 1` or `10 %`), all wavelengths",
    )
    bands: tuple[PassBand, ...] | None = key(
        ListOf(RecordForm(PassBand)),
        default=None,
        meaning="internal share passed by wavelength; nothing outside",
    )
    reflective: bool = key(
        YesNo(), default=False, meaning="the front face sends the refused share back"
    )
    thickness_mm: float = key(
        LENGTH, default=2.0, name="thickness", meaning="thickness at the centre"
    )
    glass: Glass = key(GLASS, default=Glass("BK7", None), meaning="the plate")
    front: Coating = key(COATING, default=UNCOATED, meaning="coating of the front face")
    back: Coating = key(COATING, default=UNCOATED, meaning="coating of the back face")

    def after_read(self, reader: Reader) -> None:
        """Ask for exactly one way of weakening, and for a sensible front."""
        super().after_read(reader)
        self.ask_for_thick_edge(reader)
        if (self.density is None) == (self.bands is None):
            reader.complain(
                self.span,
                "a filter needs either a density or bands",
                expected="`density: OD 1`, or `bands: [{from: 500, to: 560, transmits: 90 %}]`",
                remedy="remove one of the two" if self.bands else "add `density: OD 1`",
            )
        if self.reflective and self.written("front"):
            reader.complain(
                self.spans["front"],
                "the front of a reflective filter follows from its density or bands",
                expected="no `front` beside `reflective: yes`",
                remedy="remove `front`",
            )

    def _front(self) -> Coating:
        if not self.reflective:
            return self.front
        if self.density is not None:
            return everywhere(1.0 - self.density, 1.0 - self.density)
        edges = [0.0]
        bands: list[Band] = []
        for band in sorted(self.bands or (), key=lambda band: band.from_nm):
            bands.append(Band(edges[-1], band.from_nm, 1.0, 1.0))
            bands.append(Band(band.from_nm, band.to_nm, 1.0 - band.transmits, 1.0 - band.transmits))
            edges.append(band.to_nm)
        stated = [band for band in bands if band.s < 1.0] + [
            band for band in bands if band.s >= 1.0
        ]
        return Coating("stated", bands=(*stated, Band(edges[-1], float("inf"), 1.0, 1.0)))

    def _bulk(self) -> Bulk:
        if self.reflective:
            return CLEAR
        if self.density is not None:
            return Bulk("absorber", passes=self.density, thickness_mm=self.thickness_mm)
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
