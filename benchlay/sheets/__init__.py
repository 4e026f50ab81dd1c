"""Sheets as plain data, and what goes on each kind of sheet."""
