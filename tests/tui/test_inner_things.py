"""By keyboard to what stands in a thing: a limit of goods, a layer of a wall; added, filled in, gone again."""

from __future__ import annotations

from pathlib import Path

import pytest
from screens import Driven

PROJECTS = Path(__file__).parents[2] / "projects"


@pytest.fixture
def driven(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> Driven:
    monkeypatch.setenv("XDG_STATE_HOME", str(tmp_path / "state"))
    file = tmp_path / "box.toml"
    file.write_bytes((PROJECTS / "long-quay-freezer.toml").read_bytes())
    return Driven(tmp_path, file)


def act(driven: Driven, words: str) -> Driven:
    """An action by its name, from the list of all there is to do."""
    return driven.press(":").type(words).press("enter")


def test_a_limit_of_goods_is_added_filled_in_and_goes(driven: Driven) -> None:
    start = driven.desk.document
    driven.to_thing("store")
    act(driven, "add something").type("limit of store").press("enter")
    assert driven.sheet.thing.path == "lots.store.limits[2]"
    driven.field("above", "-10 °C").pick("where", "core")
    assert driven.desk.document["lots"][1]["limits"][-1] == {"above": "-10 °C", "where": "core"}
    driven.press("delete")
    assert len(driven.desk.document["lots"][1]["limits"]) == 1
    driven.press(*"uuuu")
    assert driven.desk.document == start


def test_a_layer_of_a_wall_is_another_and_comes_back_from_the_shop_library(driven: Driven) -> None:
    act(driven, "go to pir150: layer 2")
    driven.field("thickness", "200 mm").press("up")
    assert driven.desk.shown("constructions.pir150.layers[2].thickness") == "200 mm"
    driven.press("backspace")
    assert driven.desk.shown("constructions.pir150.layers[2].thickness") == "148.8 mm"
    act(driven, "duplicate")
    assert driven.sheet.thing.path == "constructions.pir150.layers[3]"
    assert len(driven.desk.document["constructions"]["pir150"]["layers"]) == 4
