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
from checker.chemistry.lines import Line, line_through
from checker.chemistry.symmetry_search import Found, approximate_operations

OTHER_STARTS = 6
"""So many operations that were left out may start a group of their own."""


def largest_group(body: Body, tolerance: float) -> Fit:
    """Return the largest group for which no atom has to move farther than the tolerance.

    `body` is no line; no two atoms of a kind are nearer than four times the tolerance.
    """
    found = approximate_operations(body, tolerance)
    elements = _elements(found)
    whole = _fit_of(body, trivial(len(body)), elements, len(elements))
    if whole is not None and whole.deviation <= tolerance:
        return whole
    best = _grown(body, elements, tolerance, len(elements))
    left_out = [
        element
        for element, misfit in zip(elements, found.misfit.tolist(), strict=True)
        if element not in best.closed and misfit <= 2.0 * tolerance
    ]
    for start in left_out[:OTHER_STARTS]:
        other = _grown(body, [start, *elements], tolerance, len(elements))
        best = max(best, other, key=lambda fit: (len(fit.closed), -fit.deviation))
    return best


def next_higher(body: Body, lower: Fit | Line | None, tolerance: float, reach: float) -> tuple[str, float] | None:
    """Return the nearest group that holds a lower one, and its deviation in angstrom; None beyond `reach`."""
    if lower is None:
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
    best: Fit | None = None
    seen: set[tuple[int, bytes]] = set()
    most = 4 * (len(found.misfit) + len(group))
    for element, misfit in zip(_elements(found), found.misfit.tolist(), strict=True):
        if best is not None and misfit > 2.0 * best.deviation:
            break
        if element in group or element.key in seen:
            continue
        seen |= group.beside(element)
        fit = _fit_of(body, group, [element], most)
        if fit is not None and fit.deviation <= reach and (best is None or fit.deviation < best.deviation):
            best = fit
    return None if best is None else (best.symbol, best.deviation)


def _grown(body: Body, elements: list[Element], tolerance: float, n_found: int) -> Fit:
    """Let elements in one after the other, as long as the group that comes of it fits."""
    best = fitted(body, trivial(len(body)))
    assert best is not None
    refused: set[tuple[int, bytes]] = set()
    for element in elements:
        if element in best.closed or element.key in refused:
            continue
        fit = _fit_of(body, best.closed, [element], n_found)
        if fit is not None and fit.deviation <= tolerance:
            best = fit
        else:
            refused |= best.closed.beside(element)
    return best


def _fit_of(body: Body, group: Closed, further: list[Element], n_found: int) -> Fit | None:
    closed = enlarged(group, further, most=4 * n_found + 8)
    return None if closed is None else fitted(body, closed)


def _elements(found: Found) -> list[Element]:
    permutations = np.ascontiguousarray(found.permutations)
    return [Element(p, hand) for p, hand in zip(permutations, found.handedness.tolist(), strict=True)]
