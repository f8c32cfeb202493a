"""The project as typed, frozen records, complete: names looked up, defaults filled in.

Units: temperatures °C, differences K, angles degrees, clock times hours (30.0 is 06:00 on day 2), shares 0..1,
everything else SI base units (m, m², s, kg, W, J, Pa, kg/s, 1/s). Every `Number` may also be an array of shape
(draws, 1). `None` means the thing is truly absent, never "look it up later".
Records mirror the tables of the file; `origins` tells for each key path where its value came from.
"""

from __future__ import annotations

from collections.abc import Mapping
from typing import Literal

from coldbox.physics.number import Number
from coldbox.record import Record
from coldbox.units.clock import Rate, Schedule, Spread

FACES = ("front", "right", "back", "left", "ceiling", "floor")
WALLS = ("front", "right", "back", "left")
GENERAL_NEIGHBOURS = ("outdoors", "ground", "void", "road")  # "room" is an ordinary neighbour with defaults


class Origin(Record):
    """Where a value came from: `kind`, the text as typed, its line in the file, the reason or source."""

    kind: Literal["typed", "default", "table", "library", "option"]
    text: str = ""
    line: int | None = None
    reason: str = ""


class Limit(Record):
    """A lot fails when it is above/below `limit_c` at `where` for `minutes` in sum (stored in seconds)."""

    side: Literal["above", "below"]
    limit_c: Number
    where: Literal["surface", "mean", "core", "air"]
    allowed_s: float = 0.0


class Site(Record):
    """The place and its design day; absent (None on the project) when nothing touches outdoors."""

    place: str | None
    latitude: Number
    longitude: Number
    altitude: Number
    clock: float  # hours ahead of UTC
    month: int
    day: int
    weather: str | None
    dry_bulb: Number
    daily_range: Number
    humidity: Number | None  # relative, at the day's highest; None when wet_bulb is given
    wet_bulb: Number | None
    wind: Number
    ground_temperature: Number  # annual mean of the outdoor air
    yearly_swing: Number  # half of (warmest less coldest month's mean), K
    sky: Literal["clear", "overcast", "none"]
    tau_beam: Number
    tau_diffuse: Number
    ground_reflects: Number


class Layer(Record):
    """One layer of a construction, outside first. An air space has `conductivity` None."""

    material: str
    thickness: Number
    conductivity: Number | None  # as typed, or as declared at 10 °C mean by the table
    temperature_factor: Number  # 1/K, of exp(f (mean - 10 °C)); 0 for a typed conductivity, which holds as it is
    density: Number
    specific_heat: Number
    ageing: Number  # share added to the conductivity
    moisture: Number  # share added to the conductivity
    emissivity: Number | None  # effective emissivity of an air space's faces; None: not an air space
    foam: bool  # counts as insulation for the panel minimum
    edge_psi: Number  # W/mK along the edge of an evacuated panel, else 0


class Construction(Record):
    """Layers, or one quoted figure. `r_value` is without films, `u_value` with films 0.13 + 0.04."""

    name: str
    layers: tuple[Layer, ...]
    r_value: Number | None
    u_value: Number | None
    thickness: Number
    edge_loss: Number  # W/mK along the outline of the panel
    point_loss: Number  # W/K each
    points: int


class Neighbour(Record):
    """A room behind a face, with a steady temperature and relative humidity."""

    name: str
    temperature: Number
    humidity: Number
    project: str | None
    volume: Number | None
    air_change: Number | None


class Box(Record):
    """The enclosure itself. Sizes as written (`measured` tells inside or outside)."""

    length: Number | None
    width: Number | None
    height: Number | None
    measured: Literal["inside", "outside"]
    notch_length: Number | None
    notch_width: Number | None
    notch_corner: str | None  # "back right" …
    volume: Number | None
    floor_area: Number | None
    perimeter: Number | None
    bearing: Number | None  # None with sun: the worst of 16
    temperature: Number
    humidity: Number
    powered: bool
    k_value: Number | None
    thickness: Number | None
    allowance: Number
    sun: Literal["hourly", "allowance"]
    air: Literal["doors", "table", "rate"]
    use: Literal["light", "average", "heavy"]
    films: Literal["standard", "natural"]
    leakage: Rate
    air_change: Rate | None
    fittings: Number
    credit_cold: bool
    rules: tuple[str, ...]
    limits: tuple[Limit, ...]


class Face(Record):
    """One of the six sides, complete with what the box says for all."""

    name: str
    construction: str | None  # key into Project.constructions; None when the box has a k_value
    neighbour: str  # one of GENERAL_NEIGHBOURS or a key into Project.neighbours
    colour: str
    weathered: bool
    emissivity: Number
    shade: Number
    soil: Literal["clay", "sand", "rock"]
    exposed_edge: Number | None  # None: the floor's own perimeter
    edge_wall: Number


class Panel(Record):
    """A stretch cut out of a face. `height` None with `area` given."""

    name: str
    face: str
    width: Number | None
    height: Number | None
    area: Number
    construction: str | None
    neighbour: str
    colour: str
    weathered: bool
    emissivity: Number
    shade: Number
    solar_gain: Number


class Door(Record):
    """An opening of a face; `count` equal ones. `area` is that of one."""

    name: str
    face: str
    width: Number
    height: Number
    count: int
    construction: str | None
    neighbour: str
    colour: str
    weathered: bool
    emissivity: Number
    shade: Number
    solar_gain: Number
    passages: Rate
    open_each: Number
    stood_open: Rate  # seconds open per second
    hours: Schedule
    protection: tuple[str, ...]
    effectiveness: Number  # combined share held back by all that protects it
    protection_power: Number  # W drawn into the room by an air curtain's motor while it runs
    flow_factor: Number
    gasket_leakage: Number  # m³/s per m of outline
    heater: Number
    heater_to_room: Number


class Composition(Record):
    """Mass shares; carbohydrate includes fibre. They sum to 1 without fibre."""

    water: Number
    protein: Number
    fat: Number
    carbohydrate: Number
    fibre: Number
    ash: Number


class RespirationPoint(Record):
    """Heat given off by living produce at one temperature, W/kg."""

    at_c: Number
    w_per_kg: Number


class Lot(Record):
    """A quantity of one product that arrives, is stored, or both."""

    name: str
    product: str | None
    composition: Composition | None
    respiration: tuple[RespirationPoint, ...]  # by rising temperature; empty: it does not live
    transpiration: Number  # kg/(kg s Pa), 0: none
    freezing_point: Number | None
    specific_heat_above: Number | None  # quoted; None: from the composition
    specific_heat_below: Number | None
    latent_heat: Number | None
    conductivity: Number | None
    density: Number | None
    safe_above_c: Number | None  # chilling or freezing injury below this
    stored: Number
    arrives: Number  # kg/s, mean over the day
    arrival_time: float
    arrival_temperature: Number | None
    pulldown: Number
    chilling_factor: Number  # mean rate over peak rate of the pull-down
    start_temperature: Number | None
    packaging: str
    packaging_mass: Number  # kg per day with what arrives, or kg with what is stored
    piece: tuple[Number, Number, Number]
    pieces: Number | None  # None: from the mass and the density
    exposed: tuple[str, ...]
    shape: Literal["slab", "cylinder", "sphere"] | None
    half_thickness: Number | None
    air_film: Number
    wrap: Number
    limits: tuple[Limit, ...]


class Pack(Record):
    """A mass of coolant; figures of one, times `count`."""

    name: str
    kind: str
    mass: Number
    count: int
    frozen: Number
    start_temperature: Number | None
    place: Literal["around", "above", "among"]
    area: Number | None
    air_film: Number
    melts_from: Number
    melts_to: Number
    latent_heat: Number
    specific_heat_frozen: Number
    specific_heat_melted: Number


class People(Record):
    name: str
    count: Number
    hours: Schedule


class Light(Record):
    name: str
    power: Number
    count: int
    hours: Schedule


class Motor(Record):
    """A motor or a truck: shaft and motor inside, load only, or motor only."""

    name: str
    kind: str
    power: Number
    count: int
    hours: Schedule
    place: Literal["inside", "load only", "motor only"]


class Heater(Record):
    """`power` or, for an underfloor heater, the temperature it is `held_at`."""

    name: str
    kind: Literal["underfloor", "drain", "relief port"]
    power: Number | None
    held_at: Number | None
    hours: Schedule
    to_room: Number


class Ventilation(Record):
    """Fresh air brought in on purpose."""

    name: str
    flow: Number  # m³/s at the state of the air behind
    hours: Schedule
    recovery: Number  # share of the enthalpy difference given back
    dried_to: Number | None  # dew point it is dried to, °C
    neighbour: str


class Quoted(Record):
    """A printed figure that stands in for entries of the account, with its source."""

    name: str
    group: Literal["transmission", "sun", "infiltration", "product", "internal", "equipment"]
    power: Number  # W while it runs
    hours: Schedule
    latent: Number  # share of it that is latent
    replaces: tuple[str, ...]  # entry ids or group names
    source: str


class Machine(Record):
    """Evaporator fans and defrost (own figures or declared defaults), and the chosen unit if any."""

    unit: str | None
    capacity: Number | None
    band: Number
    fans: Number
    fan_power: Number  # of one
    fan_share: Number  # declared default: fan heat as a share of the rest of the load; 0 once fans are given
    defrost: Literal["none", "air", "electric", "hot gas"]
    defrost_at: tuple[float, ...]
    defrost_time: Number
    defrost_power: Number | None  # None: by capacity (declared default share)
    defrost_share: Number  # declared default: daily defrost energy as a share of the rest; 0 once power is given
    defrost_to_room: Number


class Event(Record):
    at: float  # hours: clock time, or hours after the power goes when `after` is true
    after: bool
    what: str
    lasts: Number | None
    door: str | None
    lot: str | None
    pack: str | None
    mass: Number | None
    temperature: Number | None
    neighbour: str | None
    heading: Number | None
    shade: Number | None


class Outage(Record):
    at: float
    lasts: Number | None  # None: to the horizon
    asked: Number
    horizon: Number
    going_on: tuple[str, ...]
    dry_bulb: Number | None
    events: tuple[Event, ...]


class Leg(Record):
    name: str
    lasts: Number
    heading: Number | None  # None: worst
    speed: Number
    dry_bulb: Number | None
    shade: Number
    power: bool


class Delivery(Record):
    lot: str
    mass: Number


class Stop(Record):
    name: str
    after: str | None
    lasts: Number
    open: str | None
    open_for: Number
    deliver: tuple[Delivery, ...]
    pack: str | None
    heading: Number | None
    shade: Number
    power: bool


class Trip(Record):
    starts: float
    dry_bulb: Number | None
    legs: tuple[Leg, ...]
    stops: tuple[Stop, ...]


class Sizing(Record):
    run_hours: Number  # seconds a day
    safety: Number
    tested_with_unit: bool  # ATP: 1.35 instead of 1.75


class Money(Record):
    currency: str | None
    tariff: Number | None  # per J
    insulation_cost: Number | None  # per m³
    years: int
    interest: Number


class Spreads(Record):
    """Half-widths where the file gives no ±, each one draw for the whole project."""

    foam: Number
    ageing: Number
    air: Number
    openings: Number
    ambient: Number  # K
    enthalpy: Number
    freezing_point: Number  # K
    films: Number


class Fit(Record):
    on: bool
    file: str
    date: str
    hash: str
    conductance: Number | None
    leakage: Number | None
    heat_capacity: Number | None


class Project(Record):
    """One project, complete and checked."""

    file: str
    name: str
    units: Literal["SI", "IP"]
    customer: str
    by: str
    notes: str
    site: Site | None
    box: Box
    constructions: Mapping[str, Construction]  # inline ones stand under their owner's key path
    neighbours: Mapping[str, Neighbour]
    faces: Mapping[str, Face]  # all six
    panels: tuple[Panel, ...] = ()
    doors: tuple[Door, ...] = ()
    lots: tuple[Lot, ...] = ()
    packs: tuple[Pack, ...] = ()
    people: tuple[People, ...] = ()
    lights: tuple[Light, ...] = ()
    motors: tuple[Motor, ...] = ()
    trucks: tuple[Motor, ...] = ()
    heaters: tuple[Heater, ...] = ()
    ventilation: tuple[Ventilation, ...] = ()
    quoted: tuple[Quoted, ...] = ()
    machine: Machine
    outage: Outage
    trip: Trip | None = None
    sizing: Sizing
    money: Money
    spread_factors: Spreads
    fit: Fit | None = None
    origins: Mapping[str, Origin]
    spreads: Mapping[str, Spread]
