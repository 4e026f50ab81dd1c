"""Results as JSON: one document, the same bytes for the same input."""

from __future__ import annotations

import json
from collections.abc import Mapping, Sequence
from typing import TYPE_CHECKING, Any, TypeAlias

from benchlay.document.problems import Problem
from benchlay.report.cautions import CAUTIONS, IN_FULL
from benchlay.report.details import Ledger, TraceResult
from benchlay.report.matrix import matrix_of
from benchlay.report.model import LayoutErrors, Review
from benchlay.report.numbers import decimals_of, rounded, settled

if TYPE_CHECKING:
    from benchlay.report.faults import FaultsResult

Json: TypeAlias = Any
"""What the standard library's `json` can write."""


def check_document(results: Sequence[Review | LayoutErrors], *, version: str) -> dict[str, Json]:
    """Return the document of ``check --json`` and of ``findings.json``."""
    return {
        "benchlay": version,
        "reviews": [review_object(result) for result in results],
        "cautions": list(IN_FULL),
    }


def review_object(result: Review | LayoutErrors) -> dict[str, Json]:
    """Return what is said of one layout."""
    if isinstance(result, LayoutErrors):
        return {
            "layout": result.layout,
            "errors": [_problem(problem) for problem in result.errors],
        }
    fields = result._asdict()
    del fields["lines"], fields["faults"]
    if fields["remedies"] is None:  # they were not asked for
        del fields["remedies"]
    written = {key: plain(value, key) for key, value in fields.items()}
    written["matrix"] = plain(matrix_of(result), "matrix")
    written["ledger"] = [_ledger(entry) for entry in result.ledger]
    head = ("layout", "sha256", "title", "revision", "as_of")
    return {
        **{key: written.pop(key) for key in head},
        "verdict": result.verdict,
        **written,
    }


def trace_document(result: TraceResult | LayoutErrors) -> dict[str, Json]:
    """Return the document of ``trace --json`` and of ``beams.json``."""
    if isinstance(result, LayoutErrors):
        return review_object(result)
    return {
        "state": result.state,
        "beams": plain(result.beams, "beams"),
        "placed": plain(result.placed, "placed"),
        "ledger": [_ledger(entry) for entry in result.ledger],
        "cautions": list(CAUTIONS),
    }


def faults_document(result: FaultsResult | LayoutErrors, *, version: str) -> dict[str, Json]:
    """Return the document of ``faults --json`` and of ``faults.json``."""
    if isinstance(result, LayoutErrors):
        return review_object(result)
    written: dict[str, Json] = plain(result, "faults")
    return {
        "benchlay": version,
        **written,
        "tolerance": None,
        "cautions": list(IN_FULL),
    }


def dumps(document: Json) -> str:
    """Write a document: indented, ASCII whatever the locale, ended by a new line."""
    return json.dumps(document, indent=1, ensure_ascii=True, allow_nan=False) + "\n"


def plain(value: object, key: str = "") -> Json:
    """Turn results into what `json` writes, numbers rounded as their key asks.

    Raises
    ------
    TypeError
        For a value that no result holds, such as an array: the pipeline's mistake.
    """
    if value is None or isinstance(value, (str, bool)):
        return value
    if isinstance(value, float):
        return rounded(value, decimals_of(key))
    if isinstance(value, int):
        return int(value)
    if isinstance(value, Mapping):
        return {str(name): plain(inner, key) for name, inner in value.items()}
    if isinstance(value, tuple) and hasattr(value, "_fields"):
        return {_json_key(name): plain(getattr(value, name), name) for name in value._fields}
    if isinstance(value, (tuple, list)):
        return [plain(inner, key) for inner in value]
    msg = f"{key} must hold plain Python values, got {type(value).__name__}"
    raise TypeError(msg)


def _json_key(field: str) -> str:
    return field.removesuffix("_")


def _ledger(entry: Ledger) -> dict[str, Json]:
    """Write a ledger entry; what is unaccounted is a difference, so its noise is cut."""
    written: dict[str, Json] = plain(entry, "ledger")
    written["sinks"] = [
        {key: value for key, value in sink.items() if key != "largest_W" or value is not None}
        for sink in written["sinks"]
    ]
    written["unaccounted_W"] = rounded(settled(entry.unaccounted_W, entry.emitted_W))
    return written


def _problem(problem: Problem) -> dict[str, Json]:
    return {
        **problem.span._asdict(),
        "message": problem.message,
        "expected": problem.expected,
        "remedy": problem.remedy,
    }
