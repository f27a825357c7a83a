"""Mutated decks and arbitrary bytes through the command line's own entry: a report or a sentence, no traceback.

Three tests share the cases: 335 each in an ordinary run (1,005 in all), 6,670 each (20,010) in the long one:
``python -m pytest tests/properties/test_cli_fuzz.py --hypothesis-profile=extended``.
"""

import io
import json
from collections.abc import Callable
from contextlib import redirect_stderr, redirect_stdout
from pathlib import Path

import pytest
from hypothesis import given
from hypothesis import strategies as st

from checker.cli import run

SAMPLES = Path(__file__).parent.parent.parent / "sample_decks"
SEEDS = sorted(path for path in SAMPLES.iterdir() if path.is_file() and path.suffix in {".toml", ".json", ".xyz"})
NAMES = ("a.deck.toml", "a.deck.json", "a.xyz", "a.extxyz", "a")

Mutation = Callable[[bytes], bytes]


def _cut(at: float, length: int) -> Mutation:
    return lambda text: text[: int(at * len(text))] + text[int(at * len(text)) + length :]


def _put(at: float, piece: bytes) -> Mutation:
    return lambda text: text[: int(at * len(text))] + piece + text[int(at * len(text)) :]


def _twice(at: float, length: int) -> Mutation:
    return lambda text: text[: int(at * len(text)) + length] + text[int(at * len(text)) :]


FRACTIONS = st.floats(0, 1)
PIECES = st.one_of(
    st.binary(max_size=8),
    st.sampled_from(
        [
            b"\n", b"\r", b"\t", b"\x00", b"\xef\xbb\xbf", b"\xff\xfe", b"[", b"]" * 40, b"[" * 3000, b"{", b"}",
            b"=", b'"', b"'", b"#", b"nan", b"inf", b"-", b"1e999", b"1.0D+00", b"9" * 5000, b"-1", b"0", b"999",
            b"true", b"D", b"Xx", b"Og", b"charge=1", b"multiplicity=3", b'Lattice="5 0 0 0 5 0 0 0 5"',
            b"[species]", b"[[accepted]]", b"ghost_atoms = [1]\n", b"length_unit = 'bohr'\n",
            b'geometry = "../x.xyz"\n', b'environment = "gas"\n', b"[core_potential]\nreplaced = { H = 2 }\n",
            "\u00e9".encode(), b"\x1b[31m", b"[occupations]\nalpha = { A1 = 3 }\n",
            b"[[fragments]]\natoms = [1]\ncharge = 9\n",
        ]
    ),
)  # fmt: skip
MUTATIONS = st.one_of(
    st.builds(_cut, FRACTIONS, st.integers(1, 60)),
    st.builds(_put, FRACTIONS, PIECES),
    st.builds(_twice, FRACTIONS, st.integers(1, 60)),
)


def _reports(argv: list[str]) -> None:
    """Run the command and hold it to its contract."""
    out, err = io.StringIO(), io.StringIO()
    with redirect_stdout(out), redirect_stderr(err):
        status = run(argv)
    said = out.getvalue() + err.getvalue()
    assert status in {0, 1, 2}, said
    assert "Traceback" not in said
    if "json" in argv:
        report = json.loads(out.getvalue())
        assert report["decks"]
        assert sum(report["summary"][verdict] for verdict in ("clear", "doubtful", "halted", "unreadable")) == len(
            report["decks"]
        )
        assert (status == 2) == any(deck["verdict"] == "unreadable" for deck in report["decks"])
    else:
        assert "\x1b" not in said


@pytest.fixture(scope="module")
def folder(tmp_path_factory: pytest.TempPathFactory) -> Path:
    return tmp_path_factory.mktemp("decks")


@given(content=st.binary(max_size=400), name=st.sampled_from(NAMES), form=st.sampled_from(["json", "terminal"]))
def test_arbitrary_bytes(folder: Path, content: bytes, name: str, form: str) -> None:
    path = folder / name
    path.write_bytes(content)
    _reports(["check", str(path), "--format", form])


@given(
    seed=st.sampled_from(SEEDS),
    mutations=st.lists(MUTATIONS, min_size=1, max_size=4),
    form=st.sampled_from(["json", "terminal"]),
)
def test_mutated_decks(folder: Path, seed: Path, mutations: list[Mutation], form: str) -> None:
    content = seed.read_bytes()
    for mutate in mutations:
        content = mutate(content)
    path = folder / seed.name
    path.write_bytes(content)
    _reports(["check", str(path), "--format", form])


WHOLE = st.one_of(st.integers(-3, 12), st.sampled_from([10**6, 2**63 - 1, -(2**63)]))
COORDINATE = st.one_of(st.floats(-9, 9), st.sampled_from([0.0, 1e6, -1e6, 1e-300]))
SYMBOL = st.sampled_from("H He Li C N O F Na Si P S Cl Fe Cu Zn I Gd Hg U Og D T".split())
COUNTS = st.dictionaries(st.sampled_from(["A1", "B1u", "Ag", "E", "T2", "A''", "Pi", "x"]), WHOLE, max_size=3)


def _table(**values: st.SearchStrategy[object]) -> st.SearchStrategy[dict[str, object]]:
    return st.fixed_dictionaries({}, optional=values)


DECKS = st.fixed_dictionaries(
    {
        "deck_version": st.just(1),
        "species": st.fixed_dictionaries(
            {
                "charge": WHOLE,
                "atoms": st.lists(st.tuples(SYMBOL, COORDINATE, COORDINATE, COORDINATE), min_size=1, max_size=9),
            },
            optional={
                "multiplicity": WHOLE,
                "ghost_atoms": st.lists(st.integers(1, 9), max_size=3, unique=True),
                "length_unit": st.sampled_from(["angstrom", "bohr"]),
                "environment": st.sampled_from(["gas", "solution", "embedded", "crystal"]),
            },
        ),
    },
    optional={
        "symmetry": _table(
            point_group=st.sampled_from(["C1", "C2v", "D2h", "Td", "D6h", "Dinfh", "Kh", "Q7", ""])
        ),
        "occupations": _table(alpha=COUNTS, beta=COUNTS) | _table(paired=COUNTS, unpaired=COUNTS),
        "treatment": _table(
            spin_treatment=st.sampled_from(["restricted", "restricted-open", "unrestricted"]),
            intent=st.sampled_from(["ground", "excited", "broken-symmetry", "vertical"]),
            frozen_orbitals=WHOLE | COUNTS,
            state_irrep=st.text(max_size=4),
        ),
        "core_potential": st.fixed_dictionaries(
            {"name": st.sampled_from(["from-basis", "def2-ecp", "nonesuch"])},
            optional={"replaced": st.dictionaries(SYMBOL.filter(lambda s: s not in "DT"), WHOLE, max_size=3)},
        ),
        "basis": st.fixed_dictionaries({"name": st.sampled_from(["def2-TZVP", "cc-pVTZ-PP", ""])}),
        "fragments": st.lists(
            st.fixed_dictionaries(
                {"atoms": st.lists(st.integers(1, 9), max_size=3, unique=True)},
                optional={"charge": WHOLE, "multiplicity": WHOLE, "spin": st.sampled_from(["up", "down"])},
            ),
            max_size=2,
        ),
        "accepted": st.lists(
            st.fixed_dictionaries(
                {"rule": st.sampled_from(["spin-parity", "nonesuch"]), "reason": st.text(max_size=9)}
            ),
            max_size=2,
        ),
    },
)


@given(deck=DECKS, form=st.sampled_from(["json", "terminal"]))
def test_lawful_decks_of_unlawful_chemistry(folder: Path, deck: dict[str, object], form: str) -> None:
    path = folder / "b.deck.json"
    path.write_text(json.dumps(deck))
    _reports(["check", str(path), "--format", form])
