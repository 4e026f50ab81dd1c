"""Numbers with units, from text to a float in the program's own unit.

Own units: mm, rad, nm, pure ratio, W, J, s, Hz, W/m², J/m², kg/m³.
"""

from __future__ import annotations

import math
import re

from benchlay.document.units import Dimension, Unit
from benchlay.document.words import format_choices, nearest, quote

__all__ = ["Dimension", "QuantityError", "describe_dimension", "parse", "show"]

_LONGEST = 64
# No bench needs more; products of two such numbers are still finite.
_LARGEST = {Dimension.LENGTH: 1e9, Dimension.WAVELENGTH: 1e9}
_LARGEST_OF_OTHERS = 1e30
_QUANTITY = re.compile(
    r"\s*([+-]?)([0-9]+\.?[0-9]*|\.[0-9]+)(?:[eE]([+-]?[0-9]{1,6}))?\s*([^0-9.\s].*)?"
)
_OPTICAL_DENSITY = re.compile(r"\s*OD\s*([0-9]+\.?[0-9]*|\.[0-9]+)\s*")
_COMMA = re.compile(r"\s*([+-]?[0-9]+),([0-9]+)(\D*)")
_GROUPED = re.compile(r"\s*[+-]?[0-9]{1,3}(_[0-9]{3})+\D*")
_SIGNS = str.maketrans({"µ": "u", "μ": "u", "²": "2", "^": ""})


class QuantityError(ValueError):
    """A text that is no quantity of the dimension asked for.

    Attributes
    ----------
    message, expected, remedy : str
        The parts of a message but for its place.
    """

    def __init__(self, message: str, expected: str, remedy: str) -> None:
        super().__init__(message)
        self.message = message
        self.expected = expected
        self.remedy = remedy


def parse(text: str, dimension: Dimension) -> float:
    """Read a quantity.

    Parameters
    ----------
    text : str
        A decimal number, then a unit; the unit may be left out where the dimension has one
        for bare numbers.
    dimension : Dimension
        What it must measure.

    Returns
    -------
    float
        In the program's unit of that dimension; finite, and of a size that can be reckoned with.

    Raises
    ------
    QuantityError
        With message, expectation and mend.

    Examples
    --------
    >>> parse("1 in", Dimension.LENGTH)
    25.4
    >>> parse("OD 3", Dimension.RATIO)
    0.001
    """
    if len(text) > _LONGEST:
        raise _not_a_number(text, dimension)
    if text.lstrip().startswith("OD"):
        return _optical_density(text, dimension)
    match = _QUANTITY.fullmatch(text)
    if match is None:
        raise _not_a_number(text, dimension)
    sign, digits, exponent, written = match.groups()
    unit = _unit(text, written, dimension)
    tens = int(exponent or 0) + unit.exponent
    value = float(f"{sign}{digits}e{tens}") * unit.factor
    if unit.parts_of_degree:
        value = math.radians(value / unit.parts_of_degree)
    if not abs(value) <= _LARGEST.get(dimension, _LARGEST_OF_OTHERS):
        message = f"{quote(text)} is too large a number"
        remedy = "check the exponent and the unit"
        raise QuantityError(message, describe_dimension(dimension), remedy)
    return value


def show(value: float, dimension: Dimension) -> str:
    """Write a value of the program's unit as a user would, to six figures.

    >>> show(0.5235987755982988, Dimension.ANGLE)
    '30 deg'
    """
    if dimension is Dimension.ANGLE:
        value = math.degrees(value)
    return f"{value + 0.0:.6g} {dimension.shown}".rstrip()


def describe_dimension(dimension: Dimension, bounds: str = "") -> str:
    """Say what may be written, bounds and units included."""
    what = f"{dimension.noun}{bounds}"
    if dimension is Dimension.DENSITY:
        return f"{what}, as '2' or 'OD 2'"
    if dimension is Dimension.RATIO:
        return f"{what}, as '0.5', '50 %', '5 ppm' or 'OD 0.3'"
    listed = " ".join(dimension.units)
    comma = "," if bounds else ""
    if dimension.bare is None:
        return f"{what}{comma} with its unit ({listed})"
    return f"{what}{comma} in {dimension.bare} or with its unit ({listed})"


def _optical_density(text: str, dimension: Dimension) -> float:
    match = _OPTICAL_DENSITY.fullmatch(text)
    if match is None:
        raise _not_a_number(text, dimension)
    density = float(match[1])
    if dimension is Dimension.DENSITY:
        return density
    if dimension is Dimension.RATIO:
        return float(10.0**-density)
    raise _other_dimension(text, Dimension.DENSITY, dimension)


def _unit(text: str, written: str | None, dimension: Dimension) -> Unit:
    """Find the unit as written, or the dimension's own where none is."""
    if written is None:
        if dimension.bare is None:
            usual = f"{text.strip()} {next(iter(dimension.units))}"
            message = f"{quote(text)} has no unit"
            remedy = f"write '{usual}', or whichever unit is meant"
            raise QuantityError(message, describe_dimension(dimension), remedy)
        return dimension.units.get(dimension.bare, Unit())
    name = re.sub(r"\s*/\s*", "/", written.strip().translate(_SIGNS))
    unit = dimension.units.get(name)
    if unit is None:
        raise _unknown_unit(text, written.strip(), name, dimension)
    return unit


def _unknown_unit(text: str, written: str, name: str, dimension: Dimension) -> QuantityError:
    number = text.strip().removesuffix(written).strip()
    if _odd_number(written):
        return _not_a_number(text, dimension)
    for other in Dimension:
        if name in other.units and name not in dimension.units:
            return _other_dimension(text, other, dimension)
    expected = describe_dimension(dimension)
    message = f"{quote(text)} has the unit {quote(written)}, which is not known for "
    message += dimension.noun
    alike = [u for u in dimension.units if u.casefold() == name.casefold()]
    guess = nearest(name, dimension.units)
    if not alike and guess is not None:
        alike = [guess]
    if alike:
        remedy = f"write {format_choices(f'{number} {unit}' for unit in alike)}"
    else:
        remedy = f"write {dimension.noun}, such as '{dimension.examples[0]}'"
    return QuantityError(message, expected, remedy)


def _other_dimension(text: str, found: Dimension, wanted: Dimension) -> QuantityError:
    return QuantityError(
        f"{quote(text)} is {found.noun}, not {wanted.noun}",
        describe_dimension(wanted),
        f"write {wanted.noun}, such as '{wanted.examples[0]}'",
    )


def _odd_number(written: str) -> bool:
    """Tell whether what follows the digits is part of a number in another notation."""
    return written[0] in ",_:" or (written[0] in "xXobOB" and any(c.isdigit() for c in written))


def _not_a_number(text: str, dimension: Dimension) -> QuantityError:
    expected = describe_dimension(dimension)
    comma = _COMMA.fullmatch(text)
    if comma is not None:
        whole, part, rest = comma.groups()
        point = f"{whole}.{part}{rest}".strip()
        remedy = f"write '{point}'"
        if len(part) == 3:  # noqa: PLR2004 - digits in a group of thousands
            remedy += f", or '{whole}{part}{rest.rstrip()}' if the comma groups thousands"
        return QuantityError(f"{quote(text)} has a comma in its number", expected, remedy)
    if _GROUPED.fullmatch(text):
        return QuantityError(
            f"{quote(text)} has a '_' in its number",
            expected,
            f"write '{text.strip().replace('_', '')}'",
        )
    if "\N{MINUS SIGN}" in text and len(text) <= _LONGEST:
        return QuantityError(
            f"{quote(text)} has a minus sign other than '-'",
            expected,
            f"write '{text.strip().replace(chr(0x2212), '-')}'",
        )
    return QuantityError(
        f"{quote(text)} is not a number" if text.strip() else "nothing is written",
        expected,
        f"write {dimension.noun}, such as '{dimension.examples[0]}'",
    )
