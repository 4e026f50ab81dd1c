"""From marked nodes to the typed layout: every key read, every reference checked.

One file for each part of the language holds its table of keys; reading, the JSON Schema
and the reference text are made from these tables.
"""

from __future__ import annotations

from benchlay.layout.layout import Layout, LayoutSource, read_layout
from benchlay.layout.names import AS_DRAWN

__all__ = ["AS_DRAWN", "Layout", "LayoutSource", "read_layout"]
