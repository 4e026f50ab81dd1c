"""Times a cold `benchlay check`, whole process, beside a Python that only imports libraries.

Run by hand, from the top of a clone, with the python of an environment that has the libraries:

    python tests/bench/cold_check.py [ROUNDS] [LAYOUT]

The package is copied and compiled as an installation would, so that neither an editable
checkout nor PYTHONDONTWRITEBYTECODE takes part. The two commands alternate; what counts is the
median of the ratios of pairs, since the speed of a shared machine drifts.
"""

import compileall
import os
import resource
import shutil
import statistics
import subprocess
import sys
import tempfile
import time
from pathlib import Path

TOP = Path(__file__).resolve().parent.parent.parent
sys.path.insert(0, str(TOP))

from tests.bench.forty import bench  # noqa: E402 (found by way of the line above)

YARDSTICK = "import numpy, shapely, yaml, argparse"
CHECK = "from benchlay.cli import main; main()"


def timed(command: list[str], environment: dict[str, str]) -> tuple[float, float]:
    """Return wall time and processor time of a process, s."""
    before, start = resource.getrusage(resource.RUSAGE_CHILDREN), time.perf_counter()
    done = subprocess.run(command, env=environment, capture_output=True, check=False)
    wall, after = time.perf_counter() - start, resource.getrusage(resource.RUSAGE_CHILDREN)
    if done.returncode not in {0, 1}:
        sys.exit(done.stderr.decode())
    cpu = after.ru_utime + after.ru_stime - before.ru_utime - before.ru_stime
    return wall, cpu


def compare(layout: Path, rounds: int, installed: Path) -> None:
    """Print the ratios of check to yardstick."""
    environment = {k: v for k, v in os.environ.items() if not k.startswith("PYTHON")}
    environment["PYTHONPATH"] = str(installed)
    yardstick = [sys.executable, "-c", YARDSTICK]
    check = [sys.executable, "-c", CHECK, "check", str(layout)]
    for command in (yardstick, check):
        timed(command, environment)  # the disk is warm from here on
    pairs = []
    for number in range(rounds):
        both = (yardstick, check) if number % 2 else (check, yardstick)
        times = {id(command): timed(command, environment) for command in both}
        pairs.append((times[id(yardstick)], times[id(check)]))
    for name, kind in (("wall", 0), ("processor", 1)):
        ratios = sorted(b[kind] / a[kind] for a, b in pairs)
        least = [1e3 * min(pair[i][kind] for pair in pairs) for i in (0, 1)]
        print(
            f"{name}: check / imports = {statistics.median(ratios):.2f} "
            f"({ratios[0]:.2f} to {ratios[-1]:.2f}); least {least[1]:.0f} / {least[0]:.0f} ms"
        )


def main() -> None:
    """Make the layout and the installed copy, and compare."""
    rounds = int(sys.argv[1]) if len(sys.argv) > 1 else 11
    with tempfile.TemporaryDirectory() as folder:
        installed = Path(folder) / "installed"
        ignore = shutil.ignore_patterns("__pycache__")
        shutil.copytree(TOP / "benchlay", installed / "benchlay", ignore=ignore)
        compileall.compile_dir(installed, quiet=1)
        layout = Path(folder) / "forty.yaml"
        layout.write_text(bench(), encoding="utf-8")
        given = Path(sys.argv[2]).resolve() if len(sys.argv) > 2 else layout
        compare(given, rounds, installed)


if __name__ == "__main__":
    main()
