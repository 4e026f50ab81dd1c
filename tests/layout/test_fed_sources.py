"""Sources that other light feeds."""

import pytest

from benchlay.layout import read_layout

TEXT = """\
bench: {{size: [1500, 900]}}
sources:
  laser: {{wavelength: 450, power: 1 W, beam: {{waist_radius: 0.5}}, at: [100, 450], heading: 0}}
  far: {{wavelength: 450, beam: {{waist_radius: 0.3}}, at: [300, 200], heading: 0, {keys}}}
elements:
  T: {{kind: target, after: laser, distance: 500}}
  M: {{kind: mirror, at: [5, 5], facing: 0, diameter: 25, metal: gold}}
"""


def _far(keys):
    source, problems = read_layout(TEXT.format(keys=keys), "b.yaml")
    return source and source.layouts["as drawn"].sources["far"], [
        p.message for p in problems.sorted()
    ]


def test_it_need_not_state_its_power():
    far, problems = _far("fed_by: {target: T, share: 60 %}")
    assert problems == []
    assert far.fed().share == 0.6
    assert far.fed().target.name == "T"


@pytest.mark.parametrize(
    "stated", ["power: 2 mW", "pulse: {energy: 1 mJ, duration: 8 ns, rate: 9 Hz}"]
)
def test_what_it_states_holds(stated):
    far, problems = _far(f"{stated}, fed_by: {{target: T}}")
    assert problems == []
    assert far.fed() is None


@pytest.mark.parametrize(
    ("keys", "said"),
    [
        ("body: none", "nothing says how much it emits"),
        ("fed_by: {target: M}", "'M' is a mirror: no light is coupled in there"),
        ("fed_by: {target: Z}", "there is no element named 'Z'"),
    ],
)
def test_says_what_is_wrong(keys, said):
    _, problems = _far(keys)
    assert [said in problem for problem in problems] == [True]
