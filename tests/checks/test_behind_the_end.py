"""What lands behind the thing a beam goes to has missed that thing: one finding, with the total."""

import math

import pytest

from benchlay.checks import run_checks
from benchlay.checks._check.behind import met_before_end

OVERFILLED = """
bench: {size: [1500, 900]}
sources:
  red: {wavelength: 633, power: 2 mW, beam: {waist_radius: 20}, at: [100, 450], heading: 0}
elements:
  T: {kind: target, after: red, distance: 300, size: [30, 30]}
  K: {kind: screen, at: [500, 450], facing: 180, size: [150, 150]}
routes:
  r: [red, T]
"""


def found(make_context, text, *checks):
    findings, _ = run_checks(make_context(text))
    return [f for f in findings if f.check in checks]


def past_square(half, w=20.0):
    """Share of a round beam beside a square: erf along each of its axes."""
    return 1.0 - math.erf(math.sqrt(2.0) * half / w) ** 2


def test_what_passes_an_overfilled_target_is_clipped_there(make_context):
    (finding,) = found(make_context, OVERFILLED, "clipped", "beam-blocked", "route-broken")
    assert finding.check == "clipped"
    assert finding.value == pytest.approx(past_square(15.0), rel=1e-4)
    assert finding.message == (
        "24.9 % (499 µW) of the beam of 'r' ends on the body of 'T' or goes past it, met in the "
        "middle"
    )
    assert finding.expected == "a loss of at most 1 %; this beam loses more even through the middle"
    assert finding.remedy == (
        "widen its clear region from 30 mm to 56.2 mm, or make the beam narrower there"
    )


def test_what_passes_and_meets_nothing_is_lost_too(make_context):
    text = OVERFILLED.replace("  K:", "  K1:").replace("at: [500, 450]", "at: [500, 800]")
    (finding,) = found(make_context, text, "clipped", "beam-blocked")
    assert finding.value == pytest.approx(past_square(15.0), rel=1e-4)


def test_an_optic_without_a_mount_is_passed(make_context):
    text = OVERFILLED.replace(
        "  T: {kind: target, after: red, distance: 300, size: [30, 30]}",
        "  M: {kind: mirror, at: [400, 450], facing: 180, diameter: 30, clear: 1, thickness: 0.1,"
        " metal: silver, mount: none}\n  T: {kind: target, at: [1400, 100], facing: 90}",
    ).replace("[red, T]", "[red, M, T]")
    clipped = [f for f in found(make_context, text, "clipped") if f.element == "M"]
    (finding,) = clipped
    assert finding.value == pytest.approx(math.exp(-2.0 * 15.0**2 / 20.0**2), rel=1e-3)
    assert finding.message == "32.5 % (649 µW) of the beam of 'r' goes past 'M', met in the middle"
    assert not found(make_context, text, "beam-blocked")


def test_what_stands_before_the_target_still_blocks(make_context):
    text = OVERFILLED.replace("at: [500, 450]", "at: [300, 536]")
    blocked, clipped = found(make_context, text, "clipped", "beam-blocked")
    if blocked.check == "clipped":
        blocked, clipped = clipped, blocked
    assert (blocked.element, clipped.element) == ("K", "T")
    edge = 0.5 * math.erfc(math.sqrt(2.0) * 11.0 / 20.0)
    inside = 0.5 * (math.erf(math.sqrt(2.0) * 15.0 / 20.0) - math.erf(math.sqrt(2.0) * 11.0 / 20.0))
    high = math.erf(math.sqrt(2.0) * 75.0 / 20.0)
    assert blocked.value == pytest.approx(edge * high, rel=1e-3)
    taken = inside * math.erf(math.sqrt(2.0) * 15.0 / 20.0)
    beside = edge * high
    assert clipped.value == pytest.approx(past_square(15.0) - (beside - taken), rel=2e-2)


@pytest.mark.parametrize(("at", "before"), [("300, 536", True), ("500, 450", False)])
def test_before_and_behind_are_told_by_lines_of_flow(make_context, at, before):
    context = make_context(OVERFILLED.replace("at: [500, 450]", f"at: [{at}]"))
    s, scene = context.trace.scene.solids, context.trace.scene
    solids = (s.name == scene.names.index("K")).nonzero()[0]
    assert met_before_end(context.trace, 0, solids) == before
