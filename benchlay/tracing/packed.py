"""Tables packed into two arrays, whole and real numbers: one row a quantity, a column a beam.

Packing makes taking and joining beams two array operations whatever is known of a beam,
which decides the speed of small batches. Quantities are read by name, as views.
"""

from __future__ import annotations

from typing import Self

import numpy as np
from numpy.typing import ArrayLike

from benchlay.scene.tables import Flags, Floats, Ints


class Packed:
    """N beams; the quantities are class attributes that say which rows they are."""

    __slots__ = ("floats", "ints")

    def __init__(self, ints: Ints, floats: Floats) -> None:
        self.ints = ints
        self.floats = floats

    @classmethod
    def joined(cls, parts: list[Self]) -> Self:
        """Return several sets of beams as one."""
        if len(parts) == 1:
            return parts[0]
        return cls(
            np.concatenate([part.ints for part in parts], axis=1),
            np.concatenate([part.floats for part in parts], axis=1),
        )

    def take(self, rows: Ints | Flags | slice) -> Self:
        """Return some of the beams; of neighbouring ones (a slice) a view."""
        if isinstance(rows, slice):
            return type(self)(self.ints[:, rows], self.floats[:, rows])
        # `take` is several times quicker than an index, but counts where an index chooses.
        numbers = rows.nonzero()[0] if rows.dtype == np.bool_ else rows
        return type(self)(self.ints.take(numbers, 1), self.floats.take(numbers, 1))

    def set(self, **columns: ArrayLike) -> None:
        """Overwrite quantities of beams that nobody else holds."""
        for name, value in columns.items():
            vars(type(self))[name].put(self, value)

    def __len__(self) -> int:
        """Count the beams."""
        return int(self.ints.shape[1])


class IntColumn:
    """One whole number a beam, (N,)."""

    def __init__(self, row: int) -> None:
        self._row = row

    def __get__(self, table: Packed, owner: object) -> Ints:
        """Return the row."""
        row: Ints = table.ints[self._row]
        return row

    def put(self, table: Packed, value: ArrayLike) -> None:
        """Overwrite the row."""
        table.ints[self._row] = value


class FlagColumn:
    """Yes or no for each beam, (N,), kept as 1 or 0."""

    def __init__(self, row: int) -> None:
        self._row = row

    def __get__(self, table: Packed, owner: object) -> Flags:
        """Return which beams have it."""
        flags: Flags = table.ints[self._row] > 0
        return flags

    def put(self, table: Packed, value: ArrayLike) -> None:
        """Overwrite the row."""
        table.ints[self._row] = value


class FloatColumn:
    """One real number a beam, (N,); with a count several, (count, N)."""

    def __init__(self, row: int, count: int | None = None) -> None:
        self._rows = row if count is None else slice(row, row + count)

    def __get__(self, table: Packed, owner: object) -> Floats:
        """Return the row or rows."""
        rows: Floats = table.floats[self._rows]
        return rows

    def put(self, table: Packed, value: ArrayLike) -> None:
        """Overwrite the row or rows."""
        table.floats[self._rows] = value


class VectorColumn:
    """A vector in space a beam, (N, 3)."""

    def __init__(self, row: int) -> None:
        self._rows = slice(row, row + 3)

    def __get__(self, table: Packed, owner: object) -> Floats:
        """Return the vectors."""
        vectors: Floats = table.floats[self._rows].T
        return vectors

    def put(self, table: Packed, value: ArrayLike) -> None:
        """Overwrite the vectors."""
        table.floats[self._rows] = np.asarray(value).T
