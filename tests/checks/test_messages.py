"""What every check says of its own faulty example, in full."""

import pytest

from benchlay.checks import CHECKS
from benchlay.findings import Finding

SAID = {
    "clipped": (
        "13.5 % (677 µW) of the beam of 'main' ends on the rim of 'A1', met in the middle",
        "a loss of at most 1 %; this beam loses more even through the middle",
        "widen its clear region from 4 mm to 6.08 mm, or make the beam narrower there",
    ),
    "off-height": (
        "the beam of 'main' meets 'M1' 1 mm below its mark",
        "at most 0.5 mm above or below it",
        (
            "lower 'M1' by 1 mm, or level the beam before it; if it is meant to be met there,"
            " say so with `beam_at`"
        ),
    ),
    "off-centre": (
        (
            "the beam of 'main' meets 'L1' 1.67 mm beside its mark, on the left as seen along"
            " its front normal"
        ),
        "at most 0.5 mm to either side",
        (
            "move 'L1' by 1.67 mm to that side, or steer the beam before it; if it is meant "
            "to be met there, say so with `beam_at`"
        ),
    ),
    "route-broken": (
        (
            "route 'main' breaks between 'M1' and 'T1': the beam (4.95 mW) leaves the bench "
            "and meets nothing"
        ),
        "the beam that leaves 'M1' meets 'T1' and goes on as named",
        "turn 'M1' so that the beam meets 'T1', or move 'T1' there",
    ),
    "beam-blocked": (
        ("the body of 'supply' takes 5.87 % (293 µW) of the beam of 'main' between 'red' and 'T1'"),
        "nothing that takes more than 1 % between the two",
        ("move 'supply' out of the way, or name it in the route if the beam is meant to go there"),
    ),
    "stray-unstopped": (
        (
            "2.62 mW of stray 633 nm light from 'red', reflected by 'W1.front', leaves the "
            "bench and meets nothing: 68 W/m2 over 7 mm, 6.8 times the limit of 10 W/m2 for "
            "100 s (IEC 60825-1:2014, table A.1; thermal)"
        ),
        (
            "at most 385 µW that ends elsewhere than on a dump, screen, closed shutter, "
            "panel, lid or tube"
        ),
        ("stop it with a dump or screen, for instance at [300, 300, 100] with `facing: 270`"),
    ),
    "escape": (
        (
            "4.94 mW of 633 nm from 'red', last at 'M1', passes over panel 'north' at a "
            "height of 202.95 mm: 128 W/m2 over 7 mm, 12.8 times the limit of 10 W/m2 for 100"
            " s (IEC 60825-1:2014, table A.1; thermal)"
        ),
        "at most 385 µW beyond the enclosure",
        "end it on a dump or screen before, or raise 'north' to 205 mm",
    ),
    "open-side": (
        (
            "the south/east corner is open, 12 mm wide; 5 mW of 633 nm from 'red' could be "
            "sent there from 'T1': 130 W/m2 over 7 mm, 13 times the limit of 10 W/m2 for 100 "
            "s (IEC 60825-1:2014, table A.1; thermal)"
        ),
        "no gap wider than 0.1 mm round hazardous light",
        "close it with a panel from [788, 0] to [800, 0], or let 'south' and 'east' meet",
    ),
    "opening-mirror": (
        (
            "one flat mirror between 'red' and 'T1' could throw 50 mW of 633 nm from 'red' "
            "out through 'north.slot': 1.3 kW/m2 over 7 mm, 130 times the limit of 10 W/m2 "
            "for 100 s (IEC 60825-1:2014, table A.1; thermal)"
        ),
        (
            "no line of sight from a beam above 5 mW (class 3B or 4) to a gap, but where a "
            "tube holds it"
        ),
        (
            "close 'north.slot', put the beam in tubes, or cover 'north.slot' on the inside "
            "by a labyrinth: a sheet 10 mm from 'north' that overlaps it by 11 mm on every "
            "side"
        ),
    ),
    "probe-access": (
        (
            "a probe of 12 mm diameter reaches 5 mW of 633 nm from 'red', 52 mm inside "
            "'north.slot': 130 W/m2 over 7 mm, 13 times the limit of 10 W/m2 for 100 s (IEC "
            "60825-1:2014, table A.1; thermal)"
        ),
        "no hazardous beam within 80 mm of a gap that admits 12 mm",
        (
            "make 'north.slot' narrower than 12 mm, lengthen its passage to 30.1 mm "
            "(`depth`), or put the beam in a tube"
        ),
    ),
    "panel-overload": (
        "'east' takes 416 W/cm2 of 532 nm from 'green' and is rated for 20 W/cm2",
        "at most 20 W/cm2",
        "end the beam on a dump before 'east', or rate 'east' for it",
    ),
    "dump-overload": (
        "'D1' takes 2 W, most of it 532 nm from 'green', and withstands 1 W",
        "at most 1 W",
        "use a dump rated for 2 W or more instead of 'D1'",
    ),
    "no-interlock": (
        (
            "panel 'south' can be opened with a tool and has no interlock; inside runs 5 mW "
            "of 633 nm from 'red': 130 W/m2 over 7 mm, 13 times the limit of 10 W/m2 for 100 "
            "s (IEC 60825-1:2014, table A.1; thermal)"
        ),
        "an interlock, or at most 385 µW inside",
        "give 'south' an interlock (`access: interlocked`), or fix it for good",
    ),
    "into-source": (
        (
            "206 µW of 633 nm from 'red', sent back by 'W1.front', comes back into 'red', 0 "
            "mm from its middle and 0° from its axis"
        ),
        "at most 500 nW within its exit and acceptance",
        "tilt 'W1', or put an isolator before it",
    ),
    "mount-clash": (
        "the body of 'box2' stands 2.9 mm from the body of 'box1'",
        "a clearance of at least 3 mm",
        "move 'box2' or 'box1' apart by 0.1 mm or more",
    ),
    "off-bench": (
        "the foot of 'M1' reaches 40.56 mm beyond the edge of the bench",
        "everything that stands on the bench within its outline",
        "move 'M1' inwards by 40.6 mm or more",
    ),
    "hole-miss": (
        "no mounting hole is under the foot of 'M1'; the next is 10.36 mm out of reach",
        "a hole under the foot",
        "move 'M1' by 10.4 mm, or give it a larger foot",
    ),
    "fit-for-making": (
        "a hole of 6.6 mm in panel 'south' has its middle 8 mm from an edge",
        "at least 1.5 diameters, 9.9 mm",
        "move the row by 1.9 mm (`inset`, `pitch`), or move the opening",
    ),
    "tight-access": (
        "'supply' stands in the way of a driver to the adjusters of 'M1' (back)",
        "a straight corridor 25 mm wide and 100 mm long",
        "move 'supply', or turn the adjusters to another side (`mount: {adjusters: …}`)",
    ),
    "off-brewster": (
        (
            "'W1' is meant to stand at Brewster's angle and sends 24.2 % of 633 nm light "
            "aside on every pass; it is met at 55.537°, Brewster's angle there is 55.537°"
        ),
        "at most 0.2 % a pass",
        (
            "turn the polarization before 'W1' into its plane of incidence, or turn 'W1' "
            "about the beam"
        ),
    ),
    "coating-unstated": (
        (
            "the front of 'M1' says nothing of 633 nm, and 5 mW of it from 'red' meets it "
            # 5 mW over 38.48 mm2 is 129.9 W/m2.
            "(through one aperture: 130 W/m2 over 7 mm, 13 times the limit of 10 W/m2 for 100 s "
            "(IEC 60825-1:2014, table A.1; thermal)); the bare material is assumed"
        ),
        "a coating that states its reflectance at 633 nm",
        (
            "add a band with 633 nm to the coating of 'M1', such as `{from: 623, to: 643, is:"
            " …}` with the maker's figure"
        ),
    ),
    "polarization-lost": (
        (
            "the beam of route 'main' arrives with 25 % of its power linear at 90° (main "
            "direction 30°, ellipticity 0°, degree 100 %)"
        ),
        "at least 99 % of it linear at 90°",
        "set a waveplate before its end, or look for the fold that turns the state",
    ),
    "needs-unmet": (
        "459 µW arrive by route 'main'",
        "at least 1 mW",
        "raise the power of the source, or lose less on the way",
    ),
    "eye-level": (
        (
            "5 mW of 633 nm from 'red' itself runs 1.38 m above the floor, where 'operator' "
            "(standing) has their eyes: 130 W/m2 over 7 mm, 13 times the limit of 10 W/m2 for"
            " 100 s (IEC 60825-1:2014, table A.1; thermal)"
        ),
        ("nothing above the accessible limit between 1.37 m and 1.98 m outside a closed enclosure"),
        "lower or raise the beam, or enclose it",
    ),
    "at-door": (
        (
            "4.94 mW of 633 nm from 'red', last at 'M1', reaches door 'corridor': 128 W/m2 "
            "over 7 mm, 12.8 times the limit of 10 W/m2 for 100 s (IEC 60825-1:2014, table "
            "A.1; thermal); how far it goes on beyond is not computed"
        ),
        "at most 385 µW at doors and windows",
        "end the beam on a dump or screen before it reaches door 'corridor'",
    ),
    "dark-element": (
        "no beam reaches mirror 'M9', in any state",
        "a beam that meets it in one state at least",
        "remove 'M9', or bring a beam to it",
    ),
    "unaccounted": (
        (
            "631 µW of 532 nm from 'green' lies under the power floor and was not followed "
            # 631 µW over 38.48 mm2 is 16.4 W/m2.
            "(the largest single beam: 94.7 µW); all through one aperture: 16.4 W/m2 over 7 mm, "
            "1.64 times the limit of 10 W/m2 for 100 s (IEC 60825-1:2014, table A.1; thermal)"
        ),
        ("at most 385 µW, the lesser of the accessible limit and a thousandth of what is emitted"),
        "lower `limits.floor`, or look for two faces that send light to and fro",
    ),
    "as-modelled": (
        "the face reflections of thin lens 'L1' are those of a lens with two equal radii",
        "results that are read with this in mind",
        "know where they come to a focus only as far as the true radii agree",
    ),
    "not-yet": (
        "tolerances: not yet: tolerances are sampled by a later version",
        "keys that this version acts on",
        "leave the key if it is meant for later; nothing depends on it now",
    ),
}


@pytest.mark.parametrize("module", CHECKS, ids=lambda m: m.NAME)
def test_message(module, make_context, example):
    found = [
        item
        for item in module.check(make_context(example(module, "Fails")), 0)
        if isinstance(item, Finding)
    ]
    assert (found[0].message, found[0].expected, found[0].remedy) == SAID[module.NAME]
