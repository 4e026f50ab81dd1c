"""Shares of light: how they are written, and what several of them may add up to."""

from __future__ import annotations

from math import log10

from benchlay.document.form import Reader
from benchlay.document.forms import Quantity
from benchlay.document.nodes import Scalar
from benchlay.document.quantity import Dimension, QuantityError, parse
from benchlay.document.record import Record
from benchlay.document.words import quote

SHARE = Quantity(Dimension.RATIO, at_least=0.0, at_most=1.0)
USABLE = Quantity(Dimension.RATIO, above=0.0, at_most=1.0)

_DECIMALS = 6  # to which shares are shown


class DensityForm(Quantity):
    """Reads an optical density, `2` or `OD 2`; a share is refused with the density it means."""

    def __init__(self) -> None:
        super().__init__(Dimension.DENSITY, at_least=0.0)

    def value(self, node: Scalar, reader: Reader) -> float | None:
        """Read the density, adding what is wrong to the reader's problems."""
        share = _share_with_unit(node.text)
        if share is None:
            return super().value(node, reader)
        density = 0.0 - log10(share)
        reader.complain(
            node,
            f"{quote(node.text)} is a share, not an optical density",
            expected=self.text(),
            remedy=f"write 'OD {density:.6g}', which lets {node.text.strip()} of the light pass",
        )
        return None


def _share_with_unit(text: str) -> float | None:
    """Return the share above 0 that a text with `%` or `ppm` means; None for all else."""
    if not text.rstrip().endswith(tuple(Dimension.RATIO.units)):
        return None
    try:
        share = parse(text, Dimension.RATIO)
    except QuantityError:
        return None
    return share if 0.0 < share <= 1.0 else None


def refuse_excess(
    record: Record, first: tuple[str, float], second: tuple[str, float], reader: Reader
) -> None:
    """Refuse two shares, each with its key, that add up to more than all of the light.

    The mend lowers the second.
    """
    (name, share), (other, rest) = first, second
    if share + rest <= 1.0:
        return
    written = [n for n in (other, name) if record.written(n)]
    room = round(1.0 - share, _DECIMALS)
    if share + room > 1.0:  # the mend, when followed, must be enough
        room -= 10.0**-_DECIMALS
    reader.complain(
        record.span_of(written[0] if written else other),
        f"'{name}' and '{other}' add up to {share + rest:.9g}",
        expected="at most 1 together",
        remedy=f"set '{other}' to {room:.6g} or less",
    )
