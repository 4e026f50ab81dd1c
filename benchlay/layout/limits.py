"""The limits that checks hold a layout against, and which of them it overrides."""

from __future__ import annotations

from benchlay.document.form import Reader
from benchlay.document.forms import Pair, Quantity, RecordForm, YesNo
from benchlay.document.quantity import Dimension
from benchlay.document.record import Record, key
from benchlay.elements.mount import RANGE
from benchlay.layout._forms import NOT_NEGATIVE, POSITIVE, SHARE


class Eyes(Record):
    """Bands of eye height above the floor: site policy."""

    seated_mm: tuple[float, float] = key(
        Pair(POSITIVE),
        default=(1070.0, 1380.0),
        name="seated",
        meaning="eyes of people who sit, above the floor",
    )
    standing_mm: tuple[float, float] = key(
        Pair(POSITIVE),
        default=(1370.0, 1980.0),
        name="standing",
        meaning="eyes of people who stand, above the floor",
    )

    def after_read(self, reader: Reader) -> None:
        """Refuse bands that run downwards."""
        for name, (low, high) in (
            ("seated", self.seated_mm),
            ("standing", self.standing_mm),
        ):
            if low >= high:
                reader.complain(
                    self.span_of(name),
                    f"the band '{name}' runs from {low:g} mm to {high:g} mm",
                    expected="[lower, upper]",
                    remedy=f"write '{name}: [{high:g}, {low:g}]'"
                    if low > high
                    else "write two different heights",
                )


class Driver(Record):
    """The straight corridor a driver needs to reach an adjuster."""

    diameter_mm: float = key(
        POSITIVE, default=25.0, name="diameter", meaning="width of hand and handle"
    )
    length_mm: float = key(
        POSITIVE, default=100.0, name="length", meaning="length of driver and hand"
    )


class Faults(Record):
    """Which single faults are credible: families by the kinds in the results, on or off."""

    range_rad: float = key(
        RANGE,
        default=0.0,
        name="range",
        meaning="how far every adjustable mount is knocked at least, both ways",
    )
    knocked: bool = key(
        YesNo(), default=True, meaning="each adjustable mount through its `range`, yaw and pitch"
    )
    out: bool = key(YesNo(), default=True, meaning="each optic gone from its mount")
    reversed: bool = key(YesNo(), default=True, meaning="each optic back to front")
    turned: bool = key(YesNo(), default=True, meaning="each waveplate at every angle")
    rolled: bool = key(
        YesNo(), default=True, meaning="each polarizer and cube rolled about the beam"
    )
    stuck: bool = key(
        YesNo(), default=True, meaning="shutters, flip mounts and power settings that stick"
    )
    missing: bool = key(YesNo(), default=True, meaning="each dump, screen, tube or target gone")
    opened: bool = key(
        YesNo(), default=True, meaning="each access panel or lid open, its interlock failed"
    )
    wavelength: bool = key(
        YesNo(), default=True, meaning="light of which an optic's coatings say nothing"
    )


class Limits(Record):
    """What checks hold a layout against."""

    time_base_s: float | None = key(
        Quantity(Dimension.DURATION, above=0.0),
        default=None,
        name="time_base",
        meaning="duration of exposure; by default 100 s from 400 nm up and 30 000 s below",
    )
    eyes: Eyes = key(RecordForm(Eyes), default=Eyes(), meaning="bands of eye height")
    clip: float = key(SHARE, default=0.01, meaning="share a working beam may lose at an aperture")
    off_height_mm: float = key(
        NOT_NEGATIVE,
        default=0.5,
        name="off_height",
        meaning="how far above or below its mark a working beam may meet an optic",
    )
    off_centre_mm: float = key(
        NOT_NEGATIVE,
        default=0.5,
        name="off_centre",
        meaning="how far beside its mark a working beam may meet an optic",
    )
    clearance_mm: float = key(
        NOT_NEGATIVE, default=3.0, name="clearance", meaning="least distance between bodies"
    )
    driver: Driver = key(RecordForm(Driver), default=Driver(), meaning="corridor to every adjuster")
    reach_mm: float = key(
        POSITIVE,
        default=20_000.0,
        name="reach",
        meaning="how far a zone is followed where no wall stops it (`20 m`)",
    )
    floor: float = key(
        Quantity(Dimension.RATIO, above=0.0, at_most=1.0),
        default=0.01,
        meaning="share of the accessible limit below which beams are not followed; "
        "never more than 1e-6 of the source",
    )
    back_reflection_w: float | None = key(
        Quantity(Dimension.POWER, above=0.0),
        default=None,
        name="back_reflection",
        meaning="power that may come back into a source",
    )
    faults: Faults = key(
        RecordForm(Faults), default=Faults(), meaning="which single faults are reviewed"
    )

    @property
    def overridden(self) -> tuple[str, ...]:
        """The keys that the layout sets, in the order of the language."""
        return tuple(k.name for k in self.KEYS.values() if self.written(k.name))
