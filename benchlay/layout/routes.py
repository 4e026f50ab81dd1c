"""Routes: what the drafter means a beam to do."""

from __future__ import annotations

from typing import Any

from benchlay.document.form import Failed, Form, Reader
from benchlay.document.forms import OneOf, RecordForm, Whole
from benchlay.document.nodes import Mapping, Node, Scalar, Sequence
from benchlay.document.record import Record, key
from benchlay.document.span import Span
from benchlay.layout._forms import ANGLE, LENGTH, NOT_NEGATIVE, POWER, SHARE, SPREAD, DottedForm
from benchlay.layout.light import PolarizationForm
from benchlay.named import NamedTuple

_MAX_TIMES = 1_000
_MAX_ITEMS = 10_000


class RouteItem(NamedTuple):
    """An item of a route: `part` is what follows the dot, as written (empty if nothing does).

    After the references are checked exactly one of `branch`, `wavelength_nm` and `opening`
    may be set, whichever the part means.
    """

    name: str
    part: str
    span: Span
    branch: str | None = None
    wavelength_nm: float | None = None
    opening: tuple[str, str] | None = None


class _WantedAngle(Record):
    angle_rad: float = key(ANGLE, name="angle", meaning="from horizontal")
    within_rad: float = key(SPREAD, name="within", meaning="how far it may be off")


class _WantedPath(Record):
    is_mm: float = key(LENGTH, name="is", meaning="optical path")
    within_mm: float = key(NOT_NEGATIVE, name="within", meaning="how far it may be off")


class Needs(Record):
    """What must arrive at the end of a route."""

    transmits: float | None = key(SHARE, default=None, meaning="least share that arrives")
    power_w: float | None = key(
        POWER, default=None, name="power", meaning="least power that arrives"
    )
    polarization: Any = key(
        OneOf(RecordForm(_WantedAngle), PolarizationForm()),
        default=None,
        meaning="state of polarization that arrives",
    )
    path: _WantedPath | None = key(
        RecordForm(_WantedPath), default=None, meaning="optical path from the source"
    )


def _too_long(node: Node, reader: Reader) -> None:
    reader.complain(
        node,
        f"the route has more than {_MAX_ITEMS} items",
        expected=f"at most {_MAX_ITEMS} items, repeated ones counted",
        remedy="shorten the route, or lower 'times'",
    )


class _ItemForm(Form[tuple[RouteItem, ...]]):
    """Reads one item, or a repeated run of items as `{times: 12, through: [A, B]}`."""

    _dotted = DottedForm("an item of a route", "M1", "BS1.reflected", "green.1064", "east.port")

    def read(self, node: Node, reader: Reader) -> tuple[RouteItem, ...] | None:
        """Return the items it stands for."""
        if isinstance(node, Mapping):
            repeat: tuple[RouteItem, ...] | None = REPEAT.read(node, reader)
            return repeat
        found = self._dotted.read(node, reader)
        return None if found is None else (RouteItem(*found),)

    def text(self) -> str:
        """Say what it names."""
        return self._dotted.text()

    def example(self) -> str:
        """Give a sample."""
        return "'M1'"

    def schema(self) -> dict[str, Any]:
        """Allow both ways."""
        return {"anyOf": [self._dotted.schema(), REPEAT.schema()]}


class _ItemsForm(Form[tuple[RouteItem, ...]]):
    """Reads a list of items, repeated runs written out."""

    def __init__(self, least: int, item: Form[tuple[RouteItem, ...]]) -> None:
        self.least, self.item = least, item

    def read(self, node: Node, reader: Reader) -> tuple[RouteItem, ...] | None:
        """Read every item and report all problems."""
        if not isinstance(node, Sequence) or len(node) < self.least:
            reader.refuse(node, self)
            return None
        items: list[RouteItem] = []
        failed = False
        for k, item in enumerate(node.items, start=1):
            value = reader.attempt(self.item, item, f"[{k}]")
            if isinstance(value, Failed):
                failed = True
            elif len(items) + len(value) <= _MAX_ITEMS:
                items += value
            else:
                _too_long(item, reader)
                return None
        return None if failed else tuple(items)

    def takes(self, node: Node) -> bool:
        """Take lists."""
        return isinstance(node, Sequence)

    def text(self) -> str:
        """Say what the list holds."""
        return f"a list of at least {self.least} items, [source, element, …, element]"

    def example(self) -> str:
        """Give a sample."""
        return "[green, M1]"

    def schema(self) -> dict[str, Any]:
        """Give the schema of the items."""
        return {"type": "array", "items": self.item.schema(), "minItems": self.least}


class _Repeat(Record):
    times: int = key(Whole(1, _MAX_TIMES), meaning="how often")
    through: tuple[RouteItem, ...] = key(
        _ItemsForm(1, _ItemForm()), meaning="the items met every time, in order"
    )


class _RepeatForm(Form[tuple[RouteItem, ...]]):
    """Reads `{times: 12, through: [A, B]}`."""

    _form = RecordForm(_Repeat)

    def read(self, node: Node, reader: Reader) -> tuple[RouteItem, ...] | None:
        """Return the items, as often as asked for."""
        keys = self._form.read(node, reader)
        if keys is None:
            return None
        if len(keys.through) * keys.times > _MAX_ITEMS:
            _too_long(node, reader)
            return None
        return keys.through * keys.times

    def text(self) -> str:
        """Say how it is written."""
        return "'{times: 12, through: [A, B]}'"

    def schema(self) -> dict[str, Any]:
        """Give the schema; runs within runs are read too, but not described."""
        item = DottedForm("an item", "M1").schema()
        return {
            "type": "object",
            "properties": {
                "times": Whole(1, _MAX_TIMES).schema(),
                "through": {"type": "array", "items": item, "minItems": 1},
            },
            "required": ["times", "through"],
            "additionalProperties": False,
        }


REPEAT = _RepeatForm()
ITEMS = _ItemsForm(2, _ItemForm())


class RouteKeys(Record):
    """A route with needs; without needs its list of items is enough: `[green, M1, sample]`."""

    path: tuple[RouteItem, ...] = key(ITEMS, meaning="the items in order, a source first")
    needs: Needs | None = key(
        RecordForm(Needs),
        default=None,
        meaning="what must arrive",
    )


class Route(NamedTuple):
    """A route; repeated runs are written out."""

    name: str
    items: tuple[RouteItem, ...]
    needs: Needs | None
    span: Span


ROUTE = OneOf(ITEMS, RecordForm(RouteKeys))


def read_route(name: Scalar, node: Node, reader: Reader) -> Route | None:
    """Read one entry of `routes`; None after problems. What it names is checked later."""
    value = ROUTE.read(node, reader)
    if isinstance(value, RouteKeys):
        return Route(name.text, value.path, value.needs, name.span)
    return None if value is None else Route(name.text, value, None, name.span)
