"""Files, folders, links and standard input: what is read, in what order, and what is said of the rest."""

# sentences stand whole where they can, so that a search finds them
# ruff: noqa: E501

import errno
import os
import socket
from collections.abc import Callable
from io import BytesIO
from pathlib import Path

import pytest
from decks_as_text import ATOMS, FRAME, HEAD

from checker.deck import Deck, UnreadableDeck
from checker.reading import FillIn, read_paths, read_text

NOTHING = FillIn()
Workplace = Callable[[dict[str, str]], Path]


@pytest.fixture
def workplace(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> Workplace:
    """Make a folder with the files given, and work in it."""

    def make(files: dict[str, str]) -> Path:
        for name, text in files.items():
            path = tmp_path / "desk" / name
            path.parent.mkdir(parents=True, exist_ok=True)
            path.write_text(text, encoding="utf-8")
        (tmp_path / "desk").mkdir(exist_ok=True)
        monkeypatch.chdir(tmp_path / "desk")
        return tmp_path / "desk"

    return make


def found(*paths: str, stdin: bytes = b"", fill_in: FillIn = NOTHING) -> list[Deck | UnreadableDeck]:
    return list(read_paths(paths, fill_in=fill_in, stdin=BytesIO(stdin)))


def sentences(*paths: str, fill_in: FillIn = NOTHING) -> list[str]:
    items = found(*paths, fill_in=fill_in)
    return [str(c) for item in items for c in (item.complaints if isinstance(item, UnreadableDeck) else ())]


def names(*paths: str, fill_in: FillIn = NOTHING) -> list[str]:
    return [item.name for item in found(*paths, fill_in=fill_in)]


DECK = HEAD + ATOMS
BY_FILE = HEAD + 'geometry = "g.xyz"\n'


def test_reads_in_the_order_given_and_loses_none(workplace: Workplace) -> None:
    workplace({"b.deck.toml": DECK, "a.xyz": FRAME + FRAME, "broken.deck.toml": "x"})
    items = found("b.deck.toml", "missing.toml", "a.xyz", "broken.deck.toml", "./b.deck.toml")
    assert [(item.name, isinstance(item, Deck)) for item in items] == [
        ("b.deck.toml", True),
        ("missing.toml", False),
        ("a.xyz#1", True),
        ("a.xyz#2", True),
        ("broken.deck.toml", False),
        ("./b.deck.toml", True),
    ]


@pytest.mark.parametrize(
    ("text", "name"), [(DECK, "-"), ('{"deck_version": 1}', "-"), (FRAME, "-"), (FRAME + FRAME, "-#1")]
)
def test_standard_input_is_told_by_its_look(workplace: Workplace, text: str, name: str) -> None:
    workplace({})
    assert found("-", stdin=text.encode())[0].name == name


def test_an_unknown_suffix_is_told_by_its_look_and_says_so(workplace: Workplace) -> None:
    workplace({"a.geom": FRAME, "b.txt": "hello there\n"})
    assert names("a.geom") == ["a.geom"]
    assert sentences("b.txt") == [
        "b.txt:1:7: a key stands here without = and a value; write key = value, or # before a comment; taken for a "
        "TOML deck, as its name ends in none of .toml, .json, .xyz or .extxyz and the text begins neither with { nor "
        "with a number of atoms"
    ]


def test_a_folder_means_its_decks_in_stable_order(workplace: Workplace) -> None:
    workplace(
        {
            "set/z.deck.toml": DECK,
            "set/a/deep.deck.json": "{}",
            "set/a.xyz": FRAME,
            "set/uncharged.xyz": FRAME.replace("charge=0", ""),
            "set/g.xyz": FRAME,
            "set/m.deck.toml": BY_FILE,
            "set/notes.toml": "",
            "set/.hidden/b.deck.toml": DECK,
            "set/.c.deck.toml": DECK,
        }
    )
    Path("set/linked").symlink_to("a")
    assert names("set") == ["set/a.xyz", "set/a/deep.deck.json", "set/m.deck.toml", "set/z.deck.toml"]
    assert names("set/") == names("set")
    assert "set/uncharged.xyz" in names("set", fill_in=FillIn(charge=0))
    assert [name for name in names(".") if "/a" in name] == ["set/a.xyz", "set/a/deep.deck.json"]


def test_error_folder_without_decks(workplace: Workplace) -> None:
    workplace({"set/uncharged.xyz": FRAME.replace("charge=0", "")})
    assert sentences("set") == [
        "set: no deck was found in this folder; looked for *.deck.toml, *.deck.json, and for *.xyz and *.extxyz files "
        "that state a charge on their comment line, or any with --charge"
    ]


def test_error_link_that_leads_out_of_the_folder(workplace: Workplace) -> None:
    place = workplace({"set/a.deck.toml": DECK})
    (place.parent / "secret.deck.toml").write_text(DECK)
    Path("set/b.deck.toml").symlink_to("../../secret.deck.toml")
    assert sentences("set") == [
        "set/b.deck.toml: this link leads out of the folder, so it was not read; give the file itself to have it judged"
    ]
    assert isinstance(found("set/b.deck.toml")[0], Deck), "given by name, the user means it"


@pytest.mark.parametrize(
    ("path", "message"),
    [
        ("missing.toml", "there is no such file; check the path"),
        ("", "there is no such file; check the path"),
        ("a.deck.toml/b", "a part of this path is a file, not a folder; check the path"),
        ("dangling.toml", "this is a link to a file that does not exist; mend the link"),
        ("loop.toml", "this path leads through links that go in a circle; mend the links"),
        ("pipe.toml", "this is a named pipe, but must be a file; to pipe a deck in, give - as its name"),
        ("socket.toml", "this is a socket, but must be a file"),
        ("/dev/zero", "this is a device, but must be a file; to pipe a deck in, give - as its name"),
        ("a\0b.toml", "the path holds a character that no file name has; check the path"),
        ("a" * 5_000, "the path is longer than this system allows; check it"),
    ],
)
def test_error_what_cannot_be_opened(workplace: Workplace, path: str, message: str) -> None:
    workplace({"a.deck.toml": DECK})
    Path("dangling.toml").symlink_to("nowhere")
    Path("loop.toml").symlink_to("loop.toml")
    os.mkfifo("pipe.toml")
    with socket.socket(socket.AF_UNIX) as listener:
        listener.bind("socket.toml")
        (said,) = sentences(path)
    assert said.endswith(f": {message}")


def test_error_no_right_to_read(workplace: Workplace, monkeypatch: pytest.MonkeyPatch) -> None:
    """Rights are refused by the calls themselves, as the tests may run as a user who may read everything."""
    workplace({"set/a.deck.toml": DECK, "set/inner/b.deck.toml": DECK})
    for call in ("open", "scandir"):
        real = getattr(os, call)

        def refuse(path: str, *rest: object, real: Callable[..., object] = real) -> object:
            if os.fspath(path) in ("set/a.deck.toml", "set/inner"):
                raise PermissionError(errno.EACCES, "refused", path)
            return real(path, *rest)

        monkeypatch.setattr(os, call, refuse)
    assert sentences("set") == [
        "set/a.deck.toml: this user has no right to read the file; ask its owner, or change its rights",
        "set/inner: this user has no right to list the folder, so the decks in it were not read",
    ]


class TestGeometryFile:
    def test_gives_one_deck_a_frame(self, workplace: Workplace) -> None:
        workplace({"jobs/a.deck.toml": BY_FILE, "jobs/g.xyz": FRAME + FRAME.replace("O", "Xx")})
        first, second = found("jobs/a.deck.toml")
        assert (first.name, second.name) == ("jobs/a.deck.toml#1", "jobs/a.deck.toml#2")
        assert isinstance(first, Deck)
        assert isinstance(second, UnreadableDeck)
        assert str(second.complaints[0]).startswith("jobs/g.xyz:7:1: 'Xx' is no element")

    def test_an_atom_has_its_place_there_and_all_else_in_the_deck(self, workplace: Workplace) -> None:
        workplace({"jobs/a.deck.toml": BY_FILE, "jobs/g.xyz": FRAME})
        (deck,) = found("jobs/a.deck.toml")
        assert isinstance(deck, Deck)
        places = [deck.places.find(key) for key in ("species.atoms[1]", "species.atoms", "species.charge")]
        assert [(p.file, p.line, p.column) for p in places] == [
            ("jobs/g.xyz", 4, 1),
            ("jobs/a.deck.toml", 4, 1),
            ("jobs/a.deck.toml", 3, 1),
        ]
        assert deck.places.find("species.multiplicity").file == "jobs/g.xyz", "only the comment line states it"

    def test_lengths_in_bohr_mean_the_file_too(self, workplace: Workplace) -> None:
        workplace({"a.deck.toml": BY_FILE + 'length_unit = "bohr"\n', "g.xyz": FRAME.replace("0.96", "2")})
        (deck,) = found("a.deck.toml")
        assert isinstance(deck, Deck)
        assert deck.job.species.atoms.coordinates[1, 2] == pytest.approx(1.058354421088, rel=1e-12)

    def test_all_complaints_of_deck_and_file_at_once(self, workplace: Workplace) -> None:
        workplace({"a.deck.toml": BY_FILE + "foo = 1\n", "g.xyz": FRAME.replace("O", "Xx")})
        assert [said.split(" ")[0] for said in sentences("a.deck.toml")] == ["a.deck.toml:5:1:", "g.xyz:3:1:"]

    def test_error_atom_numbers_beyond_the_frame(self, workplace: Workplace) -> None:
        workplace({"a.deck.toml": BY_FILE + "ghost_atoms = [3]\n", "g.xyz": FRAME})
        assert sentences("a.deck.toml") == [
            "a.deck.toml:5:16: there is no atom 3; the deck has 2 atoms, numbered from 1"
        ]

    def test_error_no_charge_anywhere(self, workplace: Workplace) -> None:
        workplace({"a.deck.toml": BY_FILE.replace("charge = 0\n", ""), "g.xyz": FRAME.replace("charge=0", "")})
        assert sentences("a.deck.toml") == [
            "a.deck.toml:2:2: neither the deck nor the comment line of its geometry file states a charge; add the total "
            "charge, such as charge = 0, to [species]"
        ]
        assert sentences("a.deck.toml", fill_in=FillIn(charge=0)) == []

    @pytest.mark.parametrize(
        ("written", "why"),
        [
            ("/etc/a.xyz", ", which begins at the root, but must be relative to the deck; name an XYZ file beside the deck"),
            ("C:/a.xyz", ", which begins with a drive letter, but must be relative to the deck; name an XYZ file beside the deck"),
            ("~/a.xyz", ", which begins with ~, but must be relative to the deck; name an XYZ file beside the deck"),
            ("https://a/b.xyz", ", which is an address, but nothing is read from the network; name an XYZ file beside the deck"),
            ("a\\\\b.xyz", ", which holds a backslash; write folders with forward slashes"),
            ("a\\u0000.xyz", ", which holds a control character; name an XYZ file beside the deck"),
            ("a.toml", ", which does not end in .xyz or .extxyz; name an XYZ file"),
            ("missing.xyz", ": there is no such file; check the path"),
            ("folder.xyz", ": this is a folder, but must be a file"),
            ("pipe.xyz", ": this is a named pipe, but must be a file"),
            ("dangling.xyz", ": there is no such file; check the path"),
        ],
    )  # fmt: skip
    def test_error_in_its_name(self, workplace: Workplace, written: str, why: str) -> None:
        workplace({"a.deck.toml": HEAD + f'geometry = "{written}"\n', "folder.xyz/x": ""})
        os.mkfifo("pipe.xyz")
        Path("dangling.xyz").symlink_to("nowhere.xyz")
        shown = written.replace("\\\\", "\\").replace("\\u0000", "\\x00")
        assert sentences("a.deck.toml") == [f"a.deck.toml:4:1: species.geometry is '{shown}'{why}"]

    def test_error_empty_name(self, workplace: Workplace) -> None:
        workplace({"a.deck.toml": HEAD + 'geometry = " "\n'})
        assert sentences("a.deck.toml") == [
            "a.deck.toml:4:1: species.geometry is empty; name an XYZ file beside the deck"
        ]


OUT = (
    "the path leads out of the folders that this deck may read from, its own and the one the check was called in; "
    "copy the file beside the deck"
)


class TestConfinement:
    """A deck from a stranger reads no other files, and the answer does not tell whether they exist."""

    @pytest.mark.parametrize("exists", [True, False])
    @pytest.mark.parametrize("written", ["../secret.xyz", "link.xyz", "linked/secret.xyz", "x/../../secret.xyz"])
    def test_error_path_that_leads_out(self, workplace: Workplace, written: str, exists: bool) -> None:
        place = workplace({"a.deck.toml": HEAD + f'geometry = "{written}"\n', "x/y": ""})
        Path("link.xyz").symlink_to("../secret.xyz")
        Path("linked").symlink_to("..")
        if exists:
            (place.parent / "secret.xyz").write_text("classified\n")
        assert sentences("a.deck.toml") == [f"a.deck.toml:4:1: species.geometry is '{written}': {OUT}"]

    def test_the_folder_of_the_call_may_be_read_from_a_deck_in_it(self, workplace: Workplace) -> None:
        workplace({"jobs/a.deck.toml": HEAD + 'geometry = "../shared/g.xyz"\n', "shared/g.xyz": FRAME})
        assert names("jobs/a.deck.toml") == ["jobs/a.deck.toml"]
        assert sentences("jobs/a.deck.toml") == []

    def test_error_the_folder_of_the_call_is_closed_to_a_deck_outside(self, workplace: Workplace) -> None:
        place = workplace({"g.xyz": FRAME})
        (place.parent / "alien").mkdir()
        (place.parent / "alien/a.deck.toml").write_text(HEAD + 'geometry = "../desk/g.xyz"\n')
        (said,) = sentences("../alien/a.deck.toml")
        assert said.endswith(OUT)

    @pytest.mark.parametrize("wide", ["home", "home-by-link"])
    def test_error_the_home_folder_is_too_wide(
        self, workplace: Workplace, monkeypatch: pytest.MonkeyPatch, wide: str
    ) -> None:
        place = workplace({"jobs/a.deck.toml": HEAD + 'geometry = "../g.xyz"\n', "g.xyz": FRAME})
        (place.parent / "alias").symlink_to("desk")
        monkeypatch.setenv("HOME", str(place if wide == "home" else place.parent / "alias"))
        (said,) = sentences("jobs/a.deck.toml")
        assert said.endswith(OUT)

    def test_a_deck_from_standard_input_reads_in_the_folder_of_the_call_only(self, workplace: Workplace) -> None:
        place = workplace({"g.xyz": FRAME})
        (place.parent / "secret.xyz").write_text(FRAME)
        assert isinstance(found("-", stdin=BY_FILE.encode())[0], Deck)
        outside = found("-", stdin=BY_FILE.replace("g.xyz", "../secret.xyz").encode())[0]
        assert isinstance(outside, UnreadableDeck)
        assert outside.complaints[0].message.endswith(OUT)

    def test_error_a_text_has_no_folder(self, workplace: Workplace) -> None:
        workplace({"g.xyz": FRAME})
        (item,) = read_text(BY_FILE, name="never-written.toml", fill_in=FillIn())
        assert isinstance(item, UnreadableDeck)
        assert item.complaints[0].message == (
            "the deck is a text without a folder, so no geometry file can be read; write the atoms into the deck"
        )


class TestFillIn:
    def said_beside(
        self, text: str, name: str, **fill_in: int
    ) -> tuple[int, int | None, list[tuple[str, int, str]]]:
        Path(name).write_text(text)
        (deck,) = found(name, fill_in=FillIn(**fill_in))
        assert isinstance(deck, Deck), deck
        species = deck.job.species
        return species.charge, species.multiplicity, [(a.key, a.value, a.said_in) for a in deck.asides]

    def test_options_fill_in_only_what_is_stated_nowhere(self, workplace: Workplace) -> None:
        workplace({})
        bare = FRAME.replace("charge=0 multiplicity=2", "no words")
        assert self.said_beside(bare, "a.xyz", charge=1, multiplicity=3) == (1, 3, [])
        assert self.said_beside(bare, "a.xyz", charge=1) == (1, None, [])
        assert self.said_beside(FRAME, "a.xyz", charge=0, multiplicity=2) == (0, 2, [])
        assert self.said_beside(FRAME, "a.xyz", charge=1, multiplicity=4) == (
            0,
            2,
            [("species.charge", 1, "--charge"), ("species.multiplicity", 4, "--multiplicity")],
        )
        assert self.said_beside(DECK.replace("charge = 0\n", ""), "a.deck.toml", charge=-1) == (-1, None, [])

    def test_the_deck_wins_over_the_comment_line_and_both_are_kept(self, workplace: Workplace) -> None:
        workplace({"g.xyz": FRAME})
        twice = [("species.charge", 0, "line 2 of g.xyz")]
        assert self.said_beside(BY_FILE, "a.deck.toml") == (0, 2, twice)
        assert self.said_beside(BY_FILE.replace("= 0", "= 1"), "a.deck.toml") == (1, 2, twice)
        assert self.said_beside(BY_FILE.replace("charge = 0\n", ""), "a.deck.toml") == (0, 2, [])


def test_error_a_path_of_a_million_folders_is_refused_at_once(workplace: Workplace) -> None:
    workplace({"a.deck.toml": HEAD + f'geometry = "{"a/" * 1_000_000}g.xyz"\n'})
    assert sentences("a.deck.toml") == [
        f"a.deck.toml:4:1: species.geometry is '{'a/' * 19}a...', which is longer than 1,000 characters; name an XYZ file beside the deck"
    ]


def test_reading_opens_nothing_but_what_was_given(workplace: Workplace, monkeypatch: pytest.MonkeyPatch) -> None:
    """The names inside a deck (here of the deck that orbitals come from) are words, not files to open."""
    opened: list[str] = []
    real_open = os.open

    def spy(path: str, flags: int, *rest: int) -> int:
        opened.append(path)
        return real_open(path, flags, *rest)

    workplace(
        {"a.deck.toml": BY_FILE + '[treatment]\nstarts_from = "b.deck.toml"\n', "g.xyz": FRAME, "b.deck.toml": "x"}
    )
    monkeypatch.setattr(os, "open", spy)
    assert len(found("a.deck.toml")) == 1
    assert [Path(path).name for path in opened] == ["a.deck.toml", "g.xyz"]
