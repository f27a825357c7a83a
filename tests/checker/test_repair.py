"""Repairs written into decks: what they change, and that nothing else changes."""

import difflib
import stat
from pathlib import Path

import pytest

from checker import api
from checker.errors import RepairRefused
from checker.findings import DeckReport, Edit, Finding, Grade, Json, Repair
from checker.reading import FillIn
from checker.registry import Rule, RuleSet
from checker.repair import Written, apply_repair
from checker.repair_json import mended as mended_json
from checker.repair_toml import mended as mended_toml
from checker.repair_xyz import mended as mended_xyz

TOML = """\
# Water, as measured.
deck_version = 1

[species]   # the species
charge = 0  # neutral
multiplicity   =  1   # singlet
atoms = [  # in angstrom
  ["O",    0.0000,    0.0000,    0.1173],  # oxygen
  ["H",    0.0000,    0.7572,   -0.4692],
  # the other one
  ["H",    0.0000,   -0.7572,   -0.4692],
]

[basis]
name = "cc-pVDZ"  # \u03a3
"""
JSON = """\
{
  "deck_version": 1,
  "species": {
    "charge":  0,
    "atoms": [
      ["O",    0.0000,    0.0000,    0.1173],
      ["H",    0.0000,    0.7572,   -0.4692]
    ]
  }
}
"""
XYZ = """\
3
water charge=0 multiplicity=1
O    0.0000    0.0000    0.1173
H    0.0000    0.7572   -0.4692
H    0.0000   -0.7572   -0.4692
"""


def changed(before: str, after: str) -> list[str]:
    """Return the lines that differ, as "-old" and "+new"."""
    lines = difflib.ndiff(before.splitlines(keepends=True), after.splitlines(keepends=True))
    return [line[0] + line[2:] for line in lines if line[0] in "+-"]


def edited(text: str, key: str, value: Json) -> list[str]:
    """Return how an edit changes a TOML deck."""
    return changed(text, mended_toml(text, [Edit(key, value)]))


class TestToml:
    def test_a_value_keeps_its_comment_and_spacing(self) -> None:
        """One line differs, in one place."""
        assert edited(TOML, "species.multiplicity", 2) == [
            "-multiplicity   =  1   # singlet\n",
            "+multiplicity   =  2   # singlet\n",
        ]

    def test_a_missing_multiplicity_is_written_below_the_charge(self) -> None:
        """That is where readers look for it."""
        text = TOML.replace("multiplicity   =  1   # singlet\n", "")

        assert mended_toml(text, [Edit("species.multiplicity", 3)]) == text.replace(
            "# neutral\n", "# neutral\nmultiplicity = 3\n"
        )

    def test_a_missing_key_goes_to_the_end_of_its_table(self) -> None:
        """Not into the next one."""
        assert edited(TOML, "species.length_unit", "bohr") == ['+length_unit = "bohr"\n']
        assert '\nlength_unit = "bohr"\n\n[basis]' in mended_toml(TOML, [Edit("species.length_unit", "bohr")])

    def test_a_missing_table_is_made(self) -> None:
        """With its header."""
        assert edited(TOML, "treatment.intent", "excited") == [
            "+\n",
            "+[treatment]\n",
            '+intent = "excited"\n',
        ]

    def test_a_count_by_element_is_written_as_an_inline_table(self) -> None:
        """As decks write it."""
        assert edited(TOML, "core_potential.replaced.I", 28)[1:] == [
            "+[core_potential]\n",
            "+replaced = { I = 28 }\n",
        ]

    def test_a_row_is_added_in_the_style_of_the_rows(self) -> None:
        """Same indentation, columns and number of decimals."""
        assert edited(TOML, "species.atoms[3]", ["H", 1.0, -2.5, 0.123456]) == [
            '+  ["H",    1.0000,   -2.5000,    0.1235],\n'
        ]

    def test_a_row_is_replaced(self) -> None:
        """Its comment stays."""
        assert edited(TOML, "species.atoms[0]", ["S", 0.0, 0.0, 0.1173]) == [
            '-  ["O",    0.0000,    0.0000,    0.1173],  # oxygen\n',
            '+  ["S",    0.0000,    0.0000,    0.1173],  # oxygen\n',
        ]

    @pytest.mark.parametrize("index", [1, 2])
    def test_a_row_is_taken_out(self, index: int) -> None:
        """Nothing but the row goes."""
        gone = edited(TOML, f"species.atoms[{index}]", None)

        assert gone == [f"-{TOML.splitlines(keepends=True)[{1: 8, 2: 10}[index]]}"]

    def test_rows_without_a_last_comma_get_one(self) -> None:
        """The list stays well formed."""
        text = TOML.replace("-0.4692],\n]", "-0.4692]\n]")

        assert edited(text, "species.atoms[3]", ["H", 1.0, 0.0, 0.0]) == [
            '-  ["H",    0.0000,   -0.7572,   -0.4692]\n',
            '+  ["H",    0.0000,   -0.7572,   -0.4692],\n',
            '+  ["H",    1.0000,    0.0000,    0.0000]\n',
        ]

    def test_coarse_rows_do_not_round_an_atom_away(self) -> None:
        """Two decimals are too few to place a hydrogen."""
        text = 'deck_version = 1\n[species]\ncharge = 0\natoms = [["O", 0.0, 0.0, 0.12]]\n'

        assert 'atoms = [["O", 0.0, 0.0, 0.12], ["H", 0.0, 0.75721, -0.4692]]' in mended_toml(
            text, [Edit("species.atoms[1]", ["H", 0.0, 0.75721, -0.4692])]
        )

    def test_dotted_keys_stay_dotted(self) -> None:
        """A deck without headers gets none."""
        text = 'deck_version = 1\nspecies.charge = 0 # c\nspecies.atoms = [["He", 0.0, 0.0, 0.0]]\n'

        assert edited(text, "species.charge", -1) == ["-species.charge = 0 # c\n", "+species.charge = -1 # c\n"]
        assert edited(text, "species.multiplicity", 1) == ["+species.multiplicity = 1\n"]

    def test_inline_tables_are_changed_in_place(self) -> None:
        """One value, not the table."""
        text = 'deck_version = 1\ncore_potential = { name = "x", replaced = { I = 27 , Br = 10 } } # c\n'

        assert edited(text, "core_potential.replaced.I", 28)[1] == (
            '+core_potential = { name = "x", replaced = { I = 28 , Br = 10 } } # c\n'
        )

    def test_a_list_of_tables_is_changed_by_number(self) -> None:
        """Fragments count from 0 in keys."""
        text = TOML + "\n[[fragments]]\natoms = [1]\n\n[[fragments]]\natoms = [2]\nmultiplicity = 1\n"

        assert edited(text, "fragments[1].multiplicity", 2) == ["-multiplicity = 1\n", "+multiplicity = 2\n"]
        assert edited(text, "fragments[0].spin", "up") == ['+spin = "up"\n']

    def test_windows_line_ends_stay_and_are_taken_up(self) -> None:
        """Every line of a deck ends alike."""
        text = TOML.replace("\n", "\r\n")

        assert edited(text, "species.multiplicity", 2)[1].endswith("# singlet\r\n")
        new = mended_toml(
            text, [Edit("treatment.intent", "excited"), Edit("species.atoms[3]", ["H", 9.0, 9.0, 9.0])]
        )
        assert new.count("\n") == new.count("\r\n") == text.count("\n") + 4

    def test_several_edits_are_made_in_order(self) -> None:
        """Taking out two rows counts the second one after the first is gone."""
        new = mended_toml(TOML, [Edit("species.atoms[1]", None), Edit("species.atoms[1]", None)])

        assert new.count('["H"') == 0

    def test_error_nothing_to_take_out(self) -> None:
        """A key that is not there is refused."""
        with pytest.raises(RepairRefused, match="there is no 'environment'"):
            mended_toml(TOML, [Edit("species.environment", None)])


class TestJson:
    @pytest.mark.parametrize(
        ("key", "value", "difference"),
        [
            pytest.param(
                "species.charge", -1, ['-    "charge":  0,\n', '+    "charge":  -1,\n'], id="value_in_place"
            ),
            pytest.param("species.multiplicity", 2, ['+    "multiplicity": 2,\n'], id="below_the_charge"),
            pytest.param(
                "species.atoms[2]",
                ["H", 0.0, -0.7572, -0.4692],
                [
                    '-      ["H",    0.0000,    0.7572,   -0.4692]\n',
                    '+      ["H",    0.0000,    0.7572,   -0.4692],\n',
                    '+      ["H",    0.0000,   -0.7572,   -0.4692]\n',
                ],
                id="row_added",
            ),
            pytest.param(
                "species.atoms[0]", None, ['-      ["O",    0.0000,    0.0000,    0.1173],\n'], id="row_out"
            ),
            pytest.param(
                "species.atoms[1]",
                None,
                [
                    '-      ["O",    0.0000,    0.0000,    0.1173],\n',
                    '+      ["O",    0.0000,    0.0000,    0.1173]\n',
                    '-      ["H",    0.0000,    0.7572,   -0.4692]\n',
                ],
                id="last_row_out",
            ),
            pytest.param(
                "core_potential.replaced.I",
                28,
                ["-  }\n", "+  },\n", '+  "core_potential": {"replaced": {"I": 28}}\n'],
                id="missing_table",
            ),
        ],
    )
    def test_an_edit_changes_nothing_else(self, key: str, value: Json, difference: list[str]) -> None:
        """The layout stays."""
        assert changed(JSON, mended_json(JSON, [Edit(key, value)])) == difference

    def test_one_line_stays_one_line(self) -> None:
        """Compact decks stay compact."""
        text = '{"deck_version": 1, "species": {"charge": 0, "atoms": [["He", 0.0, 0.0, 0.0]]}}'

        new = mended_json(text, [Edit("species.multiplicity", 1), Edit("treatment.intent", "excited")])

        assert new == (
            '{"deck_version": 1, "species": {"charge": 0, "multiplicity": 1, "atoms": [["He", 0.0, 0.0, 0.0]]}, '
            '"treatment": {"intent": "excited"}}'
        )

    def test_a_key_is_taken_out_with_its_comma(self) -> None:
        """First, last or only one."""
        text = '{"a": 1, "b": {"x": 2}, "c": 3}'

        assert mended_json(text, [Edit("a", None)]) == '{"b": {"x": 2}, "c": 3}'
        assert mended_json(text, [Edit("c", None)]) == '{"a": 1, "b": {"x": 2}}'
        assert mended_json(text, [Edit("b.x", None)]) == '{"a": 1, "b": {}, "c": 3}'
        assert mended_json('{"b": {}}', [Edit("b.x", 1)]) == '{"b": {"x": 1}}'

    def test_windows_line_ends_and_characters_beyond_ascii_stay(self) -> None:
        """Offsets count characters, not bytes."""
        text = JSON.replace('"deck_version"', '"title": "\u03a3\U0001f9ea",\n  "deck_version"').replace(
            "\n", "\r\n"
        )

        assert changed(text, mended_json(text, [Edit("species.multiplicity", 2)])) == [
            '+    "multiplicity": 2,\r\n'
        ]


class TestXyz:
    @pytest.mark.parametrize(
        ("comment", "key", "value", "mended"),
        [
            pytest.param("charge=0 multiplicity=1", "charge", -1, "charge=-1 multiplicity=1", id="replaced"),
            pytest.param("water Charge=0", "charge", 1, "water Charge=1", id="case_stays"),
            pytest.param("water", "charge", 1, "water charge=1", id="added"),
            pytest.param("", "multiplicity", 2, "multiplicity=2", id="added_to_nothing"),
            pytest.param('charge="0" x', "charge", 1, "charge=1 x", id="quoted"),
            pytest.param("supercharge=7 charge=0", "charge", 1, "supercharge=7 charge=1", id="whole_word"),
            pytest.param("charge=0 x", "charge", None, "x", id="taken_out"),
        ],
    )
    def test_words_of_the_comment_line(self, comment: str, key: str, value: Json, mended: str) -> None:
        """The rest of the comment stays."""
        text = f"1\n{comment}\nHe 0.0 0.0 0.0\n"

        assert mended_xyz(text, [Edit(f"species.{key}", value)]) == f"1\n{mended}\nHe 0.0 0.0 0.0\n"

    def test_rows_and_their_count_change_together(self) -> None:
        """A row added, a row taken out."""
        assert changed(XYZ, mended_xyz(XYZ, [Edit("species.atoms[3]", ["H", 0.0, 0.0, 1.12345])])) == [
            "-3\n",
            "+4\n",
            "+H    0.0000    0.0000    1.1235\n",
        ]
        assert changed(XYZ, mended_xyz(XYZ, [Edit("species.atoms[0]", None)])) == [
            "-3\n",
            "+2\n",
            "-O    0.0000    0.0000    0.1173\n",
        ]

    def test_a_file_without_a_last_line_end_gets_no_half_row(self) -> None:
        """The new row begins on a line of its own, and the file still ends without one."""
        new = mended_xyz(XYZ.rstrip("\n"), [Edit("species.atoms[3]", ["H", 0.0, 0.0, 1.0])])

        assert new.endswith("-0.4692\nH    0.0000    0.0000    1.0000")

    def test_windows_line_ends_stay(self) -> None:
        """Also in the row that is new."""
        new = mended_xyz(XYZ.replace("\n", "\r\n"), [Edit("species.atoms[3]", ["H", 0.0, 0.0, 1.0])])

        assert new.count("\n") == new.count("\r\n") == 6

    def test_error_a_key_that_xyz_cannot_hold(self) -> None:
        """The way out is a deck."""
        with pytest.raises(RepairRefused, match=r"no place for treatment\.intent; write a deck"):
            mended_xyz(XYZ, [Edit("treatment.intent", "excited")])

    def test_error_several_frames(self) -> None:
        """Which one is meant cannot be told."""
        with pytest.raises(RepairRefused, match="several frames"):
            mended_xyz(XYZ + XYZ, [Edit("species.charge", 1)])

    def test_error_rows_with_more_columns(self) -> None:
        """What a force would be for the new atom, nobody knows."""
        text = "1\nProperties=species:S:1:pos:R:3:forces:R:3\nHe 0.0 0.0 0.0 1.0 1.0 1.0\n"

        with pytest.raises(RepairRefused, match="more than element and coordinates"):
            mended_xyz(text, [Edit("species.atoms[1]", ["He", 0.0, 0.0, 1.0])])


@pytest.fixture
def repairs(monkeypatch: pytest.MonkeyPatch) -> list[Repair]:
    """Return a list of repairs that the only rule offers on every deck."""
    offered: list[Repair] = []
    said = {"at": "species.charge", "message": "found", "why": "ground"}
    rule = Rule("toy", Grade.DOUBT, lambda facts: iter([Finding(**said, repairs=tuple(offered))]))  # type: ignore[arg-type]
    monkeypatch.setattr(api, "all_rules", lambda: RuleSet([rule]))
    return offered


NOTHING = FillIn()


def repair(path: Path, number: int = 1, fill_in: FillIn = NOTHING) -> Written:
    report: DeckReport
    (report,) = api.check_path(path, fill_in=fill_in)
    return apply_repair(str(path), report, number, fill_in)


class TestApply:
    def test_writes_the_one_asked_for_and_keeps_mode_and_mark(self, tmp_path: Path, repairs: list[Repair]) -> None:
        """The byte order mark and the permissions of the file stay."""
        deck = tmp_path / "a.deck.toml"
        deck.write_bytes(b"\xef\xbb\xbf" + TOML.encode())
        deck.chmod(0o640)
        repairs += [Repair("x", (Edit("species.charge", 5),)), Repair("y", (Edit("species.multiplicity", 2),))]

        written = repair(deck, 2)

        assert (written.files, written.say) == ((str(deck),), "y")
        assert deck.read_bytes() == b"\xef\xbb\xbf" + TOML.replace("=  1 ", "=  2 ").encode()
        assert stat.S_IMODE(deck.stat().st_mode) == 0o640
        assert list(tmp_path.iterdir()) == [deck]

    def test_atoms_go_to_the_geometry_file(self, tmp_path: Path, repairs: list[Repair]) -> None:
        """The deck names the file; the deck itself keeps what is its own."""
        (tmp_path / "w.xyz").write_text(XYZ.replace(" charge=0 multiplicity=1", ""))
        deck = tmp_path / "a.deck.toml"
        deck.write_text('deck_version = 1\n[species]\ncharge = 0\nmultiplicity = 1\ngeometry = "w.xyz"\n')
        repairs.append(Repair("x", (Edit("species.atoms[2]", None), Edit("species.multiplicity", 2))))

        written = repair(deck)

        assert {Path(file).name for file in written.files} == {"w.xyz", "a.deck.toml"}
        assert (tmp_path / "w.xyz").read_text().startswith("2\nwater\nO ")
        assert "multiplicity = 2" in deck.read_text()

    def test_a_value_that_only_the_comment_line_states_is_changed_there(
        self, tmp_path: Path, repairs: list[Repair]
    ) -> None:
        """Writing it into the deck would make the two differ."""
        (tmp_path / "w.xyz").write_text(XYZ)
        deck = tmp_path / "a.deck.toml"
        deck.write_text('deck_version = 1\n[species]\ncharge = 0\ngeometry = "w.xyz"\n')
        repairs.append(Repair("x", (Edit("species.multiplicity", 3),)))

        repair(deck)

        assert "multiplicity=3" in (tmp_path / "w.xyz").read_text()
        assert "multiplicity" not in deck.read_text()

    def test_options_that_the_repair_answers_no_longer_fill_in(
        self, tmp_path: Path, repairs: list[Repair]
    ) -> None:
        """Otherwise the option would contradict what was written."""
        file = tmp_path / "a.xyz"
        file.write_text("1\n\nHe 0.0 0.0 0.0\n")
        repairs.append(Repair("x", (Edit("species.multiplicity", 1),)))

        written = repair(file, fill_in=FillIn(charge=0, multiplicity=2))

        assert written.fill_in == FillIn(charge=0)
        assert file.read_text() == "1\nmultiplicity=1\nHe 0.0 0.0 0.0\n"

    def test_error_a_deck_that_would_be_unreadable_is_put_back(
        self, tmp_path: Path, repairs: list[Repair]
    ) -> None:
        """The file is as it was, to the byte."""
        deck = tmp_path / "a.deck.toml"
        deck.write_text(TOML)
        repairs.append(Repair("x", (Edit("species.environment", "vacuum"),)))

        with pytest.raises(RepairRefused, match="was left as it was"):
            repair(deck)

        assert deck.read_text() == TOML
        assert list(tmp_path.iterdir()) == [deck]

    @pytest.mark.parametrize(
        ("number", "said"), [(0, "numbered 1 to 2"), (3, "numbered 1 to 2"), (2, "is advice")], ids=str
    )
    def test_error_no_such_repair(self, tmp_path: Path, repairs: list[Repair], number: int, said: str) -> None:
        """The numbers there are get named."""
        deck = tmp_path / "a.deck.toml"
        deck.write_text(TOML)
        repairs += [Repair("x", (Edit("species.charge", 5),)), Repair("think again", ())]

        with pytest.raises(RepairRefused, match=said):
            repair(deck, number)

        assert deck.read_text() == TOML

    def test_error_taking_out_an_atom_would_shift_the_numbers_of_others(
        self, tmp_path: Path, repairs: list[Repair]
    ) -> None:
        """Ghost atoms are named by number."""
        deck = tmp_path / "a.deck.toml"
        deck.write_text(TOML.replace("charge = 0", "ghost_atoms = [3]\ncharge = 0"))
        repairs.append(Repair("x", (Edit("species.atoms[1]", None),)))

        with pytest.raises(RepairRefused, match="would shift them"):
            repair(deck)

    def test_an_atom_is_taken_out_where_the_repair_sees_to_the_numbers(
        self, tmp_path: Path, repairs: list[Repair]
    ) -> None:
        """Then the numbers are right afterwards."""
        deck = tmp_path / "a.deck.toml"
        deck.write_text(TOML.replace("charge = 0", "ghost_atoms = [3]\ncharge = 0"))
        repairs.append(Repair("x", (Edit("species.atoms[1]", None), Edit("species.ghost_atoms", [2]))))

        repair(deck)

        assert "ghost_atoms = [2]\n" in deck.read_text()

    def test_a_link_is_followed_within_its_folder(self, tmp_path: Path, repairs: list[Repair]) -> None:
        """The link stays a link, and the file it leads to is mended."""
        (tmp_path / "real.deck.toml").write_text(TOML)
        link = tmp_path / "a.deck.toml"
        link.symlink_to("real.deck.toml")
        repairs.append(Repair("x", (Edit("species.multiplicity", 2),)))

        repair(link)

        assert link.is_symlink()
        assert "=  2 " in (tmp_path / "real.deck.toml").read_text()

    def test_error_a_link_out_of_its_folder(
        self, tmp_path: Path, repairs: list[Repair], monkeypatch: pytest.MonkeyPatch
    ) -> None:
        """A deck from a stranger must not make us write elsewhere."""
        (tmp_path / "inner").mkdir()
        (tmp_path / "real.deck.toml").write_text(TOML)
        link = tmp_path / "inner" / "a.deck.toml"
        link.symlink_to("../real.deck.toml")
        monkeypatch.chdir(tmp_path)
        repairs.append(Repair("x", (Edit("species.multiplicity", 2),)))
        (report,) = api.check_path(tmp_path / "real.deck.toml")

        with pytest.raises(RepairRefused, match="a link to a file outside its folder"):
            apply_repair(str(link), report, 1, FillIn())

        assert (tmp_path / "real.deck.toml").read_text() == TOML
