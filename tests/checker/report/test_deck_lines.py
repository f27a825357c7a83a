"""Repairs as lines to paste, in the language of the file they go into."""

import dataclasses
import tomllib

import pytest

from builders import job, report
from checker.findings import DeckReport, Edit, Repair
from checker.report.deck_lines import deck_lines

CHARGE = Edit("species.charge", -1)
SPIN = Edit("species.multiplicity", 2)
ROW = ["H", 0.0, 0.75, -1e-12]


def water(deck: str, atoms_file: str | None = None) -> DeckReport:
    return dataclasses.replace(report(job("O H H")), deck=deck, atoms_file=atoms_file or deck)


def written(*edits: Edit, deck: str = "a.deck.toml", atoms_file: str | None = None) -> list[str]:
    return deck_lines(Repair("x", edits), water(deck, atoms_file))


@pytest.mark.parametrize(
    ("edits", "lines"),
    [
        pytest.param([CHARGE, SPIN], ["[species]", "charge = -1", "multiplicity = 2"], id="one_table"),
        pytest.param(
            [SPIN, Edit("treatment.intent", "excited")],
            ["[species]", "multiplicity = 2", "[treatment]", 'intent = "excited"'],
            id="two_tables",
        ),
        pytest.param(
            [Edit("core_potential.replaced.I", 28), Edit("core_potential.replaced.Br", 10)],
            ["[core_potential]", "replaced = { I = 28, Br = 10 }"],
            id="by_element",
        ),
        pytest.param(
            [Edit("core_potential", {"name": "from-basis"})],
            ["[core_potential]", 'name = "from-basis"'],
            id="whole_table",
        ),
        pytest.param([Edit("core_potential", None)], ["# without core_potential"], id="without_table"),
        pytest.param(
            [Edit("species.multiplicity", None)], ["[species]", "# without multiplicity"], id="without_key"
        ),
        pytest.param(
            [Edit("fragments[1].spin", "up")], ["[[fragments]]  # number 2", 'spin = "up"'], id="fragment"
        ),
        pytest.param(
            [Edit("occupations.alpha", {"A1": 3, "A''": 1})],
            ["[occupations]", "alpha = { A1 = 3, \"A''\" = 1 }"],
            id="quoted_irrep",
        ),
        pytest.param(
            [Edit("species.atoms[3]", ROW)],
            ["# atoms, new row at the end:", '["H", 0.0, 0.75, 0.0],'],
            id="new_row",
        ),
        pytest.param(
            [Edit("species.atoms[0]", ROW)], ["# atoms, row 1:", '["H", 0.0, 0.75, 0.0],'], id="changed_row"
        ),
        pytest.param([Edit("species.atoms[2]", None)], ["# atoms, without row 3"], id="without_row"),
        pytest.param(
            [Edit("species.atoms[2]", None), Edit("species.atoms[2]", ROW)],
            ["# atoms, without row 3", "# atoms, new row at the end:", '["H", 0.0, 0.75, 0.0],'],
            id="in_order",
        ),
    ],
)
def test_toml(edits: list[Edit], lines: list[str]) -> None:
    """What is shown can be pasted; what is said beside it is a comment."""
    shown = written(*edits)

    assert shown == lines
    pasted = "\n".join(line for line in shown if not line.startswith('["'))
    tomllib.loads(pasted)


def test_json() -> None:
    """With the quotes and colons that JSON wants."""
    shown = written(SPIN, Edit("species.atoms[3]", ROW), deck="a.deck.json")

    assert shown == ['in "species":', '"multiplicity": 2', "atoms, new row at the end:", '["H", 0.0, 0.75, 0.0]']


@pytest.mark.parametrize("deck", ["a.xyz", "a.xyz#3", "A.XYZ"])
def test_xyz(deck: str) -> None:
    """Words of the comment line, rows, and the count above them."""
    shown = written(CHARGE, SPIN, Edit("species.atoms[3]", ROW), deck=deck, atoms_file=deck.partition("#")[0])

    assert shown == [
        "comment line: charge=-1 multiplicity=2",
        "new row at the end:",
        "H  0.0  0.75  0.0",
        "count line: 4",
    ]


def test_what_xyz_cannot_hold_needs_a_deck() -> None:
    """The comment line states charge and multiplicity only."""
    shown = written(CHARGE, Edit("treatment.intent", "excited"), deck="a.xyz")

    assert shown == [
        "comment line: charge=-1",
        "in a deck that names this file as its geometry:",
        "[treatment]",
        'intent = "excited"',
    ]


def test_rows_of_a_geometry_file_are_said_to_be_there() -> None:
    """The deck itself has no rows then."""
    shown = written(SPIN, Edit("species.atoms[0]", None), atoms_file="w.xyz")

    assert shown == ["[species]", "multiplicity = 2", "w.xyz, without row 1", "w.xyz, count line: 2"]


def test_control_characters_stay_out_of_the_terminal() -> None:
    """Even where they come from a rule."""
    assert "\x1b" not in "".join(written(Edit("treatment.method", "\x1b[2J"), Edit("title", "\u202e")))
