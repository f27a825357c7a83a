"""Builds the job from plain tables and says in the words of a deck what does not fit."""

import re
from collections.abc import Callable, Iterator, Mapping
from typing import Any

from pydantic import ValidationError
from pydantic_core import ErrorDetails

from checker.model import DECK_VERSION, UNION_TAGS, Job
from checker.reading.faults import Fault, KeyPath, key_text
from checker.reading.known_keys import header, lists_of_tables, sentence_on_unknown, suggestion
from checker.reading.limits import MAX_FAULTS_OF_FORM
from checker.reading.symbols import sentence_on_symbol
from checker.reading.words import described, listed, nearest, plural, quoted

# how to write a required key that is missing
_MISSING = {
    "deck_version": f"add deck_version = {DECK_VERSION} at the top of the deck",
    "species": "add a [species] table with the charge and the atoms",
    "species.charge": "add the total charge, such as charge = 0",
    "fragments.atoms": "list the fragment's atoms by number, such as atoms = [1, 2]",
    "active_space.electrons": "add the number of active electrons, such as electrons = 6",
    "active_space.orbitals": "add the number of active orbitals, such as orbitals = 6",
    "basis.name": 'add the name of the basis set, such as name = "cc-pVTZ"',
    "accepted.rule": "name the rule whose finding is accepted",
    "accepted.reason": "say in a sentence why the finding is accepted",
}


def build(mapping: dict[str, Any]) -> Job | list[Fault]:
    """Return the job of a deck, or everything about its form that does not fit.

    `species.atoms` must already be a geometry. Chemistry is not judged: a wrong charge passes.
    """
    try:
        return Job.model_validate(mapping)
    except ValidationError as error:
        errors = error.errors(include_url=False)
    # a sentence costs up to a millisecond, and a hostile deck has a million errors
    faults = list(_faults(errors[:MAX_FAULTS_OF_FORM]))
    n_left = len(errors) - MAX_FAULTS_OF_FORM
    if n_left > 0:
        rest = f"and {plural(n_left, 'more fault')} of form; mend the first ones and check again"
        faults.append(Fault(_path(errors[MAX_FAULTS_OF_FORM]), rest))
    return faults


def _faults(errors: list[ErrorDetails]) -> Iterator[Fault]:
    """Translate all errors; a key that is missing because it is misspelt is complained of once."""
    unknown = {_path(e) for e in errors if e["type"] == "extra_forbidden"}
    misspelt = {(*path[:-1], suggestion(path[:-1], str(path[-1]))) for path in unknown}
    for error in errors:
        path = _path(error)
        if error["type"] == "missing" and path in misspelt:
            continue
        if error["type"] == "no_element":
            yield from _symbol_faults(path, error["input"])
        else:
            yield Fault(path, _sentence(path, error))


def _path(error: ErrorDetails) -> KeyPath:
    """Return where an error is, in steps of the deck, without the names of a choice's branches."""
    return tuple(step for step in error["loc"] if step not in UNION_TAGS and step != "[key]")


def _sentence(path: KeyPath, error: ErrorDetails) -> str:
    translate = _SENTENCES.get(error["type"], _other)
    return translate(path, error)


def _wrong_kind(needed: str) -> Callable[[KeyPath, ErrorDetails], str]:
    def say(path: KeyPath, error: ErrorDetails) -> str:
        return (
            f"{key_text(path)} is {described(error['input'])}, but must be {needed}{_hint(error['input'], needed)}"
        )

    return say


def _hint(value: object, needed: str) -> str:
    """Return how to write a value of the wrong kind, where that is plain."""
    if isinstance(value, bool):
        return "; true and false are no numbers" if "number" in needed else ""
    if isinstance(value, float) and "whole" in needed and value.is_integer() and abs(value) < 10**15:
        return f"; write {int(value)}, without a decimal point"
    if (
        isinstance(value, str)
        and "number" in needed
        and re.fullmatch(r"[+-]?\d{1,15}(\.\d{1,15})?", value.strip())
    ):
        return f"; write {value.strip()}, without quotes"
    if isinstance(value, int | float) and "text" in needed:
        return f'; write "{described(value)}"'
    return ""


def _table(path: KeyPath, error: ErrorDetails) -> str:
    name = str(path[-1])
    written = f"{{ {name} }}"
    if len(path) == 1:
        written = f"[{name}] on a line of its own, and its keys below it"
        return f"{name} is {described(error['input'])}, but must be a table; write {written}"
    if isinstance(path[-1], int):
        return (
            f"{key_text(path)} is {described(error['input'])}, but must be a table; write {header(str(path[0]))}"
        )
    return f"{key_text(path)} is {described(error['input'])}, but must be a table such as {{ Ag = 1 }}"


def _list(path: KeyPath, error: ErrorDetails) -> str:
    start = f"{key_text(path)} is {described(error['input'])}, but must be a list"
    if path[-1] in lists_of_tables():
        return f"{start} of tables; write [[{path[-1]}]], in double brackets"
    return f"{start} of atom numbers, such as [1, 2]"


def _choice(path: KeyPath, error: ErrorDetails) -> str:
    if path == ("deck_version",):
        found = described(error["input"])
        return f"deck_version is {found}, but this program reads version {DECK_VERSION}; write deck_version = 1"
    choices = re.findall(r"'([^']*)'", str(error["ctx"]["expected"]))
    start = f"{key_text(path)} is {described(error['input'])}, but must be {listed(map(quoted_double, choices))}"
    meant = nearest(error["input"], choices) if isinstance(error["input"], str) else None
    return f"{start}; the nearest is {quoted_double(meant)}" if meant else start


def quoted_double(word: str) -> str:
    """Return a word as a deck writes text."""
    return f'"{word}"'


def _missing(path: KeyPath, _: ErrorDetails) -> str:
    how = _MISSING[".".join(step for step in path if isinstance(step, str))]
    return f"{key_text(path)} is missing; {how}"


def _unknown(path: KeyPath, _: ErrorDetails) -> str:
    return sentence_on_unknown(path[:-1], str(path[-1]))


def _symbol_faults(path: KeyPath, mapping: Mapping[str, object]) -> Iterator[Fault]:
    """Complain of all names in a table by element that are no element, or name one for the second time."""
    from checker.elements import number_of, symbol_of

    seen: dict[int, str] = {}
    for name in mapping:
        z = number_of(name)
        if z is None:
            yield Fault((*path, name), sentence_on_symbol(name, in_table=True))
        elif z in seen:
            message = f"{quoted(seen[z])} and {quoted(name)} are both {symbol_of(z)}; keep one of the two"
            yield Fault((*path, name), message)
        else:
            seen[z] = name


def _too_small(path: KeyPath, error: ErrorDetails) -> str:
    if isinstance(error["input"], int) and error["ctx"]["ge"]:
        return _too_large(path, error)
    return f"{key_text(path)} is {described(error['input'])}, but must be 0 or more"


def _too_large(path: KeyPath, error: ErrorDetails) -> str:
    return f"{key_text(path)} is too large; the whole numbers of a deck have at most 18 digits"


def _no_real(path: KeyPath, error: ErrorDetails) -> str:
    if isinstance(error["input"], int) and not isinstance(error["input"], bool):  # too large for any float
        return _too_large(path, error)
    return _wrong_kind("a number")(path, error)


def _not_finite(path: KeyPath, error: ErrorDetails) -> str:
    return f"{key_text(path)} is {described(error['input'])}, but must be a finite number"


def _empty(path: KeyPath, _: ErrorDetails) -> str:
    return f"{key_text(path)} is empty; say in a sentence why the finding is accepted"


def _own_words(path: KeyPath, error: ErrorDetails) -> str:
    return f"{key_text(path)}: {error['ctx']['error']}"


def _other(path: KeyPath, error: ErrorDetails) -> str:
    return (
        f"{key_text(path)} is {described(error['input'])}, which is not of the kind this key takes; see the manual"
    )


_date = _wrong_kind("a date such as 2027-06-30")
_SENTENCES: dict[str, Callable[[KeyPath, ErrorDetails], str]] = {
    "int_type": _wrong_kind("a whole number"),
    "int_from_float": _wrong_kind("a whole number"),
    "int_parsing_size": _choice,  # of deck_version, the one choice among numbers
    "float_type": _no_real,
    "finite_number": _not_finite,
    "string_type": _wrong_kind("text in quotes"),
    "string_too_short": _empty,
    "dict_type": _table,
    "model_type": _table,
    "tuple_type": _list,
    "literal_error": _choice,
    "missing": _missing,
    "extra_forbidden": _unknown,
    "greater_than_equal": _too_small,
    "less_than_equal": _too_large,
    "value_error": _own_words,
    "date_type": _date,
    "date_from_datetime_parsing": _date,
    "date_from_datetime_inexact": _date,
}
