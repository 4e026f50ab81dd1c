"""The JSON that other programs rely on."""

import json
import math

import numpy as np
import pytest

from benchlay.document.problems import Problem
from benchlay.document.span import Span
from benchlay.findings import Finding, MergedFinding, Severity
from benchlay.report.details import (
    BeamRow,
    Coverage,
    Gap,
    Ledger,
    Polarization,
    Pose,
    Sink,
    TraceResult,
)
from benchlay.report.json_out import check_document, dumps, plain, trace_document
from benchlay.report.model import Acceptance, LayoutErrors, reported

FINDING_KEYS = [
    "id", "check", "severity", "states", "worst_state", "message", "expected", "remedy",
    "element", "beam", "at", "file", "line", "column", "value", "limit", "unit", "accepted",
    "related", "stretch", "stretches",
]  # fmt: skip
REVIEW_KEYS = [
    "layout", "sha256", "title", "revision", "as_of", "verdict", "findings", "checks",
    "limits_used", "routes", "ledger", "zones",
    "controlled_areas", "coverage", "panels", "cavities", "matched",
    "handed_over", "hazards", "signs", "not_computed", "matrix",
]  # fmt: skip
BEAM_KEYS = [
    "beam", "parent", "source", "wavelength_nm", "splits", "route", "routes", "leg", "from",
    "from_face", "to", "to_face", "ends", "event", "start", "end", "direction",
    "medium_index", "power_W", "power_at_end_W", "lost_W", "pulse_energy_J", "w_start_mm",
    "w_end_mm", "w_axis_deg", "m2", "optical_path_mm", "polarization",
    "peak_irradiance_end_W_cm2",
]  # fmt: skip


def read_back(document):
    return json.loads(dumps(document))


def beam(**fields):
    whole = BeamRow(
        beam=0,
        parent=None,
        source="green",
        wavelength_nm=532.0,
        splits=0,
        route="excitation",
        routes=("excitation",),
        leg=0,
        from_="green",
        from_face="exit",
        to="M1",
        to_face="front",
        ends="optic",
        event="emitted",
        start=(100.0, 450.0, 100.0),
        end=(450.0, 450.0, 100.0),
        direction=(1.0, 6.1e-17, -0.0),
        medium_index=1.00027,
        power_W=0.15,
        power_at_end_W=0.15,
        lost_W={"rim": 0.0},
        pulse_energy_J=None,
        w_start_mm=(0.5, 0.5),
        w_end_mm=(0.517, 0.517),
        w_axis_deg=0.0,
        m2=(1.1, 1.1),
        optical_path_mm=350.1,
        polarization=Polarization(1.0, 90.0, 0.0, (0.0, 1.0, 0.0)),
        peak_irradiance_end_W_cm2=35.8,
    )
    return whole._replace(**fields)


def test_the_keys_of_a_review_in_their_order(make_review, make_finding):
    document = read_back(check_document([make_review(findings=[make_finding()])], version="0"))
    assert list(document) == ["benchlay", "reviews", "cautions"]
    (written,) = document["reviews"]
    assert list(written) == REVIEW_KEYS
    assert list(written["findings"][0]) == FINDING_KEYS
    assert written["checks"] == [
        {"check": "escape", "state": "as drawn", "ran": True, "reason": None}
    ]


def test_the_verdict_is_the_worst_that_is_not_accepted(make_review, make_finding):
    entry = Acceptance("survey of May", "safety officer", "2027-06-30", "8 mW")
    fail, warn = make_finding("fail", accepted=entry), make_finding("warn")
    assert make_review(findings=[fail, warn]).verdict == "warn"
    assert make_review(findings=[fail]).verdict == "none"
    document = check_document([make_review(findings=[fail])], version="0")
    assert document["reviews"][0]["findings"][0]["accepted"] == entry._asdict()


def test_errors_stand_in_place_of_the_review():
    problem = Problem(Span("x.yaml", 4, 5), "'mirorr' is no kind", "a kind", "mirror")
    document = check_document([LayoutErrors("x.yaml", (problem,), ("a",))], version="0")
    assert document["reviews"] == [
        {
            "layout": "x.yaml",
            "errors": [
                {
                    "file": "x.yaml",
                    "line": 4,
                    "column": 5,
                    "message": "'mirorr' is no kind",
                    "expected": "a kind",
                    "remedy": "mirror",
                }
            ],
        }
    ]


def test_the_keys_and_numbers_of_a_beam():
    ledger = Ledger("as drawn", "green", 0.15, (Sink("target", "S", 532.0, 0.15),), 2.8e-17)
    result = TraceResult(
        "x.yaml", "as drawn", (beam(),), {"M1": Pose((1.0, 2.0, 3.0), 135.0, 0.0)}, (ledger,)
    )
    document = read_back(trace_document(result))
    assert list(document) == ["state", "beams", "placed", "ledger", "cautions"]
    (written,) = document["beams"]
    assert list(written) == BEAM_KEYS
    assert written["direction"] == [1.0, 0.0, 0.0]
    assert math.copysign(1.0, written["direction"][2]) == 1.0
    assert document["placed"] == {"M1": {"at": [1.0, 2.0, 3.0], "facing": 135.0, "pitch": 0.0}}
    assert document["ledger"][0]["unaccounted_W"] == 0.0
    sink = {"kind": "target", "name": "S", "wavelength_nm": 532.0, "power_W": 0.15}
    assert document["ledger"][0]["sinks"] == [sink]


def test_the_largest_beam_below_the_floor_is_named():
    sink = Sink("below-floor", None, 532.0, 1e-9, largest_W=2e-11)
    ledger = Ledger("as drawn", "green", 0.15, (sink,), 0.0)
    result = TraceResult("x.yaml", "as drawn", (), {}, (ledger,))
    assert trace_document(result)["ledger"][0]["sinks"][0]["largest_W"] == 2e-11


def test_words_of_python_lose_their_underscore(make_review):
    gap = Gap("open-side/-/1a2b", (132.1, 134.8), (-4.0, 12.0), 0.01, "south/east corner", 12.0)
    review = make_review(coverage=(Coverage("as drawn", "M1", 0.973, (gap,)),))
    (written,) = check_document([review], version="0")["reviews"][0]["coverage"]
    assert list(written) == ["state", "from", "covered", "gaps"]
    assert written["gaps"][0]["azimuth"] == [132.1, 134.8]


def test_text_in_any_script_comes_out_as_ascii(make_review):
    text = dumps(check_document([make_review(title="Schärfe 測定 \x1b")], version="0"))
    assert text.isascii()
    assert json.loads(text)["reviews"][0]["title"] == "Schärfe 測定 \x1b"


def test_an_array_in_a_result_is_a_mistake():
    with pytest.raises(TypeError, match="at must hold plain Python values, got ndarray"):
        plain(np.zeros(3), "at")


def test_a_merged_finding_becomes_a_reported_one():
    finding = Finding(
        "escape", Severity.FAIL, "m", "e", "r", state="alignment", element="W1",
        span=Span("x.yaml", 41, 3), value=1.0, id="escape/W1/g7f3",
        related=((Span("x.yaml", 3, 5), "panel 'south'"),),
    )  # fmt: skip
    flat = reported(MergedFinding(finding, ("as drawn", "alignment"), "alignment"))
    assert (flat.severity, flat.file, flat.line, flat.column) == ("fail", "x.yaml", 41, 3)
    assert flat.unit is None
    assert flat.related[0]._asdict() == {
        "file": "x.yaml", "line": 3, "column": 5, "message": "panel 'south'",
    }  # fmt: skip


def test_a_finding_of_no_line_has_none():
    flat = reported(MergedFinding(Finding("c", Severity.WARN, "m", "e", "r"), ("s",), "s"))
    assert (flat.file, flat.line, flat.column) == (None, None, None)
