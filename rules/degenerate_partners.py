"""degenerate-partners: the partners of a degenerate level are occupied together, or its terms have to be minded.

The geometry may have a higher symmetry than the group of the deck. Per spin, the rule seeks whole numbers of
levels of the full group that become exactly the stated counts. Where none fit, a degenerate level is partly
filled. If the electrons of that level have one term only, whichever partner is filled (pi1, pi3, p2 of an
atom), it is a note: the choices are the same state. If a single determinant may mix terms (a closed shell of
pi2 is 1Delta and 1Sigma+ at once), it is a doubt. Not judged with an active space, without a stated group, or
where the geometry lacks it; silent where only other axes make sense of the counts: axis-convention speaks.

Passes: N2 in D2h with B2u = 1 and B3u = 1; triplet O2 with B2g and B3g half filled.
Speaks: NO in C2v with one electron in B1 and none in B2 (note); O2 singlet with two electrons in B2g (doubt).
Source: G. Herzberg, Spectra of Diatomic Molecules (1950), ch. VI; F. A. Cotton, Chemical Applications of Group
Theory, 3rd ed., ch. 9 (from memory).
"""

from collections.abc import Iterator
from typing import TYPE_CHECKING

from checker.facts import Facts
from checker.findings import Finding, Grade, Json, NotJudged
from checker.registry import Rule

if TYPE_CHECKING:
    from checker.chemistry.filling import OpenLevel


def judge(facts: Facts) -> Iterator[Finding | NotJudged]:
    """Look for whole levels, then for one that is partly filled."""
    if facts.job.occupations is None:
        return
    irreps = facts.irreps
    readings = irreps.stated_readings
    if readings is None or irreps.other_axes:
        return
    if facts.job.active_space is not None:
        yield NotJudged("the open levels may be those of the active space")
    elif not readings:
        yield _no_level_fits(facts)
    elif len(irreps.terms_of(readings[0])) == 1:
        yield _one_term(facts, readings[0])
    else:
        yield _mixed_terms(facts, readings[0])


def _key(facts: Facts) -> str:
    occupations = facts.job.occupations
    assert occupations is not None
    named = {name: getattr(occupations, name) for name in ("alpha", "unpaired", "beta", "paired")}
    return next((f"occupations.{name}" for name, table in named.items() if table is not None), "occupations")


def _evidence(facts: Facts, level: "OpenLevel") -> dict[str, Json]:
    return {
        "point_group": facts.irreps.group,
        "full_group": facts.irreps.body_group,
        "level": level.irrep,
        "partners": dict[str, Json](facts.irreps.electrons_per_level[level.irrep]),
        "alpha": dict[str, Json](level.alpha),
        "beta": dict[str, Json](level.beta),
        "terms": list(facts.irreps.terms_of(level)) if _only_open(facts, level) else [],
    }


def _holds(facts: Facts, level: "OpenLevel") -> str:
    plural = "electron" if level.n_electrons == 1 else "electrons"
    partners = "" if facts.irreps.group == facts.irreps.body_group else f", here {_partners(facts, level)},"
    article = "an" if level.irrep[0] in "AEFHIS" else "a"
    return (
        f"{article} {level.irrep} level of {facts.irreps.body_group}{partners} holds {level.n_electrons} {plural}"
    )


def _partners(facts: Facts, level: "OpenLevel") -> str:
    counted = facts.irreps.electrons_per_level[level.irrep]
    return " + ".join(name if n == 1 else f"{n} {name}" for name, n in counted.items())


def _one_term(facts: Facts, level: "OpenLevel") -> Finding:
    (term,) = facts.irreps.terms_of(level)
    state = f"a {term}" if _only_open(facts, level) else "a degenerate"
    return Finding(
        at=_key(facts),
        grade=Grade.NOTE,
        message=f"{_holds(facts, level)}: {state} state, the same whichever partner is filled",
        why="The partners are equal by symmetry; the job describes one component of a degenerate state, and its "
        "density has a lower symmetry than the molecule.",
        evidence=_evidence(facts, level),
    )


def _mixed_terms(facts: Facts, level: "OpenLevel") -> Finding:
    terms = " and ".join(facts.irreps.terms_of(level)) if _only_open(facts, level) else "several terms"
    return Finding(
        at=_key(facts),
        message=f"{_holds(facts, level)} of {2 * level.dimension}; one determinant may mix {terms}",
        why="Such a determinant belongs to no single term, so its energy lies between those of the terms; these "
        "need more than one configuration.",
        confidence=0.9,
        evidence=_evidence(facts, level),
    )


def _only_open(facts: Facts, level: "OpenLevel") -> bool:
    """Tell whether all else is doubly filled, so that the terms of the level are those of the state."""
    alpha, beta = facts.irreps.electrons
    names = {*alpha, *beta}
    return all(
        alpha.get(name, 0) - level.alpha.get(name, 0) == beta.get(name, 0) - level.beta.get(name, 0)
        for name in names
    )


def _no_level_fits(facts: Facts) -> Finding:
    irreps = facts.irreps
    alpha, beta = irreps.electrons
    return Finding(
        at=_key(facts),
        message=f"these counts in {irreps.group} are no whole levels of {irreps.body_group}, the group of the "
        "geometry, even with one of them partly filled",
        why="Partners of a degenerate level lie at the same energy and are filled together in a ground state.",
        confidence=0.8,
        evidence={
            "point_group": irreps.group,
            "full_group": irreps.body_group,
            "alpha": dict[str, Json](alpha),
            "beta": dict[str, Json](beta),
        },
    )


RULE = Rule("degenerate-partners", Grade.DOUBT, judge)
