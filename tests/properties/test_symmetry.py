"""The group does not depend on how a body is turned, numbered or mirrored, nor on noise below the tolerance."""

import numpy as np
from hypothesis import assume, given, settings
from hypothesis import strategies as st
from named_molecules import NAMED
from symmetric_bodies import FAMILIES, Body, built, moved, shaken
from symmetric_bodies import body as body_of_rows

from checker.chemistry.axes import orders_of
from checker.chemistry.irreps import point_group
from checker.chemistry.point_groups import standard_operations
from checker.chemistry.symmetry import DEFAULT_TOLERANCE, Symmetry, find_symmetry

CASES: dict[str, tuple[str, Body]] = {
    **{name: (group, body_of_rows(rows)) for name, group, _, rows in NAMED},
    **{f"a body made for {group}": (group, built(group)) for group in FAMILIES},
}
cases = st.sampled_from(sorted(CASES))
seeds = st.integers(0, 2**31 - 1)
few = settings(max_examples=60)


def find(of: Body, tolerance: float = DEFAULT_TOLERANCE) -> Symmetry:
    return find_symmetry(*of, tolerance=tolerance)


@few
@given(cases, seeds)
def test_turned_numbered_anew_and_mirrored(name: str, seed: int) -> None:
    group, body = CASES[name]
    kinds, places = moved(body, seed)
    assert find((kinds, places)).group == group
    assert find((kinds, places * [1.0, 1.0, -1.0])).group == group


@few
@given(cases, seeds)
def test_noise_of_a_tenth_of_the_tolerance(name: str, seed: int) -> None:
    """Unless another group lies within that of the threshold, which none of these bodies has."""
    group, body = CASES[name]
    noisy = shaken(moved(body, seed), 0.1 * DEFAULT_TOLERANCE, seed)
    found = find(noisy)
    assert found.group == group
    assert found.deviation_angstrom <= 0.2 * DEFAULT_TOLERANCE


@few
@given(cases, seeds, st.floats(0.2, 4.0))
def test_whatever_the_noise_what_is_found_is_a_group_within_the_tolerance(
    name: str, seed: int, noise_over_tolerance: float
) -> None:
    _, body = CASES[name]
    noisy = shaken(body, noise_over_tolerance * DEFAULT_TOLERANCE, seed)
    assume(len(noisy[0]) <= 40)
    found = find(noisy)
    assert found.deviation_angstrom <= DEFAULT_TOLERANCE
    assert_consistent(found, noisy)
    if found.next_higher is not None:
        assert found.next_higher[1] > DEFAULT_TOLERANCE
        parent = point_group(found.next_higher[0])
        assert parent is not None
        assert parent.order is None or parent.order > len(found.operations)


def assert_consistent(found: Symmetry, body: Body) -> None:
    """Operations take symmetrised places onto each other, and the frame takes them to the standard ones."""
    places = found.symmetrised - found.center
    assert np.linalg.norm(found.symmetrised - body[1], axis=1).max() <= DEFAULT_TOLERANCE + 1e-9
    for placement in (found.placement, found.abelian):
        images = places @ placement.operations.transpose(0, 2, 1)
        assert np.allclose(images, places[placement.permutations], atol=1e-7)
        assert (body[0][placement.permutations] == body[0]).all()
        if placement.group not in ("C∞v", "D∞h", "Kh"):
            standard = placement.frame @ placement.operations @ placement.frame.T
            assert np.allclose(standard, standard_operations(placement.group), atol=1e-7)
        assert np.isclose(np.linalg.det(placement.frame), 1.0)
    assert (orders_of(found.abelian.operations) <= 2).all()


@few
@given(cases, seeds)
def test_symmetrised_coordinates_have_the_group_exactly(name: str, seed: int) -> None:
    _, body = CASES[name]
    noisy = shaken(moved(body, seed), 0.3 * DEFAULT_TOLERANCE, seed)
    found = find(noisy)
    again = find((noisy[0], found.symmetrised), tolerance=1e-6)
    assert again.group == found.group
    assert again.deviation_angstrom < 1e-9
    assert_consistent(found, noisy)


@few
@given(cases, seeds)
def test_a_larger_tolerance_never_loses_symmetry(name: str, seed: int) -> None:
    _, body = CASES[name]
    noisy = shaken(body, 0.02, seed)
    orders = [order_of(find(noisy, tolerance).group) for tolerance in (0.002, 0.01, 0.05)]
    assert orders == sorted(orders)


def order_of(symbol: str) -> float:
    group = point_group(symbol)
    assert group is not None
    return np.inf if group.order is None else group.order


@few
@given(seeds, st.floats(-0.004, 0.004))
def test_accidental_moments_of_inertia(seed: int, off: float) -> None:
    """A body without symmetry, squeezed until it is a spherical top or nearly, still has none."""
    places = np.random.default_rng(seed).normal(scale=2.0, size=(12, 3))
    places -= places.mean(axis=0)
    left, sizes, right = np.linalg.svd(places, full_matrices=False)
    places = left * sizes.mean() * [1.0, 1.0 + off, 1.0 - off] @ right
    gaps = np.linalg.norm(places[:, None] - places[None] + 9 * np.eye(12)[:, :, None], axis=2)
    assume(gaps.min() > 0.5)
    assert find((np.full(12, 6), places)).group == "C1"
