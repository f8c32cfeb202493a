"""Rules across fields: each is broken once, and told with its line and key path."""

from __future__ import annotations

import pytest
from typed import LEAST, SITE, line_of, problems

OUTSIDE = LEAST.replace('"room"', '"outdoors"') + SITE
LOT = '[[lots]]\nname = "milk"\nproduct = "milk"\nstored = "100 kg"\n'
TRUCK = OUTSIDE + (
    '[[doors]]\nname = "rear"\nwidth = "1 m"\nheight = "2 m"\n'
    + LOT
    + '[trip]\nlegs = [{ name = "out", lasts = "1 h" }]\n'
)
OWN = 'r_value = "RSI 4", thickness = "80 mm"'

# what the rule is about: the text, the key path of its problem, a word of its sentence, the line's text
BROKEN = {
    "construction unknown": (
        LEAST.replace('construction = "wall"', 'construction = "wal"'), "box.construction", '"wall"', "construction ="
    ),
    "no construction at all": (
        LEAST.replace('construction = "wall"\n', ""), "box.construction", "missing", "[box]"
    ),
    "neighbour unknown": (
        LEAST.replace('"room"', '"hal"') + '[neighbours]\nhall = { temperature = "20 °C" }\n',
        "box.neighbour", '"hall"', "neighbour =",
    ),
    "material unknown": (
        LEAST.replace(OWN, 'layers = [{ material = "PIF foam", thickness = "80 mm" }]'),
        "constructions.wall.layers[1].material", "PI", "wall =",
    ),
    "product unknown": (LEAST + LOT.replace('"milk"\ns', '"mylk"\ns'), "lots.milk.product", "milk", "product ="),
    "place unknown": (OUTSIDE + 'place = "Oslo-on-Sea"\n', "site.place", "weather table", "place ="),
    "outdoors without site": (LEAST.replace('"room"', '"outdoors"'), "box.neighbour", "[site]", "neighbour ="),
    "site without dry bulb": (OUTSIDE.replace('dry_bulb = "32 °C"\n', ""), "site.dry_bulb", "32 °C", "[site]"),
    "wall on the ground": (
        OUTSIDE + '[faces]\nleft = { neighbour = "ground" }\n', "faces.left.neighbour", "floor", "left ="
    ),
    "door into the ground": (
        OUTSIDE + '[faces]\nfloor = { neighbour = "ground" }\n'
        '[[doors]]\nname = "hatch"\nface = "floor"\nwidth = "1 m"\nheight = "1 m"\n',
        "doors.hatch.face", "ground", "face =",
    ),
    "ground far from any known year": (
        OUTSIDE.replace("55.1° N", "50° S").replace("14.7° E", "80° E") + '[faces]\nfloor = { neighbour = "ground" }\n',
        "site.ground_temperature", "year", "[site]",
    ),
    "ground inside a building": (
        OUTSIDE + '[faces]\nfloor = { neighbour = "ground", exposed_edge = "0 m" }\n',
        "faces.floor.exposed_edge", "ground_temperature", "floor =",
    ),
    "r_value without thickness": (
        LEAST.replace(', thickness = "80 mm"', ""), "constructions.wall.thickness", "80 mm", "wall ="
    ),
    "r and u": (
        LEAST.replace('"80 mm"', '"80 mm", u_value = "0.3 W/m²K"'), "constructions.wall.r_value", "twice", "wall ="
    ),
    "layers and r": (
        LEAST.replace('"80 mm"', '"80 mm", layers = [{ material = "PIR foam", thickness = "80 mm" }]'),
        "constructions.wall.r_value", "twice", "wall =",
    ),
    "construction of nothing": (LEAST.replace(OWN, 'notes = "?"'), "constructions.wall", "layers", "wall ="),
    "layers that do not add up": (
        LEAST.replace(OWN, 'thickness = "90 mm", layers = [{ material = "PIR foam", thickness = "80 mm" }]'),
        "constructions.wall.thickness", "80 mm", "wall =",
    ),
    "k_value with a construction": (
        LEAST.replace('neighbour = "room"', 'neighbour = "room"\nk_value = "0.4 W/m²K"\nthickness = "80 mm"'),
        "box.construction", "k_value", "construction =",
    ),
    "k_value without thickness": (
        LEAST.replace('construction = "wall"', 'k_value = "0.4 W/m²K"'), "box.thickness", "80 mm", "[box]"
    ),
    "door's construction in a k_value box": (
        LEAST.replace('construction = "wall"', 'k_value = "0.4 W/m²K"\nthickness = "80 mm"')
        + '[[doors]]\nwidth = "1 m"\nheight = "2 m"\nconstruction = "wall"\n',
        "doors[1].construction", "k_value", 'construction = "wall"\n',
    ),
    "rate without air change": (
        LEAST.replace('"room"', '"room"\nair = "rate"'), "box.air_change", "2/h", "[box]"
    ),
    "size missing": (LEAST.replace('height = "2.4 m"\n', ""), "box.height", "2.4 m", "[box]"),
    "other shape, half said": (
        LEAST.replace('height = "2.4 m"\n', 'volume = "20 m³"\n'), "box.floor_area", "all three", "[box]"
    ),
    "notch half said": (
        LEAST.replace('height =', 'notch_length = "1 m"\nheight ='), "box.notch_width", "all three", "[box]"
    ),
    "notch too large": (
        LEAST.replace("height =", 'notch_length = "3 m"\nnotch_width = "1 m"\nnotch_corner = "back left"\nheight ='),
        "box.notch_length", "smaller", "notch_length",
    ),
    "nothing left inside": (
        LEAST.replace("height =", 'measured = "outside"\nheight =').replace('"80 mm"', '"1.5 m"'),
        "box.length", "nothing is left", "length =",
    ),
    "wall thicker than the box": (
        LEAST.replace('"3 m"', '"0.3 m"').replace('"80 mm"', '"400 mm"'), "box.construction", "shortest",
        "construction ="
    ),
    "door too wide": (
        LEAST + '[[doors]]\nwidth = "4.5 m"\nheight = "2 m"\n', "doors[1].width", "4000 mm", 'width = "4.5 m"'
    ),
    "door too high": (
        LEAST + '[[doors]]\nwidth = "1 m"\nheight = "2.5 m"\n', "doors[1].height", "2400 mm", 'height = "2.5 m"'
    ),
    "doors larger than the face": (
        LEAST + '[[doors]]\nface = "left"\nwidth = "1 m"\nheight = "2 m"\ncount = 4\n', "doors[1]", "7.2 m²",
        "[[doors]]"
    ),
    "panel and door larger than the face": (
        LEAST + '[[panels]]\nface = "left"\nwidth = "2 m"\n[[doors]]\nface = "left"\nwidth = "2 m"\nheight = "2.2 m"\n',
        "doors[1]", "cut out already", "[[doors]]",
    ),
    "panel without width": (LEAST + '[[panels]]\nface = "left"\n', "panels[1].width", "area", "[[panels]]"),
    "panel with width and area": (
        LEAST + '[[panels]]\nface = "left"\nwidth = "1 m"\narea = "2 m²"\n', "panels[1].width", "area", 'width = "1 m"'
    ),
    "open longer than there is time": (
        LEAST + '[[doors]]\nwidth = "1 m"\nheight = "2 m"\npassages = "300/h"\nopen_each = "20 s"\n',
        "doors[1].passages", "167 %", "passages",
    ),
    "a day's passages in too few hours": (
        LEAST + '[[doors]]\nwidth = "1 m"\nheight = "2 m"\npassages = "2000/day"\nhours = "07:00-12:00"\n',
        "doors[1].passages", "167 %", "passages",
    ),
    "spread over no hours": (
        LEAST + '[[doors]]\nwidth = "1 m"\nheight = "2 m"\npassages = "300/day"\nhours = "never"\n',
        "doors[1].passages", "hours", "passages",
    ),
    "above and below": (
        LEAST + LOT + 'limits = [{ above = "8 °C", below = "0 °C" }]\n', "lots.milk.limits[1].below",
        "two limits", "limits ="
    ),
    "limit of nothing": (LEAST + LOT + 'limits = [{ where = "core" }]\n', "lots.milk.limits[1]", "above", "limits ="),
    "shares that do not sum": (
        LEAST + LOT.replace('product = "milk"\n', "")
        + 'freezing_point = "-1 °C"\ncomposition = { water = "80 %", fat = "3 %", ash = "1 %" }\n',
        "lots.milk.composition", "84 %", "composition =",
    ),
    "more fibre than carbohydrate": (
        LEAST + LOT.replace('product = "milk"\n', "")
        + 'freezing_point = "-1 °C"\ncomposition = { water = "95 %", carbohydrate = "5 %", fibre = "6 %" }\n',
        "lots.milk.composition.fibre", "part of the carbohydrate", "composition =",
    ),
    "composition without freezing point": (
        LEAST + LOT.replace('product = "milk"', 'composition = { water = "100 %" }'),
        "lots.milk.freezing_point", "-0.5", "[[lots]]"
    ),
    "freezing point above zero": (
        LEAST + LOT + 'freezing_point = "2 °C"\n', "lots.milk.freezing_point", "0 °C", "freezing_point"
    ),
    "no product, no figures": (
        LEAST + LOT.replace('product = "milk"\n', ""), "lots.milk.product", "composition", "[[lots]]"
    ),
    "quoted, but it may freeze": (
        LEAST.replace('"4 °C"', '"-18 °C"')
        + LOT.replace('product = "milk"', 'specific_heat_above = "3.4 kJ/kgK"'),
        "lots.milk.latent_heat", "all four", "[[lots]]",
    ),
    "neither stored nor arriving": (
        LEAST + LOT.replace('stored = "100 kg"\n', ""), "lots.milk.stored", "arrives", "[[lots]]"
    ),
    "arrives how warm": (
        LEAST + LOT.replace('stored = "100 kg"', 'arrives = "10 kg/day"'), "lots.milk.arrival_temperature",
        "12 °C", "[[lots]]"
    ),
    "one point of respiration": (
        LEAST + LOT + 'respiration = [{ at = "0 °C", heat = "50 mW/kg" }]\n', "lots.milk.respiration", "two", "[[lots]]"
    ),
    "packaging of nothing": (
        LEAST + LOT + 'packaging_mass = "4 kg"\n', "lots.milk.packaging_mass", "cardboard", "packaging_mass"
    ),
    "packaging by the day, nothing arrives": (
        LEAST + LOT + 'packaging = "wood"\npackaging_mass = "4 kg/day"\n', "lots.milk.packaging_mass",
        "45 kg", "packaging_mass"
    ),
    "humidity and wet bulb": (
        OUTSIDE + 'humidity = "50 %"\nwet_bulb = "20 °C"\n', "site.wet_bulb", "one of them", "wet_bulb"
    ),
    "wet bulb above dry bulb": (OUTSIDE + 'wet_bulb = "33 °C"\n', "site.wet_bulb", "above the dry bulb", "wet_bulb"),
    "a day that is not": (OUTSIDE + 'month = "June"\nday = 31\n', "site.day", "30 days", "day ="),
    "pack that melts backwards": (
        LEAST + '[[packs]]\nkind = "ice"\nmass = "1 kg"\nmelts_from = "2 °C"\n', "packs.ice.melts_from",
        "lower", "melts_from"
    ),
    "own pack without figures": (
        LEAST + '[[packs]]\nkind = "own"\nmass = "1 kg"\n', "packs.own.latent_heat", "melting range", "[[packs]]"
    ),
    "fans without power": (LEAST + "[machine]\nfans = 2\n", "machine.fan_power", "110 W", "[machine]"),
    "heated defrost of no kind": (
        LEAST + '[machine]\ndefrost = "air"\ndefrost_power = "2 kW"\n', "machine.defrost_power", "electric",
        "defrost_power"
    ),
    "heater of both kinds": (
        OUTSIDE + '[[heaters]]\nkind = "underfloor"\npower = "1 kW"\nheld_at = "5 °C"\n', "heaters.underfloor.held_at",
        "result", "held_at",
    ),
    "heater under a room": (
        LEAST + '[[heaters]]\nkind = "underfloor"\nheld_at = "5 °C"\n', "heaters.underfloor.held_at",
        "no ground", "held_at"
    ),
    "two currencies": (
        LEAST + '[money]\ntariff = "0.3 EUR/kWh"\ninsulation_cost = "400 DKK/m³"\n', "money.insulation_cost",
        "one currency",
        "insulation_cost",
    ),
    "its own neighbour": (
        LEAST + '[neighbours]\nnext = { temperature = "4 °C", project = "typed" }\n',
        "neighbours.next.project", "this very",
        "next =",
    ),
    "asked beyond the horizon": (
        LEAST + '[outage]\nasked = "100 h"\nhorizon = "72 h"\n', "outage.asked", "horizon", "asked ="
    ),
    "event of an unknown door": (
        LEAST + '[[doors]]\nname = "main"\nwidth = "1 m"\nheight = "2 m"\n[outage]\n'
        'events = [{ at = "16:00", what = "door open", door = "mane", lasts = "5 min" }]\n',
        "outage.events[1].door", '"main"', "events =",
    ),
    "event without what it needs": (
        LEAST + '[outage]\nevents = [{ at = "16:00", what = "door open", lasts = "5 min" }]\n', "outage.events[1].door",
        "no doors", "events =",
    ),
    "event with what it has no use for": (
        LEAST + LOT + '[outage]\nevents = [{ at = "16:00", what = "goods out", lot = "milk", door = "x" }]\n',
        "outage.events[1].door", "no use", "events =",
    ),
    "moved nowhere": (
        LEAST + '[outage]\nevents = [{ at = "6 h", what = "moved" }]\n', "outage.events[1].neighbour", "where",
        "events ="
    ),
    "trip without legs": (OUTSIDE + "[trip]\n", "trip.legs", "driven", "[trip]"),
    "trip indoors": (LEAST + '[trip]\nlegs = [{ lasts = "1 h" }]\n', "trip", "[site]", "[trip]"),
    "stop after nothing": (
        TRUCK + 'stops = [{ after = "home", lasts = "5 min" }]\n', "trip.stops[1].after", "out", "stops ="
    ),
    "one stop too many": (
        TRUCK + 'stops = [{ lasts = "5 min" }, { lasts = "5 min" }]\n', "trip.stops[2].after", "1 legs", "stops ="
    ),
    "open longer than the stop": (
        TRUCK + 'stops = [{ lasts = "5 min", open = "rear", open_for = "6 min" }]\n',
        "trip.stops[1].open_for", "5 min", "stops ="
    ),
    "more delivered than there is": (
        TRUCK + 'stops = [{ lasts = "5 min", deliver = [{ lot = "milk", mass = "101 kg" }] }]\n',
        "trip.stops[1].deliver",
        "100 kg", "stops =",
    ),
}  # fmt: skip


@pytest.mark.parametrize("rule", BROKEN)
def test_a_broken_rule_is_told(rule: str) -> None:
    text, path, word, place = BROKEN[rule]
    found = problems(text)
    about = [problem for problem in found if problem.path == path]
    assert about, [str(problem) for problem in found]
    assert word in about[0].text
    assert about[0].line == line_of(text, place)
    assert about[0].file == "typed.toml"


@pytest.mark.parametrize("rule", BROKEN)
def test_a_broken_rule_is_told_once(rule: str) -> None:
    """No problem drags others along that only follow from it; four figures missing are four problems."""
    text, path, _, _ = BROKEN[rule]
    others = [problem for problem in problems(text) if problem.path.rpartition(".")[0] != path.rpartition(".")[0]]
    assert not others


def test_the_rules_let_a_sound_file_pass() -> None:
    assert not problems(LEAST)
    assert not problems(OUTSIDE)
    assert not problems(TRUCK)
    assert not problems(LEAST + LOT)


def test_all_problems_come_at_once_in_the_order_of_the_file() -> None:
    text = LEAST.replace('"wall"', '"wal"') + LOT.replace('"milk"\ns', '"mylk"\ns') + "[machine]\nfans = 2\n"
    lines = [problem.line or 0 for problem in problems(text)]
    assert len(lines) == 3
    assert lines == sorted(lines)
