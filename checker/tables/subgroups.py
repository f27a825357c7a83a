"""The table of abelian subgroups, loaded on first use; what its columns mean stands at its head."""

from collections import defaultdict
from collections.abc import Mapping
from dataclasses import dataclass
from functools import cache
from types import MappingProxyType

from checker.tables import read_rows


@dataclass(frozen=True, slots=True)
class SubgroupRow:
    """An abelian subgroup of a family of groups.

    Attributes
    ----------
    axis : the orders of axis it is for: ``odd``, ``even``, ``4k``, ``4k+2``, or empty for any.
    subgroup : its symbol.
    turn : its x, y, z in the axes of the group, or ``half step``.

    """

    axis: str
    subgroup: str
    turn: str

    def holds_for(self, n: int) -> bool:
        """Tell whether the row is for groups with an n-fold axis."""
        return {"odd": n % 2 == 1, "even": n % 2 == 0, "4k": n % 4 == 0, "4k+2": n % 4 == 2}.get(self.axis, True)


@cache
def abelian_rows() -> Mapping[str, tuple[SubgroupRow, ...]]:
    """Return the rows by family (``Dnh``, ``Td``), the preferred one first."""
    rows = defaultdict(list)
    for row in read_rows("abelian_subgroups.csv"):
        rows[row["family"]].append(SubgroupRow(row["axis"], row["subgroup"], row["turn"]))
    return MappingProxyType({family: tuple(of_family) for family, of_family in rows.items()})
