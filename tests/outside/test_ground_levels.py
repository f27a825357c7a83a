"""Ground levels against mendeleev, the NIST multiplicities of qc-AtomDB, and published levels of awkward atoms."""

import csv
import importlib.util
import math
from functools import cache
from pathlib import Path

import pytest

from checker import tables
from checker.chemistry.configurations import anion_is_bound, ground_level, usual_charges
from checker.chemistry.shells import parse_configuration
from checker.elements import number_of, symbol_of, written_ion
from checker.errors import NotDerivable

ALL = range(1, 119)

# Configurations and levels of neutral atoms: W. C. Martin, A. Musgrove, S. Kotochigova, J. E. Sansonetti, "Ground
# Levels and Ionization Energies for the Neutral Atoms", NIST (from memory).
AWKWARD = {
    "Cr": ("[Ar] 3d5 4s", "7S3"),
    "Cu": ("[Ar] 3d10 4s", "2S1/2"),
    "Nb": ("[Kr] 4d4 5s", "6D1/2"),
    "Mo": ("[Kr] 4d5 5s", "7S3"),
    "Ru": ("[Kr] 4d7 5s", "5F5"),
    "Rh": ("[Kr] 4d8 5s", "4F9/2"),
    "Pd": ("[Kr] 4d10", "1S0"),
    "Ag": ("[Kr] 4d10 5s", "2S1/2"),
    "La": ("[Xe] 5d 6s2", "2D3/2"),
    "Ce": ("[Xe] 4f 5d 6s2", "1G*4"),
    "Gd": ("[Xe] 4f7 5d 6s2", "9D*2"),
    "W": ("[Xe] 4f14 5d4 6s2", "5D0"),
    "Pt": ("[Xe] 4f14 5d9 6s", "3D3"),
    "Au": ("[Xe] 4f14 5d10 6s", "2S1/2"),
    "Ac": ("[Rn] 6d 7s2", "2D3/2"),
    "Th": ("[Rn] 6d2 7s2", "3F2"),
    "Pa": ("[Rn] 5f2 6d 7s2", "(4,3/2)11/2"),
    "U": ("[Rn] 5f3 6d 7s2", "(9/2,3/2)*6"),
    "Np": ("[Rn] 5f4 6d 7s2", "(4,3/2)11/2"),
    "Cm": ("[Rn] 5f7 6d 7s2", "9D*2"),
    "Lr": ("[Rn] 5f14 7s2 7p", "2P*1/2"),
}


@cache
def mendeleev_column(column: str) -> dict[int, object]:
    from mendeleev.fetch import fetch_table

    elements = fetch_table("elements")
    return dict(zip(elements["atomic_number"].tolist(), elements[column].tolist(), strict=True))


@cache
def nist_multiplicities() -> dict[tuple[int, int], int]:
    """(Z, charge) of neutral atoms and cations with an electron left; its anions are isoelectronic guesses."""
    package = importlib.util.find_spec("atomdb")
    assert package is not None and package.origin is not None
    lines = (Path(package.origin).parent / "data" / "multiplicities_table.csv").read_text(encoding="utf-8")
    _, charges, *rows = csv.reader(lines.splitlines())
    table = {
        (int(z), int(charge)): int(value)
        for z, *values in rows
        for charge, value in zip(charges[1:], values, strict=True)
    }
    return {(z, q): value for (z, q), value in table.items() if 0 <= q < z and value != 0}


@pytest.mark.parametrize(("symbol", "published"), AWKWARD.items())
def test_awkward_atoms_have_their_published_level(symbol: str, published: tuple[str, str]) -> None:
    z = number_of(symbol)
    assert z is not None
    found = ground_level(z, 0)
    assert (found.configuration, found.level) == published


def test_neutral_configurations_agree_with_mendeleev_but_for_ds_and_rg() -> None:
    """Both are predicted: 6d8 7s2 and 6d9 7s2 here, one 7s electron in mendeleev."""
    theirs = mendeleev_column("electronic_configuration")
    differ = {symbol_of(z) for z in ALL if ground_level(z, 0).occupation != parse_configuration(str(theirs[z]))}
    assert differ == {"Ds", "Rg"}


def test_every_multiplicity_that_nist_gives_and_we_know_agrees() -> None:
    compared, differ = 0, {}
    for (z, charge), theirs in nist_multiplicities().items():
        try:
            ours = ground_level(z, charge).multiplicity
        except NotDerivable:
            continue
        compared += 1
        if ours != theirs:
            differ[written_ion(z, charge)] = (ours, theirs)
    assert differ == {}
    assert compared > 1_100


def test_we_know_every_charge_to_4_that_nist_gives_but_one() -> None:
    """Os2+ is refused: compilations and calculations disagree (5d6 5D4 or 5d5 6s 7S3)."""
    refused = set()
    for z, charge in nist_multiplicities():
        if charge <= 4:
            try:
                ground_level(z, charge)
            except NotDerivable:
                refused.add(written_ion(z, charge))
    assert refused == {"Os2+"}


def test_anions_are_bound_where_the_electron_affinity_is_positive() -> None:
    """Affinities of mendeleev, not above zero is unbound; what either side leaves open is not compared."""
    affinity = mendeleev_column("electron_affinity")
    compared, differ = 0, {}
    for z in ALL:
        ours, value = anion_is_bound(z, -1), affinity[z]
        if ours is None or not isinstance(value, float) or math.isnan(value):
            continue
        compared += 1
        if ours != (value > 0):
            differ[symbol_of(z)] = (ours, value)
    assert differ == {}
    assert compared > 60


def test_usual_charges_are_oxidation_states_of_mendeleev() -> None:
    from mendeleev.fetch import fetch_table

    states = fetch_table("oxidationstates")
    theirs: dict[int, set[int]] = {}
    for z, state in zip(states["atomic_number"].tolist(), states["oxidation_state"].tolist(), strict=True):
        theirs.setdefault(z, set()).add(state)
    unknown = {symbol_of(z): set(usual_charges(z)) - theirs.get(z, set()) for z in tables.usual_charges()}
    assert {symbol: charges for symbol, charges in unknown.items() if charges} == {}
