"""Each field typed wrong in every way: one problem each, in the right line, under the right key path.

All of it is made from the declarations, so a new field is covered by itself.
"""

from __future__ import annotations

import sys
from pathlib import Path

import pytest

from coldbox import units
from coldbox.project import codec
from coldbox.project.fields import FIELDS, TABLES, TOP_TABLES, Field
from coldbox.units.clock import Rate

sys.path.insert(0, str(Path(__file__).parents[1] / "support"))
from blocks import holding

ALL = [declared for fields in FIELDS.values() for declared in fields]
PLAIN = [declared for declared in ALL if not declared.structural]
SIZED = [declared for declared in PLAIN if declared.low is not None]
plain = pytest.mark.parametrize("declared", PLAIN, ids=lambda declared: declared.path)


def only_problem(declared: Field, value: str, word: str = "") -> str:
    """The sentence about the one thing wrong: `KEY = value` in an otherwise sound file."""
    key = word or declared.key
    made = holding(declared.table, f"{key} = {value}", without=() if word else (declared.key,))
    _, problems = codec.read(made.text, "x.toml")
    told = "\n".join(str(problem) for problem in problems)
    assert len(problems) == 1, told or f"{key} = {value} was taken"
    (problem,) = problems
    assert problem.file == "x.toml"
    path = made.path if declared.table else ""
    expected = f"{path}.{key}" if path else key
    assert problem.path == expected, told
    assert made.text.split("\n")[(problem.line or 0) - 1].startswith(f"{key} = "), told
    assert problem.text.endswith(tuple(".]")), "a whole sentence"
    return problem.text


@plain
def test_a_wrong_unit(declared: Field) -> None:
    if declared.kind in ("text", "name"):
        return
    text = only_problem(declared, '"7 apples"' if declared.many != "three" else '["7 apples", "1 m", "1 m"]')
    assert "apples" in text
    assert "rite " in text, "it says what to write"


@plain
def test_a_bare_number(declared: Field) -> None:
    if declared.kind in ("count", "number", "month"):
        return
    text = only_problem(declared, "90")
    assert "90" in text
    if declared.kind in ("length", "temperature", "power") and not declared.many:
        assert "has no unit" in text


@plain
def test_a_text_where_something_else_is_due(declared: Field) -> None:
    if declared.kind in ("count", "number", "yes_no", "word", "month"):
        assert '"seven"' in only_problem(declared, '"seven"')


@plain
def test_a_wrong_kind(declared: Field) -> None:
    for value in ("{ a = 1 }", "[1]", "[[]]", "[{ a = 1 }]"):
        if declared.key != "construction" or value[0] != "{":  # a construction of its own may stand there
            only_problem(declared, value)
    if declared.kind != "yes_no":
        only_problem(declared, "true")
    for value in ("2026-03-02", "14:00:00"):
        text = only_problem(declared, value)
        if declared.kind not in ("count", "number", "yes_no"):
            assert f'Put it in quotes: {declared.key} = "{value}".' in text


@plain
def test_no_number(declared: Field) -> None:
    for value in ("nan", "inf", "-inf", "1e400"):
        assert value in only_problem(declared, value), "as it was typed"
    if declared.kind not in ("text", "name"):
        for value in ('"nan"', '"inf m"', '"1e400 m"', '"1e400"'):
            only_problem(declared, value)


@pytest.mark.parametrize("declared", SIZED, ids=lambda declared: declared.path)
@pytest.mark.parametrize("side", ["low", "high"])
def test_out_of_bounds(declared: Field, side: str) -> None:
    assert declared.low is not None and declared.high is not None
    beyond = (
        (declared.high - declared.low) * 0.6 + 1e-9 + abs(declared.high) * 0.1 + (2 if declared.kind == "count" else 0)
    )
    value = declared.low - beyond if side == "low" else declared.high + beyond
    only_problem(declared, _typed(declared, value))


def _typed(declared: Field, value: float) -> str:
    if declared.kind in ("count", "month"):
        return str(round(value))
    if declared.kind == "number":
        return str(value)
    size: object = value
    if declared.kind in ("rate", "daily_duration"):
        size = Rate(value, "hour" if declared.kind == "rate" else "day")
    if declared.kind == "clock" and value < 0:
        return '"-1:00"'
    if declared.kind == "utc_offset":
        return f'"UTC{value:+.0f}"'
    text = units.show(size, declared.kind, digits=9, currency="EUR" if "price" in declared.kind else None)
    return f'["{text}", "{text}", "{text}"]' if declared.many == "three" else f'"{text}"'


@pytest.mark.parametrize("declared", SIZED, ids=lambda declared: declared.path)
def test_the_bounds_themselves_are_in(declared: Field) -> None:
    assert declared.low is not None and declared.high is not None
    if declared.kind in ("clock", "utc_offset", "hours"):
        return
    inside = (
        declared.low + 0.001 * (declared.high - declared.low),
        declared.high - 0.001 * (declared.high - declared.low),
    )
    for value in inside:
        text = _typed(declared, value if declared.kind not in ("count", "month") else declared.high)
        made = holding(declared.table, f"{declared.key} = {text}", without=(declared.key,))
        _, problems = codec.read(made.text, "x.toml")
        assert not problems, f"{text}: {problems}"


@pytest.mark.parametrize("declared", [one for one in ALL if one.required], ids=lambda declared: declared.path)
def test_missing(declared: Field) -> None:
    made = holding(declared.table, without=(declared.key,))
    _, problems = codec.read(made.text, "x.toml")
    assert [problem.path for problem in problems] == [f"{made.path}.{declared.key}" if made.path else declared.key]
    assert problems[0].line == made.line
    assert problems[0].text.startswith(f"{declared.key} is missing. Write one, such as {declared.key} = ")


@pytest.mark.parametrize("declared", ALL, ids=lambda declared: declared.path)
def test_a_misspelt_key(declared: Field) -> None:
    text = only_problem(declared, '"x"', word=f"{declared.key}x")
    assert f'"{declared.key}x" is no key' in text
    assert f'Nearest: "{declared.key}".' in text


@pytest.mark.parametrize("declared", [one for one in ALL if one.structural], ids=lambda declared: declared.path)
def test_a_value_where_tables_belong(declared: Field) -> None:
    for value in ('"x"', "7", "nan", "[7]", '["x"]', "{ z = 1 }", "14:00:00"):
        made = holding(declared.table, f"{declared.key} = {value}")
        _, problems = codec.read(made.text, "x.toml")
        assert problems, value
        for problem in problems:
            assert problem.path.startswith(f"{made.path}.{declared.key}")
            assert made.text.split("\n")[(problem.line or 0) - 1].startswith(f"{declared.key} = ")


@pytest.mark.parametrize("table", TOP_TABLES)
def test_a_text_where_a_top_table_belongs(table: str) -> None:
    for value in ('"x"', "7", "true", "[7]", "14:00:00"):
        _refused_at_the_top(table, value)


def _refused_at_the_top(table: str, value: str) -> None:
    text = f"format = 1\n{table} = {value}\n" + ("" if table == "box" else '[box]\ntemperature = "4 °C"\n')
    _, problems = codec.read(text, "x.toml")
    assert [problem.line for problem in problems] == [2]
    assert problems[0].path in (table, f"{table}[1]")
    assert "table" in problems[0].text or "bracket" in problems[0].text
    assert "rite " in problems[0].text


@pytest.mark.parametrize("table", TOP_TABLES)
def test_the_other_brackets(table: str) -> None:
    wrong = f"[{table}]" if TABLES[table].form == "list" else f"[[{table}]]"
    text = "format = 1\n" + ("" if table == "box" else '[box]\ntemperature = "4 °C"\n') + f"{wrong}\n"
    _, problems = codec.read(text, "x.toml")
    assert [problem.path for problem in problems] == [table]
    assert "bracket" in problems[0].text or "Write [" in problems[0].text


@pytest.mark.parametrize("table", TOP_TABLES)
def test_a_misspelt_table(table: str) -> None:
    brackets = ("[[", "]]") if TABLES[table].form == "list" else ("[", "]")
    text = f'format = 1\n[box]\ntemperature = "4 °C"\n{brackets[0]}{table}x{brackets[1]}\n'
    _, problems = codec.read(text, "x.toml")
    assert [(problem.line, problem.path) for problem in problems] == [(4, f"{table}x")]
    assert f"Nearest: {brackets[0]}{table}" in problems[0].text


def test_all_of_it_at_once() -> None:
    """One file in which every value of every table is wrong: each is told, and nothing else."""
    lines, expected = ["format = 1"], set()
    for table in ("site", "box", "sizing", "money", "machine", "trip", "outage", "spreads"):
        lines.append(f"[{table}]")
        for declared in FIELDS[table]:
            lines.append(f"{declared.key} = nan")
            expected.add((len(lines), f"{table}.{declared.key}"))
    _, problems = codec.read("\n".join(lines), "x.toml")
    assert {(problem.line, problem.path) for problem in problems} == expected
    assert [problem.line for problem in problems] == sorted(problem.line or 0 for problem in problems)
