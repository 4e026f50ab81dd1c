"""What fills the title block and how sheets are made; nothing is taken from the clock."""

from __future__ import annotations

from benchlay.document.forms import Choice, Date, ListOf, Text
from benchlay.document.record import Record, key

# Lengths of fields as ISO 7200 recommends them, where it does.
_OWNER, _NUMBER, _PERSON = 60, 16, 20


class Drawing(Record):
    """What fills the title block."""

    owner: str = key(Text(_OWNER, sample="workshop"), default="", meaning="legal owner")
    number: str = key(Text(_NUMBER, sample="B-001"), default="", meaning="identification number")
    date: str = key(Date(), default="", meaning="date of issue")
    drawn_by: str = key(Text(_PERSON), default="", meaning="creator: role or initials")
    approved_by: str = key(Text(_PERSON), default="", meaning="approval: role or initials")
    sheet: str = key(
        Choice("auto", "A4", "A3", "A2", "A1", "A0"), default="auto", meaning="sheet size"
    )
    scale: str = key(
        Text(12, r"auto|[1-9][0-9]*:[1-9][0-9]*", what="a scale", sample="1:5"),
        default="auto",
        meaning="scale of the plan",
    )
    projection: str = key(Choice("first", "third"), default="first", meaning="angle of projection")
    decimal: str = key(
        Choice("point", "comma"), default="point", meaning="decimal sign on the sheets"
    )
    notes: tuple[str, ...] = key(
        ListOf(Text(200), max=50), default=(), meaning="notes printed on the plan"
    )


class Revision(Record):
    """A row of the revision table."""

    rev: str = key(Text(4, sample="A"), meaning="revision index")
    date: str = key(Date(), meaning="its date")
    what: str = key(Text(200), meaning="what changed")
    by: str = key(Text(_PERSON), meaning="role or initials")
