"""The command line's figures of one beam, read and put as a question.

Figures are read by the code that reads those of a layout. Everything wrong is collected, so
that one run shows it all.
"""

from __future__ import annotations

from argparse import Namespace

from benchlay.document.quantity import Dimension, QuantityError, parse
from benchlay.exposure.accessible import Pulse
from benchlay.exposure.errors import OutOfRange
from benchlay.exposure.factors import (
    check_duration,
    check_wavelength,
)
from benchlay.exposure.questions import Exit, Question, check_exposure, question
from benchlay.named import NamedTuple


class Mistake(NamedTuple):
    """One thing wrong with the command line: which option, what, expected, how to mend it."""

    option: str
    message: str
    expected: str
    remedy: str

    def __str__(self) -> str:
        """Write it as the problems of a layout are written."""
        head = f"benchlay: exposure: {self.option}: {self.message}"
        return f"{head}\n  expected: {self.expected}\n  to mend: {self.remedy}"


class Form(NamedTuple):
    """What an option measures, in which range, and what it is for."""

    dimension: Dimension
    metavar: str
    meaning: str
    zero: bool = False


FORMS: dict[str, Form] = {
    "wavelength": Form(Dimension.WAVELENGTH, "LENGTH", "in vacuum, such as 532nm; 180 nm to 1 mm"),
    "power": Form(Dimension.POWER, "POWER", "of continuous light, such as 5mW"),
    "pulse_energy": Form(Dimension.ENERGY, "ENERGY", "of one pulse, such as 1mJ"),
    "pulse_duration": Form(Dimension.DURATION, "TIME", "of one pulse, such as 8ns"),
    "rate": Form(Dimension.RATE, "RATE", "of pulses, such as 1kHz; 0Hz for one", zero=True),
    "exposure": Form(
        Dimension.DURATION, "TIME", "of the exposure, such as 10s (100 s; 30000 s below 400 nm)"
    ),
    "diameter": Form(Dimension.LENGTH, "LENGTH", "of the beam at its exit, at 1/e²"),
    "divergence": Form(Dimension.ANGLE, "ANGLE", "full angle at 1/e², such as 1mrad"),
}
"""Every option that carries a figure, by its name in the parsed arguments."""

_PULSED = ("pulse_energy", "pulse_duration", "rate")


def flag(name: str) -> str:
    """Return the option as it is typed."""
    return "--" + name.replace("_", "-")


def read(options: Namespace) -> Question | tuple[Mistake, ...]:
    """Read the figures and put the question, or list everything that is wrong with them.

    Parameters
    ----------
    options : argparse.Namespace
        One list of word lists an option, as often as it was given; None where it was not.
    """
    mistakes: list[Mistake] = []
    given: dict[str, float | None] = {}
    for name, form in FORMS.items():
        words = getattr(options, name)
        if words is not None:
            given[name] = _figure(name, form, words, mistakes)
    _check_set(given, mistakes)
    _check_ranges(given, mistakes)
    if mistakes:
        return tuple(mistakes)
    # Nothing is wrong with them one by one, so every figure given is a number.
    return _question({name: value for name, value in given.items() if value is not None})


def _figure(name: str, form: Form, words: list[list[str]], mistakes: list[Mistake]) -> float | None:
    if len(words) > 1:
        mistakes.append(
            Mistake(flag(name), "given more than once", "one figure", "keep the one that is meant")
        )
        return None
    try:
        value = parse(" ".join(words[0]), form.dimension)
    except QuantityError as error:
        mistakes.append(Mistake(flag(name), error.message, error.expected, error.remedy))
        return None
    if value > 0.0 or (form.zero and value == 0.0):
        return value
    least = "0 or more" if form.zero else "more than 0"
    mistakes.append(
        Mistake(
            flag(name),
            f"'{' '.join(words[0])}' is {'negative' if value < 0.0 else 'zero'}",
            f"{form.dimension.noun} of {least}",
            f"write {form.dimension.noun}, such as '{form.dimension.examples[0]}'",
        )
    )
    return None


def _check_set(given: dict[str, float | None], mistakes: list[Mistake]) -> None:
    """Say which options are missing, and which do not go together."""
    if "wavelength" not in given:
        mistakes.append(
            Mistake("--wavelength", "missing", "the wavelength in vacuum", "add --wavelength 532nm")
        )
    pulsed = [name for name in _PULSED if name in given]
    either = "either --power, or --pulse-energy, --pulse-duration and --rate"
    if "power" in given and pulsed:
        names = ", ".join(flag(name) for name in pulsed)
        mistakes.append(
            Mistake(
                "--power",
                f"given together with {names}: light is either continuous or pulsed",
                either,
                f"for pulses leave out --power, for continuous light {names}",
            )
        )
    elif not pulsed and "power" not in given:
        mistakes.append(
            Mistake("--power", "missing: nothing says how strong the light is", either, "add one")
        )
    elif pulsed:
        for name in _PULSED:
            if name not in given:
                remedy = f"add {flag(name)} {FORMS[name].dimension.examples[0].replace(' ', '')}"
                if name == "rate":
                    remedy += ", or --rate 0Hz for one single pulse"
                mistakes.append(Mistake(flag(name), "missing for pulses", either, remedy))
    for name, other in (("diameter", "divergence"), ("divergence", "diameter")):
        if name in given and other not in given:
            mistakes.append(
                Mistake(
                    flag(other),
                    f"missing beside {flag(name)}",
                    "both, from which the beam's size follows everywhere, or neither",
                    f"add {flag(other)}, or leave out {flag(name)}",
                )
            )


def _check_ranges(given: dict[str, float | None], mistakes: list[Mistake]) -> None:
    """Say what lies where no limit exists, and which times contradict one another."""
    wl, exposure = given.get("wavelength"), given.get("exposure")
    pulse, rate = given.get("pulse_duration"), given.get("rate")
    if wl is not None:
        try:
            check_wavelength(wl)
        except OutOfRange as error:
            mistakes.append(
                Mistake(
                    "--wavelength",
                    str(error),
                    "a wavelength from 180 nm to 1 mm",
                    "check the unit; outside this range another standard is needed",
                )
            )
            wl = None
    for name, value in (("exposure", exposure), ("pulse_duration", pulse)):
        if value is not None:
            mistakes += _time_mistakes(name, value, wl)
    if pulse is None:
        return
    if rate is not None and pulse * rate >= 1.0:
        mistakes.append(
            Mistake(
                "--rate",
                f"pulses of {pulse:g} s at {rate:g} Hz overlap",
                f"less than {1.0 / pulse:g} Hz for pulses this long",
                "check both figures; light that does not pause is given by its --power",
            )
        )
    elif exposure is not None and pulse >= exposure:
        mistakes.append(
            Mistake(
                "--exposure",
                f"a pulse of {pulse:g} s fills the whole exposure of {exposure:g} s",
                "an exposure longer than one pulse",
                "give a longer exposure, or the pulse's power as --power",
            )
        )


def _time_mistakes(name: str, value: float, wl: float | None) -> list[Mistake]:
    expected = "a duration from 1e-13 s to 30000 s"
    try:
        check_duration(value)
    except OutOfRange as error:
        return [Mistake(flag(name), str(error), expected, "check the unit")]
    try:
        if name == "exposure" and wl is not None:
            check_exposure(wl, value)
    except OutOfRange as error:
        return [
            Mistake(
                flag(name),
                str(error),
                "10 s or more for light that nobody sees",
                "leave it out for the time base of this wavelength; an exposure that the "
                "source ends is a pulse, with --rate 0Hz",
            )
        ]
    return []


def _question(given: dict[str, float]) -> Question | tuple[Mistake, ...]:
    light: float | Pulse
    if "power" in given:
        light = given["power"]
    else:
        light = Pulse(given["pulse_energy"], given["pulse_duration"], given["rate"])
    beam = Exit(given["diameter"], given["divergence"]) if "diameter" in given else None
    try:
        return question(given["wavelength"], light, given.get("exposure"), beam)
    except OutOfRange as error:  # a default exposure that a pulse outlasts
        expected = "pulses shorter than the exposure"
        return (Mistake("--pulse-duration", str(error), expected, "give the light by its --power"),)
