"""Real numbers as geometry files write them, Fortran exponents among them."""

_D_TO_E = bytes.maketrans(b"Dd", b"Ee")


def real(token: bytes) -> float:
    """Return the number; raise ValueError where there is none.

    >>> real(b"-1.5D+01")
    -15.0
    """
    if b"_" in token:  # Python would let 1_000 pass
        raise ValueError(token)
    return float(token.translate(_D_TO_E))


def reals(tokens: tuple[bytes, ...]) -> list[float]:
    """Return many numbers at once; raise ValueError where one is none."""
    try:
        found = list(map(float, tokens))
    except ValueError:
        return list(map(real, tokens))
    if b"_" in b"".join(tokens):
        raise ValueError(tokens)
    return found
