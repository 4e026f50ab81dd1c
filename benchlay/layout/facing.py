"""Elements that say neither which way they face nor which beam arrives.

Placing would find them too; found here they are told together with all other mistakes in
the file.
"""

from __future__ import annotations

from collections.abc import Mapping

from benchlay.document.form import Reader
from benchlay.layout.elements import Element

_A_BEAM = "'after' with the item the beam comes from"
_BY_A_BEAM = ("turn", "aim", "incidence")


def refuse_faceless(elements: Mapping[str, Element], reader: Reader) -> None:
    """Report each element that no beam is known to reach and that does not face anywhere."""
    for name, element in elements.items():
        stand = element.stand
        if stand.after or element.record.leads_to() is not None:
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
