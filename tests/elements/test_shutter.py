"""Shutters."""

from benchlay.elements._kind import Acts
from benchlay.geometry.outline import circle, rectangle


def test_defaults(make):
    made = make("kind: shutter")
    assert (made.opening, made.size_mm, made.closed) == (circle(5.0), (50.0, 50.0), False)
    assert made.BLOCKS


def test_open_it_is_an_aperture(make):
    shutter = make("kind: shutter, opening: 8")
    (front,) = shutter.geometry().faces
    assert (front.acts, front.clear, front.outline) == (
        Acts.PASSES,
        circle(4.0),
        rectangle(50.0, 50.0),
    )
    assert not shutter.interrupts()


def test_closed_it_ends_light_on_its_whole_front(make):
    shutter = make("kind: shutter, opening: 8, closed: yes")
    (front,) = shutter.geometry().faces
    assert (front.acts, front.sink) == (Acts.OPAQUE, "screen")
    assert front.outline == front.clear == rectangle(50.0, 50.0)
    assert shutter.interrupts()
    assert shutter.geometry().solids == make("kind: shutter").geometry().solids


def test_closing_changes_no_way(make):
    """A route through a closed shutter is still the route that is meant."""
    assert make("kind: shutter, closed: yes").branches() == make("kind: shutter").branches()


def test_a_plate_smaller_than_the_default_opening_is_refused(complaints):
    assert complaints("kind: shutter, size: [8, 20]") == [
        (
            "the opening is 10 mm in width, its plate 8 mm",
            "an opening smaller than its plate",
            "write a larger 'size', or an 'opening' below 8",
        )
    ]


def test_closed_is_yes_or_no(complaints):
    assert complaints("kind: shutter, closed: maybe") == [
        ("closed: 'maybe' is not known here", "'yes' or 'no'", "write 'yes' or 'no'")
    ]
