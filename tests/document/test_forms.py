"""Forms: values read, shapes told apart, every message in full."""

import math
from enum import Enum

import pytest

from benchlay.document.forms import (
    Choice,
    ChoiceOf,
    Date,
    Deferred,
    Dimension,
    Fixed,
    ListOf,
    Name,
    OneOf,
    Pair,
    Quantity,
    Reader,
    Table,
    Text,
    Whole,
    Words,
    YesNo,
)
from benchlay.document.nodes import parse
from benchlay.document.problems import Problems
from benchlay.document.span import Span


class Side(Enum):
    LEFT = "left"
    RIGHT = "right"


LENGTH = Quantity(Dimension.LENGTH)
SHARE = Quantity(Dimension.RATIO, at_least=0, at_most=1)
THICKNESS = Quantity(Dimension.LENGTH, above=0, at_most=5)
YAW = Quantity(Dimension.ANGLE, at_least=-math.pi / 2, below=math.pi / 2)
PLACE = OneOf(Fixed(LENGTH, 2), Fixed(LENGTH, 3))
BODY = OneOf(Words({"none": None}), Quantity(Dimension.LENGTH, above=0))


def read(form, text):
    problems = Problems()
    reader = Reader(problems)
    node = parse(f"k: {text}\n", "x.yaml", problems).get("k")
    value = form.read(node, reader)
    return value, [(p.span.column, *p[1:]) for p in problems.sorted()]


@pytest.mark.parametrize(
    ("form", "text", "value"),
    [
        (LENGTH, "1 in", 25.4),
        (THICKNESS, "5", 5.0),
        (YAW, "-90", -math.pi / 2),
        (Whole(1, 12), "012", 12),
        (YesNo(), "yes", True),
        (YesNo(), "Off", False),
        (YesNo(), "TRUE", True),
        (YesNo(), "no", False),
        (Text(), " 'two words ' ", "two words"),
        (Text(lines=True), '"a\\nb"', "a\nb"),
        (Text(pattern="[A-Z]+"), "ABC", "ABC"),
        (Name(), "M1-a_b", "M1-a_b"),
        (Name(), "x" * 64, "x" * 64),
        (Name(), "com10", "com10"),
        (Choice("a", "b"), "b", "b"),
        (ChoiceOf(Side), "right", Side.RIGHT),
        (Pair(LENGTH), "[1, 2 in]", (1.0, 50.8)),
        (Fixed(Whole(0, 9), 3), "[1, 2, 3]", (1, 2, 3)),
        (ListOf(Name()), "[a, b]", ("a", "b")),
        (ListOf(Name()), "[]", ()),
        (Date(), "2028-02-29", "2028-02-29"),
        (Date(), "2027-06-30", "2027-06-30"),
        (Date(), "2000-02-29", "2000-02-29"),
        (Date(), "2027-07-31", "2027-07-31"),
        (Date(), "2027-08-31", "2027-08-31"),
        (PLACE, "[1, 2]", (1.0, 2.0)),
        (PLACE, "[1, 2, 3]", (1.0, 2.0, 3.0)),
        (BODY, "none", None),
        (BODY, "5", 5.0),
        (Table(LENGTH), "{a: 1, b: 2}", {"a": 1.0, "b": 2.0}),
        (Table(BODY), "{a: none}", {"a": None}),
        (ListOf(BODY), "[none, 1]", (None, 1.0)),
    ],
)
def test_reads(form, text, value):
    assert read(form, text) == (value, [])


A_LENGTH = "a length in mm or with its unit (nm um mm m cm in ft)"
A_THICKNESS = (
    "a length above 0 mm and of at most 5 mm, in mm or with its unit (nm um mm m cm in ft)"
)
A_YAW = (
    "an angle of at least -90 deg and below 90 deg, "
    "in deg or with its unit (deg ° arcmin arcsec mrad rad urad)"
)
A_SHARE = "a ratio of at least 0 and of at most 1, as '0.5', '50 %', '5 ppm' or 'OD 0.3'"
A_BODY = "'none'; or a length above 0 mm, in mm or with its unit (nm um mm m cm in ft)"
A_NAME = "a name of letters, digits, '-' and '_', a letter first, at most 64"
A_DATE = "a date as YYYY-MM-DD"
TWO = f"a list of 2, each {A_LENGTH}"

REFUSED = [
    (LENGTH, "", 3, "nothing is written", A_LENGTH, "write it in that form, such as '25'"),
    (
        LENGTH,
        "[1, 2]",
        4,
        "a list of 2 is not what is read here",
        A_LENGTH,
        "write it in that form, such as '25'",
    ),
    (LENGTH, "x", 4, "'x' is not a number", A_LENGTH, "write a length, such as '25'"),
    (THICKNESS, "x", 4, "'x' is not a number", A_THICKNESS, "write a length, such as '1'"),
    (
        THICKNESS,
        "0",
        4,
        "'0' is too small",
        A_THICKNESS,
        "write a value within the bounds, such as '1'",
    ),
    (
        THICKNESS,
        "1 in",
        4,
        "'1 in' is too large",
        A_THICKNESS,
        "write a value within the bounds, such as '1'",
    ),
    (
        YAW,
        "90",
        4,
        "'90' is too large",
        A_YAW,
        "write a value within the bounds, such as '30'",
    ),
    (
        Quantity(Dimension.LENGTH, at_least=3, at_most=7),
        "8",
        4,
        "'8' is too large",
        "a length of at least 3 mm and of at most 7 mm, "
        "in mm or with its unit (nm um mm m cm in ft)",
        "write a value within the bounds, such as '5 mm'",
    ),
    (
        Whole(1, 12),
        "13",
        4,
        "'13' is out of range",
        "a whole number from 1 to 12",
        "write a whole number from 1 to 12, such as '1'",
    ),
    (
        Whole(2, 12),
        "1.5",
        4,
        "'1.5' is not a whole number",
        "a whole number from 2 to 12",
        "write a whole number from 2 to 12, such as '2'",
    ),
    (
        YesNo(),
        "maybe",
        4,
        "'maybe' is not known here",
        "'yes' or 'no'",
        "write 'yes' or 'no'",
    ),
    (
        ChoiceOf(Side),
        "lft",
        4,
        "'lft' is not known here",
        "one of 'left' or 'right'",
        "write 'left'",
    ),
    (
        Text(5),
        "abcdefg",
        4,
        "this text is 7 characters long",
        "text on one line, at most 5 characters",
        "shorten it to 5 characters",
    ),
    (
        Text(),
        '"a\\nb"',
        4,
        "this text has more than one line",
        "text on one line, at most 200 characters",
        "write it on one line",
    ),
    (
        Text(8, "[0-9]+:[0-9]+", what="a scale", sample="1:5"),
        "1/5",
        4,
        "'1/5' is not a scale",
        "a scale on one line, at most 8 characters",
        "write a scale, such as '1:5'",
    ),
    (Name(), "M 1", 4, "'M 1' cannot be a name", A_NAME, "write 'M-1'"),
    (Name(), "1064", 4, "'1064' cannot be a name", A_NAME, "write 'N1064'"),
    (Name(), "BS1.a", 4, "'BS1.a' cannot be a name", A_NAME, "write 'BS1-a'"),
    (Name(), "'é'", 4, "'é' cannot be a name", A_NAME, "write a name, such as 'M1'"),
    (
        Name(),
        "Lpt1",
        4,
        "'Lpt1' is reserved by some systems and cannot be a file's name",
        A_NAME,
        "write another name, such as 'Lpt1-1'",
    ),
    (
        Name(),
        "x" * 65,
        4,
        f"'{'x' * 59}…' is too long for a name",
        A_NAME,
        "shorten it",
    ),
    (
        Date(),
        "30.6.2027",
        4,
        "'30.6.2027' is not a date",
        A_DATE,
        "write a date as YYYY-MM-DD, such as '2027-06-30'",
    ),
    (
        Date(),
        "2027-02-29",
        4,
        "'2027-02-29' is a day no calendar has",
        A_DATE,
        "write a date as YYYY-MM-DD, such as '2027-06-30'",
    ),
    (
        Pair(LENGTH),
        "[1]",
        4,
        "a list of 1 is not what is read here",
        TWO,
        "write it in that form, such as [25, 25]",
    ),
    (
        Pair(LENGTH),
        "[1, x]",
        8,
        "[2]: 'x' is not a number",
        A_LENGTH,
        "write a length, such as '25'",
    ),
    (
        ListOf(Name(), 2),
        "[a]",
        4,
        "a list of 1 is not what is read here",
        f"a list of at least 2, each item {A_NAME}",
        "write it in that form, such as [M1, M1]",
    ),
    (
        ListOf(Name(), 1, 3),
        "a",
        4,
        "'a' is not what is read here",
        f"a list of 1 to 3, each item {A_NAME}",
        "write it in that form, such as [M1]",
    ),
    (
        Table(LENGTH),
        "{a: 1, A: 2}",
        11,
        "'A' differs from 'a' only in capitals; that one stands in line 1, column 5",
        "names that differ in more than capitals",
        "give one of the two another name, such as 'A-2'",
    ),
    (
        Table(LENGTH),
        "3",
        4,
        "'3' is not what is read here",
        f"a table of names, each with {A_LENGTH}",
        "write it in that form, such as {NAME: 25}",
    ),
    (
        PLACE,
        "[1, 2, x]",
        11,
        "[3]: 'x' is not a number",
        A_LENGTH,
        "write a length, such as '25'",
    ),
    (
        PLACE,
        "[1]",
        4,
        "a list of 1 is not what is read here",
        f"{TWO}; or a list of 3, each {A_LENGTH}",
        "write it in that form, such as [25, 25]",
    ),
    (
        BODY,
        "non",
        4,
        "'non' is not what is read here",
        A_BODY,
        "write it in that form, such as 'none'",
    ),
    (
        BODY,
        "-5",
        4,
        "'-5' is too small",
        A_BODY,
        "write a value within the bounds, such as '25'",
    ),
    (BODY, "", 3, "nothing is written", A_BODY, "write it in that form, such as 'none'"),
    (
        BODY,
        "{a: 1}",
        4,
        "a table with 'a' is not what is read here",
        A_BODY,
        "write it in that form, such as 'none'",
    ),
]


@pytest.mark.parametrize("case", REFUSED, ids=lambda case: f"{case[1]!r}-{case[3]}")
def test_refuses(case):
    form, text, *problem = case
    assert read(form, text) == (None, [tuple(problem)])


def test_every_item_is_reported():
    _, found = read(ListOf(SHARE), "[1, 2, x, 50 %]")
    assert found == [
        (
            8,
            "[2]: '2' is too large",
            A_SHARE,
            "write a value within the bounds, such as '50 %'",
        ),
        (11, "[3]: 'x' is not a number", A_SHARE, "write a ratio, such as '50 %'"),
    ]


FORMS = [
    LENGTH,
    THICKNESS,
    YAW,
    SHARE,
    Quantity(Dimension.POWER, above=0),
    Quantity(Dimension.LENGTH, at_least=-9, at_most=-3),
    Quantity(Dimension.LENGTH, below=-3),
    Quantity(Dimension.LENGTH, above=1e6),
    Quantity(Dimension.ANGLE, above=0, below=1e-4),
    Whole(3, 5),
    YesNo(),
    Text(),
    Name(),
    Choice("a", "b"),
    ChoiceOf(Side),
    Pair(LENGTH),
    Fixed(SHARE, 4),
    ListOf(Name(), 2),
    Table(LENGTH),
    PLACE,
    BODY,
    Date(),
]


@pytest.mark.parametrize("form", FORMS, ids=lambda form: form.text())
def test_examples_clear_the_problem(form):
    _, found = read(form, form.example())
    assert found == []


def test_what_is_broken_is_reported_once():
    for form in FORMS:
        value, found = read(form, "*x")
        assert value is None
        assert [message for _, message, _, _ in found] == [
            "the alias '*x' stands for something written elsewhere"
        ]


def test_broken_item_fails_the_list_though_none_is_a_value():
    value, found = read(ListOf(BODY), "[none, *x]")
    assert value is None
    assert len(found) == 1


def test_table_keeps_order_and_places_and_cannot_be_changed():
    table, _ = read(Table(LENGTH), "{b: 1, a: 2}")
    assert list(table) == ["b", "a"]
    assert table.spans == {"b": Span("x.yaml", 1, 5), "a": Span("x.yaml", 1, 11)}
    with pytest.raises(TypeError):
        table["c"] = 1.0
    assert hash(table) == hash(read(Table(LENGTH), "{b: 1, a: 2}")[0])


def test_deferred_keeps_the_node():
    node, found = read(Deferred("a list of faults"), "[1, 2]")
    assert found == []
    assert len(node) == 2


def test_values_shown_as_written():
    assert THICKNESS.show(2.5) == "2.5 mm"
    assert YAW.show(math.radians(45)) == "45 deg"
    assert ChoiceOf(Side).show(Side.LEFT) == "left"
    assert YesNo().show(value=True) == "yes"
    assert PLACE.show((1.0, 2.0)) == "[1 mm, 2 mm]"
    assert BODY.show(None) == "none"
    assert Name().show(None) == "none"


@pytest.mark.parametrize(
    ("form", "schema"),
    [
        (
            YAW,
            {
                "anyOf": [
                    {"type": "number", "minimum": -90.0, "exclusiveMaximum": 90.0},
                    {"type": "string"},
                ]
            },
        ),
        (Quantity(Dimension.POWER), {"type": "string"}),
        (Whole(1, 3), {"type": "integer", "minimum": 1, "maximum": 3}),
        (YesNo(), {"enum": [True, False, "yes", "no", "on", "off"]}),
        (ChoiceOf(Side), {"enum": ["left", "right"]}),
        (Text(9, "a+"), {"type": "string", "maxLength": 9, "pattern": "^(?:a+)$"}),
        (Date(), {"type": "string", "format": "date"}),
        (Deferred("x"), {}),
        (
            Pair(Choice("a")),
            {"type": "array", "items": {"enum": ["a"]}, "minItems": 2, "maxItems": 2},
        ),
        (
            ListOf(Choice("a"), 1, 3),
            {"type": "array", "items": {"enum": ["a"]}, "minItems": 1, "maxItems": 3},
        ),
        (OneOf(Choice("a"), Choice("b")), {"anyOf": [{"enum": ["a"]}, {"enum": ["b"]}]}),
        (
            Table(Choice("a")),
            {
                "type": "object",
                "propertyNames": {
                    "type": "string",
                    "pattern": "^[A-Za-z][A-Za-z0-9_-]*$",
                    "maxLength": 64,
                },
                "additionalProperties": {"enum": ["a"]},
            },
        ),
    ],
)
def test_schemas(form, schema):
    assert form.schema() == schema
