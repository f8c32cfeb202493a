"""Every field typed wrong in every way, as `coldbox check` tells it: all at once, each with its line, exit status 2.

All of it is made from the declarations, a file for each table and way, so a new field is covered by itself.
"""

from __future__ import annotations

import re
from collections.abc import Callable, Iterator
from pathlib import Path

import pytest
from blocks import holding

from coldbox import units
from coldbox.cli.main import main
from coldbox.project.fields import FIELDS, TABLES, Field
from coldbox.units.clock import Rate

HEAD = re.compile(r"^(?P<file>.+?):(?P<line>\d+)  (?P<path>\S.*)$")
FREE = ("text", "name")  # any text will do
WORDS = (*FREE, "word", "yes_no", "count", "number", "month", "hours")


def _beyond(field: Field, sign: int) -> str | None:
    """A value outside the bounds, typed; None for a field without bounds, or a kind with bounds of its own."""
    if field.low is None or field.high is None:
        return None
    over = (field.high - field.low) * 0.6 + abs(field.high) * 0.1 + 3.0
    value = field.high + over if sign > 0 else field.low - over
    if field.kind in ("count", "month"):
        return str(round(value))
    if field.kind == "number":
        return str(value)
    if field.kind == "clock":
        return '"49:00"' if sign > 0 else '"-1:00"'
    if field.kind == "utc_offset":
        return f'"UTC{value:+.0f}"'
    size: object = Rate(value, "day") if field.kind in ("rate", "daily_duration") else value
    text = units.show(size, field.kind, digits=9, currency="EUR" if "price" in field.kind else None)
    return f'["{text}", "{text}", "{text}"]' if field.many == "three" else f'"{text}"'


WAYS: dict[str, Callable[[Field], str | None]] = {
    "wrong unit": lambda field: None if field.structural or field.kind in FREE else '"3 furlongs"',
    "another quantity": lambda field: None if field.structural or field.kind in WORDS else '"3 lux"',
    "wrong kind": lambda field: '"x"' if field.structural else "[[]]",
    "a number without unit": lambda field: None if field.kind in ("count", "number", "month") else "7",
    "too much": lambda field: _beyond(field, +1),
    "too little": lambda field: _beyond(field, -1),
    "nan": lambda _: "nan",
    "inf": lambda _: "-inf",
    "1e400": lambda _: "1e400",
    "yes": lambda field: None if field.kind == "yes_no" else "true",
    "a date": lambda _: "2026-03-02",
    "empty": lambda field: None if field.kind in FREE or field.structural else '""',
}


def _files(way: str) -> Iterator[tuple[str, list[tuple[int, str]]]]:
    """Texts with every field of a table typed wrong in one way, and the lines and keys to be told."""
    for table, fields in FIELDS.items():
        wrong = [(field.key, WAYS[way](field)) for field in fields]
        lines = [f"{key} = {value}" for key, value in wrong if value is not None]
        if not lines:
            continue
        made = holding(table, *lines, without=tuple(key for key, value in wrong if value is not None))
        rows = made.text.split("\n")
        yield made.text, [(rows.index(line) + 1, line.partition(" ")[0]) for line in lines]


def _told(captured: str) -> list[tuple[str, int, str]]:
    heads = [HEAD.match(line) for line in captured.splitlines() if line and not line.startswith(" ")]
    return [(head["file"], int(head["line"]), head["path"]) for head in heads if head]


@pytest.mark.parametrize("way", WAYS)
def test_every_field_wrong_in_one_way(way: str, tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    for number, (text, expected) in enumerate(_files(way)):
        file = tmp_path / f"{number}.toml"
        file.write_text(text, encoding="utf-8")
        assert main(["check", str(file)]) == 2, text
        out, err = capsys.readouterr()
        assert not out
        assert "Traceback" not in err
        told = _told(err)
        assert {name for name, _, _ in told} == {str(file)}
        found = {(line, path.rpartition(".")[2].partition("[")[0]) for _, line, path in told}
        missed = [one for one in expected if one not in found]
        assert not missed, f"{text}\n{err}"
        lines = [line for _, line, _ in told]
        assert lines == sorted(lines)


@pytest.mark.parametrize("table", [name for name in FIELDS if name])
def test_unknown_keys_and_missing_ones_are_told_together(
    table: str, tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    required = tuple(field.key for field in FIELDS[table] if field.required)
    made = holding(table, *(f'{field.key}zz = "1"' for field in FIELDS[table]), without=required)
    file = tmp_path / "a.toml"
    file.write_text(made.text, encoding="utf-8")
    assert main(["check", str(file)]) == 2
    err = capsys.readouterr().err
    told = _told(err)
    rows = made.text.split("\n")
    for field in FIELDS[table]:
        line = rows.index(f'{field.key}zz = "1"') + 1
        assert (str(file), line) in {(name, at) for name, at, _ in told}, field.path
        assert f'"{field.key}zz" is no key' in err
    for key in required:
        assert f"{key} is missing." in err


def test_a_text_where_any_table_belongs(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    tops = [name for name in TABLES if name and "." not in name]
    text = "format = 1\n" + "".join(f'{name} = "x"\n' for name in tops)
    file = tmp_path / "a.toml"
    file.write_text(text, encoding="utf-8")
    assert main(["check", str(file)]) == 2
    told = _told(capsys.readouterr().err)
    assert [(line, path) for _, line, path in told] == [(2 + place, name) for place, name in enumerate(tops)]


@pytest.mark.parametrize(
    ("text", "line", "words"),
    [
        ('format = 1\n[box\nlength = "3 m"\n', 2, "box"),
        ("format = 1\n[box]\nlength = 3 m\n", 3, "quotes"),
        ('format = 1\n[box]\nlength = "3 m"\nlength = "4 m"\n', 4, "length"),
        ("format = 1\n[box]\nat = 14:00\n", 3, "quotes"),
        ("format = 2\n[box]\n", 1, "format"),
        ('format = 1\nname = "a\x1b[31mb"\n', 2, ""),
        ("\x00\x01\x02", 1, ""),
    ],
)  # fmt: skip
def test_broken_files(text: str, line: int, words: str, tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    file = tmp_path / "broken.toml"
    file.write_text(text, encoding="utf-8")
    assert main(["check", str(file)]) == 2
    out, err = capsys.readouterr()
    assert not out
    assert "Traceback" not in err
    assert "\x1b" not in err
    assert line in [at for _, at, _ in _told(err)] or f"{file}:{line}\n" in err
    assert words in err


def test_names_twice_and_references_to_nothing(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    text = """format = 1
[box]
length = "4 m"
width = "4 m"
height = "2.5 m"
temperature = "2 °C"
construction = "walll"
neighbour = "haal"
[constructions.wall]
r_value = "RSI 4"
thickness = "100 mm"
[neighbours.hall]
temperature = "20 °C"
[[doors]]
name = "main"
width = "1 m"
height = "2 m"
[[doors]]
name = "main"
width = "1 m"
height = "2 m"
neighbour = "nowhere"
"""
    file = tmp_path / "a.toml"
    file.write_text(text, encoding="utf-8")
    assert main(["check", str(file)]) == 2
    err = capsys.readouterr().err
    assert [(line, path) for _, line, path in _told(err)] == [
        (7, "box.construction"), (8, "box.neighbour"), (19, "doors[2].name"), (22, "doors[2].neighbour"),
    ]  # fmt: skip
    assert '"wall"' in err
    assert '"hall"' in err


def test_several_files_are_all_told(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    for name in ("a", "b"):
        (tmp_path / f"{name}.toml").write_text("format = 1\n[box]\ntemperature = 3\n", encoding="utf-8")
    assert main(["check", str(tmp_path / "a.toml"), str(tmp_path / "none.toml"), str(tmp_path / "b.toml")]) == 2
    err = capsys.readouterr().err
    assert {Path(name).name for name, _, _ in _told(err)} == {"a.toml", "b.toml"}
    assert "none.toml: there is no such file." in err


@pytest.mark.parametrize("command", ["check", "load", "compare"])
def test_what_is_no_project_file(command: str, tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    large = tmp_path / "large.toml"
    large.write_bytes(b"# \n" * 1_700_000)
    (tmp_path / "latin.toml").write_bytes(b'format = 1\nname = "K\xfchlhaus"\n')
    cases = {
        "absent.toml": "there is no such file",
        "": "is a folder",
        "large.toml": "has 5.1 MB. A project file has at most 1 MB.",
        "latin.toml": "not UTF-8",
        "a\0b": "no name of a file",
    }
    for name, words in cases.items():
        assert main([command, str(tmp_path / name)]) == 2
        out, err = capsys.readouterr()
        assert not out
        assert words in err
        assert "Traceback" not in err


def test_a_large_file_is_refused_before_it_is_read(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    import tomllib

    large = tmp_path / "large.toml"
    large.write_bytes(b"# \n" * 1_700_000)
    read: list[object] = []
    monkeypatch.setattr(tomllib, "loads", lambda *given, **_: read.append(given))
    monkeypatch.setattr("builtins.open", lambda *given, **_: read.append(given))
    assert main(["check", str(large)]) == 2
    assert not read
