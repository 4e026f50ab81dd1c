"""Whatever is written, reading ends in a layout or in problems, never in an exception."""

from pathlib import Path

import yaml
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from benchlay.elements import KINDS
from benchlay.layout import read_layout
from benchlay.layout.elements import Shared
from benchlay.layout.header import SECTIONS, Header
from benchlay.layout.reference import SECTIONS as TABLES

EVERY_KEY = (Path(__file__).parent / "every_key.yaml").read_text(encoding="utf-8")
KEYS = sorted(
    {k.name for cls in (*(c for _, c in TABLES), *KINDS.values()) for k in cls.KEYS.values()}
    | set(SECTIONS)
)
WORDS = [
    "green",
    "M1",
    "M1.reflected",
    "east.port",
    "left 90",
    "532",
    "1 mW",
    "5 mm",
    "yes",
    "none",
    "-3",
    "1e400",
    "",
    "OD 2",
    "mirror",
    "é",
    "1:5",
    "~",
]
scalars = st.sampled_from(WORDS) | st.text(max_size=8) | st.integers(-5, 2000).map(str)
trees = st.recursive(
    scalars,
    lambda inner: (
        st.lists(inner, max_size=4)
        | st.dictionaries(st.sampled_from(KEYS) | scalars, inner, max_size=5)
    ),
    max_leaves=20,
)
quiet = settings(max_examples=60, deadline=None, suppress_health_check=[HealthCheck.too_slow])


def ends_well(text):
    source, problems = read_layout(text, "fuzz.yaml")
    assert (source is None) == bool(problems)
    for problem in problems.sorted():
        assert problem.span.line >= 1
        assert problem.message
        assert problem.expected
        assert problem.remedy


@quiet
@given(
    st.dictionaries(
        st.sampled_from([*SECTIONS, *(k.name for k in Header.KEYS.values())]), trees, max_size=5
    )
)
def test_trees_under_the_keys_of_a_layout(tree):
    ends_well(yaml.safe_dump(tree, allow_unicode=True))


@quiet
@given(
    st.sampled_from(sorted(KINDS)),
    st.dictionaries(
        st.sampled_from(sorted({k.name for k in Shared.KEYS.values()} | set(KEYS))),
        trees,
        max_size=8,
    ),
)
def test_trees_under_the_keys_of_an_element(kind, tree):
    layout = {"bench": {"size": ["9", "9"]}, "elements": {"M1": {**tree, "kind": kind}}}
    ends_well(yaml.safe_dump(layout, allow_unicode=True))


@quiet
@given(st.data())
def test_a_good_layout_with_one_value_exchanged(data):
    tree = yaml.load(EVERY_KEY, yaml.BaseLoader)
    node, path = tree, []
    while isinstance(node, (dict, list)) and node and (len(path) < 2 or data.draw(st.booleans())):
        keys = sorted(node) if isinstance(node, dict) else range(len(node))
        path.append((node, data.draw(st.sampled_from(list(keys)))))
        node = path[-1][0][path[-1][1]]
    holder, key = path[-1]
    holder[key] = data.draw(trees)
    ends_well(yaml.safe_dump(tree, allow_unicode=True))


@quiet
@given(st.data())
def test_a_good_layout_with_a_piece_cut_out(data):
    start = data.draw(st.integers(0, len(EVERY_KEY)))
    ends_well(EVERY_KEY[:start] + EVERY_KEY[start + data.draw(st.integers(0, 200)) :])
