"""The JSON report: what stands in it, that it is stable, and that it keeps to its schema."""

import dataclasses
import json
from typing import Any

import jsonschema
import pytest

from builders import job, report
from checker.explain import schema
from checker.findings import DeckReport, Edit, Finding, Grade, Json, NotJudged, Repair
from checker.registry import Rule
from checker.report import RENDERERS, Look
from rules.spin_parity import RULE as SPIN_PARITY

VALIDATOR = jsonschema.Draft202012Validator(json.loads(schema("report")))


def text(*reports: DeckReport, stop_at: Grade = Grade.DOUBT) -> str:
    return "".join(RENDERERS["json"](reports, Look(stop_at=stop_at)))


def record(*reports: DeckReport) -> Any:
    parsed = json.loads(text(*reports))
    VALIDATOR.validate(parsed)
    return parsed


def rule_that_says(**fields: Any) -> Rule:
    said = {"at": "species.charge", "message": "found", "why": "ground", **fields}
    return Rule("toy", Grade.DOUBT, lambda facts: iter([Finding(**said)]))


def test_holds_the_fields_of_the_contract() -> None:
    """A cation of water sent as a singlet has no alpha and beta to state."""
    (deck,) = record(report(job("O H H", charge=1, multiplicity=1, title="cation"), SPIN_PARITY))["decks"]

    assert list(deck) == [
        "deck",
        "title",
        "verdict",
        "findings",
        "not_judged",
        "ledger",
        "symmetry",
        "basis",
        "expected",
    ]
    assert deck["verdict"] == "halted"
    assert deck["findings"][0]["evidence"] == {"electrons": 9, "multiplicity": 1}
    assert deck["findings"][0]["where"] == {
        "file": "made.deck.toml",
        "key": "species.multiplicity",
        "line": None,
        "column": None,
    }
    ledger = {key: value for key, value in deck["ledger"].items() if key not in {"by_element", "ghost_atoms"}}
    assert ledger == {
        "nuclear_charge": 10,
        "core_electrons_replaced": 0,
        "charge": 1,
        "electrons": 9,
        "alpha": None,
        "beta": None,
        "unpaired": None,
    }


def test_counts_the_decks_by_verdict_in_the_order_given() -> None:
    """Every deck stands in the report once, and the summary adds up."""
    halted = report(job("O H H", charge=1, multiplicity=1, title="first"), SPIN_PARITY)
    clear = report(job("O H H", multiplicity=1, title="second"), SPIN_PARITY)

    parsed = record(halted, clear)

    assert [deck["title"] for deck in parsed["decks"]] == ["first", "second"]
    assert parsed["summary"] == {"decks": 2, "clear": 1, "doubtful": 0, "halted": 1, "unreadable": 0}


def test_no_decks_make_a_report_too() -> None:
    """An empty run is a report of no decks."""
    assert record()["decks"] == []


def test_numbers_of_repairs_are_those_of_apply() -> None:
    """Repairs carry the N of --apply N; null takes a key out."""
    repairs = (
        Repair("one", (Edit("species.charge", 1),), 0.7),
        Repair("two", (Edit("species.multiplicity", None),), 0.3),
    )
    (deck,) = record(report(job("H", multiplicity=2), rule_that_says(repairs=repairs)))["decks"]

    assert deck["findings"][0]["repairs"] == [
        {"number": 1, "say": "one", "edits": [{"key": "species.charge", "value": 1}], "weight": 0.7},
        {"number": 2, "say": "two", "edits": [{"key": "species.multiplicity", "value": None}], "weight": 0.3},
    ]


@pytest.mark.parametrize(
    ("found", "written"),
    [
        pytest.param(0.1 + 0.2, 0.3, id="last_digits_go"),
        pytest.param(float("nan"), None, id="nan_is_null"),
        pytest.param(float("inf"), None, id="inf_is_null"),
        pytest.param(-0.0, 0.0, id="no_minus_zero"),
        pytest.param([1.23456789, {"x": 2}], [1.23457, {"x": 2}], id="nested"),
        pytest.param("broken \udcff", "broken \\udcff", id="broken_surrogate"),
    ],
)
def test_evidence_is_written_so_that_every_reader_takes_it(found: Json, written: Json) -> None:
    """Reals are rounded; what JSON has no word for is null."""
    (deck,) = record(report(job("H", multiplicity=2), rule_that_says(evidence={"value": found})))["decks"]

    assert deck["findings"][0]["evidence"] == {"value": written}


def test_is_ascii_and_the_same_bytes_each_time() -> None:
    """Neither locale nor terminal can spoil it."""
    made = report(job("O H H", multiplicity=1, title="Wasser \u03a3 \x1b[2J"), SPIN_PARITY)

    assert text(made).isascii()
    assert text(made) == text(made)
    assert text(made).endswith("}\n")
    assert "\x1b" not in text(made)


def test_says_what_was_not_judged_and_what_was_accepted() -> None:
    """Silence is explained; an accepted finding stays visible."""
    silent = Rule("silent", Grade.DOUBT, lambda facts: iter([NotJudged("no basis is named")]))
    accepted = [{"rule": "toy", "reason": "meant so", "until": "2099-01-01"}]

    (deck,) = record(report(job("H", multiplicity=2, accepted=accepted), rule_that_says(), silent))["decks"]

    assert deck["not_judged"] == [{"rule": "silent", "because": "no basis is named"}]
    assert deck["findings"][0]["accepted"] == {"reason": "meant so", "until": "2099-01-01"}
    assert deck["verdict"] == "clear"


def test_error_schema_refuses_what_is_not_the_contract() -> None:
    """A schema that accepts everything would prove nothing above."""
    good = record(report(job("H", multiplicity=2), rule_that_says()))
    for spoil in (
        lambda r: r["decks"][0].pop("ledger"),
        lambda r: r["decks"][0].update(verdict="fine"),
        lambda r: r["decks"][0]["findings"][0].update(grade="error"),
        lambda r: r["decks"][0]["ledger"].update(electrons=0.5),
        lambda r: r["summary"].pop("clear"),
        lambda r: r.update(report_version=2),
    ):
        bad = json.loads(json.dumps(good))
        spoil(bad)
        assert not VALIDATOR.is_valid(bad)


def test_ledger_of_the_schema_is_that_of_the_code() -> None:
    """Each field of the books has its place in the report."""
    made = report(job("O H H", multiplicity=1), SPIN_PARITY)
    assert made.ledger is not None

    (deck,) = record(made)["decks"]

    assert len(deck["ledger"]) == len(dataclasses.fields(made.ledger))
    assert sum(element["nuclear_charge"] for element in deck["ledger"]["by_element"]) == 10
