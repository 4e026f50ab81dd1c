"""What must hold of every convex solid, worked out from its points alone."""

import itertools

import numpy as np


def planes(solid):
    """Return (normal, point) of every patch and disc, normals as the order of points says."""
    points = np.array(solid.points)
    found = []
    for patch in solid.patches:
        corners = points[list(patch)]
        around = np.roll(corners, -1, axis=0)
        normal = np.cross(corners, around).sum(axis=0) / 2  # the area vector
        found.append((normal / np.linalg.norm(normal), corners[0]))
    for centre, first, second in solid.discs:
        normal = np.cross(points[first] - points[centre], points[second] - points[centre])
        found.append((normal / np.linalg.norm(normal), points[centre]))
    return found


def assert_convex_and_outward(solid):
    """Every patch is flat, and no point of the solid lies beyond any of its planes."""
    points = np.array(solid.points)
    for patch in solid.patches:
        corners = points[list(patch)]
        normal = planes(solid._replace(patches=(patch,), discs=()))[0][0]
        assert np.allclose((corners - corners[0]) @ normal, 0.0, atol=1e-9)
    assert planes(solid)
    if solid.cylinder is not None:
        points = np.array([rim for disc in solid.discs for rim in rim_of(solid, disc)])
    for normal, point in planes(solid):
        assert ((points - point) @ normal).max() < 1e-9


def rim_of(solid, disc, steps=16):
    """Return points round the rim of a disc."""
    centre, first, second = (np.array(solid.points[i]) for i in disc)
    angles = np.linspace(0.0, 2.0 * np.pi, steps, endpoint=False)
    return [centre + np.cos(a) * (first - centre) + np.sin(a) * (second - centre) for a in angles]


def assert_closed(solid):
    """Every edge of the patches belongs to two of them, once in either direction."""
    edges = [
        (a, b) for patch in solid.patches for a, b in zip(patch, patch[1:] + patch[:1], strict=True)
    ]
    assert len(set(edges)) == len(edges)
    assert {(b, a) for a, b in edges} == set(edges)


def volume(solid):
    """Return the volume within patches, by the divergence theorem."""
    points = np.array(solid.points)
    total = 0.0
    for patch in solid.patches:
        corners = points[list(patch)]
        for b, c in itertools.pairwise(corners):
            total += corners[0] @ np.cross(b, c) / 6
    return total
