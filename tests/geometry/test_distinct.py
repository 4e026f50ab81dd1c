"""Distinct numbers, beside numpy's own way."""

import numpy as np
from hypothesis import given
from hypothesis import strategies as st

from benchlay.geometry.distinct import distinct, ranked


@given(st.lists(st.integers(-5, 5)))
def test_as_numpy_has_it(values):
    array = np.array(values, dtype=np.int64)
    names, places = np.unique(array, return_inverse=True)
    assert distinct(array).tolist() == names.tolist()
    own_names, own_places = ranked(array)
    assert own_names.tolist() == names.tolist()
    assert own_places.tolist() == places.tolist()
