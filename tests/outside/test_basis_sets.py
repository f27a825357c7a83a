"""The shipped basis sets against the catalogue of basis_set_exchange, and functions against PySCF.

Where the installed catalogue is of another version than the shipped table, the counts are compared no further.
PySCF brings sets of its own, typed in from other places than the catalogue's.
"""

from functools import cache, partial
from typing import Any
from unittest import mock

import basis_set_exchange
import pytest
from ase.collections import g2
from ase.data import atomic_numbers
from basis_set_exchange import api, compose, manip, memo, misc

from checker.chemistry.basis_names import key_of
from checker.chemistry.basis_sets import BasisSet, Form, Shells, basis_set, n_functions
from checker.chemistry.core_potentials import electrons_replaced
from checker.chemistry.job_basis import job_basis
from checker.tables.basis_sets import basis_set_rows

CATALOGUE = {entry["display_name"]: entry for entry in basis_set_exchange.get_metadata().values()}
LETTERS = "spdfghiklm"
#: The only sets with an l that the catalogue makes cartesian for some elements (Na to Ar), spherical for others.
MIXED = {"6-311++G*", "6-311++G**", "6-311+G*", "6-311+G**", "6-311G(d,p)", "6-311G*", "6-311G**"}
MIXED_ELEMENTS = range(11, 19)
G2_SETS = ("STO-3G", "6-31G", "6-31G*", "6-31+G*", "6-311++G**", "cc-pVDZ", "cc-pVTZ", "aug-cc-pVTZ", "def2-SVP",
           "def2-TZVPP", "6-311+G(3df,2p)")  # fmt: skip


@pytest.fixture(scope="module", autouse=True)
def quick_catalogue() -> Any:
    """Let the package share what it reads between copies that nothing here changes: a tenth of the time."""
    merge = partial(manip.merge_element_data, use_copy=False)
    with mock.patch.object(manip, "merge_element_data", merge), mock.patch.object(memo, "memoize_enabled", False):
        yield


def elements_in_catalogue(name: str) -> dict[int, Any]:
    entry = CATALOGUE[name]
    path = entry["versions"][entry["latest_version"]]["file_relpath"]
    elements = compose.compose_table_basis(path, api._default_data_dir)["elements"]
    return {int(z): held for z, held in elements.items()}


def written(shells: tuple[Shells, ...]) -> str:
    """Write shells as the catalogue does: 9s4p1d.3s2p1d."""
    primitive = "".join(f"{s.n_primitive}{LETTERS[s.angular_momentum]}" for s in shells)
    contracted = "".join(f"{s.n_contracted}{LETTERS[s.angular_momentum]}" for s in shells)
    return f"{primitive}.{contracted}" if shells else ""


def known(name: str) -> BasisSet:
    found = basis_set(name)
    assert found is not None, name
    return found


def test_the_whole_catalogue_is_there_by_its_own_names() -> None:
    shipped = {name for row in basis_set_rows() for name in row.names}
    assert len(CATALOGUE) >= 776
    assert shipped == set(CATALOGUE)
    for name in CATALOGUE:
        assert key_of(known(name).name) == key_of(name)


@pytest.mark.parametrize("name", sorted(CATALOGUE))
def test_a_set_has_what_the_catalogue_says(name: str) -> None:
    """Elements, shells and exponents by l, core electrons, forms, role: every element."""
    mine, elements = known(name), elements_in_catalogue(name)
    assert {z: written(shells) for z, shells in mine.shells.items()} == {
        z: misc.contraction_string(held, compact=True) for z, held in elements.items()
    }
    assert mine.role == (CATALOGUE[name]["role"] if any(mine.shells.values()) else "potential")
    if CATALOGUE[name]["role"] == "orbital":
        replaced = {z: held.get("ecp_electrons", 0) for z, held in elements.items()}
        assert {z: electrons_replaced(name, z) for z in elements} == replaced
    for z, held in elements.items():
        if not (name in MIXED and z in MIXED_ELEMENTS):
            assert_forms_agree(mine, held)


def assert_forms_agree(mine: BasisSet, held: dict[str, Any]) -> None:
    for shell in held.get("electron_shells", ()):
        for momentum in shell["angular_momentum"]:
            if momentum > 1:
                assert mine.form_at(momentum) == shell["function_type"].removeprefix("gto_")


def test_sets_with_both_forms_in_one_momentum_are_those_known() -> None:
    """A calculation has one form of d functions: that of most elements. 6-311G* is spherical (common practice)."""
    for name in MIXED:
        forms = {
            (shell["function_type"], z in MIXED_ELEMENTS)
            for z, held in elements_in_catalogue(name).items()
            for shell in held["electron_shells"]
            if 2 in shell["angular_momentum"]
        }
        assert forms == {("gto_cartesian", True), ("gto_spherical", False)}
        assert known(name).form == "spherical"


@pytest.mark.parametrize("name", ["6-311++G(2d,2p)", "6-311++G(3df,3pd)", "6-311+G(2d,p)", "6-311G(2df,2pd)",
                                  "6-31G(2df,p)", "6-31G(3df,3pd)"])  # fmt: skip
def test_a_name_that_spells_out_its_polarization_gives_the_published_set(name: str) -> None:
    """The sets of that kind in the catalogue, put together from the set without polarization."""
    from checker.chemistry.basis_names import read_polarized
    from checker.chemistry.basis_sets import _polarized_set

    spelled = read_polarized(key_of(name))
    assert spelled is not None
    made = _polarized_set(spelled)
    assert made is not None
    both = made.shells.keys() & known(name).shells.keys()
    assert both >= set(range(3, 11))
    differ = {z for z in both if contracted(made, z) != contracted(known(name), z)}
    assert differ == ({1, 2} if name == "6-31G(2df,p)" else set())
    assert made.form == known(name).form == "spherical"


def contracted(held: BasisSet, z: int) -> str:
    return written(held.shells[z]).split(".")[1]


def test_the_catalogue_gives_hydrogen_two_p_functions_where_one_is_named() -> None:
    """The shipped table follows the catalogue here: 6-31G(2df,p) has the pair of a (2p) set on H, not one p."""
    shells = elements_in_catalogue("6-31G(2df,p)")[1]["electron_shells"]
    exponents = [float(x) for shell in shells if shell["angular_momentum"] == [1] for x in shell["exponents"]]
    assert exponents == [1.5, 0.375]
    assert contracted(known("6-31G(2df,p)"), 1) == "2s2p"


@cache
def in_pyscf(name: str, symbol: str, form: Form) -> int:
    gto = pytest.importorskip("pyscf.gto")  # not made for Windows
    z = atomic_numbers[symbol]
    built = gto.M(atom=f"{symbol} 0 0 0", basis=name, cart=form == "cartesian", spin=z % 2, verbose=0)
    return int(built.nao)


@pytest.mark.parametrize("form", ["spherical", "cartesian"])
@pytest.mark.parametrize("name", G2_SETS)
def test_functions_of_the_g2_molecules_are_those_of_pyscf(name: str, form: Form) -> None:
    for molecule in g2.names:
        symbols = g2[molecule].get_chemical_symbols()
        mine = job_basis(name, {}, form, g2[molecule].numbers).n_functions
        assert mine == sum(in_pyscf(name, symbol, form) for symbol in symbols), molecule


@pytest.mark.parametrize("form", ["spherical", "cartesian"])
@pytest.mark.parametrize("molecule", ["CH3CH2OH", "SiCl4", "C6H6", "LiF", "2-butyne"])
def test_functions_of_whole_molecules_are_those_of_pyscf(molecule: str, form: Form) -> None:
    gto = pytest.importorskip("pyscf.gto")
    atoms = g2[molecule]
    rows = list(zip(atoms.get_chemical_symbols(), atoms.positions.tolist(), strict=True))
    built = gto.M(atom=rows, basis="def2-tzvpp", cart=form == "cartesian", verbose=0)
    assert job_basis("def2-TZVPP", {}, form, atoms.numbers).n_functions == built.nao


@pytest.mark.parametrize(
    ("name", "symbol"),
    [("cc-pVTZ-PP", "I"), ("def2-QZVP", "U"), ("def2-QZVP", "Au"), ("ANO-RCC", "Fe"), ("LANL2DZ", "Fe"),
     ("cc-pV5Z", "Fe"), ("6-31G*", "Fe"), ("def2-TZVPD", "I")],
)  # fmt: skip
@pytest.mark.parametrize("form", ["spherical", "cartesian"])
def test_functions_of_heavy_atoms_are_those_of_pyscf(name: str, symbol: str, form: Form) -> None:
    z = atomic_numbers[symbol]
    if n_functions(name, z) is None:
        with pytest.raises(Exception, match=r"(?i)not found|not available"):
            in_pyscf(name, symbol, form)
    else:
        assert n_functions(name, z, form) == in_pyscf(name, symbol, form)
