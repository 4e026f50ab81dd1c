"""How far holes keep from edges and from one another."""

from __future__ import annotations

from math import dist, hypot

from benchlay.geometry.polygon import Point
from benchlay.making.blank import Blank


def edge_distances(blank: Blank) -> list[float]:
    """Return for every fixing hole how far its middle is from the nearest edge of the sheet.

    Edges are those of the blank, of openings, and of the other holes.
    """
    loops = (blank.outer, *blank.inner)
    sides = [(loop[n - 1], loop[n]) for loop in loops for n in range(len(loop))]
    circles = (*blank.rounds, *blank.holes)
    out = []
    for hole in blank.holes:
        away = [_from_side(hole.centre, a, b) for a, b in sides]
        away += [
            dist(hole.centre, other.centre) - other.diameter_mm / 2
            for other in circles
            if other is not hole
        ]
        out.append(min(away))
    return out


def _from_side(p: Point, a: Point, b: Point) -> float:
    ux, uy, vx, vy = b[0] - a[0], b[1] - a[1], p[0] - a[0], p[1] - a[1]
    share = min(max((ux * vx + uy * vy) / (ux * ux + uy * uy), 0.0), 1.0)
    return hypot(vx - share * ux, vy - share * uy)
