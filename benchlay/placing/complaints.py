"""What is said of items that cannot be placed, before giving up on them."""

from __future__ import annotations

from typing import TYPE_CHECKING, NoReturn

from benchlay.placing.arrivals import Unplaceable

if TYPE_CHECKING:
    from benchlay.layout.elements import Element
    from benchlay.layout.sources import Source
    from benchlay.placing.solve import Solver


def complain(
    item: Source | Element, key: str, what: str, *, expected: str, remedy: str, solver: Solver
) -> NoReturn:
    """Report a problem at a key of an item, unless only trying, and give the item up."""
    if not solver.arrivals.trying:
        solver.problems.add(item.spans.get(key, item.span), what, expected=expected, remedy=remedy)
    raise Unplaceable(item.name)


def no_ray(element: Element, solver: Solver) -> NoReturn:
    """Say that the ray that arrives is not known."""
    way = next((k for k in ("turn", "aim", "incidence") if k in element.spans), None)
    name = element.name
    if way is not None:
        what = f"`{way}` needs to know which beam arrives at {name!r}"
        expected = "`after` with the item the beam comes from"
        remedy = "add `after`, or use `facing`"
    else:
        what = f"nothing says which way {name!r} faces, and no beam is known to arrive"
        expected = "`facing`, or `after` with the item the beam comes from"
        remedy = "add `facing: 90`, or `after`"
    complain(element, way or "kind", what, expected=expected, remedy=remedy, solver=solver)
