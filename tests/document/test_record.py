"""Records: one definition of keys gives constructor, reading, schema and reference."""

import pickle
import sys
import textwrap

import jsonschema
import pytest
from mypy import api

from benchlay.document.describe import reference_text, schema_of
from benchlay.document.forms import (
    Choice,
    Dimension,
    OneOf,
    Quantity,
    Reader,
    RecordForm,
    Text,
    Words,
)
from benchlay.document.nodes import parse
from benchlay.document.problems import Problems
from benchlay.document.record import Record, key, read_record
from benchlay.document.span import NOWHERE, Span

LENGTH = Quantity(Dimension.LENGTH, above=0)


class Part(Record):
    kind: str = key(Choice("mirror", "lens"), meaning="What it is.")
    width_mm: float = key(LENGTH, name="width", default=50.0, meaning="How wide.")


class Mirror(Part):
    glass: str | None = key(
        OneOf(Words({"none": None}), Text()), default="BK7", meaning="Its substrate."
    )
    width_mm: float = key(LENGTH, name="width", default=25.0, meaning="How wide.")
    hole_mm: float | None = key(
        LENGTH, name="hole", default=None, meaning="A bore.", not_yet="bores are solid"
    )
    clip_mm: float = key(
        LENGTH,
        name="clip",
        default=5.0,
        meaning="A clip.",
        not_yet="clips are left out",
        not_yet_is_note=True,
    )

    def after_read(self, reader):
        if self.kind == "lens" and self.glass is None:
            reader.complain(
                self.span_of("glass"),
                "a lens without glass",
                expected="a glass",
                remedy="name one",
            )


def read(text, cls=Mirror, **options):
    problems = Problems()
    reader = Reader(problems)
    record = read_record(cls, parse(text, "x.yaml", problems), reader, **options)
    found = [(p.span.line, p.span.column, *p[1:]) for p in problems.sorted()]
    return record, found, reader.not_yet


def test_reads_keys_and_defaults():
    record, found, _ = read("kind: mirror\nglass: none\n")
    assert found == []
    assert record == Mirror(kind="mirror", glass=None)
    assert (record.kind, record.width_mm, record.glass) == ("mirror", 25.0, None)
    assert record.written("glass")
    assert not record.written("width")
    assert record.span == Span("x.yaml", 1, 1)
    assert record.spans == {"kind": Span("x.yaml", 1, 7), "glass": Span("x.yaml", 2, 8)}
    assert record.span_of("glass") == Span("x.yaml", 2, 8)
    assert record.span_of("width") == record.span


def test_bases_come_first_and_keep_their_order():
    names = [spec.name for spec in Mirror.KEYS.values()]
    assert names == ["kind", "width", "glass", "hole", "clip"]
    assert Part.KEYS["width_mm"].default == 50.0


def test_all_problems_together():
    record, found, _ = read("widht: 3\nhole: 2\nwidth: -1\nturn: 3\n")
    assert record is None
    known = "the keys 'kind', 'width', 'glass', 'hole' or 'clip'"
    assert found == [
        (
            1,
            1,
            "'kind' is missing",
            "'kind' with one of 'mirror' or 'lens'",
            "add 'kind: mirror', with the value that is meant",
        ),
        (1, 1, "'widht' is not a key here", known, "write 'width', or remove the key"),
        (
            2,
            7,
            "hole: not yet: bores are solid",
            "a layout without 'hole' here",
            "remove 'hole'",
        ),
        (
            3,
            8,
            "width: '-1' is too small",
            "a length above 0 mm, in mm or with its unit (nm um mm m cm in ft)",
            "write a value within the bounds, such as '25'",
        ),
        (4, 1, "'turn' is not a key here", known, "remove the key"),
    ]


def test_not_a_table():
    record, found, _ = read("- a\n", Part)
    assert record is None
    assert found == [
        (
            1,
            1,
            "a list of 1 is not what is read here",
            "a table with the keys 'kind' and 'width'",
            "write it in that form, such as {kind: mirror}",
        )
    ]


def test_no_keys_at_all():
    class Nothing(Record):
        """Has none."""

    _, found, _ = read("a: 1\n", Nothing)
    assert found == [(1, 1, "'a' is not a key here", "no keys", "remove the key")]


def test_not_yet_as_a_note_keeps_the_value():
    record, found, notes = read("kind: mirror\nclip: 3\n")
    assert found == []
    assert record.clip_mm == 3.0
    assert notes == [(Span("x.yaml", 2, 7), "clip: not yet: clips are left out")]


def test_not_yet_is_silent_where_the_default_is_written():
    record, found, notes = read("kind: mirror\nclip: 5\n")
    assert (found, notes) == ([], [])
    assert record.written("clip")


def test_reader_can_note_all_that_is_not_yet():
    problems = Problems()
    reader = Reader(problems, not_yet_is_note=True)
    node = parse("kind: mirror\nhole: 3\n", "x.yaml", problems)
    assert read_record(Mirror, node, reader).hole_mm == 3.0
    assert reader.not_yet == [(Span("x.yaml", 2, 7), "hole: not yet: bores are solid")]
    assert not problems


def test_extra_keys_are_known_and_ignored_ones_are_not_told():
    record, found, _ = read("kind: mirror\nat: [1]\npart: x\n", extra=["at"], ignore=["part"])
    assert found == []
    assert record.written("at")
    _, found, _ = read("kind: mirror\nta: 1\n", Part, extra=["at"], ignore=["part"])
    assert found == [
        (
            2,
            1,
            "'ta' is not a key here",
            "the keys 'kind', 'width' or 'at'",
            "write 'at', or remove the key",
        )
    ]


def test_ignored_own_key_keeps_its_default():
    record, found, _ = read("kind: mirror\nwidth: nonsense\n", ignore=["width"])
    assert found == []
    assert record.width_mm == 25.0


def test_cross_key_rules_speak_only_when_all_keys_are_good():
    record, found, _ = read("kind: lens\nglass: none\n")
    assert record is None
    assert found == [(2, 8, "a lens without glass", "a glass", "name one")]
    _, found, _ = read("kind: lens\nglass: none\nwidth: x\n")
    assert [message for _, _, message, _, _ in found] == ["width: 'x' is not a number"]


def test_broken_value_is_not_reported_again():
    record, found, _ = read("kind: mirror\nwidth: *w\n")
    assert record is None
    assert [message for _, _, message, _, _ in found] == [
        "the alias '*w' stands for something written elsewhere"
    ]


def test_paths_name_the_way():
    class Bench(Record):
        part: Mirror = key(RecordForm(Mirror), meaning="One.")

    _, found, _ = read("part: {kind: mirror, width: 0}\n", Bench)
    assert [message for _, _, message, _, _ in found] == ["part.width: '0' is too small"]


class Quick(Record):
    power_W: float = key(Quantity(Dimension.POWER), name="power", meaning="Mean power.")


class Slow(Record):
    energy_J: float = key(Quantity(Dimension.ENERGY), name="energy", meaning="Energy.")
    rate_Hz: float = key(Quantity(Dimension.RATE), name="rate", meaning="Rate.")


class Emitter(Record):
    gives: Quick | Slow = key(OneOf(RecordForm(Quick), RecordForm(Slow)), meaning="x")


def test_of_two_records_the_one_that_knows_the_keys_speaks():
    record, found, _ = read("gives: {energy: 1 J, rate: 2 Hz}\n", Emitter)
    assert found == []
    assert record.gives == Slow(energy_J=1.0, rate_Hz=2.0)
    _, found, _ = read("gives: {power: 3}\n", Emitter)
    assert [(column, message) for _, column, message, _, _ in found] == [
        (16, "gives.power: '3' has no unit")
    ]
    _, found, _ = read("gives: {rate: 3}\n", Emitter)
    assert [(column, message) for _, column, message, _, _ in found] == [
        (8, "gives: 'energy' is missing"),
        (15, "gives.rate: '3' has no unit"),
    ]
    _, found, _ = read("gives: {colour: red}\n", Emitter)
    assert found == [
        (
            1,
            8,
            "gives: a table with 'colour' is not what is read here",
            "a table with the key 'power'; or a table with the keys 'energy' and 'rate'",
            "write it in that form, such as {power: 150 mW}",
        )
    ]


def test_constructor_refuses_what_the_class_does_not_say():
    with pytest.raises(TypeError, match="Mirror needs 'kind'"):
        Mirror()
    with pytest.raises(TypeError, match="Mirror has no 'colour'"):
        Mirror(kind="mirror", colour="red")
    with pytest.raises(TypeError, match="Twice has two keys of one name"):

        class Twice(Record):
            a: str = key(Text(), meaning="x")
            b: str = key(Text(), name="a", meaning="y")


def test_cannot_be_changed():
    mirror = Mirror(kind="mirror")
    with pytest.raises(AttributeError, match=r"cannot be changed; use replace\(kind=…\)"):
        mirror.kind = "lens"
    with pytest.raises(AttributeError, match="cannot be changed"):
        del mirror.kind


def test_replace_gives_a_changed_copy_with_the_same_places():
    mirror, _, _ = read("kind: mirror\n")
    wide = mirror.replace(width_mm=80.0)
    assert (mirror.width_mm, wide.width_mm) == (25.0, 80.0)
    assert wide.span == mirror.span
    assert wide.spans == mirror.spans
    assert type(wide) is Mirror


def test_equality_is_of_values_not_of_places():
    mirror, _, _ = read("kind: mirror\nwidth: 25\n")
    made = Mirror(kind="mirror")
    assert made.span == NOWHERE
    assert mirror == made
    assert hash(mirror) == hash(made)
    assert mirror != made.replace(width_mm=1.0)
    assert Part(kind="mirror", width_mm=25.0) != made
    assert made != "mirror"


def test_survives_pickling():
    mirror, _, _ = read("kind: mirror\nwidth: 30\n")
    again = pickle.loads(pickle.dumps(mirror))
    assert again == mirror
    assert again.spans == mirror.spans


def test_repr_shows_the_values():
    assert repr(Part(kind="lens")) == "Part(kind='lens', width_mm=50.0)"


def test_schema():
    assert schema_of(Mirror, extra=["at"]) == {
        "type": "object",
        "properties": {
            "kind": {"enum": ["mirror", "lens"], "description": "What it is."},
            "width": {
                "anyOf": [{"type": "number", "exclusiveMinimum": 0}, {"type": "string"}],
                "description": "How wide. Default: 25 mm.",
            },
            "glass": {
                "anyOf": [{"enum": ["none"]}, {"type": "string", "maxLength": 200}],
                "description": "Its substrate. Default: BK7.",
            },
            "hole": {
                "anyOf": [{"type": "number", "exclusiveMinimum": 0}, {"type": "string"}],
                "description": "A bore. Default: none.",
            },
            "clip": {
                "anyOf": [{"type": "number", "exclusiveMinimum": 0}, {"type": "string"}],
                "description": "A clip. Default: 5 mm.",
            },
            "at": {},
        },
        "additionalProperties": False,
        "required": ["kind"],
    }
    assert RecordForm(Part, extra=["at"]).schema() == schema_of(Part, extra=["at"])


def test_schema_is_a_valid_one():
    jsonschema.Draft202012Validator.check_schema(schema_of(Mirror))
    validator = jsonschema.Draft202012Validator(schema_of(Mirror))
    assert validator.is_valid({"kind": "mirror", "width": "1 in"})
    assert not validator.is_valid({"kind": "mirror", "widht": 3})


def test_reference():
    length = "a length above 0 mm, in mm or with its unit (nm um mm m cm in ft)"
    assert reference_text(Mirror) == textwrap.dedent(f"""\
        | key | to write | default | meaning |
        |---|---|---|---|
        | `kind` | one of 'mirror' or 'lens' | required | What it is. |
        | `width` | {length} | 25 mm | How wide. |
        | `glass` | 'none'; or text on one line, at most 200 characters | BK7 | Its substrate. |
        | `hole` | {length} | none | A bore. Not yet: bores are solid. |
        | `clip` | {length} | 5 mm | A clip. Not yet: clips are left out. |
        """)


TYPED = """
from benchlay.document.forms import Quantity, Dimension
from benchlay.document.record import Record, key
from benchlay.document.span import NOWHERE
class Part(Record):
    width_mm: float = key(Quantity(Dimension.LENGTH), name="width", meaning="x")
    depth_mm: float = key(Quantity(Dimension.LENGTH), default=1.0, meaning="y")

good = Part(width_mm=1.0, span=NOWHERE, spans={})
Part()
Part(width_mm="wide")
Part(width_mm=1.0, colour=2)
good.width_mm = 3.0
"""


def test_type_checker_knows_the_constructor(tmp_path):
    file = tmp_path / "typed.py"
    file.write_text(TYPED)
    out, _, _ = api.run(
        [
            "--strict",
            "--follow-imports=silent",
            f"--python-executable={sys.executable}",
            f"--cache-dir={tmp_path}",
            "--hide-error-context",
            "--no-error-summary",
            "--config-file=",
            str(file),
        ]
    )
    codes = [(line.split(":")[1], line.rpartition(" ")[2]) for line in out.splitlines()]
    assert codes == [
        ("10", "[call-arg]"),
        ("11", "[arg-type]"),
        ("12", "[call-arg]"),
        ("13", "[misc]"),
    ]
