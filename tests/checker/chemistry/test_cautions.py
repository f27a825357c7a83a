"""Groups and substances that call for caution, told from formulas and bonds."""

import numpy as np
import pytest

from checker.chemistry.attachment import hill_formula
from checker.chemistry.bonding import Bonds, perceive_bonds
from checker.chemistry.cautions import may_hold_some, of_elements, of_molecules
from checker.elements import number_of
from checker.tables import read_rows

ROWS = read_rows("cautions.csv")


def bonded(symbols: str, pairs: str) -> tuple[np.ndarray, Bonds]:
    """Atoms by symbol and bonds as pairs of 1-based numbers, no geometry needed."""
    numbers = np.array([number_of(symbol) for symbol in symbols.split()])
    neighbours: tuple[list[int], ...] = tuple([] for _ in numbers)
    for pair in pairs.split():
        i, j = (int(end) - 1 for end in pair.split("-"))
        neighbours[i].append(j)
        neighbours[j].append(i)
    return numbers, Bonds(neighbours, tuple([1.0] * len(near) for near in neighbours), {}, ())


@pytest.mark.parametrize(
    ("symbols", "pairs", "kind"),
    [
        pytest.param("C N O O", "1-2 2-3 2-4", "energetic", id="nitro_on_one_carbon"),
        pytest.param("C C C C C C N O O", "1-2 2-3 3-4 4-5 5-6 6-1 1-7 7-8 7-9", None, id="nitrobenzene"),
        pytest.param("C C C C C C N O O N O O", "1-2 2-3 3-4 4-5 5-6 6-1 1-7 7-8 7-9 3-10 10-11 10-12",
                     "energetic", id="dinitrobenzene"),
        pytest.param("C O N O O", "1-2 2-3 3-4 3-5", "energetic", id="nitrate_ester"),
        pytest.param("C N N O O", "1-2 2-3 3-4 3-5", "energetic", id="nitramine"),
        pytest.param("C N N N", "1-2 2-3 3-4", "energetic", id="organic_azide"),
        pytest.param("C O O C", "1-2 2-3 3-4", "energetic", id="peroxide"),
        pytest.param("C O O H", "1-2 2-3 3-4", "energetic", id="hydroperoxide"),
        pytest.param("Cl O O O O N", "1-2 1-3 1-4 1-5", "energetic", id="perchlorate_beside_nitrogen"),
        pytest.param("P O F C", "1-2 1-3 1-4", "toxic", id="phosphonofluoride"),
        pytest.param("N O O O", "1-2 1-3 1-4", None, id="nitrate_ion"),
        pytest.param("H O N O O", "1-2 2-3 3-4 3-5", None, id="nitric_acid"),
        pytest.param("N N N", "1-2 2-3", None, id="azide_ion"),
        pytest.param("H O O H", "1-2 2-3 3-4", None, id="hydrogen_peroxide"),
        pytest.param("O O O", "1-2 2-3", None, id="ozone"),
        pytest.param("C O C", "1-2 2-3", None, id="ether"),
        pytest.param("C C O O", "1-2 2-3 2-4", None, id="carboxylate"),
        pytest.param("C P O O O", "1-2 2-3 2-4 2-5", None, id="phosphonate"),
        pytest.param("P F F F F F F", "1-2 1-3 1-4 1-5 1-6 1-7", None, id="hexafluorophosphate"),
    ],
)  # fmt: skip
def test_groups(symbols: str, pairs: str, kind: str | None) -> None:
    assert [caution.kind for caution in of_molecules(*bonded(symbols, pairs))] == [kind] * (kind is not None)


def test_many_carbons_thin_a_group_out() -> None:
    chain = " ".join(f"{i}-{i + 1}" for i in range(1, 15))
    assert of_molecules(*bonded("C C C C C C O O C C C C C C C", chain)) == []
    assert len(of_molecules(*bonded("C C O O C C C C C C C C C C C", "1-2 2-3 3-4 4-5"))) == 1


def test_a_substance_is_found_among_other_molecules() -> None:
    numbers, bonds = bonded("O H H H F", "1-2 1-3 4-5")
    assert [caution.what for caution in of_molecules(numbers, bonds)] == [
        "the formula is that of hydrogen fluoride"
    ]


def test_carbonyls_are_known_as_a_whole() -> None:
    rows = [[0.0, 0.0, 0.0]]
    for direction in ([1, 1, 1], [1, -1, -1], [-1, 1, -1], [-1, -1, 1]):
        rows += [[d * r / 3**0.5 for d in direction] for r in (1.82, 2.96)]
    numbers = np.array([28, *[6, 8] * 4])
    assert [c.kind for c in of_molecules(numbers, perceive_bonds(numbers, np.array(rows)))] == ["toxic"]


def test_elements() -> None:
    assert [c.what for c in of_elements([92, 8, 92])] == ["uranium is without a stable isotope"]
    assert of_elements([1, 6, 7, 8, 26, 83]) == []
    assert {c.kind for z in range(84, 119) for c in of_elements([z])} == {"radioactive"}


def test_a_look_at_molecules_is_worth_it_only_where_the_elements_are_there() -> None:
    assert not may_hold_some({1, 6})
    assert not may_hold_some({1, 8})
    assert may_hold_some({1, 6, 7, 26})


def test_the_table_is_whole() -> None:
    formulas = [row["keys"] for row in ROWS if row["by"] == "formula"]
    symbols = [s for row in ROWS if row["by"] == "element" for s in row["keys"].split()]
    assert len(set(formulas)) == len(formulas)
    assert len(set(symbols)) == len(symbols)
    assert {row["kind"] for row in ROWS} == {"radioactive", "toxic", "energetic"}
    for formula in formulas:  # in Hill order, or it would never be found
        spelled = "".join(f" {c}" if c.isupper() else c for c in formula)
        numbers = [number_of(part.rstrip("0123456789")) for part in spelled.split()]
        counts = [int(part.lstrip("".join(filter(str.isalpha, part))) or 1) for part in spelled.split()]
        assert hill_formula(np.repeat(np.array(numbers), counts)) == formula
