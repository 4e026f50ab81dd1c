"""Beams as the frames in which outlines are seen: components, scaling, and where planes cross.

Scaled coordinates are x/w: W(z)^-1 times the transverse place, W the symmetric square root of
4 times the second moments of position at depth z.
"""

from __future__ import annotations

import numpy as np

from benchlay.named import NamedTuple
from benchlay.optics.rays import cross, dot
from benchlay.scene.tables import Floats, Ints
from benchlay.tracing.front import Front

_FLAT = 1e-12


class Frame(NamedTuple):
    """For each of K outlines, the beam it is seen along."""

    problem: Ints
    position: Floats
    direction: Floats
    first: Floats
    second: Floats
    moments: Floats
    medium: Floats  # index of refraction


def frame_of(part: Front, problem: Ints) -> Frame:
    """Return the frames of the beams of some outlines."""
    direction, first = part.direction.take(problem, 0), part.axis.take(problem, 0)
    return Frame(
        problem,
        part.position.take(problem, 0),
        direction,
        first,
        cross(direction, first),
        part.moments.take(problem, 1),
        part.index[problem],
    )


def local(frame: Frame, vector: Floats, *, point: bool) -> tuple[Floats, Floats, Floats]:
    """Return components along first, second and direction of (K, 3) or (K, V, 3) vectors."""
    many = vector.ndim == 3  # noqa: PLR2004 (K outlines of V corners)
    away = vector
    if point:
        away = vector - (frame.position[:, None, :] if many else frame.position)
    axes = (frame.first, frame.second, frame.direction)
    if many:
        x, y, z = (np.einsum("kvi,ki->kv", away, axis) for axis in axes)
    else:
        x, y, z = (dot(away, axis) for axis in axes)
    return x, y, z


def inverse_roots(frame: Frame, z: Floats) -> tuple[Floats, Floats, Floats]:
    """Return the components of W(z)^-1 (11, 12, 22), 1/mm, at depths z (K,) or (K, V)."""
    m, d = frame.moments, frame.medium
    if z.ndim == 2:  # noqa: PLR2004 (K outlines of V corners)
        m, d = m[:, :, None], d[:, None]
    reduced = z / d
    a = 4.0 * (m[0] + reduced * (2.0 * m[3] + reduced * m[7]))
    b = 4.0 * (m[1] + reduced * (m[4] + m[5] + reduced * m[8]))
    c = 4.0 * (m[2] + reduced * (2.0 * m[6] + reduced * m[9]))
    s = np.sqrt(np.maximum(a * c - b * b, 0.0))
    t = s * np.sqrt(a + c + 2.0 * s)
    return (c + s) / t, -b / t, (a + s) / t


def gradient(
    frame: Frame, normal: Floats, slope: Floats, root: tuple[Floats, Floats, Floats]
) -> Floats:
    """Return (K, 2): how the depth of a plane grows along the scaled coordinates."""
    gx, gy = -dot(normal, frame.first) / slope, -dot(normal, frame.second) / slope
    i11, i12, i22 = root
    det = i11 * i22 - i12 * i12
    return np.stack(((gx * i22 - gy * i12) / det, (gy * i11 - gx * i12) / det), axis=1)


def plane_depth(frame: Frame, point: Floats, normal: Floats) -> tuple[Floats, Floats]:
    """Return where planes cross the chief rays, and direction . normal."""
    slope = dot(frame.direction, normal)
    safe = np.where(np.abs(slope) < _FLAT, _FLAT, slope)
    return dot(point - frame.position, normal) / safe, safe


def unit_vectors(vectors: Floats) -> Floats:
    """Return vectors (K, 3) with length one; those without length stay as they are."""
    length = np.sqrt(dot(vectors, vectors))
    unit: Floats = vectors / np.where(length < _FLAT, 1.0, length)[:, None]
    return unit


def scaled(root: tuple[Floats, Floats, Floats], x: Floats, y: Floats) -> Floats:
    """Return (..., 2): transverse places x, y (mm) times W^-1, of which `root` has 11, 12, 22."""
    return np.stack((root[0] * x + root[1] * y, root[1] * x + root[2] * y), axis=-1)
