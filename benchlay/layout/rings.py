"""Places that hang on one another in a ring, found from the names alone."""

from __future__ import annotations

from collections.abc import Iterator, Mapping

from benchlay.document.form import Reader
from benchlay.layout._forms import Ref
from benchlay.layout.elements import Element


def refuse_rings(elements: Mapping[str, Element], reader: Reader) -> None:
    """Report each ring of `after`, `aim` and `facing` once, at the first of its names.

    Placing would find the same rings; found here they are told together with all other
    mistakes in the file.
    """
    done: set[str] = set()
    for name in sorted(elements):
        ring = _ring(name, elements, done)
        if ring:
            done.update(ring)
            reader.complain(
                elements[ring[0]].span,
                "these places hang on one another: " + " → ".join((*ring, ring[0])),
                expected="places that lead back to a source, or to `at` with `facing`",
                remedy=f"give one of them, such as {ring[0]!r}, a place of its own: "
                "`at` and `facing`",
            )


def _ring(start: str, elements: Mapping[str, Element], done: set[str]) -> list[str]:
    """Return the first ring met from a name, empty if there is none that is not done."""
    path: list[str] = []
    where = [_hangs_on(start, elements)]
    path.append(start)
    seen = {start}
    while where:
        following = next(where[-1], None)
        if following is None:
            where.pop()
            path.pop()
        elif following in path:
            ring = path[path.index(following) :]
            return [] if done.intersection(ring) else ring
        elif following not in seen:
            seen.add(following)
            path.append(following)
            where.append(_hangs_on(following, elements))
    return []


def _hangs_on(name: str, elements: Mapping[str, Element]) -> Iterator[str]:
    """Yield the elements whose poses must be known first."""
    stand = elements[name].stand
    fixed = stand.at_mm is not None or stand.in_opening is not None or stand.hole is not None
    if not fixed or stand.facing is None:
        for item in stand.after:
            if item.item in elements:
                yield item.item
    for ref in (stand.aim, stand.facing):
        if isinstance(ref, Ref) and ref.name != name and ref.name in elements:
            looked_at = elements[ref.name].stand
            if looked_at.at_mm is None and looked_at.in_opening is None:
                yield ref.name
