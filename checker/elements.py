"""Element names, symbols and covalent radii, from the library `periodictable`."""

from functools import cache

MAX_ATOMIC_NUMBER = 118
HYDROGEN_ISOTOPES = {"D": 2, "T": 3}


@cache
def _symbols() -> tuple[str, ...]:
    """Symbols by atomic number; entry 0 is empty."""
    import periodictable

    return ("", *(periodictable.elements[z].symbol for z in range(1, MAX_ATOMIC_NUMBER + 1)))


@cache
def numbers_by_symbol() -> dict[str, int]:
    """Atomic number by symbol as written in the periodic table, without D and T."""
    return {symbol: z for z, symbol in enumerate(_symbols()) if z}


def symbol_of(z: int) -> str:
    """Return the symbol of atomic number `z`, 1 to 118.

    >>> symbol_of(26)
    'Fe'
    """
    if not 1 <= z <= MAX_ATOMIC_NUMBER:
        raise ValueError(f"no element has the atomic number {z}")
    return _symbols()[z]


def number_of(symbol: str) -> int | None:
    """Return the atomic number of a symbol in any case (D and T are hydrogen), or None if there is none.

    >>> number_of("CL"), number_of("d"), number_of("Xx")
    (17, 1, None)
    """
    written = symbol.strip().capitalize()
    if written in HYDROGEN_ISOTOPES:
        return 1
    return numbers_by_symbol().get(written)


def mass_number_of(symbol: str) -> int:
    """Return 2 for D, 3 for T and 0, the natural mixture, for every other symbol."""
    return HYDROGEN_ISOTOPES.get(symbol.strip().capitalize(), 0)


@cache
def name_of(z: int) -> str:
    """Return the English name of an element in lower case."""
    import periodictable

    return str(periodictable.elements[z].name)


def written_ion(z: int, charge: int) -> str:
    """Return an atom or ion as written.

    >>> written_ion(26, 2), written_ion(17, -1), written_ion(18, 0)
    ('Fe2+', 'Cl-', 'Ar')
    """
    if charge == 0:
        return symbol_of(z)
    return f"{symbol_of(z)}{abs(charge) if abs(charge) > 1 else ''}{'+' if charge > 0 else '-'}"


@cache
def covalent_radius(z: int) -> float | None:
    """Return the covalent radius in angstrom (Cordero et al., Dalton Trans. 2008, 2832), or None above curium."""
    import periodictable

    radius = periodictable.elements[z].covalent_radius
    return None if radius is None else float(radius)
