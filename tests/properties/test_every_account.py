"""What holds for the account of every valid box, over random ones."""

from __future__ import annotations

import random
from typing import Any

import numpy as np
import random_boxes as rb
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

import coldbox
from coldbox.account.entry import GROUPS, Load
from coldbox.paper.data import load_json
from coldbox.project.model import Project
from coldbox.tables import load as tables

quick = settings(max_examples=40, deadline=None, suppress_health_check=[HealthCheck.too_slow])
LOWEST = {"atp-a": 0.0, "atp-c": -20.0}  # classes of the transport agreement
any_project = rb.projects() | rb.files().map(lambda file: rb.project(rb.written(file)))


@quick
@given(any_project)
def test_the_entries_sum_to_the_hours_and_the_hours_to_the_day(project: Project) -> None:
    load = coldbox.load(project)
    told = load_json(load)
    hours = np.array([entry["hours_w"] for entry in told["entries"]])
    assert hours.shape == (len(load.entries), 24)
    magnitude = np.abs(hours).sum(axis=0)
    np.testing.assert_array_less(np.abs(hours.sum(axis=0) - told["hours_w"]), 1e-9 * magnitude + 1e-12)
    assert abs(told["daily_heat_kwh"] - hours.sum() / 1000.0) <= 1e-9 * magnitude.sum() / 1000.0 + 1e-15
    for entry, of in zip(told["entries"], load.entries, strict=True):
        own = np.array(entry["hours_w"])
        size = 1e-9 * (np.abs(of.sensible_w) + np.abs(of.latent_w)) + 1e-12
        np.testing.assert_array_less(np.abs(of.sensible_w + of.latent_w - own), size)
        assert abs(entry["sensible_w"] + entry["latent_w"] - entry["peak_w"]) <= size.max()
        assert entry["peak_w"] == own[told["peak"]["hour"]]
        assert abs(entry["daily_kwh"] - own.sum() / 1000.0) <= 1e-9 * np.abs(own).sum() / 1000.0 + 1e-15


@quick
@given(any_project)
def test_every_entry_says_what_it_is(project: Project) -> None:
    load = coldbox.load(project)
    ids = [entry.id for entry in load.entries]
    assert len(set(ids)) == len(ids)
    for entry in load.entries:
        assert entry.group in GROUPS
        assert entry.label and entry.method and entry.formula
        assert entry.source.startswith("quoted: ") or tables.source(entry.source)
        keys = [item.key for item in entry.inputs]
        assert len(set(keys)) == len(keys)
        assert np.isfinite(entry.hours_w).all()


def _counted(told: dict[str, Any], credit: bool, *, defrost: bool) -> np.ndarray:
    watts = [entry["hours_w"] for entry in told["entries"] if defrost or entry["id"] != "defrost"]
    counted = np.array(watts) if watts else np.zeros((1, 24))
    return (counted if credit else np.maximum(counted, 0.0)).sum(axis=0)


@quick
@given(any_project)
def test_the_capacity_as_anybody_works_it_out_from_the_json(project: Project) -> None:
    told = load_json(coldbox.load(project))
    credit = project.box.credit_cold
    by_daily = max(_counted(told, credit, defrost=True).sum(), 0.0) / told["run_hours"] * (1.0 + told["safety"])
    by_peak = max(_counted(told, credit, defrost=False).max(), 0.0) * (1.0 + told["safety"])
    rules = [rule for rule in project.box.rules if rule.startswith("atp-")]
    by_rule = max((1.75 * told["ua_w_per_k"] * (30.0 - LOWEST[rule]) for rule in rules), default=0.0)
    needed = max(by_daily, by_peak, by_rule)
    assert abs(told["required_capacity_w"] - needed) <= 1e-9 * max(abs(needed), 1.0)
    assert abs(told["by_daily_w"] - by_daily) <= 1e-9 * max(abs(by_daily), 1.0)
    assert abs(told["by_peak_w"] - by_peak) <= 1e-9 * max(abs(by_peak), 1.0)
    assert told[f"by_{told['governs']}_w"] == told["required_capacity_w"]
    at_peak = max(_counted(told, credit, defrost=False)[told["peak"]["hour"]], 0.0)
    assert at_peak * (1.0 + told["safety"]) >= by_peak * (1 - 1e-12) - 1e-9


@quick
@given(rb.files())
def test_si_and_ip_files_of_the_same_box_give_the_same_figures(file: rb.File) -> None:
    metric, imperial = (load_json(coldbox.load(rb.project(rb.written(file, system)))) for system in ("SI", "IP"))
    _same(metric, imperial, "")


@quick
@given(rb.files(), st.integers(0, 2**32))
def test_the_order_of_tables_blocks_and_keys_changes_nothing(file: rb.File, seed: int) -> None:
    orders = (None, list.reverse, random.Random(seed).shuffle)
    straight, *others = (load_json(coldbox.load(rb.project(rb.written(file, order=order)))) for order in orders)
    for told in (straight, *others):
        told["entries"] = {entry["id"]: entry for entry in told["entries"]}
        told["findings"] = {(found["id"], found["path"], found["level"]): "" for found in told["findings"]}
    for mixed in others:
        assert straight["entries"].keys() == mixed["entries"].keys()
        assert straight["findings"].keys() == mixed["findings"].keys()
        _same(straight, {**mixed, "entries": {key: mixed["entries"][key] for key in straight["entries"]}}, "")


def _same(one: Any, other: Any, path: str, size: float = 1.0) -> None:
    """The same words, and the same figures to 1e-9 of their own size (hours: of the day's)."""
    assert type(one) is type(other), path
    if isinstance(one, dict):
        if path.endswith(".findings"):
            return
        assert one.keys() == other.keys(), path
        for key, value in one.items():
            if key != "remark" and not (path.startswith(".findings") and key == "text"):
                _same(value, other[key], f"{path}.{key}")
    elif isinstance(one, list):
        assert len(one) == len(other), path
        whole = max((abs(value) for value in one if isinstance(value, float)), default=1.0)
        for place, (left, right) in enumerate(zip(one, other, strict=True)):
            _same(left, right, f"{path}[{place}]", whole)
    elif isinstance(one, float):
        assert abs(one - other) <= 1e-9 * max(abs(one), abs(other), size, 1e-3), path
    else:
        assert one == other, path


# Physical sense


def _by_id(load: Load) -> dict[str, float]:
    return {entry.id: float(entry.hours_w.sum()) for entry in load.entries}


def _loaded(file: rb.File, **changes: dict[str, Any]) -> Load:
    tables = {**file["tables"], **{name: {**file["tables"][name], **change} for name, change in changes.items()}}
    return coldbox.load(rb.project(rb.written({"tables": tables})))


@quick
@given(rb.files(room=(-30.0, -6.0)), st.floats(0.01, 0.3))
def test_more_insulation_never_lets_more_through_what_is_warmer_outside(file: rb.File, more: float) -> None:
    """Every neighbour is warmer than the room, and no wall is thicker than the shortest inside side."""
    file["tables"]["box"] |= {"measured": "inside", "films": "standard"}  # natural films move with the surface
    file["tables"]["box"].pop("bearing", None)
    file["tables"]["site"] |= {"ground_temperature": rb.Q(10.0, "temperature"), "yearly_swing": rb.Q(5.0, "difference")}
    file["tables"]["site"]["dry_bulb"] = rb.Q(max(file["tables"]["site"]["dry_bulb"].value, 25.0), "temperature")
    thin = _by_id(_loaded(file))
    for made in file["tables"]["constructions"].values():
        foam = made["layers"][1]
        foam["thickness"] = rb.Q(foam["thickness"].value + more, "length")
    thick = coldbox.load(rb.project(rb.written(file)))
    assert max(one.thickness for one in thick.project.constructions.values()) <= min(
        file["tables"]["box"][key].value for key in ("length", "width", "height")
    )
    for entry in thick.entries:
        if entry.group == "transmission":
            assert float(entry.hours_w.sum()) <= thin[entry.id] * (1.0 + 1e-9) + 1e-9, entry.id


@quick
@given(rb.files(room=(-30.0, -6.0)), st.floats(1.0, 2.0))
def test_a_longer_opening_never_lowers_what_the_door_lets_in(file: rb.File, times: float) -> None:
    file["tables"]["box"]["air"] = "doors"
    short = _by_id(_loaded(file))
    for door in file["tables"]["doors"]:
        door["open_each"] = rb.Q(door["open_each"].value * times, "duration")
    long = _by_id(_loaded(file))
    for door in file["tables"]["doors"]:
        for part in ("traffic", "curtain"):
            name = f"doors.{door['name']}.{part}"
            assert long.get(name, 0.0) >= short.get(name, 0.0) * (1.0 - 1e-12), name


@quick
@given(rb.files(), st.sampled_from(["allowance", "hourly"]))
def test_darker_is_never_less_sun(file: rb.File, way: str) -> None:
    file["tables"]["faces"]["left"].pop("colour")
    before: dict[str, float] = {}
    for colour in rb.COLOURS:
        found = _by_id(_loaded(file, box={"colour": colour, "sun": way, "bearing": "200°"}))
        suns = {name: heat for name, heat in found.items() if name.startswith("sun.")}
        for name, heat in before.items():
            assert suns[name] >= heat * (1.0 - 1e-9) - 1e-9, (colour, name)
        before = suns


@quick
@given(rb.files(), st.floats(-25.0, 14.0).map(lambda value: round(value, 1)), st.floats(0.4, 0.95))
def test_where_all_is_equal_and_nothing_inside_there_is_no_heat(file: rb.File, level: float, humidity: float) -> None:
    tables = file["tables"]
    same = {"temperature": rb.Q(level, "temperature"), "humidity": rb.Q(humidity, "share")}
    tables["box"] |= same
    tables["neighbours"] = dict.fromkeys(rb.ROOMS, same)
    tables["site"] |= {
        "dry_bulb": same["temperature"],
        "humidity": same["humidity"],
        "ground_temperature": same["temperature"],
        "daily_range": rb.Q(0.0, "difference"),
        "yearly_swing": rb.Q(0.0, "difference"),
        "sky": "none",
    }
    for name in ("lots", "people", "lights", "motors", "heaters"):
        tables[name] = []
    for door in tables["doors"]:
        door |= {"heater": rb.Q(0.0, "power"), "protection": "none"}
    tables["machine"] = {"defrost": "electric"}
    load = coldbox.load(rb.project(rb.written(file)))
    scale = float(np.mean(load.ua_w_per_k))  # the heat of one kelvin
    assert np.abs(load.hours_w).max() <= 1e-9 * scale
    for entry in load.entries:
        assert np.abs(entry.hours_w).max() <= 1e-9 * scale, entry.id
    assert abs(load.required_capacity_w) <= 1e-9 * scale
    assert abs(load.frost_kg_per_day) <= 1e-9
