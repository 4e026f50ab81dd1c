"""Rules of integration that are written down as numbers."""

import numpy as np
import pytest

from benchlay.optics._gauss import rule


@pytest.mark.parametrize("nodes", [8, 16])
def test_the_numbers_are_those_of_numpy(nodes):
    x, weight = np.polynomial.legendre.leggauss(nodes)
    own = rule(nodes)
    assert np.allclose(own[0], x, rtol=0.0, atol=1e-15)
    assert np.allclose(own[1], weight, rtol=0.0, atol=1e-15)


@pytest.mark.parametrize("nodes", [8, 16])
def test_polynomials_up_to_twice_the_nodes_are_integrated_exactly(nodes):
    x, weight = rule(nodes)
    for power in range(0, 2 * nodes, 2):
        assert weight @ x**power == pytest.approx(2.0 / (power + 1), rel=1e-13)
