"""The weather table holds together: what can be known about a place without its weather service."""

from __future__ import annotations

import numpy as np
import psychrolib
import pytest

from coldbox.tables import load

PLACES = load.rows("weather")
TROPIC = 23.5


def each(test):
    return pytest.mark.parametrize("name", PLACES)(test)


def test_there_are_places_on_every_continent():
    assert len(PLACES) >= 48
    latitude = np.array([row["latitude"] for row in PLACES.values()])
    longitude = np.array([row["longitude"] for row in PLACES.values()])
    boxes = {
        "Europe": (36, 72, -25, 45),
        "North America": (15, 72, -170, -52),
        "South America": (-56, 12, -82, -34),
        "Africa": (-35, 37, -18, 52),
        "Asia": (-10, 78, 45, 150),
        "Oceania": (-50, 0, 110, 180),
    }
    for south, north, west, east in boxes.values():
        inside = (latitude > south) & (latitude < north) & (longitude > west) & (longitude < east)
        assert inside.sum() >= 6
    assert (np.abs(latitude) < TROPIC).sum() >= 10
    assert min(row["annual_mean_c"] for row in PLACES.values()) < -5


def test_no_two_places_stand_on_one_spot():
    spots = {(round(row["latitude"]), round(row["longitude"])) for row in PLACES.values()}
    assert len(spots) == len(PLACES)


@each
def test_the_year_is_the_year_of_its_months(name):
    row = PLACES[name]
    months = np.array(row["monthly_mean_c"])
    assert row["annual_mean_c"] == pytest.approx(months.mean(), abs=0.06)
    assert row["yearly_swing_k"] == pytest.approx(np.ptp(months) / 2, abs=0.06)
    assert months[row["hottest_month"] - 1] == months.max()


@each
def test_the_months_follow_the_sun(name):
    """Outside the tropics the warm half of the year is that of the hemisphere; near the equator the year is flat."""
    row = PLACES[name]
    months = np.array(row["monthly_mean_c"])
    if abs(row["latitude"]) > TROPIC:
        north = row["latitude"] > 0
        assert row["hottest_month"] in ((6, 7, 8) if north else (12, 1, 2))
        warm = months[4:9].mean() - months[[10, 11, 0, 1]].mean()
        assert (warm > 0) == north
    if abs(row["latitude"]) < 10:
        assert row["yearly_swing_k"] < 4
    assert np.abs(np.diff(months, append=months[0])).max() < 21  # no month jumps away from its neighbours


@each
def test_neighbouring_months_are_smooth(name):
    """A slip of the pen in one month stands out against the mean of the months beside it."""
    months = np.array(PLACES[name]["monthly_mean_c"])
    off = months - (np.roll(months, 1) + np.roll(months, -1)) / 2
    yearly = PLACES[name]["yearly_swing_k"]
    assert np.abs(off).max() < 1.3 + 0.21 * yearly


@each
def test_the_design_day_belongs_to_the_hottest_month(name):
    row = PLACES[name]
    warmest = max(row["monthly_mean_c"])
    assert row["dry_bulb_c"] > warmest + row["daily_range_k"] / 2 - 2
    assert row["dry_bulb_c"] < warmest + row["daily_range_k"] / 2 + 10


@each
def test_the_wet_bulb_is_possible_at_the_dry_bulb(name):
    row = PLACES[name]
    assert row["wet_bulb_c"] < row["dry_bulb_c"]
    psychrolib.SetUnitSystem(psychrolib.SI)
    pressure = psychrolib.GetStandardAtmPressure(row["altitude"])
    humidity = psychrolib.GetRelHumFromTWetBulb(row["dry_bulb_c"], row["wet_bulb_c"], pressure)
    assert 0.06 < humidity < 0.75
    coldest_of_the_day = row["dry_bulb_c"] - row["daily_range_k"]
    dew_point = psychrolib.GetTDewPointFromTWetBulb(row["dry_bulb_c"], row["wet_bulb_c"], pressure)
    assert dew_point < coldest_of_the_day + 3  # at night the air may reach its dew point, not lie far below it


@each
def test_the_clock_goes_with_the_longitude(name):
    row = PLACES[name]
    assert abs(row["utc_offset"] - row["longitude"] / 15) < 2.5
    assert row.get("summer_offset", row["utc_offset"] + 1) == row["utc_offset"] + 1
    assert row["utc_offset"] * 4 == int(row["utc_offset"] * 4)


@each
def test_the_clear_sky_is_a_sky(name):
    """A hazy beam comes with much diffuse: tau_d falls where tau_b rises."""
    row = PLACES[name]
    assert 0.3 <= row["tau_beam"] <= 0.85
    assert 1.45 <= row["tau_diffuse"] <= 2.55
    assert abs(row["tau_diffuse"] - (3.05 - 2.0 * row["tau_beam"])) < 0.5


def test_nothing_passes_for_verified():
    """A row may say verified only when its source was read."""
    claimed = [name for name, row in PLACES.items() if row["verified"]]
    assert not [name for name in claimed if load.source(PLACES[name]["source"])["read"] == "memory"]
