"""Elements that say neither which way they face nor which beam arrives.

Placing would find them too; found here they are told together with all other mistakes in
the file.
"""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from collections.abc import Set as AbstractSet

from benchlay.document import nodes
from benchlay.document.form import Reader
from benchlay.document.nodes import Node
from benchlay.layout.elements import Element

_A_BEAM = "'after' with the item the beam comes from, or a route that names it"
_BY_A_BEAM = ("turn", "aim", "incidence")


def mentioned(routes: Node | None) -> frozenset[str]:
    """Return the names of all items in routes, those that could not be read among them."""
    return frozenset(text.partition(".")[0].strip() for text in _texts(routes))


def _texts(node: Node | None) -> Iterator[str]:
    if isinstance(node, nodes.Scalar):
        yield node.text
    elif isinstance(node, nodes.Sequence):
        for item in node.items:
            yield from _texts(item)
    elif isinstance(node, nodes.Mapping):
        for _, value in node.pairs:
            yield from _texts(value)


def refuse_faceless(
    elements: Mapping[str, Element], on_routes: AbstractSet[str], reader: Reader
) -> None:
    """Report each element that no beam is known to reach and that does not face anywhere."""
    for name, element in elements.items():
        stand = element.stand
        if stand.after or name in on_routes or element.record.leads_to() is not None:
            continue
        way = next((way for way in _BY_A_BEAM if stand.written(way)), None)
        if way is None and (stand.facing is not None or stand.in_opening is not None):
            continue
        reader.path = ["elements", name]
        if way is None:
            reader.complain(
                element.span,
                "nothing says which way it faces, and no beam is known to arrive",
                expected=f"'facing', or {_A_BEAM}",
                remedy="add 'facing: 90', or 'after'",
            )
        else:
            reader.complain(
                stand.spans[way],
                f"'{way}' needs to know which beam arrives",
                expected=_A_BEAM,
                remedy="add 'after', or use 'facing'",
            )
        reader.path = []
