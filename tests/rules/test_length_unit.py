"""length-unit. Each id states the scale or the distances, in angstrom as read."""

import pytest
from ase import Atoms
from ase.cluster import Octahedron
from ase.collections import g2

from builders import job, run_rule
from checker.findings import Edit, Finding
from checker.geometry import ANGSTROM_PER_BOHR
from rules.length_unit import RULE

POLYATOMIC = sorted(name for name in g2.names if len(g2[name]) > 2)


def scaled(system: Atoms, scale: float, **species: object) -> list[Finding]:
    rows = [(s, *p) for s, p in zip(system.symbols, (scale * system.positions).tolist(), strict=True)]
    return run_rule(RULE, job(rows, species=dict(species)))


@pytest.mark.parametrize("scale", [1.0, 0.9, 1.15], ids=lambda s: f"scale_{s}")
def test_is_silent_on_g2_and_on_g2_stretched_or_compressed(scale: float) -> None:
    assert [name for name in g2.names if scaled(g2[name], scale)] == []


def test_finds_every_polyatomic_of_g2_in_the_wrong_unit() -> None:
    """Curtiss et al., J. Chem. Phys. 106, 1063 (1997), geometries as ASE ships them."""
    assert len(POLYATOMIC) == 120
    for name in POLYATOMIC:
        (long,) = scaled(g2[name], 1 / ANGSTROM_PER_BOHR)
        assert long.repairs[0].edits == (Edit("species.length_unit", "bohr"),), name
        (short,) = scaled(g2[name], ANGSTROM_PER_BOHR, length_unit="bohr")
        assert short.repairs[0].edits == (Edit("species.length_unit", "angstrom"),), name


@pytest.mark.parametrize(
    "rows",
    [
        pytest.param([("Ar", 0, 0, 0), ("Ar", 3.8, 0, 0), ("Ar", 1.9, 3.29, 0)], id="argon_trimer-3.8"),
        pytest.param([("Zn", 0, 0, 0), ("Zn", 4.2, 0, 0), ("Zn", 2.1, 3.6, 0)], id="zinc_trimer-4.2"),
        pytest.param([("H", 0, 0, 1.17 * i) for i in range(6)], id="hydrogen_chain-1.17"),
        pytest.param([("O", 0, 0, -1.7), ("U", 0, 0, 0), ("O", 0, 0, 1.7)], id="uranyl-1.70"),
        pytest.param([("O", 0, 0, 0), ("H", 0, 0, 1.9)], id="one_distance_only-1.9"),
        pytest.param([("Ne", 0, 0, 0), ("H", 0, 0, 2.3), ("H", 0, 0, 3.04)], id="neon_hydrogen-2.3"),
        pytest.param([("Na", 0, 0, 0), ("Cl", 2.7, 0, 0), ("Na", 2.7, 2.7, 0), ("Cl", 0, 2.7, 0)], id="salt-2.7"),
        pytest.param([("O", 0, 0, 0), ("H", 0, 0, 1.9), ("H", 0, 1.9, 0), ("O", 0, 0, 9), ("H", 0, 0, 9.97)],
                     id="one_true_bond_proves_angstrom"),
        pytest.param([("O", 0, 0, 0), ("O", 0, 0, 4), ("O", 0, 0, 8), ("O", 0, 0, 12)], id="separate_atoms-4.0"),
    ],
)  # fmt: skip
def test_is_silent_where_no_bond_is_expected(rows: list[tuple[str, float, float, float]]) -> None:
    assert not run_rule(RULE, job(rows))


def test_is_silent_on_a_metal_cluster() -> None:
    assert not scaled(Octahedron("Cu", 3), 1.0)


def test_more_atoms_make_it_surer() -> None:
    (three,), (fourteen,) = (scaled(g2[name], 1 / ANGSTROM_PER_BOHR) for name in ("H2O", "isobutane"))
    assert three.confidence < 0.7
    assert fourteen.confidence > 0.9


def test_says_both_ratios_and_the_way_out() -> None:
    (finding,) = scaled(g2["CH4"], 1 / ANGSTROM_PER_BOHR)
    assert finding.at == "species.length_unit"
    assert finding.message == (
        "the nearest neighbours stand at 1.92 times a bond's length; as bohr they would stand at 1.02; "
        'set length_unit = "bohr" (an XYZ file without a deck is in angstrom: multiply by 0.529177)'
    )


def test_the_unit_of_a_geometry_file_is_stated_in_the_deck() -> None:
    (finding,) = scaled(g2["CH4"], 1 / ANGSTROM_PER_BOHR, geometry="methane.xyz")
    assert finding.repairs[0].edits == (Edit("species.length_unit", "bohr"),)


def test_a_unit_converted_twice_is_said_so() -> None:
    (finding,) = scaled(g2["CH4"], 1 / ANGSTROM_PER_BOHR, length_unit="bohr")
    assert "converted twice" in finding.message
    assert finding.repairs == ()
