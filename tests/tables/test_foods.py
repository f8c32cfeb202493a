"""Plausibility of every row of goods, coolants and packaging; the printed table of vegetables to the digit."""

from __future__ import annotations

import math
from typing import Any

import pytest

from coldbox.physics import food
from coldbox.tables import load

PARTS = ("water", "protein", "fat", "carbohydrate", "fibre", "ash")
FOODS = load.rows("foods")
DRY = {name for name, row in FOODS.items() if "freezing_point_c" not in row}
# Sugar, salt, fat or alcohol hold the freezing point below -4 °C here.
LOW_FREEZING = {"cheddar", "Swiss cheese", "ice cream", "wine", "bread", "dough", "cake", "pizza", "bacon"}

# ASHRAE Handbook, Refrigeration, Table 3, read: water, protein, fat, carbohydrate, fibre, ash %, freezing point °C,
# specific heat above and below freezing kJ/kgK, latent heat kJ/kg.
PRINTED = {
    "artichokes": (84.94, 3.27, 0.15, 10.51, 5.40, 1.13, -1.2, 3.90, 2.02, 284),
    "asparagus": (92.40, 2.28, 0.20, 4.54, 2.10, 0.57, -0.6, 4.03, 1.79, 309),
    "beans, snap": (90.27, 1.82, 0.12, 7.14, 3.40, 0.66, -0.7, 3.99, 1.85, 302),
    "beans, lima": (70.24, 6.84, 0.86, 20.16, 4.90, 1.89, -0.6, 3.52, 2.07, 235),
    "beets": (87.58, 1.61, 0.17, 9.56, 2.80, 1.08, -1.1, 3.91, 1.94, 293),
    "broccoli": (90.69, 2.98, 0.35, 5.24, 3.00, 0.92, -0.6, 4.01, 1.82, 303),
    "Brussels sprouts": (86.00, 3.38, 0.30, 8.96, 3.80, 1.37, -0.8, 3.90, 1.91, 287),
    "cabbage": (92.15, 1.44, 0.27, 5.43, 2.30, 0.71, -0.9, 4.02, 1.85, 308),
    "carrots": (87.79, 1.03, 0.19, 10.14, 3.00, 0.87, -1.4, 3.92, 2.00, 293),
    "cauliflower": (91.91, 1.98, 0.21, 5.20, 2.50, 0.71, -0.8, 4.02, 1.84, 307),
    "celeriac": (88.00, 1.50, 0.30, 9.20, 1.80, 1.00, -0.9, 3.90, 1.89, 294),
    "celery": (94.64, 0.75, 0.14, 3.65, 1.70, 0.82, -0.5, 4.07, 1.74, 316),
    "collards": (90.55, 1.57, 0.22, 7.11, 3.60, 0.55, -0.8, 4.01, 1.86, 302),
    "sweet corn": (75.96, 3.22, 1.18, 19.02, 2.70, 0.62, -0.6, 3.62, 1.98, 254),
    "cucumbers": (96.01, 0.69, 0.13, 2.76, 0.80, 0.41, -0.5, 4.09, 1.71, 321),
    "eggplant": (92.03, 1.02, 0.18, 6.07, 2.50, 0.71, -0.8, 4.02, 1.83, 307),
    "endive": (93.79, 1.25, 0.20, 3.35, 3.10, 1.41, -0.1, 4.07, 1.69, 313),
    "garlic": (58.58, 6.36, 0.50, 33.07, 2.10, 1.50, -0.8, 3.17, 2.19, 196),
    "horseradish": (78.66, 9.40, 1.40, 8.28, 2.00, 2.26, -1.8, 3.70, 2.12, 263),
    "kale": (84.46, 3.30, 0.70, 10.01, 2.00, 1.53, -0.5, 3.82, 1.86, 282),
    "kohlrabi": (91.00, 1.70, 0.10, 6.20, 3.60, 1.00, -1.0, 4.02, 1.90, 304),
    "leeks": (83.00, 1.50, 0.30, 14.15, 1.80, 1.05, -0.7, 3.77, 1.91, 277),
    "lettuce": (95.89, 1.01, 0.19, 2.09, 1.40, 0.48, -0.2, 4.09, 1.65, 320),
}
# Specific heats above freezing of the same table, from memory, kJ/kgK.
REMEMBERED = {
    "apples": 3.81, "bananas": 3.56, "grapes": 3.71, "oranges": 3.81, "pears": 3.80, "strawberries": 4.00,
    "potatoes": 3.67, "onions": 3.95, "tomatoes": 4.08, "garden peas": 3.75, "cod": 3.78, "salmon": 3.68,
    "milk": 3.89, "cheddar": 2.77, "butter": 2.40, "ice cream": 3.22, "eggs": 3.63, "beef carcass": 3.24, "lamb": 3.60,
    "chocolate": 1.83, "cream": 3.25,
}  # fmt: skip


def composition(row: Any) -> dict[str, float]:
    return {part: row[part] for part in PARTS}


def test_there_are_enough_goods() -> None:
    others = [name for name, row in FOODS.items() if row.get("not_food")]
    assert len(FOODS) - len(others) >= 70
    assert len(others) >= 10


@pytest.mark.parametrize("name", FOODS)
def test_a_row_is_plausible(name: str) -> None:
    row = FOODS[name]
    assert sum(row[part] for part in PARTS) - row["fibre"] == pytest.approx(1.0, abs=0.01)
    assert row["fibre"] <= row["carbohydrate"]
    assert 0.5 <= row["chilling_factor"] <= 1.0
    if name not in DRY and name not in LOW_FREEZING:
        assert -4.0 <= row["freezing_point_c"] <= 0.0
    freezes = row.get("freezing_point_c", -math.inf)
    alive = bool(row["respiration"])
    if alive:
        assert row["store_at_c"] > freezes
        assert row["store_at_c"] >= row.get("safe_above_c", -math.inf)
    heats = [heat for _, heat in row["respiration"]]
    assert heats == sorted(heats)
    assert not heats or (len(heats) >= 2 and 0.003 < heats[0] < 0.3 and heats[-1] < 1.3)
    for limit in row["limit"]:  # kept as it should be, it never spoils
        assert row["store_at_c"] <= limit.get("above", math.inf)
        assert row["store_at_c"] >= limit.get("below", -math.inf)
        if alive and "below" in limit:
            assert limit["below"] == row.get("safe_above_c", freezes)


@pytest.mark.parametrize("name", sorted(set(FOODS) - DRY - {"water", "ice", "butter"}))
def test_the_enthalpy_of_a_row_is_near_what_the_trade_adds_up(name: str) -> None:
    """Chen against 334 kJ per kg of ice and Earle's specific heats, 10 to -30 °C. (Earle's are not for butter.)"""
    row = FOODS[name]
    point = row["freezing_point_c"]
    above = food.unfrozen_specific_heat(**composition(row))
    known = {"water": row["water"], "protein": row["protein"], "freezing_point_c": point}
    chen = food.enthalpy(10.0, **known, specific_heat_above=above) - food.enthalpy(-30.0, **known)
    trade = above * (10.0 - point) + food.latent_heat(food.ice_fraction(-30.0, **known))
    trade += food.frozen_specific_heat(row["water"]) * (point + 30.0)
    assert chen == pytest.approx(trade, rel=0.08 if row["water"] > 0.5 else 0.25)


def test_butter_by_its_printed_figures() -> None:
    """2.40 and 2.65 kJ/kgK, 60 kJ/kg (Table 3, from memory): most of its heat is that of fat."""
    row = FOODS["butter"]
    known = {"water": row["water"], "protein": row["protein"], "freezing_point_c": row["freezing_point_c"]}
    above = food.unfrozen_specific_heat(**composition(row))
    chen = food.enthalpy(10.0, **known, specific_heat_above=above) - food.enthalpy(-30.0, **known)
    assert chen / 1000 == pytest.approx(2.40 * 10.6 + 60 + 2.65 * 29.4, rel=0.05)


@pytest.mark.parametrize("name", PRINTED)
def test_the_printed_vegetables_are_as_printed(name: str) -> None:
    *shares, point, above, below, latent = PRINTED[name]
    row = FOODS[name]
    assert [100 * row[part] for part in PARTS] == pytest.approx(shares, abs=1e-9)
    assert row["freezing_point_c"] == point
    assert food.latent_heat(row["water"]) / 1000 == pytest.approx(latent, abs=0.6)
    assert food.unfrozen_specific_heat(**composition(row)) / 1000 == pytest.approx(above, rel=0.03)
    if name != "endive":  # at -0.1 °C the handbook's own formula gives less than ice alone
        low = food.apparent_heat_capacity(
            -40.0, water=row["water"], protein=row["protein"], freezing_point_c=row["freezing_point_c"]
        )
        assert low / 1000 == pytest.approx(below, rel=0.15)


@pytest.mark.parametrize("name", REMEMBERED)
def test_remembered_specific_heats(name: str) -> None:
    assert food.unfrozen_specific_heat(**composition(FOODS[name])) / 1000 == pytest.approx(REMEMBERED[name], rel=0.1)


def test_names_as_people_type_them() -> None:
    for typed, name in {"peas": "green peas", "fish, lean": "cod", "potato": "potatoes", "beetroot": "beets"}.items():
        assert load.row("foods", typed) is load.row("foods", name)


def test_no_name_is_used_twice() -> None:
    names = list(FOODS) + [other for row in FOODS.values() for other in row.get("also", ())]
    assert len(names) == len(set(names))


def test_what_is_frozen_does_not_live_and_is_kept_frozen() -> None:
    for row in FOODS.values():
        if row["group"] == "frozen":
            assert row["store_at_c"] <= -18.0
            assert not row["respiration"]
            assert "safe_above_c" not in row


def test_coolants_are_plausible() -> None:
    for name, row in load.rows("packs").items():
        assert row["melts_from"] <= row["melts_to"], name
        # None beats water, but what turns into gas.
        assert 1.5e5 < row["latent_heat"] <= (6e5 if row.get("sublimes") else 333_600.0), name
        if not row.get("sublimes") and "paraffin" not in name:
            assert row["specific_heat_frozen"] < row["specific_heat_melted"] <= 4190.0, name


def test_dry_ice_gas_is_carbon_dioxide() -> None:
    from CoolProp.CoolProp import PropsSI

    row = load.row("packs", "dry ice")
    means = [PropsSI("Cpmass", "T", at, "P", 101325.0, "CO2") for at in (220.0, 245.0, 270.0)]
    assert row["specific_heat_melted"] == pytest.approx(sum(means) / 3, rel=0.01)


def test_paraffin_melts_where_its_pure_substance_does() -> None:
    for name, melting_k in {"paraffin 5": 279.0, "paraffin 18": 291.3}.items():  # triple points, from memory
        row = load.row("packs", name)
        assert row["melts_from"] - 0.1 <= melting_k - 273.15 <= row["melts_to"] + 0.1


def test_every_packaging_of_a_lot_has_a_row() -> None:
    for word in ("cardboard", "wood", "plastic", "glass", "steel"):
        assert 400 < load.row("packaging", word)["specific_heat"] < 2200
