"""Entries of whole boxes computed by hand from the published methods, in plain arithmetic that knows nothing of ours.

Every figure a case starts from is written out: sizes and schedules out of the example's file, properties out of the
table it cites. The arithmetic stands beside the case with its source. Moist air is taken by Buck's saturation curve
instead of that of Hyland and Wexler, and conduction through the day as steady: so the cases agree within a per cent or
two, the rest within rounding.
"""

from __future__ import annotations

from functools import cache
from math import asin, cos, exp, log, pi, radians, sin, sqrt
from pathlib import Path

import pytest

from coldbox.account.entry import Entry, Load
from coldbox.account.load import load
from coldbox.project import store

ROOT = Path(__file__).parents[2]
BOXES = Path(__file__).parent / "boxes"


@cache
def account(name: str) -> Load:
    folder = BOXES if (BOXES / f"{name}.toml").exists() else ROOT / "projects"
    return load(store.open(str(folder / f"{name}.toml"), {}))


def entry(box: str, name: str) -> Entry:
    return next(one for one in account(box).entries if one.id == name)


def mean_w(box: str, name: str) -> float:
    return float(entry(box, name).hours_w.mean())


# Moist air: Buck 1981 (as revised in 1996) for saturation, the gas law, and h = 1.006 t + W (2501 + 1.86 t) kJ/kg.


def saturation(t: float) -> float:
    if t >= 0.0:
        return 611.21 * exp((18.678 - t / 234.5) * t / (257.14 + t))
    return 611.15 * exp((23.036 - t / 333.7) * t / (279.82 + t))


def water(t: float, share: float, p: float = 101325.0) -> float:
    vapour = share * saturation(t)
    return 0.622 * vapour / (p - vapour)


def enthalpy(t: float, w: float) -> float:
    return 1006.0 * t + w * (2.501e6 + 1860.0 * t)


def density(t: float, w: float, p: float = 101325.0) -> float:
    """kg of dry air and its water in a m³."""
    return p / (287.05 * (t + 273.15)) * (1.0 + w) / (1.0 + w / 0.622)


def ice_too(t_room: float) -> float:
    """What a kg of water gives up beyond condensing when it ends as ice of the room's temperature."""
    return 333.4e3 - 2100.0 * t_room if t_room < 0.0 else 0.0


def doorway_w(width: float, height: float, behind: tuple[float, float], room: tuple[float, float], p: float) -> float:
    """Watts through a fully open doorway, by W. B. Gosney and H. A.-L. Olama 1975, as ASHRAE Refrigeration prints it.

    q = 0.221 A (h_i - h_r) ρ_r (1 - ρ_i / ρ_r)^0.5 (g H)^0.5 F_m, F_m = (2 / (1 + (ρ_r / ρ_i)^(1/3)))^1.5
    behind, room: °C and humidity ratio.
    """
    inside, outside = density(*room, p), density(*behind, p)
    mixed = (2.0 / (1.0 + (inside / outside) ** (1.0 / 3.0))) ** 1.5
    difference = enthalpy(*behind) - enthalpy(*room) + (behind[1] - room[1]) * ice_too(room[0])
    speed = sqrt(1.0 - outside / inside) * sqrt(9.81 * height)
    return 0.221 * width * height * difference * inside * speed * mixed


def wall_ua(
    inside: float, outside: float, edges: float, thickness: float, r: float, r_in: float, r_out: float
) -> float:
    """W/K by textbook conduction shape factors: the layers on the inside area with half of each edge (0.54 of its
    length) and a third of each corner (0.15 of the thickness); each film on its own area."""
    layers = inside + 0.5 * 0.54 * thickness * edges + 0.15 * thickness**2 * 4 / 3
    return 1.0 / (r_in / inside + r / layers + r_out / outside)


# --- walls between rooms


def test_a_wall_of_the_cookhouse_cooler_in_inches_and_fahrenheit() -> None:
    # Right wall 10 ft by 7 ft 6 in, 4.04 in thick in all, R-7.2 an inch as the maker quotes it (so no correction for
    # temperature), 84 °F against 36 °F, films 0.13 m²K/W = 0.738 h ft² °F/Btu on both sides, joints 0.003 W/mK.
    foot = 0.3048
    length, height, thick = 10 * foot, 7.5 * foot, 4.04 * 0.0254
    r = 28.8 * 0.1761
    ua = wall_ua(
        length * height, (length + 2 * thick) * (height + 2 * thick), 2 * (length + height), thick, r, 0.13, 0.13
    ) + 0.003 * 2 * (length + height)
    assert mean_w("cookhouse-cooler", "right") == pytest.approx(ua * 48 / 1.8, rel=0.005)


def test_a_ceiling_of_the_freezing_room_with_its_foam_at_its_mean_temperature() -> None:
    # 4 m by 4 m, 148.8 mm PIR at 0.023 W/mK declared at 10 °C, exp(0.0055 (t - 10)) (ISO 10456), t = (32 - 25) / 2;
    # heat flows down: 0.17 m²K/W on both sides (ISO 6946).
    r = 0.1488 / (0.023 * exp(0.0055 * (3.5 - 10.0)))
    ua = wall_ua(16.0, 4.3 * 4.3, 16.0, 0.15, r, 0.17, 0.17)
    assert mean_w("block-house-freezing", "ceiling") == pytest.approx(ua * 57.0, rel=0.005)


def test_a_wall_to_a_colder_room_takes_heat_out() -> None:
    # The meat room's wall to the freezing room: 6 m by 3.6 m, 148.8 mm PIR at a mean of (1 - 25) / 2 °C.
    r = 0.1488 / (0.023 * exp(0.0055 * (-12.0 - 10.0)))
    ua = wall_ua(21.6, 6.2 * 3.95, 19.2, 0.15, r, 0.13, 0.13)
    assert mean_w("block-house-meat", "left") == pytest.approx(ua * -26.0, rel=0.005)


def test_a_parcel_has_thick_edges() -> None:
    # 320 x 320 x 280 mm, 60 mm EPS 0.034 W/mK as typed and 5 mm board of 0.065 W/mK, -70 °C in 26 °C: the whole box.
    # S = A / t + 0.54 · 4 (l + w + h) + 0.15 · 8 t, with k = t / R (Holman, table 3-1); films on their areas.
    r = 0.06 / 0.034 + 0.005 / 0.065
    faces = {"front": (0.32, 0.28, 0.13), "ceiling": (0.32, 0.32, 0.17), "floor": (0.32, 0.32, 0.10)}
    for name, (wide, high, film) in faces.items():
        outside = (wide + 0.13) * (high + 0.13)
        ua = wall_ua(wide * high, outside, 2 * (wide + high), 0.065, r, film, film)
        assert mean_w("weekend-parcel", name) == pytest.approx(ua * 96.0, rel=0.01)


# --- floors


def slab_w(
    area: float, edge: float, r: float, soil: tuple[float, float], room: float, year: tuple[float, float], month: int
) -> float:
    """ISO 13370: slab on ground, U by its two branches, and the year's wave without edge insulation; walls 0.3 m.

    soil: λ and ρc. year: mean and half the swing of the monthly means, °C and K; July is the warmest month.
    """
    size = area / (0.5 * edge)
    thick = 0.3 + soil[0] * (0.10 + r + 0.04)
    if thick < size:
        u = 2 * soil[0] / (pi * size + thick) * log(pi * size / thick + 1)
    else:
        u = soil[0] / (0.457 * size + thick)
    depth = sqrt(3.15e7 * soil[0] / (pi * soil[1]))
    wave = 0.37 * edge * soil[0] * log(depth / thick + 1)
    lag = 1.5 - 0.42 * log(depth / (thick + 1))
    return u * area * (year[0] - room) + wave * year[1] * cos(2 * pi * (month - 7 - lag) / 12)


def test_the_slab_of_the_long_quay_freezer() -> None:
    # 6 x 5 m, 160 mm XPS of 0.034 W/mK at 10 °C, here between the room's -20 °C and the 7 °C of the ground, 150 mm
    # concrete of 1.65 below and 120 mm reinforced of 2.3 above it; sand: 2.0 W/mK, 2 MJ/m³K; Halifax: 7.0 °C and
    # 12.5 K; August. The heater idles.
    foam = 0.16 / (0.034 * exp(0.0045 * (-6.5 - 10.0)))
    heat = slab_w(30.0, 22.0, foam + 0.15 / 1.65 + 0.12 / 2.3, (2.0, 2.0e6), -20.0, (7.0, 12.5), 8)
    assert mean_w("long-quay-freezer", "floor") == pytest.approx(heat, rel=0.01)


def test_the_slab_of_the_desert_store() -> None:
    # 10 x 8 m, 160 mm of foam at 0.034 W/mK as typed, 120 mm concrete of 1.65; clay: 1.5 W/mK, 3 MJ/m³K; July.
    heat = slab_w(80.0, 36.0, 0.16 / 0.034 + 0.12 / 1.65, (1.5, 3.0e6), -25.0, (24.0, 11.0), 7)
    assert mean_w("desert-store", "floor") == pytest.approx(heat, rel=0.001)


def test_a_slab_of_which_one_side_alone_meets_the_outdoors() -> None:
    # Greens hall: an L of 7 x 8 m less 2 x 2.5 m, 7 m of it exposed; 80 mm XPS at 0.034 W/mK near 3 °C, 120 mm
    # concrete of 1.65, 70 mm screed of 1.4; clay. The 5 % allowance lies beside the layers, not beside the ground.
    layers = 0.08 / (0.034 * exp(0.0045 * (3.4 - 10.0))) + 0.12 / 1.65 + 0.07 / 1.4
    heat = slab_w(51.0, 7.0, layers / 1.05, (1.5, 3.0e6), 2.0, (7.0, 12.5), 8)
    assert mean_w("greens-hall", "floor") == pytest.approx(heat, rel=0.02)


# --- sun, sky and the outside surface

# ASHRAE Fundamentals 1997, chapter 28, table 2: share of the daily range by which each hour lies below the highest.
BELOW = (82, 87, 92, 96, 99, 100, 98, 93, 84, 71, 56, 39, 23, 11, 3, 0, 3, 10, 21, 34, 47, 58, 68, 76)


def air_c(sun_hour: float, highest: float, swing: float) -> float:
    """Straight between the full hours."""
    first = int(sun_hour // 1) % 24
    rest = sun_hour - sun_hour // 1
    return highest - swing * ((1 - rest) * BELOW[first] + rest * BELOW[(first + 1) % 24]) / 100


def sun_on_a_roof(day: int, latitude: float, sun_hour: float, tau_b: float, tau_d: float) -> float:
    """W/m² on a horizontal plane: Cooper's declination, ASHRAE's clear sky (2013), air mass of Kasten and Young."""
    declination = radians(23.45 * sin(2 * pi * (284 + day) / 365))
    where = radians(latitude)
    sine = sin(where) * sin(declination) + cos(where) * cos(declination) * cos(radians(15 * (sun_hour - 12)))
    if sine <= 0.0:
        return 0.0
    mass = 1 / (sine + 0.50572 * (6.07995 + asin(sine) * 180 / pi) ** -1.6364)
    beyond = 1367 * (1 + 0.033 * cos(2 * pi * (day - 3) / 365))
    ab = 1.454 - 0.406 * tau_b - 0.268 * tau_d + 0.021 * tau_b * tau_d
    ad = 0.507 + 0.205 * tau_b - 0.080 * tau_d - 0.190 * tau_b * tau_d
    return beyond * (exp(-tau_b * mass**ab) * sine + exp(-tau_d * mass**ad))


def dew_point(w: float, p: float) -> float:
    low, high = -60.0, 60.0
    for _ in range(60):
        middle = 0.5 * (low + high)
        low, high = (middle, high) if saturation(middle) < p * w / (0.622 + w) else (low, middle)
    return low


def roof_surface_c(sun: float, air: float, sky: float, absorbs: float, wind: float, u: float, room: float) -> float:
    """°C where absorbed sun, the sky, the wind (4 + 4 v, ISO 6946) and what goes through the panel balance; by halving.

    Long-wave emissivity 0.9. The panel is taken as without mass: 150 mm of foam lags by less than an hour.
    """
    low, high = -40.0, 140.0
    for _ in range(60):
        t = 0.5 * (low + high)
        gains = absorbs * sun + EMITS * 5.6704e-8 * ((sky + 273.15) ** 4 - (t + 273.15) ** 4)
        gains += (4 + 4 * wind) * (air - t) - u * (t - room)
        low, high = (t, high) if gains > 0 else (low, t)
    return low


EMITS = 0.92  # dark paint


def test_the_dark_roof_of_the_desert_store() -> None:
    # 21 July, day 202, at 33.4° north and 112° west; clock UTC-7, so mean sun time is 28 minutes behind it, and the
    # equation of time takes another 6.4. 340 m up: 97.3 kPa. Air 43 °C at 10 %, falling by 12 K; Berdahl and Martin's
    # clear sky. Roof 10 x 8 m, dark: absorbs 0.90; 150 mm foam of 0.022 W/mK; R_si 0.17 m²K/W.
    day, p = 202, 97300.0
    dew = dew_point(water(43.0, 0.10, p), p)
    r = 0.15 / 0.022
    layers = 80.0 + 0.5 * 0.54 * 0.15 * 36 + 0.15 * 0.15**2 * 4 / 3
    through = 1.0 / (0.17 / 80.0 + r / layers)  # W/K from the outside surface to the room
    u = through / (10.3 * 8.3)
    dark, lit = [], []
    for tenth in range(240):
        mean_sun = tenth / 10 + 0.05 - 28 / 60
        air = air_c(mean_sun % 24, 43.0, 12.0)
        clear = 0.711 + 0.56 * dew / 100 + 0.73 * (dew / 100) ** 2 + 0.013 * cos(2 * pi * mean_sun / 24)
        clear += 0.00012 * (p / 100 - 1000)
        sky = (air + 273.15) * clear**0.25 - 273.15
        sun = sun_on_a_roof(day, 33.4, mean_sun - 6.4 / 60, 0.45, 2.1)
        dark.append(roof_surface_c(0.0, air, sky, 0.90, 3.0, u, -25.0))
        lit.append(roof_surface_c(sun, air, sky, 0.90, 3.0, u, -25.0))
    plain = through * (sum(dark) / 240 + 25.0)
    assert mean_w("desert-store", "ceiling") == pytest.approx(plain, rel=0.005)
    sunny = through * (sum(lit) - sum(dark)) / 240
    assert mean_w("desert-store", "sun.ceiling") == pytest.approx(sunny, rel=0.01)
    warmest = max(sum(lit[10 * hour : 10 * hour + 10]) / 10 for hour in range(24))
    told = next(one.value for one in entry("desert-store", "sun.ceiling").inputs if one.key == "peak_surface_c")
    assert float(told) == pytest.approx(warmest, abs=0.5)


# --- doors, air changes, fresh air


def test_the_kitchen_door_of_the_cookhouse_cooler() -> None:
    # 36 x 78 in; 36 °F and 85 % inside, 84 °F and 50 % behind. 24 an hour of 12 s, from 6 to 22 o'clock; flow factor
    # 0.8 for short openings; a strip curtain that still holds back 75 %.
    behind = (28.89, water(28.89, 0.5))
    room = (2.222, water(2.222, 0.85))
    q = doorway_w(0.9144, 1.9812, behind, room, 101325.0) * 24 * 12 / 3600 * 0.8 * 0.25
    hours = entry("cookhouse-cooler", "doors.kitchen door.traffic").hours_w
    assert hours[12] == pytest.approx(q, rel=0.01) and hours[3] == 0.0


def test_the_door_of_the_freezing_room_with_the_fusion_of_its_frost() -> None:
    # 0.9 x 2.0 m; -25 °C and 90 % over ice, 14 °C and 65 % behind, 35 m up: 100.9 kPa. 30 a day of 15 s within nine
    # hours, flow factor 0.8, strips 85 %.
    p = 100900.0
    behind, room = (14.0, water(14.0, 0.65, p)), (-25.0, water(-25.0, 0.90, p))
    q = doorway_w(0.9, 2.0, behind, room, p) * 30 * 15 / (9 * 3600) * 0.8 * 0.15
    assert float(entry("block-house-freezing", "doors.freezing door.traffic").hours_w[10]) == pytest.approx(q, rel=0.01)


def test_the_dock_door_of_the_desert_store_in_the_hottest_hour() -> None:
    # 2.4 x 3 m, 10 an hour of 30 s, flow factor 0.8, nothing hangs in it. Clock hour 15-16 is 14:32-15:32 sun time: the
    # profile's top, 0.2 K below 43 °C in the mean; the water is that of 43 °C and 10 %.
    p = 97300.0
    air = sum(air_c(14.53 + (i + 0.5) / 20, 43.0, 12.0) for i in range(20)) / 20
    behind, room = (air, water(43.0, 0.10, p)), (-25.0, water(-25.0, 0.85, p))
    q = doorway_w(2.4, 3.0, behind, room, p) * 10 * 30 / 3600 * 0.8
    assert float(entry("desert-store", "doors.dock.traffic").hours_w[15]) == pytest.approx(q, rel=0.01)


def test_air_changes_of_the_cider_cellar_by_the_table() -> None:
    # 50 m³: between 14.0 changes at 42.48 and 12.0 at 56.63 m³ (1500 and 2000 ft³, above 0 °C), straight on
    # logarithmic axes; long storage 0.6. 10 °C and 75 % inside, 30 °C and 50 % outside.
    along = log(50.0 / 42.48) / log(56.63 / 42.48)
    changes = 0.6 * exp(log(14.0) + along * log(12.0 / 14.0))
    room, behind = (10.0, water(10.0, 0.75)), (30.0, water(30.0, 0.5))
    dry = density(*room) / (1 + room[1])
    q = changes * 50.0 / 86400 * dry * (enthalpy(*behind) - enthalpy(*room))
    assert mean_w("cider-cellar", "air_change") == pytest.approx(q, rel=0.01)


def test_fresh_air_of_the_cider_cellar_less_what_is_recovered() -> None:
    # 60 m³/h of outside air for two hours, 40 % of the enthalpy difference given back.
    room, behind = (10.0, water(10.0, 0.75)), (30.0, water(30.0, 0.5))
    dry = density(*behind) / (1 + behind[1])
    q = 60 / 3600 * dry * (enthalpy(*behind) - enthalpy(*room)) * 0.6
    hours = entry("cider-cellar", "ventilation.fresh").hours_w
    assert hours[6] == pytest.approx(q, rel=0.01) and hours.sum() == pytest.approx(2 * q, rel=0.01)


# --- goods


def chen(t: float, x_w: float, protein: float, t_f: float) -> float:
    """J/kg below freezing, Chen 1985: (t + 40)(1.55 + 1.26 x_s + (x_w - x_b) 333.6 t_f / (40 t)), x_b = 0.4 protein."""
    return 1000 * (t + 40) * (1.55 + 1.26 * (1 - x_w) + (x_w - 0.4 * protein) * 333.6 * t_f / (40 * t))


def test_beef_that_is_frozen_in_the_freezing_room() -> None:
    # 600 kg a day of lean beef (73.1 % water, 23.2 % protein, 2.8 % fat, 1.1 % ash, freezes at -1.7 °C) from 4 to
    # -25 °C in 20 h. Above freezing by Choi and Okos near 0 °C: water 4.177, protein 2.008, fat 1.984 and ash 1.093
    # kJ/kgK. First hours: mean / 0.65.
    warm = (0.731 * 4.177 + 0.232 * 2.008 + 0.028 * 1.984 + 0.011 * 1.093) * 1000
    beef = (0.731, 0.232, -1.7)
    heat = 600 * (chen(-1.7, *beef) - chen(-25.0, *beef) + warm * 5.7)
    found = entry("block-house-freezing", "lots.boned beef.intake")
    assert found.daily_j == pytest.approx(heat, rel=0.01)
    assert found.hours_w[15:20] == pytest.approx([heat / (20 * 3600) / 0.65] * 5, rel=0.01)


def test_stock_pots_that_cool_in_the_cookhouse() -> None:
    # 200 lb of water from 70 to 36 °F at 4.19 kJ/kgK, and 30 lb of steel at 0.45, within 6 h.
    pots, steel = (entry("cookhouse-cooler", f"lots.stock pots.{name}").daily_j for name in ("intake", "packaging"))
    assert pots == pytest.approx(200 * 0.4536 * 4190 * 34 / 1.8, rel=0.001)
    assert steel == pytest.approx(30 * 0.4536 * 450 * 34 / 1.8, rel=0.001)


def test_what_breathes_in_the_greens_hall() -> None:
    # 2 500 kg of carrots at 2 °C: 44.6 mW/kg at 0 °C, 59.4 at 5 °C (USDA AH-66), by one factor per kelvin between.
    watts = 2500 * 0.0446 * (0.0594 / 0.0446) ** (2 / 5)
    assert mean_w("greens-hall", "lots.carrots.respiration") == pytest.approx(watts, rel=0.001)


def test_apples_that_breathe_while_they_cool() -> None:
    # 3 000 kg at 10 °C: 26.7 mW/kg (USDA AH-66). 400 kg from 22 °C within 16 h, f 0.67: the rate holds for 0.34 of the
    # time and then falls evenly; 44.6 mW/kg at 15 °C, 59.4 at 20 °C and on along that line.
    stored = 3000 * 0.0267
    parts = 1600
    cooling = 0.0
    for part in range(parts):
        passed = (part + 0.5) / parts
        late = max(passed - 0.34, 0.0)
        t = 10.0 + 12.0 * (1 - (passed - late**2 / 1.32) / 0.67)
        low, high, at = (0.0267, 0.0446, 10.0) if t < 15.0 else (0.0446, 0.0594, 15.0)
        cooling += 400 * low * (high / low) ** ((t - at) / 5) * 16 / 24 / parts
    assert mean_w("cider-cellar", "lots.apples.respiration") == pytest.approx(stored + cooling, rel=0.005)


# --- people, motors, fans, defrost, frost


def test_people_by_the_handbooks_line() -> None:
    # ASHRAE Refrigeration: 272 - 6 t each. Two at 10 °C for four hours; one at -25 °C for a tenth of nine.
    assert entry("cider-cellar", "people.people").daily_j / 3600 == pytest.approx(2 * (272 - 60) * 4)
    assert entry("block-house-freezing", "people.people").daily_j / 3600 == pytest.approx((272 + 150) * 0.9)


def test_a_pump_of_which_only_the_motor_stands_in_the_cellar() -> None:
    # 550 W drawn: between 1/3 hp (246 W at 0.56, 439 W drawn) and 1/2 hp (373 W at 0.60, 621 W drawn); two hours.
    losses = 550 * (1 - (0.56 + 0.04 * (550 - 439.5) / (621.5 - 439.5)))
    assert entry("cider-cellar", "motors.pump").daily_j / 3600 == pytest.approx(2 * losses, rel=0.002)


def test_fans_and_electric_defrost_of_the_long_quay_freezer() -> None:
    # Three of 160 W but for four times 25 min, when 5.4 kW of heaters run; half of their heat stays in the room.
    hours = 4 * 25 / 60
    assert mean_w("long-quay-freezer", "fans") == pytest.approx(480 * (24 - hours) / 24)
    assert mean_w("long-quay-freezer", "defrost") == pytest.approx(0.5 * 5400 * hours / 24)


def test_fans_blow_on_while_the_rooms_own_air_thaws_the_coil() -> None:
    # Off-cycle: the compressor stands still and the fans draw the room's air over the frost; without them it stays.
    assert mean_w("cookhouse-cooler", "fans") == pytest.approx(90.0)
    assert mean_w("quayside-display", "fans") == pytest.approx(114.0)


def test_frost_of_the_freezing_room_is_the_water_of_its_air_and_its_people() -> None:
    # Door as above, leakage 0.15 an hour of 57.6 m³ while it is shut, and a person of whose 422 W 15 % leave as
    # vapour, at 2.5 MJ/kg.
    p = 100900.0
    behind, room = (14.0, water(14.0, 0.65, p)), (-25.0, water(-25.0, 0.90, p))
    inside, outside = density(*room, p), density(*behind, p)
    flow = (
        0.221 * 1.8 * sqrt(1 - outside / inside) * sqrt(9.81 * 2.0) * (2 / (1 + (inside / outside) ** (1 / 3))) ** 1.5
    )
    day = flow * 30 * 15 * 0.8 * 0.15 + 0.15 * 57.6 * (24 - 30 * 15 / 3600)
    frost = day * inside * (behind[1] - room[1]) + 422 * 0.15 * 0.9 * 3600 / 2.5e6
    assert float(account("block-house-freezing").frost_kg_per_day) == pytest.approx(frost, rel=0.01)


# --- the capacity


def test_daily_heat_over_the_running_hours_or_the_peak_hour_whichever_is_more() -> None:
    # Trade practice: what counts of the day over 18 h (electric defrost) or 16 h (off-cycle), the peak hour without
    # defrost; 10 % on either. Entries below nought do not count.
    for name, hours in (("long-quay-freezer", 18), ("block-house-meat", 18), ("greens-hall", 16)):
        made = account(name)
        each = [[max(float(watt), 0.0) for watt in one.hours_w] for one in made.entries]
        thaw = [one.id == "defrost" for one in made.entries]
        daily = sum(map(sum, each)) / hours * 1.1
        peak = 1.1 * max(sum(one[hour] for one, off in zip(each, thaw, strict=True) if not off) for hour in range(24))
        assert float(made.required_capacity_w) == pytest.approx(max(daily, peak))
        assert made.governs == ("daily" if daily > peak else "peak")


def test_what_the_agreement_asks_of_the_truck() -> None:
    # ATP: 1.75 times K √(S_i S_e) at 30 °C outside and -20 °C inside; K 0.38; 4.6 x 2.1 x 2.1 m, walls of 85 mm.
    inside = 2 * (4.6 * 2.1 * 2 + 2.1 * 2.1)
    outside = 2 * (4.77 * 2.27 * 2 + 2.27 * 2.27)
    assert float(account("island-round").by_atp_w) == pytest.approx(1.75 * 0.38 * sqrt(inside * outside) * 50, rel=1e-6)
