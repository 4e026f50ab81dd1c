import os

import pytest

from benchlay.writers import atomic


def test_content_arrives_whole_and_alone(tmp_path):
    atomic.write(tmp_path / "a.svg", b"new")
    assert [(p.name, p.read_bytes()) for p in tmp_path.iterdir()] == [("a.svg", b"new")]


def test_failure_leaves_what_was_there(tmp_path, monkeypatch):
    path = tmp_path / "a.svg"
    path.write_bytes(b"old")

    def full(_):
        raise OSError(28, "no space left")

    monkeypatch.setattr(os, "fsync", full)
    with pytest.raises(OSError, match="no space"):
        atomic.write(path, b"new")
    assert [(p.name, p.read_bytes()) for p in tmp_path.iterdir()] == [("a.svg", b"old")]


def test_readable_as_any_other_file(tmp_path):
    plain, written = tmp_path / "plain", tmp_path / "written"
    plain.write_bytes(b"")
    atomic.write(written, b"")
    assert written.stat().st_mode == plain.stat().st_mode
