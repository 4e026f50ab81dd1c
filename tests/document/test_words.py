"""Words in messages."""

import time

from benchlay.document.problems import format_choices, nearest
from benchlay.document.words import quote


def test_choices_read_as_a_sentence():
    assert format_choices([]) == ""
    assert format_choices(["a"]) == "'a'"
    assert format_choices(["a", "b"]) == "'a' or 'b'"
    assert format_choices(["a", "b", "c"], "and") == "'a', 'b' and 'c'"
    many = [f"k{n}" for n in range(43)]
    assert format_choices(many).endswith("'k38', 'k39' and 3 more")


def test_nearest_finds_slips_and_nothing_else():
    kinds = ["mirror", "lens", "window", "waveplate", "dump"]
    assert nearest("miror", kinds) == "mirror"
    assert nearest("Mirror", kinds) == "mirror"
    assert nearest("mirrro", kinds) == "mirror"  # neighbours swapped count once
    assert nearest("lnes", kinds) == "lens"
    assert nearest("wavepalte", kinds) == "waveplate"
    assert nearest("prism", kinds) is None
    assert nearest("", kinds) is None
    assert nearest("M2", ["M1", "M3"]) == "M1"  # of equals the first
    assert nearest("ab", ["xy"]) is None
    assert nearest("s", ["T", "r"]) is None  # one letter for another is no slip
    assert nearest("s", ["T", "S"]) == "S"


def test_nearest_is_cheap_on_long_words():
    start = time.perf_counter()
    assert nearest("x" * 100_000, ["mirror"] * 1000) is None
    assert time.perf_counter() - start < 0.5


def test_quote_shortens_and_shows_what_cannot_be_printed():
    assert quote("M1") == "'M1'"
    assert quote("a\nb\x1b") == "'a\\nb\\x1b'"
    assert quote("x" * 100) == f"'{'x' * 59}…'"
