"""Tolerances of kinds and of single elements; read whole, acted on by a later version."""

from __future__ import annotations

from typing import Any

from benchlay.document.form import Failed, Form, Reader
from benchlay.document.forms import Choice, Entries
from benchlay.document.nodes import Mapping, Node
from benchlay.document.record import Record, RecordForm, key
from benchlay.layout._forms import NOT_NEGATIVE, SPREAD, RefForm
from benchlay.named import NamedTuple


class Tolerance(Record):
    """How far an element may be from its solved pose."""

    yaw_rad: float = key(SPREAD, default=0.0, name="yaw", meaning="turned, seen from above")
    pitch_rad: float = key(SPREAD, default=0.0, name="pitch", meaning="tilted")
    along_mm: float = key(
        NOT_NEGATIVE, default=0.0, name="along", meaning="shifted along its normal"
    )
    left_mm: float = key(NOT_NEGATIVE, default=0.0, name="left", meaning="shifted sideways")
    up_mm: float = key(NOT_NEGATIVE, default=0.0, name="up", meaning="shifted in height")
    spread: str = key(
        Choice("normal", "uniform"),
        default="normal",
        meaning="normal: the figures are standard deviations; uniform: half widths",
    )


class Tolerances(NamedTuple):
    """Tolerances by kind or element name, and those of every plate's make."""

    by_name: Entries[Tolerance]
    thickness_mm: float = 0.0
    wedge_rad: float = 0.0


NO_TOLERANCES = Tolerances(Entries())
_MAKE: dict[str, Form[float]] = {"thickness": NOT_NEGATIVE, "wedge": SPREAD}


class TolerancesForm(Form[Tolerances]):
    """Reads a table of kinds and names, with `thickness` and `wedge` beside them."""

    _name = RefForm("a kind or an element")
    _record = RecordForm(Tolerance)

    def read(self, node: Node, reader: Reader) -> Tolerances | None:
        """Read every entry and report all problems."""
        if not isinstance(node, Mapping):
            reader.refuse(node, self)
            return None
        make: dict[str, float] = {}
        by_name: dict[str, Tolerance] = {}
        spans = {name.text: name.span for name, _ in node.pairs}
        for name, item in node.pairs:
            form: Form[Any] = _MAKE.get(name.text, self._record)
            value = reader.attempt(form, item, name.text)
            if isinstance(value, Tolerance):
                by_name[name.text] = value
            elif not isinstance(value, Failed):
                make[name.text] = value
        if len(make) + len(by_name) < len(node):
            return None
        entries = Entries(by_name, spans)
        return Tolerances(entries, make.get("thickness", 0.0), make.get("wedge", 0.0))

    def text(self) -> str:
        """Say what the table holds."""
        return "a table of kinds and element names with their tolerances, 'thickness' and 'wedge'"

    def example(self) -> str:
        """Give a sample."""
        return "{mirror: {yaw: 0.5 mrad}}"

    def schema(self) -> dict[str, Any]:
        """Allow both."""
        return {
            "type": "object",
            "properties": {name: form.schema() for name, form in _MAKE.items()},
            "additionalProperties": self._record.schema(),
        }

    def show(self, value: object) -> str:
        """Write the default as a user would."""
        return "none" if value == NO_TOLERANCES else str(value)
