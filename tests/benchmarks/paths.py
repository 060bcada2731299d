"""The search for the net-section chain: against size, and against trying every chain.

    python tests/benchmarks/paths.py

The same staggered patterns as tests/benchmarks/run.py, at more sizes. Nothing passes or fails by a
time.
"""

from __future__ import annotations

import sys
from pathlib import Path

sys.path.insert(0, str(Path(__file__).resolve().parents[2]))

from tensionlib.joints.parts import Flat
from tensionlib.joints.paths import least_path
from tests.benchmarks.run import Row, _holes, best, machine, ms, table
from tests.brute import area_lost, chains

PART = Flat.plain(400.0, 12.0)
GROSS = 1e5  # mm², more than any chain here loses


def by_size() -> list[Row]:
    rows = [Row("Least chain, holes in six staggered lines")]
    for count in (10, 25, 50, 100, 200, 400):
        holes = _holes(count)
        took = best(lambda h=holes: least_path(PART, h), 15, 3)
        rows.append(ms(f"{count} holes", took, 10.0 if count == 200 else None))
    for count in (50, 100):
        holes = _holes(count)
        took = best(lambda h=holes: least_path(PART, h, credit_behind=True, gross=GROSS), 10, 1)
        rows.append(ms(f"{count} holes, bolts behind credited", took))
    return rows


def by_trying() -> list[Row]:
    """Every chain tried, in the same run and on the same holes as the search."""
    rows = [Row("Every chain tried, in plain Python, over the search")]
    for count in range(4, 13):
        holes = _holes(count)
        number = sum(1 for _ in chains(holes))
        took = best(lambda h=holes: least_path(PART, h), 15, 5)
        tried = best(lambda h=holes: max(area_lost(PART, c) for c in chains(h)), 5, 1)
        said = f"{tried * 1e3:.3g} / {took * 1e3:.3g} ms = {tried / took:.3g}"
        rows.append(Row(f"{count} holes, {number} chains", said))
    return rows


if __name__ == "__main__":
    print(f"{machine()}\n\n{table([*by_size(), *by_trying()])}")
