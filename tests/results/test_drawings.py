"""Drawings as files, and what speaks against making one."""

import xml.etree.ElementTree as ET
from io import BytesIO

import pypdf
import pytest

from benchlay import sheets
from benchlay.results.drawings import drawings, refusals
from benchlay.sheets import Planned


def stems(files, ending):
    return [name.removesuffix(ending) for name in files if name.endswith(ending)]


def test_every_sheet_in_every_form(corner):
    files = drawings(corner, sha256="0" * 64)
    assert {"plan", "elevation-work", "safety"} <= set(stems(files, ".svg"))
    assert set(stems(files, ".svg")) <= set(stems(files, ".dxf"))
    assert "sheets" in stems(files, ".pdf")
    assert len(pypdf.PdfReader(BytesIO(files["sheets.pdf"])).pages) == len(stems(files, ".svg"))
    assert ET.fromstring(files["plan.svg"]).tag.endswith("svg")
    assert b"0" * 64 in files["plan.dxf"]


def test_one_form_alone(corner):
    files = drawings(corner, form="svg")
    assert set(stems(files, ".svg")) == {name.removesuffix(".svg") for name in files}
    assert "sheets.pdf" in drawings(corner, form="pdf")
    assert not stems(drawings(corner, form="pdf"), ".svg")


def test_a_sheet_asked_for_by_name_is_a_file_of_its_own(corner):
    assert list(drawings(corner, sheet="plan", form="pdf")) == ["plan.pdf"]
    assert sorted(drawings(corner, sheet="plan")) == ["plan.dxf", "plan.pdf", "plan.svg"]


def test_pages_that_belong_together_are_one_file(corner, monkeypatch):
    def tiles(subject):
        (plan,) = sheets.SHEETS["plan"](subject)
        for n in (1, 2, 3):
            name = f"template-{n}"
            yield Planned(
                name,
                lambda number, name=name: plan.compose(number)._replace(name=name),
                numbered=False,
                forms=("pdf",),
                within="template",
            )

    monkeypatch.setattr(sheets, "SHEETS", {**sheets.SHEETS, "template": tiles})
    files = drawings(corner)
    assert [name for name in files if "template" in name] == ["template.pdf"]
    count = {
        name: len(pypdf.PdfReader(BytesIO(files[name])).pages) for name in files if "pdf" in name
    }
    assert count["template.pdf"] == 3
    assert count["sheets.pdf"] == len(stems(files, ".svg"))  # the template is not numbered


@pytest.mark.parametrize(
    ("sheet", "form", "said"),
    [
        ("plan", "svg", []),
        (None, None, []),
        ("pln", None, ["there is no sheet 'pln'"]),
        (None, "pdf", []),
        (None, "png", ["not yet: sheets are not written as png"]),
    ],
)
def test_what_cannot_be_drawn_is_refused(corner, sheet, form, said):
    layout = corner.placed.base.layout
    assert [problem.message for problem in refusals(layout, sheet, form)] == said


SMALL = """
bench: {{size: [9000, 6000]}}
sources:
  red: {{wavelength: 633, power: 8 mW, beam: {{waist_radius: 0.5}}, at: [100, 100], heading: 0}}
elements:
  T1: {{kind: target, at: [400, 100], facing: 180}}
drawing: {{{asked}}}
"""


def test_a_sheet_that_is_too_small_is_refused_at_its_line(traced):
    trace = traced(SMALL.format(asked="sheet: A4"))
    (problem,) = refusals(trace.placed.base.layout, None, None)
    assert (problem.span.line, problem.span.column) == (7, 18)
    assert "A4" in problem.message


def test_what_fits_nowhere_is_a_problem_of_the_layout(traced):
    problem = drawings(traced(SMALL.format(asked="sheet: A3, scale: '1:1'")))
    assert problem.message.startswith("the plan cannot be drawn: ")
    assert problem.span.line == 7
    assert "sheet: auto" in problem.remedy


def test_a_kind_that_the_layout_has_nothing_for_is_a_problem(corner):
    problem = drawings(corner, sheet="room")
    assert problem.message == "the layout has nothing that a sheet 'room' would show"


def test_a_format_in_which_a_sheet_is_not_made_is_a_problem(corner):
    problem = drawings(corner, sheet="template", form="dxf")
    assert problem.message == "sheet 'template' is not written as dxf"
    assert problem.remedy == "leave --format out"
    assert list(drawings(corner, sheet="template", form="pdf")) == ["template.pdf"]
