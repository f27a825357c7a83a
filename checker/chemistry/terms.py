"""LS terms of electron configurations, by counting microstates; Hund's rules; names of terms and levels.

A subshell l^n is the pair (l, n). Its microstates are counted by (M_L, 2M_S); the number of terms L, S is the
second difference of that count. Several open shells are joined by adding M_L and M_S, a convolution of counts.

References: E. U. Condon and G. H. Shortley, The Theory of Atomic Spectra (1935), chap. 7; F. Hund, Z. Phys. 33,
345 (1925). Names: NIST, an asterisk for odd parity ("4S*3/2").
"""

import math
import re
from collections import Counter
from collections.abc import Iterable, Mapping
from dataclasses import dataclass
from functools import cache

#: Letters of L = 0, 1, 2 ...: J is skipped, S and P do not come again.
L_LETTERS = "SPDFGHIKLMNOQRTUVWXYZ"
_LEVEL_NAME = re.compile(r"(?P<multiplicity>\d+)(?P<letter>[A-Z])(?P<odd>\*?)(?P<j>\d+(/2)?)")

Shell = tuple[int, int]


@dataclass(frozen=True, slots=True, order=True)
class Term:
    """An LS term: 2S+1, L, parity."""

    multiplicity: int
    orbital: int
    odd: bool = False

    @property
    def name(self) -> str:
        """The term as written, such as ``5D`` or ``4S*``."""
        return f"{self.multiplicity}{L_LETTERS[self.orbital]}{'*' if self.odd else ''}"

    @property
    def twice_j(self) -> tuple[int, ...]:
        """2J of the levels of the term, ascending."""
        twice_s = self.multiplicity - 1
        lowest = abs(2 * self.orbital - twice_s)
        return tuple(range(lowest, 2 * self.orbital + twice_s + 1, 2))


@dataclass(frozen=True, slots=True, order=True)
class Level:
    """A level of an LS term: the term and 2J."""

    term: Term
    twice_j: int

    @property
    def name(self) -> str:
        """The level as written, such as ``5D4`` or ``4S*3/2``."""
        return self.term.name + written_j(self.twice_j)


def written_j(twice_j: int) -> str:
    """Return J as written.

    >>> written_j(8), written_j(3)
    ('4', '3/2')
    """
    return f"{twice_j}/2" if twice_j % 2 else str(twice_j // 2)


def parse_level(name: str) -> Level:
    """Return the level of an LS name with J; raise ValueError for any other text.

    >>> parse_level("4S*3/2")
    Level(term=Term(multiplicity=4, orbital=0, odd=True), twice_j=3)
    """
    found = _LEVEL_NAME.fullmatch(name)
    if found is None or found["letter"] not in L_LETTERS:
        raise ValueError(f"{name!r} is no LS level name such as 5D4 or 4S*3/2")
    whole, _, half = found["j"].partition("/")
    twice_j = int(whole) if half else 2 * int(whole)
    term = Term(int(found["multiplicity"]), L_LETTERS.index(found["letter"]), bool(found["odd"]))
    return Level(term, twice_j)


def n_states(shells: Iterable[Shell]) -> int:
    """Return the number of microstates: the product of the binomials C(2(2l+1), n)."""
    return math.prod(math.comb(2 * (2 * ell + 1), n) for ell, n in shells)


def max_unpaired(shells: Iterable[Shell]) -> int:
    """Return how many electrons can be unpaired at most in a configuration.

    >>> max_unpaired([(2, 6), (0, 1)])
    5
    """
    return sum(min(n, 2 * (2 * ell + 1) - n) for ell, n in shells)


def is_open(shell: Shell) -> bool:
    """Tell whether a shell is neither empty nor full."""
    ell, n = shell
    return 0 < n < 2 * (2 * ell + 1)


def terms_of(shells: Iterable[Shell]) -> Mapping[Term, int]:
    """Return how often each LS term occurs in a configuration; closed shells may be left out.

    >>> sorted(term.name for term in terms_of([(1, 2)]))
    ['1D', '1S', '3P']
    """
    return _terms_of_open(tuple(sorted(shell for shell in shells if is_open(shell))))


def has_level(shells: Iterable[Shell], level: Level) -> bool:
    """Tell whether a configuration has a term of that name with that J."""
    return level.term in terms_of(shells) and level.twice_j in level.term.twice_j


def hund_ground_level(ell: int, n: int) -> Level:
    """Return the ground level of one open shell l^n by Hund's three rules: largest S, then L, then J by filling.

    Raises ValueError for more electrons than the shell holds.

    >>> hund_ground_level(2, 6).name, hund_ground_level(3, 13).name
    ('5D4', '2F*7/2')
    """
    half = 2 * ell + 1
    if not 0 <= n <= 2 * half:
        raise ValueError(f"a shell of quantum number {ell} holds no {n} electrons")
    n_unpaired = min(n, 2 * half - n)
    orbital = sum(range(ell, ell - n % half, -1))
    term = Term(n_unpaired + 1, orbital, odd=(ell * n) % 2 == 1)
    twice_j = term.twice_j
    return Level(term, twice_j[-1] if n > half else twice_j[0])


@cache
def _terms_of_open(shells: tuple[Shell, ...]) -> Mapping[Term, int]:
    counts = Counter({(0, 0): 1})
    for ell, n in shells:
        counts = _convolve(counts, _microstates(ell, n))
    odd = sum(ell * n for ell, n in shells) % 2 == 1
    found = {}
    for m_l, twice_ms in sorted(key for key in counts if min(key) >= 0):
        occurs = (
            counts[m_l, twice_ms]
            - counts[m_l + 1, twice_ms]
            - counts[m_l, twice_ms + 2]
            + counts[m_l + 1, twice_ms + 2]
        )
        if occurs:
            found[Term(twice_ms + 1, m_l, odd)] = occurs
    return found


@cache
def _microstates(ell: int, n: int) -> Counter[tuple[int, int]]:
    """Return the number of microstates of l^n by (M_L, 2M_S): n_alpha and n_beta electrons placed separately."""
    counts: Counter[tuple[int, int]] = Counter()
    for n_alpha in range(n + 1):
        twice_ms = 2 * n_alpha - n
        for alpha_ml, alpha_ways in _same_spin(ell, n_alpha).items():
            for beta_ml, beta_ways in _same_spin(ell, n - n_alpha).items():
                counts[alpha_ml + beta_ml, twice_ms] += alpha_ways * beta_ways
    return counts


@cache
def _same_spin(ell: int, n: int) -> Counter[int]:
    """Return the number of ways to place n electrons of one spin, by M_L: one orbital m after the other."""
    ways: dict[int, Counter[int]] = {0: Counter({0: 1})}
    for m in range(-ell, ell + 1):
        for placed in sorted(ways, reverse=True):
            target = ways.setdefault(placed + 1, Counter())
            for m_l, count in ways[placed].items():
                target[m_l + m] += count
    return ways.get(n, Counter())


def _convolve(a: Counter[tuple[int, int]], b: Counter[tuple[int, int]]) -> Counter[tuple[int, int]]:
    joined: Counter[tuple[int, int]] = Counter()
    for (a_ml, a_ms), a_ways in a.items():
        for (b_ml, b_ms), b_ways in b.items():
            joined[a_ml + b_ml, a_ms + b_ms] += a_ways * b_ways
    return joined
