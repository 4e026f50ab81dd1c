"""What the plan says of light that no source emits: made by a converter, or scattered."""

import textwrap

from benchlay.pipeline import place, read, trace
from benchlay.sheets.drafting import plan_picture
from benchlay.zones import zones_of


def picture(text, state="as drawn"):
    traced = trace(place(read("bench.yaml", textwrap.dedent(text))))
    variant = traced.scene.variants.index(state)
    return plan_picture(traced, zones_of(traced), variant=variant)


MADE = """
    bench: {size: [800, 400]}
    sources:
      ir: {wavelength: 1064, power: 1 W, beam: {waist_radius: 1}, at: [100, 200], heading: 0}
    elements:
      C: {kind: converter, after: ir, distance: 200, incidence: 2, diameter: 10, length: 10,
          front: 0, back: 0, produces: [{wavelength: 532, share: 60 %, polarization: vertical}]}
      D1: {kind: dump, after: C, wavelength: 532, distance: 200}
    routes: {main: [ir, C.532, D1], rest: [ir, C.1064, D1]}
    states:
      bare: {elements.C.out: yes}
      dark: {sources.ir.out: yes}
    """


def test_the_legend_says_what_makes_a_wavelength_and_how_much():
    green, infrared = picture(MADE).legend
    assert green.words == "532 nm, made by C 0.6 W: B3"
    assert green.width_mm == infrared.width_mm  # as strong as that is, not as what is dark
    assert infrared.words == "1064 nm, ir 1 W: B1 to B2"


def test_what_is_not_made_in_a_state_is_not_emitted():
    for state in ("bare", "dark"):
        green = picture(MADE, state).legend[0]
        assert green.words == "532 nm, not emitted"
        assert green.width_mm < picture(MADE).legend[0].width_mm


SCATTERED = """
    bench: {size: [800, 400]}
    sources:
      red: {wavelength: 633, power: 1 mW, beam: {waist_radius: 0.5}, at: [100, 200], heading: 0}
    elements:
      T1: {kind: target, after: red, distance: 300}
      W1: {kind: window, at: [325, 250], facing: T1, diameter: 25}
      cam: {kind: target, at: [250, 300], facing: T1}
    routes: {pilot: [red, T1.scattered, W1, cam]}
    """


def test_scattered_light_has_no_power_in_its_tag():
    tags = [leg.words for leg in picture(SCATTERED).legs if leg.words]
    assert tags == ["B1 red 633 nm 1 mW", "B2 scattered"]


def test_scattered_light_says_its_wavelength_where_there_are_several():
    more = "      blue: {wavelength: 450, power: 1 mW, beam: {waist_radius: 0.5}, at: [100, 50],\n"
    text = SCATTERED.replace("    elements:", f"{more}        heading: 0}}\n    elements:")
    tags = [leg.words for leg in picture(text).legs if leg.words and not leg.stray]
    assert tags == ["B1 red 633 nm 1 mW", "B2 633 nm scattered"]
