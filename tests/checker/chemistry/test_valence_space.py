"""The minimal valence space: electrons by group, and unpaired electrons that can be counted by hand."""

import pytest
from mendeleev.fetch import fetch_table

from checker.chemistry.valence_space import most_unpaired, valence_electrons, valence_orbitals


def test_valence_electrons_are_those_of_the_group() -> None:
    """Groups of the IUPAC periodic table, as mendeleev ships them; He is filled as group 18 with two."""
    groups = fetch_table("elements").set_index("atomic_number")["group_id"]
    for z in [*range(3, 57), *range(72, 88), *range(104, 119)]:
        group = int(groups[z])
        assert valence_electrons(z) == (group if group <= 12 else group - 10), z
    assert [valence_electrons(z) for z in (1, 2)] == [1, 2]


def test_f_block_counts_f_electrons() -> None:
    assert [valence_electrons(z) for z in (57, 64, 70, 71, 89, 92, 102, 103)] == [3, 10, 16, 3, 3, 6, 16, 3]
    assert [valence_orbitals(z) for z in (57, 70, 71, 102, 103)] == [16, 16, 9, 16, 9]


@pytest.mark.parametrize(
    ("numbers", "charge", "n_bonds", "most"),
    [
        pytest.param([1], 0, 0, 1, id="H"),
        pytest.param([2], 0, 0, 0, id="He"),
        pytest.param([7], 0, 0, 3, id="N"),
        pytest.param([10], 0, 0, 0, id="Ne"),
        pytest.param([26], 0, 0, 8, id="Fe"),
        pytest.param([8, 8], 0, 1, 2, id="O2_with_its_bond"),
        pytest.param([6, 1, 1, 1, 1], 0, 0, 8, id="methane_taken_apart"),
        pytest.param([6, 1, 1, 1, 1], 0, 4, 0, id="methane_whole"),
        pytest.param([6, 1, 1, 1], 0, 3, 1, id="methyl"),
        pytest.param([6, 1, 1], 0, 2, 2, id="methylene"),
        pytest.param([6, 6, 1, 1, 1, 1], 0, 5, 2, id="ethylene"),
        pytest.param([54, 9, 9], 0, 2, None, id="XeF2_does_not_fit"),
        pytest.param([1, 1, 1], 1, 3, None, id="H3_cation_does_not_fit"),
        pytest.param([2], -1, 0, None, id="He_anion_does_not_fit"),
    ],
)
def test_most_unpaired(numbers: list[int], charge: int, n_bonds: int, most: int | None) -> None:
    assert most_unpaired(numbers, charge, n_bonds) == most
