"""What opens an enclosure: a side that is missing, unless a wall of the room closes it."""

import pytest

from benchlay.hazards.reach import why_open
from benchlay.pipeline import read
from benchlay.zones.enclosure_line import enclosure_line

BENCH = """\
bench: {{size: [800, 400], surface_height: 900}}
room: {{outline: [[-1000, -1000], [2000, -1000], [2000, {wall}], [-1000, {wall}]]}}
sources:
  red: {{wavelength: 633, power: 5 mW, beam: {{waist_radius: 0.5}}, at: [100, 200], heading: 0}}
enclosure:
  to_height: 200
  panels:
    south: {{from: [0, 0], to: [800, 0]}}
    east: {{from: [800, 0], to: [800, 400]}}
    west: {{from: [0, 400], to: [0, 0]}}
  lids: {{main: {{height: 200, outline: [[0, 0], [800, 0], [800, 400], [0, 400]]}}}}
"""


@pytest.mark.parametrize(("wall", "open_side"), [(400, False), (400.4, False), (402, True)])
def test_a_side_at_a_wall_of_the_room_is_shut(wall, open_side):
    layout = read("x.yaml", BENCH.format(wall=wall)).as_drawn
    because = why_open(layout, enclosure_line(layout))
    assert because == (("no panel closes 800 mm of the enclosure's side",) if open_side else ())
