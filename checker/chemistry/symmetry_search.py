"""Search for the operations that take a body nearly into itself.

An operation is fixed by where it takes two atoms that are not in line with the centre, and by its handedness. Two
reference atoms are chosen that few others resemble; every pair of atoms that could be their image, by kind, by
distance from the centre, from each other and from all other atoms, gives two candidates, which are tried on the
whole body. So neither the moments of inertia nor the order or orientation of the atoms play a part.

No operation is lost: if every atom is at most `reach` from its place in an exactly symmetric body, then radii of
equivalent atoms differ by 2 `reach` at most, distances by 4, and so do distances in ascending order.
"""

from dataclasses import dataclass

import numpy as np

from checker.chemistry.bodies import Body, Bools, Floats, Ints, best_matrices, cross_products
from checker.errors import NotDerivable

POOL_ATOMS = 24
"""From so many of the rarest atoms the two reference atoms are chosen."""

MOST_IMAGES = 2_000_000
"""Operations times atoms that are tried before giving up: twice what an axis of order 60 needs on 2,000 atoms."""

WORST_IN_REACH = 3.0
"""An operation fitted by least squares may be off by a little more than the 2 `reach` of the ideal one."""

MOST_COMPARED_ATOMS = 60
"""Up to here all pairs of atoms are compared in all their distances before the search proper."""

_COMPARED_ELEMENTS = 4_000_000


@dataclass(frozen=True, eq=False)
class Found:
    """Approximate operations of a body, no two the same.

    Attributes
    ----------
    permutations : (c, n) image atom of each atom.
    handedness : (c,) 1 for rotations, -1 for the others.
    misfit : (c,) root mean square distance of the images from the atoms they fall on, angstrom.

    """

    permutations: Ints
    handedness: Ints
    misfit: Floats


@dataclass(frozen=True, eq=False)
class _Reference:
    """Two reference atoms and the pairs of atoms that may be their images."""

    first: int
    second: int
    lever: float  # of the second atom on the line through the centre and the first, angstrom
    images: Ints  # (p, 2)


def approximate_operations(body: Body, reach: float) -> Found:
    """Find every operation under which no atom is farther than about `reach` from exact symmetry.

    Parameters
    ----------
    body : three atoms or more, not in line.
    reach : angstrom; less than a quarter of `body.gap`, so that every atom has one image at most.

    Raises
    ------
    NotDerivable
        If the body has more operations than any group that has a name here.

    """
    if is_asymmetric(body, reach):
        return _identity(len(body))
    pool, resembles = _pool(body, reach)
    reference = _reference_pair(body, pool, resembles, reach)
    allowed = _allowed_misfit(body, reference, reach)
    matrices, handedness = _candidates(body, reference)
    if len(matrices) * len(body) > _COMPARED_ELEMENTS // 100:
        near = _worst(body, matrices, body.images(matrices, pool), pool) <= allowed
        matrices, handedness = matrices[near], handedness[near]
    if len(matrices) * len(body) > MOST_IMAGES:
        raise NotDerivable(
            f"the search for its symmetry would try {len(matrices)} operations on {len(body)} atoms"
        )
    return _sifted(body, matrices, handedness, allowed, WORST_IN_REACH * reach)


def is_asymmetric(body: Body, reach: float) -> bool:
    """Tell whether no two atoms can be equivalent and the body is not flat: no operation but the identity is left.

    Tried on small bodies only, as it compares all distances of all pairs. Where it is not told, the search tells.
    """
    if len(body) > MOST_COMPARED_ATOMS:
        return False
    n_resembling = np.count_nonzero(body.alike & (body.environment_gaps <= 4.0 * reach + 1e-9))
    if n_resembling > len(body):
        return False
    thickness = float(np.linalg.eigvalsh(body.positions.T @ body.positions)[0])
    return thickness > 1.001 * len(body) * reach**2


def _identity(n_atoms: int) -> Found:
    return Found(np.arange(n_atoms)[None], np.ones(1, dtype=np.int64), np.zeros(1))


def _sifted(body: Body, matrices: Floats, handedness: Ints, allowed: float, wanted: float) -> Found:
    """Keep the candidates that fit as wanted, at once or after a turn to where they fit better."""
    images = body.images(matrices)
    worst = _worst(body, matrices, images)
    kept = (worst <= wanted) & _is_permutation(images)
    close = (worst <= allowed) & ~kept
    if not close.any():
        return _distinct(body, images[kept], handedness[kept])
    matrices = best_matrices(body.positions, body.positions[images[close]], handedness[close])
    turned = body.images(matrices)
    mended = (_worst(body, matrices, turned) <= wanted) & _is_permutation(turned)
    images = np.concatenate([images[kept], turned[mended]])
    return _distinct(body, images, np.concatenate([handedness[kept], handedness[close][mended]]))


def _pool(body: Body, reach: float) -> tuple[Ints, Bools]:
    """Return the atoms (p,) that fewest others resemble, and which ones (p, n) do.

    Atoms far from the centre are preferred, as they fix a direction better. Half of the pool lies off the line
    through the centre and the first atom.
    """
    spread = 1e3 * (float(body.radii.max()) + 1.0)
    codes = body.kinds * spread + body.radii
    ordered = np.sort(codes)
    slack = 2.0 * reach + 1e-9
    counts = np.searchsorted(ordered, codes + slack) - np.searchsorted(ordered, codes - slack)
    score = counts / np.maximum(body.radii, 1e-9)
    pool = np.argsort(score, kind="stable")
    if len(pool) > POOL_ATOMS:
        off_line = _levers(body, pool[:1])[0]
        off_line = pool[off_line[pool] > 0.2 * off_line.max()]
        chosen = np.concatenate([pool[: POOL_ATOMS // 2], off_line[: POOL_ATOMS // 2]])
        pool = np.flatnonzero(np.bincount(chosen))  # np.unique would import numpy.ma
    resembles = body.alike[pool] & (np.abs(body.radii[pool, None] - body.radii) <= slack)
    rows, columns = np.nonzero(resembles)
    every = 1 + len(rows) * len(body) // _COMPARED_ELEMENTS
    environments = body.environments[:, ::every]
    gaps = np.abs(environments[pool[rows]] - environments[columns]).max(axis=1)
    resembles[rows, columns] = gaps <= 4.0 * reach + 1e-9
    return pool, resembles


def _levers(body: Body, atoms: Ints) -> Floats:
    """Return the distances (a, n) of all atoms from the lines through the centre and some, angstrom."""
    along = body.positions[atoms] / np.maximum(body.radii[atoms], 1e-9)[:, None]
    heights = along @ body.positions.T
    return np.sqrt(np.maximum(body.radii**2 - heights**2, 0.0))


def _reference_pair(body: Body, pool: Ints, resembles: Bools, reach: float) -> _Reference:
    """Choose two atoms with few possible images, far from the centre and not in line with it."""
    farthest = float(body.radii.max())
    scores = resembles.sum(axis=1) * farthest / np.maximum(body.radii[pool], 1e-9)
    chosen = int(scores.argmin())
    first, sources = int(pool[chosen]), np.flatnonzero(resembles[chosen])
    apart = np.abs(body.distances[sources][:, None, :] - body.distances[first, pool][None, :, None])
    possible = (apart <= 4.0 * reach + 1e-9) & resembles
    levers = _levers(body, pool[[chosen]])[0, pool]
    scores = possible.sum(axis=(0, 2)) * farthest / np.maximum(levers, 1e-9)
    second = int(scores.argmin())
    rows, images = np.nonzero(possible[:, second])
    return _Reference(first, int(pool[second]), float(levers[second]), np.stack([sources[rows], images], axis=1))


def _candidates(body: Body, reference: _Reference) -> tuple[Floats, Ints]:
    """Return the matrices (c, 3, 3) that take the reference pair to its possible images, and their handedness."""
    pairs = np.concatenate([[[reference.first, reference.second]], reference.images])
    trihedra = _trihedra(body.positions[pairs[:, 0]], body.positions[pairs[:, 1]])
    origin, targets = trihedra[0], trihedra[1:]
    mirrored = targets * np.array([1.0, 1.0, -1.0])
    handedness = np.repeat(np.array([1, -1], dtype=np.int64), len(targets))
    return np.concatenate([targets, mirrored]) @ origin.T, handedness


def _trihedra(first: Floats, second: Floats) -> Floats:
    """Return orthonormal right-handed axes (p, 3, 3), as columns, spanned by two vectors each."""
    axes = np.empty((len(first), 3, 3))
    axes[:, :, 0] = along = first / np.sqrt(np.einsum("pi,pi->p", first, first))[:, None]
    across = second - np.einsum("pi,pi->p", second, along)[:, None] * along
    across /= np.maximum(np.sqrt(np.einsum("pi,pi->p", across, across)), 1e-12)[:, None]
    axes[:, :, 1] = across
    axes[:, :, 2] = cross_products(along, across)
    return axes


def _allowed_misfit(body: Body, reference: _Reference, reach: float) -> float:
    """Return how far an image may be off its atom before the fit: the reference atoms' own errors, levered."""
    first, second = float(body.radii[reference.first]), float(body.radii[reference.second])
    angle = 2.0 * reach / first + 2.0 * reach * (1.0 + second / first) / max(reference.lever, 1e-9)
    return WORST_IN_REACH * reach + float(body.radii.max()) * angle


def _squares(body: Body, matrices: Floats, images: Ints, atoms: Ints | None = None) -> Floats:
    """Return the squared distances (c, m) of images from the atoms they fall on; infinite where there is none."""
    positions = body.positions if atoms is None else body.positions[atoms]
    gaps = positions @ matrices.transpose(0, 2, 1) - body.positions[images]
    return np.where(images < 0, np.inf, np.einsum("cni,cni->cn", gaps, gaps))


def _worst(body: Body, matrices: Floats, images: Ints, atoms: Ints | None = None) -> Floats:
    return np.asarray(np.sqrt(_squares(body, matrices, images, atoms).max(axis=1, initial=0.0)))


def _is_permutation(images: Ints) -> Bools:
    return np.asarray((np.sort(images, axis=1) == np.arange(images.shape[1])).all(axis=1))


def _distinct(body: Body, images: Ints, handedness: Ints) -> Found:
    """Keep each operation once, the best fitting first."""
    if len(images) == 1:  # the identity, the usual case by far
        return Found(images, handedness, np.zeros(1))
    keys = zip(handedness.tolist(), map(bytes, np.ascontiguousarray(images)), strict=True)
    first = list({key: i for i, key in enumerate(keys)}.values())
    images, handedness = images[first], handedness[first]
    matrices = best_matrices(body.positions, body.positions[images], handedness)
    misfit = np.sqrt(_squares(body, matrices, images).mean(axis=1))
    order = np.argsort(misfit, kind="stable")
    return Found(images[order], handedness[order], misfit[order])
