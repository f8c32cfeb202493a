"""The loader: one row at a time, checked, found by any of its names."""

from __future__ import annotations

import subprocess
import sys
import time

import pytest

from coldbox.errors import TableFault, UnknownName
from coldbox.tables import columns, load

GOOD = """# fans

["small"]
also = ["tiny"]
up_to_c = 5
share = 0.1
source = "mill"
where = "page 3"

["large"]
up_to_c = 10.0
share = 0.2
source = "mill"
where = "page 4"
"""
SOURCES = '[mill]\ntitle = "Mill"\nwhere = "1900"\nread = "memory"\n'


@pytest.fixture
def shelf(tmp_path):
    """A folder of tables of its own, and a way to write one."""
    (tmp_path / "sources.toml").write_text(SOURCES, encoding="utf-8")

    def put(text: str = GOOD, table: str = "fans"):
        (tmp_path / f"{table}.toml").write_text(text, encoding="utf-8")
        return tmp_path

    return put


def test_a_row_by_name_and_by_other_name(shelf):
    folder = shelf()
    small = load.row("fans", "small", folder)
    assert small["share"] == 0.1
    assert small["up_to_c"] == 5.0
    assert isinstance(small["up_to_c"], float)
    assert load.row("fans", "tiny", folder) == small
    assert load.row("fans", "large", folder)["share"] == 0.2
    assert load.names("fans", folder) == ("small", "large")
    assert load.aliases("fans", folder) == {"tiny": "small"}
    assert load.figures("fans", "share", folder) == {"small": 0.1, "large": 0.2}


def test_a_row_is_read_only():
    with pytest.raises(TypeError):
        load.row("materials", "ice")["density"] = 1.0  # type: ignore[index]


def test_a_look_up_parses_only_its_own_row(shelf):
    """A fault further down the table does not stop a sound row from being found."""
    folder = shelf(GOOD + '\n["broken"]\nshare = = 3\n')
    assert load.row("fans", "small", folder)["share"] == 0.1
    with pytest.raises(TableFault):
        load.row("fans", "broken", folder)
    with pytest.raises(TableFault):
        load.rows("fans", folder)


@pytest.mark.parametrize(
    ("asked", "nearest"),
    [("stel sheet", "steel sheet"), ("pur foam", "PUR foam"), ("Polystyren foam", "polyethylene foam"), ("qqq", None)],
)
def test_an_unknown_name_says_the_nearest(asked, nearest):
    with pytest.raises(UnknownName) as caught:
        load.row("materials", asked)
    assert caught.value.nearest == nearest
    assert (caught.value.table, caught.value.name) == ("materials", asked)


def test_an_unknown_table():
    with pytest.raises(UnknownName) as caught:
        load.row("material", "ice")
    assert caught.value.nearest == "materials"


@pytest.mark.parametrize("name", ["", "[", 'a"]\n["ice', "\n", "steel sheet\n"])
def test_odd_names_are_only_unknown(name):
    with pytest.raises(UnknownName):
        load.row("materials", name)


@pytest.mark.parametrize(
    ("was", "becomes", "says"),
    [
        ("share = 0.1", "share = 1.1", "between 0 and 1"),
        ("share = 0.1", "share = nan", "between"),
        ("share = 0.1", "share = true", "number"),
        ("share = 0.1", 'share = "0.1"', "number"),
        ("share = 0.1\n", "", "share is missing"),
        ("share = 0.1", "share = 0.1\nshade = 2", "shade is no column"),
        ('source = "mill"\nwhere = "page 3"', 'source = "windmill"\nwhere = "page 3"', "windmill"),
        ('where = "page 3"\n', "", "where is missing"),
        ('where = "page 3"', 'where = " "', "text"),
        ('also = ["tiny"]', 'also = ["tiny", ""]', "list of names"),
    ],
)
def test_a_faulty_row_is_refused_and_says_why(shelf, was, becomes, says):
    assert was in GOOD
    folder = shelf(GOOD.replace(was, becomes, 1))
    with pytest.raises(TableFault) as caught:
        load.row("fans", "small", folder)
    assert says in str(caught.value)
    assert (caught.value.table, caught.value.row) == ("fans", "small")
    assert load.row("fans", "large", folder)["share"] == 0.2


@pytest.mark.parametrize(
    ("column", "value", "says"),
    [
        (columns.Column(kind="count", low=1, high=12), 1.5, "whole number"),
        (columns.Column(kind="count", low=1, high=12), 13, "between"),
        (columns.Column(kind="numbers", length=2), [1.0], "list of 2"),
        (columns.Column(kind="numbers", low=0, high=1), [1.0, 2.0], "between"),
        (columns.Column(kind="pairs", low=0, high=1), [[0, 0.1], [0, 0.2]], "rise"),
        (columns.Column(kind="pairs", low=0, high=1), [[0, 0.1], [5, 1.2]], "between"),
        (columns.Column(kind="pairs", low=0, high=1), [0, 0.1], "pairs"),
        (columns.Column(kind="limits"), [{"above": 8.0}], "where"),
        (columns.Column(kind="limits"), [{"above": 8.0, "below": 2.0, "where": "core"}], "above or below"),
        (columns.Column(kind="limits"), [{"above": "8", "where": "core"}], "temperature"),
        (columns.Column(kind="limits"), [{"above": 8.0, "where": "lid"}], "surface"),
        (columns.Column(kind="word", choices=("up", "down")), "left", "up, down"),
        (columns.Column(kind="yes_no"), "yes", "true or false"),
    ],
)
def test_every_kind_of_column_can_say_no(column, value, says):
    assert says in column.fault(value)


def test_sound_values_pass_and_become_floats_and_tuples():
    pairs = columns.Column(kind="pairs", low=0, high=1)
    assert not pairs.fault([[0, 0.1], [5, 0.2]])
    assert pairs.clean([[0, 0.1], [5, 0.2]]) == ((0.0, 0.1), (5.0, 0.2))
    assert not columns.Column(kind="limits").fault([{"below": -2, "where": "core"}])
    assert columns.Column(kind="numbers", length=2).clean([1, 2.5]) == (1.0, 2.5)


def test_a_table_that_is_not_there(tmp_path):
    with pytest.raises(TableFault):
        load.names("fans", tmp_path)


def test_a_row_costs_a_small_part_of_its_table():
    """Side by side: the last row of the longest table against the whole table."""
    load.row("weather", "London")  # the text is read once
    began = time.perf_counter()
    load.row("weather", "Nadi")
    one = time.perf_counter() - began
    load._rows.cache_clear()
    began = time.perf_counter()
    load.rows("weather")
    assert one < 0.2 * (time.perf_counter() - began)


def test_a_look_up_needs_no_difflib():
    code = "import sys; from coldbox.tables import load; load.row('materials', 'ice'); print('difflib' in sys.modules)"
    ran = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)
    assert ran.stdout.strip() == "False"
