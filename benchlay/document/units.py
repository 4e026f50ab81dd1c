"""The dimensions a quantity may have, and the units each may be written in."""

from __future__ import annotations

from enum import Enum

from benchlay.named import NamedTuple


class Unit(NamedTuple):
    """How a number with this unit becomes one in the dimension's own unit.

    The power of ten is put into the number's exponent before it is read, so that
    ``0.5 mrad`` is the float nearest to 0.0005. `parts_of_degree` is 1 for degrees, 60 for
    arc minutes, 3600 for arc seconds, and 0 for everything else.
    """

    exponent: int = 0
    factor: float = 1.0
    parts_of_degree: int = 0


_PREFIXES = {
    "p": -12,
    "n": -9,
    "u": -6,
    "m": -3,
    "": 0,
    "k": 3,
    "M": 6,
    "G": 9,
    "T": 12,
}


def _scaled(unit: str, prefixes: str, *, one: str = "") -> dict[str, Unit]:
    """Make the units with the given prefixes (`-` for none), counted from the prefix `one`."""
    base = _PREFIXES[one]
    names = ("" if p == "-" else p for p in prefixes)
    return {p + unit: Unit(_PREFIXES[p] - base) for p in names}


def _per_area(energy: str, prefixes: str) -> dict[str, Unit]:
    """Make the units per area, as powers of ten of the one per square metre."""
    return {
        f"{name}/{area}": Unit(unit.exponent + tens)
        for area, tens in (("cm2", 4), ("mm2", 6), ("m2", 0))
        for name, unit in _scaled(energy, prefixes).items()
    }


_LENGTHS = {
    **_scaled("m", "num-", one="m"),
    "cm": Unit(1),
    "in": Unit(0, 25.4),
    "ft": Unit(0, 304.8),
}
_DEGREES = {
    "deg": Unit(parts_of_degree=1),
    "°": Unit(parts_of_degree=1),
    "arcmin": Unit(parts_of_degree=60),
    "arcsec": Unit(parts_of_degree=3600),
}
_DURATIONS = {
    **_scaled("s", "-munp"),
    "fs": Unit(-15),
    "min": Unit(0, 60.0),
    "h": Unit(0, 3600.0),
}


class Dimension(Enum):
    """What a quantity measures.

    Attributes
    ----------
    noun : str
        For messages, with its article.
    bare : str or None
        The unit of a number without one; None if it must have one. Empty for pure numbers.
    shown : str
        The unit in which values are shown.
    units : dict of str to Unit
        By the names that may be written, the usual one first.
    examples : tuple of str
        As a user would write them.
    """

    LENGTH = ("a length", "mm", "mm", _LENGTHS, ("25", "100", "1", "0.1", "0"))
    ANGLE = (
        "an angle",
        "deg",
        "deg",
        {**_DEGREES, **_scaled("rad", "m-u")},
        ("30", "90", "1", "0.1", "0"),
    )
    WAVELENGTH = (
        "a wavelength",
        "nm",
        "nm",
        _scaled("m", "num-", one="n"),
        ("532", "1064", "10600"),
    )
    RATIO = (
        "a ratio",
        "",
        "",
        {"%": Unit(-2), "ppm": Unit(-6)},
        ("50 %", "1 %", "0.5", "1", "1.5", "2", "0"),
    )
    DENSITY = ("an optical density", "", "", dict[str, Unit](), ("2", "0.3", "0"))
    MASS_DENSITY = (
        "a density",
        None,
        "kg/m3",
        {"kg/m3": Unit(), "g/cm3": Unit(3)},
        ("2700 kg/m3", "7850 kg/m3"),
    )
    POWER = ("a power", None, "W", _scaled("W", "m-kunpMG"), ("150 mW", "1 W", "1 kW"))
    ENERGY = ("an energy", None, "J", _scaled("J", "m-unpk"), ("2 mJ", "1 J", "1 nJ"))
    DURATION = ("a duration", None, "s", _DURATIONS, ("8 ns", "1 s", "100 s"))
    RATE = ("a rate", None, "Hz", _scaled("Hz", "-kMGTm"), ("10 Hz", "1 kHz"))
    FREQUENCY = (
        "a frequency",
        None,
        "Hz",
        _scaled("Hz", "GMk-T"),
        ("1 MHz", "1 GHz"),
    )
    IRRADIANCE = (
        "an irradiance",
        None,
        "W/m2",
        _per_area("W", "-mkuMG"),
        ("20 W/cm2", "10 W/m2"),
    )
    FLUENCE = (
        "a fluence",
        None,
        "J/m2",
        _per_area("J", "-mku"),
        ("1 J/cm2", "10 J/m2"),
    )

    def __init__(
        self,
        noun: str,
        bare: str | None,
        shown: str,
        units: dict[str, Unit],
        examples: tuple[str, ...],
    ) -> None:
        self.noun = noun
        self.bare = bare
        self.shown = shown
        self.units = units
        self.examples = examples
