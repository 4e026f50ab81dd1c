"""What may be asked about one beam: its light, its exit, and how long it meets an eye."""

from __future__ import annotations

import math

from benchlay.exposure.accessible import Pulse, default_time_base_s
from benchlay.exposure.errors import OutOfRange
from benchlay.exposure.factors import check_duration, check_wavelength, is_visible
from benchlay.exposure.limits import Limit
from benchlay.exposure.trains import Train, eye_rules
from benchlay.named import NamedTuple

# Nothing living ends an exposure within a tenth of a second: that short it is the source,
# a shutter or a scanner that ends it. From there up to a second it would be the eye.
_HUMAN_S = (0.1, 1.0)
D86_PER_D63 = math.sqrt(2.0)


class Exit(NamedTuple):
    """A round Gaussian beam with its waist at the exit.

    Attributes
    ----------
    diameter_mm : float
        1/e^2 diameter at the exit, mm.
    divergence_rad : float
        Full angle at 1/e^2, rad.
    """

    diameter_mm: float
    divergence_rad: float

    @property
    def d63_mm(self) -> float:
        """Diameter that holds 63 % of the power at the exit, mm."""
        return self.diameter_mm / D86_PER_D63

    def m2(self, wavelength_nm: float) -> float:
        """Beam quality that the two figures imply: pi d theta/(4 lambda)."""
        return math.pi * self.diameter_mm * self.divergence_rad / (4e-6 * wavelength_nm)


class Question(NamedTuple):
    """Light of one wavelength, how long it may meet an eye, and its beam if that is known."""

    wavelength_nm: float
    light: float | Pulse  # W, or pulses
    exposure_s: float
    beam: Exit | None = None
    time_by_default: bool = False


class Held(NamedTuple):
    """Light held against one rule of a limit.

    Attributes
    ----------
    rule : str
        ``single exposure`` for continuous light, else the rule for pulses.
    limit : Limit
        W/m2 for continuous light, J/m2 of one pulse for pulses.
    exposure : float
        What the limiting aperture takes at the exit over its area, in the limit's unit.
    """

    rule: str
    limit: Limit
    exposure: float

    @property
    def ratio(self) -> float:
        """Exposure over limit; above one the limit is exceeded."""
        return self.exposure / self.limit.value


def check_exposure(wavelength_nm: float, exposure_s: float) -> float:
    """Return the duration of an exposure if it may be reckoned with.

    Raises
    ------
    OutOfRange
        If no limit exists, or if only turning away could end the exposure and the light
        is none that makes anyone turn away.
    """
    kept = check_duration(exposure_s)
    if not is_visible(wavelength_nm) and _HUMAN_S[0] <= kept < _HUMAN_S[1]:
        msg = (
            f"a time base of {exposure_s:g} s holds only for accidental viewing of visible "
            f"light, 400 to 700 nm: at {wavelength_nm:g} nm nothing makes an eye turn away"
        )
        raise OutOfRange(msg)
    return kept


def question(
    wavelength_nm: float,
    light: float | Pulse,
    exposure_s: float | None = None,
    beam: Exit | None = None,
) -> Question:
    """Put a question together, the time base filled in and everything checked.

    Raises
    ------
    OutOfRange
        If no limit exists for it, or the pulses are no pulses of that exposure.
    """
    wl = check_wavelength(wavelength_nm)
    time_s = default_time_base_s(wl) if exposure_s is None else check_exposure(wl, exposure_s)
    if isinstance(light, Pulse):
        check_duration(light.duration_s)
        eye_rules(wl, time_s, Train(light.duration_s, light.rate_hz))  # refuses what overlaps
    return Question(wl, light, time_s, beam, exposure_s is None)
