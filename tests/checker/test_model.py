"""The deck's record: form only, frozen, no unknown key."""

import pytest
from pydantic import ValidationError

from builders import geometry, job
from checker.model import Job

BARE = {"deck_version": 1, "species": {"charge": 0, "atoms": geometry("H H")}}


def test_a_deck_needs_version_charge_and_geometry_only() -> None:
    made = Job.model_validate(BARE)

    assert (made.species.charge, made.species.multiplicity, made.fragments) == (0, None, ())


@pytest.mark.parametrize("multiplicity", [0, -3, 2, 99])
def test_a_chemically_wrong_multiplicity_is_left_to_the_rules(multiplicity: int) -> None:
    assert job("H H", 0, multiplicity).species.multiplicity == multiplicity


@pytest.mark.parametrize(
    "tables",
    [
        pytest.param({"spieces": {}}, id="unknown-table"),
        pytest.param({"basis": {"name": "x", "nmae": "y"}}, id="unknown-key"),
        pytest.param({"occupations": {"alpha": {"A": 1}, "paired": {"A": 1}}}, id="two-styles"),
        pytest.param({"core_potential": {}}, id="potential-says-nothing"),
        pytest.param({"core_potential": {"replaced": {"Xx": 28}}}, id="no-element"),
        pytest.param({"core_potential": {"replaced": {"I": 28, "i": 28}}}, id="element-twice"),
        pytest.param({"deck_version": 2}, id="other-version"),
        pytest.param({"accepted": [{"rule": "spin-parity", "reason": ""}]}, id="no-reason"),
        pytest.param({"accepted": [{"rule": "spin-parity", "reason": "x", "until": "soon"}]}, id="no-date"),
    ],
)
def test_error_wrong_form(tables: dict[str, object]) -> None:
    with pytest.raises(ValidationError):
        Job.model_validate(BARE | tables)


@pytest.mark.parametrize("charge", [True, 1.0, "1", None, 2**63])
def test_error_charge_is_no_whole_number(charge: object) -> None:
    with pytest.raises(ValidationError):
        Job.model_validate({"deck_version": 1, "species": {"charge": charge, "atoms": geometry("H")}})


def test_is_frozen() -> None:
    made = Job.model_validate(BARE | {"core_potential": {"replaced": {"i": 28}}})

    with pytest.raises(ValidationError):
        made.species.charge = 1  # type: ignore[misc]
    with pytest.raises(TypeError):
        made.core_potential.replaced["I"] = 46  # type: ignore[index, union-attr]
    with pytest.raises(ValueError, match="read-only"):
        made.species.atoms.coordinates[0, 0] = 1.0


def test_symbols_are_written_as_in_the_periodic_table() -> None:
    made = Job.model_validate(BARE | {"core_potential": {"replaced": {"i": 28}}})

    assert made.core_potential is not None
    assert dict(made.core_potential.replaced) == {"I": 28}
