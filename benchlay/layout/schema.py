"""JSON Schema (draft 2020-12) of the whole language, made from the tables that read it.

The schema serves editors. It knows keys, forms and bounds; what only several keys together
can have wrong, units and references are told by reading alone.
"""

from __future__ import annotations

from typing import Any

from benchlay.document.describe import schema_of
from benchlay.document.texts import NAME_LENGTH, NAME_PATTERN
from benchlay.elements import KINDS
from benchlay.layout.elements import Shared
from benchlay.layout.enclosure import Enclosure
from benchlay.layout.header import Header
from benchlay.layout.routes import ITEMS, RouteKeys
from benchlay.layout.sources import SourceKeys
from benchlay.layout.states import ROOTS

DIALECT = "https://json-schema.org/draft/2020-12/schema"
_NAMES = {"type": "string", "pattern": f"^{NAME_PATTERN}$", "maxLength": NAME_LENGTH}


def schema() -> dict[str, Any]:
    """Return the schema of a layout."""
    found = schema_of(Header)
    found["properties"] |= {
        "sources": _table(schema_of(SourceKeys), "what emits, by name"),
        "elements": _table({"$ref": "#/$defs/element"}, "what stands on the bench, by name"),
        "routes": _table(_route(), "what beams are meant to do, by name"),
        "enclosure": schema_of(Enclosure) | {"description": "panels and lids"},
        "states": _table(_state(), "keys that are set otherwise, by name of state"),
    }
    kinds = {f"kind-{name}": _kind(name) for name in KINDS}
    return {
        "$schema": DIALECT,
        "title": "benchlay layout",
        **found,
        "$defs": {"element": _element(), "shared": schema_of(Shared), **kinds},
    }


def _table(entry: dict[str, Any], description: str) -> dict[str, Any]:
    return {
        "type": "object",
        "propertyNames": _NAMES,
        "additionalProperties": entry,
        "description": description,
    }


def _element() -> dict[str, Any]:
    """Choose the schema of an element by its kind, so that errors name its keys only."""
    by_kind = [
        {
            "if": {"properties": {"kind": {"const": name}}, "required": ["kind"]},
            "then": {"$ref": f"#/$defs/kind-{name}"},
        }
        for name in KINDS
    ]
    kind = {"enum": list(KINDS), "description": "what it is"}
    return {
        "type": "object",
        "properties": {"kind": kind},
        "required": ["kind"],
        "allOf": by_kind,
    }


def _kind(name: str) -> dict[str, Any]:
    own = schema_of(KINDS[name])
    shared = {
        key.name: {"$ref": f"#/$defs/shared/properties/{key.name}"} for key in Shared.KEYS.values()
    }
    both = {
        key: {"anyOf": [shared[key], form]}
        for key, form in own["properties"].items()
        if key in shared
    }
    properties = {"kind": {"const": name}, **shared, **own["properties"], **both, "part": {}}
    return {
        "type": "object",
        "properties": properties,
        "required": ["kind", *own.get("required", [])],
        "additionalProperties": False,
    }


def _route() -> dict[str, Any]:
    return {"anyOf": [ITEMS.schema(), schema_of(RouteKeys)]}


def _state() -> dict[str, Any]:
    roots = "|".join(ROOTS)
    return {
        "type": "object",
        "propertyNames": {"type": "string", "pattern": rf"^({roots})(\.[A-Za-z0-9_-]+)+$"},
    }
