"""Results of an outage, a pull-down and a trip, made by hand: figures that no engine touched."""

from __future__ import annotations

from pathlib import Path
from typing import Any

import numpy as np

from coldbox.project import store
from coldbox.scene.finding import Finding
from coldbox.spread.hold import HoldSpread
from coldbox.spread.influence import Driver
from coldbox.spread.percentiles import Chance, percentiles
from coldbox.timeline.results import (
    CarbonDioxide,
    LegResult,
    LimitResult,
    LotSeries,
    Outage,
    PackResult,
    PackSeries,
    Series,
    Told,
    Trip,
)
from coldbox.units import show

PROJECTS = Path(__file__).parents[2] / "projects"
HORIZON_H = 48.0
START_H = 14.0


def clock(hours: float) -> str:
    return show(START_H + hours, "clock")


def limit(**changes: Any) -> LimitResult:
    """Cod at its surface, crossed after 18 h 20 min."""
    given: dict[str, Any] = {
        "lot": "cod", "side": "above", "where": "surface", "limit_c": -12.0, "allowed_min": 0.0,
        "crossed_at_h": 18.0 + 1.0 / 3.0, "at_clock": clock(18.0 + 1.0 / 3.0), "start_c": -18.0, "end_c": -6.0,
        "worst_c": -6.0, "beyond_min": 1780.0, "crossed_draws_h": np.linspace(10.0, 30.0, 500),
    }  # fmt: skip
    return LimitResult(**{**given, **changes})


def series(*, gone_after: float = np.inf, gas: bool = False) -> Series:
    """Air and a lot that warm up towards 20 °C; the lot may leave."""
    at = np.arange(0.0, HORIZON_H + 0.01, 0.5)
    surface = 20.0 - 38.0 * np.exp(-at / 105.0)
    lot = LotSeries(surface_c=surface, mean_c=surface - 1.0, core_c=surface - 1.5, there=at <= gone_after)
    left = PackSeries(left_kg=30.0 * np.exp(-at / 15.0), frozen=np.ones_like(at)) if gas else None
    ice = PackSeries(left_kg=np.full_like(at, 14.4), frozen=np.clip(0.97 - at / 40.0, 0.0, 1.0))
    return Series(
        t_h=at,
        air_c=20.0 - 38.0 * np.exp(-at / 60.0),
        humidity=np.full_like(at, 0.8),
        lots={"cod": lot},
        packs={"ice": ice} if left is None else {"relief": left},
        carbon_dioxide_ppm=None if left is None else 70_000.0 * at / HORIZON_H,
        around_ppm=None,
    )


def spread(**changes: Any) -> HoldSpread:
    """500 draws around 18 h."""
    hours = np.random.default_rng(1).normal(18.3, 2.4, 500)
    leak = Driver(key="box.leakage", label="leakage", at_lowest=2.5, at_highest=-2.7, beyond=False)
    foam = Driver(key="spreads.foam", label="conductivity of the foam", at_lowest=1.8, at_highest=-1.9, beyond=False)
    given: dict[str, Any] = {
        "draws": 500, "seed": 1, "hours": percentiles(hours), "never": Chance(share=0.0, error=0.0038),
        "asked": Chance(share=0.84, error=0.032),
        "drivers": (leak, foam), "limits": (percentiles(hours), percentiles(np.full(500, np.inf))),
        "first_shares": (1.0, 0.0), "left_out": (),
    }  # fmt: skip
    return HoldSpread(**{**given, **changes})


def outage(**changes: Any) -> Outage:
    """An outage of 48 h in the net loft's freezer, its cod over after 18 h 20 min."""
    return Outage(**{**_usual(), **changes})


def _usual() -> dict[str, Any]:
    first = limit()
    core = limit(
        where="core", limit_c=-5.0, crossed_at_h=None, at_clock=None, end_c=-7.5, worst_c=-7.5, beyond_min=0.0,
        allowed_min=30.0,
    )  # fmt: skip
    return {
        "kind": "outage",
        "project": store.open(str(PROJECTS / "net-loft-full.toml")),
        "start_clock_h": START_H,
        "start_clock": clock(0.0),
        "horizon_h": HORIZON_H,
        "asked_h": 16.0,
        "power_back_h": None,
        "hold_h": first.crossed_at_h,
        "first": first,
        "limits": (first, core),
        "reached_h": None,
        "reached_clock": None,
        "draws": 500,
        "hold_draws_h": None,
        "first_draws": None,
        "reached_draws_h": None,
        "spread": spread(),
        "heat_balance_error": 2e-9,
        "trace": series(),
        "packs": (PackResult(id="ice", left_kg=14.4, frozen=0.0, spent_at_h=38.8, spent_clock=clock(38.8)),),
        "carbon_dioxide": None,
        "events": (
            Told(at_h=0.0, clock=clock(0.0), text="power off"),
            Told(at_h=2.0, clock=clock(2.0), text="main open for 10 min"),
        ),
        "inside": ("cod, 900 kg, since 08:00",),
        "stopped": ("fans", "defrost", "door traffic"),
        "notes": (),
        "findings": (),
        "facts": {"frost_kg": 0.4},
    }


def dry_ice() -> Outage:
    """With dry ice whose gas is a danger."""
    found = Finding(
        level="danger",
        id="carbon dioxide",
        text="carbon dioxide in the room over 40 000 ppm from 21:52: do not go in",
        rule="NIOSH",
        path="packs.relief",
    )
    gas = CarbonDioxide(
        box_ppm=70_000.0, box_at_h=13.8, around="cab", around_ppm=6_120.0, around_at_h=20.0, gas_kg=28.8
    )
    pack = PackResult(id="relief", left_kg=1.2, frozen=1.0, spent_at_h=None, spent_clock=None)
    return outage(findings=(found,), carbon_dioxide=gas, trace=series(gas=True), packs=(pack,))


def pulldown(**changes: Any) -> Outage:
    """Cold after 9 h 10 min."""
    back = limit(start_c=12.0, end_c=-18.0, worst_c=12.0, back_at_h=9.0, back_clock=clock(9.0), crossed_at_h=0.0)
    given = {
        "kind": "pulldown", "hold_h": None, "first": None, "limits": (back,), "reached_h": 9.0 + 1.0 / 6.0,
        "reached_clock": clock(9.0 + 1.0 / 6.0), "spread": None, "draws": 1, "packs": (),
    }  # fmt: skip
    return outage(**{**given, **changes})


def trip(**changes: Any) -> Trip:
    """A round of two legs and a stop; the cod leaves at the stop."""
    legs = (
        LegResult(
            kind="leg", label="to the bakery", from_h=0.0, to_h=1.0, worst_c=-16.0, margin_k=4.0, worst_lot="cod",
            worst_where="surface", air_highest_c=-15.0, heading=90.0,
        ),
        LegResult(
            kind="stop", label="bakery", from_h=1.0, to_h=1.5, worst_c=-11.0, margin_k=-1.0, worst_lot="cod",
            worst_where="surface", air_highest_c=-4.0, heading=None,
        ),
        LegResult(
            kind="leg", label="home", from_h=1.5, to_h=HORIZON_H, worst_c=None, margin_k=None, worst_lot=None,
            worst_where=None, air_highest_c=3.0, heading=270.0,
        ),
    )  # fmt: skip
    given = {"kind": "trip", "legs": legs, "trace": series(gone_after=24.0), "asked_h": HORIZON_H}
    return Trip(**{**_usual(), **given, **changes})
