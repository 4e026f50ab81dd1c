"""The drawings of a checked layout, each in its formats, as files' bytes."""

from __future__ import annotations

from datetime import date

from benchlay.results.review import Checked


def drawings(
    checked: Checked, on: date | None, *, sheet: str | None = None, form: str | None = None
) -> dict[str, bytes]:
    """Return the sheets asked for (all for None) in the formats asked for, by file name."""
    return {}
