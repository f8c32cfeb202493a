"""The same seed, the same digits, however the draws are cut into blocks and shared among processes."""

from __future__ import annotations

from pathlib import Path

import numpy as np
import pytest

import coldbox
from coldbox.paper.data import outage_json
from coldbox.spread import hold
from coldbox.timeline.results import Kind, Outage

PROJECTS = Path(__file__).parents[2] / "projects"
COUNT = 25


def digits(found: Outage) -> object:
    arrays = (found.hold_draws_h, found.reached_draws_h)
    return outage_json(found), [None if one is None else one.tolist() for one in arrays]


FEW_PACKS = {"packs.water packs.count": "4"}  # so that they are spent within the run


def ran(name: str, kind: Kind = "outage", *, block: int = COUNT, processes: int = 1) -> Outage:
    changes = {"outage.horizon": "60 h", "outage.asked": "20 h", **(FEW_PACKS if name == "dispensary-box" else {})}
    project = coldbox.open(PROJECTS / f"{name}.toml", changes)
    return hold.run(project, kind, count=COUNT, seed=4, block=block, processes=processes)


@pytest.mark.parametrize(
    ("name", "kind"),
    [
        ("greens-hall", "outage"),  # living goods of several ages
        ("cookhouse-cooler", "outage"),
        ("weekend-parcel", "outage"),  # dry ice, moved
        ("dispensary-box", "outage"),  # ice packs
        ("milk-van", "outage"),  # sun
        ("block-house-freezing", "pulldown"),
        ("island-round", "trip"),
    ],
)
def test_blocks_change_no_digit(name: str, kind: Kind) -> None:
    whole = ran(name, kind)
    assert digits(ran(name, kind, block=9)) == digits(whole)
    if kind == "outage":
        hours = [one.crossed_draws_h for one in whole.limits if one.crossed_draws_h is not None]
        assert len(np.unique(np.concatenate(hours))) > 3, "nothing varies: this shows nothing"


def test_processes_change_no_digit(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(hold, "WORTH_A_PROCESS", 2)
    assert digits(ran("net-loft-half", block=10, processes=2)) == digits(ran("net-loft-half"))


def test_another_seed_gives_other_draws() -> None:
    project = coldbox.open(PROJECTS / "net-loft-half.toml")
    one, other = (hold.run(project, count=5, seed=seed) for seed in (1, 2))
    assert one.hold_h == other.hold_h
    assert one.hold_draws_h is not None and other.hold_draws_h is not None
    assert not np.any(one.hold_draws_h == other.hold_draws_h)
