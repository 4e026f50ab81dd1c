"""Coatings: what a layout says of a face, before it is known which light arrives."""

from __future__ import annotations

from itertools import pairwise
from typing import Any

from benchlay.document.form import Reader
from benchlay.document.forms import Choice, ListOf, OneOf, Quantity, RecordForm, Words
from benchlay.document.nodes import Mapping, Node, Scalar, describe
from benchlay.document.quantity import Dimension
from benchlay.document.record import Record, key
from benchlay.elements._shares import SHARE
from benchlay.named import NamedTuple

METAL_NAMES = ("silver", "gold", "aluminium")


class Band(NamedTuple):
    """Reflected shares for s and p light between two wavelengths (None: unstated)."""

    from_nm: float | None
    to_nm: float | None
    s: float
    p: float


class Coating(NamedTuple):
    """`kind` is ``uncoated``, ``metal`` (with its name) or ``stated`` (with bands).

    `absorbs` is the share of s and of p light that a stated coating swallows.
    """

    kind: str
    metal: str = ""
    bands: tuple[Band, ...] = ()
    absorbs: tuple[float, float] = (0.0, 0.0)

    def general(self) -> Band | None:
        """Return the band that names no wavelengths, if there is one."""
        return next((band for band in self.bands if band.from_nm is None), None)

    def at(self, wavelength_nm: float) -> Band | None:
        """Return the band stated for a wavelength, if there is one; of two that touch, the first.

        Both ends belong to a band.
        """
        for band in self.bands:
            if (
                band.from_nm is not None
                and band.to_nm is not None
                and band.from_nm <= wavelength_nm <= band.to_nm
            ):
                return band
        return None


UNCOATED = Coating("uncoated")


def reflecting(s: float, p: float) -> Coating:
    """Return a coating with one pair of reflected shares, unstated in wavelength."""
    return Coating("stated", bands=(Band(None, None, s, p),))


def everywhere(s: float, p: float, absorbs: tuple[float, float] = (0.0, 0.0)) -> Coating:
    """Return a coating that holds at every wavelength."""
    return Coating("stated", bands=(Band(0.0, float("inf"), s, p),), absorbs=absorbs)


class BandKeys(Record):
    """The two ends of a band of wavelengths."""

    from_nm: float = key(
        Quantity(Dimension.WAVELENGTH, above=0.0), name="from", meaning="lowest wavelength"
    )
    to_nm: float = key(
        Quantity(Dimension.WAVELENGTH, above=0.0), name="to", meaning="highest wavelength"
    )

    def after_read(self, reader: Reader) -> None:
        """Refuse a band that runs backwards."""
        super().after_read(reader)
        if self.from_nm > self.to_nm:
            reader.complain(
                self.span_of("from"),
                f"the band runs backwards, from {self.from_nm:g} nm to {self.to_nm:g} nm",
                expected="'from' at or below 'to'",
                remedy=f"write 'from: {self.to_nm:g}' and 'to: {self.from_nm:g}'",
            )


class SharePair(Record):
    """What is reflected of s and of p light."""

    s: float = key(SHARE, meaning="share of s light")
    p: float = key(SHARE, meaning="share of p light")


class MetalFilm(Record):
    """An opaque film of metal."""

    metal: str = key(Choice(*METAL_NAMES), meaning="the metal")


class ReflectedBand(BandKeys):
    """What is reflected between two wavelengths."""

    share: float | SharePair = key(
        OneOf(SHARE, RecordForm(SharePair)), name="is", meaning="reflected share"
    )


def refuse_overlap(bands: tuple[BandKeys, ...], reader: Reader) -> bool:
    """Refuse bands that overlap, at the later one; bands may touch. Tell whether any did."""
    found = False
    for first, second in pairwise(sorted(bands, key=lambda band: (band.from_nm, band.to_nm))):
        if second.from_nm < first.to_nm:
            found = True
            reader.complain(
                second.span_of("from"),
                f"this band begins at {second.from_nm:g} nm, "
                f"inside the one from {first.from_nm:g} nm to {first.to_nm:g} nm",
                expected="bands that do not overlap",
                remedy=f"begin it at {first.to_nm:g}, or end the other one at {second.from_nm:g}",
            )
    return found


_SHARES = "a reflectance, as '0.5 %' or '{s: 2 %, p: 1 %}'"
_BANDS = "a list by wavelength, as '[{from: 520, to: 545, is: 99.5 %}]'"
_METALS = "'{metal: silver}' (or gold, aluminium)"


class CoatingForm(OneOf):
    """Reads a coating.

    Parameters
    ----------
    bare : bool
        Whether `uncoated` may be written.
    metals : bool
        Whether an opaque film of metal may be written.
    """

    def __init__(self, *, bare: bool = True, metals: bool = True) -> None:
        words = [Words({UNCOATED.kind: UNCOATED})] if bare else []
        films = [RecordForm(MetalFilm)] if metals else []
        bands = ListOf(RecordForm(ReflectedBand), min=1)
        super().__init__(*words, SHARE, RecordForm(SharePair), *films, bands)
        self.bare = bare
        self.metals = metals

    def text(self) -> str:
        """Say what is expected."""
        said = ["'uncoated'"] if self.bare else []
        said += [_METALS] if self.metals else []
        return ", ".join([*said, _SHARES]) + f", or {_BANDS}"

    def example(self) -> str:
        """Give one that may be written."""
        return "'uncoated'" if self.bare else "'99.5 %'"

    def show(self, value: object) -> str:
        """Write the default as a user would."""
        return "uncoated" if value == UNCOATED else super().show(value)

    def read(self, node: Node, reader: Reader) -> Coating | None:
        """Read a coating, adding what is wrong to the reader's problems."""
        if self._is_strange(node):
            self._refuse_strange(node, reader)
            return None
        before = reader.failures
        value = super().read(node, reader)
        return None if reader.failures > before else _coating(value, reader)

    def _is_strange(self, node: Node) -> bool:
        """Tell words that are no coating, and films of metal where none can be."""
        if isinstance(node, Mapping):
            return not self.metals and node.get("metal") is not None
        if not isinstance(node, Scalar):
            return False
        word = node.text.strip()
        bare = self.bare and word == UNCOATED.kind
        return word[:1].isalpha() and not word.startswith("OD") and not bare

    def _refuse_strange(self, node: Node, reader: Reader) -> None:
        what, remedy = f"{describe(node)} is not a coating", f"such as {self.example()}"
        if isinstance(node, Mapping):
            what = "a film of metal is opaque, which is not what is read here"
            remedy = f"the share that is reflected, {remedy}"
        elif self.metals and isinstance(node, Scalar) and node.text in METAL_NAMES:
            remedy = f"'{{metal: {node.text}}}'"
        else:
            remedy = f"a coating, {remedy}"
        reader.complain(node, what, expected=self.text(), remedy=f"write {remedy}")


def _coating(value: Any, reader: Reader) -> Coating | None:  # noqa: ANN401 (what the forms read)
    """Make a coating of what was written."""
    if isinstance(value, Coating):
        return value
    if isinstance(value, MetalFilm):
        return Coating("metal", metal=value.metal)
    if not isinstance(value, tuple):
        return reflecting(*_pair(value))
    if refuse_overlap(value, reader):
        return None
    bands = (Band(band.from_nm, band.to_nm, *_pair(band.share)) for band in value)
    return Coating("stated", bands=tuple(sorted(bands, key=lambda band: band.from_nm or 0.0)))


def _pair(share: float | SharePair) -> tuple[float, float]:
    return (share.s, share.p) if isinstance(share, SharePair) else (share, share)


COATING = CoatingForm()
REFLECTANCE = CoatingForm(bare=False, metals=False)
BARE_OR_REFLECTANCE = CoatingForm(metals=False)
