"""``python -m benchlay`` is the console command."""

from __future__ import annotations

from benchlay.cli import main

if __name__ == "__main__":
    main()
