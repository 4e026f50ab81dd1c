"""What checks make of tubes, cells and light that converters make."""

import pytest

from benchlay.checks import CHECKS

HEAD = """\
bench: {{size: [1500, 900]}}
sources:
  green: {{wavelength: {nm}, power: 1 W, beam: {{waist_radius: 0.5}}, polarization: {state},
    at: [100, 450], heading: 0, body: none}}
elements:
"""


def found(make_context, name, elements, *, nm=532, state="horizontal"):
    (check,) = (check for check in CHECKS if name == check.NAME)
    return list(check.check(make_context(HEAD.format(nm=nm, state=state) + elements), 0))


PLATE = """\
  W: {kind: window, after: green, distance: 300, incidence: 45, side: left, diameter: 50,
    glass: BK7, mount: none}
  D: {kind: dump, after: W, distance: 400}
"""


@pytest.mark.parametrize(
    ("kind", "stopped"),
    [
        ("tube, to: [300, 650], bore: 30, at: [500, 650]", True),
        ("obstacle, outline: [[0, -100], [9, -100], [9, 100], [0, 100]], to_height: 200,"
         " facing: 270, at: [400, 640]", False),
    ],
)  # fmt: skip
def test_a_stray_may_end_on_a_tube_and_not_on_another_body(make_context, kind, stopped):
    """The window's reflection goes to the left, across the bench."""
    elements = PLATE + f"  B: {{kind: {kind}, mount: none}}\nroutes: {{a: [green, W, D]}}\n"
    strays = found(make_context, "stray-unstopped", elements)
    assert (not any("'B'" in finding.message for finding in strays)) == stopped


def _cell(incidence):
    return (
        "  C: {kind: cell, after: green, distance: 200, length: 200, bore: 20,"
        f" windows: {{incidence: {incidence}, glass: BK7}}, mount: none}}\n"
        "  D: {kind: dump, after: C, distance: 300}\n"
        "routes: {a: [green, C, D]}\n"
    )


@pytest.mark.parametrize(
    ("incidence", "state", "count"),
    [("brewster", "horizontal", 0), ("brewster", "vertical", 1), ("20", "vertical", 0)],
)
def test_brewster_windows_of_a_cell_want_their_polarization(make_context, incidence, state, count):
    findings = found(make_context, "off-brewster", _cell(incidence), state=state)
    assert [finding.element for finding in findings] == ["C"] * count


def test_light_that_a_converter_makes_is_judged_by_its_own_limit(make_context):
    """A share of 0.5 % leaves 995 mW of infrared and 5 mW of green, which the eye bears less."""
    elements = (
        "  X: {kind: converter, after: green, distance: 100, diameter: 10, length: 5,"
        " front: 0 %, back: 0 %, produces: [{wavelength: 532, share: 0.5 %}]}\n"
        "routes: {a: [green, X.1064]}\n"
    )
    findings = found(make_context, "escape", elements, nm=1064)
    infra, green = sorted(findings, key=lambda finding: -finding.value)
    assert (infra.value, green.value) == (pytest.approx(0.995), pytest.approx(0.005))
    # IEC 60825-1:2014, tables A.1 and 1: 10 W/m2 through 7 mm; C4 = 5 at 1064 nm.
    assert green.limit == pytest.approx(10 * 3.14159 / 4 * 49e-6, rel=1e-5)
    assert infra.limit == pytest.approx(5 * green.limit)


@pytest.mark.parametrize(
    ("kind", "said"),
    [
        ("retroreflector, diameter: 20, glass: BK7", "acts as a hollow corner cube"),
        ("retroreflector, diameter: 20", None),
        (
            "converter, diameter: 9, length: 5, produces: [{wavelength: 266, share: 1 %}]",
            "makes the same share of weak light as of strong",
        ),
    ],
)
def test_what_is_modelled_simply_is_told(make_context, kind, said):
    elements = f"  X: {{kind: {kind}, after: green, distance: 100}}\n"
    notes = [finding.message for finding in found(make_context, "as-modelled", elements)]
    assert [said in note for note in notes] == ([] if said is None else [True])
