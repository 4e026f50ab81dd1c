import copy
import pickle

import pytest

from benchlay.named import NamedTuple


class Point(NamedTuple):
    x: float
    y: float = 2.0

    @property
    def total(self):
        return self.x + self.y


class Tagged(Point):
    def __repr__(self):
        return "tagged"


class Empty(NamedTuple):
    pass


def test_an_instance_is_a_tuple_with_names():
    point = Point(1.0)
    assert point == (1.0, 2.0)
    assert (point.x, point.y, point.total) == (1.0, 2.0, 3.0)
    assert Point(y=3.0, x=1.0) == (1.0, 3.0)
    assert repr(point) == "Point(x=1.0, y=2.0)"
    assert not hasattr(point, "__dict__")
    assert Empty() == ()


def test_copies_keep_the_class():
    point = Point(1.0)
    assert point._replace(y=5.0) == Point(1.0, 5.0)
    assert point._asdict() == {"x": 1.0, "y": 2.0}
    assert type(Point._make([3.0, 4.0])) is Point
    assert copy.copy(point) == point == pickle.loads(pickle.dumps(point))
    assert type(copy.deepcopy(point)) is Point


def test_a_class_of_a_class_keeps_the_fields_and_its_own_methods():
    tagged = Tagged(1.0)
    assert type(tagged) is Tagged
    assert tagged.total == 3.0
    assert repr(tagged) == "tagged"
    assert type(Point(1.0)) is Point


def test_it_can_be_matched_by_place():
    match Point(1.0, 4.0):
        case Point(x, y):
            assert (x, y) == (1.0, 4.0)


def test_what_does_not_fit_is_refused():
    with pytest.raises(TypeError):
        Point()
    with pytest.raises(TypeError):
        Point(1.0, 2.0, 3.0)
    with pytest.raises(TypeError):
        Point(1.0, z=3.0)
    with pytest.raises(TypeError, match="expected 2 values, got 1"):
        Point._make([1.0])
    with pytest.raises(ValueError, match="z"):
        Point(1.0)._replace(z=3.0)
    with pytest.raises(AttributeError):
        Point(1.0).x = 2.0
    with pytest.raises(TypeError, match="without default"):

        class Wrong(NamedTuple):
            x: float = 1.0
            y: float
