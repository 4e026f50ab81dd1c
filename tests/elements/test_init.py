"""The registry: every kind is in it, and every kind is complete."""

import importlib
import inspect
import re
import textwrap
from pathlib import Path

import numpy as np
import pytest

import benchlay.elements
from benchlay.document.describe import reference_text, schema_of
from benchlay.elements import KINDS
from benchlay.elements._kind import Acts, Inside
from benchlay.geometry.axes import in_plane_axes
from benchlay.geometry.polygon import signed_area
from tests.geometry.solid_checks import assert_convex_and_outward

TRACED = {name: kind for name, kind in KINDS.items() if kind.PENDING is None}
NO_KINDS = {"mount", "pending"}  # what holds an element, and kinds not traced yet
EXAMPLE = re.compile(r"\.\. code-block:: yaml\n\n((?:   .*\n|\n)+)")


def example_of(kind):
    module = importlib.import_module(kind.__module__)
    (text,) = EXAMPLE.findall(module.__doc__)
    return textwrap.dedent(text)


@pytest.fixture(params=sorted(TRACED))
def kind(request):
    return TRACED[request.param]


@pytest.fixture
def record(kind, read_text):
    element, problems = read_text(example_of(kind))
    assert [str(problem) for problem in problems] == []
    return element.record


def test_every_file_is_registered():
    folder = Path(benchlay.elements.__file__).parent
    files = {p.stem for p in folder.glob("*.py") if not p.stem.startswith("_")}
    assert files - NO_KINDS == {k.__module__.rpartition(".")[2] for k in TRACED.values()}


def test_names_are_those_of_the_classes_and_unique():
    assert {name: kind.KIND for name, kind in KINDS.items()} == {name: name for name in KINDS}
    assert len(set(KINDS.values())) == len(KINDS)


def test_the_language_is_complete():
    assert set(KINDS) == {
        "mirror", "splitter", "cube", "window", "filter", "polarizer", "plate-polarizer",
        "waveplate", "rotator", "lens", "aperture", "grating", "prism", "parabola",
        "retroreflector", "cell", "converter", "dump", "target", "screen", "shutter", "tube",
        "obstacle",
    }  # fmt: skip


def test_its_page_has_an_example_that_reads(kind, record):
    assert type(record) is kind


def test_its_example_is_of_its_own_kind(kind):
    assert f"kind: {kind.KIND}" in example_of(kind)


def test_every_base_is_asked_after_reading(kind):
    """A base whose `after_read` is passed over would leave its problems unsaid."""
    asked = [base for base in kind.__mro__ if "after_read" in vars(base)]
    for base in asked[:-1]:  # the last is Record's own, which asks nothing
        assert "super().after_read(reader)" in source_of(base)


def source_of(base):
    return inspect.getsource(base.after_read)


def test_schema_and_reference_can_be_made(kind):
    schema = schema_of(kind)
    names = {spec.name for spec in kind.KEYS.values()}
    assert set(schema["properties"]) == names
    text = reference_text(kind)
    assert all(f"| `{name}` |" in text for name in names)
    assert "Coating(" not in text
    assert "Glass(" not in text
    assert "Outline(" not in text


def test_the_default_branch_is_a_branch(kind):
    assert kind.DEFAULT_BRANCH is None or kind.DEFAULT_BRANCH in kind.BRANCHES


def test_faces_have_names_of_their_own(record):
    names = [face.name for face in record.geometry().faces]
    assert len(set(names)) == len(names)


def test_normals_are_unit_and_outward(record):
    geometry = record.geometry()
    middle = np.mean(
        [np.array(solid.points).mean(axis=0) for solid in geometry.solids] or [[0.0] * 3], axis=0
    )
    for face in geometry.faces:
        assert np.linalg.norm(face.normal) == pytest.approx(1.0, abs=1e-12)
        if face.inside is not Inside.BOTH and geometry.solids:
            assert (np.array(face.origin) - middle) @ face.normal > 0.0


def test_clear_parts_lie_within_outlines(record):
    for face in record.geometry().faces:
        for clear, whole in zip(face.clear.radii, face.outline.radii, strict=True):
            assert 0.0 < clear <= whole


def test_outlines_are_anticlockwise_seen_from_outside(record):
    for face in record.geometry().faces:
        left, up = in_plane_axes(face.normal)
        assert np.cross(left, up).tolist() == pytest.approx(face.normal, abs=1e-12)
        assert face.outline.round or signed_area(face.outline.corners) > 0.0


def test_solids_are_convex_with_outward_patches(record):
    for solid in record.geometry().solids:
        assert_convex_and_outward(solid)


def test_what_is_drawn_is_as_wide_as_it_is(record):
    geometry = record.geometry()
    drawn = np.array([p for stroke in geometry.strokes for p in stroke.points])
    half_width = geometry.extent[2]
    assert np.abs(drawn[:, 1]).max() == pytest.approx(half_width)
    assert {stroke.role for stroke in geometry.strokes} <= {
        "outline",
        "coated",
        "opening",
        "hidden",
    }


def test_drawn_lines_have_length_and_closed_ones_an_area(record):
    for stroke in record.geometry().strokes:
        assert len(set(stroke.points)) == len(stroke.points) >= 2
        if stroke.closed:
            assert abs(signed_area(stroke.points)) > 1.0


def test_every_way_uses_faces_that_exist(record):
    names = {face.name for face in record.geometry().faces}
    for ways in record.branches().values():
        assert ways
        for way in ways:
            assert {face for face, _ in way} <= names
            assert {event for _, event in way} <= {"reflected", "transmitted"}


def test_every_branch_that_may_be_named_has_ways(record):
    assert set(record.branches()) == set(type(record).BRANCHES)


def test_every_way_enters_leaves_and_stays_inside_between(record):
    """In and out of the glass by turns: a way that ends inside would lead nowhere."""
    faces = {face.name: face for face in record.geometry().faces}
    for ways in record.branches().values():
        for way in ways:
            inside = False
            for name, event in way:
                face = faces[name]
                if event == "transmitted" and face.inside is Inside.BEHIND:
                    inside = not inside
                if face.inside is Inside.BOTH:
                    assert inside
            assert not inside


def test_every_way_can_be_walked_straight(record):
    """Follow each way by plain reflection, at normal incidence, without refraction."""
    faces = {face.name: face for face in record.geometry().faces}
    for ways in record.branches().values():
        for way in ways:
            if way[0][1] == "reflected":
                continue
            first = faces[way[0][0]]
            direction = -np.array(first.normal)
            point = np.array(first.origin) - 100.0 * direction
            for name, event in way:
                face = faces[name]
                normal = np.array(face.normal)
                distance = (np.array(face.origin) - point) @ normal / (direction @ normal)
                assert distance >= 0.0
                point = point + distance * direction
                if event == "reflected":
                    direction = direction - 2.0 * (direction @ normal) * normal
            assert face.acts is Acts.PASSES or direction @ np.array(face.normal) > 0.0


def test_ways_start_from_different_faces(record):
    for ways in record.branches().values():
        starts = [way[0] for way in ways]
        assert len(set(starts)) == len(starts)


def test_the_glass_between_its_faces_is_the_one_that_is_traced(record):
    assert record.glass_of() == record.geometry().glass
