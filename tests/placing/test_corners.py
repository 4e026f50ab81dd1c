"""The nominal ray off a corner cube."""

import numpy as np


def test_it_goes_back_beside_itself(standing):
    placed = standing(
        "  R: {kind: retroreflector, after: laser, at: [500, 455, 97], facing: 175,"
        " diameter: 40}\n"
        "  T: {kind: target, after: R, distance: 200}\n"
    )
    point, direction = placed.ray("T")
    np.testing.assert_allclose(direction, [-1, 0, 0], atol=1e-12)
    np.testing.assert_allclose(point[1:], [460, 94], atol=1e-9)
