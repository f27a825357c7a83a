"""core-potential-count: a core potential replaces as many electrons as published ones of that element do.

The electrons replaced go into the books, so a miscount shifts parity and spin. A core as large as the nuclear
charge leaves no atom. A count that no published potential of the element uses is doubted, with the nearest
published one as the repair; odd counts belong to potentials that hold an open f shell in the core. Those take the
f spin out of the books: for trivalent Gd with 53 replaced, 4f7 is in the core, its spin is no longer counted and
the rest is a singlet, whereas 28 replaced leaves 4f7 to be counted. Not judged where a named potential is not in
the table and `core_potential.replaced` says nothing. The names and counts are those of
checker/tables/core_potentials.csv.

Passes: I, replaced 28 or 46.
Speaks: I, replaced 27; Gd3+ as an octet, replaced 53 (4f7 is in the core); a replaced count for an element that is
not in the geometry.
Source: the catalogue of the library basis_set_exchange; Dolg, Stoll, Savin, Preuss, Theor. Chim. Acta 75, 173
(1989); Moritz, Cao, Dolg, Theor. Chem. Acc. 117, 297 (2007) (both from memory).
"""

from collections.abc import Iterator

from checker.chemistry.core_potentials import electrons_replaced, f_unpaired, nearest_counts, published_counts
from checker.elements import number_of, symbol_of
from checker.errors import NotDerivable
from checker.facts import Facts
from checker.findings import Edit, Finding, Grade, NotJudged, Repair
from checker.registry import Rule

FIRST_WITH_5F = 89


def judge(facts: Facts) -> Iterator[Finding | NotJudged]:
    """Speak of counts that cannot be, that nobody uses, and of f electrons in the core."""
    potential = facts.job.core_potential
    if potential is None:
        return
    for symbol, replaced in potential.replaced.items():
        yield from _judge_stated(facts, symbol, replaced)
    _ = facts.replaced_per_atom  # a named potential that is unknown ends the judgement here
    for z in facts.elements:
        yield from _judge_f_shell(facts, z)


def _judge_stated(facts: Facts, symbol: str, replaced: int) -> Iterator[Finding]:
    z = number_of(symbol)
    assert z is not None, "the form of the deck allows elements only"
    if z not in facts.numbers:
        yield _absent(facts, symbol, replaced)
    elif not 0 <= replaced < z:
        yield _impossible(symbol, z, replaced)
    elif (of_set := _named_count(facts, symbol, z)) is not None:
        if replaced != of_set[1]:
            yield _contradicts(symbol, replaced, *of_set)
    elif replaced and replaced not in {count.electrons for count in published_counts(z)}:
        yield _unpublished(symbol, z, replaced)


def _named_count(facts: Facts, symbol: str, z: int) -> tuple[str, int] | None:
    """Return the named set and what it replaces, or None where there is none or it is unknown."""
    try:
        name = facts.potential_set(symbol)
    except NotDerivable:
        return None
    known = None if name is None else electrons_replaced(name, z)
    return None if name is None or known is None else (name, known)


def _absent(facts: Facts, symbol: str, replaced: int) -> Finding:
    key = f"core_potential.replaced.{symbol}"
    potential = facts.job.core_potential
    # a table of core potentials with neither a name nor a count is no deck
    is_last = potential is not None and potential.name is None and len(potential.replaced) == 1
    gone = Edit("core_potential" if is_last else key, None)
    return Finding(
        at=key,
        message=f"{key} = {replaced}, and the geometry has no {symbol}",
        why="The count is spent on no atom: either the element or the geometry is another one than meant.",
        evidence={"element": symbol, "replaced": replaced},
        repairs=(Repair(f"take {symbol} out of the core potentials", (gone,), 0.6),),
    )


def _impossible(symbol: str, z: int, replaced: int) -> Finding:
    found = f"{replaced} electrons of {symbol} are said to be replaced"
    needed = "a count cannot be negative" if replaced < 0 else f"the atom has {z}, and some must be left"
    return Finding(
        at=f"core_potential.replaced.{symbol}",
        grade=Grade.HALT,
        message=f"{found}; {needed}",
        why="A core potential stands for the inner electrons of an atom and leaves its valence electrons.",
        evidence={"element": symbol, "replaced": replaced, "nuclear_charge": z},
        repairs=_count_repairs(symbol, z, replaced),
    )


def _contradicts(symbol: str, replaced: int, name: str, of_set: int) -> Finding:
    key = f"core_potential.replaced.{symbol}"
    held = f"replaces {of_set} electrons of {symbol}" if of_set else f"leaves {symbol} all-electron"
    return Finding(
        at=key,
        message=f"{name} {held}, and the deck states {replaced}",
        why="The books go by the stated count, the calculation by the potential it reads.",
        confidence=0.9,
        evidence={"element": symbol, "replaced": replaced, "set": name, "set_replaces": of_set},
        repairs=(Repair(f"state what {name} replaces, {of_set}", (Edit(key, of_set),), 0.8),),
    )


def _unpublished(symbol: str, z: int, replaced: int) -> Finding:
    counts = sorted({count.electrons for count in published_counts(z)})
    known = f"published ones replace {_listed(counts)}" if counts else "the element is treated all-electron"
    odd = " An odd number occurs only where an open f shell is in the core." if replaced % 2 else ""
    return Finding(
        at=f"core_potential.replaced.{symbol}",
        message=f"no known core potential of {symbol} replaces {replaced} electrons; {known}",
        why=f"A count off by one shifts parity and spin of the whole species.{odd}",
        confidence=0.9,
        evidence={"element": symbol, "replaced": replaced, "published": [*counts]},
        repairs=_count_repairs(symbol, z, replaced),
    )


def _count_repairs(symbol: str, z: int, replaced: int) -> tuple[Repair, ...]:
    key = f"core_potential.replaced.{symbol}"
    nearest = nearest_counts(z, replaced)[:2]
    if not nearest:
        return (Repair(f"treat {symbol} all-electron", (Edit(key, None),), 0.8),)
    return tuple(
        Repair(f"replace {count.electrons}, as {count.sets[0]} does", (Edit(key, count.electrons),), weight)
        for count, weight in zip(nearest, (0.7, 0.2), strict=False)
    )


def _judge_f_shell(facts: Facts, z: int) -> Iterator[Finding | NotJudged]:
    try:
        n_f = facts.f_in_core_of(z)
    except NotDerivable as reason:
        yield NotJudged(reason.because)
        return
    n_unpaired = f_unpaired(n_f)
    if not n_unpaired:
        return
    symbol, replaced = symbol_of(z), facts.replaced_per_atom[z]
    shell = f"{5 if z >= FIRST_WITH_5F else 4}f{n_f if n_f > 1 else ''}"
    still_counted = _still_counted(facts, facts.unpaired_in_core)
    stated = facts.job.core_potential is not None and symbol in facts.job.core_potential.replaced
    yield Finding(
        at=f"core_potential.replaced.{symbol}" if stated else "core_potential.name",
        grade=None if still_counted else Grade.NOTE,
        message=_f_shell_message(facts, symbol, shell, replaced, still_counted),
        why=f"{replaced} electrons replaced are all of {symbol} inside the f shell and {shell}, whose spin the "
        "potential averages over; multiplicity and occupations are those of the electrons left.",
        confidence=0.9,
        evidence={
            "element": symbol,
            "replaced": replaced,
            "f_electrons_in_core": n_f,
            "unpaired_in_core": n_unpaired * _n_atoms(facts, z),
        },
        repairs=_f_shell_repairs(facts, z, facts.unpaired_in_core) if still_counted else (),
    )


def _n_atoms(facts: Facts, z: int) -> int:
    return int((facts.real_numbers == z).sum())


def _still_counted(facts: Facts, n_unpaired_in_cores: int) -> bool:
    """Tell whether the stated multiplicity seems to hold the f spin: there is room for it, and parity agrees."""
    multiplicity = facts.job.species.multiplicity
    if multiplicity is None or multiplicity - 1 < n_unpaired_in_cores:
        return False
    parity_holds = (facts.n_electrons - multiplicity) % 2 == 1
    return not parity_holds if n_unpaired_in_cores % 2 else parity_holds


def _f_shell_message(facts: Facts, symbol: str, shell: str, replaced: int, still_counted: bool) -> str:
    core = (
        f"{replaced} electrons replaced for {symbol} put {shell} into the core, so its spin is no longer counted"
    )
    if not still_counted:
        return core
    return f"{core}, and multiplicity {facts.job.species.multiplicity} seems to count it"


def _f_shell_repairs(facts: Facts, z: int, n_unpaired_in_cores: int) -> tuple[Repair, ...]:
    rest = facts.stated_multiplicity - n_unpaired_in_cores
    count_the_rest = Repair(
        f"count the electrons outside the core only, multiplicity {rest}",
        (Edit("species.multiplicity", rest),),
        0.7,
    )
    small = [count for count in published_counts(z) if not count.f_electrons_in_core][:1]
    key = f"core_potential.replaced.{symbol_of(z)}"
    return (
        count_the_rest,
        *(
            Repair(
                f"take a potential that leaves the f shell to be counted, such as {count.sets[0]}",
                (Edit(key, count.electrons),),
                0.3,
            )
            for count in small
        ),
    )


def _listed(counts: list[int]) -> str:
    *head, last = (str(count) for count in counts)
    return f"{', '.join(head)} or {last}" if head else last


RULE = Rule("core-potential-count", Grade.DOUBT, judge)
