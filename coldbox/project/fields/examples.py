"""What one would type: an example for every field, in SI or IP units."""

from __future__ import annotations

from coldbox.project.fields.declare import Field
from coldbox.units import KINDS, parse
from coldbox.units.clock import Rate

_NAMES = {
    "constructions": "pir100",
    "neighbours": "kitchen",
    "doors": "main",
    "lots": "cod",
    "packs": "relief",
    "trip.legs": "to the market",
}
_OWN = {
    "format": "1",
    "name": '"Quay freezer"',
    "customer": '"Harbour kitchens"',
    "by": '"A. Lind"',
    "site.place": '"Copenhagen"',
    "site.library": '"quay 2026-03-02"',
    "site.longitude": '"14.7° E"',
    "site.altitude": '"40 m"',
    "site.clock": '"UTC+2"',
    "site.month": '"July"',
    "site.day": "15",
    "site.weather": '"july.csv"',
    "site.dry_bulb": '"32 °C ± 2 K"',
    "site.humidity": '"45 %"',
    "site.wet_bulb": '"21 °C"',
    "site.ground_temperature": '"10 °C"',
    "site.yearly_swing": '"8 K"',
    "site.tau_beam": "0.45",
    "site.tau_diffuse": "2.1",
    "site.ground_reflects": '"60 %"',
    "box.length": '"3 m"',
    "box.width": '"4 m"',
    "box.height": '"2.4 m"',
    "box.notch_length": '"1 m"',
    "box.notch_width": '"1.5 m"',
    "box.volume": '"70 m³"',
    "box.floor_area": '"28 m²"',
    "box.perimeter": '"14 m"',
    "box.temperature": '"-18 °C"',
    "box.humidity": '"85 %"',
    "box.k_value": '"0.38 W/m²K"',
    "box.thickness": '"80 mm"',
    "box.allowance": '"5 %"',
    "box.leakage": '"0.3/h ± 50 %"',
    "box.air_change": '"0.5/h"',
    "box.fittings": '"300 kg"',
    "box.limits.above": '"8 °C"',
    "box.limits.below": '"2 °C"',
    "constructions.thickness": '"100 mm"',
    "constructions.library": '"pir100 2026-03-02"',
    "constructions.edge_loss": '"0.02 W/mK"',
    "constructions.points": "12",
    "constructions.layers.material": '"PIR foam"',
    "constructions.layers.thickness": '"100 mm"',
    "constructions.layers.conductivity": '"0.022 W/mK ± 10 %"',
    "constructions.layers.temperature_factor": "0.004",
    "constructions.layers.density": '"35 kg/m³"',
    "constructions.layers.specific_heat": '"1.4 kJ/kgK"',
    "constructions.layers.ageing": '"8 %"',
    "constructions.layers.moisture": '"5 %"',
    "constructions.layers.emissivity": '"5 %"',
    "neighbours.temperature": '"24 °C"',
    "neighbours.project": '"quay"',
    "neighbours.volume": '"9 m³"',
    "neighbours.air_change": '"2/h"',
    "faces.neighbour": '"ground"',
    "faces.emissivity": '"25 %"',
    "faces.shade": '"100 %"',
    "faces.exposed_edge": '"7 m"',
    "faces.edge_wall": '"0.2 m"',
    "panels.name": '"window"',
    "panels.width": '"1.2 m"',
    "panels.height": '"0.8 m"',
    "panels.area": '"1.5 m²"',
    "panels.u_value": '"1.1 W/m²K"',
    "panels.thickness": '"24 mm"',
    "panels.shade": '"20 %"',
    "panels.solar_gain": '"55 %"',
    "doors.name": '"main"',
    "doors.library": '"swing door 2026-03-02"',
    "doors.height": '"2 m"',
    "doors.thickness": '"80 mm"',
    "doors.shade": '"20 %"',
    "doors.solar_gain": '"35 %"',
    "doors.passages": '"20/h"',
    "doors.open_each": '"12 s"',
    "doors.stood_open": '"20 min/day"',
    "doors.hours": '"06:00-14:00"',
    "doors.protection": '"strip curtain"',
    "doors.effectiveness": '"85 %"',
    "doors.flow_factor": '"70 %"',
    "doors.gasket_leakage": '"0.5 m³/h per m"',
    "doors.heater": '"180 W"',
    "doors.heater_to_room": '"30 %"',
    "lots.name": '"cod"',
    "lots.product": '"cod"',
    "lots.library": '"salad mix 2026-03-02"',
    "lots.specific_heat_below": '"1.9 kJ/kgK"',
    "lots.freezing_point": '"-0.3 °C"',
    "lots.conductivity": '"0.5 W/mK"',
    "lots.density": '"600 kg/m³"',
    "lots.safe_above": '"0 °C"',
    "lots.stored": '"3000 kg"',
    "lots.arrives": '"900 kg/day"',
    "lots.arrival_time": '"06:00"',
    "lots.arrival_temperature": '"-13 °C"',
    "lots.pulldown": '"10 h"',
    "lots.chilling_factor": '"67 %"',
    "lots.start_temperature": '"3 °C"',
    "lots.packaging": '"cardboard"',
    "lots.packaging_mass": '"45 kg/day"',
    "lots.piece": '["1.2 m", "0.8 m", "1.4 m"]',
    "lots.pieces": "5",
    "lots.exposed": '["top", "sides"]',
    "lots.half_thickness": '"0.2 m"',
    "lots.air_film": '"8 W/m²K"',
    "lots.wrap": '"RSI 0.1"',
    "lots.composition.water": '"93 %"',
    "lots.composition.protein": '"1.5 %"',
    "lots.composition.fat": '"0.2 %"',
    "lots.composition.carbohydrate": '"4.5 %"',
    "lots.composition.fibre": '"1.8 %"',
    "lots.composition.ash": '"0.8 %"',
    "lots.respiration.at": '"20 °C"',
    "lots.respiration.heat": '"120 mW/kg"',
    "lots.limits.above": '"-12 °C"',
    "lots.limits.below": '"0 °C"',
    "lots.limits.minutes": '"120 min"',
    "packs.name": '"relief"',
    "packs.library": '"eutectic plate 2026-03-02"',
    "packs.mass": '"5 kg"',
    "packs.count": "8",
    "packs.frozen": '"97 %"',
    "packs.start_temperature": '"-12 °C"',
    "packs.area": '"0.1 m²"',
    "packs.air_film": '"10 W/m²K"',
    "packs.melts_from": '"-23 °C"',
    "packs.melts_to": '"-21 °C"',
    "packs.latent_heat": '"230 kJ/kg"',
    "packs.specific_heat_frozen": '"2.1 kJ/kgK"',
    "packs.specific_heat_melted": '"3.6 kJ/kgK"',
    "people.count": "2",
    "people.hours": '"07:00-17:00 25 %"',
    "lights.power": '"40 W"',
    "lights.count": "4",
    "lights.hours": '"06:00-18:00"',
    "motors.kind": '"conveyor"',
    "motors.hours": '"06:00-14:00"',
    "trucks.kind": '"pallet truck"',
    "trucks.power": '"1.2 kW"',
    "trucks.hours": '"06:00-14:00 20 %"',
    "heaters.name": '"floor heater"',
    "heaters.power": '"60 W"',
    "heaters.held_at": '"5 °C"',
    "heaters.to_room": '"50 %"',
    "ventilation.flow": '"100 m³/h"',
    "ventilation.hours": '"06:00-18:00"',
    "ventilation.recovery": '"60 %"',
    "ventilation.dried_to": '"2 °C"',
    "quoted.name": '"air change, as printed"',
    "quoted.hours": '"08:00-16:00"',
    "quoted.latent": '"30 %"',
    "quoted.replaces": '["infiltration"]',
    "quoted.source": '"offer of 2 March, page 3"',
    "machine.unit": '"MX-400"',
    "machine.library": '"MX-400 2026-03-02"',
    "machine.capacity": '"4 kW"',
    "machine.band": '"3 K"',
    "machine.fans": "3",
    "machine.fan_power": '"110 W"',
    "machine.fan_share": '"8 %"',
    "machine.defrost": '"electric"',
    "machine.defrost_at": '["05:00", "17:00"]',
    "machine.defrost_time": '"20 min"',
    "machine.defrost_power": '"2.4 kW"',
    "machine.defrost_share": '"6 %"',
    "machine.defrost_to_room": '"40 %"',
    "outage.lasts": '"8 h"',
    "outage.asked": '"16 h"',
    "outage.horizon": '"168 h"',
    "outage.dry_bulb": '"36 °C"',
    "outage.events.at": '"16:00"',
    "outage.events.lasts": '"10 min"',
    "outage.events.mass": '"200 kg"',
    "outage.events.temperature": '"-15 °C"',
    "outage.events.neighbour": '"depot"',
    "outage.events.shade": '"100 %"',
    "trip.starts": '"06:30"',
    "trip.dry_bulb": '"34 °C"',
    "trip.legs.name": '"to the market"',
    "trip.legs.lasts": '"50 min"',
    "trip.legs.heading": '"90°"',
    "trip.legs.speed": '"60 km/h"',
    "trip.legs.dry_bulb": '"36 °C"',
    "trip.legs.shade": '"50 %"',
    "trip.stops.lasts": '"15 min"',
    "trip.stops.open_for": '"6 min"',
    "trip.stops.heading": '"E"',
    "trip.stops.shade": '"100 %"',
    "trip.stops.deliver.mass": '"200 kg"',
    "sizing.run_hours": '"18 h"',
    "sizing.safety": '"15 %"',
    "money.years": "15",
    "money.interest": '"3 %"',
    "spreads.foam": '"15 %"',
    "spreads.ageing": '"3 %"',
    "spreads.air": '"30 %"',
    "spreads.openings": '"20 %"',
    "spreads.ambient": '"3 K"',
    "spreads.enthalpy": '"8 %"',
    "spreads.freezing_point": '"0.5 K"',
    "spreads.films": '"15 %"',
    "fit.file": '"logger.csv"',
    "fit.date": '"2026-03-02"',
    "fit.hash": '"9f2c41"',
    "fit.conductance": "1.08",
    "fit.leakage": "1.4",
    "fit.heat_capacity": "0.95",
}
_TABLES = {
    "box.limits": '[{ above = "8 °C", where = "air" }]',
    "constructions.layers": '[{ material = "PIR foam", thickness = "100 mm" }]',
    "lots.composition": '{ water = "88 %", protein = "3 %", fat = "4 %", carbohydrate = "4.3 %", ash = "0.7 %" }',
    "lots.respiration": '[{ at = "0 °C", heat = "50 mW/kg" }, { at = "20 °C", heat = "400 mW/kg" }]',
    "lots.limits": '[{ above = "-12 °C", where = "surface", minutes = "0 min" }]',
    "outage.events": '[{ at = "16:00", what = "door open", door = "main", lasts = "10 min" }]',
    "trip.legs": '[{ name = "to the market", lasts = "50 min", heading = "90°", speed = "60 km/h" }]',
    "trip.stops": '[{ lasts = "15 min", open = "rear", open_for = "6 min" }]',
    "trip.stops.deliver": '[{ lot = "milk", mass = "200 kg" }]',
}


def example(field: Field) -> str:
    """The key with a value that will do, as a line of the file."""
    return f"{field.key} = {typed(field)}"


def typed(field: Field) -> str:
    """A value that will do, as TOML."""
    own = _OWN.get(field.path) or _TABLES.get(field.path)
    if own is not None:
        return own
    if field.kind in ("count", "yes_no"):
        if field.kind == "yes_no":
            return "false" if field.default == "true" else "true"
        return str(max(int(field.low or 0), 2))
    if field.kind == "number":
        return f"{0.5 * ((field.low or 0.0) + (field.high or 1.0)):.2g}"
    text = _text(field)
    return f'["{text}"]' if field.many == "list" else f'"{text}"'


def _text(field: Field) -> str:
    if field.kind == "word":
        return next((word for word in field.choices if word != field.default), field.choices[0])
    if field.kind == "name":
        return _NAMES.get(field.refers, "main")
    if field.kind == "text":
        return "as the customer told us" if field.key == "notes" else "pir100"
    for text in (*KINDS[field.kind].examples, field.default or ""):
        if text and _within(field, text):
            return text
    raise KeyError(f"{field.path} needs an example of its own")


def _within(field: Field, text: str) -> bool:
    value = parse(text, field.kind).value
    size = value.per_second if isinstance(value, Rate) else value
    if field.low is None or field.high is None or not isinstance(size, (int, float)):
        return True
    return field.low <= size <= field.high
