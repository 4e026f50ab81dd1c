"""Light that meets glass of unknown index is booked, and said; it never vanishes."""

import pytest

from benchlay.checks import run_checks

SOURCE = """
bench: {size: [900, 600]}
sources:
  uv: {wavelength: %s, power: 1 mW, beam: {waist_radius: 0.4}, at: [100, 200], heading: 0}
elements:
"""
TARGET = "  T: {kind: target, at: [800, 200], facing: 180}\n"


def found(make_context, element, nm=200):
    context = make_context(SOURCE % nm + element + TARGET)
    findings, runs = run_checks(context)
    assert all(run.ran for run in runs)
    trace = context.trace
    assert trace.ledger.power.sum() == pytest.approx(1e-3, rel=1e-12)  # no NaN, nothing lost
    return [f for f in findings if f.check == "unaccounted"]


@pytest.mark.parametrize(
    "element",
    [
        "{kind: window, at: [400, 200], facing: 180, diameter: 25.4}",
        "{kind: window, at: [400, 200], facing: 180, diameter: 25.4, front: 0 %, back: 0 %}",
        "{kind: lens, focal: 100, at: [400, 200], facing: 180, diameter: 25.4, front: 0 %}",
        "{kind: cube, reflectance: {s: 99 %, p: 1 %}, at: [400, 200], facing: 180}",
    ],
)
def test_glass_without_an_index_swallows_and_is_told(make_context, element):
    (finding,) = found(make_context, f"  X: {element}\n")
    assert finding.element == "X"
    assert "no known index" in finding.message
    assert finding.value == pytest.approx(1e-3, rel=1e-6)
    mended = element.replace("kind:", "glass: {index: 1.5}, kind:")
    assert found(make_context, f"  X: {mended}\n") == []


def test_a_stated_reflectance_holds_before_unknown_glass(make_context):
    element = (
        "  X: {kind: splitter, reflectance: 60 %, at: [400, 200], facing: 180, diameter: 25.4}\n"
    )
    (finding,) = found(make_context, element)
    assert finding.value == pytest.approx(0.4e-3, rel=1e-9)


@pytest.mark.parametrize("coating", ["reflectance: 99 %", "metal: gold", "metal: aluminium"])
def test_behind_a_ground_mirror_the_glass_does_not_matter(make_context, coating):
    element = f"  X: {{kind: mirror, {coating}, at: [400, 200], facing: 180, diameter: 25.4}}\n"
    assert found(make_context, element, nm=10600) == []


def test_a_metal_beyond_its_table_is_told_as_such(make_context):
    element = "  X: {kind: mirror, metal: aluminium, at: [400, 200], facing: 180, diameter: 25.4}\n"
    findings, _ = run_checks(make_context(SOURCE % 190 + element + TARGET))
    (finding,) = (f for f in findings if f.check == "coating-unstated")
    assert "assumed to send all back" in finding.message
    assert "not its metal" in finding.remedy


def test_what_falls_on_glass_beside_the_chief_ray_is_told_as_well(make_context):
    text = (SOURCE % 200).replace("0.4", "5") + TARGET
    text += "  X: {kind: window, at: [400, 208], facing: 180, diameter: 12.7, mount: none}\n"
    findings, _ = run_checks(make_context(text))
    (finding,) = (f for f in findings if f.check == "unaccounted")
    assert finding.element == "X"
