"""Accepted findings: kept on the record and out of the verdict, within bounds."""

from __future__ import annotations

import re
from typing import Any

from benchlay.document.form import Form, Reader
from benchlay.document.forms import Date, Entries, Quantity, RecordForm, Table, Text
from benchlay.document.nodes import Node, Scalar
from benchlay.document.quantity import Dimension, QuantityError, parse
from benchlay.document.record import Record, key
from benchlay.layout._forms import NOT_NEGATIVE, PLACE
from benchlay.named import NamedTuple

_MEASURED = (
    Dimension.POWER,
    Dimension.IRRADIANCE,
    Dimension.ENERGY,
    Dimension.FLUENCE,
    Dimension.DURATION,
    Dimension.ANGLE,
    Dimension.LENGTH,
    Dimension.RATIO,
)
_BARE = Quantity(Dimension.RATIO)
_NUMBER = re.compile(r"[+-]?[0-9.]+([eE][+-]?[0-9]+)?")


class Amount(NamedTuple):
    """A value in the unit that the finding has; `dimension` is None for a bare number."""

    value: float
    dimension: Dimension | None
    text: str


class AmountForm(Form[Amount]):
    """Reads a quantity of any dimension; the finding's own unit decides whether it fits."""

    def read(self, node: Node, reader: Reader) -> Amount | None:
        """Read a bare number, or a number whose unit tells the dimension."""
        if not isinstance(node, Scalar) or not node.text.strip():
            reader.refuse(node, self)
            return None
        text = node.text.strip()
        if _NUMBER.fullmatch(text):
            number = _BARE.read(node, reader)
            return None if number is None else Amount(number, None, text)
        for dimension in _MEASURED:
            try:
                return Amount(parse(text, dimension), dimension, text)
            except QuantityError:
                continue
        reader.refuse(node, self)
        return None

    def text(self) -> str:
        """Say what may be written."""
        return "the value that may be reached, with the finding's unit"

    def example(self) -> str:
        """Give a sample."""
        return "'2 mW'"

    def schema(self) -> dict[str, Any]:
        """Allow numbers and text."""
        return {"type": ["number", "string"]}


class Bound(Record):
    """Where an element must stay for the acceptance to hold."""

    at_mm: tuple[float, ...] = key(PLACE, name="at", meaning="its place when it was accepted")
    within_mm: float = key(NOT_NEGATIVE, name="within", meaning="how far from it it may stand")


class Accept(Record):
    """One accepted finding."""

    finding: str = key(Text(200, what="a finding's id"), meaning="the finding's id, as printed")
    reason: str = key(Text(1000, lines=True), meaning="why it is accepted")
    by: str = key(Text(80, what="a role"), meaning="who accepted it: a role or initials")
    until: str = key(Date(), meaning="the day up to which it holds")
    at_most: Amount | None = key(
        AmountForm(), default=None, meaning="the value up to which it holds"
    )
    bound: Entries[Bound] = key(
        Table(RecordForm(Bound)), default=Entries(), meaning="elements that must stay in place"
    )
