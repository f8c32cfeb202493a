"""Draws: every stratum once, the distributions asked for, and nothing that depends on how the file is written."""

from __future__ import annotations

from pathlib import Path
from typing import Any

import numpy as np
import pytest
from scipy import stats

from coldbox.project import store
from coldbox.project.draw import numeric_paths
from coldbox.spread import inputs
from coldbox.spread.draws import drawn, draws, hypercube_column
from coldbox.spread.inputs import ENTHALPY, FILMS, Target, columns, left_out
from coldbox.spread.normal import below, quantile

ROOT = Path(__file__).parents[2]

HEAD = """format = 1
name = "Boat shed"
[box]
length = "3 m"
width = "2.5 m"
height = "2.2 m"
temperature = "-18 °C"
construction = "wall"
neighbour = "shed"
leakage = "0.3/h ± 40 %"
"""
WALL = """[constructions.wall]
layers = [{ material = "steel sheet", thickness = "0.5 mm" }, { material = "PIR foam", thickness = "100 mm" }]
"""
SHED = """[neighbours.shed]
temperature = "18 to 28 °C"
humidity = "50 %"
"""
DOOR = """[[doors]]
name = "hatch"
width = "0.8 m"
height = "1.9 m"
construction = "wall"
passages = "6/h"
"""
LOTS = """[[lots]]
name = "cod"
product = "cod"
stored = "500 kg ± 50 kg"
[[lots]]
name = "peas"
product = "green peas"
stored = "300 kg"
"""


def opened(tmp_path: Path, *parts: str) -> Any:
    file = tmp_path / "shed.toml"
    file.write_text("\n".join(parts), encoding="utf-8")
    return store.open(str(file))


@pytest.fixture
def shed(tmp_path: Path) -> Any:
    return opened(tmp_path, HEAD, WALL, SHED, DOOR, LOTS)


def test_quantile_against_a_library() -> None:
    share = np.concatenate((np.logspace(-300, -1, 400), np.linspace(0.001, 0.999, 2001), 1 - np.logspace(-15, -1, 200)))
    np.testing.assert_allclose(quantile(share), stats.norm.ppf(share), rtol=4e-15, atol=1e-16)
    assert quantile(np.array([0.0, 1.0])).tolist() == [-np.inf, np.inf]
    for z in (-9.0, -1.2, 0.0, 0.4, 6.0):
        assert below(z) == pytest.approx(stats.norm.cdf(z), rel=1e-14)


@pytest.mark.parametrize("count", [1, 2, 7, 500, 2000])
def test_every_stratum_has_one_draw(count: int) -> None:
    column = hypercube_column("box.leakage", count, 3)
    assert sorted(np.floor(column * count).astype(int)) == list(range(count))
    assert column.min() > 0.0 and column.max() < 1.0


def test_columns_know_nothing_of_each_other() -> None:
    count = 4000
    mixed = [hypercube_column(key, count, 1) for key in ("box.leakage", "box.length", "spreads.foam", "spreads.films")]
    apart = np.corrcoef(mixed) - np.eye(len(mixed))
    assert np.abs(apart).max() < 4.0 / np.sqrt(count)
    # Within the strata draws lie evenly: else the mean of a column would be off.
    assert stats.kstest((mixed[0] * count) % 1.0, "uniform").pvalue > 0.001


@pytest.mark.parametrize(("low", "high"), [(-np.inf, np.inf), (0.0, np.inf), (0.9, 1.2), (-np.inf, 1.0), (1.0, np.inf)])
def test_normal_inputs_are_normal_and_cut_at_their_bounds(low: float, high: float) -> None:
    half = 0.5
    target = Target(path="x", middle=1.0, half_width=half, low=low, high=high)
    ranks = hypercube_column("x", 3000, 1)
    found = drawn(target, "normal", ranks)
    scale = half / 1.959963984540054
    cut = stats.truncnorm((low - 1.0) / scale, (high - 1.0) / scale, loc=1.0, scale=scale)
    np.testing.assert_allclose(found, cut.ppf(ranks), rtol=1e-9)
    assert found.min() >= low and found.max() <= high
    if not np.isfinite((low, high)).any():
        assert np.mean(np.abs(found - 1.0) <= half) == pytest.approx(0.95, abs=0.001)


def test_even_inputs_are_even() -> None:
    ranks = hypercube_column("x", 1000, 1)
    found = drawn(Target(path="x", middle=4.0, half_width=1.0, low=3.5), "even", ranks)
    np.testing.assert_allclose(found, stats.uniform(3.5, 1.5).ppf(ranks), rtol=1e-12)


def test_the_middle_comes_first_and_the_file_rules(shed: Any) -> None:
    made = draws(shed, 400, 7)
    paths = numeric_paths(shed)
    for path, values in made.values.items():
        assert values.shape == (401,)
        assert values[0] == pytest.approx(paths[path], rel=1e-14), path
    leak = made.values["box.leakage"] * 3600.0
    assert np.mean(np.abs(leak[1:] - 0.3) <= 0.12) == pytest.approx(0.95, abs=0.005)
    warm = made.values["neighbours.shed.temperature"][1:]
    assert warm.min() >= 18.0 and warm.max() <= 28.0 and warm.std() == pytest.approx(10.0 / np.sqrt(12.0), rel=0.01)
    assert made.values["lots.cod.stored"][1:].std() == pytest.approx(50.0 / 1.96, rel=0.02)
    assert "lots.peas.stored" not in made.values
    # One figure in the file is one draw wherever it is used; its ± takes the place of the usual factor.
    assert {column.key for column in made.columns} == {
        "box.leakage", "neighbours.shed.temperature", "lots.cod.stored", "spreads.foam", "spreads.ageing",
        "spreads.openings", "spreads.enthalpy", "spreads.freezing_point", "spreads.films",
    }  # fmt: skip
    foam = made.values["constructions.wall.layers[2].conductivity"]
    assert foam[1:].std() / foam[0] == pytest.approx(0.10 / 1.96, rel=0.01)
    assert "constructions.wall.layers[1].conductivity" not in made.values
    ageing = made.values["constructions.wall.layers[2].ageing"]
    assert ageing.min() == 0.0 and np.mean(ageing <= 0.05) == pytest.approx(0.95, abs=0.005)
    cod, peas = (made.values[f"lots.{name}.freezing_point"] for name in ("cod", "peas"))
    np.testing.assert_allclose(cod - cod[0], peas - peas[0], atol=0.02)  # one draw for both
    assert made.enthalpy[1:].std() == pytest.approx(0.10 / 1.96, rel=0.01)
    assert made.films[0] == made.enthalpy[0] == 1.0


def test_plus_minus_nothing_switches_off(tmp_path: Path) -> None:
    head = HEAD.replace("± 40 %", "± 0")
    off = '[spreads]\nfoam = "± 0 %"\nfilms = "0 %"\nenthalpy = "0 %"\n'
    made = draws(opened(tmp_path, head, WALL, SHED, DOOR, LOTS, off), 20, 1)
    keys = {column.key for column in made.columns}
    assert not keys & {"box.leakage", "spreads.air", "spreads.foam", "spreads.films", "spreads.enthalpy"}
    assert made.films_of(1, 5) == made.enthalpy_of(1, 5) == 1.0
    assert "spreads.ageing" in keys


def test_order_in_the_file_changes_nothing(tmp_path: Path) -> None:
    one = draws(opened(tmp_path, HEAD, WALL, SHED, DOOR, LOTS), 60, 5)
    lots = LOTS.split("[[lots]]")
    turned = "".join(f"[[lots]]{part}" for part in (lots[2], lots[1]))
    extra = '[[people]]\ncount = 1\nhours = "08:00-12:00"\n'
    other = draws(opened(tmp_path, HEAD, turned, DOOR, extra, SHED, WALL), 60, 5)
    assert one.values.keys() == other.values.keys()
    for path, values in one.values.items():
        assert np.array_equal(values, other.values[path]), path
    assert np.array_equal(one.films, other.films)


def test_seed_and_count_decide(shed: Any) -> None:
    one = draws(shed, 50, 1).values["box.leakage"]
    assert np.array_equal(one, draws(shed, 50, 1).values["box.leakage"])
    assert not np.array_equal(one, draws(shed, 50, 2).values["box.leakage"])
    for count, seed in ((0, 1), (-3, 1), (10, -1)):
        with pytest.raises(ValueError):
            draws(shed, count, seed)


def test_parts_are_slices_behind_the_middle(shed: Any) -> None:
    made = draws(shed, 30, 1)
    whole, part = made.part(1, 31), made.part(11, 21)
    assert whole.lots[0].stored.shape == (31, 1)
    assert np.array_equal(part.lots[0].stored, np.concatenate((whole.lots[0].stored[:1], whole.lots[0].stored[11:21])))
    assert part.box.leakage.basis == "hour"
    assert np.array_equal(made.films_of(11, 21)[:, 0], np.concatenate((made.films[:1], made.films[11:21])))
    thickness = whole.constructions["wall"].thickness
    assert thickness == pytest.approx(0.1005)


def test_quoted_figures_are_drawn_by_their_resistance(tmp_path: Path) -> None:
    wall = '[constructions.wall]\nu_value = "0.25 W/m²K"\nthickness = "100 mm"\n'
    made = draws(opened(tmp_path, HEAD, wall, SHED), 300, 1)
    figure = made.values["constructions.wall.u_value"]
    own = 1.0 / figure - 0.17
    assert figure[0] == pytest.approx(0.25)
    assert (own[0] / own)[1:].std() == pytest.approx(0.10 / 1.96, rel=0.02)
    glass = '[constructions.wall]\nu_value = "2.8 W/m²K"\nthickness = "30 mm"\n'
    assert "constructions.wall.u_value" not in draws(opened(tmp_path, HEAD, glass, SHED), 10, 1).values


def test_doors_are_never_open_for_more_than_all_the_time(tmp_path: Path) -> None:
    busy = DOOR.replace('"6/h"', '"20/h"') + 'open_each = "150 s"\n'
    made = draws(opened(tmp_path, HEAD, WALL, SHED, busy), 500, 1)
    shares = made.values["doors.hatch.passages"] * 150.0
    assert shares[0] == pytest.approx(20 * 150 / 3600)
    assert shares.max() <= 1.0


def test_the_wet_bulb_moves_with_the_dry_bulb(tmp_path: Path) -> None:
    outdoors = HEAD.replace('"shed"', '"outdoors"')
    site = """[site]
latitude = "55° N"
longitude = "14° E"
month = "July"
dry_bulb = "30 °C ± 4 K"
wet_bulb = "{} °C"
"""
    values = draws(opened(tmp_path, outdoors, WALL, site.format(29)), 300, 1).values
    np.testing.assert_allclose(values["site.dry_bulb"] - values["site.wet_bulb"], 1.0)
    values = draws(opened(tmp_path, outdoors, WALL, site.format("29.5 °C ± 2 K").replace(' °C"', '"')), 300, 1).values
    assert np.all(values["site.wet_bulb"] <= values["site.dry_bulb"])


def test_films_and_heats_with_a_spread_of_their_own_keep_it(tmp_path: Path) -> None:
    lots = LOTS.replace('stored = "300 kg"', 'stored = "300 kg"\nair_film = "8 W/m²K ± 1 W/m²K"')
    made = draws(opened(tmp_path, HEAD, WALL, SHED, lots), 400, 1)
    alone = made.values["lots.peas.air_film"] * made.films
    np.testing.assert_allclose(alone[1:].std(), 1.0 / 1.96, rtol=0.02)
    assert np.corrcoef(alone[1:], made.films[1:])[0, 1] == pytest.approx(0.0, abs=0.15)


def test_a_spread_that_nothing_takes_up_is_told(tmp_path: Path) -> None:
    lots = LOTS + 'limits = [{ above = "-12 °C ± 1 K", where = "mean", minutes = "30 ± 10 min" }]\n'
    found = opened(tmp_path, HEAD, WALL, SHED, lots)
    made = draws(found, 10, 1)
    assert "lots.peas.limits[1].above" in made.values
    assert left_out(found) == ("lots.peas.limits[1].minutes",)


@pytest.mark.parametrize("file", sorted((ROOT / "projects").glob("*.toml")), ids=lambda file: file.stem)
def test_every_example_is_drawn_within_its_fields(file: Path) -> None:
    found = store.open(str(file))
    made = draws(found, 200, 1)
    assert {"spreads.enthalpy", "spreads.films"} <= {column.key for column in made.columns} or not found.lots
    project = made.part(1, 201)
    assert any(np.size(value) == 201 for value in numeric_paths(project).values())
    for path, values in made.values.items():
        field = inputs.declaration(path)
        assert np.all(np.isfinite(values)), path
        if field is not None and field.low is not None and field.high is not None:
            assert values.min() >= field.low - 1e-12 and values.max() <= field.high + 1e-12, path
    assert ENTHALPY not in made.values and FILMS not in made.values
    assert len({column.key for column in columns(found)}) == len(columns(found))
