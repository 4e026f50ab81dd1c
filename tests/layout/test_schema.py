"""The schema takes what reading takes, and refuses what it can tell to be wrong."""

import json
import re
from pathlib import Path

import jsonschema
import pytest
import yaml

from benchlay.elements import KINDS
from benchlay.layout.schema import schema

SCHEMA = schema()
EVERY_KEY = (Path(__file__).parent / "every_key.yaml").read_text(encoding="utf-8")
SOURCE = "{wavelength: 532, power: 1 W, beam: {waist_radius: 1}, at: [1, 1], heading: 0}"


class _Loader(yaml.SafeLoader):
    """YAML 1.2 as editors read it for schemas: `1:5` and dates are text."""


_Loader.yaml_implicit_resolvers = {}
for _tag, _form, _first in (
    ("bool", "true|false|yes|no", "tfyn"),
    ("int", "[-+]?[0-9]+", "-+0123456789"),
    ("float", r"[-+]?(\.[0-9]+|[0-9]+(\.[0-9]*)?)([eE][-+]?[0-9]+)?", "-+.0123456789"),
):
    _Loader.add_implicit_resolver(
        f"tag:yaml.org,2002:{_tag}", re.compile(f"^(?:{_form})$"), list(_first)
    )


@pytest.fixture(scope="module")
def validator():
    jsonschema.Draft202012Validator.check_schema(SCHEMA)
    return jsonschema.Draft202012Validator(SCHEMA)


def errors(validator, text):
    data = yaml.load(text, _Loader)
    return ["/".join(map(str, error.path)) for error in validator.iter_errors(data)]


def test_the_layout_with_every_key_is_valid(validator):
    assert errors(validator, EVERY_KEY) == []


@pytest.mark.parametrize(
    ("text", "where"),
    [
        ("{}", [""]),
        ("bench: {size: [9, 9]}\nelement: {}", [""]),
        ("bench: {size: [9, -9]}", ["bench/size/1"]),
        (f"bench: {{size: [9, 9]}}\nsources: {{a b: {SOURCE}}}", ["sources"]),
        ("bench: {size: [9, 9]}\nsources: {a: {power: 1 W}}", ["sources/a"]),
        ("bench: {size: [9, 9]}\nelements: {a: {kind: miror}}", ["elements/a/kind"]),
        ("bench: {size: [9, 9]}\nelements: {a: {kind: dump, bore: 3}}", ["elements/a"]),
        ("bench: {size: [9, 9]}\nelements: {a: {kind: dump, out: 3}}", ["elements/a/out"]),
        ("bench: {size: [9, 9]}\nroutes: {a: [b]}", ["routes/a"]),
        ("bench: {size: [9, 9]}\nstates: {s: {bench.size: 3}}", ["states/s"]),
        ("bench: {size: [9, 9]}\nenclosure: {panels: {p: {from: [0, 0]}}}", ["enclosure/panels/p"]),
    ],
)
def test_mistakes_are_refused_where_they_are(validator, text, where):
    assert errors(validator, text) == where


def test_every_kind_has_its_schema_and_text_is_stable():
    assert {f"kind-{name}" for name in KINDS} < set(SCHEMA["$defs"])
    assert json.dumps(schema()) == json.dumps(SCHEMA)
