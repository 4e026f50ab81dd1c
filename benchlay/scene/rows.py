"""Collects faces and solids from items in their own frames, and turns them all at once."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np

from benchlay.elements._kind import Face
from benchlay.geometry.axes import in_plane_axes
from benchlay.geometry.solid import Solid, Vector
from benchlay.placing.pose import Axes
from benchlay.scene.tables import Floats, Ints

_LEVEL_AXES: Axes = ((1.0, 0.0, 0.0), (0.0, 1.0, 0.0), (0.0, 0.0, 1.0))
_ORIGIN: Vector = (0.0, 0.0, 0.0)


class Frames:
    """Points and directions waiting to be turned into the plan frame together."""

    def __init__(self) -> None:
        self._axes: list[Axes] = [_LEVEL_AXES]
        self._turns: Floats = np.zeros((0, 3, 3))  # the same as an array, made when first asked for
        self._origins: list[Vector] = [_ORIGIN]

    def add(self, axes: Axes, origin: Vector) -> int:
        """Return the number of a new frame; number 0 is the plan frame itself."""
        self._axes.append(axes)
        self._origins.append(origin)
        return len(self._axes) - 1

    def turn(self, vectors: Sequence[Vector], frames: Sequence[int]) -> Floats:
        """Return directions (N, 3) in the plan frame."""
        if not vectors:
            return np.zeros((0, 3))
        if len(self._turns) < len(self._axes):
            self._turns = np.array(self._axes)
        axes = self._turns[np.asarray(frames)]
        turned: Floats = np.matmul(np.array(vectors)[:, None, :], axes)[:, 0, :]
        return turned

    def place(self, points: Sequence[Vector], frames: Sequence[int]) -> Floats:
        """Return points (N, 3) in the plan frame."""
        if not points:
            return np.zeros((0, 3))
        placed: Floats = self.turn(points, frames) + np.array(self._origins)[np.asarray(frames)]
        return placed


class FaceRows:
    """Faces in the order of their rows."""

    def __init__(self) -> None:
        self.faces: list[Face] = []
        self.frames: list[int] = []
        self.owners: list[int] = []

    def add(self, face: Face, owner: int, frame: int) -> int:
        """Return the row of a new face."""
        self.faces.append(face)
        self.frames.append(frame)
        self.owners.append(owner)
        return len(self.faces) - 1

    def axes(self, frames: Frames) -> tuple[Floats, Floats, Floats, Floats]:
        """Return origins, left, up and normal of all, in the plan frame."""
        in_plane = [in_plane_axes(face.normal) for face in self.faces]
        return (
            frames.place([face.origin for face in self.faces], self.frames),
            frames.turn([left for left, _ in in_plane], self.frames),
            frames.turn([up for _, up in in_plane], self.frames),
            frames.turn([face.normal for face in self.faces], self.frames),
        )


class SolidRows:
    """Solids in the order of their rows, with what identifies them."""

    def __init__(self) -> None:
        self.solids: list[Solid] = []
        self.frames: list[int] = []
        self.labels: list[tuple[int, int, int, int, float]] = []  # owner name part sink specular

    def add(self, solid: Solid, frame: int, label: tuple[int, int, int, int, float]) -> int:
        """Return the row of a new solid."""
        self.solids.append(solid)
        self.frames.append(frame)
        self.labels.append(label)
        return len(self.solids) - 1

    def points(self, frames: Frames) -> tuple[Floats, Ints]:
        """Return all corner points in the plan frame and the first of each solid."""
        counts = [len(solid.points) for solid in self.solids]
        points = [point for solid in self.solids for point in solid.points]
        owners = [frame for frame, n in zip(self.frames, counts, strict=True) for _ in range(n)]
        start = np.concatenate(([0], np.cumsum(counts)[:-1])) if counts else np.zeros(0)
        return frames.place(points, owners), start.astype(np.int64)
