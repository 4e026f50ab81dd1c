"""How quantities, places and events are put into messages, in the user's own units."""

from __future__ import annotations

from collections.abc import Sequence
from math import ceil, degrees, floor, log10

_PREFIXES = (
    (1e9, "G"), (1e6, "M"), (1e3, "k"), (1.0, ""),
    (1e-3, "m"), (1e-6, "µ"), (1e-9, "n"), (1e-12, "p"),
)  # fmt: skip
_DIGITS = 3
_NO_LENGTH_MM = 1e-6  # a nanometre on a bench is rounding


def prefixed(value: float, unit: str) -> str:
    """Write a value to three figures with the prefix that leaves 1 to 999 before the unit."""
    size = abs(float(f"{value:.{_DIGITS}g}"))
    for factor, prefix in _PREFIXES:
        if size >= factor * (1.0 - 1e-9):
            return f"{float(f'{value / factor:.{_DIGITS}g}'):g} {prefix}{unit}"
    return f"{value:.{_DIGITS}g} {unit}"


def power_text(power_w: float) -> str:
    """Write a power.

    >>> power_text(0.0061), power_text(0.000385), power_text(0.99996)
    ('6.1 mW', '385 µW', '1 W')
    """
    return prefixed(power_w, "W")


def irradiance_text(irradiance_w_m2: float) -> str:
    """Write an irradiance as the language has it.

    >>> irradiance_text(200_000.0)
    '20 W/cm2'
    """
    return prefixed(irradiance_w_m2 * 1e-4, "W/cm2")


def length_text(length_mm: float) -> str:
    """Write a length to a hundredth of a millimetre, or three figures.

    >>> length_text(3.14159), length_text(1234.5678), length_text(0.00123), length_text(1e-14)
    ('3.14 mm', '1234.57 mm', '0.00123 mm', '0 mm')
    """
    if abs(length_mm) < _NO_LENGTH_MM:
        return "0 mm"
    if abs(length_mm) < 1.0:
        return f"{length_mm:.{_DIGITS}g} mm"
    return f"{round(length_mm, 2):.10g} mm"


def angle_text(angle_rad: float) -> str:
    """Write an angle in degrees.

    >>> angle_text(0.5)
    '28.648°'
    """
    return f"{round(degrees(angle_rad), 3) + 0.0:g}°"


def share_text(share: float) -> str:
    """Write a share as a percentage.

    >>> share_text(0.0123456), share_text(1.0), share_text(1.2e-7)
    ('1.23 %', '100 %', '1.2e-05 %')
    """
    return f"{float(f'{100.0 * share:.{_DIGITS}g}'):g} %"


def wavelength_text(wavelength_nm: float) -> str:
    """Write a wavelength.

    >>> wavelength_text(632.8)
    '632.8 nm'
    """
    return f"{wavelength_nm:.10g} nm"


def listed(words: Sequence[str], last: str = "and") -> str:
    """Join words as a sentence has them.

    >>> listed(["a", "b", "c"]), listed(["a"])
    ('a, b and c', 'a')
    """
    if len(words) <= 1:
        return "".join(words)
    return f"{', '.join(words[:-1])} {last} {words[-1]}"


def rounded_up(value: float, digits: int = 2) -> float:
    """Round up to a number of figures, so that a mend that is followed is enough.

    >>> rounded_up(12.341), rounded_up(0.0301)
    (13.0, 0.031)
    """
    if value <= 0.0:
        return 0.0
    step = 10.0 ** (floor(log10(value)) - digits + 1)
    return round(ceil(value / step - 1e-9) * step, 12)


def above(value: float, limit: float) -> bool:
    """Whether a value is above its limit by more than rounding; at the limit it passes.

    >>> above(1.0, 1.0), above(1.0 + 1e-6, 1.0)
    (False, True)
    """
    return value > limit * (1.0 + 1e-9) + 1e-15


_PARTS = {
    "mount": "the mount of",
    "post": "the post of",
    "foot": "the foot of",
    "edge": "the edge of",
    "plate": "the plate of",
    "source": "the body of source",
}
_BY_NAME = {"screen": "", "handed-over": "the opening "}
_SINKS = {
    "target": "target",
    "dump": "dump",
    "rim": "the rim of",
    "absorbed": "the inside of",
    "body": "the body of",
}


def place_words(sink: str, name: str | None, part: str | None = None) -> str:
    """Say what light landed on.

    >>> place_words("body", "L2", "mount"), place_words("panel", "south", "panel")
    ("the mount of 'L2'", "panel 'south'")
    >>> place_words("wall", "ceiling"), place_words("bench", None)
    ('the ceiling of the room', 'the bench top')
    """
    if sink == "panel":
        return f"{'lid' if part == 'lid' else 'panel'} '{name}'"
    if sink == "wall":
        return {"floor": "the floor", "ceiling": "the ceiling of the room"}.get(
            name or "", "a wall of the room"
        )
    if sink == "bench":
        return "the bench top"
    if sink == "escaped":
        return "nothing within reach"
    if sink in _BY_NAME:
        return f"{_BY_NAME[sink]}'{name}'"
    words = _PARTS.get(part or "") if sink == "body" else None
    return f"{words or _SINKS.get(sink, sink)} '{name}'"


_EVENTS = {
    "emitted": "emitted by",
    "reflected": "reflected by",
    "transmitted": "passed by",
    "diffracted": "diffracted by",
    "converted": "made in",
    "scattered": "scattered by",
    "spilled": "spilled by",
}


def event_words(event: str) -> str:
    """Say what made a beam.

    >>> event_words("reflected")
    'reflected by'
    """
    return _EVENTS[event]
