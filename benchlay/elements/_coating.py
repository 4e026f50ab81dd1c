"""Coatings: what a layout says of a face, before it is known which light arrives."""

from __future__ import annotations

from typing import Any, NamedTuple

from benchlay.document.form import Form, Reader
from benchlay.document.forms import Choice, Quantity
from benchlay.document.nodes import Mapping, Node, Scalar, Sequence
from benchlay.document.quantity import Dimension

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
        """Return the band stated for a wavelength, if there is one."""
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


SHARE = Quantity(Dimension.RATIO, at_least=0.0, at_most=1.0)
_WAVELENGTH = Quantity(Dimension.WAVELENGTH, above=0.0)
_EXPECTED = (
    "`uncoated`, `metal: silver|gold|aluminium`, a reflectance (`0.5 %` or `{s: 2 %, p: 1 %}`), "
    "or a list of `{from, to, is}` by wavelength"
)


class CoatingForm(Form[Coating]):
    """Reads a coating; `words` are the single words allowed (`uncoated`)."""

    def __init__(self, words: tuple[str, ...] = ("uncoated",)) -> None:
        self.words = words

    def text(self) -> str:
        """Say what is expected."""
        return _EXPECTED

    def example(self) -> str:
        """Give one that may be written."""
        return "uncoated"

    def schema(self) -> dict[str, Any]:
        """Return the JSON Schema of a coating."""
        share = SHARE.schema()
        pair = {
            "type": "object",
            "properties": {"s": share, "p": share},
            "required": ["s", "p"],
            "additionalProperties": False,
        }
        band = {
            "type": "object",
            "properties": {
                "from": _WAVELENGTH.schema(),
                "to": _WAVELENGTH.schema(),
                "is": {"anyOf": [share, pair]},
            },
            "required": ["from", "to", "is"],
            "additionalProperties": False,
        }
        metal = {
            "type": "object",
            "properties": {"metal": {"enum": list(METAL_NAMES)}},
            "required": ["metal"],
            "additionalProperties": False,
        }
        words = {"enum": list(self.words)}
        return {
            "anyOf": [
                words,
                share,
                pair,
                metal,
                {"type": "array", "items": band, "minItems": 1},
            ]
        }

    def read(self, node: Node, reader: Reader) -> Coating | None:
        """Read a coating, adding what is wrong to the reader's problems."""
        if isinstance(node, Sequence):
            return self._read_bands(node, reader)
        if isinstance(node, Mapping) and node.get("metal") is not None:
            return self._read_metal(node, reader)
        if isinstance(node, Scalar) and node.text in self.words:
            return Coating(node.text)
        if isinstance(node, Scalar) and node.text.startswith(("metal", "un")):
            reader.complain(
                node.span,
                f"{node.text!r} is not a coating",
                expected=_EXPECTED,
                remedy="write `uncoated`, or `{metal: silver}`",
            )
            return None
        pair = _read_share(node, reader)
        return None if pair is None else reflecting(*pair)

    def _read_metal(self, node: Mapping, reader: Reader) -> Coating | None:
        if not _only(node, ("metal",), reader):
            return None
        value = node.get("metal")
        assert value is not None
        name = Choice(*METAL_NAMES).read(value, reader)
        return None if name is None else Coating("metal", metal=name)

    def _read_bands(self, node: Sequence, reader: Reader) -> Coating | None:
        bands = [_read_band(item, reader) for item in node.items]
        if not bands:
            reader.complain(
                node.span,
                "the list of bands is empty",
                expected=_EXPECTED,
                remedy="write at least one band",
            )
            return None
        good = [band for band in bands if band is not None]
        if len(good) < len(bands) or not _disjoint(good, node, reader):
            return None
        return Coating("stated", bands=tuple(sorted(good, key=lambda band: band.from_nm or 0.0)))


def _only(node: Mapping, names: tuple[str, ...], reader: Reader) -> bool:
    unknown = [name for name, _ in node.pairs if name.text not in names]
    for name in unknown:
        reader.complain(
            name.span,
            f"unknown key {name.text!r}",
            expected="one of " + ", ".join(names),
            remedy="remove it",
        )
    missing = [name for name in names if node.get(name) is None]
    if missing:
        reader.complain(
            node.span,
            f"{missing[0]!r} is missing",
            expected=", ".join(names),
            remedy=f"add `{missing[0]}`",
        )
    return not unknown and not missing


def _read_share(node: Node, reader: Reader) -> tuple[float, float] | None:
    if not isinstance(node, Mapping):
        share = SHARE.read(node, reader)
        return None if share is None else (share, share)
    if not _only(node, ("s", "p"), reader):
        return None
    parts = [
        SHARE.read(value, reader) for name in ("s", "p") if (value := node.get(name)) is not None
    ]
    if len(parts) != 2 or parts[0] is None or parts[1] is None:  # noqa: PLR2004 (s and p)
        return None
    return parts[0], parts[1]


def _read_band(node: Node, reader: Reader) -> Band | None:
    if not isinstance(node, Mapping):
        reader.complain(
            node.span,
            "a band of a coating is a mapping",
            expected="`{from: 520, to: 545, is: 99.5 %}`",
            remedy="write from, to and is",
        )
        return None
    if not _only(node, ("from", "to", "is"), reader):
        return None
    low, high, share = node.get("from"), node.get("to"), node.get("is")
    assert low is not None and high is not None and share is not None
    start, stop = _WAVELENGTH.read(low, reader), _WAVELENGTH.read(high, reader)
    pair = _read_share(share, reader)
    if start is None or stop is None or pair is None:
        return None
    if start > stop:
        reader.complain(
            low.span,
            f"the band runs backwards: from {start:g} nm to {stop:g} nm",
            expected="`from` at or below `to`",
            remedy="swap the two",
        )
        return None
    return Band(start, stop, *pair)


def _disjoint(bands: list[Band], node: Sequence, reader: Reader) -> bool:
    ordered = sorted(bands, key=lambda band: band.from_nm or 0.0)
    for first, second in zip(ordered, ordered[1:], strict=False):
        if second.from_nm is not None and first.to_nm is not None and second.from_nm < first.to_nm:
            reader.complain(
                node.span,
                f"two bands overlap at {second.from_nm:g} nm",
                expected="bands that do not overlap",
                remedy=f"end the first band at {second.from_nm:g}",
            )
            return False
    return True


COATING = CoatingForm()
