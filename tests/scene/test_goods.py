"""A lot as goods: which curve it gets, and what it gives off."""

from __future__ import annotations

from typing import Any

import numpy as np
import pytest

from coldbox.errors import BadProject, OutOfValidity
from coldbox.physics import food, respiration
from coldbox.project.model import Composition, Lot, RespirationPoint
from coldbox.scene.goods import goods
from coldbox.tables import load

PARTS = ("water", "protein", "fat", "carbohydrate", "fibre", "ash")
BEEF = Composition(water=0.5821, protein=0.1748, fat=0.2349, carbohydrate=0.0, fibre=0.0, ash=0.0082)
CHOCOLATE = Composition(water=0.013, protein=0.069, fat=0.307, carbohydrate=0.592, fibre=0.034, ash=0.019)
POINTS = (RespirationPoint(at_c=0.0, w_per_kg=0.05), RespirationPoint(at_c=20.0, w_per_kg=0.4))


def lot(**changes: Any) -> Lot:
    given: dict[str, Any] = {
        "name": "goods", "product": None, "composition": None, "respiration": (), "transpiration": 0.0,
        "freezing_point": None, "specific_heat_above": None, "specific_heat_below": None, "latent_heat": None,
        "conductivity": None, "density": None, "safe_above_c": None, "stored": 100.0, "arrives": 0.0,
        "arrival_time": 8.0, "arrival_temperature": None, "pulldown": 86400.0, "chilling_factor": 0.7,
        "start_temperature": None, "packaging": "none", "packaging_mass": 0.0, "piece": (0.4, 0.3, 0.3),
        "pieces": None, "exposed": ("top",), "shape": None, "half_thickness": None, "air_film": 6.0, "wrap": 0.0,
        "limits": (),
    }  # fmt: skip
    return Lot(**{**given, **changes})


def of_the_table(name: str) -> Lot:
    row = load.row("foods", name)
    quoted = {key: row.get(key) for key in ("specific_heat_above", "specific_heat_below", "latent_heat", "density")}
    return lot(
        name=name,
        composition=Composition(**{part: row[part] for part in PARTS}),
        freezing_point=row.get("freezing_point_c"),
        respiration=tuple(RespirationPoint(at_c=at, w_per_kg=heat) for at, heat in row["respiration"]),
        **quoted,
    )


def test_by_composition_it_is_chen() -> None:
    beef = goods(lot(composition=BEEF, freezing_point=-1.7))
    assert (beef.method, beef.source) == ("Chen enthalpy", "chen-1985")
    heat = 150.0 * (beef.enthalpy(10.0) - beef.enthalpy(-20.0))
    assert heat / 1e6 == pytest.approx(34.737, abs=0.001)  # as in the handbook's example
    assert beef.ice_fraction(-20.0) == food.ice_fraction(-20.0, water=0.5821, protein=0.1748, freezing_point_c=-1.7)
    assert not beef.lives
    assert beef.respiration_w_per_kg(5.0) == 0.0


def test_a_quoted_specific_heat_above_replaces_only_that_part() -> None:
    plain = goods(lot(composition=BEEF, freezing_point=-1.7))
    quoted = goods(lot(composition=BEEF, freezing_point=-1.7, specific_heat_above=3500.0))
    assert quoted.enthalpy(-10.0) == plain.enthalpy(-10.0)
    assert quoted.enthalpy(8.3) - quoted.enthalpy(-1.7) == pytest.approx(35_000.0)


def test_quoted_figures_win() -> None:
    dressing = lot(
        specific_heat_above=3400.0, specific_heat_below=1900.0, latent_heat=210e3, freezing_point=-3.0, composition=BEEF
    )
    found = goods(dressing)
    assert found.method == "quoted heats"
    assert found.enthalpy(7.0) - found.enthalpy(-13.0) == pytest.approx(34e3 + 210e3 + 19e3)
    assert found.ice_fraction(np.array([5.0, -10.0])) == pytest.approx([0.0, 210e3 / 333.6e3])


def test_what_is_not_quoted_comes_from_the_composition() -> None:
    found = goods(lot(composition=BEEF, freezing_point=-1.7, latent_heat=200e3))
    below = 840.0 + 1260.0 * 0.5821
    assert found.heat_capacity(-20.0) == pytest.approx(below)
    assert found.heat_capacity(10.0) == pytest.approx(food.chen_unfrozen_specific_heat(0.5821))


def test_dry_goods_never_freeze() -> None:
    found = goods(lot(composition=CHOCOLATE))
    assert found.source == "choi-okos-1986"
    assert found.enthalpy(20.0) - found.enthalpy(-30.0) == pytest.approx(50.0 * found.heat_capacity(0.0))
    assert 1500 < found.heat_capacity(0.0) < 1900
    assert found.ice_fraction(-20.0) == 0.0


@pytest.mark.parametrize(
    "known",
    [{"composition": BEEF}, {"specific_heat_above": 3500.0}, {"specific_heat_above": 3500.0, "latent_heat": 2e5}],
)
def test_wet_goods_of_unknown_freezing_point_are_refused_below_zero(known: dict[str, Any]) -> None:
    found = goods(lot(**known))
    assert found.enthalpy(10.0) > found.enthalpy(0.0)
    with pytest.raises(OutOfValidity):
        found.enthalpy(np.array([5.0, -1.0]))


def test_a_latent_heat_of_nothing_says_it_never_freezes() -> None:
    found = goods(lot(specific_heat_above=2000.0, latent_heat=0.0))
    assert found.enthalpy(10.0) - found.enthalpy(-20.0) == pytest.approx(60e3)


def test_one_specific_heat_holds_on_its_own_side_of_freezing() -> None:
    above = goods(lot(specific_heat_above=3500.0, freezing_point=-2.0))
    assert above.enthalpy(8.0) - above.enthalpy(-2.0) == pytest.approx(35e3)
    below = goods(lot(specific_heat_below=1800.0, freezing_point=-2.0))
    assert below.enthalpy(-2.0) - below.enthalpy(-12.0) == pytest.approx(18e3)
    for found, at in ((above, -2.1), (below, -1.9)):
        with pytest.raises(OutOfValidity):
            found.enthalpy(at)


def test_nothing_known_is_said_in_words() -> None:
    with pytest.raises(BadProject, match=r"lots\.goods"):
        goods(lot())


def test_living_goods_give_off_heat_until_they_freeze() -> None:
    salad = goods(lot(composition=BEEF, freezing_point=-0.3, respiration=POINTS))
    assert salad.lives
    found = salad.respiration_w_per_kg(np.array([-20.0, -0.31, 0.0, 10.0, 20.0]))
    assert found[:2] == pytest.approx([0.0, 0.0])
    assert found[2:] == pytest.approx(respiration.heat([0.0, 20.0], [0.05, 0.4], np.array([0.0, 10.0, 20.0])))
    assert salad.respiration_w_per_kg(-18.0) == 0.0
    assert goods(lot(specific_heat_above=4000.0, respiration=POINTS)).respiration_w_per_kg(20.0) == pytest.approx(0.4)


def test_draws_go_through_with_the_hours_last() -> None:
    rng = np.random.default_rng(3)
    water = rng.normal(0.75, 0.02, (40, 1))
    parts = BEEF.replace(water=water, fat=1.0 - water - BEEF.protein - BEEF.ash)
    points = tuple(point.replace(w_per_kg=point.w_per_kg * rng.normal(1.0, 0.1, (40, 1))) for point in POINTS)
    found = goods(lot(composition=parts, freezing_point=rng.normal(-1.7, 0.2, (40, 1)), respiration=points))
    hours = np.linspace(-10.0, 20.0, 24)
    assert np.shape(found.enthalpy(hours)) == (40, 24)
    assert np.shape(found.respiration_w_per_kg(hours)) == (40, 24)
    assert np.shape(found.conductivity(hours)) == (40, 24)


def test_quoted_conductivity_and_density_win() -> None:
    found = goods(lot(composition=BEEF, freezing_point=-1.7, conductivity=0.5, density=900.0))
    assert found.conductivity(5.0) == 0.5
    assert found.density(np.array([5.0, 6.0])) == pytest.approx([900.0, 900.0])
    unknown = goods(lot(specific_heat_above=3000.0))
    assert unknown.conductivity(5.0) is None
    assert unknown.density(5.0) is None


@pytest.mark.parametrize("name", load.names("foods"))
def test_every_row_of_the_table_makes_goods(name: str) -> None:
    found = goods(of_the_table(name))
    at = np.linspace(-39.0, 45.0, 169)
    heat = found.enthalpy(at)
    assert np.all(np.diff(heat) > 0.0)
    np.testing.assert_allclose(found.temperature(heat), at, atol=1e-8)
    assert np.all(found.heat_capacity(at) > 400.0)
    conductivity, density = found.conductivity(at), found.density(at)
    assert conductivity is not None and density is not None
    assert np.all((conductivity > 0.05) & (conductivity < 2.7))
    assert np.all((density > 100.0) & (density < 1600.0))
    if found.lives:
        assert np.all(np.diff(found.respiration_w_per_kg(np.linspace(-5.0, 30.0, 36))) > -1e-12)


def test_samples_in_water_stand_dry_ice() -> None:
    """A parcel with dry ice goes down to -78.5 °C."""
    water = goods(of_the_table("water"))
    assert water.enthalpy(5.0) - water.enthalpy(-78.5) == pytest.approx(5 * 4190 + 333.6e3 + 78.5 * 2030)
