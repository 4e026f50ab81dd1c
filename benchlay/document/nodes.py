"""Documents as nodes: the classes and the two ways to read them, under one name."""

from __future__ import annotations

from benchlay.document.tree import (
    Broken,
    Mapping,
    Node,
    PathError,
    Scalar,
    Sequence,
    describe,
    replace_at,
)
from benchlay.document.yaml_text import parse, parse_bytes

__all__ = [
    "Broken",
    "Mapping",
    "Node",
    "PathError",
    "Scalar",
    "Sequence",
    "describe",
    "parse",
    "parse_bytes",
    "replace_at",
]
