"""Whole files read: what is kept of them, and files that are broken as a whole."""

from __future__ import annotations

from pathlib import Path

import pytest

from coldbox.errors import Problem
from coldbox.project import codec
from coldbox.project.raw import Block, Raw
from coldbox.units.clock import Rate, Span, Spread

BOXES = sorted((Path(__file__).parent / "boxes").glob("*.toml"))
BOX = '[box]\ntemperature = "4 °C"\n'


def read(text: str) -> tuple[Raw, list[Problem]]:
    return codec.read(text, "x.toml")


def sound(text: str) -> Raw:
    raw, problems = read(text)
    assert problems == []
    return raw


def one(text: str) -> Problem:
    _, problems = read(text)
    assert len(problems) == 1, problems
    assert problems[0].file == "x.toml"
    return problems[0]


def block(raw: Raw, table: str, name: str = "") -> Block:
    return next(found for found in raw.blocks[table] if found.name == name)


@pytest.mark.parametrize("path", BOXES, ids=lambda path: path.stem)
def test_five_boxes_read_without_a_problem(path: Path) -> None:
    raw = sound(path.read_text("utf-8"))
    assert {"", "box"} <= set(raw.blocks)
    lines = raw.text.split("\n")
    for blocks in raw.blocks.values():
        for found in blocks:
            for key, entered in found.values.items():
                assert entered.line is not None
                assert key in lines[entered.line - 1]
                assert not entered.option


def test_what_is_kept_of_a_freezer() -> None:
    raw = sound((Path(__file__).parent / "boxes/walk-in-freezer.toml").read_text("utf-8"))
    box, main, site = block(raw, "box"), block(raw, "doors", "main"), block(raw, "site")
    assert box.values["temperature"].value == -18.0
    assert box.values["leakage"].value == Rate(0.3 / 3600.0, "hour")
    assert site.values["dry_bulb"].spread == Spread("normal", 2.0)
    assert (site.values["latitude"].value, site.values["clock"].value, site.values["month"].value) == (55.1, 2.0, 7)
    assert main.path == "doors.main"
    assert main.values["protection"].value == ("strip curtain",)
    assert main.values["width"].text == "0.9 m"
    assert main.values["hours"].value.spans == (Span(7.0, 17.0, 1.0),)  # type: ignore[attr-defined]
    cod = block(raw, "lots", "cod")
    assert cod.values["piece"].value == (1.2, 0.8, 0.8)
    assert (cod.values["packaging_mass"].kind, cod.values["arrives"].kind) == ("mass_rate", "mass_rate")
    assert cod.children["limits"][0].path == "lots.cod.limits[1]"
    assert cod.children["limits"][0].values["above"].value == -12.0
    layers = block(raw, "constructions", "pir100").children["layers"]
    assert [layer.values["material"].value for layer in layers] == ["steel sheet", "PIR foam", "steel sheet"]
    assert layers[1].values["conductivity"].spread is not None
    assert block(raw, "machine").values["defrost_at"].value == (5.0, 11.0, 17.0, 23.0)
    events = block(raw, "outage").children["events"]
    assert [event.path for event in events] == ["outage.events[1]", "outage.events[2]"]
    assert events[0].values["at"].kind == "clock"


def test_a_time_or_a_duration_will_do() -> None:
    raw = sound((Path(__file__).parent / "boxes/dry-ice-parcel.toml").read_text("utf-8"))
    at = block(raw, "outage").children["events"][0].values["at"]
    assert (at.value, at.kind) == (6 * 3600.0, "duration")


def test_counts_and_yes_no_are_kept_as_such() -> None:
    raw = sound(f'format = 1\n{BOX}powered = false\n[[lights]]\npower = "40 W"\ncount = 2\n')
    assert block(raw, "box").values["powered"].value is False
    count = raw.blocks["lights"][0].values["count"]
    assert (count.value, count.text, type(count.value)) == (2, "2", int)


def test_words_in_any_case_and_several_in_one_text() -> None:
    raw = sound(f'format = 1\nunits = "ip"\n{BOX}colour = "Bare  Metal"\n[[lots]]\nexposed = "top, bottom"\n')
    assert raw.blocks[""][0].values["units"].value == "IP"
    assert block(raw, "box").values["colour"].value == "bare metal"
    assert raw.blocks["lots"][0].values["exposed"].value == ("top", "bottom")


# Names


def test_things_without_a_name_are_numbered_or_called_after_what_they_are() -> None:
    door = '[[doors]]\nwidth = "1 m"\nheight = "2 m"\n'
    raw = sound(
        f'format = 1\n{BOX}{door}{door}name = "main"\n[[lots]]\nproduct = "milk"\n[[lots]]\nproduct = "cod"\n'
        '[[lots]]\nproduct = "cod"\n'
    )
    assert [(found.name, found.path) for found in raw.blocks["doors"]] == [
        ("doors[1]", "doors[1]"),
        ("main", "doors.main"),
    ]
    assert [found.path for found in raw.blocks["lots"]] == ["lots.milk", "lots[2]", "lots[3]"]


def test_a_name_used_twice() -> None:
    door = '[[doors]]\nname = "main"\nwidth = "1 m"\nheight = "2 m"\n'
    problem = one(f"format = 1\n{BOX}{door.replace('main', 'side')}{door}{door}")
    assert (problem.line, problem.path) == (13, "doors[3].name")
    assert '"main"' in problem.text and "line 9" in problem.text


def test_a_table_used_twice() -> None:
    problem = one(f'format = 1\n{BOX}[neighbours.hall]\ntemperature = "4 °C"\n[neighbours.hall]\n')
    assert problem.line == 6
    assert "twice" in problem.text


def test_a_key_used_twice() -> None:
    problem = one(f'format = 1\n{BOX}humidity = "80 %"\nhumidity = "85 %"\n')
    assert (problem.line, problem.path) == (5, "box.humidity")
    assert "twice" in problem.text


@pytest.mark.parametrize(
    "name",
    [
        "",
        " ",
        " main",
        "a/b",
        "..",
        "..\\a",
        ".a",
        "a[1]",
        "a=b",
        "x" * 61,
        "a\u202eb",
        "a\x1b[31m",
        "a\nb",
        "a\u200bb",
        "é\x7f",
    ],
)
def test_a_name_that_is_none(name: str) -> None:
    written = "".join(sign if sign.isprintable() and sign not in '"\\' else f"\\u{ord(sign):04x}" for sign in name)
    problem = one(f'format = 1\n{BOX}[[people]]\nname = "{written}"\ncount = 1\nhours = "always"\n')
    assert (problem.line, problem.path) == (5, "people[1].name")
    assert str(problem).replace("\n", "").isprintable()
    problem = one(f'format = 1\n{BOX}[neighbours."{written}"]\ntemperature = "4 °C"\n')
    assert problem.line == 4 and problem.path.startswith("neighbours.")
    assert str(problem).replace("\n", "").isprintable()


@pytest.mark.parametrize("name", ["main", "floor heater", "PIR 0.1 m", "Tür 2", "冷蔵庫", "a-b_c", "cod & peas", "#3"])
def test_a_name_that_is_one(name: str) -> None:
    raw = sound(f'format = 1\n{BOX}[[people]]\nname = "{name}"\ncount = 1\nhours = "always"\n')
    assert raw.blocks["people"][0].path == f"people.{name}"


@pytest.mark.parametrize(
    "sign", ["\\u001b[31m", "\\u202e", "\\u2066", "\\u0007", "\\u200f", "\\u2028", "\\u0000", "\\n"]
)
def test_text_that_would_act_on_a_terminal(sign: str) -> None:
    problem = one(f'format = 1\nname = "a{sign}b"\n{BOX}')
    assert (problem.line, problem.path) == (2, "name")
    assert "cannot be printed" in problem.text
    assert problem.text.isprintable()


def test_nothing_that_was_typed_reaches_a_message_alive() -> None:
    _, problems = read(f'format = 1\n{BOX}length = "3\\u001b[2J m"\n"\\u001b[31m" = 1\n["\\u202e".x]\n')
    assert len(problems) == 3
    assert all(str(problem).replace("\n", "").isprintable() for problem in problems)


def test_notes_have_lines_and_titles_have_not() -> None:
    raw = sound(f'format = 1\nnotes = """\nfirst\n\tsecond\n"""\n{BOX}notes = "x"\n')
    assert raw.blocks[""][0].values["notes"].value == "first\n\tsecond\n"


# Constructions in place


def test_a_construction_in_place_of_its_name() -> None:
    raw = sound(
        f'format = 1\n{BOX}[faces.floor]\nconstruction = {{ layers = [{{ material = "cork", thickness = "5 cm" }}] }}\n'
    )
    face = block(raw, "faces", "floor")
    assert "construction" not in face.values
    inline = face.children["construction"][0]
    assert (inline.table, inline.path) == ("constructions", "faces.floor.construction")
    assert inline.children["layers"][0].path == "faces.floor.construction.layers[1]"
    assert inline.children["layers"][0].line == 5


def test_a_wrong_key_deep_inside_lines() -> None:
    _, problems = read(
        f"format = 1\n{BOX}[constructions]\na = {{ layers = [\n"
        '  { material = "cork", thickness = "5 cm" },\n'
        '  { material = "cork", thicknes = "5 cm" },\n  7,\n] }\n'
    )
    assert [(problem.line, problem.path) for problem in problems] == [
        (7, "constructions.a.layers[2].thicknes"),
        (7, "constructions.a.layers[2].thickness"),
        (8, "constructions.a.layers[3]"),
    ]


def test_keys_of_another_table_are_sent_home() -> None:
    assert "[sizing]" in one(f'format = 1\n{BOX}safety = "10 %"\n').text
    assert "[box]" in one(f'format = 1\nair_change = "1/h"\n{BOX}').text
    assert '"hall"' in one(f"format = 1\n{BOX}[faces.hall]\n").text


# Broken files


@pytest.mark.parametrize(
    ("line", "path", "words"),
    [
        ("hours = 14:00", "people[1].hours", 'hours = "14:00"'),
        ("hours = 07:00-17:00 50 %  # noon", "people[1].hours", 'hours = "07:00-17:00 50 %"'),
        ("hours = always", "people[1].hours", 'hours = "always"'),
        ("hours = 3 m", "people[1].hours", 'hours = "3 m"'),
    ],
)
def test_forgotten_quotes(line: str, path: str, words: str) -> None:
    _, problems = read(f"format = 1\n{BOX}[[people]]\ncount = 1\n{line}\n")
    assert [(problem.line, problem.path) for problem in problems][:1] == [(6, path)]
    assert words in problems[0].text and "quotes" in problems[0].text


def test_forgotten_quotes_hide_no_other_problem() -> None:
    _, problems = read(
        'format = 1\n[box]\ntemperature = 4 °C\npowered = False\nlength = "3"\n[outage]\n'
        'events = [{ at = 16:00, what = "moved", neighbour = room },\n  { at = 17:00, what = "move" }]\n'
    )
    assert [(problem.line, problem.path) for problem in problems] == [
        (3, "box.temperature"),
        (4, "box.powered"),
        (5, "box.length"),
        (7, "outage.events[1].at"),
        (7, "outage.events[1].neighbour"),
        (8, "outage.events[2].at"),
        (8, "outage.events[2].what"),
    ]
    assert "powered = false" in problems[1].text


@pytest.mark.parametrize(
    ("text", "line"),
    [
        ('format = 1\n[box]\nlength = "3 m\n', 3),
        ("format = 1\n[box\n", 2),
        ("format = 1\n[box]\nlength\n", 3),
        ("format = 1\n[box]\nlength = \n", 3),
        ("format = 1\n[box]\n= 3\n", 3),
        ('format = 1\n[box]\nlimits = [{ above = "3 °C"\n', 4),
        ('format = 1\n[box]\nname = "a\\qb"\n', 3),
        ('format = 1\n[box]\nname = "\\ud800"\n', 3),
        ("format = 1\n\n\nbox.a = 1\n[box]\n", 5),
        ("format = 1\nx = { a = 1, a = 2 }\n", 2),
        ("format = 1\nx = [1]\nx.y = 1\n", 3),
        ("format = 1\nx = 2026-13-45\n", 2),
        ('format = 1\nname = "a\x07b"\n', 2),
        ('format = 1\nx = """\nabc\n', 4),
        ("format = 1\nx = 1 y = 2\n", 2),
        ("\x00", 1),
        ("format: 1\n", 1),
        ("<html>\n", 1),
        ("PK\x03\x04", 1),
    ],
)
def test_broken_toml(text: str, line: int) -> None:
    raw, problems = read(text)
    assert problems
    away = min(abs((problem.line or 0) - line) for problem in problems if "no [box]" not in problem.text)
    assert away <= (1 if "{ above" in text or '"""' in text else 0)
    assert all(problem.text.endswith(".") for problem in problems)
    assert all(str(problem).replace("\n", "").isprintable() for problem in problems)
    assert "box" not in raw.blocks


@pytest.mark.parametrize(
    "value", ["[" * 5000, "[" * 5000 + "]" * 5000, "{ a = " * 3000 + "1" + "}" * 3000, "[" * 90 + "]" * 90]
)
def test_deep_nesting(value: str) -> None:
    problem = one(f"format = 1\n{BOX}colour = {value}\n")
    assert problem.line == 4


def test_deep_dotted_keys() -> None:
    problem = one(f"format = 1\n{BOX}{'.'.join('a' * 4000)} = 1\n")
    assert (problem.line, problem.path) == (4, "box.a")


def test_a_number_without_end() -> None:
    assert one(f"format = 1\n{BOX}colour = {'9' * 6000}\n").line == 4
    assert one(f'format = 1\n{BOX}[[lights]]\npower = "1 W"\ncount = {"9" * 400}\n').path == "lights[1].count"


def test_too_many() -> None:
    problem = one(f"format = 1\n{BOX}" + '[[lights]]\npower = "1 W"\n' * 501)
    assert (problem.line, problem.path) == (4, "lights")
    assert "501" in problem.text and "500" in problem.text
    assert one(f"format = 1\n{BOX}rules = [" + '"vaccine", ' * 101 + "]\n").path == "box.rules"
    assert (
        one(f"format = 1\n{BOX}" + "".join(f'[neighbours.a{n}]\ntemperature="4 °C"\n' for n in range(501))).path
        == "neighbours"
    )


def test_thousands_of_problems_are_cut_short() -> None:
    _, problems = read(f"format = 1\n{BOX}" + "".join(f"k{n} = 1\n" for n in range(3000)))
    assert len(problems) == codec.MOST_PROBLEMS + 1
    assert any("2700 more" in problem.text for problem in problems)


def test_an_empty_file() -> None:
    _, problems = read("")
    assert [(problem.line, problem.path) for problem in problems] == [(1, "format"), (1, "box")]


def test_a_byte_order_mark_and_other_line_ends() -> None:
    sound(f"\ufeffformat = 1\r\n{BOX}")
    assert one(f'format = 1\n{BOX}length = "90"\n'.replace("\n", "\r\n")).line == 4


def test_another_format() -> None:
    problem = one(f"format = 2\n{BOX}")
    assert (problem.line, problem.path, problem.text) == (1, "format", "2 will not do. Write format = 1.")


def test_bounds_are_told_in_the_units_of_the_file() -> None:
    assert "-148 °F" in one('format = 1\nunits = "IP"\n[box]\ntemperature = "900 °F"\n').text
    assert "-100 °C" in one('format = 1\n[box]\ntemperature = "900 °F"\n').text


def test_the_form_of_a_problem() -> None:
    problem = one(f'format = 1\n{BOX}[[doors]]\nname = "main"\nheight = "2 m"\nwidth = "90"\n')
    assert str(problem) == (
        'x.toml:7  doors.main.width\n    "90" has no unit. Write a length, such as "900 mm" or "36 in".'
    )
