"""The shipped table of core potentials against the catalogue of basis_set_exchange, and published counts.

Where the installed catalogue is of another version, sets that both have must still agree.
"""

import basis_set_exchange
import pytest

from checker import tables
from checker.chemistry.core_potentials import electrons_replaced, f_electrons_in_core, published_counts

SHIPPED = {
    name
    for row in tables.core_potentials()
    if row.source.startswith("basis_set_exchange")
    for name in row.names
    if any(row.replaced.values())
}


@pytest.mark.parametrize("name", sorted(SHIPPED))
def test_a_set_replaces_what_the_catalogue_says(name: str) -> None:
    elements = basis_set_exchange.get_basis(name)["elements"]
    catalogue = {int(z): held.get("ecp_electrons", 0) for z, held in elements.items()}
    assert {z: electrons_replaced(name, z) for z in catalogue} == catalogue


def test_no_set_with_core_potentials_of_the_catalogue_is_missing() -> None:
    with_potentials = {
        entry["display_name"]
        for entry in basis_set_exchange.get_metadata().values()
        if entry["role"] == "orbital" and "scalar_ecp" in entry["function_types"]
    }
    assert len(with_potentials) > 80
    assert with_potentials - SHIPPED == set()


def test_trivalent_lanthanides_of_dolg_1989() -> None:
    """Dolg, Stoll, Savin, Preuss, Theor. Chim. Acta 75, 173 (1989): 46 + 4f^n, Gd 53, Lu 60 (from memory)."""
    for z, n_f in zip(range(58, 72), range(1, 15), strict=True):
        held = {(count.electrons, count.f_electrons_in_core) for count in published_counts(z)}
        assert (46 + n_f, n_f) in held


def test_trivalent_actinides_of_moritz_2007() -> None:
    """Moritz, Cao, Dolg, Theor. Chem. Acc. 117, 297 (2007): 78 + 5f^n, U 81, Cm 85 (from memory)."""
    for z in range(90, 104):
        held = {(count.electrons, count.f_electrons_in_core) for count in published_counts(z)}
        assert (78 + z - 89, z - 89) in held
    assert f_electrons_in_core(96, 85) == 7


@pytest.mark.parametrize(
    ("z", "count"),
    [
        # P. J. Hay, W. R. Wadt, J. Chem. Phys. 82, 270 and 299 (1985), from memory
        (26, 10),
        (26, 18),
        (79, 60),
        (79, 68),
        # K. A. Peterson et al., J. Chem. Phys. 119, 11099 and 11113 (2003), from memory
        (33, 10),
        (51, 28),
        (83, 60),
        # D. Andrae et al., Theor. Chim. Acta 77, 123 (1990), from memory
        (46, 28),
        (78, 60),
        # W. Küchle, M. Dolg, H. Stoll, H. Preuss, J. Chem. Phys. 100, 7535 (1994), from memory
        (92, 60),
    ],
)
def test_counts_of_the_papers_are_known(z: int, count: int) -> None:
    assert count in {published.electrons for published in published_counts(z)}
