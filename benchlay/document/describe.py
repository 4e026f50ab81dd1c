"""Schema and reference of a record class, made from the same keys that read it."""

from __future__ import annotations

from collections.abc import Collection
from typing import Any

from benchlay.document.keys import Key, Keyed


def schema_of(cls: type[Keyed], *, extra: Collection[str] = ()) -> dict[str, Any]:
    """Return the JSON Schema (draft 2020-12) of a record's table.

    Parameters
    ----------
    cls : type of Keyed
        Says the keys.
    extra : collection of str
        Keys read elsewhere; anything is allowed under them.
    """
    properties = {spec.name: _property(spec) for spec in cls.KEYS.values()}
    properties |= {name: {} for name in extra}
    found: dict[str, Any] = {
        "type": "object",
        "properties": properties,
        "additionalProperties": False,
    }
    needed = [spec.name for spec in cls.KEYS.values() if spec.required]
    if needed:
        found["required"] = needed
    return found


def reference_text(cls: type[Keyed]) -> str:
    """Return a Markdown table of a record's keys: name, what to write, default, meaning."""
    lines = ["| key | to write | default | meaning |", "|---|---|---|---|"]
    for spec in cls.KEYS.values():
        meaning = spec.meaning
        if spec.not_yet is not None:
            meaning = f"{meaning.rstrip('.')}. Not yet: {spec.not_yet}."
        cells = (f"`{spec.name}`", spec.form.text(), _default(spec), meaning)
        lines.append("| " + " | ".join(c.replace("|", "\\|") for c in cells) + " |")
    return "\n".join(lines) + "\n"


def _property(spec: Key) -> dict[str, Any]:
    description = spec.meaning
    if not spec.required:
        description = f"{description.rstrip('.')}. Default: {_default(spec)}."
    return {**spec.form.schema(), "description": description}


def _default(spec: Key) -> str:
    return "required" if spec.required else spec.form.show(spec.default)
