"""Of the holes of a bench only those are measured that may be the nearest."""

import numpy as np
import pytest

from benchlay.checks import hole_miss
from benchlay.geometry import convex


@pytest.mark.parametrize("share_there", [1.0, 0.5, 0.02])
@pytest.mark.parametrize("seed", range(20))
def test_the_nearest_is_that_of_all_holes(share_there, seed):
    rng = np.random.default_rng(seed)
    x = 12.5 + 25.0 * np.arange(rng.integers(1, 30))
    y = 7.5 + 25.0 * np.arange(rng.integers(1, 20))
    there = rng.random((len(y), len(x))) < share_there
    centre = rng.uniform(-400.0, 1200.0, 2)
    outline = convex.hull(centre + rng.uniform(-60.0, 60.0, (8, 2)))
    row, column = there.nonzero()
    every = np.stack((x[column], y[row]), axis=1)
    holes = hole_miss._Holes(x, y, there)
    assert hole_miss._stands_over(holes, outline) == (not convex.distances(every, outline).all())
    for place, away in (
        (outline, convex.distances(every, outline)),
        (centre[None], np.hypot(*(every - centre).T)),
    ):
        assert hole_miss._nearest(holes, place) == away.min(initial=np.inf)
