"""The shop library: where it is found, what a project takes from it, and what has changed since."""

from __future__ import annotations

from pathlib import Path

import pytest
from typed import LEAST, SHARED, problems, project

from coldbox.errors import BadProject, UnknownName
from coldbox.project import codec, shop, store
from coldbox.project.origins import looked_up
from coldbox.project.resolve import resolve

ROW = '["thick"]\ndate = "2026-03-02"\nr_value = "RSI 6"\nthickness = "150 mm"\n'
NAMED = LEAST.partition("[constructions]")[0].replace('"wall"', '"thick"')


def _shared(folder: Path, text: str = ROW, table: str = "constructions") -> None:
    (folder / "shared").mkdir(parents=True)
    (folder / "shared" / f"{table}.toml").write_text(text, encoding="utf-8")


def test_the_library_is_found_beside_the_projects_folder_and_above(tmp_path: Path) -> None:
    _shared(tmp_path)
    (tmp_path / ".git").mkdir()
    deep = tmp_path / "projects" / "town" / "quay"
    deep.mkdir(parents=True)
    for folder in (tmp_path, deep.parent.parent, deep):
        assert shop.library(folder / "a.toml").folder == str(tmp_path / "shared")


def test_without_a_checkout_no_folder_far_above_is_taken(tmp_path: Path) -> None:
    _shared(tmp_path)
    deep = tmp_path / "one" / "two" / "three"
    deep.mkdir(parents=True)
    assert shop.library(deep / "a.toml").folder == SHARED
    assert shop.library(tmp_path / "one" / "a.toml").folder == str(tmp_path / "shared")


def test_a_folder_that_happens_to_have_the_name_is_no_library(tmp_path: Path) -> None:
    (tmp_path / "shared").mkdir()
    assert shop.library(tmp_path / "a.toml").folder == SHARED


def test_nothing_is_read_before_it_is_asked_for(tmp_path: Path) -> None:
    _shared(tmp_path, "this is no TOML")
    library = shop.library(tmp_path / "a.toml")
    assert library.names("doors") == ()
    assert not library.problems


def test_every_row_that_ships_is_sound() -> None:
    library = shop.Library(SHARED)
    for table in shop.TABLES:
        assert library.names(table)
        for name in library.names(table):
            assert shop.date_of(library.dated(table, library.row(table, name)))
    assert not library.problems, library.problems


def test_every_construction_and_place_that_ships_computes() -> None:
    library = shop.Library(SHARED)
    for name in library.names("constructions"):
        made = project(NAMED.replace("thick", name), library=SHARED).constructions[name]
        assert made.layers or made.u_value or made.r_value
    for name in library.names("places"):
        text = LEAST.replace('"room"', '"outdoors"') + f'[site]\nlibrary = "{name}"\n'
        site = project(text, library=SHARED).site
        assert site is not None
        assert site.dry_bulb > 0


def test_a_name_alone_is_looked_up_and_said(tmp_path: Path) -> None:
    _shared(tmp_path)
    (tmp_path / "a.toml").write_text(NAMED, encoding="utf-8")
    found = store.open(tmp_path / "a.toml")
    assert found.constructions["thick"].r_value == 6.0
    assert looked_up(found) == [("constructions.thick", "shop library, thick 2026-03-02")]


def test_a_copied_value_holds_whatever_the_library_says(tmp_path: Path) -> None:
    copied = LEAST.replace("{ r_value", '{ library = "thick 2026-03-02", r_value')
    assert not problems(copied)  # no library at all
    _shared(tmp_path)
    (tmp_path / "a.toml").write_text(copied, encoding="utf-8")
    found = store.open(tmp_path / "a.toml")
    assert found.constructions["wall"].r_value == 4.0
    assert not looked_up(found)


def test_a_name_without_values_needs_its_row() -> None:
    text = LEAST.replace('r_value = "RSI 4", thickness = "80 mm"', 'library = "pir8"')
    (problem,) = problems(text, library=SHARED)
    assert problem.path == "constructions.wall.library"
    assert '"pir80"' in problem.text


def test_doors_packs_and_goods_come_from_it_and_what_is_typed_wins(tmp_path: Path) -> None:
    shared = tmp_path / "shared"
    shared.mkdir()
    dated = 'date = "2026-03-02"\n'
    leaf = 'width = "0.9 m"\nheight = "2 m"\nu_value = "0.22 W/m²K"\nthickness = "100 mm"\nheater = "180 W"\n'
    pie = 'composition = { water = "78 %", protein = "17 %", fat = "3.5 %", ash = "1.5 %" }\nfreezing_point = "-2 °C"\n'
    (shared / "doors.toml").write_text(f'["cold door"]\n{dated}{leaf}', encoding="utf-8")
    (shared / "packs.toml").write_text(f'["slab"]\n{dated}kind = "ice"\nmass = "2 kg"\n', encoding="utf-8")
    (shared / "goods.toml").write_text(
        f'["pie"]\n{dated}{pie}["quay box"]\n{dated}product = "cod"\n'
        'limits = [{ above = "-12 °C", where = "core" }]\n',
        encoding="utf-8",
    )
    text = LEAST + (
        '[[doors]]\nname = "main"\nlibrary = "cold door"\nheater = "20 W"\n'
        '[[packs]]\nname = "gel"\nlibrary = "slab"\ncount = 4\n'
        '[[lots]]\nname = "a"\nproduct = "pie"\nstored = "5 kg"\n'
        '[[lots]]\nname = "b"\nproduct = "quay box"\nstored = "5 kg"\n'
        '[[lots]]\nname = "c"\nlibrary = "quay box"\nstored = "5 kg"\n'
    )
    found = project(text, library=str(shared))
    door, pack, (first, second, third) = found.doors[0], found.packs[0], found.lots
    assert (door.width, door.heater) == (0.9, 20.0)
    assert found.constructions[door.construction or ""].u_value == pytest.approx(0.22)
    assert (pack.kind, pack.mass, pack.count, pack.melts_to) == ("ice", 2.0, 4, 0.0)
    assert first.composition is not None
    assert first.composition.water == pytest.approx(0.78)
    assert second.product == third.product == "cod"
    assert second.composition == third.composition is not None
    assert second.limits == third.limits
    assert second.limits[0].limit_c == -12.0
    assert found.origins["lots.a.freezing_point"].kind == "library"
    assert found.origins["lots.b.freezing_point"].kind == "table"
    assert found.origins["doors.main.heater"].kind == "typed"


def test_the_examples_say_what_the_library_beside_them_says() -> None:
    examples = sorted(Path(SHARED).parent.glob("projects/*.toml"))
    assert examples
    for file in examples:
        raw, _ = codec.read(store.read_text(file), str(file))
        assert not shop.differences(raw, shop.library(file)), file.name


def test_what_is_wrong_in_the_library_names_the_library_file(tmp_path: Path) -> None:
    _shared(tmp_path, ROW.replace('"150 mm"', '"150"') + 'colour = "white"\n["undated"]\nr_value = "RSI 1"\n')
    raw, found = codec.read(NAMED, "a.toml")
    with pytest.raises(BadProject) as told:
        resolve(raw, found, shop.library(tmp_path / "a.toml"))
    wrong = {problem.path: problem for problem in told.value.problems if problem.file.endswith("constructions.toml")}
    assert wrong["thick.thickness"].line == 4
    assert "150" in wrong["thick.thickness"].text
    assert wrong["thick.colour"].line == 5
    assert "undated" not in wrong  # nobody asked for that row
    library = shop.library(tmp_path / "a.toml")
    library.row("constructions", "undated")
    assert "2026-03-02" in library.problems[0].text


@pytest.mark.parametrize(
    "text", ["this is no TOML", 'thick = 1\n["thin"]\n', "a = [" * 3000, '["thick"]\nr_value = 5 m\n', ROW + ROW]
)
def test_a_broken_library_is_a_problem_of_its_file(tmp_path: Path, text: str) -> None:
    _shared(tmp_path, text)
    library = shop.library(tmp_path / "a.toml")
    with pytest.raises(UnknownName):
        library.row("constructions", "thick")
    assert [problem.file for problem in library.problems] == [str(tmp_path / "shared" / "constructions.toml")]


def test_rows_are_read_however_the_file_is_laid_out(tmp_path: Path) -> None:
    """In blocks, only the row asked for is read; a file that is laid out otherwise is read whole."""
    inline = 'thick = { date = "2026-03-02", r_value = "RSI 6", thickness = "150 mm" }\n'
    text = ROW.replace("date =", 'notes = """\n["thin"]\n"""\ndate =')
    under = ROW.replace('["thick"]', "[thick]") + '[[thick.layers]]\nmaterial = "cork"\n'
    rows = []
    for number, layout in enumerate((ROW + '["broken"]\nr_value = "RSI"\n', inline, text, under.partition("[[")[0])):
        folder = tmp_path / str(number)
        _shared(folder, layout)
        library = shop.library(folder / "a.toml")
        row = library.row("constructions", "thick")
        assert not library.problems
        assert library.dated("constructions", row) == "thick 2026-03-02"
        rows.append({key: row.values[key].value for key in ("r_value", "thickness")})
    assert all(row == rows[0] for row in rows)


@pytest.mark.parametrize(
    ("copied", "kind", "word"),
    [
        ('library = "thick 2026-03-02", r_value = "RSI 6", thickness = "150 mm"', None, ""),
        ('library = "thick 2026-03-02", r_value = "R-34.07", thickness = "150 mm"', "changed here", "r_value"),
        ('library = "thick 2026-03-02", r_value = "RSI 6", thickness = "140 mm"', "changed here", "thickness"),
        ('library = "thick 2025-01-01", r_value = "RSI 5", thickness = "150 mm"', "moved on", "r_value"),
        ('library = "thick 2025-01-01", r_value = "RSI 6", thickness = "150 mm"', "moved on", "same values"),
        ('library = "thin 2026-03-02", r_value = "RSI 6", thickness = "150 mm"', "gone", "thin"),
        ('library = "thick"', None, ""),
    ],
)
def test_what_moved_on_or_was_changed_is_told_apart(tmp_path: Path, copied: str, kind: str | None, word: str) -> None:
    _shared(tmp_path)
    text = LEAST.replace('r_value = "RSI 4", thickness = "80 mm"', copied)
    raw, found = codec.read(text, "a.toml")
    assert not found
    differences = shop.differences(raw, shop.library(tmp_path / "a.toml"))
    assert [one.kind for one in differences] == ([] if kind is None else [kind])
    if kind is not None:
        assert word in differences[0].text
        assert differences[0].path == "constructions.wall.library"
        assert differences[0].line is not None
