"""From placed variants to arrays that the tracer can use."""

from __future__ import annotations

from benchlay.scene.compile import compile_scene
from benchlay.scene.tables import Scene

__all__ = ["Scene", "compile_scene"]
