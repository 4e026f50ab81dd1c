"""Files of a review: each written whole or not at all, and never over someone's work."""

from __future__ import annotations

import json
import os
import tempfile
from collections.abc import Mapping
from pathlib import Path, PurePath

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

    All are first written beside their places under passing names, then each is moved to its
    place, so that a full disk or an interruption leaves no half of a file.

    Raises
    ------
    OSError
        If the folder or a file cannot be written; nothing in place has changed then, unless
        the last step, the renaming, was itself refused.
    """
    folder.mkdir(parents=True, exist_ok=True)
    waiting: list[tuple[str, Path]] = []
    try:
        for name in sorted(files):
            waiting.append((_written_beside(folder, files[name]), folder / name))
        for temporary, path in waiting:
            os.replace(temporary, path)
    finally:
        for temporary, _ in waiting:
            Path(temporary).unlink(missing_ok=True)
    return [path for _, path in waiting]


def _written_beside(folder: Path, data: bytes) -> str:
    handle, name = tempfile.mkstemp(prefix=".benchlay-", dir=folder)
    try:
        with os.fdopen(handle, "wb") as stream:
            stream.write(data)
        # mkstemp makes files that only their owner may read; a drawing is for everyone.
        Path(name).chmod(0o666 & ~_umask())
    except BaseException:
        Path(name).unlink(missing_ok=True)
        raise
    return name


def _umask() -> int:
    mask = os.umask(0)
    os.umask(mask)
    return mask
