"""From a geometry to its point group, frame and abelian subgroup, exact about the tolerance.

The group found is the largest one for which no atom would have to move farther than the tolerance to make the body
exactly symmetric (see `fitting` for how the nearest symmetric body is found). All atoms weigh alike, so the centre
is the centroid.

Provides `find_symmetry` and `Symmetry`.
"""

from dataclasses import dataclass, field
from functools import cached_property

import numpy as np

from checker.chemistry import levels
from checker.chemistry.axes import placements
from checker.chemistry.bodies import Body, Floats, Ints, body_of
from checker.chemistry.closure import trivial
from checker.chemistry.descent import abelian_subgroups, operations_of
from checker.chemistry.fitting import Fit, fitted
from checker.chemistry.frames import (
    LABELS_WITHOUT_AXES,
    Placement,
    note_of,
    permutations_among,
    place,
    straightened,
)
from checker.chemistry.irreps import MAX_AXIS, common_groups, point_group
from checker.chemistry.lines import CONTINUOUS, Line, line_through, place_on_line
from checker.chemistry.point_groups import standard_operations
from checker.chemistry.symmetry_search import is_asymmetric
from checker.errors import NotDerivable

DEFAULT_TOLERANCE = 0.01
"""Angstrom. Coordinates printed to three decimals, and optimisations that stop at the usual step of about 0.001 to
0.003 angstrom, stay well below; the distortions that chemistry knows, such as those of Jahn and Teller or a
flattened pyramid, lie well above (common practice, no source)."""

LARGEST_REACH = 0.3
"""Angstrom: a higher group that needs larger moves than this is another molecule."""

MOST_ATOMS = 3_000
"""Beyond this the distances of all atoms from each other would not be held in memory lightly."""

FARTHEST = 1e5
"""Angstrom from the origin; farther out the squares of coordinates lose the digits that count here."""


@dataclass(frozen=True, eq=False)
class Symmetry:
    """The point group of a body at a tolerance, where it lies, and what is next above.

    Attributes
    ----------
    group : Schoenflies symbol.
    center : (3,) in the coordinates given, angstrom.
    deviation_angstrom : the largest distance an atom would have to move for exact symmetry.
    symmetrised : (n, 3) coordinates after that move, angstrom.
    tolerance : angstrom.
    axis : (3,) unit vector along a linear molecule; None for the others.
    axes : "as-given" or "mulliken": how labels are bound to axes.
    abelian_choice : "D2" or "C2v", for the abelian subgroup of Td and of Dnd with an even axis.

    """

    group: str
    center: Floats
    deviation_angstrom: float
    symmetrised: Floats
    tolerance: float
    axis: Floats | None
    axes: str
    abelian_choice: str
    _body: Body = field(repr=False)
    _fit: Fit | Line | None = field(repr=False)

    @cached_property
    def placement(self) -> Placement:
        """The group in the frame of its labels."""
        if isinstance(self._fit, Fit):
            placed = self._placed(self.group, self._fit.operations)
        else:
            placed = self.subgroup(self.group, self.axes)
        assert placed is not None, self.group
        return placed

    @cached_property
    def abelian(self) -> Placement:
        """The largest subgroup that is within D2h, in the frame of its own labels; see `abelian_subgroups`."""
        choices = [choice.symbol for choice in abelian_subgroups(self.group)]
        symbol = self.abelian_choice if self.abelian_choice in choices else choices[0]
        placed: Placement | None
        if symbol == self.group:
            placed = self.placement
        elif isinstance(self._fit, Fit):
            placed = self._placed(symbol, self.operations[operations_of(self.group, symbol)])
        else:
            placed = self.subgroup(symbol, self.axes)
        assert placed is not None, self.group
        return placed

    @property
    def operations(self) -> Floats:
        """(g, 3, 3) in the order of `standard_operations`; for continuous groups see `Placement`."""
        return self.placement.operations

    @property
    def permutations(self) -> Ints:
        """(g, n) image atom of each atom under each of the operations."""
        return self.placement.permutations

    @property
    def frame(self) -> Floats:
        """(3, 3) rotation R, x_standard = R (x - center)."""
        return self.placement.frame

    @property
    def frame_note(self) -> str:
        """How the coordinates' axes were turned, in words."""
        return self.placement.frame_note

    @property
    def abelian_group(self) -> str:
        """Symbol of the largest subgroup that is within D2h."""
        return self.abelian.group

    @property
    def abelian_frame(self) -> Floats:
        """(3, 3) rotation into the frame of the abelian group's labels."""
        return self.abelian.frame

    @cached_property
    def next_higher(self) -> tuple[str, float] | None:
        """The nearest group above this one, and the largest move of an atom (angstrom) that it asks for.

        None where no group above lies within `LARGEST_REACH`. Worked out when first asked for.
        """
        return levels.next_higher(self._body, self._fit, self.tolerance, LARGEST_REACH)

    def subgroup(self, symbol: str, axes: str = "as-given") -> Placement | None:
        """Place a group that is this one or within it; None where it is neither.

        Parameters
        ----------
        symbol : as `irreps.point_group` writes it.
        axes : "as-given" or "mulliken".

        """
        if self._fit is None:
            return _at_a_point(symbol, len(self.symmetrised))
        if isinstance(self._fit, Line):
            return place_on_line(symbol, self._fit, axes, self.tolerance)
        group = point_group(symbol)
        if group is None or group.order is None or len(self._fit.operations) % group.order:
            return None
        return self._placed(symbol, self._fit.operations, axes)

    def symmetrised_to(self, symbol: str, axes: str = "as-given") -> tuple[Floats, float] | None:
        """Return coordinates (n, 3) with this group or one within it, and the largest move of an atom, angstrom.

        Elements that nearly lie along the coordinate axes are turned to lie along them exactly; that is no move.
        None where the group is neither this one nor within it.
        """
        placed = self.subgroup(symbol, axes)
        if placed is None:
            return None
        if symbol == self.group:
            places = self.symmetrised - self.center
        elif self.axis is not None and symbol == "C∞v":
            places = np.outer(self._body.positions @ self.axis, self.axis)
        else:
            places = (self._body.positions[placed.permutations] @ placed.operations).mean(axis=0)
        moves = np.linalg.norm(self._body.positions - places, axis=1)
        return straightened(places, placed.frame) + self.center, float(moves.max())

    def within(self, tolerance: float) -> "Symmetry":
        """Return the symmetry at another tolerance (angstrom), lowered to what the body's like atoms allow."""
        most = 0.25 * self._body.gap * (1.0 - 1e-6)
        coordinates = self._body.positions + self.center
        return find_symmetry(
            self._body.kinds, coordinates, min(tolerance, most), axes=self.axes, abelian_choice=self.abelian_choice
        )

    def nearest_with(self, symbol: str, reach: float) -> tuple[Floats, float] | None:
        """Return coordinates (n, 3) with a group that the body may lack, and the largest move of an atom.

        None where an atom would have to move farther than `reach`, angstrom.
        """
        for share in (0.2, 0.5, 1.0):
            found = self.within(share * reach).symmetrised_to(symbol)
            if found is not None and found[1] <= reach:
                return found
        return None

    def shared_with(self, symbol: str) -> str:
        """Return the largest common group that lies both in this one and in another."""
        holder = {"C∞v": f"C{MAX_AXIS}v", "D∞h": f"D{MAX_AXIS}h", "Kh": "Ih"}.get(symbol, symbol)
        operations = standard_operations(holder)
        by_order = sorted(common_groups(), key=lambda name: (-_order(name), name != self.abelian_group))
        return next(
            name
            for name in by_order
            if len(operations) % _order(name) == 0
            and len(placements(operations, name))
            and self.subgroup(name) is not None
        )

    def _placed(self, symbol: str, matrices: Floats, axes: str | None = None) -> Placement | None:
        assert isinstance(self._fit, Fit)
        if symbol == "C1":  # most geometries; nothing to look for
            identity = np.arange(len(self.symmetrised))[None]
            return Placement(symbol, np.eye(3), LABELS_WITHOUT_AXES, standard_operations(symbol), identity)
        lookup = permutations_among(self._fit.operations, self._fit.permutations)
        found = placements(matrices, symbol)
        return place(
            symbol,
            found,
            lookup,
            positions=self._fit.symmetrised,
            axes=axes or self.axes,
            tolerance=self.tolerance,
        )


def find_symmetry(
    kinds: Ints,
    coordinates: Floats,
    tolerance: float = DEFAULT_TOLERANCE,
    axes: str = "as-given",
    abelian_choice: str = "D2",
) -> Symmetry:
    """Find the point group of a body.

    Parameters
    ----------
    kinds : (n,) int, equal for atoms that an operation may exchange.
    coordinates : (n, 3) angstrom.
    tolerance : angstrom; how far an atom may lie from its place in an exactly symmetric body.
    axes : "as-given" or "mulliken".
    abelian_choice : "D2" or "C2v", for the abelian subgroup of Td and of Dnd with an even axis.

    Raises
    ------
    NotDerivable
        If there is no atom or more than `MOST_ATOMS`, if two atoms of one kind lie closer than four times the
        tolerance, if an axis has a higher order than is listed, or if an atom lies beyond `FARTHEST`.

    """
    if not 0 < len(kinds) <= MOST_ATOMS:
        raise NotDerivable(f"the symmetry of {len(kinds)} atoms is not worked out; from 1 to {MOST_ATOMS} it is")
    if not np.abs(coordinates).max() < FARTHEST:
        raise NotDerivable(f"an atom lies beyond {FARTHEST:g} angstrom, where distances are no longer exact")
    body, center = body_of(kinds, coordinates)
    fit = _fit(body, tolerance)
    if fit is None:
        group, deviation, places = "Kh", float(body.radii.max()), np.zeros_like(body.positions)
    else:
        group, deviation, places = fit.symbol, fit.deviation, fit.symmetrised
    axis = fit.axis if isinstance(fit, Line) else None
    return Symmetry(
        group, center, deviation, places + center, tolerance, axis, axes, abelian_choice, _body=body, _fit=fit
    )


def _fit(body: Body, tolerance: float) -> Fit | Line | None:
    """Fit the largest group; None for a body that is a point."""
    if body.radii.max() <= tolerance:
        return None
    _refuse_coincidence(body, tolerance)
    if is_asymmetric(body, tolerance):
        return fitted(body, trivial(len(body)))
    return line_through(body, tolerance) or levels.largest_group(body, tolerance)


def _refuse_coincidence(body: Body, tolerance: float) -> None:
    if body.gap <= 4.0 * tolerance:
        first, second = (atom + 1 for atom in sorted(body.closest_pair))
        raise NotDerivable(
            f"atoms {first} and {second} are alike and {body.gap:.3f} angstrom apart, too close to tell which is "
            f"the image of which within {tolerance:g} angstrom"
        )


def _at_a_point(symbol: str, n_atoms: int) -> Placement | None:
    """Place any group on a free atom, whose axes are those given."""
    group = point_group(symbol)
    if group is None:
        return None
    finite = (CONTINUOUS).get(symbol, symbol)
    operations = standard_operations(finite)
    images = np.broadcast_to(np.arange(n_atoms), (len(operations), n_atoms))
    frame = np.eye(3)
    return Placement(symbol, frame, note_of(symbol, frame, 0.0, 0.0), operations, images)


def _order(symbol: str) -> int:
    """Return the number of operations; none of the continuous groups is to be shared."""
    group = point_group(symbol)
    return 10_000_019 if group is None or group.order is None else group.order
