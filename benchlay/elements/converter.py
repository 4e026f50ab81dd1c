"""A crystal that turns light of one wavelength into another.

.. code-block:: yaml

   SHG:
     kind: converter
     after: laser
     distance: 80
     diameter: 8
     length: 12
     glass: {index: 1.65}
     front: 0.5 %
     back: 0.5 %
     produces: [{wavelength: 532, share: 35 %, polarization: vertical}]

Its reference point is the middle of its entry. Of the light that enters from outside, by
either face, the stated share becomes the new one on its way through; the rest goes on. Light
thrown back inside makes nothing more. The made light starts in the middle of the crystal, on
the same way, with the spot and M² of the light that makes it, so that its divergence goes
with its wavelength (real crystals make somewhat narrower spots that spread faster: this is
the brighter beam far away); without `polarization` it keeps that of the light that makes it.

Light makes a product if the product is a harmonic of it (its wavelength two to five times
that of the product, within 1 %); where no line that the routes bring is that, every one of
them but the products does. Say `SHG.532` in a route for what it makes, `SHG.1064` for what goes
on, and `wavelength: 532` beside `after`.
"""

from __future__ import annotations

from typing import Any

from benchlay.document.form import Reader
from benchlay.document.forms import ListOf, Quantity, RecordForm
from benchlay.document.quantity import Dimension
from benchlay.document.record import Record, key
from benchlay.elements._acting import ActingPlate
from benchlay.elements._glass import GLASS
from benchlay.elements._kind import Bulk, Glass, Made
from benchlay.elements._polarization import PolarizationForm
from benchlay.elements._shares import SHARE
from benchlay.elements._sized import LENGTH

_WAVELENGTH = Quantity(Dimension.WAVELENGTH, above=0.0)


class Product(Record):
    """Light that a converter makes."""

    wavelength_nm: float = key(_WAVELENGTH, name="wavelength", meaning="of the light made")
    share: float = key(SHARE, meaning="of the power that becomes this light")
    polarization: Any = key(
        PolarizationForm(),
        default=None,
        meaning="of the light made; without it that of the light that makes it",
    )


class Converter(ActingPlate):
    """A crystal that turns light of one wavelength into another."""

    KIND = "converter"

    produces: tuple[Product, ...] = key(ListOf(RecordForm(Product), min=1), meaning="what it makes")
    length_mm: float = key(LENGTH, name="length", meaning="of the crystal")
    glass: Glass = key(GLASS, default=Glass(None, 1.6), meaning="its index")

    def after_read(self, reader: Reader) -> None:
        """Refuse a crystal that makes more than it gets, or one light twice."""
        super().after_read(reader)
        total = sum(product.share for product in self.produces)
        if total > 1.0:
            reader.complain(
                self.span_of("produces"),
                f"the shares add up to {total:.9g}",
                expected="at most 1 together",
                remedy="lower one of them",
            )
        lines = [product.wavelength_nm for product in self.produces]
        if len(set(lines)) < len(lines):
            reader.complain(
                self.span_of("produces"),
                "one wavelength is produced twice",
                expected="products of different wavelengths",
                remedy="put their shares together in one product",
            )

    def simplified(self) -> tuple[tuple[str, str], ...]:
        """Tell that its shares do not hang on how much light there is."""
        return (
            (
                "makes the same share of weak light as of strong",
                "expect less of the made light, and more left over, from weak returns and ghosts",
            ),
        )

    def makes(self) -> tuple[Made, ...]:
        """Return the light that it makes."""
        return tuple(Made(p.wavelength_nm, p.share, p.polarization) for p in self.produces)

    def depth_mm(self) -> float:
        """Return the length of the crystal."""
        return self.length_mm

    def bulk(self) -> Bulk:
        """Return what happens inside."""
        return Bulk("converter", makes=self.makes())
