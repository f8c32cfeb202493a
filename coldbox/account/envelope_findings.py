"""Findings about the envelope: panels below the rules that were asked for, surfaces that sweat, ground that freezes."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from typing import Literal

import numpy as np

from coldbox.account.entry import Figure, Finding, Text
from coldbox.account.surfaces import SurfaceFact
from coldbox.account.transmission import Envelope
from coldbox.physics import panel
from coldbox.physics.number import Number
from coldbox.project.model import Construction
from coldbox.scene import Scene
from coldbox.scene.draws import matters
from coldbox.scene.types import Surface

WALK_IN_RULE = "10 CFR 431.306"
R_IP = 0.1761101838  # m²K/W in one h ft² °F/Btu
COOLER_R, FREEZER_R, FREEZER_FLOOR_R = 25.0 * R_IP, 32.0 * R_IP, 28.0 * R_IP
COOLER_MEAN_C, FREEZER_MEAN_C = (55.0 - 32.0) / 1.8, (20.0 - 32.0) / 1.8  # the rule's mean foam temperatures
WALK_IN_MOST_M2 = 3000.0 * 0.3048**2
QUOTED_FILMS = 0.17  # m²K/W in a quoted u_value
ATP_K = {"a": 0.70, "b": 0.40, "c": 0.40, "d": 0.70, "e": 0.40, "f": 0.40}  # W/m²K
HEAVE_C = 2.0  # under a freezer's floor; trade practice
SAME = 1e-9  # relative; a value typed at the border meets it


def findings(scene: Scene, envelope: Envelope) -> Iterator[Finding]:
    """What the panels, their surfaces and the ground beneath have to say."""
    yield from _panel_minimum(scene)
    yield from _transport_class(scene, envelope)
    for fact in envelope.surfaces:
        yield from _sweating(fact)
    yield from _frost_heave(scene, envelope.facts)


def foam_resistance(construction: Construction, mean_c: float) -> Number:
    """R of the foam alone at a mean temperature, m²K/W: no films, skins or ageing; a quoted R is taken as foam."""
    if construction.r_value is not None:
        return construction.r_value
    if construction.u_value is not None:
        return 1.0 / construction.u_value - QUOTED_FILMS
    total: Number = 0.0
    for layer in construction.layers:
        if layer.foam and layer.conductivity is not None:
            k = panel.foam_conductivity(layer.conductivity, layer.temperature_factor, mean_c)
            total = total + layer.thickness / k
    return total


def _panel_minimum(scene: Scene) -> Iterator[Finding]:
    """Foam below the minimum for US walk-ins: a caution where the rule was asked for, else one note for the worst."""
    project = scene.project
    if project.box.k_value is not None or "us-walk-in" not in project.box.rules and not _could_be_walk_in(scene):
        return
    freezer = float(np.max(scene.room.temperature_c)) <= 0.0
    mean_c = FREEZER_MEAN_C if freezer else COOLER_MEAN_C
    misses: list[tuple[float, float, Surface]] = []
    for one in scene.body.surfaces:
        needed = _needed(one, freezer)
        if needed is None or one.construction is None:
            continue
        has = float(np.min(foam_resistance(one.construction, mean_c)))
        if has < needed * (1.0 - SAME):
            misses.append((has / needed, needed, one))
    if "us-walk-in" not in project.box.rules:
        if misses:
            share, needed, one = min(misses, key=lambda miss: miss[0])
            text = (
                f"no rules chosen; as a US walk-in its {one.label} would miss the minimum: ",
                *_against(share * needed, needed),
            )
            yield _finding("note", "rules-unasked", text, WALK_IN_RULE, "box.rules")
        return
    for share, needed, one in misses:
        at = (" at a mean of ", Figure(value=mean_c, kind="temperature"), "; your local code rules")
        text = (f"{one.label}: ", *_against(share * needed, needed), *at)
        yield _finding("caution", "panel-minimum", text, WALK_IN_RULE, one.id)


def _against(has: float, needed: float) -> tuple[str | Figure, ...]:
    """The R of the foam and the R the rule asks for; known by their IP figures everywhere."""
    asked = Figure(value=needed, kind="resistance", digits=3, both=True)
    return "its foam has ", Figure(value=has, kind="resistance", digits=3, both=True), ", the rule asks for ", asked


def _could_be_walk_in(scene: Scene) -> bool:
    """Whether a person walks in, under a roof of at most 3 000 ft²; boxes nothing cools are none."""
    area = float(np.max(scene.body.floor_area))
    return scene.project.box.powered and area <= WALK_IN_MOST_M2 and float(np.min(scene.body.height)) >= 1.8


def _needed(one: Surface, freezer: bool) -> float | None:
    if one.face == "floor":
        return FREEZER_FLOOR_R if freezer else None
    if matters(one.solar_gain):
        return None
    return FREEZER_R if freezer else COOLER_R


def _transport_class(scene: Scene, envelope: Envelope) -> Iterator[Finding]:
    k = float(np.max(envelope.k_w_per_m2k))
    for rule in scene.project.box.rules:
        name = rule.removeprefix("atp-")
        if name not in ATP_K or rule == name:
            continue
        limit = ATP_K[name]
        above = k > limit * (1.0 + SAME)
        text = (
            "K ",
            Figure(value=k, kind="transmittance", digits=3),
            f" is {'above' if above else 'within'} the ",
            Figure(value=limit, kind="transmittance", digits=3),
            f" of class {name.upper()}; ",
            "only a test station certifies" if above else "a calculated K never certifies",
        )
        yield _finding("caution" if above else "note", "atp-class", text, "ATP, annex 1", "box.rules")


def _sweating(fact: SurfaceFact) -> Iterator[Finding]:
    over = float(np.min(fact.over_dew_point_k))
    if over >= 0.0:
        return
    dew = float(np.mean(fact.dew_point_c))
    where = (
        f"{fact.label}: its outside falls to ",
        Figure(value=dew + over, kind="temperature"),
        ", the dew point there is ",
        Figure(value=dew, kind="temperature"),
    )
    level: Literal["note", "caution"] = "note" if fact.behind == "outdoors" else "caution"
    what = "dew in clear nights" if fact.behind == "outdoors" else "it sweats: more insulation, drier air or heat there"
    yield _finding(level, "sweating", (*where, f"; {what}"), "ISO 13788", fact.id)


def _frost_heave(scene: Scene, facts: Mapping[str, Number]) -> Iterator[Finding]:
    centre = facts.get("under_floor_centre_c")
    if centre is None or float(np.max(scene.room.temperature_c)) >= 0.0:
        return
    coldest = Figure(value=float(np.min(centre)), kind="temperature")
    heater = facts.get("underfloor_heater_w")
    if heater is not None:
        watts = float(np.mean(heater))
        text: Text = ("without its heater the ground under the floor would settle at ", coldest)
        if watts > 0.0:
            text = (*text, "; the heater holds it with ", Figure(value=watts, kind="power"))
        else:
            text = (*text, "; on this day the heater idles")
        yield _finding("note", "frost-heave", text, "ISO 13370", "faces.floor")
    elif coldest.value < HEAVE_C:
        text = (
            "ground under the middle of the floor settles at ",
            coldest,
            ": below ",
            Figure(value=HEAVE_C, kind="temperature"),
            " it may freeze and lift the floor; plan a heater, a vented void or more insulation",
        )
        yield _finding("caution", "frost-heave", text, "ISO 13370; trade practice", "faces.floor")
    else:
        text = ("ground under the middle of the floor settles at ", coldest, ": no frost heave")
        yield _finding("note", "frost-heave", text, "ISO 13370", "faces.floor")


def _finding(level: Literal["note", "caution"], name: str, text: Text, rule: str, path: str) -> Finding:
    return Finding(level=level, id=name, text=text, rule=rule, path=path)
