"""Names that other programs rely on; a change here is a change of contract."""

import checker
import checker.api
import rules


def test_the_door_for_programs() -> None:
    assert {"check_text", "check_path"} <= set(dir(checker.api))


def test_version() -> None:
    assert checker.__version__ == "0.1.0"


def test_rules_are_listed_in_one_tuple() -> None:
    assert isinstance(rules.ALL_RULES, tuple)
