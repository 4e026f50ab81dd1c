"""Of an optic that a route meets several times, the first meeting is held against its mark."""

import math

import pytest

from benchlay.checks import run_checks

HEAD = """
bench: {size: [800, 400]}
sources:
  red: {wavelength: 633, power: 0.3 mW, beam: {waist_radius: 0.3}, at: [100, 200], heading: 0,
        body: {length: 60, width: 20, height: 40}}
"""


def found(make_context, text):
    findings, _ = run_checks(make_context(HEAD + text))
    return [(f.check, f.element) for f in findings if f.check in ("off-centre", "off-height")]


# Through the aperture, and back through it beside the middle: M is turned by 0.2 degrees.
THERE_AND_BACK = """
elements:
  A: {kind: aperture, at: [200, Y], facing: 180, opening: 20}
  M: {kind: mirror, at: [600, 200], facing: FACING, pitch: PITCH, diameter: 25.4, metal: silver}
  T: {kind: target, at: [150, TY], facing: 0, height: TZ, size: [10, 10], mount: none}
routes: {main: [red, A, M, A, T]}
"""


def there_and_back(y=200, facing=180.0, pitch=0.0):
    """Return the layout; the target is put where the beam comes back to."""
    turned, up = math.radians(facing - 180.0), math.radians(pitch)
    way = 450.0
    values = {
        "Y": y,
        "FACING": facing,
        "PITCH": pitch,
        "TY": round(200.0 - way * math.tan(2.0 * turned), 3),
        "TZ": round(100.0 + way * math.tan(2.0 * up), 3),
    }
    text = THERE_AND_BACK
    for name in ("FACING", "PITCH", "TY", "TZ", "Y"):
        text = text.replace(name, str(values[name]))
    return text


def test_what_comes_back_beside_the_middle_is_meant_to(make_context):
    assert found(make_context, there_and_back(facing=181.0)) == []  # 14 to one side


def test_what_comes_back_above_the_middle_is_meant_to(make_context):
    assert found(make_context, there_and_back(pitch=1.0)) == []


def test_the_first_meeting_counts(make_context):
    assert found(make_context, there_and_back(y=198, facing=181.0)) == [("off-centre", "A")]


def test_another_route_meets_it_for_its_own_first_time(make_context):
    """The way back is the first of a second source's beam, which runs on it from there."""
    second = """
  blue: {wavelength: 450, power: 0.02 mW, beam: {waist_radius: 0.3}, at: [400, 202], heading: 180,
        body: none}
"""
    text = second + there_and_back() + "  other: [blue, A, T]\n"
    text = text.replace("routes: {main: [red, A, M, A, T]}", "routes:\n  main: [red, A, M, A, T]")
    findings = found(make_context, text)
    assert ("off-centre", "A") in findings


CELL = """
elements:
  C1:
    kind: cell
    at: [200, 200]
    facing: 180
    length: 300
    bore: 30
    beam_at: BEAM_AT
    windows: {incidence: 50, glass: fused-silica, thickness: 0.001, diameter: 60}
    offset: OFFSET
  T: {kind: target, at: [700, 200], facing: 180}
routes: {main: [red, C1, T]}
"""


@pytest.mark.parametrize("sideways", [6, -6])
def test_the_mark_of_a_cell_is_where_its_axis_moved_aside_meets_the_window(make_context, sideways):
    """The cell is moved by 6; `beam_at` says so, in the cell's own frame."""

    def at(left, up=0):
        return CELL.replace("BEAM_AT", f"[{left}, {up}]").replace("OFFSET", f"[0, {sideways}, 0]")

    assert found(make_context, at(-sideways)) == []
    assert found(make_context, at(0)) == [("off-centre", "C1")]
    # On a window turned by 50 degrees, 0.3 lie 0.47 apart and 0.34 lie 0.53.
    assert found(make_context, at(-sideways + 0.3)) == []
    assert found(make_context, at(-sideways + 0.34)) == [("off-centre", "C1")]
    assert found(make_context, at(-sideways, 0.6)) == [("off-height", "C1")]
