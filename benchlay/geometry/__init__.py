"""Outlines and solids as plain data: what bodies and faces are made of."""
