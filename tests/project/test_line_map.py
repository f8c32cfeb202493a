"""The places of keys, against documents whose places are known because they are written here."""

from __future__ import annotations

import tomllib
from collections.abc import Iterator
from pathlib import Path
from random import Random
from typing import Any

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from coldbox.project.linemap import Key, LineMap

BOXES = sorted((Path(__file__).parent / "boxes").glob("*.toml"))


def _leaves(value: Any, key: Key = ()) -> Iterator[tuple[Key, Any]]:
    """Every key of a parsed document with what it holds, tables and lists too."""
    items: Any = value.items() if isinstance(value, dict) else enumerate(value) if isinstance(value, list) else ()
    for part, inside in items:
        yield (*key, part), inside
        yield from _leaves(inside, (*key, part))


def _agrees(text: str) -> None:
    """The map has exactly the keys that the parser has, and each value reads alone as it reads in the document."""
    document = tomllib.loads(text)
    places = LineMap(text)
    assert set(places.spots) == {key for key, _ in _leaves(document)}
    for key, value in _leaves(document):
        if isinstance(value, (dict, list)):
            continue
        assert tomllib.loads(f"x = {places.source(key)}")["x"] == value


@pytest.mark.parametrize("path", BOXES, ids=lambda path: path.stem)
def test_project_files(path: Path) -> None:
    text = path.read_text("utf-8")
    _agrees(text)
    _agrees(text.replace("\n", "\r\n"))


# Documents made of random pieces. The writer notes the line of each key as it writes.

words = st.text("abz_-09", min_size=1, max_size=4)
odd_words = st.text("ab .#[]={}'\"\\é\t", min_size=0, max_size=5)
keys = st.one_of(words, words, odd_words)
texts = st.text("ab #=[]{},'\"\\\né°", max_size=12)
scalars = st.one_of(
    texts,
    texts,
    st.integers(-99, 99),
    st.booleans(),
    st.sampled_from([1.5, -2e30, float("inf")]),
    st.dates(),
    st.times().map(lambda time: time.replace(microsecond=0)),
)
values = st.recursive(
    scalars,
    lambda inner: st.one_of(st.lists(inner, max_size=4), st.dictionaries(keys, inner, max_size=4)),
    max_leaves=10,
)
tables = st.dictionaries(keys, values, max_size=4)
documents = st.dictionaries(keys, st.one_of(values, tables, st.lists(tables, min_size=1, max_size=3)), max_size=5)


class Writer:
    """Writes a document in a style drawn at random, and notes the line of each key."""

    def __init__(self, seed: int) -> None:
        self.random = Random(seed)
        self.out = ""
        self.lines: dict[Key, int] = {}

    def put(self, text: str) -> None:
        self.out += text

    def note(self, key: Key) -> None:
        self.lines[key] = self.out.count("\n") + 1

    def pick(self, *choices: str) -> str:
        return self.random.choice(choices)

    def word(self, word: str) -> str:
        bare = bool(word) and all(sign.isascii() and (sign.isalnum() or sign in "_-") for sign in word)
        forms = [_basic(word)]
        if bare:
            forms += [word] * 3
        if "'" not in word:
            forms.append(f"'{word}'")
        return self.pick(*forms)

    def value(self, value: Any, key: Key) -> None:
        if isinstance(value, dict):
            self.put("{")
            for index, (word, inside) in enumerate(value.items()):
                self.put("," if index else "")
                self.put(self.pick("", " "))
                self.note((*key, word))
                self.put(f"{self.word(word)}{self.pick('=', ' = ')}")
                self.value(inside, (*key, word))
            self.put(self.pick("}", " }"))
        elif isinstance(value, list):
            self.put("[")
            for index, inside in enumerate(value):
                self.put("," if index else "")
                self.put(self.pick("", " ", "\n", '\n  # a ] comment, "here\n  '))
                self.note((*key, index))
                self.value(inside, (*key, index))
            self.put(self.pick("]", "\n]", " # [\n]"))
        elif isinstance(value, str):
            self.put(self.string(value))
        elif isinstance(value, bool):
            self.put(str(value).lower())
        elif isinstance(value, (int, float)):
            self.put(repr(value))
        else:
            self.put(value.isoformat())

    def string(self, text: str) -> str:
        forms = [_basic(text), _long(text)]
        if "'" not in text and "\n" not in text:
            forms.append(f"'{text}'")
        if "'" not in text:
            forms.append(f"'''\n{text}'''")
        return self.pick(*forms)

    def pairs(self, table: dict[str, Any], key: Key) -> None:
        for word, value in table.items():
            self.put(self.pick("", "\n", "# a = comment [x]\n", "  "))
            self.note((*key, word))
            if isinstance(value, dict) and len(value) == 1 and self.random.random() < 0.5:
                (inner, inside), *_ = value.items()  # dotted
                self.note((*key, word, inner))
                self.put(f"{self.word(word)}{self.pick('.', ' . ')}{self.word(inner)} = ")
                self.value(inside, (*key, word, inner))
            else:
                self.put(f"{self.word(word)}{self.pick('=', ' = ', '  =	')}")
                self.value(value, (*key, word))
            self.put(self.pick("\n", "  # after = it\n", "\n\n"))

    def document(self, document: dict[str, Any]) -> None:
        later = {}
        plain = {}
        for word, value in document.items():
            block = (
                isinstance(value, dict) or isinstance(value, list) and value and all(isinstance(x, dict) for x in value)
            )
            (later if block and self.random.random() < 0.5 else plain)[word] = value
        self.pairs(plain, ())
        for word, value in later.items():
            if isinstance(value, dict):
                self.note((word,))
                self.put(f"[{self.pick('', ' ')}{self.word(word)}]\n")
                self.pairs(value, (word,))
                continue
            self.note((word,))
            for index, table in enumerate(value):
                self.note((word, index))
                self.put(f"[[{self.word(word)}]]{self.pick('', ' # one')}\n")
                self.pairs(table, (word, index))


def _basic(text: str) -> str:
    return '"' + text.replace("\\", "\\\\").replace('"', '\\"').replace("\n", "\\n").replace("\t", "\\t") + '"'


def _long(text: str) -> str:
    return '"""\n' + text.replace("\\", "\\\\").replace('"', "\\u0022") + '"""'


@settings(max_examples=150, deadline=None)
@given(st.integers(0, 2**32), documents)
def test_random_documents(seed: int, document: dict[str, Any]) -> None:
    writer = Writer(seed)
    writer.document(document)
    assert tomllib.loads(writer.out) == document, "the writer itself is right"
    _agrees(writer.out)
    places = LineMap(writer.out)
    assert {key: places.line(key) for key in writer.lines} == writer.lines


@settings(max_examples=300, deadline=None)
@given(st.text("ab=[]{}.,#\"'\\\n 1:é", max_size=40))
def test_any_text_ends(text: str) -> None:
    places = LineMap(text)
    for start_key, start, end in places.spots.values():
        assert 0 <= start_key <= len(text)
        assert 0 <= start <= end <= len(text)
    try:
        tomllib.loads(text)
    except ValueError:
        return
    _agrees(text)


@pytest.mark.parametrize("path", BOXES, ids=lambda path: path.stem)
def test_a_file_cut_anywhere_is_mapped_up_to_the_cut(path: Path) -> None:
    text = path.read_text("utf-8")
    whole = LineMap(text).spots
    for cut in range(11, len(text), 11):
        spots = LineMap(text[:cut]).spots
        before = {key: spot for key, spot in whole.items() if spot[2] < cut and text[spot[2]] == "\n"}
        assert {key: spot for key, spot in spots.items() if key in before} == before
        for broken in (text[:cut] + text[cut + 1 :], text[:cut] + "]" + text[cut:], text[:cut] + '"' + text[cut:]):
            assert ("format",) in LineMap(broken).spots, "it ends, whatever is wrong"


def test_sub_tables_of_blocks() -> None:
    text = '[[trip.stops]]\n[[trip.stops.deliver]]\nlot = "a"\n[[trip.stops]]\n[trip.stops.x]\nb.c = 1\n'
    _agrees(text)
    places = LineMap(text)
    assert places.line(("trip", "stops", 0, "deliver", 0, "lot")) == 3
    assert places.line(("trip", "stops", 1, "x", "b", "c")) == 6
    assert places.line(("trip", "stops", 1)) == 4
    assert places.line(("trip",)) == 1


def test_a_key_that_is_not_there_is_told_by_its_table() -> None:
    places = LineMap('a = 1\n\n[box]\nlength = "3 m"\n')
    assert places.line(("box", "width")) == 3
    assert places.line(("nothing",)) is None
    assert places.source(("box", "width")) is None
    assert places.source(("box", "length")) == '"3 m"'


def test_quotes_right_before_the_closing_ones() -> None:
    _agrees('a = """x"""""\nb = \'\'\'y\'\'\'\'\nc = ""\nd = \'\'\ne = """\\""""\nf = "\\\\"\ng = 1\n')


def test_escapes_in_keys() -> None:
    _agrees('"a\\u00e9\\t\\"x" = 1\n"\\U0001F600".b = 2\n')
