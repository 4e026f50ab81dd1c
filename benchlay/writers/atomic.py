"""Files written whole or not at all."""

from __future__ import annotations

import os
import tempfile
from contextlib import suppress
from pathlib import Path

# What a plain open() would give; temporary files are made for their owner only.
_MODE = 0o666


def write(path: Path, content: bytes) -> None:
    """Put content under a name, so that nobody ever sees half of it.

    The content goes to a temporary file in the same folder, which then takes the name in
    one step. If anything fails, what stood there before stands there still.

    Raises
    ------
    OSError
        As the operating system says; no temporary file is left behind.
    """
    handle, name = tempfile.mkstemp(dir=path.parent, prefix=f".{path.name[:80]}.")
    temporary = Path(name)
    try:
        with os.fdopen(handle, "wb") as stream:
            stream.write(content)
            stream.flush()
            os.fsync(stream.fileno())
        temporary.chmod(_MODE & ~_umask())
        temporary.replace(path)
    except BaseException:
        with suppress(FileNotFoundError):
            temporary.unlink()
        raise


def _umask() -> int:
    """Read the process's mask; there is no way to read it but to set it."""
    mask = os.umask(0o077)
    os.umask(mask)
    return mask
