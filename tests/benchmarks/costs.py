"""What a judgement costs, as ratios measured in one run; nothing here passes or fails.

Run: ``python tests/benchmarks/costs.py``; start-up has a script of its own. The floors it stands for:

- 2,000 frames of 20 atoms at 500 frames a second or better in one process, all rules;
- a geometry of 100,000 atoms judged in under 10 s and 1 GB;
- no scipy under 2,000 atoms.
"""

import resource
import subprocess
import sys
import tempfile
import time
from collections.abc import Callable
from pathlib import Path

import numpy as np

ROOT = Path(__file__).parent.parent.parent
sys.path.insert(0, str(ROOT))
SMALL_DECK = ROOT / "sample_decks" / "01-marsh-water.deck.toml"


def seconds(action: Callable[[], object]) -> float:
    start = time.perf_counter()
    action()
    return time.perf_counter() - start


def fresh(*argv: str) -> Callable[[], object]:
    """Return an action that runs Python anew, its output thrown away."""
    return lambda: subprocess.run([sys.executable, *argv], cwd=ROOT, stdout=subprocess.DEVNULL, check=False)


def ethane_like(n_atoms: int, seed: int) -> str:
    """A chain of CH2 groups closed by hydrogens, a little shaken: a plain 20-atom molecule for n = 20."""
    rng = np.random.default_rng(seed)
    n_carbon = (n_atoms - 2) // 3
    carbons = np.array([[1.27 * i, 0.42 * (-1) ** i, 0.0] for i in range(n_carbon)])
    outward = np.array([[0.0, 0.63 * (-1) ** i, 0.0] for i in range(n_carbon)])
    hydrogens = np.concatenate([carbons + outward + [0, 0, 0.89], carbons + outward - [0, 0, 0.89]])
    ends = np.array([carbons[0] + [-0.89, -0.63, 0.0], carbons[-1] + [0.89, -0.63 * (-1) ** (n_carbon - 1), 0.0]])
    xyz = np.concatenate([carbons, hydrogens, ends]) + rng.normal(scale=0.03, size=(n_atoms, 3))
    symbols = ["C"] * n_carbon + ["H"] * (2 * n_carbon + 2)
    rows = [f"{s} {x:.5f} {y:.5f} {z:.5f}" for s, (x, y, z) in zip(symbols, xyz.tolist(), strict=True)]
    return "\n".join([str(n_atoms), "charge=0 multiplicity=1", *rows, ""])


def frames() -> None:
    """All rules over 2,000 frames in this process, after one warm deck, against reading the same frames alone."""
    from checker.api import check_path
    from checker.reading import FillIn, read_paths

    with tempfile.TemporaryDirectory() as folder:
        path = Path(folder) / "frames.extxyz"
        path.write_text("".join(ethane_like(20, seed) for seed in range(2000)))
        list(check_path(SMALL_DECK))
        reading = seconds(lambda: list(read_paths([str(path)], fill_in=FillIn())))
        start = time.perf_counter()
        n_clear = sum(report.verdict == "clear" for report in check_path(path))
        judging = time.perf_counter() - start
    print(f"2,000 frames of 20 atoms: {2000 / judging:.0f} a second, {n_clear} clear (floor 500 a second)")
    print(f"    {judging / reading:.1f} x reading alone")


def many_atoms() -> None:
    """A box of 33,333 waters and one neon atom, judged by a process of its own whose peak memory is read."""
    n = 100_000
    grid = np.stack(np.meshgrid(*[np.arange(33)] * 3), axis=-1).reshape(-1, 3)[: n // 3] * 3.1
    water = np.array([[0.0, 0.0, 0.117], [0.0, 0.757, -0.467], [0.0, -0.757, -0.467]])
    xyz = (grid[:, None, :] + water).reshape(-1, 3)
    rows = [f"{'OHH'[i % 3]} {x:.4f} {y:.4f} {z:.4f}" for i, (x, y, z) in enumerate(xyz.tolist())]
    rows += ["Ne -3.2 -3.2 -3.2"] * (n - len(rows))
    with tempfile.TemporaryDirectory() as folder:
        path = Path(folder) / "box.xyz"
        path.write_text("\n".join([str(n), "charge=0 multiplicity=1", *rows, ""]))
        took = seconds(fresh("-m", "checker", "check", str(path)))
    peak_mb = resource.getrusage(resource.RUSAGE_CHILDREN).ru_maxrss / 1024
    print(f"100,000 atoms: {took:.1f} s, peak memory of the children so far {peak_mb:.0f} MB (floor 10 s, 1 GB)")


def lazy_scipy() -> None:
    """Whether a small deck imports scipy, asked of a fresh interpreter."""
    code = "import sys; from checker.cli import run; run(['check', sys.argv[1]]); print('scipy' in sys.modules)"
    said = subprocess.run(
        [sys.executable, "-c", code, str(SMALL_DECK)], cwd=ROOT, capture_output=True, text=True, check=True
    )
    print(f"scipy imported for a small deck: {said.stdout.split()[-1]}")


if __name__ == "__main__":
    lazy_scipy()
    frames()
    many_atoms()
