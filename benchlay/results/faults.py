"""Puts the review of single faults into the form in which it is reported."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from math import degrees

from benchlay.faults import Fan, Fault, Light, Opened, Range, Review, Window, fans_of
from benchlay.placing.placed import Placed
from benchlay.report.faults import (
    FanRow,
    FaultFinding,
    FaultRow,
    FaultsResult,
    OpenedRow,
    Resolution,
    WindowRow,
)
from benchlay.results.panels import panel_rows

ASSUMED = (
    "one fault at a time, in the states as they are written; two at once are not reviewed",
    "adjustable mounts are those with a box; each is turned about the optic's reference point, "
    "by one axis at a time, through its range or what `limits.faults.range` asks for",
    "an element that is out leaves its mount out too; back to front it is turned about the "
    "upright through its middle; a rolled one turns about the nominal beam that arrives",
    "a shutter half way is open over half the height of its opening; flip mounts are in or out, "
    "never half way",
    "light of another wavelength is shown by taking an optic's stated coatings off: bare glass, "
    "not a coating that reflects more than that",
    "a panel's irradiance is that on the axis of the beam whose chief ray ends on it, across the "
    "beam, held for the time base of its limit: no interlock is counted on to cut it short",
    "beams as `check` follows them, each taken alone; mirror reflections off panels are followed",
)


def faults_result(review: Review, placed: Placed, file: str, sha256: str) -> FaultsResult:
    """Return the review as it is reported."""
    names = [state.name for state in placed.states]
    fans = {id(fan.fault): fan for fan in fans_of(review.faults)}
    off = _families_off(placed, review.states)
    return FaultsResult(
        file,
        sha256,
        review.states,
        review.cases,
        review.passed_over,
        tuple(_row(fault, names, fans.get(id(fault))) for fault in review.faults),
        Resolution(
            review.step_mm,
            degrees(review.open_rad),
            degrees(review.stray_open_rad),
            max(review.step_mm, review.narrowest_mm),
        ),
        (*ASSUMED, *off),
        panel_rows(review.budgets),
        tuple(map(_window, review.windows)),
        tuple(map(_opened, review.opened)),
    )


def _families_off(placed: Placed, states: Sequence[str]) -> Iterator[str]:
    for state in placed.states:
        if state.name not in states:
            continue
        settings = state.layout.limits.faults
        off = [key.name for a, key in settings.KEYS.items() if getattr(settings, a) is False]
        if off:
            yield (
                f"in {state.name!r} the layout turns off, so that nothing is known of them: "
                f"{', '.join(off)}"
            )


def _row(fault: Fault, names: Sequence[str], fan: Fan | None) -> FaultRow:
    worst, swept = fault.worst, fault.family.sweep is not None
    return FaultRow(
        fault=fault.name,
        element=fault.family.element,
        kind=fault.kind,
        state=names[fault.family.state],
        outcome=fault.outcome,
        power_W=None if worst is None else worst.power_w,
        through=None if worst is None else worst.through,
        at=None if worst is None else worst.at,
        direction=None if worst is None else worst.direction,
        findings=tuple(_finding(light, fault) for light in fault.lights),
        range=None if fault.range_of_worst is None else _degrees(fault.range_of_worst),
        ranges=tuple(_degrees(one) for one in fault.ranges),
        setting_deg=_settled(fault.setting_rad) if swept and worst is not None else None,
        times_limit=None if worst is None else worst.times,
        cases=len(fault.cases),
        reason="; ".join(fault.reasons) or None,
        number=None if fan is None else fan.number,
        fan=None if fan is None or worst is None else _fan(fan, worst),
    )


def _fan(fan: Fan, worst: Light) -> FanRow:
    azimuth, elevation = Range(*fan.azimuth_rad), Range(*fan.elevation_rad)
    return FanRow(worst.origin, _degrees(azimuth), _degrees(elevation), fan.reach_mm)


def _degrees(one: Range) -> tuple[float, float]:
    return _settled(one.low_rad), _settled(one.high_rad)


def _settled(angle_rad: float) -> float:
    """Return degrees without the noise of the conversion."""
    return round(degrees(angle_rad), 9) + 0.0


def _finding(light: Light, fault: Fault) -> FaultFinding:
    escapes = fault.outcome == "escape"
    how = "leaves by" if escapes else "ends unstopped on"
    left = f", last at '{light.left}'," if light.left else ""
    return FaultFinding(
        "escape" if escapes else "stray-unstopped",
        f"{light.power_w:.3g} W of {light.wavelength_nm:g} nm from '{light.source}'{left} {how} "
        f"'{light.through}'",
        light.source,
        light.wavelength_nm,
        light.left,
        light.through,
        light.power_w,
        light.limit_w,
        light.times,
        light.at,
        light.direction,
    )


def _window(window: Window) -> WindowRow:
    pane = window.pane
    return WindowRow(
        pane.element,
        pane.opening,
        pane.wavelength_nm,
        pane.density,
        window.arriving_w,
        window.state,
        window.fault,
        window.needed,
        window.needed_full,
        _enough(pane.density, window.needed),
        _enough(pane.density, window.needed_full),
    )


def _enough(density: float | None, needed: float | None) -> bool | None:
    """Tell whether a density is enough; None where it is not known what is needed."""
    if needed is None:
        return None
    return density is None or density >= needed


def _opened(opened: Opened) -> OpenedRow:
    light = opened.leaves
    inside = opened.inside_w
    return OpenedRow(
        opened.sheet[1],
        opened.sheet[0],
        opened.state,
        opened.access,
        None if light is None else light.power_w,
        None if light is None else light.times,
        None if light is None else light.source,
        None if light is None else light.wavelength_nm,
        None if light is None else light.left,
        None if light is None else light.at,
        None if light is None else light.direction,
        inside,
        None if inside is None or not opened.inside_limit_w else inside / opened.inside_limit_w,
    )
