"""Prints what the review of single faults costs, as a multiple of one warm check, and its growth.

    python tests/bench/faults.py

The bench is that of `forty.py`: 40 elements, four panels with an opening. Smaller ones have fewer
of its rows. Both jobs run in one process, warm, by turns; times are of the processor, so that
other work on the machine counts little, and what is printed are ratios.
"""

import statistics
import sys
import time
from math import log
from pathlib import Path

sys.path.insert(0, str(Path(__file__).resolve().parent.parent.parent))

from benchlay.faults import review_faults
from benchlay.pipeline import check, place, read, trace
from tests.bench import forty

ROUNDS = 3


def with_rows(rows):
    """Return the bench with so many of the four rows of each arm."""
    every = forty.TURNS
    forty.TURNS = every[:rows]
    try:
        return forty.bench()
    finally:
        forty.TURNS = every


def seconds(work):
    start = time.process_time()
    work()
    return time.process_time() - start


def measured(text):
    """Return elements, cases, and the two times in seconds."""
    placed = place(read("bench.yaml", text))

    def checked():
        check(trace(place(read("bench.yaml", text))))

    cases = review_faults(placed).cases
    checked()
    times = [(seconds(checked), seconds(lambda: review_faults(placed))) for _ in range(ROUNDS)]
    one, whole = (statistics.median(column) for column in zip(*times, strict=True))
    return len(placed.base.elements), cases, one, whole


def main():
    print("elements  cases  review of faults / one warm check  a case / one warm check")
    rows = []
    for text in map(with_rows, (1, 2, 3, 4)):
        elements, cases, one, whole = measured(text)
        rows.append((elements, cases, whole))
        print(f"{elements:8d} {cases:6d} {whole / one:33.1f} {whole / one / cases:24.4f}")
        sys.stdout.flush()
    (n0, c0, t0), (n1, c1, t1) = rows[0], rows[-1]
    print(f"growth with elements: time as their number to the {log(t1 / t0) / log(n1 / n0):.2f}")
    print(f"growth with cases:    time as their number to the {log(t1 / t0) / log(c1 / c0):.2f}")


if __name__ == "__main__":
    main()
