"""A second way to share a beam's power among bodies, to referee `optics.shares`.

Cartesian where the program is polar: along a column of constant xi1 each outline is crossed
where simple algebra says, a plain point-in-shape test finds the owner midway between two
crossings, the error function gives the column's power, and the columns are summed by an
adaptive Gauss-Kronrod rule that is told of corners and sides but of no crossing.
"""

from __future__ import annotations

from dataclasses import dataclass, field

import numpy as np
from scipy.special import ndtr

from benchlay.optics.shares import Shapes

EDGE = 4.8  # exp(-2 r^2) is 1e-20 here
# Kronrod's 15 nodes and weights and Gauss's 7 (Piessens et al., QUADPACK, 1983, qk15).
_X = np.array(
    [0.991455371120812639206854697526329, 0.949107912342758524526189684047851,
     0.864864423359769072789712788640926, 0.741531185599394439863864773280788,
     0.586087235467691130294144691693013, 0.405845151377397166906606412076961,
     0.207784955007898467600689403773245, 0.0]
)  # fmt: skip
_K = np.array(
    [0.022935322010529224963732008058970, 0.063092092629978553290700663189204,
     0.104790010322250183839876322541518, 0.140653259715525918745189590510238,
     0.169004726639267902826583426598550, 0.190350578064785409913256402421014,
     0.204432940075298892414161999234649, 0.209482141084727828012999174891714]
)  # fmt: skip
_G = np.array(
    [0.0, 0.129484966168869693270611432679082, 0.0, 0.279705391489276667901467771423780,
     0.0, 0.381830050505118944950369775488975, 0.0, 0.417959183673469387755102040816327]
)  # fmt: skip
_NODES = np.concatenate((-_X, _X[-2::-1]))
_KRONROD = np.concatenate((_K, _K[-2::-1]))
_GAUSS = np.concatenate((_G, _G[-2::-1]))


@dataclass
class Figure:
    """One shape of a scene, in the plainest form."""

    depth: tuple[float, float, float]
    corners: list[tuple[float, float]] | None = None
    centre: tuple[float, float] = (0.0, 0.0)
    axes: tuple[tuple[float, float], tuple[float, float]] = ((1.0, 0.0), (0.0, 1.0))
    order: int = 0
    holes: list[Figure] = field(default_factory=list)

    def holds(self, x: np.ndarray, y: np.ndarray) -> np.ndarray:
        """Whether each point lies in the outline and in none of its holes."""
        if self.corners is None:
            inverse = np.linalg.inv(np.array(self.axes))
            dx, dy = x - self.centre[0], y - self.centre[1]
            u = inverse[0, 0] * dx + inverse[0, 1] * dy
            v = inverse[1, 0] * dx + inverse[1, 1] * dy
            result = u * u + v * v <= 1.0
        else:
            result = np.ones_like(x, dtype=bool)
            for (ax, ay), (bx, by) in self._edges():
                result &= (bx - ax) * (y - ay) >= (by - ay) * (x - ax)
        for hole in self.holes:
            result &= ~hole.holds(x, y)
        return result

    def crossings(self, x: np.ndarray) -> list[np.ndarray]:
        """Heights at which the outline (and its holes') may cross each column; or NaN."""
        result = [y for hole in self.holes for y in hole.crossings(x)]
        with np.errstate(invalid="ignore", divide="ignore"):
            if self.corners is None:
                shape = np.array(self.axes) @ np.array(self.axes).T
                dx = (x - self.centre[0]) / shape[0, 0]
                middle = self.centre[1] + shape[0, 1] * dx
                half = np.sqrt(np.linalg.det(shape) * (1.0 / shape[0, 0] - dx * dx))
                return [*result, middle - half, middle + half]
            for (ax, ay), (bx, by) in self._edges():
                part = (x - ax) / (bx - ax) if bx != ax else np.full_like(x, np.nan)
                result.append(ay + np.where((part > 0) & (part < 1), part, np.nan) * (by - ay))
        return result

    def turns(self) -> np.ndarray:
        """Columns at which a corner or the side of an ellipse stands."""
        result = [hole.turns() for hole in self.holes]
        if self.corners is None:
            reach = np.hypot(*self.axes[0])
            return np.concatenate(([self.centre[0] - reach, self.centre[0] + reach], *result))
        return np.concatenate(([x for x, _ in self.corners], *result))

    def _edges(self) -> list[tuple[tuple[float, float], tuple[float, float]]]:
        return list(zip(self.corners, self.corners[1:] + self.corners[:1], strict=True))


def to_shapes(scenes: list[list[Figure]]) -> Shapes:
    """Tables of several scenes, a problem each; holes follow their body."""
    rows = []
    for problem, scene in enumerate(scenes):
        for figure in scene:
            host = len(rows)
            rows.append((problem, figure, -1))
            rows.extend((problem, hole, host) for hole in figure.holes)
    width = max([3, *(len(f.corners) for _, f, _ in rows if f.corners)])
    vertices = np.full((len(rows), width, 2), np.nan)
    for row, (_, figure, _) in enumerate(rows):
        if figure.corners:
            vertices[row] = (figure.corners + [figure.corners[-1]] * width)[:width]
    return Shapes(
        problem=np.array([p for p, _, _ in rows], dtype=int),
        corners=np.array([len(f.corners or []) for _, f, _ in rows], dtype=int),
        vertices=vertices,
        centre=np.array([f.centre for _, f, _ in rows], dtype=float).reshape(-1, 2),
        axes=np.array([f.axes for _, f, _ in rows], dtype=float).reshape(-1, 2, 2),
        depth=np.array([f.depth for _, f, _ in rows], dtype=float).reshape(-1, 3),
        order=np.array([f.order for _, f, _ in rows], dtype=int),
        hole_of=np.array([h for _, _, h in rows], dtype=int),
    )


def referee(scene: list[Figure], tolerance: float = 1e-12) -> np.ndarray:
    """Power on each body of the scene, and last the power that passes all of them."""
    edges = np.concatenate((np.linspace(-EDGE, EDGE, 601), *(f.turns() for f in scene)))
    edges = np.unique(np.clip(edges, -EDGE, EDGE))
    left, right = edges[:-1], edges[1:]
    total = np.zeros(len(scene) + 1)
    while len(left):
        half = 0.5 * (right - left)
        x = 0.5 * (right + left)[:, None] + half[:, None] * _NODES
        value = _columns(scene, x.ravel()).reshape(len(scene) + 1, *x.shape)
        kronrod, gauss = value @ _KRONROD * half, value @ _GAUSS * half
        good = (np.abs(kronrod - gauss) <= tolerance).all(axis=0) | (half < 1e-9)
        total += kronrod[:, good].sum(axis=1)
        left, right = left[~good], right[~good]
        middle = 0.5 * (left + right)
        left, right = np.concatenate((left, middle)), np.concatenate((middle, right))
    return total


def _columns(scene: list[Figure], x: np.ndarray) -> np.ndarray:
    """Power per width of each column on each body, and on none (last row)."""
    y = [np.full_like(x, -EDGE), np.full_like(x, EDGE)]
    for k, figure in enumerate(scene):
        y.extend(figure.crossings(x))
        for other in scene[:k]:
            d0, d1, d2 = np.subtract(figure.depth, other.depth)
            if d2 != 0.0:
                y.append(-(d0 + d1 * x) / d2)
    y = np.sort(np.clip(np.nan_to_num(np.array(y), nan=EDGE), -EDGE, EDGE), axis=0)
    middle = 0.5 * (y[1:] + y[:-1])
    depth = np.full((len(scene) + 1, *middle.shape), np.inf)
    depth[-1] = 1e30
    for k, figure in enumerate(scene):
        d0, d1, d2 = figure.depth
        at = d0 + d1 * x + d2 * middle + 1e-9 * figure.order
        depth[k][figure.holds(np.broadcast_to(x, middle.shape), middle)] = 0.0
        depth[k] = np.where(depth[k] == 0.0, at, np.inf)
    owner = depth.argmin(axis=0)
    # The standard deviation of exp(-2 y^2) is 1/2; differences on the side of the tail.
    sign = np.where(middle > 0.0, -1.0, 1.0)
    power = np.abs(ndtr(2.0 * sign * y[1:]) - ndtr(2.0 * sign * y[:-1]))
    density = np.sqrt(2.0 / np.pi) * np.exp(-2.0 * x * x)
    owners = np.arange(len(scene) + 1)[:, None, None]
    return np.where(owner == owners, power * density, 0.0).sum(axis=1)
