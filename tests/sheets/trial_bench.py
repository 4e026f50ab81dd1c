"""A made-up bench for looking at sheets: ten mirrors, two wavelengths, strays, zones.

Run as a script with a folder to write trial.svg and trial.dxf there.
"""

import itertools
import math
import sys
from pathlib import Path

import shapely

from benchlay.sheets.contents import (
    BeamEntry,
    Holes,
    Item,
    Leg,
    Opening,
    PanelLine,
    Picture,
    Shape,
    Zone,
)
from benchlay.sheets.title_block import TitleFields

GREEN, INFRARED = 532.0, 1064.0


def mirror(name, at, came_from, goes_to, *, kind="mirror", diameter=25.4, thick=6.0, z=100.0):
    """A plate whose normal halves the angle between the beams that come and go."""
    a = math.atan2(came_from[1] - at[1], came_from[0] - at[0])
    b = math.atan2(goes_to[1] - at[1], goes_to[0] - at[0])
    facing = math.atan2(math.sin(a) + math.sin(b), math.cos(a) + math.cos(b))
    h = diameter / 2
    glass = Shape(((0.0, -h), (0.0, h), (-thick, h), (-thick, -h)))
    box = Shape(((-1.0, -h - 7), (-1.0, h + 7), (-18.0, h + 7), (-18.0, -h - 7)))
    r = 6.35
    post = Shape(((-9.0 - r, 0.0), (-9.0 + r, 0.0)), (1.0, 1.0))
    return Item(
        name,
        kind,
        (*at, z),
        math.degrees(facing),
        (glass,),
        (((0.0, -h), (0.0, h)),),
        (box, post),
    )


def lens(name, at, facing_deg):
    edge, half, bulge = 2.0, 12.7, 0.12
    outline = Shape(
        ((edge, -half), (edge, half), (-edge, half), (-edge, -half)), (bulge, 0.0, bulge, 0.0)
    )
    return Item(name, "lens", (*at, 100.0), facing_deg, (outline,))


def source(name, at, heading_deg):
    body = Shape(((0.0, -35.0), (0.0, 35.0), (-180.0, 35.0), (-180.0, -35.0)))
    return Item(name, "source", (*at, 100.0), heading_deg, (), (), (body,))


def dump(name, at, facing_deg):
    body = Shape(((0.0, -15.0), (0.0, 15.0), (-60.0, 15.0), (-60.0, -15.0)))
    return Item(name, "dump", (*at, 100.0), facing_deg, (body,))


def target(name, at, facing_deg):
    plate = Shape(((0.0, -20.0), (0.0, 20.0), (-4.0, 20.0), (-4.0, -20.0)))
    return Item(name, "target", (*at, 100.0), facing_deg, (plate,))


def leg(name, wavelength, a, b, *, stray=False, words="", ends="optic", z=100.0, z2=None):
    length = math.dist(a, b)
    radii = [(s, math.hypot(1.0, 0.004 * s)) for s in (0.0, length / 2, length)]
    end_z = z if z2 is None else z2
    return Leg(name, wavelength, (*a, z), (*b, end_z), stray, words, ends, tuple(radii))


def path(name, wavelength, points, words):
    """Legs of a working beam; the name is repeated after each element."""
    return [
        leg(name, wavelength, a, b, words=words if n == 0 else name)
        for n, (a, b) in enumerate(itertools.pairwise(points))
    ]


B1 = [(230, 700), (600, 700), (600, 400), (950, 400), (950, 700), (1350, 700), (1350, 200)]
B2 = [(230, 150), (500, 150), (500, 300), (800, 300), (800, 120), (1150, 120), (1150, 480)]
B3 = [(1150, 480), (820, 560)]


def items():
    out = [source("green", B1[0], 0.0), source("infrared", B2[0], 0.0)]
    names = iter(["M1", "M2", "M3", "M4", "M5", "M6", "M7", "M8", "M9", "M10"])
    for points in (B1, B2):
        for a, at, b in zip(points, points[1:], points[2:], strict=False):
            out.append(mirror(next(names), at, a, b))
    out.append(mirror("BS1", B2[-1], B2[-2], B3[-1], kind="splitter", thick=5.0, z=125.0))
    out.append(lens("L1", (420, 700), 180.0))
    out.append(lens("L2", (1350, 420), 90.0))
    out.append(target("sample", B1[-1], 90.0))
    out.append(dump("D1", B3[-1], -13.6))
    return tuple(out)


def legs():
    out = path("B1", GREEN, B1, "B1 532 nm 150 mW")
    out += path("B2", INFRARED, B2, "B2 1064 nm 2 W")
    out += path("B3", INFRARED, [B2[-1], B3[-1]], "B3 1064 nm 1 W")
    out += [
        leg(
            "S1",
            GREEN,
            (600, 700),
            (760, 780),
            stray=True,
            words="S1 from M1 0,5 % 0,7 mW",
            ends="panel",
        ),
        leg("S1", GREEN, (760, 780), (820, 900), stray=True, ends="panel"),
        leg(
            "S2",
            INFRARED,
            (1150, 480),
            (1150, 900),
            stray=True,
            words="S2 from BS1 48 % 0,96 W",
            ends="panel",
        ),
        leg(
            "S3",
            GREEN,
            (1350, 420),
            (1500, 330),
            stray=True,
            words="S3 from L2 0,4 mW",
            ends="escaped",
        ),
        leg(
            "S4", INFRARED, (500, 300), (500, 420), stray=True, words="S4 from M7 4 mW", ends="dump"
        ),
        leg(
            "S5",
            INFRARED,
            (800, 120),
            (400, -3000),
            stray=True,
            words="S5 from M9 1,1 mW",
            ends="escaped",
        ),
    ]
    return tuple(out)


def panels():
    port = Opening("port", 500.0, 560.0)
    return (
        PanelLine("south", (0, 0), (1500, 0), 2.0, (), access="interlocked"),
        PanelLine("east", (1500, 0), (1500, 900), 2.0, (Opening("cable", 300.0, 340.0),)),
        PanelLine("north", (1500, 900), (0, 900), 2.0, (port,)),
        PanelLine("west", (0, 900), (0, 0), 2.0, (), is_open=True),
    )


def zones():
    room = shapely.box(20, 20, 1480, 880)
    beam = shapely.LineString(B1).buffer(9.0, cap_style="flat", join_style="mitre")
    out = shapely.Polygon([(700, -30), (820, -30), (640, -2500), (200, -2500)])
    label = ("direct 532 nm", "MPE 10 W/m², to walls", "eyewear as schedule")
    more = ("B1 532 nm 150 mW", "100 s", "to the first opaque thing")
    return (
        Zone("Z1", "direct", rings(beam), label, more),
        Zone("Z2", "diffuse", rings(room), ("diffuse 1064 nm", "reach 0,8 m"), ("B2", "100 s")),
        Zone("Z3", "direct", rings(out), ("direct 1064 nm", "reach 20 m"), ("S5 1,1 mW",)),
    )


def rings(polygon):
    return tuple(tuple(ring.coords[:-1]) for ring in (polygon.exterior, *polygon.interiors))


FIELDS = TitleFields(
    owner="Town museum, conservation workshop",
    title="Varnish fluorescence bench",
    document_type="Bench layout, plan",
    number="CW-014-01",
    revision="B",
    date="2026-05-04",
    drawn_by="workshop",
    approved_by="laser safety officer",
    sheet="1/1",
)


def picture(**changes):
    known = Picture(
        "plan",
        FIELDS,
        ((0.0, 0.0), (1500.0, 0.0), (1500.0, 900.0), (0.0, 900.0)),
        holes=Holes((25.0, 25.0), 25.0, 59, 35, "M6"),
        beam_height_mm=100.0,
        items=items(),
        legs=legs(),
        panels=panels(),
        zones=zones(),
        legend=(
            BeamEntry(GREEN, 0.5, "532 nm, green, 150 mW"),
            BeamEntry(INFRARED, 0.7, "1064 nm, infrared, 2 W"),
        ),
        revisions=(
            ("A", "2026-03-02", "first issue", "wks"),
            ("B", "2026-05-04", "splitter BS1 and dump D1 added", "wks"),
        ),
        notes=(
            "Zones are a first estimate from the traced beams; the standard, local rules and "
            "the laser safety officer decide.",
        ),
        properties=(("layout sha256", "0" * 64),),
    )
    return known._replace(**changes)


def main(folder):
    from benchlay.sheets.plan import compose
    from benchlay.writers import dxf, svg

    for name, changes in (("trial", {}), ("trial-a3", {"sheet": "A3"})):
        sheet = compose(picture(**changes))
        Path(folder, f"{name}.svg").write_bytes(svg.write(sheet))
        Path(folder, f"{name}.dxf").write_bytes(dxf.write(sheet))


if __name__ == "__main__":
    main(sys.argv[1])
