"""The largest group of a body at a tolerance, and the next one above it.

Operations that a search finds near the tolerance need not close into a group, and what they generate need not stay
within it. So groups are grown from the best fitting operation on: one is let in if the whole group that it
generates still fits. Where operations that fit alone were left out, growing starts from them as well, and the
largest group wins, so that the outcome does not hang on which of two operations the noise has favoured.
"""

import numpy as np

from checker.chemistry.bodies import Body
from checker.chemistry.closure import Closed, Element, enlarged, trivial
from checker.chemistry.fitting import Fit, fitted
from checker.chemistry.irreps import MAX_AXIS
from checker.chemistry.lines import Line, line_through
from checker.chemistry.symmetry_search import Found, approximate_operations
from checker.errors import NotDerivable

OTHER_STARTS = 6
"""So many operations that were left out may start a group of their own."""

WITHOUT_HIGHER = ("Oh", "Ih", "D∞h")
"""Groups within no other one but that of a point."""


def largest_group(body: Body, tolerance: float) -> Fit:
    """Return the largest group for which no atom has to move farther than the tolerance.

    Parameters
    ----------
    body : no line; no two atoms of a kind nearer than four times the tolerance.
    tolerance : angstrom.

    Raises
    ------
    NotDerivable
        If an axis has a higher order than is listed.

    """
    found = approximate_operations(body, tolerance)
    elements = _elements(found)
    fits = _Fits(body, most=4 * len(elements) + 8)
    whole = fits.of(trivial(len(body)), elements)
    if whole is not None and whole.deviation <= tolerance:
        return whole
    _refuse_high_axis(elements)
    best = _grown(fits, elements, tolerance)
    left_out = [
        element
        for element, misfit in zip(elements, found.misfit.tolist(), strict=True)
        if element not in best.closed and misfit <= 2.0 * tolerance
    ]
    for start in left_out[:OTHER_STARTS]:
        other = _grown(fits, [start, *elements], tolerance)
        best = max(best, other, key=lambda fit: (len(fit.closed), -fit.deviation))
    return best


class _Fits:
    """Fits of groups on a body, each made once."""

    def __init__(self, body: Body, most: int) -> None:
        self._body = body
        self._most = most
        self._known: dict[frozenset[tuple[int, bytes]], Fit | None] = {}

    def of(self, group: Closed, further: list[Element]) -> Fit | None:
        """Fit the group that further elements generate with those of another; None if it is no point group."""
        closed = enlarged(group, further, self._most)
        if closed is None:
            return None
        key = frozenset(closed.elements)
        if key not in self._known:
            self._known[key] = fitted(self._body, closed)
        return self._known[key]


def _refuse_high_axis(elements: list[Element]) -> None:
    """Say so where what was found is a group indeed, but with an axis that is beyond the lists."""
    group = enlarged(trivial(len(elements[0].permutation)), elements, most=len(elements))
    if group is not None and (highest := int(group.orders[group.handedness == 1].max())) > MAX_AXIS:
        raise NotDerivable(
            f"its axis of order {highest} is higher than the groups listed, which end at {MAX_AXIS}"
        )


def next_higher(body: Body, lower: Fit | Line | None, tolerance: float, reach: float) -> tuple[str, float] | None:
    """Return the nearest group that holds a lower one, and its deviation in angstrom; None beyond `reach`."""
    if lower is None or lower.symbol in WITHOUT_HIGHER:
        return None
    if isinstance(lower, Line):
        return _higher_line(body, lower, reach)
    reach = min(reach, 0.25 * body.gap * (1.0 - 1e-9))
    line = line_through(body, reach)
    best = None if line is None else (line.symbol, line.deviation)
    if reach > tolerance:
        above = _nearest_above(body, lower.closed, reach)
        if above is not None and (best is None or above[1] < best[1]):
            return above
    return best


def _higher_line(body: Body, lower: Line, reach: float) -> tuple[str, float] | None:
    higher = line_through(body, reach)
    return None if higher is None or higher.symbol == lower.symbol else (higher.symbol, higher.deviation)


def _nearest_above(body: Body, group: Closed, reach: float) -> tuple[str, float] | None:
    """Try every operation that is not in the group, and what it makes of it.

    An operation of a group with deviation d has a misfit of 2 d at most, so the search may stop early.
    """
    found = approximate_operations(body, reach)
    fits = _Fits(body, most=4 * (len(found.misfit) + len(group)))
    best: Fit | None = None
    seen: set[tuple[int, bytes]] = set()
    for element, misfit in zip(_elements(found), found.misfit.tolist(), strict=True):
        if best is not None and misfit > 2.0 * best.deviation:
            break
        if element in group or element.key in seen:
            continue
        seen |= group.beside(element)
        fit = fits.of(group, [element])
        if fit is not None and fit.deviation <= reach and (best is None or fit.deviation < best.deviation):
            best = fit
    return None if best is None else (best.symbol, best.deviation)


def _grown(fits: _Fits, elements: list[Element], tolerance: float) -> Fit:
    """Let elements in one after the other, as long as the group that comes of it fits."""
    best = fits.of(trivial(len(elements[0].permutation)), [])
    assert best is not None
    refused: set[tuple[int, bytes]] = set()
    for element in elements:
        if element in best.closed or element.key in refused:
            continue
        fit = fits.of(best.closed, [element])
        if fit is not None and fit.deviation <= tolerance:
            best = fit
        else:
            refused |= best.closed.beside(element)
    return best


def _elements(found: Found) -> list[Element]:
    permutations = np.ascontiguousarray(found.permutations)
    return [Element(p, hand) for p, hand in zip(permutations, found.handedness.tolist(), strict=True)]
