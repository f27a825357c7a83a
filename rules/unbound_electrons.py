"""unbound-electrons: in the gas phase, an anion must be able to hold its electrons.

A finite basis holds an electron by force: the job converges, and with diffuse functions it drifts towards the
neutral species and a free electron. This speaks of atoms whose anion is not bound, of multiply charged anions of
a few atoms, whose charges repel each other (sulfate, carbonate, phosphate, peroxide; an atom never binds a second
electron), and of molecules with nowhere to put one: closed single bonds only, or a temporary anion in electron
transmission. Larger anions with their charges apart, anions with counter-ions or water, those with metals, and
every environment other than gas pass.

Passes: NO3-, charge -1, in the gas phase; SO4 2- in solution.
Speaks: SO4 2- in the gas phase; CH4-, charge -1, multiplicity 2.
Source: A. I. Boldyrev, J. Simons, J. Chem. Phys. 98, 4745 (1993); X.-B. Wang, L.-S. Wang, Annu. Rev. Phys. Chem.
60, 105 (2009); K. D. Jordan, P. D. Burrow, Chem. Rev. 87, 557 (1987); T. Andersen et al., J. Phys. Chem. Ref. Data
28, 1511 (1999) (all from memory).
"""

from collections.abc import Iterator

from checker.chemistry.attachment import Unbound, unbound_because, written_formula
from checker.elements import written_ion
from checker.facts import Facts
from checker.findings import Edit, Finding, Grade, Json, NotJudged, Repair
from checker.registry import Rule


def judge(facts: Facts) -> Iterator[Finding | NotJudged]:
    """Speak where an anion in the gas phase does not hold all its electrons."""
    if facts.charge >= 0 or facts.environment != "gas" or not len(facts.real_numbers):
        return
    if facts.free_atom is not None:
        yield from _atom(facts, facts.free_atom)
        return
    found = unbound_because(facts.real_numbers, facts.charge, facts.valence)
    if found is not None:
        yield _finding(facts, f"{written_formula(facts.real_numbers)}{_sign(facts.charge)}", found)


def _atom(facts: Facts, z: int) -> Iterator[Finding | NotJudged]:
    from checker.chemistry.configurations import anion_is_bound  # a table that only free atoms need

    ion = written_ion(z, facts.charge)
    bound = anion_is_bound(z, facts.charge)
    if bound is None:
        yield NotJudged(f"whether {ion} is bound is not in the table")
    elif not bound:
        why = (
            "The free atom takes up no electron: its electron affinity is not positive."
            if facts.charge == -1
            else "No free atom binds a second extra electron."
        )
        yield _finding(facts, ion, Unbound(why, 0.95))


def _finding(facts: Facts, species: str, found: Unbound) -> Finding:
    evidence: dict[str, Json] = {"charge": facts.charge}
    if found.attachment_ev is not None:
        evidence["attachment_energy_ev"] = found.attachment_ev
    return Finding(
        at="species.charge",
        message=f"{species} does not hold all its electrons in the gas phase; change charge or environment",
        why=found.why,
        confidence=found.confidence,
        evidence=evidence,
        repairs=_repairs(facts),
    )


def _repairs(facts: Facts) -> tuple[Repair, ...]:
    surroundings = Repair("say that the species is in solution", (Edit("species.environment", "solution"),), 0.6)
    if facts.charge != -1:
        return (surroundings,)
    multiplicity = 1 if facts.free_atom is None else _neutral_multiplicity(facts.free_atom)
    edits = (Edit("species.charge", 0), Edit("species.multiplicity", multiplicity))
    return Repair(f"take the neutral species, multiplicity {multiplicity}", edits, 0.6), surroundings


def _neutral_multiplicity(z: int) -> int | None:
    from checker.chemistry.configurations import ground_level

    return ground_level(z, 0).multiplicity


def _sign(charge: int) -> str:
    return "-" if charge == -1 else f" {-charge}-"


RULE = Rule("unbound-electrons", Grade.DOUBT, judge)
