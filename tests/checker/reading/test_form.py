"""The form of a deck: every complaint at once, each at its key and in the words of a deck."""

# sentences stand whole where they can, so that a search finds them
# ruff: noqa: E501

import pytest
from decks_as_text import ATOMS, HEAD, complaints, one_deck, said

DECK = HEAD + ATOMS  # four lines
AT_KEY = (5, 1)


@pytest.mark.parametrize(
    ("line", "message"),
    [
        pytest.param(
            "multiplicity = '3'",
            "species.multiplicity is the text '3', but must be a whole number; write 3, without quotes",
        ),
        pytest.param(
            "multiplicity = 3.0",
            "species.multiplicity is 3.0, but must be a whole number; write 3, without a decimal point",
        ),
        pytest.param("multiplicity = 2.5", "species.multiplicity is 2.5, but must be a whole number"),
        pytest.param(
            "multiplicity = true",
            "species.multiplicity is true, but must be a whole number; true and false are no numbers",
        ),
        pytest.param("multiplicity = [1]", "species.multiplicity is a list, but must be a whole number"),
        pytest.param("multiplicity = 2026-12-01", "species.multiplicity is a date, but must be a whole number"),
        pytest.param(
            "multiplicity = 0x" + "f" * 9_000,
            "species.multiplicity is too large; the whole numbers of a deck have at most 18 digits",
            id="36000-bits",
        ),
        pytest.param(
            'length_unit = "Bohr"',
            'species.length_unit is the text \'Bohr\', but must be "angstrom" or "bohr"; the nearest is "bohr"',
        ),
        pytest.param(
            'environment = "vacuum"',
            'species.environment is the text \'vacuum\', but must be "gas", "solution", "embedded" or "crystal"',
        ),
        pytest.param(
            "ghost_atoms = 1", "species.ghost_atoms is 1, but must be a list of atom numbers, such as [1, 2]"
        ),
        pytest.param(
            "multiplicty = 1", "the key 'multiplicty' is not known in [species]; the nearest is multiplicity"
        ),
        pytest.param(
            "Multiplicity = 1", "the key 'Multiplicity' is not known in [species]; the nearest is multiplicity"
        ),
        pytest.param(
            'basis = "x"', "the key 'basis' is not known in [species]; basis is a table of its own, [basis]"
        ),
        pytest.param('rule = "x"', "the key 'rule' is not known in [species]; rule belongs in [[accepted]]"),
        pytest.param(
            'title = "x"',
            "the key 'title' is not known in [species]; title belongs at the top of the deck, before the first table",
        ),
        pytest.param(
            'spn = "up"',
            "the key 'spn' is not known in [species]; the nearest is spin, which belongs in [[fragments]]",
        ),
        pytest.param(
            "foo = 1",
            "the key 'foo' is not known in [species]; remove it, or use one of charge, multiplicity, atoms, geometry, "
            "length_unit, ghost_atoms and environment",
        ),
        pytest.param(
            '"\\u001b[31m" = 1',
            "the key '\\x1b[31m' is not known in [species]; remove it, or use one of charge, multiplicity, atoms, "
            "geometry, length_unit, ghost_atoms and environment",
            id="escape-code-in-a-key",
        ),
    ],
)
def test_error_in_species(line: str, message: str) -> None:
    assert said(f"{DECK}{line}\n") == [(*AT_KEY, message)]


@pytest.mark.parametrize(
    ("table", "place", "message"),
    [
        pytest.param(
            "[treatment]\nfrozen_orbitals = 'two'",
            (6, 1),
            "treatment.frozen_orbitals is the text 'two', but must be a whole number",
        ),
        pytest.param(
            "[treatment]\nfrozen_orbitals = { A = 1.5 }",
            (6, 21),
            "treatment.frozen_orbitals.A is 1.5, but must be a whole number",
        ),
        pytest.param(
            "[treatment]\nroots = 3", (6, 1), "treatment.roots is 3, but must be a table such as { Ag = 1 }"
        ),
        pytest.param(
            "[treatment]\nmethod = 3", (6, 1), 'treatment.method is 3, but must be text in quotes; write "3"'
        ),
        pytest.param(
            "[treatment]\nspin_treatment = 'restrictd'",
            (6, 1),
            'treatment.spin_treatment is the text \'restrictd\', but must be "restricted", "restricted-open" or '
            '"unrestricted"; the nearest is "restricted"',
        ),
        pytest.param(
            "[basis]", (5, 2), 'basis.name is missing; add the name of the basis set, such as name = "cc-pVTZ"'
        ),
        pytest.param(
            "[basis]\nname = 'x'\nfor_element = { Ironn = 'y' }",
            (7, 17),
            "'Ironn' is no element; the nearest is Fe",
        ),
        pytest.param(
            "[basis]\nname = 'x'\nfor_element = { H = 'y', h = 'z' }",
            (7, 26),
            "'H' and 'h' are both H; keep one of the two",
        ),
        pytest.param(
            "[active_space]\nelectrons = 2",
            (5, 2),
            "active_space.orbitals is missing; add the number of active orbitals, such as orbitals = 6",
        ),
        pytest.param(
            "[occupations]\nalpha = {}\npaired = {}",
            (5, 2),
            "occupations: alpha and beta stand beside paired and unpaired; keep one of the two styles",
        ),
        pytest.param(
            "[core_potential]",
            (5, 2),
            "core_potential: neither name nor replaced is given; give one, or leave the table out",
        ),
        pytest.param(
            "[resources]\nmemory_gb = '64'",
            (6, 1),
            "resources.memory_gb is the text '64', but must be a number; write 64, without quotes",
        ),
        pytest.param(
            f"[resources]\nhours = 1{'0' * 400}",
            (6, 1),
            "resources.hours is too large; the whole numbers of a deck have at most 18 digits",
            id="beyond-all-floats",
        ),
        pytest.param("[resources]\nhours = -1", (6, 1), "resources.hours is -1, but must be 0 or more"),
        pytest.param("[resources]\nhours = nan", (6, 1), "resources.hours is nan, but must be a finite number"),
        pytest.param(
            "[accepted]\nrule = 'x'",
            (5, 2),
            "accepted is a table, but must be a list of tables; write [[accepted]], in double brackets",
        ),
        pytest.param(
            "[[accepted]]\nrule = 'x'\nreason = ''",
            (7, 1),
            "accepted[0].reason is empty; say in a sentence why the finding is accepted",
        ),
        pytest.param(
            "[[accepted]]\nrule = 'x'\nreason = 'y'\nuntil = 'soon'",
            (8, 1),
            "accepted[0].until is the text 'soon', but must be a date such as 2027-06-30",
        ),
        pytest.param(
            "[[accepted]]\nrule = 'x'\nreason = 'y'\nuntil = 1700000000",
            (8, 1),
            "accepted[0].until is 1700000000, but must be a date such as 2027-06-30",
        ),
        pytest.param(
            "[[fragments]]\natoms = [1, 3]", (6, 13), "there is no atom 3; the deck has 2 atoms, numbered from 1"
        ),
        pytest.param(
            "[[fragments]]\natoms = [1]\n[[fragments]]\natoms = [2, 1]",
            (8, 13),
            "atom 1 is already in fragments[0]; an atom belongs to one fragment",
        ),
        pytest.param(
            "[[fragments]]\natoms = []", (6, 1), "fragments[0].atoms is empty; list the fragment's atoms by number"
        ),
    ],
)
def test_error_in_another_table(table: str, place: tuple[int, int], message: str) -> None:
    assert said(f"{DECK}{table}\n") == [(*place, message)]


def test_error_all_of_a_deck_at_once_in_the_order_of_the_text() -> None:
    text = (
        "deck_version = 2\n"
        "[species]\n"
        "charg = 0\n"
        "ghost_atoms = [2, 2, 0, 'a']\n"
        'atoms = [["Xx", 0, 0, 0], ["H", 0, 0]]\n'
        "[treatmnt]\n"
    )
    assert said(text) == [
        (1, 1, "deck_version is 2, but this program reads version 1; write deck_version = 1"),
        (3, 1, "the key 'charg' is not known in [species]; the nearest is charge"),
        (4, 25, "species.ghost_atoms[3] is the text 'a', but must be a whole number"),
        (
            5,
            10,
            "'Xx' is no element; write the element whose basis functions it carries, and its number in ghost_atoms",
        ),
        (5, 27, 'the row of this atom has 3 items, but must have 4; a row is ["O", x, y, z]'),
        (6, 2, "the key 'treatmnt' is not known at the top of a deck; the nearest is treatment"),
    ]


def test_error_missing_tables_and_keys() -> None:
    assert said("title = 'x'\n") == [
        (1, 1, "deck_version is missing; add deck_version = 1 at the top of the deck"),
        (1, 1, "species is missing; add a [species] table with the charge and the atoms"),
    ]
    assert said("deck_version = 1\n[species]\n") == [
        (2, 2, "species.charge is missing; add the total charge, such as charge = 0"),
        (
            2,
            2,
            "species has neither atoms nor geometry; add rows of atoms, or the name of an XYZ file as geometry",
        ),
    ]


def test_error_version_true_or_1_point_0_is_not_1() -> None:
    for version in ("true", "1.0", "0"):
        (first, *_) = said(f"deck_version = {version}\n")
        assert first[2] == f"deck_version is {version}, but this program reads version 1; write deck_version = 1"


def test_error_null_in_json() -> None:
    text = '{"deck_version": 1, "species": {"charge": null, "atoms": [["H", 0, 0, 0]]}}'
    assert said(text, "a.json") == [(1, 33, "species.charge is null, but must be a whole number")]


def test_error_an_endless_list_of_complaints_is_cut_short() -> None:
    found = complaints(DECK + "".join(f"foo{i} = 1\n" for i in range(150)))
    assert len(found) == 51
    assert found[-1].message == "and 100 more faults of form; mend the first ones and check again"


def test_a_wrong_multiplicity_is_no_matter_of_form() -> None:
    assert one_deck(DECK + "multiplicity = -4\n").job.species.multiplicity == -4


def test_a_title_survives_in_an_unreadable_deck() -> None:
    from checker.reading import FillIn, read_text

    (deck,) = read_text("title = 'marsh'\n", name="a.toml", fill_in=FillIn())
    assert getattr(deck, "title", None) == "marsh"
