"""Files of a review: each written whole or not at all, and never over someone's work."""

from __future__ import annotations

import json
from collections.abc import Mapping
from pathlib import Path, PurePath

from benchlay.writers.atomic import write

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
