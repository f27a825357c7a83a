"""stated-twice: what the deck says twice must agree.

Charge and multiplicity may stand in the deck, on the comment line of a geometry file, and in an option; the
deck wins. A comment line that differs is doubted, since one of the two is wrong; an option that differs is
noted. The charges of fragments that cover all atoms add up to the species' charge, as nothing else could
carry the rest. Their spins, up and down, add up to the species' multiplicity in the determinant that
fragments describe; other couplings of the same spins exist, so that is doubted only. A charge, multiplicity
or spin left out of a fragment silences its sum.

Passes: fragments of charge 1 and 1 in a species of charge 2; two sextets up and down in a singlet.
Speaks: charge=0 on the comment line, charge = 1 in the deck; fragments of charge 1 and 1 in a species of
charge 1.
Source: the deck format (hundsight explain deck); conservation of charge and of the spin's z component.
"""

from collections.abc import Iterator

from checker.chemistry.ledger import is_reachable
from checker.deck import Aside
from checker.facts import Facts
from checker.findings import Edit, Finding, Grade, Repair
from checker.model import Fragment
from checker.registry import Rule

MOST_NAMED = 12


def judge(facts: Facts) -> Iterator[Finding]:
    """Compare the deck with what is said beside it, and the species with its fragments."""
    for aside in facts.asides:
        yield from _aside(facts, aside)
    fragments = facts.job.fragments
    if fragments and _cover_all_atoms(facts, fragments):
        yield from _charges(facts, fragments)
    if fragments:
        yield from _spins(facts, fragments)


def _aside(facts: Facts, aside: Aside) -> Iterator[Finding]:
    name = aside.key.rpartition(".")[2]
    in_deck = facts.charge if name == "charge" else facts.job.species.multiplicity
    if in_deck is None or in_deck == aside.value:
        return
    is_option = aside.said_in.startswith("-")
    yield Finding(
        at=aside.key,
        grade=Grade.NOTE if is_option else Grade.DOUBT,
        message=f"the deck says {name} {in_deck}, {aside.said_in} says {aside.value}; the deck's value is used, "
        "so correct the one that is wrong",
        why="A value that is said twice is one value; where the two differ, one of them is a slip.",
        evidence={"deck": in_deck, "beside": aside.value, "said_in": aside.said_in},
        repairs=(Repair(f"take the {name} of {aside.said_in}", (Edit(aside.key, aside.value),), 0.5),),
        subject=f"{in_deck} against {aside.value}",
    )


def _cover_all_atoms(facts: Facts, fragments: tuple[Fragment, ...]) -> bool:
    """Tell whether every real atom stands in one fragment and none in two."""
    named = [number for fragment in fragments for number in fragment.atoms]
    return len(set(named)) == len(named) and {int(index) + 1 for index in facts.real_indices} <= set(named)


def _charges(facts: Facts, fragments: tuple[Fragment, ...]) -> Iterator[Finding]:
    charges = [fragment.charge for fragment in fragments if fragment.charge is not None]
    total = sum(charges)
    if len(charges) < len(fragments) or total == facts.charge:
        return
    gap = facts.charge - total
    repairs = [Repair("the fragments are right", (Edit("species.charge", total),), 0.5)]
    repairs += [
        Repair(
            f"the species is right, fragment {i + 1} is not",
            (Edit(f"fragments[{i}].charge", charge + gap),),
            0.4 / len(charges),
        )
        for i, charge in enumerate(charges)
    ]
    yield Finding(
        at="species.charge",
        grade=Grade.HALT,
        message=f"the fragments' charges {_sum_of(charges)} make {total}, and the species has charge "
        f"{facts.charge}; correct one of them",
        why="The fragments hold every atom, so their charges are the whole charge.",
        evidence={"fragment_charges": list(charges), "sum": total, "charge": facts.charge},
        repairs=tuple(repairs),
    )


def _spins(facts: Facts, fragments: tuple[Fragment, ...]) -> Iterator[Finding]:
    multiplicity = facts.job.species.multiplicity
    spins = _signed_unpaired(fragments)
    if multiplicity is None or spins is None:
        return
    total = abs(sum(spins))
    if total == multiplicity - 1:
        return
    yield Finding(
        at="species.multiplicity",
        message=f"the fragments' unpaired electrons {_sum_of(spins)} leave {total}, and multiplicity "
        f"{multiplicity} has {multiplicity - 1}; correct the multiplicity or turn a fragment's spin",
        why="In the determinant that fragments describe, up counts as alpha and down as beta.",
        confidence=0.8,
        evidence={"fragment_unpaired": list(spins), "sum": total, "multiplicity": multiplicity},
        repairs=tuple(_spin_repairs(facts, spins, multiplicity)),
    )


def _signed_unpaired(fragments: tuple[Fragment, ...]) -> list[int] | None:
    """Return 2S of each fragment with the sign of its spin, or None where one of them leaves it open."""
    spins = []
    for fragment in fragments:
        if fragment.multiplicity is None or (fragment.spin is None and fragment.multiplicity != 1):
            return None
        spins.append((fragment.multiplicity - 1) * (-1 if fragment.spin == "down" else 1))
    return spins


def _spin_repairs(facts: Facts, spins: list[int], multiplicity: int) -> Iterator[Repair]:
    implied = abs(sum(spins)) + 1
    n_electrons = facts.ledger.n_electrons
    if n_electrons is None or is_reachable(n_electrons, implied):
        yield Repair("the fragments are right", (Edit("species.multiplicity", implied),), 0.5)
    for i, spin in enumerate(spins):
        if spin and abs(sum(spins) - 2 * spin) == multiplicity - 1:
            turned = "up" if spin < 0 else "down"
            yield Repair(
                f"fragment {i + 1} is {turned}", (Edit(f"fragments[{i}].spin", turned),), 0.4 / len(spins)
            )


def _sum_of(numbers: list[int]) -> str:
    more = f" and {len(numbers) - MOST_NAMED} more" if len(numbers) > MOST_NAMED else ""
    return " ".join(f"{number:+d}" for number in numbers[:MOST_NAMED]) + more


RULE = Rule("stated-twice", Grade.DOUBT, judge)
