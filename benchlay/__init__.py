"""Laser benches written down as text: placed, traced, checked and drawn.

The stages are functions, each from one value to the next::

    layout = benchlay.read("bench.yaml")
    placed = benchlay.place(layout)
    trace = benchlay.trace(placed)
    findings = benchlay.check(trace)
    files = benchlay.draw(trace)

They are loaded on first use, so that ``import benchlay`` alone costs next to nothing.
"""

from __future__ import annotations

from typing import TYPE_CHECKING, Any

if TYPE_CHECKING:
    from benchlay.stages import LayoutError, check, draw, place, read, trace

__version__ = "0.1.0"

__all__ = ["LayoutError", "__version__", "check", "draw", "place", "read", "trace"]


def __getattr__(name: str) -> Any:  # noqa: ANN401 - whatever the stages offer
    """Load a public name from the stages when it is asked for."""
    if name not in __all__:
        msg = f"module 'benchlay' has no attribute {name!r}"
        raise AttributeError(msg)
    from benchlay import stages

    return getattr(stages, name)


def __dir__() -> list[str]:
    """Name what can be had, loaded or not."""
    return sorted(__all__)
