"""How well `rank_causes` names the slip: the measured table, and the floors it is held to in tests/outside.

Run from the root of the project: ``python tests/benchmarks/parity_ranking.py`` (``--misses`` lists the cases
outside the first three).
"""

import argparse
import sys
import time
from collections import defaultdict
from pathlib import Path

ROOT = Path(__file__).parents[2]
sys.path[:0] = [str(ROOT), str(ROOT / "tests" / "support")]

from slips import Score, cases, mending  # noqa: E402


def scores(*, show_misses: bool = False) -> dict[str, Score]:
    """Rank every case; the scores by kind of slip, and over all."""
    table: dict[str, Score] = defaultdict(Score)
    for case in cases():
        causes = case.ranked()
        place = table[case.slip].add(case, causes)
        table["all"].add(case, causes)
        if show_misses and place > 2:
            found = [(*mending(cause), round(cause.weight, 3)) for cause in causes]
            print(case.name, case.slip, case.charge, case.multiplicity, "true:", *case.truth, "found:", *found)
    return table


def main() -> None:
    """Print the table."""
    parser = argparse.ArgumentParser(description="Measure the ranking of causes of a failed spin parity.")
    parser.add_argument("--misses", action="store_true")
    show_misses = parser.parse_args().misses
    start = time.perf_counter()
    table = scores(show_misses=show_misses)
    spent = time.perf_counter() - start
    print(f"{'slip':24} {'cases':>6} {'first':>8} {'in three':>9} {'atom named':>11} {'mean weight':>12}")
    for slip, score in table.items():
        named = f"{score.atom_first / score.cases:10.1%}" if slip == "hydrogen removed" else ""
        shares = f"{score.first / score.cases:8.1%} {score.in_three / score.cases:9.1%} {named:>11}"
        print(f"{slip:24} {score.cases:6d} {shares} {score.weight / score.cases:12.2f}")
    print(f"{1e3 * spent / table['all'].cases:.2f} ms a case")


if __name__ == "__main__":
    main()
