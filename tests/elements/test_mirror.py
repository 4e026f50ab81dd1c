"""Mirrors."""

import pytest

from benchlay.elements._coating import UNCOATED, Coating
from benchlay.elements._kind import Acts, Glass
from benchlay.geometry.outline import circle

REFLECTANCE = (
    "a reflectance, as '0.5 %' or '{s: 2 %, p: 1 %}', or a list by wavelength, "
    "as '[{from: 520, to: 545, is: 99.5 %}]'"
)


def test_defaults(make):
    mirror = make("kind: mirror, diameter: 25.4, reflectance: 99.5 %")
    assert (mirror.thickness_mm, mirror.back, mirror.absorbs) == (6.0, "ground", 0.0)
    assert mirror.glass == Glass("BK7", None)
    assert (mirror.TURNS_FRONT, mirror.MOUNTED, mirror.DEFAULT_BRANCH) == (True, True, "reflected")


def test_front_and_back_stand_a_thickness_apart(make, face_of):
    geometry = make("kind: mirror, diameter: 20, metal: gold, thickness: 3").geometry()
    front, back = face_of(geometry, "front"), face_of(geometry, "back")
    assert (front.origin, front.normal) == ((0.0, 0.0, 0.0), (1.0, 0.0, 0.0))
    assert (back.origin, back.normal) == ((-3.0, 0.0, 0.0), (-1.0, 0.0, 0.0))
    assert front.outline == back.outline == circle(10.0)
    assert front.coating == Coating("metal", metal="gold")
    assert front.acts is Acts.INTERFACE


def test_a_ground_back_ends_light_and_a_polished_one_lets_it_out(make, face_of):
    keys = "kind: mirror, diameter: 20, metal: gold"
    assert face_of(make(keys).geometry(), "back").acts is Acts.OPAQUE
    polished = face_of(make(f"{keys}, back: polished").geometry(), "back")
    assert polished.acts is Acts.INTERFACE
    assert polished.coating == UNCOATED


def test_what_it_absorbs_is_lost_of_s_and_p_alike(make):
    mirror = make("kind: mirror, diameter: 20, reflectance: {s: 99 %, p: 98 %}, absorbs: 0.5 %")
    coating = mirror.coating()
    assert coating.absorbs == (0.005, 0.005)
    assert (coating.general().s, coating.general().p) == (0.99, 0.98)


def test_from_behind_it_is_the_same_mirror_seen_through_its_glass(make):
    ways = make("kind: mirror, diameter: 20, metal: gold").branches()["reflected"]
    assert ways == (
        (("front", "reflected"),),
        (("back", "transmitted"), ("front", "reflected"), ("back", "transmitted")),
    )


@pytest.mark.parametrize(
    ("keys", "problem"),
    [
        (
            "glass: BK7",
            (
                "no coating is given",
                "either 'reflectance: 99.5 %' or 'metal: aluminium'",
                "add 'reflectance: 99.5 %', with the share that is meant",
            ),
        ),
        (
            "metal: gold, reflectance: 99 %",
            (
                "both a reflectance and a metal are given",
                "either 'reflectance: 99.5 %' or 'metal: aluminium'",
                "remove 'reflectance' or 'metal'",
            ),
        ),
        (
            "metal: gold, absorbs: 1 %",
            (
                "what a metal swallows follows from the metal",
                "'absorbs' only beside 'reflectance'",
                "remove 'absorbs'",
            ),
        ),
        (
            "reflectance: [{from: 1, to: 2, is: 50 %}, {from: 3, to: 4, is: 99 %}], absorbs: 2 %",
            (
                "'reflectance' and 'absorbs' add up to 1.01",
                "at most 1 together",
                "set 'absorbs' to 0.01 or less",
            ),
        ),
        (
            "reflectance: uncoated",
            (
                "reflectance: 'uncoated' is not a coating",
                REFLECTANCE,
                "write a coating, such as '99.5 %'",
            ),
        ),
        (
            "metal: gold, radius: 400 CC",
            (
                "radius: not yet: curved mirrors",
                "a layout without 'radius' here",
                "remove 'radius'",
            ),
        ),
        (
            "metal: gold, hole: 3",
            ("hole: not yet: mirrors with a hole", "a layout without 'hole' here", "remove 'hole'"),
        ),
        (
            "metal: gold, back: rough",
            (
                "back: 'rough' is not known here",
                "one of 'ground' or 'polished'",
                "write one of 'ground' or 'polished'",
            ),
        ),
    ],
)
def test_says_what_is_wrong(complaints, keys, problem):
    assert complaints(f"kind: mirror, diameter: 20, {keys}") == [problem]


def test_flat_is_no_curved_mirror(make):
    assert make("kind: mirror, diameter: 20, metal: gold, radius: flat").radius_mm == 0.0
