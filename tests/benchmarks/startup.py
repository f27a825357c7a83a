"""How long `hundsight check` takes on one small deck, against importing the libraries it stands on.

Both are run by turns in processes of their own, modules compiled, and the ratio of each pair is taken;
the floor is 1.5 at the median:

    python tests/benchmarks/startup.py [PAIRS]

Processor time is given beside elapsed time, as it suffers less from what else the machine does.
"""

import os
import resource
import statistics
import subprocess
import sys
import tempfile
import time
from collections.abc import Sequence
from pathlib import Path
from typing import NamedTuple

ROOT = Path(__file__).parents[2]
DECK = ROOT / "tests" / "golden" / "decks" / "clear.deck.toml"
FLOOR = 1.5
BASE = ("-c", "import numpy, pydantic, rich.console, typer, periodictable")
CALLS = {
    "terminal": ("-m", "checker", "check", str(DECK)),
    "json": ("-m", "checker", "check", str(DECK), "--format", "json"),
}


class Cost(NamedTuple):
    """Seconds of one process."""

    elapsed: float
    processor: float


def cost(arguments: Sequence[str], env: dict[str, str]) -> Cost:
    """Run Python with the arguments and return what it took."""
    before = resource.getrusage(resource.RUSAGE_CHILDREN)
    start = time.perf_counter()
    subprocess.run([sys.executable, *arguments], env=env, stdout=subprocess.DEVNULL, check=True)
    elapsed = time.perf_counter() - start
    after = resource.getrusage(resource.RUSAGE_CHILDREN)
    return Cost(elapsed, after.ru_utime + after.ru_stime - before.ru_utime - before.ru_stime)


def measure(pairs: int) -> bool:
    """Print the costs and ratios of each call, and return whether all keep to the floor."""
    with tempfile.TemporaryDirectory() as cache:
        env = {**os.environ, "PYTHONPATH": str(ROOT), "PYTHONPYCACHEPREFIX": cache}
        env.pop("PYTHONDONTWRITEBYTECODE", None)
        for arguments in (BASE, *CALLS.values()):
            cost(arguments, env)  # compiles what is not compiled yet
        rounds = [(cost(BASE, env), {name: cost(call, env) for name, call in CALLS.items()}) for _ in range(pairs)]
    base = statistics.median(base.elapsed for base, _ in rounds)
    print(f"imports alone  {1000 * base:4.0f} ms")
    good = True
    for name in CALLS:
        elapsed = statistics.median(costs[name].elapsed / base.elapsed for base, costs in rounds)
        processor = statistics.median(costs[name].processor / base.processor for base, costs in rounds)
        took = statistics.median(costs[name].elapsed for _, costs in rounds)
        print(f"{name:<13}  {1000 * took:4.0f} ms  {elapsed:.2f} x elapsed, {processor:.2f} x processor")
        good &= elapsed <= FLOOR
    return good


if __name__ == "__main__":
    sys.exit(not measure(int(sys.argv[1]) if len(sys.argv) > 1 else 9))
