"""Every repair that the rules on occupations and symmetry offer for the sample decks is written and judged."""

import re
import shutil
from pathlib import Path

import pytest

from builders import TODAY
from checker.api import check_path
from checker.findings import DeckReport
from checker.reading import FillIn
from checker.repair import apply_repair

FOLDER = Path(__file__).parent.parent.parent / "sample_decks"
RULES = ("axis-convention", "partner-states", "state-symmetry", "point-group-mismatch", "point-group-near-miss",
         "occupation-irreps")  # fmt: skip
WATER_ALONG_X = """deck_version = 1
[species]
charge = 0
multiplicity = 1
length_unit = "bohr"
atoms = [
  ["O", 0.2217, 0.0, 0.0],
  ["H", -0.8867, 1.4309, 0.0],
  ["D", -0.8867, -1.4309, 0.0],
]
[symmetry]
point_group = "C2v"
[occupations]
paired = { A1 = 3, B1 = 1, B2 = 1 }
"""


def judged(path: Path) -> DeckReport:
    (report,) = check_path(path, today=TODAY)
    return report


def offers() -> list[tuple[str, str, int]]:
    found = []
    for path in sorted(FOLDER.glob("*.deck.*")):
        for finding in judged(path).findings:
            if finding.rule in RULES and finding.accepted is None:
                found += [(path.name, finding.rule, number) for number, _ in finding.numbered]
    return found


OFFERS = offers()


def test_each_of_the_rules_offers_something() -> None:
    assert {rule for _, rule, _ in OFFERS} == set(RULES)


@pytest.mark.parametrize(("name", "rule", "number"), OFFERS)
def test_a_written_repair_settles_the_finding(name: str, rule: str, number: int, tmp_path: Path) -> None:
    shutil.copytree(FOLDER, tmp_path, dirs_exist_ok=True)
    path = tmp_path / name
    apply_repair(str(path), judged(path), number, FillIn())
    after = judged(path)
    assert rule not in [finding.rule for finding in after.findings]
    assert not after.rule_failed


def test_a_turned_geometry_keeps_unit_and_isotopes(tmp_path: Path) -> None:
    path = tmp_path / "water.deck.toml"
    path.write_text(WATER_ALONG_X)
    report = judged(path)
    ((number, rule),) = [(n, finding.rule) for finding in report.findings for n, _ in finding.numbered]
    assert rule == "point-group-mismatch"
    apply_repair(str(path), report, number, FillIn())
    rows = re.findall(r'\["(\w)", (\S+), (\S+), (\S+)\]', path.read_text())
    assert [row[0] for row in rows] == ["O", "H", "D"]
    assert float(rows[0][3]) - float(rows[1][3]) == pytest.approx(1.1084)  # bohr, along z now
    after = judged(path)
    assert after.symmetry is not None
    assert after.symmetry.frame_note == "axes as given"
    assert [finding.rule for finding in after.findings] == []
