"""From a scene to beams: what light does, generation by generation."""

from __future__ import annotations

from benchlay.tracing.trace import Trace, trace

__all__ = ["Trace", "trace"]
