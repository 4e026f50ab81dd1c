"""Files of a review: each written whole or not at all, and never over someone's work."""

from __future__ import annotations

import json
from collections.abc import Collection, Mapping
from pathlib import Path, PurePath

from benchlay.report.words import tame
from benchlay.writers.atomic import write

_MOST_NAMED = 8
RECORD = "findings.json"
"""The file by which a folder is known as an earlier review's."""


def refusal(folder: Path, layout: str) -> str | None:
    """Say why a review of this layout should not be written here; None if nothing speaks against.

    A folder may be new, empty, or hold an earlier review of a layout of the same file name.
    """
    holds = _contents(folder)
    if holds is None or holds == _owner(layout):
        return None
    return (
        f"benchlay: {folder} holds {holds}; nothing was written\n"
        f"  expected: a new or empty folder, or {_owner(layout)}\n"
        "  to mend: choose another folder with -o DIR, or write there all the same with --force\n"
    )


def _owner(layout: str) -> str:
    return f"a review of {PurePath(layout).name}"


def _contents(folder: Path) -> str | None:
    if not folder.exists():
        return None
    if not folder.is_dir():
        return "a file, no folder"
    if not any(folder.iterdir()):
        return None
    try:
        record = json.loads((folder / RECORD).read_bytes())
        return _owner(str(record["reviews"][0]["layout"]))
    except (OSError, ValueError, KeyError, IndexError, TypeError):
        return "other files"


def unwritable(folder: Path, error: OSError) -> str:
    """Say that a folder or a file in it cannot be written."""
    why = (error.strerror or type(error).__name__).lower()
    where = error.filename or folder
    return (
        f"benchlay: {where} cannot be written: {why}\n"
        "  expected: a folder that may be written to, on a disk with room\n"
        "  to mend: choose another folder with -o DIR\n"
    )


def left_over(folder: Path, written: Collection[Path]) -> str:
    """Name the files of a folder that a review did not write; nothing where there are none.

    A panel that has a new name since leaves its old drawings behind, and nothing on them says
    that they are out of date. They may be somebody's own, so they are not taken away.
    """
    names = {path.name for path in written}
    others = sorted(path.name for path in folder.iterdir() if path.name not in names)
    if not others:
        return ""
    shown = ", ".join(tame(name) for name in others[:_MOST_NAMED])
    more = len(others) - _MOST_NAMED
    return (
        f"benchlay: not of this review, but in {folder}: {shown}"
        f"{f' and {more} more' if more > 0 else ''}\n"
        "  to mend: remove what an earlier review left, before anybody works from it\n"
    )


def write_all(folder: Path, files: Mapping[str, bytes]) -> list[Path]:
    """Write files into a folder, made if need be, in the order of their names.

    Raises
    ------
    OSError
        If the folder or a file cannot be written; each file is then either the new or the
        old one, whole.
    """
    folder.mkdir(parents=True, exist_ok=True)
    paths = []
    for name in sorted(files):
        write(folder / name, files[name])
        paths.append(folder / name)
    return paths
