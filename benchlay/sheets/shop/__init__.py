"""Sheets for the workshop: what is cut, drilled, set out and fetched from the store."""
