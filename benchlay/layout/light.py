"""What light a source makes: polarization, lines, continuous power or pulses."""

from __future__ import annotations

from math import pi
from typing import Any, NamedTuple

from benchlay.document.form import Form, Reader
from benchlay.document.forms import Choice, OneOf, Quantity, RecordForm, Words
from benchlay.document.nodes import Node
from benchlay.document.quantity import Dimension
from benchlay.document.record import Record, key
from benchlay.document.span import Span
from benchlay.layout._forms import ANGLE, POWER, WAVELENGTH

_ENERGY = Quantity(Dimension.ENERGY, above=0.0)
_DURATION = Quantity(Dimension.DURATION, above=0.0)
_RATE = Quantity(Dimension.RATE, above=0.0)


class Polarization(NamedTuple):
    """`kind` is ``none``, ``angle`` (from horizontal) or ``circular`` (with its hand)."""

    kind: str
    angle_rad: float = 0.0
    hand: str = ""


UNPOLARIZED = Polarization("none")


class _Inclined(Record):
    angle_rad: float = key(
        ANGLE,
        name="angle",
        meaning="from horizontal, anticlockwise to a viewer whom the beam approaches",
    )


class _Circular(Record):
    circular: str = key(Choice("left", "right"), meaning="`right` turns clockwise to that viewer")


class PolarizationForm(Form[Polarization]):
    """Reads `horizontal`, `vertical`, `none`, `{angle: 30}` or `{circular: left}`."""

    _form = OneOf(
        Words(
            {
                "horizontal": Polarization("angle", 0.0),
                "vertical": Polarization("angle", pi / 2),
                "none": UNPOLARIZED,
            }
        ),
        RecordForm(_Inclined),
        RecordForm(_Circular),
    )

    def read(self, node: Node, reader: Reader) -> Polarization | None:
        """Read a state of polarization."""
        value = self._form.read(node, reader)
        if isinstance(value, _Inclined):
            return Polarization("angle", value.angle_rad)
        if isinstance(value, _Circular):
            return Polarization("circular", hand=value.circular)
        return value if isinstance(value, Polarization) else None

    def text(self) -> str:
        """Say what may be written."""
        return "'horizontal', 'vertical', 'none', '{angle: 30}' or '{circular: left|right}'"

    def example(self) -> str:
        """Give a sample."""
        return "'vertical'"

    def schema(self) -> dict[str, Any]:
        """Allow all ways."""
        return self._form.schema()

    def show(self, value: object) -> str:
        """Write a state as a user would."""
        return "none" if value == UNPOLARIZED else str(value)


class PulseTrain(Record):
    """Equal pulses at an even rate."""

    energy_j: float = key(_ENERGY, name="energy", meaning="energy of one pulse")
    duration_s: float = key(_DURATION, name="duration", meaning="duration of one pulse")
    rate_hz: float = key(_RATE, name="rate", meaning="pulses a second")

    def after_read(self, reader: Reader) -> None:
        """Refuse pulses that overlap."""
        if self.duration_s * self.rate_hz > 1.0:
            reader.complain(
                self.spans["duration"],
                "the pulses last longer than the time between them",
                expected=f"a duration of at most {1 / self.rate_hz:.6g} s at this rate",
                remedy="check duration and rate, or state continuous 'power'",
            )


class Line(NamedTuple):
    """One line of a source; `power_w` of pulses is their mean power."""

    wavelength_nm: float
    power_w: float
    pulse: PulseTrain | None
    span: Span


class Emits(Record):
    """Keys that say how much is emitted."""

    power_w: float | None = key(POWER, default=None, name="power", meaning="continuous power")
    pulse: PulseTrain | None = key(
        RecordForm(PulseTrain), default=None, meaning="pulses instead of continuous power"
    )

    def check_power(self, reader: Reader) -> None:
        """Ask for power or pulse, and only one of them."""
        if (self.power_w is None) == (self.pulse is None):
            both = self.power_w is not None
            reader.complain(
                self.span_of("pulse"),
                "both power and pulse are given" if both else "nothing says how much it emits",
                expected="either 'power' or 'pulse'",
                remedy="remove one of the two"
                if both
                else "add 'power: 150 mW', or 'pulse: {energy: 2 mJ, duration: 8 ns, rate: 10 Hz}'",
            )

    def line(self, wavelength_nm: float, span: Span) -> Line:
        """Return the line it makes at a wavelength."""
        if self.pulse is not None:
            mean = self.pulse.energy_j * self.pulse.rate_hz
            return Line(wavelength_nm, mean, self.pulse, span)
        return Line(wavelength_nm, self.power_w or 0.0, None, span)


class LineKeys(Emits):
    """One of several lines."""

    wavelength_nm: float = key(WAVELENGTH, name="wavelength", meaning="vacuum wavelength")

    def after_read(self, reader: Reader) -> None:
        """Ask for power or pulse."""
        self.check_power(reader)
