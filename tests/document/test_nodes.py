"""YAML to nodes: places, refusals in full, and hostile files."""

import time

import pytest
import yaml
from hypothesis import given
from hypothesis import strategies as st

from benchlay.document import yaml_text
from benchlay.document.nodes import (
    Broken,
    Mapping,
    PathError,
    Scalar,
    Sequence,
    describe,
    parse,
    parse_bytes,
    replace_at,
)
from benchlay.document.problems import Problems
from benchlay.document.span import Span


@pytest.fixture(params=["C", "Python"])
def loader(request, monkeypatch):
    """Run with both parsers: messages must not depend on how PyYAML was built."""
    if request.param == "Python":
        monkeypatch.setattr(yaml_text, "_LOADER", yaml.SafeLoader)
    return request.param


def read(text):
    problems = Problems()
    function = parse_bytes if isinstance(text, bytes) else parse
    return function(text, "x.yaml", problems), problems.sorted()


def plain(node):
    """Strip a tree of its places."""
    if isinstance(node, Mapping):
        return {key.text: plain(value) for key, value in node.pairs}
    if isinstance(node, Sequence):
        return [plain(item) for item in node.items]
    return node.text if isinstance(node, Scalar) else None


@pytest.mark.usefixtures("loader")
def test_everything_keeps_its_place():
    text = "titel: é, x\nlist: [1:5, 010]\nin:\n  - a: no\n    b: 'yes'\n"
    node, problems = read(text)
    assert problems == []
    assert plain(node) == {
        "titel": "é, x",
        "list": ["1:5", "010"],
        "in": [{"a": "no", "b": "yes"}],
    }
    assert node.span == Span("x.yaml", 1, 1)
    assert node.span_of_key("list") == Span("x.yaml", 2, 1)
    assert node.get("list").items[1].span == Span("x.yaml", 2, 13)
    inner = node.get("in").items[0]
    assert inner.get("b").span == Span("x.yaml", 5, 8)
    assert [inner.get(k).quoted for k in "ab"] == [False, True]
    assert list(inner.names()) == ["a", "b"]
    assert node.get("nothing") is None
    assert node.span_of_key("nothing") is None


@pytest.mark.usefixtures("loader")
def test_columns_count_characters_not_bytes():
    node, _ = read("\ufeffé: ü\n")
    assert node.span_of_key("é") == Span("x.yaml", 1, 1)
    assert node.get("é").span == Span("x.yaml", 1, 4)


ANCHOR = ("values without anchors: each is written where it belongs",)
SHARE = "share keys between elements with 'parts'"
INDENT = (
    "this does not fit into the table around it",
    "keys of one table indented alike, or a comma between keys in braces",
    "indent the line like the other keys, or close the bracket or quote before it",
)
SECOND_COLON = (
    "a second ': ' stands where a value is read already",
    "one 'key: value' a line",
    "begin a new line, or put the value in quotes",
)
UNSEEN = "characters that can be seen, spaces and line ends"
BEGINNING = (
    "a value cannot begin with this character",
    "a value, or text in quotes",
    "put the value in quotes",
)
EMPTY = (
    1,
    1,
    "the file is empty",
    "a table of keys",
    "write the layout into it; 'benchlay explain layout' says what there may be",
)

# text, what is read all the same, and the problems in full
REFUSED = {
    "anchor": (
        "a: &x 1\n",
        {"a": "1"},
        [
            (
                1,
                4,
                "the anchor '&x' stands before this value",
                "values without anchors: each is written where it belongs",
                f"remove the anchor; {SHARE}",
            )
        ],
    ),
    "alias": (
        "a: *x\nb: 2\n",
        {"a": None, "b": "2"},
        [
            (
                1,
                4,
                "the alias '*x' stands for something written elsewhere",
                "values written where they belong",
                f"write the value out here; {SHARE}",
            )
        ],
    ),
    "merge": (
        "a: 1\n<<: {b: 2}\n",
        {"a": "1"},
        [
            (
                2,
                1,
                "the merge key '<<' stands here",
                "keys written where they belong",
                f"write the keys out here; {SHARE}",
            )
        ],
    ),
    "tag": (
        "a: !!int 1\n",
        {"a": "1"},
        [
            (
                1,
                4,
                "the tag '!!int' stands before this value",
                "values without tags: the key decides how a value is read",
                "remove the tag",
            )
        ],
    ),
    "key twice": (
        "a: 1\nb: 2\na: 3\n",
        {"a": "1", "b": "2"},
        [
            (
                3,
                1,
                "the key 'a' is written twice; first in line 1, column 1",
                "each key once in a table",
                "remove one of the two",
            )
        ],
    ),
    "list as key": (
        "? [a]\n: 1\nb: 2\n",
        {"b": "2"},
        [
            (
                1,
                3,
                "a list or table stands where a key is expected",
                "a word as key",
                "write 'key: value'; put text that starts with a bracket in quotes",
            )
        ],
    ),
    "two documents": (
        "a: 1\n---\nb: 1\n",
        None,
        [
            (
                2,
                1,
                "a second document begins here",
                "one document in a file",
                "remove the line '---', or move what follows to a file of its own",
            )
        ],
    ),
    "tab": (
        "a:\n\tb: 1\n",
        None,
        [
            (
                2,
                1,
                "this line is indented with a tab",
                "indentation by spaces",
                "replace each tab at the start of the line by spaces",
            )
        ],
    ),
    "NUL": (
        "a: \x00b\n",
        {"a": "\ufffdb"},
        [(1, 4, "the character U+0000 cannot be seen", UNSEEN, "delete it")],
    ),
    "direction mark": (
        "a: 1\r\nb: \u202e2\n",
        {"a": "1", "b": "\ufffd2"},
        [(2, 4, "the character U+202E cannot be seen", UNSEEN, "delete it")],
    ),
    "surrogate": (
        "a: \ud800\n",
        {"a": "\ufffd"},
        [(1, 4, "the character U+D800 cannot be seen", UNSEEN, "delete it")],
    ),
    "escaped direction mark": (
        'a: "\\u202e"\n',
        {"a": None},
        [
            (
                1,
                4,
                "this text holds the character U+202E, which cannot be seen",
                UNSEEN,
                "remove the escape that stands for it",
            )
        ],
    ),
    "bytes": (
        b"a: 1\nb: \xff\n",
        None,
        [
            (
                2,
                4,
                "byte 0xff is not part of any UTF-8 character",
                "a text file in UTF-8",
                "save the file as UTF-8 in your editor",
            )
        ],
    ),
    "long text": (
        f"a: {'x' * 1_000_000}\nb: 1\n",
        {"a": None, "b": "1"},
        [
            (
                1,
                4,
                "this text is 1000000 characters long",
                "at most 10000 characters",
                "shorten it, or check that a closing quote is not missing",
            )
        ],
    ),
    "long file": (
        "x" * 4_000_001,
        None,
        [
            (
                1,
                1,
                "the file is 4000001 characters long",
                "at most 4000000 characters",
                "check that this is a layout; move shared parts to files of their own",
            )
        ],
    ),
    "empty": ("", None, [EMPTY]),
    "only a comment": ("# nothing\n", None, [EMPTY]),
    "second colon": ("a: b: c\n", None, [(1, 5, *SECOND_COLON)]),
    "indented too far": ("a: 1\n b: 2\n", None, [(2, 3, *SECOND_COLON)]),
    "item beside key": ("a: 1\n- b\n", None, [(2, 1, *INDENT)]),
    "beginning": ("a: @x\n", None, [(1, 4, *BEGINNING)]),
    "open list": (
        "a: [1, 2\n",
        None,
        [
            (
                2,
                1,
                "a list in brackets is not closed or lacks a comma; it begins in line 1, column 4",
                "[item, item]",
                "add the missing ',' or ']' at or before this place",
            )
        ],
    ),
    "open table": (
        "a: {b: 1\n",
        None,
        [
            (
                2,
                1,
                "a table in braces is not closed or lacks a comma; it begins in line 1, column 4",
                "{key: value, key: value}",
                "add the missing ',' or '}' at or before this place",
            )
        ],
    ),
    "open quote": (
        "a: 'x\n",
        None,
        [
            (
                2,
                1,
                "a quote is opened and never closed; it begins in line 1, column 4",
                "text between two quotes of one kind",
                "add the closing quote",
            )
        ],
    ),
    "bracket too many": (
        "a: [1, ]]\n",
        None,
        [
            (
                1,
                9,
                "this does not fit into the table around it",
                INDENT[1],
                INDENT[2],
            )
        ],
    ),
    "nothing between commas": (
        "a: [1,,2]\n",
        None,
        [
            (
                1,
                7,
                "a value is missing here, or a bracket closes what is not open",
                "a value",
                "remove the comma or bracket that is too many, or put the text in quotes",
            )
        ],
    ),
    "star": (
        "a: *\n",
        None,
        [
            (
                1,
                5,
                "a value cannot begin with '*' or '&'",
                "a value, or text in quotes",
                "put the value in quotes",
            )
        ],
    ),
}


@pytest.mark.usefixtures("loader")
@pytest.mark.parametrize("case", REFUSED)
def test_refuses(case):
    text, left, problems = REFUSED[case]
    node, found = read(text)
    assert [(p.span.line, p.span.column, *p[1:]) for p in found] == problems
    assert plain(node) == left


def test_errors_without_own_words_keep_the_parsers():
    _, (problem,) = read("%FOO 1\n---\na: 1\n")
    assert problem.message.startswith("this is not YAML: ")
    assert problem[2:] == ("YAML", "correct the line, or put the text in quotes")


DEEP = (
    "values are nested more than 50 deep",
    "at most 50 lists and tables inside one another",
    "check the brackets before this place",
)
BILLION = "a: &a [x, x]\n" + "".join(
    f"{name}: &{name} [*{before}, *{before}]\n"
    for before, name in zip("abcdefghijklmnopqrs", "bcdefghijklmnopqrst", strict=True)
)


@pytest.mark.parametrize(
    "text",
    ["[" * 100_000, "{a: " * 100_000, "- " * 100_000],
    ids=["lists", "tables", "items"],
)
def test_deep_nesting_is_refused_at_once(text):
    start = time.perf_counter()
    node, (problem,) = read(text)
    assert time.perf_counter() - start < 1.0
    assert node is None
    assert problem[1:] == DEEP


def test_fifty_deep_is_read():
    node, problems = read("[" * 50 + "]" * 50)
    assert problems == []
    assert isinstance(node, Sequence)
    assert read("[" * 51 + "]" * 51)[1][0].span == Span("x.yaml", 1, 51)


def test_billion_laughs_are_not_laughed():
    start = time.perf_counter()
    node, problems = read(BILLION)
    assert time.perf_counter() - start < 1.0
    assert len(problems) == 20 + 38
    assert isinstance(node.get("t").items[0], Broken)


def test_too_many_values():
    node, (problem,) = read("- a\n" * 200_001)
    assert node is None
    assert problem.span == Span("x.yaml", 200_000, 3)
    assert problem[1:] == (
        "the file holds more than 200000 values",
        "at most 200000 values",
        "check that this is a layout",
    )


@given(st.text(alphabet=st.characters(), max_size=60))
def test_any_text_gives_a_tree_or_problems(text):
    node, problems = read(text)
    assert node is not None or problems


@given(st.binary(max_size=60))
def test_any_bytes_give_a_tree_or_problems(data):
    node, problems = read(data)
    assert node is not None or problems


words = st.text(alphabet="abcXYZ019 _-é'\"#:{}[],", max_size=12)
trees = st.recursive(
    words,
    lambda inner: st.lists(inner, max_size=3) | st.dictionaries(words, inner, max_size=3),
    max_leaves=12,
)


@given(trees)
def test_what_yaml_writes_is_read_back_as_text(tree):
    if tree == "":
        return
    node, problems = read(yaml.safe_dump(tree, default_style="'", allow_unicode=True))
    assert problems == []
    assert plain(node) == tree


def test_replace_at_shares_the_rest():
    node, _ = read("a: {b: 1, c: 2}\nd: [3]\n")
    new = Scalar("9", Span("x.yaml", 7, 7))
    changed = replace_at(node, ("a", "b"), new)
    assert plain(changed) == {"a": {"b": "9", "c": "2"}, "d": ["3"]}
    assert plain(node) == {"a": {"b": "1", "c": "2"}, "d": ["3"]}
    assert changed.get("d") is node.get("d")
    assert changed.get("a").get("c") is node.get("a").get("c")
    assert changed.get("a").get("b") is new
    assert changed.get("a").span_of_key("b") == Span("x.yaml", 1, 5)
    assert replace_at(node, (), new) is new


def test_replace_at_makes_missing_tables():
    node, _ = read("a: 1\n")
    new = Scalar("9", Span("x.yaml", 7, 7))
    changed = replace_at(node, ("m", "w"), new)
    assert plain(changed) == {"a": "1", "m": {"w": "9"}}
    assert changed.span_of_key("m") == new.span


def test_replace_at_does_not_go_through_text():
    node, _ = read("a: {b: 1}\n")
    with pytest.raises(PathError) as caught:
        replace_at(node, ("a", "b", "c"), Scalar("9", node.span))
    assert caught.value.depth == 2
    assert describe(caught.value.node) == "'1'"


@pytest.mark.parametrize(
    ("text", "words"),
    [
        ("a", "'a'"),
        ("''", "''"),
        ("~", "'~'"),
        ("[1, 2]", "a list of 2"),
        ("{}", "an empty table"),
        ("{a: 1, b: 2}", "a table with 'a' and 'b'"),
    ],
)
def test_describe(text, words):
    assert describe(read(text)[0]) == words


def test_describe_nothing():
    assert describe(read("a:\n")[0].get("a")) == "nothing"
