"""The deck's JSON Schema says what the model says."""

import json
from pathlib import Path
from typing import Any, get_args

import jsonschema
import pytest
from pydantic import BaseModel

from checker import model
from checker.deck import Deck
from checker.explain import schema
from checker.reading import FillIn, read_text

DECK = json.loads(schema("deck"))
VALIDATOR = jsonschema.Draft202012Validator(DECK)
WATER = {"deck_version": 1, "species": {"charge": 0, "atoms": [["He", 0.0, 0.0, 0.0]]}}
TABLES = {
    "species": model.Species,
    "symmetry": model.Symmetry,
    "occupations": model.Occupations,
    "treatment": model.Treatment,
    "active_space": model.ActiveSpace,
    "basis": model.Basis,
    "core_potential": model.CorePotential,
    "fragment": model.Fragment,
    "resources": model.Resources,
    "acceptance": model.Acceptance,
}


def deck(**tables: Any) -> dict[str, Any]:
    return {**WATER, **tables}


ACCEPTED = [
    pytest.param(WATER, id="least"),
    pytest.param(deck(title="x", symmetry={"point_group": "C2v", "axes": "mulliken"}), id="symmetry"),
    pytest.param(deck(occupations={"alpha": {"Ag": 1}, "beta": {"Ag": 1}}), id="by_spin"),
    pytest.param(deck(occupations={"paired": {"A'": 1}, "unpaired": {}}), id="by_pairs"),
    pytest.param(deck(treatment={"frozen_orbitals": 2, "intent": "excited", "roots": {"A1": 2}}), id="treatment"),
    pytest.param(deck(treatment={"frozen_orbitals": {"Ag": 1}}), id="frozen_by_irrep"),
    pytest.param(deck(active_space={"electrons": 2, "orbitals": {"A1": 2}}), id="active_space"),
    pytest.param(deck(basis={"name": "cc-pVDZ", "for_element": {"He": "cc-pVTZ"}}), id="basis"),
    pytest.param(deck(core_potential={"replaced": {"He": 0}}), id="core_potential"),
    pytest.param(deck(fragments=[{"atoms": [1], "charge": 0, "spin": "up"}]), id="fragments"),
    pytest.param(deck(resources={"memory_gb": 1.5, "cores": 4, "hours": 2}), id="resources"),
    pytest.param(deck(accepted=[{"rule": "x", "reason": "y", "until": "2027-06-30"}]), id="accepted"),
]
REFUSED = [
    pytest.param({"deck_version": 1}, id="no_species"),
    pytest.param({**WATER, "deck_version": 2}, id="other_version"),
    pytest.param(deck(chrage=0), id="unknown_key"),
    pytest.param(deck(treatment={"methd": "x"}), id="unknown_inner_key"),
    pytest.param(deck(species={"atoms": [["He", 0, 0, 0]]}), id="no_charge"),
    pytest.param(deck(species={"charge": 0}), id="no_atoms"),
    pytest.param(deck(species={"charge": 0, "atoms": [["He", 0.0, 0.0]]}), id="short_row"),
    pytest.param(deck(species={"charge": 0.5, "atoms": [["He", 0, 0, 0]]}), id="half_a_charge"),
    pytest.param(deck(symmetry={"axes": "upright"}), id="unknown_word"),
    pytest.param(deck(occupations={"alpha": {}, "paired": {}}), id="two_styles"),
    pytest.param(deck(core_potential={}), id="empty_core_potential"),
    pytest.param(deck(basis={}), id="no_basis_name"),
    pytest.param(deck(accepted=[{"rule": "x", "reason": ""}]), id="no_reason"),
]


def reads(record: dict[str, Any]) -> bool:
    (read,) = read_text(json.dumps(record), name="x.deck.json", fill_in=FillIn())
    return isinstance(read, Deck)


def test_the_schema_itself_is_sound() -> None:
    """It follows draft 2020-12, as it says."""
    jsonschema.Draft202012Validator.check_schema(DECK)
    jsonschema.Draft202012Validator.check_schema(json.loads(schema("report")))


@pytest.mark.parametrize("record", ACCEPTED)
def test_what_is_read_the_schema_accepts(record: dict[str, Any]) -> None:
    """Reader and schema agree that it is a deck."""
    assert reads(record)
    VALIDATOR.validate(record)


@pytest.mark.parametrize("record", REFUSED)
def test_error_what_is_not_read_the_schema_refuses(record: dict[str, Any]) -> None:
    """Reader and schema agree that it is no deck."""
    assert not reads(record)
    assert not VALIDATOR.is_valid(record)


def properties(name: str) -> dict[str, Any]:
    found = DECK["$defs"][name]["properties"]
    assert isinstance(found, dict)
    return found


def test_the_tables_are_those_of_the_model() -> None:
    """No table is missing from the schema, and none is too many."""
    assert set(DECK["properties"]) == set(model.Job.model_fields)


@pytest.mark.parametrize("name", TABLES)
def test_the_keys_of_a_table_are_those_of_the_model(name: str) -> None:
    """Every key stands in both, and the words it may have are the same."""
    fields = TABLES[name].model_fields

    assert set(properties(name)) == set(fields)
    for key, field in fields.items():
        words = {word for part in (field.annotation, *get_args(field.annotation)) for word in words_of(part)}
        assert set(properties(name)[key].get("enum", ())) == words, key


@pytest.mark.parametrize("name", TABLES)
def test_what_a_table_needs_is_what_the_model_needs(name: str) -> None:
    """Atoms aside, which may stand in a geometry file."""
    needed = {key for key, field in TABLES[name].model_fields.items() if field.is_required()}

    assert set(DECK["$defs"][name].get("required", ())) == needed - {"atoms"} | (
        {"atoms"} & needed if name == "fragment" else set()
    )


def test_the_written_tables_are_all_there_are() -> None:
    """A table added to the model must be added here."""
    classes = {
        item
        for item in vars(model).values()
        if isinstance(item, type) and issubclass(item, BaseModel) and item.__module__ == model.__name__
    }

    assert classes == {*TABLES.values(), model.Table, model.Job}


def test_every_sample_deck_in_json_is_accepted() -> None:
    """The decks people learn from keep to it."""
    samples = sorted((Path(__file__).parents[3] / "sample_decks").glob("*.json"))

    assert samples
    for sample in samples:
        VALIDATOR.validate(json.loads(sample.read_text(encoding="utf-8")))


def words_of(annotation: object) -> tuple[str, ...]:
    """Return the words of a Literal, or nothing."""
    return tuple(word for word in get_args(annotation) if isinstance(word, str))
