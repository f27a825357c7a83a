"""bond_radii.csv against the library it was read from: mendeleev, which cites Pyykko and co-workers."""

import pytest
from mendeleev import element

from checker.tables.structure import bond_radii

COLUMNS = ("covalent_radius_pyykko", "covalent_radius_pyykko_double", "covalent_radius_pyykko_triple")


@pytest.mark.parametrize("z", [1, 5, 6, 7, 8, 9, 14, 15, 16, 17, 26, 35, 53, 78, 92, 118])
def test_radii_are_those_of_the_source(z: int) -> None:
    read = element(z)
    expected = [getattr(read, column) for column in COLUMNS]
    assert list(bond_radii()[z]) == [None if value is None else pytest.approx(value / 100) for value in expected]
