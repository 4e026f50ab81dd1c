"""Times the trace beside the same physics one beam at a time in plain Python.

Run by hand, from the top of a clone:

    python tests/bench/trace_loop.py [ROUNDS] [LAYOUT]

The loop finds the nearest face and body, divides at faces by Fresnel or by stated shares, and
carries coherency and moments, with numbers and tuples only. It cuts no cross-sections, so that
it does less than the trace does; lenses, metals, retarders and openings are not in it.
"""

import statistics
import sys
import time
from math import inf, sqrt
from pathlib import Path

sys.path.insert(0, str(Path(__file__).resolve().parent.parent.parent))

from benchlay.pipeline import place, read
from benchlay.scene.compile import compile_scene
from benchlay.tracing import trace
from benchlay.tracing.emission import emitted
from benchlay.tracing.ways import ways_of
from tests.bench.forty import bench

OPAQUE, PASSES = 1, 2  # what faces do, as in `Acts`
SKIN, OUTSIDE = 1e-7, -1


def dot(a, b):
    return a[0] * b[0] + a[1] * b[1] + a[2] * b[2]


def cross(a, b):
    return (a[1] * b[2] - a[2] * b[1], a[2] * b[0] - a[0] * b[2], a[0] * b[1] - a[1] * b[0])


def plus(a, b, times=1.0):
    return (a[0] + times * b[0], a[1] + times * b[1], a[2] + times * b[2])


class Bench:
    """The scene as lists."""

    def __init__(self, scene):
        f, s = scene.faces, scene.solids
        columns = (f.origin, f.left, f.up, f.normal, f.middle, f.radii, f.round, f.acts, f.inside)
        self.faces = list(zip(*(c.tolist() for c in columns), f.owner.tolist(), strict=True))
        self.here = [set(row.nonzero()[0].tolist()) for row in f.present]
        shares = (f.mode[:, 0], f.share_s[:, 0], f.share_p[:, 0], f.loss_s[:, 0], f.loss_p[:, 0])
        self.shares = list(zip(*(c.tolist() for c in shares), strict=True))
        self.indices = scene.indices[:, 0].tolist()
        self.sides = list(zip(scene.before.tolist(), scene.behind.tolist(), strict=True))
        self.own = [[r for r in row if r >= 0] for row in scene.fixed.own_faces.tolist()]
        ends = [*s.plane_start.tolist()[1:], len(s.plane_solid)]
        planes = list(zip(s.plane_normal.tolist(), s.plane_offset.tolist(), strict=True))
        rounds = zip(s.axis_point.tolist(), s.axis.tolist(), s.axis_radius.tolist(), strict=True)
        of_solid = dict(zip(s.axis_solid.tolist(), rounds, strict=True))
        self.solids = [
            (planes[a:b], of_solid.get(i), owner, close)
            for i, (a, b, owner, close) in enumerate(
                zip(
                    s.plane_start.tolist(),
                    ends,
                    s.owner.tolist(),
                    scene.close.tolist(),
                    strict=True,
                )
            )
        ]
        self.bodies = [row.nonzero()[0].tolist() for row in s.present]


def at_face(face, position, direction):
    """Return distance and slope, or None outside the outline."""
    origin, left, up, normal, middle, radii, is_round = face[:7]
    slope = dot(direction, normal)
    if abs(slope) < 1e-12:
        return None
    away = plus(position, origin, -1.0)
    distance = -dot(away, normal) / slope
    there = plus(away, direction, distance)
    a = abs(dot(there, left) - middle[0]) / radii[0]
    b = abs(dot(there, up) - middle[1]) / radii[1]
    if (a * a + b * b if is_round else max(a, b)) > 1.0:
        return None
    return distance, slope


def at_solid(solid, position, direction):
    """Return where the ray enters; infinity where it does not."""
    planes, tube = solid[:2]
    enter, leave = -inf, inf
    for normal, offset in planes:
        slope, gap = dot(direction, normal), offset - dot(position, normal)
        if abs(slope) < 1e-12:
            if gap < 0.0:
                return inf
        elif slope < 0.0:
            enter = max(enter, gap / slope)
        else:
            leave = min(leave, gap / slope)
    if tube and enter <= leave:
        point, axis, radius = tube
        away = plus(position, point, -1.0)
        lean, mixed = dot(direction, axis), dot(away, axis)
        a, b = 1.0 - lean * lean, dot(away, direction) - mixed * lean
        square = b * b - a * (dot(away, away) - mixed * mixed - radius * radius)
        if a > 1e-12:
            if square < 0.0:
                return inf
            enter = max(enter, (-b - sqrt(square)) / a)
            leave = min(leave, (-b + sqrt(square)) / a)
    return max(enter, 0.0) if enter <= leave and leave > SKIN else inf


def first_inside(room, position, direction, within, left_face):
    """Return the distance, the face or None, and the slope there, inside an optic."""
    best = (inf, None, 0.0)
    for row in room.own[within]:
        hit = at_face(room.faces[row], position, direction) if row != left_face else None
        if hit and hit[1] > 0.0 and -1e-9 < hit[0] < best[0]:
            best = (hit[0], row, hit[1])
    return best


def first_outside(room, beam):
    """Return the same among all faces and bodies; where a body is nearest, no face."""
    position, direction, _, _, owner, body, variant = beam[:7]
    best, aimed = (inf, None, 0.0), {owner}
    for row in room.here[variant]:
        face = room.faces[row]
        hit = at_face(face, position, direction)
        if hit is None or (hit[1] > 0.0 and face[7] != PASSES):
            continue
        if hit[0] > (SKIN if face[9] == owner else -SKIN):
            aimed.add(face[9])
            best = min(best, (hit[0], row, hit[1]))
    for number in room.bodies[variant]:
        solid = room.solids[number]
        if number != body and not (solid[3] and solid[2] in aimed):
            distance = at_solid(solid, position, direction)
            if distance < best[0] - SKIN:
                best = (distance, None, 0.0)
    return best


def carried(m, way):
    """Moments after a reduced length."""
    xx, xy, yy, xu, xv, yu, yv, uu, uv, vv = m
    xu2, xv2, yu2, yv2 = xu + way * uu, xv + way * uv, yu + way * uv, yv + way * vv
    xx, xy, yy = xx + way * (xu + xu2), xy + way * (yu + xv2), yy + way * (yv + yv2)
    return (xx, xy, yy, xu2, xv2, yu2, yv2, uu, uv, vv)


def turned(j, m, c, s):
    """Coherency and moments in a basis turned by an angle."""
    cc, ss, cs = c * c, s * s, c * s
    a, b, re, im = j
    mixed = 2.0 * cs * re
    j = (cc * a + ss * b + mixed, ss * a + cc * b - mixed, (cc - ss) * re + cs * (b - a), im)
    xx, xy, yy, xu, xv, yu, yv, uu, uv, vv = m
    even, odd = cs * (xv + yu), cs * (yv - xu)
    return j, (
        cc * xx + ss * yy + 2.0 * cs * xy,
        (cc - ss) * xy + cs * (yy - xx),
        ss * xx + cc * yy - 2.0 * cs * xy,
        cc * xu + ss * yv + even,
        cc * xv - ss * yu + odd,
        cc * yu - ss * xv + odd,
        ss * xu + cc * yv - even,
        cc * uu + ss * vv + 2.0 * cs * uv,
        (cc - ss) * uv + cs * (vv - uu),
        ss * uu + cc * vv - 2.0 * cs * uv,
    )


def stretched(m, f):
    """Moments after the second axis was stretched."""
    xx, xy, yy, xu, xv, yu, yv, uu, uv, vv = m
    return (xx, xy * f, yy * f * f, xu, xv / f, yu * f, yv, uu, uv / f, vv / (f * f))


def divided(room, row, n1, n2, cosine):
    """Return r_s, r_p, t_s, t_p (their squares are shares); no total reflection here."""
    mode, share_s, share_p, loss_s, loss_p = room.shares[row]
    if mode:
        return (
            (-sqrt(share_s), sqrt(share_p)),
            (sqrt(max(1.0 - share_s - loss_s, 0.0)), sqrt(max(1.0 - share_p - loss_p, 0.0))),
        )
    sine2 = n1 * n1 * (1.0 - cosine * cosine)
    if sine2 >= n2 * n2:
        return (-1.0, 1.0), (0.0, 0.0)
    a, q = n1 * cosine, sqrt(n2 * n2 - sine2)
    root = sqrt(q / a)
    t = 2.0 * a / (a + q) * root, 2.0 * a * n2 / (n2 * n2 * cosine + n1 * q) * root
    return ((a - q) / (a + q), (n2 * n2 * cosine - n1 * q) / (n2 * n2 * cosine + n1 * q)), t


def children(room, beam, floor_w):
    """Return what leaves the end of a beam's leg."""
    position, direction, within, left_face, _, _, variant, index, axis, j, m = beam
    if within == OUTSIDE:
        distance, row, slope = first_outside(room, beam)
    else:
        distance, row, slope = first_inside(room, position, direction, within, left_face)
    if row is None or room.faces[row][7] == OPAQUE:
        return []
    place, m = plus(position, direction, distance), carried(m, distance / index)
    owner, side = room.faces[row][9], 1.0 if slope > 0.0 else -1.0
    normal, cosine = tuple(side * n for n in room.faces[row][3]), abs(slope)
    s = cross(direction, normal)
    length = sqrt(dot(s, s))
    s = tuple(v / length for v in s) if length > 1e-12 else axis
    j, m = turned(j, m, dot(s, axis), dot(s, cross(direction, axis)))
    before, behind = room.sides[row]
    inside = behind if within == before else before
    beyond = room.indices[inside]
    reflect, transmit = divided(room, row, index, beyond, cosine)
    ratio = index / beyond
    cos2 = sqrt(max(1.0 - ratio * ratio * (1.0 - cosine * cosine), 0.0))
    ahead = plus(tuple(ratio * k for k in direction), normal, cos2 - ratio * cosine)
    born = []
    for way, medium, n, (a, b), f in (
        (plus(direction, normal, -2.0 * cosine), within, index, reflect, -1.0),
        (ahead, inside, beyond, transmit, max(cos2, 1e-12) / cosine),
    ):
        light = (a * a * j[0], b * b * j[1], a * b * j[2], a * b * j[3])
        if light[0] + light[1] >= floor_w:
            child = (place, way, medium, row, owner, -1, variant, n, s, light, stretched(m, f))
            born.append(child)
    return born


def loop(scene, ways, placed, floor_w):
    """Trace beam by beam and return how many there were."""
    room, start = Bench(scene), emitted(placed, scene, ways)
    live = [
        (
            *(tuple(v) for v in (start.position[i].tolist(), start.direction[i].tolist())),
            *(OUTSIDE, -1, int(start.owner[i]), -1, int(start.variant[i]), float(start.index[i])),
            *(tuple(v[i].tolist()) for v in (start.axis, start.coherency.T, start.moments.T)),
        )
        for i in range(len(start))
    ]
    count = 0
    while live:
        count += 1
        live += children(room, live.pop(), floor_w)
    return count


def main() -> None:
    """Compare."""
    rounds = int(sys.argv[1]) if len(sys.argv) > 1 else 5
    name = sys.argv[2] if len(sys.argv) > 2 else "forty.yaml"
    text = Path(name).read_text(encoding="utf-8") if len(sys.argv) > 2 else bench()
    placed = place(read(name, text))
    scene = compile_scene(placed)
    ways = ways_of(placed, scene)
    floor_w = 2e-8
    floors = dict.fromkeys(scene.wavelengths_nm.tolist(), floor_w)
    ratios = []
    for _ in range(rounds):
        start = time.perf_counter()
        traced = trace(placed, floors)
        middle = time.perf_counter()
        beams = loop(scene, ways, placed, floor_w)
        end = time.perf_counter()
        ratios.append((end - middle) / (middle - start))
        print(
            f"trace {1e3 * (middle - start):.0f} ms ({len(traced.beams.length)} beams, cut where "
            f"needed), loop {1e3 * (end - middle):.0f} ms ({beams} beams)"
        )
    print(f"loop / trace = {statistics.median(ratios):.1f}")


if __name__ == "__main__":
    main()
