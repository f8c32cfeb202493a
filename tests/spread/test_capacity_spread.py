"""The capacity with draws, against single accounts of each draw and against a hand-made spread."""

from __future__ import annotations

from pathlib import Path

import numpy as np
import pytest

from coldbox.account.load import load
from coldbox.project import store
from coldbox.project.draw import with_values
from coldbox.spread import capacity
from coldbox.spread.capacity import capacity_spread
from coldbox.spread.draws import draws

PROJECTS = Path(__file__).parents[2] / "projects"
FREEZER = str(PROJECTS / "long-quay-freezer.toml")


def test_each_draw_is_an_account_of_its_own() -> None:
    project = store.open(FREEZER)
    found = capacity_spread(project, 12, 4)
    drawn = draws(project, 12, 4)
    for number in range(1, 13):
        one = with_values(project, {path: float(values[number]) for path, values in drawn.values.items()})
        alone = load(one.replace(sizing=one.sizing.replace(safety=0.0)), enthalpy=float(drawn.enthalpy[number]))
        assert found.draws_w[number - 1] == pytest.approx(float(alone.required_capacity_w), rel=1e-9)


def test_the_safety_allowance_is_left_out() -> None:
    project = store.open(FREEZER)
    whole = load(project)
    found = capacity_spread(project, 200, 1)
    assert found.middle_w == pytest.approx(float(whole.required_capacity_w) / (1.0 + float(whole.safety)), rel=1e-12)
    p10, p50, p90 = found.required_w.p10, found.required_w.p50, found.required_w.p90
    assert p10 is not None and p50 is not None and p90 is not None
    assert p10 < p50 < p90 and p10 < found.middle_w < p90
    assert p50 == pytest.approx(found.middle_w, rel=0.02)
    safer = capacity_spread(with_values(project, {"sizing.safety": 0.5}), 200, 1)
    assert np.array_equal(safer.draws_w, found.draws_w)


@pytest.mark.parametrize("file", [FREEZER, str(PROJECTS / "island-round.toml")])
def test_blocks_change_nothing(file: str, monkeypatch: pytest.MonkeyPatch) -> None:
    project = store.open(file)
    assert file == FREEZER or project.box.bearing is None
    whole = capacity_spread(project, 70, 1)
    monkeypatch.setattr(capacity, "BLOCK", 16)
    np.testing.assert_allclose(capacity_spread(project, 70, 1).draws_w, whole.draws_w, rtol=1e-12)


def test_an_input_made_very_unsure_leads() -> None:
    project = store.open(FREEZER, {"box.temperature": "-20 °C ± 15 K"})
    found = capacity_spread(project, 300, 1)
    assert found.drivers[0].key == "box.temperature"
    assert found.drivers[0].at_lowest > 0.0 > found.drivers[0].at_highest  # colder asks for more
    assert found.drivers[0].label == "room temperature"


@pytest.mark.parametrize("file", sorted(PROJECTS.glob("*.toml")), ids=lambda file: file.stem)
def test_every_example_has_a_spread(file: Path) -> None:
    found = capacity_spread(store.open(str(file)), 100, 1)
    assert np.all(found.draws_w > 0.0) and found.draws_w.std() > 0.0
    assert found.drivers
