"""acceptance-lapsed: the engine speaks for it, and its own judge keeps silent."""

import pytest

from builders import job, run_rule
from checker.registry import ENGINE_GRADES
from rules.acceptance_lapsed import RULE


@pytest.mark.parametrize("atoms", ["O H H", "H", ""])
def test_its_own_judge_is_silent(atoms: str) -> None:
    assert run_rule(RULE, job(atoms)) == []


def test_its_grade_is_the_engines() -> None:
    assert RULE.grade is ENGINE_GRADES["acceptance-lapsed"]
