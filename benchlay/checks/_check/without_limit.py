"""What checks of hazard say of light for which no limit could be computed."""

from __future__ import annotations

from collections.abc import Iterator

from benchlay.checks._check.context import Context
from benchlay.checks._check.protocol import Unevaluated
from benchlay.checks._check.words import wavelength_text


def unjudged(context: Context, variant: int) -> Iterator[Unevaluated]:
    """Yield one entry a source and wavelength that has no accessible limit in a state."""
    for (source, nm), reason in context.unjudged(variant).items():
        yield Unevaluated(
            f"light of {wavelength_text(nm)} from '{source}' has no accessible limit ({reason})",
            "judge this light by the standard, with the laser safety officer",
            source,
            context.span_of(source, variant),
        )
