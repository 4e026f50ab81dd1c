"""From the traced bench to what a sheet shows: the only room of the sheets that knows both."""

from __future__ import annotations

from benchlay.sheets.drafting.picture import plan_picture, title_fields

__all__ = ["plan_picture", "title_fields"]
