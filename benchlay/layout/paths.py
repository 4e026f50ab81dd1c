"""What compares and combines routes: matched paths and open cavities."""

from __future__ import annotations

from benchlay.document.forms import ListOf, Pair, Quantity
from benchlay.document.quantity import Dimension
from benchlay.document.record import Record, key
from benchlay.layout._forms import NOT_NEGATIVE, Ref, RefForm

_ROUTES = ListOf(RefForm("a route"), min=2, max=100)
_ELEMENT = RefForm("an element")


class Matched(Record):
    """Routes whose optical paths are meant to be equal."""

    routes: tuple[Ref, ...] = key(_ROUTES, meaning="the routes compared")
    within_mm: float = key(
        NOT_NEGATIVE, name="within", meaning="how far their optical paths may differ"
    )


class Cavity(Record):
    """An open cavity between two mirrors."""

    between: tuple[Ref, Ref] = key(Pair(_ELEMENT), meaning="its end mirrors")
    through: tuple[Ref, ...] = key(
        ListOf(_ELEMENT), default=(), meaning="what stands between them, in order"
    )
    gain_per_pass: float = key(
        Quantity(Dimension.RATIO, at_least=0.0), default=0.0, meaning="gain on one pass"
    )
