"""Basis sets: names as people write them, shells, functions, sets that have an element, the basis of a job."""

from importlib.resources import files

import numpy as np
import pytest

from checker.chemistry.basis_names import key_of, keys_of
from checker.chemistry.basis_sets import (
    Form,
    basis_set,
    elements_of,
    form_of,
    functions_per_shell,
    n_functions,
    nearest_names,
    nearest_set_with,
    shells_of,
)
from checker.chemistry.core_potentials import electrons_replaced
from checker.chemistry.job_basis import job_basis
from checker.errors import NotDerivable
from checker.tables.basis_sets import basis_set_rows

H, C, OXYGEN, FE, BR, IODINE, AU, U = 1, 6, 8, 26, 35, 53, 79, 92
WATER, IRON_CARBONYL, METHYL_IODIDE = (
    np.array([OXYGEN, H, H]),
    np.array([FE, C, OXYGEN]),
    np.array([C, H, H, H, IODINE]),
)


class TestNames:
    @pytest.mark.parametrize(
        ("written", "name"),
        [
            ("cc-pVTZ", "cc-pVTZ"),
            ("cc-pvtz", "cc-pVTZ"),
            ("ccpvtz", "cc-pVTZ"),
            ("CC_PVTZ", "cc-pVTZ"),
            (" cc pVTZ ", "cc-pVTZ"),
            ("cc\u2013pVTZ", "cc-pVTZ"),  # an en dash out of a word processor
            ("aug-cc-pVTZ", "aug-cc-pVTZ"),
            ("AUGCCPVTZ", "aug-cc-pVTZ"),
            ("cc-pV(T+d)Z", "cc-pV(T+d)Z"),
            ("cc-pvt+dz", "cc-pV(T+d)Z"),
            ("cc-pVTZ+d", "cc-pV(T+d)Z"),
            ("aug-cc-pvqz+d", "aug-cc-pV(Q+d)Z"),
            ("6-31G*", "6-31G*"),
            ("6-31g(d)", "6-31G*"),
            ("631G*", "6-31G*"),
            ("6-31Gd", "6-31G*"),
            ("6-31G**", "6-31G(d,p)"),
            ("6-31G(d, p)", "6-31G(d,p)"),
            ("6-31G[d,p]", "6-31G(d,p)"),
            ("6-31gdp", "6-31G(d,p)"),
            ("6-31+G(d)", "6-31+G*"),
            ("6-31++g(d,p)", "6-31++G**"),
            ("6-311++G(2d,2p)", "6-311++G(2d,2p)"),
            ("6-311++g(2d, 2p)", "6-311++G(2d,2p)"),
            ("6-311+G(2df,2p)", "6-311+G(2df,2p)"),
            ("6-311+g(3df,2p)", "6-311+G(3df,2p)"),
            ("m6-31G(d)", "m6-31G*"),
            ("6-31++G(d,p)-J", "6-31++G**-J"),
            ("def2tzvp", "def2-TZVP"),
            ("Def2-SVPD", "def2-SVPD"),
            ("def2-SV(P)", "def2-SV(P)"),
            ("def2-sv_p", "def2-SV(P)"),
            ("def2svp", "def2-SVP"),
            ("lanl2dz", "LANL2DZ"),
            ("sto3g", "STO-3G"),
            ("MIDI!", "MIDI!"),
            ("midi", "MIDI"),
            ("pcseg 1", "pcseg-1"),
            ("cc-pVTZ/JKFIT", "cc-pVTZ-JKFIT"),
        ],
    )
    def test_a_set_is_known_by_all_its_spellings(self, written: str, name: str) -> None:
        found = basis_set(written)
        assert found is not None
        assert found.name == name

    @pytest.mark.parametrize(
        "written",
        ["", " ", "*", "()", "cc-pVTTZ", "ma-def2-SVP", "6-31G(p,d)", "6-31G(0d)", "6-31G(d')", "6-311G(2d,p",
         "B3LYP", "VTZ", "DZP", "def2", "cc-pV10Z", "a|b", "6-31G|6-31G*", "\u0000", "6" * 100_000],
    )  # fmt: skip
    def test_what_is_no_set_is_unknown(self, written: str) -> None:
        assert basis_set(written) is None
        assert shells_of(written, C) is None
        assert n_functions(written, C) is None
        assert elements_of(written) is None
        assert form_of(written) is None

    def test_no_two_sets_share_a_spelling(self) -> None:
        held: dict[str, int] = {}
        for number, row in enumerate(basis_set_rows()):
            for name in row.names:
                assert held.setdefault(key_of(name), number) == number, name

    def test_names_at_one_go_have_the_keys_they_have_alone(self) -> None:
        names = [name for row in basis_set_rows() for name in row.names]
        assert keys_of(names) == [key_of(name) for name in names]

    @pytest.mark.parametrize(
        ("written", "nearest"),
        [
            ("cc-pVTTZ", "cc-pVTZ"),
            ("ma-def2-SVP", "def2-SVP"),
            ("DZP", "DZP (Dunning-Hay)"),
            ("6-31G(p,d)", "6-31G(2df,p)"),
        ],
    )
    def test_an_unknown_name_has_neighbours(self, written: str, nearest: str) -> None:
        assert nearest in nearest_names(written)

    def test_what_resembles_nothing_has_none(self) -> None:
        assert nearest_names("B3LYP") == nearest_names("") == ()


class TestContents:
    """Contracted and primitive counts as the sets' papers print them: (9s4p1d) -> [3s2p1d] (from memory)."""

    @pytest.mark.parametrize(
        ("name", "z", "shells"),
        [
            ("STO-3G", C, [(0, 2, 6), (1, 1, 3)]),  # combined sp shells
            ("6-31G*", C, [(0, 3, 10), (1, 2, 4), (2, 1, 1)]),
            ("cc-pVDZ", C, [(0, 3, 9), (1, 2, 4), (2, 1, 1)]),  # general contraction
            ("cc-pVTZ", H, [(0, 3, 5), (1, 2, 2), (2, 1, 1)]),
            ("def2-SVP", C, [(0, 3, 7), (1, 2, 4), (2, 1, 1)]),
            ("LANL2DZ", FE, [(0, 3, 5), (1, 3, 5), (2, 2, 5)]),
        ],
    )
    def test_shells(self, name: str, z: int, shells: list[tuple[int, int, int]]) -> None:
        found = shells_of(name, z)
        assert found is not None
        assert [(s.angular_momentum, s.n_contracted, s.n_primitive) for s in found] == shells

    @pytest.mark.parametrize(
        ("name", "z", "form", "functions"),
        [
            ("cc-pVDZ", C, None, 14),
            ("cc-pVTZ", C, None, 30),
            ("cc-pVTZ", C, "cartesian", 35),
            ("aug-cc-pVTZ", C, None, 46),
            ("6-31G*", C, None, 15),
            ("6-31G*", C, "spherical", 14),
            ("6-311++G**", C, None, 22),
            ("6-31G*", FE, None, 36),  # six d functions, seven f
            ("6-31G*", FE, "cartesian", 39),
            ("6-31G*", FE, "spherical", 34),
            ("6-31G*", U, None, None),
            ("def2-ECP", IODINE, None, None),
        ],
    )
    def test_functions(self, name: str, z: int, form: Form | None, functions: int | None) -> None:
        assert n_functions(name, z, form) == functions

    def test_functions_per_shell_for_g(self) -> None:
        assert (functions_per_shell(4, "spherical"), functions_per_shell(4, "cartesian")) == (9, 15)

    def test_every_packed_content_is_read_whole(self) -> None:
        for row in basis_set_rows():
            found = basis_set(row.names[0])
            assert found is not None
            assert found.shells, row.names
            for z, shells in found.shells.items():
                assert 1 <= z <= 118
                momenta = [shell.angular_momentum for shell in shells]
                assert momenta == sorted(set(momenta))
                assert all(shell.n_primitive and shell.n_contracted for shell in shells), (row.names, z)

    def test_roles(self) -> None:
        roles = {
            name: basis_set(name) for name in ("cc-pVTZ", "cc-pVTZ-RIFIT", "def2-ECP", "def2-universal-JKFIT")
        }
        assert {name: (s.role, s.is_auxiliary) for name, s in roles.items() if s is not None} == {
            "cc-pVTZ": ("orbital", False),
            "cc-pVTZ-RIFIT": ("rifit", True),
            "def2-ECP": ("potential", False),
            "def2-universal-JKFIT": ("jkfit", True),
        }

    def test_the_file_is_small(self) -> None:
        assert len(files("checker.tables").joinpath("basis_sets.csv").read_bytes()) < 250_000


class TestNearestSetWith:
    @pytest.mark.parametrize(
        ("name", "z", "found"),
        [
            ("cc-pVTZ", IODINE, "cc-pVTZ-PP"),
            ("aug-cc-pVQZ", AU, "aug-cc-pVQZ-PP"),
            ("6-31G*", AU, "def2-SVP"),
            ("6-31+G*", BR, "6-31G*"),
            ("def2-TZVPD", 58, "def2-TZVP"),
            ("def2-SVP", U, "ANO-RCC-VDZP"),
            ("def2-SVP", 118, "dyall-v2z"),
            ("cc-pVTZ-PP-RIFIT", C, "cc-pVTZ-RIFIT"),
            ("cc-pVTZ-RIFIT", U, None),
            ("def2-ECP", C, None),
            ("house-made", IODINE, None),
        ],
    )
    def test_it_is_alike_or_else_of_like_size(self, name: str, z: int, found: str | None) -> None:
        assert nearest_set_with(name, z) == found

    def test_it_has_the_element(self) -> None:
        for name in ("cc-pVDZ", "6-311G**", "STO-3G", "pc-2", "LANL2DZ"):
            for z in range(1, 119):
                found = nearest_set_with(name, z)
                assert found is not None
                assert shells_of(found, z)


class TestJobBasis:
    def test_functions_of_all_atoms_are_counted(self) -> None:
        assert job_basis("cc-pVDZ", {}, None, WATER).n_functions == 24
        assert job_basis("6-31G*", {}, None, WATER).n_functions == 19
        assert job_basis("cc-pVDZ", {}, None, np.array([], dtype=np.int64)).n_functions == 0

    def test_an_element_may_have_a_set_of_its_own(self) -> None:
        basis = job_basis("cc-pVTZ", {IODINE: "cc-pVTZ-PP"}, None, METHYL_IODIDE)
        assert basis.n_functions == 30 + 3 * 14 + (n_functions("cc-pVTZ-PP", IODINE) or 0)
        assert basis.form == "spherical"

    def test_one_form_for_all(self) -> None:
        assert job_basis("cc-pVTZ", {}, None, WATER).form == "spherical"
        assert job_basis("6-31G*", {}, None, WATER).form == "cartesian"
        assert job_basis("6-31G*", {}, "spherical", WATER).form == "spherical"
        assert job_basis("6-31G*", {}, None, IRON_CARBONYL).form is None
        assert job_basis("STO-3G", {}, None, WATER).form == "spherical"

    @pytest.mark.parametrize("form", [None, "spherical", "cartesian"])
    def test_shells_per_atom_hold_all_functions(self, form: Form | None) -> None:
        basis = job_basis("6-31G*", {}, form, IRON_CARBONYL)
        spherical, cartesian = basis.shells_per_atom("spherical"), basis.shells_per_atom("cartesian")
        momenta = np.arange(spherical.shape[1])
        by_hand = spherical @ (2 * momenta + 1) + cartesian @ ((momenta + 1) * (momenta + 2) // 2)
        assert by_hand.sum() == basis.n_functions

    @pytest.mark.parametrize(
        ("name", "for_element", "because"),
        [
            ("cc-pVTTZ", {}, "the basis set 'cc-pVTTZ' is not in the catalogue; near it are cc-pVTZ, "),
            ("house-made", {}, "the basis set 'house-made' is not in the catalogue"),
            ("cc-pVTZ", {}, "the basis set cc-pVTZ of the catalogue has no I"),
            ("def2-ECP", {}, "def2-ECP is a core potential, no basis set"),
            ("cc-pVTZ-RIFIT", {}, "cc-pVTZ-RIFIT is an auxiliary set (rifit), it expands no orbitals"),
            ("6-31G*", {IODINE: "cc-pVTZ-PP"},
             "6-31G* is made for cartesian functions and cc-pVTZ-PP for spherical ones; state basis.form"),
        ],
    )  # fmt: skip
    def test_what_cannot_be_counted_is_said(self, name: str, for_element: dict[int, str], because: str) -> None:
        with pytest.raises(NotDerivable) as raised:
            job_basis(name, for_element, None, METHYL_IODIDE)
        assert str(raised.value).startswith(because)

    def test_a_stated_form_settles_it(self) -> None:
        assert job_basis("6-31G*", {IODINE: "cc-pVTZ-PP"}, "spherical", METHYL_IODIDE).form == "spherical"


@pytest.mark.parametrize(
    ("written", "z", "replaced"),
    [("6-31G(d)", C, 0), ("6-31+gdp", C, 0), ("lanl08[d]", IODINE, 46), ("def2-sv_p", IODINE, 28),
     ("6-31G(d)", U, None)],
)  # fmt: skip
def test_core_potentials_are_found_by_the_same_spellings(written: str, z: int, replaced: int | None) -> None:
    assert electrons_replaced(written, z) == replaced
