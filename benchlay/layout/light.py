"""What light a source makes: polarization, lines, continuous power or pulses."""

from __future__ import annotations

from benchlay.document.form import Reader
from benchlay.document.forms import Quantity, RecordForm
from benchlay.document.quantity import Dimension
from benchlay.document.record import Record, key
from benchlay.document.span import Span
from benchlay.elements._polarization import UNPOLARIZED, Polarization, PolarizationForm
from benchlay.layout._forms import POWER, WAVELENGTH
from benchlay.named import NamedTuple

__all__ = [
    "UNPOLARIZED",
    "Emits",
    "Line",
    "LineKeys",
    "Polarization",
    "PolarizationForm",
    "PulseTrain",
]

_ENERGY = Quantity(Dimension.ENERGY, above=0.0)
_DURATION = Quantity(Dimension.DURATION, above=0.0)
_RATE = Quantity(Dimension.RATE, above=0.0)


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
