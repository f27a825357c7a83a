"""Rebuild checker/tables/bond_radii.csv from the library mendeleev, keeping the head of the file.

Run by hand: ``python tests/rebuild/bond_radii.py``.
"""

from pathlib import Path

from mendeleev import get_all_elements

TABLE = Path(__file__).parents[2] / "checker" / "tables" / "bond_radii.csv"
COLUMNS = ("covalent_radius_pyykko", "covalent_radius_pyykko_double", "covalent_radius_pyykko_triple")


def main() -> None:
    """Write the table."""
    head = [line for line in TABLE.read_text(encoding="utf-8").splitlines() if line.startswith(("#", "number"))]
    lines = [
        ",".join(
            [str(element.atomic_number), element.symbol, *(written(getattr(element, name)) for name in COLUMNS)]
        )
        for element in get_all_elements()
    ]
    TABLE.write_text("\n".join([*head, *lines, ""]), encoding="utf-8")


def written(picometres: float | None) -> str:
    """Angstrom with two decimals; empty where nothing is known."""
    return "" if picometres is None else f"{picometres / 100:.2f}"


if __name__ == "__main__":
    main()
