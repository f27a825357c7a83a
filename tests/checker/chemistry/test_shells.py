"""Reading, writing and counting configurations."""

import pytest
from hypothesis import given
from hypothesis import strategies as st

from checker import tables
from checker.chemistry.shells import (
    NOBLE_GAS_CORES,
    NOBLE_GAS_ELECTRONS,
    capacity,
    electrons_in,
    electrons_per_shell,
    functions_in_subshell,
    open_subshells,
    parse_configuration,
    radial_nodes,
    write_configuration,
)


def test_a_core_is_expanded_and_a_bare_subshell_holds_one() -> None:
    assert parse_configuration("[Ne] 3s2 3p") == ((1, 0, 2), (2, 0, 2), (2, 1, 6), (3, 0, 2), (3, 1, 1))


@pytest.mark.parametrize("symbol", NOBLE_GAS_CORES)
def test_cores_hold_the_electrons_of_their_noble_gas(symbol: str) -> None:
    assert electrons_in(parse_configuration(f"[{symbol}]")) == NOBLE_GAS_ELECTRONS[symbol]


@pytest.mark.parametrize(
    ("text", "named"),
    [
        ("[Fe] 4s", r"\[Fe\]"),
        ("3d11", "3d11"),
        ("2d1", "2d1"),
        ("1p", "1p"),
        ("4s0", "4s0"),
        ("3x2", "3x2"),
        ("[Ar] 3p", "3p"),
    ],
)
def test_what_no_atom_has_is_named(text: str, named: str) -> None:
    with pytest.raises(ValueError, match=named):
        parse_configuration(text)


def test_every_stored_configuration_reads_back() -> None:
    """Written with the largest core, subshells ascending; a closed shell is written out, as in [He] 2s2 2p6."""
    configurations = {row.configuration for row in tables.ground_levels().values()}
    assert len(configurations) > 150
    for text in configurations:
        assert parse_configuration(write_configuration(parse_configuration(text))) == parse_configuration(text)


@given(st.integers(1, 7), st.integers(0, 5))
def test_radial_nodes_are_n_minus_l_minus_one(n: int, ell: int) -> None:
    if ell < n:
        assert radial_nodes(n, ell) + ell + 1 == n
    else:
        with pytest.raises(ValueError, match="no subshell"):
            radial_nodes(n, ell)


def test_counts_of_iron() -> None:
    iron = parse_configuration("[Ar] 3d6 4s2")
    assert electrons_in(iron) == 26
    assert electrons_per_shell(iron) == {1: 2, 2: 8, 3: 14, 4: 2}
    assert open_subshells(iron) == ((3, 2, 6),)
    assert [functions_in_subshell(ell) for ell in range(4)] == [1, 3, 5, 7]
    assert [capacity(ell) for ell in range(4)] == [2, 6, 10, 14]
