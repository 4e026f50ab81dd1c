"""Every limit: exactly at it, just inside and just outside."""

import math

import numpy as np
import pytest

from benchlay.checks import CHECKS, run_checks
from benchlay.findings import Severity

BY_NAME = {module.NAME: module for module in CHECKS}
HEAD = "bench: {size: [800, 400]}\n"


def source(keys="", power="5 mW", w=0.5):
    return (
        "sources:\n"
        f"  red: {{wavelength: 633, power: {power}, beam: {{waist_radius: {w}}}, "
        f"polarization: vertical, at: [100, 200], heading: 0{keys}}}\n"
    )


def found(make_context, name, text, variant=0):
    return list(BY_NAME[name].check(make_context(text), variant))


def aperture(limit, w=2.0, opening=6.0):
    return (
        HEAD
        + source(w=w)
        + f"elements:\n  A1: {{kind: aperture, after: red, distance: 0.001, opening: {opening}}}\n"
        + "  T1: {kind: target, after: A1, distance: 100}\n"
        + "routes: {main: [red, A1, T1]}\n"
        + f"limits: {{clip: {limit!r}}}\n"
    )


@pytest.mark.parametrize(("factor", "fires"), [(1 - 1e-6, True), (1.0, False), (1 + 1e-6, False)])
def test_clipped_at_the_closed_form(make_context, factor, fires):
    """A round beam loses exp(-2 a2/w2) at a round opening in its middle."""
    loss = math.exp(-2.0 * 3.0**2 / 2.0**2)
    findings = found(make_context, "clipped", aperture(factor * loss))
    assert bool(findings) == fires
    for finding in findings:
        assert finding.value == pytest.approx(loss, rel=1e-6)


def test_clipped_names_a_decentre_that_is_indeed_allowed(make_context):
    text = aperture(0.05).replace("opening: 6.0", "opening: 6.0, offset: [0, {off}, 0]")
    (finding,) = found(make_context, "clipped", text.replace("{off}", "2.5"))
    allowed = float(finding.expected.split("up to ")[1].removesuffix(" mm"))
    assert not found(make_context, "clipped", text.replace("{off}", f"{allowed - 0.01}"))
    assert found(make_context, "clipped", text.replace("{off}", f"{allowed + 0.01}"))


def test_clipped_names_a_width_that_clears_it(make_context):
    (finding,) = found(make_context, "clipped", aperture(0.001))
    width = float(finding.remedy.split(" to ")[1].split(" mm")[0])
    assert not found(make_context, "clipped", aperture(0.001, opening=width))
    assert found(make_context, "clipped", aperture(0.001, opening=0.99 * width))


@pytest.mark.parametrize(("off", "fires"), [(0.499999, False), (0.5, False), (0.500001, True)])
@pytest.mark.parametrize(("name", "offset"), [("off-centre", 1), ("off-height", 2)])
def test_marks(make_context, name, offset, off, fires):
    where = [0.0, 0.0, 0.0]
    where[offset] = off
    text = (
        HEAD
        + source()
        + f"elements:\n  T1: {{kind: target, after: red, distance: 100, offset: {where}}}\n"
        + "routes: {main: [red, T1]}\n"
    )
    findings = found(make_context, name, text)
    assert bool(findings) == fires
    for finding in findings:
        assert finding.value == pytest.approx(off, abs=1e-9)
        assert (finding.limit, finding.unit) == (0.5, "mm")


@pytest.mark.parametrize("offset", [[0, 2, 0], [0, -2, 0], [0, 0, 2], [0, 0, -2]])
def test_the_mend_of_a_mark_clears_it(make_context, offset):
    name, axis = ("off-centre", 1) if offset[1] else ("off-height", 2)
    text = (
        HEAD
        + source()
        + (
            f"elements:\n  M1: {{kind: mirror, after: red, distance: 100, turn: left 90, "
            f"diameter: 25.4, metal: silver, offset: {offset}}}\nroutes: {{main: [red, M1]}}\n"
        )
    )
    (finding,) = found(make_context, name, text)
    by = 2.0 if any(word in finding.remedy for word in ("raise", "left")) else -2.0
    by = 2.0 if "on the left" in finding.message else by
    moved = list(offset)
    moved[axis] += by
    assert not found(make_context, name, text.replace(str(offset), str(moved)))


def test_beam_at_moves_the_mark(make_context):
    text = (
        HEAD
        + source()
        + (
            "elements:\n  T1: {kind: target, at: [300, 198], facing: 180, beam_at: [-2, 0]}\n"
            "routes: {main: [red, T1]}\n"
        )
    )
    assert not found(make_context, "off-centre", text)
    (finding,) = found(
        make_context, "off-centre", text.replace("beam_at: [-2, 0]", "beam_at: [2, 0]")
    )
    assert finding.value == pytest.approx(4.0)


def edge(at, clip="1 %"):
    return (
        HEAD
        + source()
        + (
            f"elements:\n  post: {{kind: obstacle, at: [300, {at}], facing: 0, "
            "outline: [[0, 0], [20, 0], [20, 20], [0, 20]], to_height: 200}\n"
            "  T1: {kind: target, after: red, distance: 400}\n"
            f"routes: {{main: [red, T1]}}\nlimits: {{clip: {clip}}}\n"
        )
    )


def test_an_edge_at_the_beam_radius_takes_half_the_complementary_error_function(make_context):
    """A half plane at a distance d from the axis takes erfc(sqrt 2 d/w)/2.

    The side runs along the beam, which spreads into it: w is that at its far end.
    """
    context = make_context(edge(200.5))
    (finding,) = BY_NAME["beam-blocked"].check(context, 0)
    w = 0.5 * math.hypot(1.0, 220.0 * 633e-6 / (math.pi * 0.25))
    share = 0.5 * math.erfc(math.sqrt(2.0) * 0.5 / w)
    assert finding.value == pytest.approx(share, rel=1e-3)
    assert finding.element == "post"


@pytest.mark.parametrize(("at", "fires"), [(200.56, True), (201.2, False)])
def test_blocked_by_an_edge(make_context, at, fires):
    assert bool(found(make_context, "beam-blocked", edge(at))) == fires


def ghost(power):
    return (
        HEAD
        + source(power=power)
        + (
            "elements:\n  W1: {kind: window, after: red, distance: 200, incidence: 45, "
            "glass: {index: 1.5}, diameter: 25.4, thickness: 3, back: 0.001 %}\n"
            "  T1: {kind: target, after: W1, distance: 100}\nroutes: {main: [red, W1, T1]}\n"
        )
    )


def test_stray_is_held_against_the_accessible_limit(make_context):
    """s light at 45 degrees on an index of 1.5: R = 9.20 % (Fresnel)."""
    inner = math.sqrt(1.5**2 - 0.5)
    share = ((math.sqrt(0.5) - inner) / (math.sqrt(0.5) + inner)) ** 2
    context = make_context(ghost("5 mW"))
    limit = float(context.limit_w[0])
    at_limit = limit / share
    for factor, fires in ((1 - 1e-6, False), (1.0, False), (1 + 1e-6, True)):
        findings = found(make_context, "stray-unstopped", ghost(f"{factor * at_limit!r} W"))
        assert bool(findings) == fires
    (finding,) = findings
    assert finding.value == pytest.approx(limit, rel=1e-5)
    assert finding.limit == limit
    assert finding.element == "W1"
    assert "meets nothing" in finding.message


def test_the_mend_of_a_stray_clears_it(make_context):
    (finding,) = found(make_context, "stray-unstopped", ghost("50 mW"))
    at = finding.remedy.split("at ")[1].split(" with")[0]
    facing = finding.remedy.split("facing: ")[1].rstrip("`")
    screen = f"elements:\n  SC: {{kind: screen, at: {at}, facing: {facing}}}\n"
    mended = ghost("50 mW").replace("elements:\n", screen)
    assert not found(make_context, "stray-unstopped", mended)


def leaving(power):
    return HEAD + source(power=power)


def test_escape_is_held_against_the_accessible_limit(make_context):
    limit = float(make_context(leaving("5 mW")).limit_w[0])
    for factor, fires in ((1 - 1e-6, False), (1.0, False), (1 + 1e-6, True)):
        assert bool(found(make_context, "escape", leaving(f"{factor * limit!r} W"))) == fires
    (finding,) = found(make_context, "escape", leaving("5 mW"))
    assert finding.at == pytest.approx((800.0, 200.0, 100.0))
    assert finding.value == pytest.approx(5e-3)


def test_a_wide_beam_is_judged_by_what_an_eye_could_take_in(make_context):
    """Of a beam of 1/e2 radius 20 mm a pupil of 7 mm takes 1 - exp(-2 3.5^2/20^2)."""
    context = make_context(HEAD + source(power="100 mW", w=20))
    (finding,) = BY_NAME["escape"].check(context, 0)
    assert finding.value == pytest.approx(0.1 * -math.expm1(-2 * (3.5 / 20) ** 2), rel=1e-4)


def test_a_focus_on_the_way_is_the_worst_place(make_context):
    """A beam that starts wide and has its waist half way is judged there."""
    text = (HEAD + source(power="1 mW")).replace(
        "{waist_radius: 0.5}", "{waist_radius: 0.01, waist_ahead: 400}"
    ) + "elements:\n  T1: {kind: target, after: red, distance: 650, size: [90, 90]}\n"
    context = make_context(text)
    assert context.accessible_w[0] == pytest.approx(1e-3, rel=1e-9)


def test_a_line_without_a_limit_is_never_passed(make_context):
    text = (HEAD + source()).replace("wavelength: 633", "wavelength: 150")
    context = make_context(
        text.replace("bench: {size: [800, 400]}", "bench: {size: [800, 400], medium: vacuum}")
    )
    findings, runs = run_checks(context)
    stray = [f for f in findings if f.check == "escape"]
    assert [f.severity for f in stray] == [Severity.FAIL]
    assert "not evaluated" in stray[0].message
    (run,) = (r for r in runs if r.check == "escape")
    assert not run.ran
    assert "150 nm" in run.reason


class _Broken:
    NAME = "broken"

    @staticmethod
    def check(context, variant):
        raise ZeroDivisionError(variant)
        yield context


def test_a_check_that_crashes_is_a_finding_and_the_others_run(make_context):
    from benchlay.checks._run import run_checks as run_these

    findings, runs = run_these(make_context(leaving("5 mW")), (_Broken, BY_NAME["escape"]))
    assert [f.check for f in findings] == ["broken", "escape"]
    assert [r.ran for r in runs] == [False, True]
    assert "ZeroDivisionError" in runs[0].reason


def test_the_ledger_of_a_bench_closes(make_context):
    context = make_context(ghost("5 mW"))
    assert not [f for f in BY_NAME["unaccounted"].check(context, 0) if "sinks" in f.message]


def test_a_ledger_that_does_not_close_is_told(make_context):
    context = make_context(ghost("5 mW"))
    for factor, fires in ((1 + 0.5e-9, False), (1 + 2e-9, True)):
        ledger = context.trace.ledger
        changed = context.trace._replace(
            ledger=ledger._replace(power=factor * np.asarray(ledger.power))
        )
        again = type(context)(changed, context.limits)
        findings = [f for f in BY_NAME["unaccounted"].check(again, 0) if "sinks" in f.message]
        assert bool(findings) == fires


@pytest.mark.parametrize(
    ("height", "fires"), [(360, False), (369.9, False), (370.1, True), (380, True)]
)
def test_eye_level_of_people_who_stand(make_context, height, fires):
    text = f"bench: {{size: [800, 400], surface_height: 1000, beam_height: {height}}}\n" + source()
    assert bool(found(make_context, "eye-level", text)) == fires


@pytest.mark.parametrize(("tilt", "fires"), [(0.5, True), (1.5, False)])
def test_into_source_by_angle(make_context, tilt, fires):
    """A face tilted by half a degree sends light back at one degree; accepted are two."""
    text = (
        HEAD
        + source(keys=", acceptance: 4, body: {length: 90, width: 60, height: 60}")
        + (
            f"elements:\n  W1: {{kind: window, after: red, distance: 10, incidence: {tilt}, "
            "diameter: 25.4}\nroutes: {main: [red, W1]}\n"
        )
    )
    assert bool(found(make_context, "into-source", text)) == fires


def test_panel_without_rating_is_not_shown(make_context):
    text = leaving("5 mW") + "enclosure: {panels: {east: {from: [800, 0], to: [800, 400]}}}\n"
    (finding,) = found(make_context, "panel-overload", text)
    assert "not shown" in finding.message
    assert not found(make_context, "panel-overload", text.replace("5 mW", "0.3 mW"))


@pytest.mark.parametrize(
    ("rated", "fires"), [("4.99 mW", True), ("5 mW", False), ("5.01 mW", False)]
)
def test_dump_at_its_rating(make_context, rated, fires):
    text = leaving("5 mW") + (
        f"elements:\n  D1: {{kind: dump, after: red, distance: 200, "
        f"withstands: {{power: {rated}}}}}\nroutes: {{main: [red, D1]}}\n"
    )
    assert bool(found(make_context, "dump-overload", text)) == fires


def test_where_no_clearance_is_asked_for_bodies_may_touch_but_not_overlap(make_context):
    text = (
        "bench: {size: [800, 400]}\nlimits: {clearance: 0}\nsources:\n"
        "  red: {wavelength: 633, power: 5 mW, beam: {waist_radius: 0.5}, at: [100, 200],"
        " heading: 0}\nelements:\n"
    )
    box = (
        "  %s: {kind: obstacle, at: [%s, 40], facing: 0, outline: [[0, 0], [50, 0], [50, 50], "
        "[0, 50]], to_height: 60}\n"
    )

    def clashes(second_x):
        context = make_context(text + box % ("A", 300) + box % ("B", second_x))
        return [f for f in run_checks(context)[0] if f.check == "mount-clash"]

    assert clashes(350) == []
    (clash,) = clashes(348)
    assert clash.value == pytest.approx(-2.0)
    assert clash.message == "the body of 'B' overlaps the body of 'A' by 2 mm"


MAKING = "elements: {T1: {kind: target, after: red, distance: 100}}\nroutes: {main: [red, T1]}\n"


def panel(keys, material=""):
    sheet = f"materials: {{s: {{thickness: 2{material}}}}}\n"
    start = "enclosure:\n  material: s\n  panels:\n    south: {from: [0, 0], to: [800, 0], "
    return HEAD + source() + MAKING + sheet + start + keys + "}\n"


def making(make_context, text):
    return [(f.value, f.limit) for f in found(make_context, "fit-for-making", text)]


@pytest.mark.parametrize(("hole", "fires"), [(1.999, True), (2.0, False), (2.001, False)])
def test_fit_for_making_at_the_thickness(make_context, hole, fires):
    text = panel(f"fix: {{hole: {hole}, pitch: 150, inset: 10}}")
    assert making(make_context, text) == ([(hole, 2.0)] if fires else [])
    text = panel(f"openings: {{o: {{along: 100, height: 100, diameter: {hole}}}}}")
    assert bool(making(make_context, text)) == fires


@pytest.mark.parametrize(("inset", "fires"), [(8.99, True), (9.0, False), (9.01, False)])
def test_fit_for_making_at_the_edge(make_context, inset, fires):
    text = panel(f"fix: {{hole: 6, pitch: 150, inset: {inset}}}")
    assert making(make_context, text) == ([(pytest.approx(inset), 9.0)] if fires else [])


def test_fit_for_making_counts_the_edges_of_openings(make_context):
    # The row of 6 begins at 25: its second hole, at 175, is 7 from the opening's side.
    opening = "openings: {o: {along: 182, width: 20, from_height: 0, to_height: 40}}"
    text = panel("fix: {hole: 6, pitch: 150, inset: 10}, " + opening)
    assert making(make_context, text) == [(pytest.approx(7.0), 9.0)]


@pytest.mark.parametrize(("density", "fires"), [(31240, False), (31260, True)])
def test_fit_for_making_at_fifteen_kilograms(make_context, density, fires):
    # 800 x 300 x 2 mm: 0.00048 m3, so 15 kg at 31250 kg/m3.
    text = panel("access: none", f", density: {density} kg/m3")
    (said,) = making(make_context, text) or [None]
    assert (said is not None) == fires
    if fires:
        assert said == (pytest.approx(0.00048 * density), 15.0)


@pytest.mark.parametrize(
    ("slots", "pitch", "thread", "off"),
    [
        ("[[0, -12.5], [0, 12.5]]", 25.4, "1/4-20", None),  # 0.4: within the play
        ("[[0, -25], [0, 25]]", 25.4, "1/4-20", 0.8),
        ("[[0, -25.4], [0, 25.4]]", 25, "M6", 0.8),
        ("[[0, -25], [0, 25]]", 25, "M6", None),
        ("[[0, -26], [0, 26]]", 25, "M6", None),  # of neither grid: slots, or a plate
    ],
)
def test_fit_for_making_between_grids(make_context, slots, pitch, thread, off):
    text = (
        "bench: {size: [800, 400], holes: "
        + f"{{pitch: {pitch}, first: [25, 25], thread: {thread}}}}}\n"
        + source()
        + "elements:\n"
        + f"  M1: {{kind: mirror, after: red, distance: 200, turn: left 90, diameter: 25.4, "
        f"metal: silver, mount: {{slots: {slots}}}}}\n"
    )
    assert making(make_context, text) == ([] if off is None else [(pytest.approx(off), 0.6)])


def test_fit_for_making_names_a_thread_of_the_other_grid(make_context):
    text = "bench: {size: [800, 400], holes: {pitch: 25.4, first: [25, 25], thread: M6}}\n"
    assert making(make_context, text + source()) == [(25.4, 25.0)]


@pytest.mark.parametrize(("off", "fires"), [(0.499, False), (0.5, False), (0.501, True)])
def test_fit_for_making_at_the_middle_of_a_port(make_context, off, fires):
    text = (
        HEAD
        + source()
        + "routes: {main: [red, east.port]}\n"
        + "enclosure:\n  panels:\n    east: {from: [800, 0], to: [800, 400], "
        + f"openings: {{port: {{along: {200 + off}, height: 100, diameter: 30}}}}}}\n"
    )
    assert making(make_context, text) == ([(pytest.approx(off), 0.5)] if fires else [])
