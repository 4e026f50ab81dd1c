"""The live beams of one batch, packed into two arrays: one row a quantity, a column a beam.

Packing makes taking and joining beams two array operations whatever is known of a beam,
which decides the speed of small batches. Quantities are read by name.
"""

from __future__ import annotations

import numpy as np

from benchlay.scene.tables import Flags, Floats, Ints

OUTSIDE = -1
EXIT = -1  # the "face" that a source's beam leaves

EVENTS = ("emitted", "reflected", "transmitted", "diffracted", "converted", "scattered", "spilled")
EMITTED, REFLECTED, TRANSMITTED, DIFFRACTED, CONVERTED, SCATTERED, SPILLED = range(7)

_INTS = (
    "variant",
    "source",
    "wave",
    "parent",
    "node",
    "splits",
    "event",
    "face",
    "body",
    "owner",
    "within",
    "lump",
)
_INT_ROW = {name: row for row, name in enumerate(_INTS)}
_FLOAT_ROWS = {
    "index": slice(0, 1),
    "kept": slice(1, 2),
    "optical_path": slice(2, 3),
    "position": slice(3, 6),
    "direction": slice(6, 9),
    "axis": slice(9, 12),
    "coherency": slice(12, 16),
    "moments": slice(16, 26),
}
_VECTORS = ("position", "direction", "axis")
_FLOATS = 26


class Front:
    """N beams where they start.

    Attributes
    ----------
    variant, source, wave : (N,) ndarray of int
        Numbers of state, source and wavelength.
    parent : (N,) ndarray of int
        Number of the beam it came from, -1 for none.
    node : (N,) ndarray of int
        Place in the tree of routes, -1 for strays.
    splits : (N,) ndarray of int
        Unintended splittings since the source.
    event : (N,) ndarray of int
        What made it, a number in `EVENTS`.
    face, body : (N,) ndarray of int
        Row of the face or of the solid that it left, -1 for none.
    owner : (N,) ndarray of int
        Number of what it left: elements, then sources, then one number for all else.
    within : (N,) ndarray of int
        Row of the optic that it is inside of, or `OUTSIDE`.
    lump : (N,) ndarray of bool
        Whether it is a spilled lump, which is not cut again.
    index : (N,) ndarray of float64
        Absolute index of the medium.
    position, direction, axis : (N, 3) ndarray of float64
        Start in mm, unit direction, and first transverse axis; the second is
        direction x axis.
    coherency : (4, N) ndarray of float64
        W.
    moments : (10, N) ndarray of float64
        mm and rad.
    kept : (N,) ndarray of float64
        Share of the unclipped beam that is left.
    optical_path : (N,) ndarray of float64
        From the source, mm.
    """

    __slots__ = ("floats", "ints")

    def __init__(self, ints: Ints, floats: Floats) -> None:
        self.ints = ints
        self.floats = floats

    @staticmethod
    def made(count: int, **columns: Ints | Floats | Flags | int | float) -> Front:
        """Return beams from their quantities; what is not named is 0."""
        front = Front(np.zeros((len(_INTS), count), dtype=np.int64), np.zeros((_FLOATS, count)))
        front.set(**columns)
        return front

    def set(self, **columns: Ints | Floats | Flags | int | float) -> None:
        """Overwrite quantities of beams that nobody else holds."""
        for name, value in columns.items():
            row = _INT_ROW.get(name)
            if row is not None:
                self.ints[row] = value
            elif name in _VECTORS:
                self.floats[_FLOAT_ROWS[name]] = np.asarray(value).T
            else:
                self.floats[_FLOAT_ROWS[name]] = value

    def changed(self, **columns: Ints | Floats | Flags | int | float) -> Front:
        """Return beams with some quantities changed."""
        front = Front(self.ints.copy(), self.floats.copy())
        front.set(**columns)
        return front

    def take(self, rows: Ints | Flags) -> Front:
        """Return some of the beams."""
        return Front(self.ints[:, rows], self.floats[:, rows])

    def part(self, rows: slice) -> Front:
        """Return a view of neighbouring beams."""
        return Front(self.ints[:, rows], self.floats[:, rows])

    def twice(self) -> Front:
        """Return all beams, and all of them again."""
        return Front(
            np.concatenate((self.ints, self.ints), axis=1),
            np.concatenate((self.floats, self.floats), axis=1),
        )

    def __len__(self) -> int:
        """Count the beams."""
        return int(self.ints.shape[1])

    @property
    def power(self) -> Floats:
        """Power of each beam, W."""
        power: Floats = self.floats[12] + self.floats[13]
        return power

    @property
    def variant(self) -> Ints:  # noqa: D102 (see the class)
        value: Ints = self.ints[0]
        return value

    @property
    def source(self) -> Ints:  # noqa: D102 (see the class)
        value: Ints = self.ints[1]
        return value

    @property
    def wave(self) -> Ints:  # noqa: D102 (see the class)
        value: Ints = self.ints[2]
        return value

    @property
    def parent(self) -> Ints:  # noqa: D102 (see the class)
        value: Ints = self.ints[3]
        return value

    @property
    def node(self) -> Ints:  # noqa: D102 (see the class)
        value: Ints = self.ints[4]
        return value

    @property
    def splits(self) -> Ints:  # noqa: D102 (see the class)
        value: Ints = self.ints[5]
        return value

    @property
    def event(self) -> Ints:  # noqa: D102 (see the class)
        value: Ints = self.ints[6]
        return value

    @property
    def face(self) -> Ints:  # noqa: D102 (see the class)
        value: Ints = self.ints[7]
        return value

    @property
    def body(self) -> Ints:  # noqa: D102 (see the class)
        value: Ints = self.ints[8]
        return value

    @property
    def owner(self) -> Ints:  # noqa: D102 (see the class)
        value: Ints = self.ints[9]
        return value

    @property
    def within(self) -> Ints:  # noqa: D102 (see the class)
        value: Ints = self.ints[10]
        return value

    @property
    def lump(self) -> Flags:  # noqa: D102 (see the class)
        value: Flags = self.ints[11] > 0
        return value

    @property
    def index(self) -> Floats:  # noqa: D102 (see the class)
        value: Floats = self.floats[0]
        return value

    @property
    def kept(self) -> Floats:  # noqa: D102 (see the class)
        value: Floats = self.floats[1]
        return value

    @property
    def optical_path(self) -> Floats:  # noqa: D102 (see the class)
        value: Floats = self.floats[2]
        return value

    @property
    def position(self) -> Floats:  # noqa: D102 (see the class)
        value: Floats = self.floats[3:6].T
        return value

    @property
    def direction(self) -> Floats:  # noqa: D102 (see the class)
        value: Floats = self.floats[6:9].T
        return value

    @property
    def axis(self) -> Floats:  # noqa: D102 (see the class)
        value: Floats = self.floats[9:12].T
        return value

    @property
    def coherency(self) -> Floats:  # noqa: D102 (see the class)
        value: Floats = self.floats[12:16]
        return value

    @property
    def moments(self) -> Floats:  # noqa: D102 (see the class)
        value: Floats = self.floats[16:26]
        return value

    @property
    def light(self) -> Floats:
        """Coherency above moments (14, N)."""
        value: Floats = self.floats[12:26]
        return value


def join(fronts: list[Front]) -> Front:
    """Return several sets of beams as one."""
    if len(fronts) == 1:
        return fronts[0]
    return Front(
        np.concatenate([front.ints for front in fronts], axis=1),
        np.concatenate([front.floats for front in fronts], axis=1),
    )
