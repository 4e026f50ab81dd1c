"""Files of a review: whole, and never over someone's work."""

import json

import pytest

from benchlay.report.files import left_over, refusal, unwritable, write_all

OWN = json.dumps({"benchlay": "0", "reviews": [{"layout": "somewhere/a.yaml"}]}).encode()


@pytest.fixture
def folder(tmp_path):
    return tmp_path / "exports" / "a"


def test_a_new_or_an_empty_folder_is_free(folder):
    assert refusal(folder, "a.yaml") is None
    folder.mkdir(parents=True)
    assert refusal(folder, "a.yaml") is None


def test_a_review_of_the_same_layout_is_replaced(folder):
    write_all(folder, {"findings.json": OWN, "plan.svg": b"old"})
    assert refusal(folder, "elsewhere/a.yaml") is None


@pytest.mark.parametrize("record", [b"", b"[]", b"{}", b'{"reviews": []}', b"\xff", b"7"])
def test_a_record_that_is_none_of_ours_is_other_files(folder, record):
    write_all(folder, {"findings.json": record})
    assert "holds other files; nothing was written" in refusal(folder, "a.yaml")


def test_a_review_of_another_layout_is_kept(folder):
    write_all(folder, {"findings.json": OWN})
    assert "holds a review of a.yaml" in refusal(folder, "b.yaml")


def test_a_file_in_place_of_the_folder_is_refused(tmp_path):
    (tmp_path / "a").write_bytes(b"")
    assert "holds a file, no folder" in refusal(tmp_path / "a", "a.yaml")


def test_files_are_written_by_name_and_listed(folder):
    written = write_all(folder, {"plan.svg": b"s", "beams.json": b"b"})
    assert [p.name for p in written] == ["beams.json", "plan.svg"]
    assert [p.read_bytes() for p in written] == [b"b", b"s"]
    assert sorted(p.name for p in folder.iterdir()) == ["beams.json", "plan.svg"]


def test_what_an_earlier_review_left_is_named(folder):
    write_all(folder, {"findings.json": OWN, "cut-old.dxf": b"d"})
    written = write_all(folder, {"findings.json": OWN, "cut-new.dxf": b"d"})
    told = left_over(folder, written)
    assert "but in" in told
    assert "cut-old.dxf\n" in told
    assert "cut-new" not in told
    (folder / "cut-old.dxf").unlink()
    assert left_over(folder, written) == ""


def test_of_many_files_a_few_are_named_and_all_counted(folder):
    written = write_all(folder, {"findings.json": OWN})
    write_all(folder, {f"note-{n:02}.txt": b"" for n in range(20)})
    assert "note-07.txt and 12 more" in left_over(folder, written)


def test_a_folder_that_cannot_be_made_is_told_with_its_reason(tmp_path):
    (tmp_path / "a").write_bytes(b"")
    with pytest.raises(OSError, match=r".") as refused:
        write_all(tmp_path / "a" / "b", {"findings.json": OWN})
    told = unwritable(tmp_path / "a" / "b", refused.value)
    assert "b cannot be written: not a directory\n  expected: " in told
    assert "\n  to mend: " in told
