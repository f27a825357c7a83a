"""Multiple bonds: pairing of the valences that single bonds leave open.

Each atom brings a number of open slots; a multiple bond takes one slot of each of two neighbours, two at most
between the same two. As many slots as possible are paired: end atoms first, then the shortest bonds, then
alternating paths from what is left. This is maximum matching on the unsaturated part of the molecule; the search
is bounded, and says so when it gave up.
Source: J. Edmonds, Can. J. Math. 17, 449 (1965) for alternating paths; the bounded form is ours.
"""

from collections import deque
from collections.abc import Iterable, Iterator
from itertools import pairwise

Edge = tuple[int, int]

MOST_MULTIPLE_BONDS = 2
"""Between the same two atoms: a triple bond."""

_PATH_STEPS = 4_000
_TOTAL_STEPS = 400_000


class Pairing:
    """Open slots of atoms, and the multiple bonds made of them so far.

    Attributes
    ----------
    left : slots that are still open, by atom.
    bonds : multiple bonds beyond the single one, by pair of atoms (smaller index first).
    gave_up : True where the search ran out of its budget, so that `left` may be more than it need be.
    """

    def __init__(self, slots: dict[int, int]) -> None:
        self.left = dict(slots)
        self.bonds: dict[Edge, int] = {}
        self.gave_up = False
        self._partners: dict[int, list[int]] = {atom: [] for atom in slots}
        self._edges: list[Edge] = []
        self._steps = 0

    def add_edges(self, edges: Iterable[Edge]) -> None:
        """Allow multiple bonds between these atoms; the likelier ones first."""
        for i, j in edges:
            if j in self._partners.setdefault(i, []):
                continue
            self._partners[i].append(j)
            self._partners.setdefault(j, []).append(i)
            self._edges.append((i, j))

    def add_slot(self, atom: int) -> None:
        """Open one more slot at an atom."""
        self.left[atom] = self.left.get(atom, 0) + 1
        self._partners.setdefault(atom, [])

    def bonds_of(self, atom: int) -> int:
        """Return the number of multiple bonds at an atom, beyond its single bonds."""
        return sum(self.between(atom, other) for other in self._partners.get(atom, ()))

    def between(self, i: int, j: int) -> int:
        """Return the number of multiple bonds between two atoms, beyond the single one."""
        return self.bonds.get((i, j) if i < j else (j, i), 0)

    def pair_greedily(self) -> None:
        """Pair end atoms with their only partner; where there is none, take the likeliest bond."""
        live = {
            atom: [other for other in others if self.left.get(other)] for atom, others in self._partners.items()
        }
        count = {atom: len(others) for atom, others in live.items()}
        ends = deque(sorted(atom for atom in live if count[atom] == 1))
        rest = deque(self._edges)
        while ends or rest:
            if ends:
                i = ends.popleft()
                partner = next((other for other in live[i] if self._can_pair(i, other)), None)
            else:
                i, partner = rest.popleft()
            if partner is None or not self._can_pair(i, partner):
                continue
            most = min(self.left[i], self.left[partner], MOST_MULTIPLE_BONDS - self.between(i, partner))
            self._change(i, partner, most if count[i] == 1 else 1)
            self._retire(i, live, count, ends)
            self._retire(partner, live, count, ends)

    def pair_by_paths(self) -> None:
        """Pair what is left along alternating paths."""
        for atom in sorted(atom for atom, slots in self.left.items() if slots):
            while self.left[atom] and self.extend_from(atom):
                pass

    def extend_from(self, atom: int) -> bool:
        """Pair a slot of this atom with an open slot elsewhere, shifting bonds between; False if there is none."""
        if not self._another_is_open(atom):
            return False
        path = self._short_path(atom) or self._long_path(atom)
        if path is not None:
            self.shift(path)
        return path is not None

    def alternatives(self, atom: int, most: int = 60) -> dict[int, list[int]]:
        """Return the atoms that could be open in place of this one, each with the path that shifts the slot."""
        reached = {atom: [atom]}
        waiting = deque([atom])
        while waiting and len(reached) < most:
            i = waiting.popleft()
            for j in self._partners[i]:
                if self.between(i, j) >= MOST_MULTIPLE_BONDS or j in reached[i]:
                    continue
                for k in self._partners[j]:
                    if k not in reached and self.between(j, k):
                        reached[k] = [*reached[i], j, k]
                        waiting.append(k)
        return reached

    def shift(self, path: list[int]) -> None:
        """Add and remove bonds by turns along an alternating path: the slot moves to its end, or is paired."""
        for place, (i, j) in enumerate(pairwise(path)):
            self._change(i, j, -1 if place % 2 else 1)

    def _can_pair(self, i: int, j: int) -> bool:
        return bool(self.left[i] and self.left[j]) and self.between(i, j) < MOST_MULTIPLE_BONDS

    def _change(self, i: int, j: int, by: int) -> None:
        edge = (i, j) if i < j else (j, i)
        self.bonds[edge] = self.bonds.get(edge, 0) + by
        if not self.bonds[edge]:
            del self.bonds[edge]
        self.left[i] -= by
        self.left[j] -= by

    def _retire(self, atom: int, live: dict[int, list[int]], count: dict[int, int], ends: deque[int]) -> None:
        """Strike a sated atom from the partners; neighbours with one partner left become ends."""
        if self.left[atom]:
            if count[atom] == 1:
                ends.append(atom)
            return
        for other in live[atom]:
            count[other] -= 1
            if count[other] == 1 and self.left[other]:
                ends.append(other)

    def _may_go_on(self) -> bool:
        """Take a step of the budget; say whether there was one left."""
        self._steps += 1
        if self._steps > _TOTAL_STEPS:
            self.gave_up = True
        return self._steps <= _TOTAL_STEPS

    def _another_is_open(self, start: int) -> bool:
        """Without this look an odd ring system would be searched to the end of the budget, in vain."""
        seen, waiting = {start}, [start]
        while waiting and self._may_go_on():
            for j in self._partners[waiting.pop()]:
                if j not in seen:
                    if self.left[j]:
                        return True
                    seen.add(j)
                    waiting.append(j)
        return False

    def _short_path(self, start: int) -> list[int] | None:
        """Breadth-first: the shortest alternating path in which no atom changes its role. Cheap, not complete."""
        inner: set[int] = set()
        came: dict[int, tuple[int, int]] = {}
        outer = {start}
        waiting = deque([start])
        while waiting and self._may_go_on():
            i = waiting.popleft()
            for j in self._partners[i]:
                if j in outer or j in inner or self.between(i, j) >= MOST_MULTIPLE_BONDS:
                    continue
                if self.left[j]:
                    return [*_trace(i, came), j]
                inner.add(j)
                for k in self._partners[j]:
                    if self.between(j, k) and k not in outer and k not in inner:
                        outer.add(k)
                        came[k] = (j, i)
                        waiting.append(k)
        return None

    def _long_path(self, start: int) -> list[int] | None:
        """Depth-first over simple paths, within a budget: finds the paths through odd rings too."""
        limit = min(self._steps + _PATH_STEPS, _TOTAL_STEPS)
        path, on_path = [start], {start}
        branches = [self._next_steps(start)]
        while branches:
            self._steps += 1
            if self._steps > limit:
                self.gave_up = True
                return None
            step = next((s for s in branches[-1] if not on_path.intersection(s)), None)
            if step is None:
                branches.pop()
                on_path.difference_update(path[-2:])
                del path[-2:]
            elif len(step) == 1:
                return [*path, *step]
            else:
                path.extend(step)
                on_path.update(step)
                branches.append(self._next_steps(step[-1]))
        return None

    def _next_steps(self, i: int) -> Iterator[tuple[int, ...]]:
        """Each way to go on from an open atom: to an open partner, or over a partner to the atom it gives up."""
        for j in self._partners[i]:
            if self.between(i, j) >= MOST_MULTIPLE_BONDS:
                continue
            if self.left[j]:
                yield (j,)
            for k in self._partners[j]:
                if k != i and self.between(j, k):
                    yield (j, k)


def _trace(end: int, came: dict[int, tuple[int, int]]) -> list[int]:
    path = [end]
    while end in came:
        inner, end = came[end]
        path += [inner, end]
    return path[::-1]
