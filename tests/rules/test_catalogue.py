"""The catalogue: every rule file is listed once, in order, and has a manual page with all its parts."""

import importlib
import re
from pathlib import Path

import pytest

import rules
from checker.findings import Grade
from checker.registry import ENGINE_GRADES, Rule, RuleSet
from rules import ALL_RULES

# The names people may use in a deck's [[accepted]] and in a policy: a contract, in reading order.
VOCABULARY = """
spin-parity electron-count multiplicity-unstated multiplicity-out-of-reach core-potential-count charge-structure
unbound-electrons stated-twice
closed-shell-treatment high-spin-default atom-ground-term frontier-degeneracy spin-contamination
occupation-irreps occupation-total occupation-capacity occupation-order axis-convention degenerate-partners
point-group-mismatch point-group-near-miss orbital-degeneracy state-symmetry partner-states
close-contact length-unit isolated-atom open-valence periodic-cell
metal-spin-state metal-spin-ceiling spin-coupling
basis-coverage core-potential-pairing diffuse-functions relativity frozen-core active-space memory-need
starting-orbitals
deck-unreadable rule-failed acceptance-lapsed caution
series-consistency
""".split()

FOLDER = Path(rules.__file__).parent
FILES = sorted(path.stem for path in FOLDER.glob("*.py") if not path.stem.startswith("_"))
ONE_EACH = pytest.mark.parametrize("rule", ALL_RULES, ids=lambda rule: rule.id)


def manual_parts(rule: Rule) -> dict[str, str]:
    """Return the text after each of the headings of a manual page."""
    parts = re.split(r"^(Passes|Speaks|Source): ", rule.manual, flags=re.MULTILINE)
    return dict(zip(parts[1::2], parts[2::2], strict=True))


def test_every_file_is_listed_once() -> None:
    assert sorted(rule.id.replace("-", "_") for rule in ALL_RULES) == FILES
    assert len(RuleSet(ALL_RULES)) == len(ALL_RULES)


def test_reading_order_is_that_of_the_vocabulary() -> None:
    ids = [rule.id for rule in ALL_RULES]
    assert ids == [known for known in VOCABULARY if known in ids]


@pytest.mark.parametrize("name", FILES)
def test_the_id_is_the_files_name(name: str) -> None:
    rule = importlib.import_module(f"rules.{name}").RULE
    assert rule.id == name.replace("_", "-")
    assert rule.id in VOCABULARY
    assert rule in ALL_RULES


@ONE_EACH
def test_the_manual_opens_with_id_and_demand(rule: Rule) -> None:
    first = rule.manual.splitlines()[0]
    assert re.fullmatch(rf"{rule.id}: [a-z].{{20,}}\.", first), first
    assert rule.title == first.partition(": ")[2]
    assert rule.manual.splitlines()[1] == ""


@ONE_EACH
def test_the_manual_has_a_case_that_passes_one_that_speaks_and_a_source(rule: Rule) -> None:
    parts = manual_parts(rule)
    assert list(parts) == ["Passes", "Speaks", "Source"]
    assert all(len(text.split()) >= 3 for text in parts.values()), parts


@ONE_EACH
def test_the_grade_is_set_and_the_engines_where_it_speaks(rule: Rule) -> None:
    assert isinstance(rule.grade, Grade)
    assert rule.grade is ENGINE_GRADES.get(rule.id, rule.grade)


@ONE_EACH
def test_the_rule_has_a_test_of_its_own(rule: Rule) -> None:
    assert (Path(__file__).parent / f"test_{rule.id.replace('-', '_')}.py").is_file()


def test_the_engines_rules_are_all_there() -> None:
    assert set(ENGINE_GRADES) <= {rule.id for rule in ALL_RULES}


@ONE_EACH
def test_the_readme_has_a_row_for_the_rule(rule: Rule) -> None:
    readme = (Path(__file__).parents[2] / "README.md").read_text()
    assert f"| `{rule.id}` | `{rule.grade.word}` | {rule.title} |" in readme
