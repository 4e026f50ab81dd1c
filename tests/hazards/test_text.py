"""The hazards of a bench as the terminal shows them, whole."""

# ruff: noqa: E501 - lines as long as they are printed

import re

from judged import BOX, TWO, hazards, review

from benchlay.exposure.cautions import CAUTIONS, DECIDING
from benchlay.report.hazards_text import hazard_lines
from benchlay.report.text import check_text, verdict_line

WHOLE = """\
hazards in as drawn (IEC 60825-1:2014)
  source green, 532 nm, 0.15 W: within the limit of class 3B as modelled; 0 m to 289 m (far-field formula 289 m)
  in reach (outside the enclosure, shut as drawn): no light that was followed gets there: within the limit of class 1 as modelled
  inside: within the limit of class 3B as modelled; the worst: 532 nm from green
  eyewear inside, panels open, 532 nm: OD 2.6, D LB5; worst: green itself
  eyewear outside, 532 nm: limit not exceeded as modelled
  scattered from S1, 532 nm: look at it from 0.1 m (limit met at 21.9 mm) or more
  controlled area in plan … m², none of it outside the enclosure: whoever opens the enclosure needs the eyewear for inside
  desk (seated): outside the controlled area, … m from its edge
  path (standing): outside the controlled area, … m from its edge
  not reached by it: door corridor
  holds for exposures of up to 100 s in all (532 nm)

hazards in alignment (IEC 60825-1:2014)
  source green, 532 nm, 0.3 mW: within the limit of class 1 as modelled; limit not exceeded as modelled
  in reach (panel east is open): within the limit of class 1 as modelled; the worst: 532 nm from green
  outside the enclosure: no light that was followed gets there: within the limit of class 1 as modelled
  eyewear inside, panels open, 532 nm: limit not exceeded as modelled
  eyewear outside, 532 nm: limit not exceeded as modelled
  controlled area in plan … m²: the limit is exceeded nowhere, as modelled
  desk (seated): outside the controlled area
  path (standing): outside the controlled area
  not reached by it: door corridor
  holds for exposures of up to 100 s in all (532 nm)

hazards in service (IEC 60825-1:2014)
  source green, 532 nm, 0.15 W: within the limit of class 3B as modelled; 0 m to 289 m (far-field formula 289 m)
  in reach (panel east is open): within the limit of class 3B as modelled; the worst: 532 nm from green
  outside the enclosure: within the limit of class 3B as modelled; the worst: 532 nm from S1.front
  eyewear inside, panels open, 532 nm: OD 2.6, D LB5; worst: green itself
  eyewear outside, 532 nm: OD 2.6, D LB5; worst: S1.front, beam 1
  beam in reach, 532 nm from S1.front, beam 1: 0 m to 288 m (far-field formula 289 m); stopped at 2.5 m, a wall of the room
  beam in reach, 532 nm from green itself: 0 m to 289 m (far-field formula 289 m); stopped at 0.4 m, 'S1'
  scattered from wall, 532 nm: look at it from 0.1 m (limit met at 69.1 mm) or more
  controlled area in plan … m²: in it only with the eyewear of this state
  desk (seated): outside the controlled area, … m from its edge
  path (standing): INSIDE the controlled area, … mm from its edge
  door corridor: REACHED by the controlled area
  holds for exposures of up to 100 s in all (532 nm)
"""


def without_areas(text):
    """Leave out the figures that come from the zones, which have tests of their own."""
    return re.sub(r"[\d.]+ (m²|m from its edge|mm from its edge)", r"… \1", text)


def test_the_hazards_of_a_bench_in_full():
    found = hazards(BOX)
    assert without_areas("\n".join(hazard_lines(tuple(found.values())))) == WHOLE


def test_they_stand_before_the_verdict_with_their_cautions():
    text = check_text([review(BOX)])
    assert WHOLE in without_areas(text)
    assert text.index("hazards in service") < text.index(verdict_line(review(BOX)))
    assert all(f"caution: {words}" in text for words in CAUTIONS)


def test_a_plain_check_says_nothing_of_them():
    short = review(BOX)._replace(hazards=(), signs=())
    text = check_text([short])
    assert "hazards in" not in text
    assert not any(words in text for words in set(CAUTIONS) - set(DECIDING))


def test_one_set_of_eyewear_is_asked_for():
    text = "\n".join(hazard_lines(tuple(hazards(TWO).values())))
    assert "one set of eyewear must do for all these wavelengths at once" in text
