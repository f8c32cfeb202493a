"""Outages, pull-downs and trips on paper: the first lines answer, the rest can be read at 60, 80 and 120 columns."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

import numpy as np
import pytest
import runs_by_hand as by_hand

from coldbox.paper import markdown, outage, text, trip
from coldbox.paper.document import Document
from coldbox.paper.sure import eight_in_ten, percent, rough
from coldbox.scene.finding import Finding
from coldbox.spread.percentiles import Chance, percentiles
from coldbox.timeline.results import Outage, Trip

CASES: dict[str, Callable[[], Outage]] = {
    "outage": by_hand.outage,
    "dry ice": by_hand.dry_ice,
    "pulldown": by_hand.pulldown,
    "trip": by_hand.trip,
    "without draws": lambda: by_hand.outage(spread=None, draws=1),
    "never crossed": lambda: never_crossed(),  # noqa: PLW0108  defined below
    "no limits": lambda: by_hand.outage(limits=(), first=None, hold_h=None, spread=None),
}  # fmt: skip


def never_crossed() -> Outage:
    kept = by_hand.limit(crossed_at_h=None, at_clock=None, end_c=-13.5, worst_c=-13.5, beyond_min=0.0)
    never = percentiles(np.full(500, np.inf))
    sure = by_hand.spread(
        hours=never,
        never=Chance(share=1.0, error=0.004),
        asked=Chance(share=1.0, error=0.004),
        limits=(never,),
        first_shares=(0.0,),
    )
    return by_hand.outage(limits=(kept,), first=None, hold_h=None, spread=sure)


def page_of(found: Outage, system: Any = "SI") -> Document:
    return trip.document(found, system) if isinstance(found, Trip) else outage.document(found, system)


def lines_of(found: Outage, system: Any = "SI", width: int = 80) -> list[str]:
    return text.render(page_of(found, system), width=width).splitlines()


def test_the_first_three_lines_answer() -> None:
    how_long, who, how_sure = lines_of(by_hand.outage())[:3]
    assert how_long == "Holds 18 h 20 min (15 h 30 to 20 h 45 min, 8 in 10): until 08:20 day 2"
    assert who == "  first: cod surface passes -12 °C"
    assert how_sure == "  the asked 16 h: 84 % sure (± 3 points; 500 draws, seed 1)"


def test_what_comes_second_is_named() -> None:
    late = by_hand.limit(lot="peas", where="mean", crossed_at_h=25.5, at_clock=by_hand.clock(25.5), allowed_min=30.0)
    limits = (late, by_hand.limit())
    both = by_hand.spread(limits=by_hand.spread().limits, first_shares=(0.0, 1.0))
    page = lines_of(by_hand.outage(limits=limits, spread=both))
    assert page[1] == "  first: cod surface passes -12 °C"
    assert page[3] == "  then: peas mean passes -12 °C for 30 min, 15:30 day 2"


def test_few_draws_that_agree_are_no_certainty() -> None:
    few = by_hand.spread(draws=20, asked=Chance(share=1.0, error=0.08))
    assert lines_of(by_hand.outage(spread=few))[2] == "  the asked 16 h: 100 % sure (± 8 points; 20 draws, seed 1)"


def test_nothing_crossed_says_who_comes_nearest() -> None:
    how_long, who, how_sure = lines_of(never_crossed())[:3]
    assert how_long == "Holds beyond 48 h, as far as it was looked at (beyond 48 h, 8 in 10)"
    assert who == "  nearest to its limit: cod surface, 1.5 K from -12 °C"
    assert how_sure == "  the asked 16 h: over 99 % sure (500 draws, seed 1)"


def test_a_lower_limit_says_so() -> None:
    cold = by_hand.limit(lot="box", where="air", side="below", limit_c=2.0, worst_c=1.0, end_c=1.5, start_c=4.0)
    page = lines_of(by_hand.outage(limits=(cold,), first=cold, spread=None, draws=1))
    assert page[1] == "  first: air falls below 2 °C"
    assert any("air below 2 °C" in line for line in page)
    assert "how sure: not looked into" in page[2]


def test_beyond_a_limit_from_the_start() -> None:
    over = by_hand.limit(crossed_at_h=0.0, at_clock="14:00", start_c=-10.0)
    page = lines_of(by_hand.outage(limits=(over,), first=over, hold_h=0.0, spread=None, draws=1))
    assert page[0] == "Does not hold: beyond a limit from the start"


def test_dangers_stand_in_full_above_everything() -> None:
    page = lines_of(by_hand.dry_ice())
    assert "  DANGER carbon dioxide in the room over 40 000 ppm from 21:52: do not go in" in page[:5]
    assert any("6 100 ppm in cab" in line for line in page)


def test_what_is_not_counted_stands_beside_the_answer() -> None:
    text = "not counted, beyond a limit when this begins: cod, today's. Look there first"
    warm = Finding(level="caution", id="still-warm", text=text, rule="", path="lots.cod")
    page = lines_of(by_hand.outage(findings=(warm,)))
    assert f"  {text}" in page[:5] and not any("see below" in line for line in page)


def test_pulldown_and_recovery() -> None:
    page = lines_of(by_hand.pulldown())
    assert page[0] == "Cold after 9 h 10 min: 23:10"
    assert page[1] == "  last: the air, within 1 K of -20 °C from 23:10"  # the cod was at 23:00
    page = lines_of(by_hand.pulldown(reached_h=9.0, reached_clock=by_hand.clock(9.0)))
    assert page[1] == "  last: cod surface, within -12 °C from 23:00"
    page = lines_of(by_hand.pulldown(facts={"machine_w": 800.0, "day_puts_in_w": 500.0}))
    assert page[3] == "  it can stay cold: the machine takes out 800 W, a day puts in 500 W"
    page = lines_of(by_hand.pulldown(facts={"machine_w": 400.0, "day_puts_in_w": 500.0}))
    assert page[3] == "  it cannot stay cold: a day puts in 500 W, the machine takes out 400 W"
    warm = by_hand.limit(start_c=12.0, end_c=-3.0, worst_c=12.0, back_at_h=None)
    page = lines_of(by_hand.pulldown(limits=(warm,), reached_h=None, reached_clock=None))
    assert page[0] == "Not cold within 48 h, as far as it was looked at"
    assert page[1] == "  not back within its limit at the end: cod surface at -3 °C"
    page = lines_of(by_hand.pulldown(kind="recovery"))
    assert page[0] == "All back after 9 h 10 min: 23:10"


def test_a_trip_is_told_leg_by_leg() -> None:
    page = lines_of(by_hand.trip())
    assert page[0] == "Holds 18 h 20 min of 48 h (15 h 30 to 20 h 45 min, 8 in 10): until 08:20 day 2"
    assert page[2] == "  every limit kept to the end: under 1 % sure (500 draws, seed 1)"
    table = page[page.index("Leg by leg") + 1 :][:5]
    assert any("stop: bakery" in line and "cod surface -11 °C" in line and "-1 K" in line for line in table)
    assert any("to the bakery, E" in line for line in table) and any("home, W" in line for line in table)
    kept = by_hand.trip(hold_h=None, first=None)
    assert lines_of(kept)[0] == "Keeps every limit on the way: 48 h, until 14:00 day 3"


def test_what_has_left_has_no_temperature() -> None:
    page = lines_of(by_hand.trip())
    noon = next(line for line in page if line.startswith(" 12:00 day 3"))
    assert noon.split()[4:6] == ["-", "-"]


def test_the_clock_table_holds_what_happens() -> None:
    page = lines_of(by_hand.outage())
    for clock, words in (
        ("14:00 ", "power off"),
        ("16:00 ", "main open for 10 min"),
        ("08:20 day 2", "cod surface over"),
        ("04:48 day 3", "ice spent"),
    ):
        assert any(line.startswith(f" {clock}") and line.endswith(words) for line in page), words
    crossing = next(line for line in page if line.startswith(" 08:20 day 2"))
    assert "-11.9" in crossing  # what the series says there, between its instants


@pytest.mark.parametrize("case", CASES)
@pytest.mark.parametrize("width", [60, 80, 120])
@pytest.mark.parametrize("ascii_only", [False, True])
def test_no_line_is_too_long(case: str, width: int, ascii_only: bool) -> None:
    for system in ("SI", "IP"):
        page = text.render(page_of(CASES[case](), system), width=width, ascii_only=ascii_only)
        assert not [line for line in page.splitlines() if len(line) > width]
        assert "nan" not in page and "inf " not in page


@pytest.mark.parametrize("case", CASES)
def test_markdown_has_the_same_tables(case: str) -> None:
    page = markdown.render(page_of(CASES[case]()))
    assert page.startswith("# ") and "| clock |" in page and "nan" not in page
    for block in page.split("\n\n"):
        if block.startswith("|"):
            assert len({line.count(" | ") for line in block.splitlines()}) == 1, block


def test_inch_pound_units() -> None:
    page = lines_of(by_hand.outage(), "IP")
    assert page[1] == "  first: cod surface passes 10.4 °F"
    assert "By the clock, °F" in page
    assert any(line.startswith(" 14:00") and "-0.4" in line for line in page)


def test_percentiles_are_no_finer_than_their_error() -> None:
    assert rough(18.34, 0.3, 72.0) == "18 h 15 min"
    assert rough(18.34, 0.01, 72.0) == "18 h 20 min"
    assert rough(0.34, 5.0, 72.0) == "20 min"
    assert rough(None, None, 72.0) == "beyond 72 h"
    assert eight_in_ten(percentiles(np.full(100, 3.0)), 72.0) == "3 h"
    some_never = np.concatenate((np.linspace(10.0, 20.0, 400), np.full(100, np.inf)))
    assert eight_in_ten(percentiles(some_never), 72.0).endswith(" to beyond 72 h")


@pytest.mark.parametrize(
    ("share", "words"),
    [(0.0, "0 %"), (0.001, "under 1 %"), (0.5, "50 %"), (0.998, "over 99 %"), (0.994, "99 %"), (1.0, "100 %")],
)
def test_no_certainty_that_is_none(share: float, words: str) -> None:
    assert percent(share) == words


def test_what_cannot_be_drawn_is_told() -> None:
    page = lines_of(by_hand.outage(spread=by_hand.spread(left_out=("lots.cod.limits[1].minutes",), drivers=())))
    assert any("lots.cod.limits[1].minutes" in line for line in page)
    assert "No input moves it more than chance does." in page


def test_asked_beyond_the_horizon() -> None:
    page = lines_of(
        by_hand.outage(asked_h=60.0, spread=by_hand.spread(asked=None, never=Chance(share=0.25, error=0.04)))
    )
    assert "60 h are beyond what was looked at" in page[2] and "25 %" in page[2] + page[3]
