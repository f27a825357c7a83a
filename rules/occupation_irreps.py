"""occupation-irreps: names of irreps must belong to the stated point group.

Occupations, frozen and active orbitals, the wanted state and its roots are named by the irreps of
`symmetry.point_group`: Mulliken symbols, case ignored, linear molecules with Greek letters or their names. An
unknown name halts, with the nearest ones as repairs; if all names of the deck are those of one group of the
D2h family, that group is offered too. Another spelling of a name (a typographic prime, F2 for T2) is
understood and noted. A point group that does not exist halts too. No orbital is Σ-: an orbital of a linear
molecule without angular momentum about the axis keeps its sign in the planes through it. Names without a
stated group are not judged.

Passes: C2v with alpha = { A1 = 3, B1 = 1, B2 = 1 }; D∞h with Sigmag+ = 3.
Speaks: C2v with B1g = 1 (B1 is offered); D2h with B1 = 1 (B1g and B1u are); point_group = "D2x".
Source: R. S. Mulliken, J. Chem. Phys. 23, 1997 (1955); G. Herzberg, Spectra of Diatomic Molecules, ch. V
(from memory).
"""

import json
import re
from collections.abc import Iterator, Mapping
from dataclasses import dataclass

from checker.chemistry.irrep_names import Reading, find_irrep, read_orbital, read_state
from checker.chemistry.irreps import PointGroup, nearest_groups, point_group
from checker.facts import Facts
from checker.findings import Edit, Finding, Grade, Json, Repair
from checker.registry import Rule

D2H_FAMILY = ("C1", "Cs", "Ci", "C2", "C2v", "C2h", "D2", "D2h")
STATE = "treatment.state_irrep"
MOST_LISTED = 12


@dataclass(frozen=True, slots=True)
class _Table:
    """Counts by irrep as a deck gives them; `value` is what an edit of the key holds."""

    key: str
    counts: Mapping[str, int]
    of_orbitals: bool


def judge(facts: Facts) -> Iterator[Finding]:
    """Look up the group, then every name of every table."""
    tables = _tables(facts)
    written = facts.job.symmetry.point_group
    if written is not None and point_group(written) is None:
        yield _unknown_group(written)
        return
    if not tables:
        return
    group = facts.point_group
    for table in tables:
        yield from _judge_table(table, group, tables)


def _tables(facts: Facts) -> list[_Table]:
    occupations, treatment, active = facts.job.occupations, facts.job.treatment, facts.job.active_space
    found: list[tuple[str, object, bool]] = []
    if occupations is not None:
        found += [(f"occupations.{name}", getattr(occupations, name), True) for name in
                  ("alpha", "beta", "paired", "unpaired")]  # fmt: skip
    found.append(("treatment.frozen_orbitals", treatment.frozen_orbitals, True))
    found.append(("active_space.orbitals", None if active is None else active.orbitals, True))
    found.append(("treatment.roots", treatment.roots, False))
    if treatment.state_irrep is not None:
        found.append((STATE, {treatment.state_irrep: 1}, False))
    return [_Table(key, counts, of_orbitals) for key, counts, of_orbitals in found if isinstance(counts, Mapping)]


def _judge_table(table: _Table, group: PointGroup, tables: list[_Table]) -> Iterator[Finding]:
    read = read_orbital if table.of_orbitals else read_state
    readings = [read(group, name) for name in table.counts]
    unknown = [reading for reading in readings if reading.irrep is None and not reading.lacks_sign]
    if unknown:
        yield _unknown_names(table, group, unknown, tables)
        return
    respelled = [reading for reading in readings if reading.is_respelled]
    if respelled:
        yield _respelled(table, group, respelled)
    yield from (_without_sign(table, group, reading) for reading in readings if reading.lacks_sign)
    yield from _named_twice(table, readings)
    if table.of_orbitals:
        yield from _no_orbitals(table, group, readings)
    yield from _negative(table)


def _unknown_group(written: str) -> Finding:
    near = nearest_groups(written)
    hint = f"the nearest is {near[0]}" if near else "write a Schoenflies symbol such as C2v, D3h or Td"
    return Finding(
        at="symmetry.point_group",
        message=f"there is no point group {written!r}; {hint}",
        why="Irreps, occupations and states are named within a group, so nothing of them can be judged.",
        evidence={"point_group": written, "nearest": list(near)},
        repairs=tuple(
            Repair(f"{symbol} is meant", (Edit("symmetry.point_group", symbol),), 0.6 / (i + 1))
            for i, symbol in enumerate(near)
        ),
    )


def _unknown_names(table: _Table, group: PointGroup, unknown: list[Reading], tables: list[_Table]) -> Finding:
    nearest = {reading.written: [irrep.name for irrep in reading.candidates] for reading in unknown}
    names = ", ".join(list(nearest)[:MOST_LISTED])
    verb = "is no irrep" if len(unknown) == 1 else "are no irreps"
    return Finding(
        at=_key(table, unknown[0].written),
        message=f"{names} {verb} of {group.symbol}, which has {_listed(group)}",
        why="Symmetry blocks are addressed by these names; a name of another group addresses none.",
        evidence={
            "point_group": group.symbol,
            "unknown": list(nearest),
            "nearest": {name: list[Json](near) for name, near in nearest.items()},
        },
        repairs=(*_renamings(table, nearest), *_other_group(group, tables)),
    )


def _key(table: _Table, name: str) -> str:
    """Return the key of a name's count, quoted as in TOML where it must be."""
    if table.key == STATE:
        return table.key
    return f"{table.key}.{name if re.fullmatch(r'[A-Za-z0-9_-]+', name) else json.dumps(name)}"


def _listed(group: PointGroup) -> str:
    shown = [irrep.name for irrep in group.irreps[:MOST_LISTED]]
    return ", ".join(shown) + (" ..." if len(group.irreps) > len(shown) else "")


def _renamings(table: _Table, nearest: Mapping[str, list[str]]) -> Iterator[Repair]:
    """Offer every near name where one is wrong; where several are, only if each has a single near name."""
    if len(nearest) == 1:
        ((name, near),) = nearest.items()
        choices = [{name: new} for new in near]
    elif all(len(near) == 1 for near in nearest.values()):
        choices = [{name: near[0] for name, near in nearest.items()}]
    else:
        return
    for choice in choices:
        edit = _rename(table, choice)
        if edit is not None:
            says = ", ".join(f"{new} for {old}" for old, new in choice.items())
            yield Repair(
                f"{says} is meant" if len(choice) == 1 else f"{says} are meant", (edit,), 0.8 / len(choices)
            )


def _rename(table: _Table, new_names: Mapping[str, str]) -> Edit | None:
    """Return the edit that renames, or None where a new name stands there already."""
    renamed = {new_names.get(name, name): count for name, count in table.counts.items()}
    if len({name.casefold() for name in renamed}) < len(table.counts):
        return None
    if table.key == STATE:
        return Edit(table.key, next(iter(renamed)))
    return Edit(table.key, dict(renamed))


def _other_group(group: PointGroup, tables: list[_Table]) -> Iterator[Repair]:
    """Offer the one group of the D2h family that has all names of the deck."""
    names = {name for table in tables for name in table.counts}
    families = [point_group(symbol) for symbol in D2H_FAMILY]
    fitting = [g for g in families if g is not None and all(find_irrep(g, name) for name in names)]
    if len(fitting) == 1 and fitting[0] != group:
        symbol = fitting[0].symbol
        yield Repair(f"the names are those of {symbol}", (Edit("symmetry.point_group", symbol),), 0.5)


def _respelled(table: _Table, group: PointGroup, respelled: list[Reading]) -> Finding:
    meant = {reading.written: reading.irrep.name for reading in respelled if reading.irrep is not None}
    edit = _rename(table, meant)
    return Finding(
        at=_key(table, respelled[0].written),
        grade=Grade.NOTE,
        message=f"{', '.join(f'{old} is read as {new}' for old, new in meant.items())}; write it so",
        why=f"The names of {group.symbol} are written with plain primes, digits and signs.",
        evidence={"point_group": group.symbol, "read_as": dict[str, Json](meant)},
        repairs=() if edit is None else (Repair("write the usual names", (edit,), 0.9),),
    )


def _without_sign(table: _Table, group: PointGroup, reading: Reading) -> Finding:
    """Doubt a Σ state without its sign; an atom's parity follows from its configuration and is not asked for."""
    names = [irrep.name for irrep in reading.candidates]
    edits = [(name, _rename(table, {reading.written: name})) for name in names]
    return Finding(
        at=_key(table, reading.written),
        grade=Grade.DOUBT,
        message=f"{reading.written} may be {' or '.join(names)}; write the sign",
        why="The two differ under reflection in a plane through the axis and are different states.",
        evidence={"point_group": group.symbol, "written": reading.written, "may_be": list(names)},
        repairs=tuple(Repair(f"{name} is meant", (edit,), 0.5) for name, edit in edits if edit is not None),
    )


def _named_twice(table: _Table, readings: list[Reading]) -> Iterator[Finding]:
    seen: dict[str, str] = {}
    for reading in readings:
        name = "" if reading.irrep is None else reading.irrep.name
        if name in seen:
            yield Finding(
                at=_key(table, reading.written),
                message=f"{seen[name]} and {reading.written} are the same irrep {name}; give it once",
                why="Which of the two numbers counts cannot be known.",
                evidence={"irrep": name, "written": [seen[name], reading.written]},
            )
        if name:
            seen[name] = reading.written


def _no_orbitals(table: _Table, group: PointGroup, readings: list[Reading]) -> Iterator[Finding]:
    for reading in readings:
        irrep = reading.irrep
        if irrep is not None and not irrep.of_orbitals and table.counts[reading.written]:
            yield Finding(
                at=_key(table, reading.written),
                message=f"no orbital of {group.symbol} is {irrep.name}; that symmetry belongs to states only",
                why="One electron's function has the parity of its angular momentum, and the + sign without one.",
                evidence={"point_group": group.symbol, "irrep": irrep.name},
            )


def _negative(table: _Table) -> Iterator[Finding]:
    for name, count in table.counts.items():
        if count < 0:
            yield Finding(
                at=_key(table, name),
                message=f"{name} = {count} is a negative number; give zero or more, or leave {name} out",
                why="An irrep holds no less than nothing.",
                evidence={"irrep": name, "count": count},
            )


RULE = Rule("occupation-irreps", Grade.HALT, judge)
