"""All forms under one name."""

from __future__ import annotations

from benchlay.document.alternatives import OneOf
from benchlay.document.composite import Entries, Fixed, ListOf, Pair, Table
from benchlay.document.form import FAILED, Failed, Form, Reader, show_plainly
from benchlay.document.record import RecordForm
from benchlay.document.scalars import (
    Choice,
    ChoiceOf,
    Quantity,
    Single,
    Whole,
    Words,
    YesNo,
)
from benchlay.document.texts import Date, Deferred, Name, Text
from benchlay.document.units import Dimension

__all__ = [
    "FAILED",
    "Choice",
    "ChoiceOf",
    "Date",
    "Deferred",
    "Dimension",
    "Entries",
    "Failed",
    "Fixed",
    "Form",
    "ListOf",
    "Name",
    "OneOf",
    "Pair",
    "Quantity",
    "Reader",
    "RecordForm",
    "Single",
    "Table",
    "Text",
    "Whole",
    "Words",
    "YesNo",
    "show_plainly",
]
