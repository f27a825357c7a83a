"""Names of basis sets as people write them, brought to one key, and the names nearest to one that is unknown.

Case, spaces, hyphens, underscores, slashes and the kind of bracket carry no meaning: ``aug-cc-pVTZ``,
``augccpvtz`` and ``AUG CC-PVTZ`` are one set. In the sets named after the split of the valence shell a star is d
functions on all atoms but H and He, and a second star p functions on those: ``6-31G(d,p)`` is ``6-31G**``
(P. C. Hariharan, J. A. Pople, Theor. Chim. Acta 28, 213 (1973)).
"""

import re
from collections.abc import Iterable
from dataclasses import dataclass

__all__ = ["LONGEST", "Polarized", "key_of", "keys_of", "loose_key_of", "nearest_keys", "read_polarized"]

_WITHOUT_MEANING = re.compile(r"[\s\-_/‐-―−]+")
_ONE_SPELLING = str.maketrans({"[": "(", "]": ")", "{": "(", "}": ")", "∗": "*", "＋": "+"})
_STARS = (("g(d,p)", "g**"), ("g(d)", "g*"))
#: The one pair of sets that brackets tell apart, where file names have none.
_SV_P = re.compile(r"sv_p(?![a-z])_?")
#: cc-pVTZ+d is how cc-pV(T+d)Z is written where brackets are not wanted.
_TIGHT_D = re.compile(r"pv([dtq5])z\+d(?![a-z])")
_POLARIZED = re.compile(r"(6311?\+{0,2}g)\(([2-9]?d)([2-9]?f)?(?:,([2-9]?p)([2-9]?d)?)?\)")
_LIKENESS = 0.6
LONGEST = 60  # characters of a name that are compared; published ones have half of that


@dataclass(frozen=True, slots=True)
class Polarized:
    """A split-valence set with the polarization functions that its name spells out.

    Attributes
    ----------
    base : key of the set without them.
    suffix : how they are written, such as ``(2df,p)``.
    on_heavy, on_light : what Li to Ar and what H and He get, such as ``2d1f`` and ``1p``.

    """

    base: str
    suffix: str
    on_heavy: str
    on_light: str


def key_of(name: str) -> str:
    """Return what all spellings of a set's name have in common.

    >>> key_of("6-31+G(d,p)"), key_of("aug-cc-pV(T+d)Z"), key_of("aug_cc-pvtz+d")
    ('631+g**', 'augccpv(t+d)z', 'augccpv(t+d)z')
    """
    spelled = _SV_P.sub("sv(p)", name.casefold().translate(_ONE_SPELLING))
    key = _WITHOUT_MEANING.sub("", spelled)
    for functions, stars in _STARS:
        key = key.replace(functions, stars)
    return _TIGHT_D.sub(r"pv(\1+d)z", key)


def keys_of(names: Iterable[str]) -> list[str]:
    """Return the keys of many names, worked out at one go as that costs a fifth."""
    return key_of("|".join(names)).split("|")


def loose_key_of(key: str) -> str:
    """Return a key without brackets and commas, stars spelled out; good only where one set alone has it.

    >>> loose_key_of("631+g**"), loose_key_of("augccpv(t+d)z")
    ('631+gdp', 'augccpvt+dz')
    """
    return re.sub(r"[(),]", "", key.replace("g**", "gdp").replace("g*", "gd"))


def read_polarized(key: str) -> Polarized | None:
    """Return the parts of a key such as ``6311+g(2df,p)``, or None if it is no such key.

    The notation is that of M. J. Frisch, J. A. Pople, J. S. Binkley, J. Chem. Phys. 80, 3265 (1984).

    >>> read_polarized("6311+g(2df,p)")
    Polarized(base='6311+g', suffix='(2df,p)', on_heavy='2d1f', on_light='1p')
    """
    parts = _POLARIZED.fullmatch(key)
    if parts is None:
        return None
    base, *functions = parts.groups(default="")
    d, f, p, light_d = (word if len(word) != 1 else f"1{word}" for word in functions)
    return Polarized(base, key.removeprefix(base), d + f, p + light_d)


def nearest_keys(key: str, known: Iterable[str], limit: int) -> list[str]:
    """Return the known keys most like a key, best first: those that go on from it, then those spelled alike."""
    from difflib import get_close_matches

    key, listed = key[:LONGEST], list(known)
    longer = sorted((other for other in listed if key and other.startswith(key)), key=len)
    return list(dict.fromkeys([*longer, *get_close_matches(key, listed, limit, _LIKENESS)]))[:limit]
