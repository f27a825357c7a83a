"""Where keys stand: line and column in characters, for every way of writing a key."""

import pytest

from checker.reading.kinds import Kind
from checker.reading.places import DeckPlaces
from checker.source import Span

TOML = """\
deck_version = 1
treatment.method = "x"
"symmetry" . 'point_group' = "C1"
[species]
charge = 0
"é" = 1
'ü' = 2
atoms = [ # a comment is no atom
  ["O", 0, 0, 0], # é
  "é", ["H", 0, 0, 1],
]
[occupations]
alpha = { "A'" = 1, "A''" = 2, inner.most = { deep = [7] } }
[core_potential.replaced]
I = 28
[[fragments]]
atoms = [1]
[[fragments]]
  atoms = [2]
"""

JSON = """\
{"deck_version": 1, "tïtle": "é", "species": {"charge": 0,
  "atoms": [["O", 0, 0, 0],
            ["H", 0, 0, 1]]},
 "fragments": [{"atoms": [1]}, {"atoms": [2, 3]}]}
"""


@pytest.mark.parametrize(
    ("key", "line", "column"),
    [
        pytest.param("deck_version", 1, 1, id="at-the-top"),
        pytest.param("treatment.method", 2, 11, id="dotted-key"),
        pytest.param("treatment", 2, 1, id="table-of-a-dotted-key"),
        pytest.param("treatment.roots", 2, 1, id="absent-beside-a-dotted-key"),
        pytest.param("symmetry.point_group", 3, 14, id="quoted-dotted-key"),
        pytest.param("species", 4, 2, id="table"),
        pytest.param("species.charge", 5, 1, id="in-a-table"),
        pytest.param("species.multiplicity", 4, 2, id="absent-from-a-table"),
        pytest.param("species.ü", 7, 1, id="quoted-key"),
        pytest.param("species.atoms", 8, 1, id="list"),
        pytest.param("species.atoms[0]", 9, 3, id="first-item"),
        pytest.param("species.atoms[1]", 10, 3, id="text-as-item"),
        pytest.param("species.atoms[2]", 10, 8, id="characters-not-bytes"),
        pytest.param("species.atoms[2][3]", 10, 20, id="item-of-an-item"),
        pytest.param("species.atoms[3]", 8, 1, id="absent-item"),
        pytest.param("occupations.alpha.A'", 13, 11, id="inline-table"),
        pytest.param("occupations.alpha.A''", 13, 21, id="second-of-an-inline-table"),
        pytest.param("occupations.alpha.B", 13, 1, id="absent-from-an-inline-table"),
        pytest.param("occupations.alpha.inner.most.deep[0]", 13, 55, id="deep-inside"),
        pytest.param("core_potential", 14, 2, id="table-named-on-the-way"),
        pytest.param("core_potential.replaced.I", 15, 1, id="in-a-dotted-table"),
        pytest.param("fragments", 16, 3, id="array-of-tables"),
        pytest.param("fragments[1]", 18, 3, id="second-of-an-array-of-tables"),
        pytest.param("fragments[1].atoms", 19, 3, id="key-in-an-array-of-tables"),
        pytest.param("fragments[1].atoms[0]", 19, 12, id="item-in-an-array-of-tables"),
        pytest.param("fragments[1].charge", 18, 3, id="absent-from-an-array-of-tables"),
        pytest.param("fragments[2]", 16, 3, id="absent-fragment"),
        pytest.param("basis.name", 1, 1, id="absent-altogether"),
        pytest.param("", 1, 1, id="the-deck-as-a-whole"),
    ],
)
def test_place_in_toml(key: str, line: int, column: int) -> None:
    assert DeckPlaces("a.toml", TOML, Kind.TOML).find(key) == Span("a.toml", line, column)


@pytest.mark.parametrize("end", ["\n", "\r\n"])
@pytest.mark.parametrize(
    ("key", "line", "column"),
    [
        ("deck_version", 1, 2),
        ("species", 1, 35),
        ("species.charge", 1, 47),
        ("species.multiplicity", 1, 35),
        ("species.atoms", 2, 3),
        ("species.atoms[1]", 3, 13),
        ("fragments[0].atoms", 4, 17),
        ("fragments[1].atoms[1]", 4, 46),
        ("basis", 1, 1),
    ],
)
def test_place_in_json(key: str, line: int, column: int, end: str) -> None:
    assert DeckPlaces("a.json", JSON.replace("\n", end), Kind.JSON).find(key) == Span("a.json", line, column)


@pytest.mark.parametrize(
    ("key", "written"),
    [
        ("species.charge", "0"),
        ("treatment.method", '"x"'),
        ("species.atoms[1]", '"é"'),
        ("species.atoms[2]", '["H", 0, 0, 1]'),
        ("occupations.alpha.A''", "2"),
        ("species", None),
        ("species.multiplicity", None),
    ],
)
def test_range_of_a_value(key: str, written: str | None) -> None:
    found = DeckPlaces("a.toml", TOML, Kind.TOML).value_range(key)
    assert (None if found is None else TOML[slice(*found)]) == written


@pytest.mark.parametrize(("kind", "start"), [(Kind.TOML, "a = "), (Kind.JSON, '{"a": ')])
def test_20000_brackets_cost_no_stack(kind: Kind, start: str) -> None:
    text = start + "[" * 20_000 + "]" * 20_000 + "}" * (kind is Kind.JSON)
    places = DeckPlaces("a", text, kind)
    assert places.find("a" + "[0]" * 19_999) == Span("a", 1, len(start) + 20_000)


def test_a_text_in_no_language_has_places_too() -> None:
    for text in ("", "[[[", "a = = 1\n]", '{"a": }', "\0"):
        for kind in (Kind.TOML, Kind.JSON):
            assert DeckPlaces("a", text, kind).find("a.b[3].c").file == "a"
