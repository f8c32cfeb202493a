"""Lots and packs: products of the table, of the shop library, by composition or by quoted figures."""

from __future__ import annotations

import math
from collections.abc import Mapping
from typing import Any

from coldbox.errors import UnknownName
from coldbox.project.model import Box, Composition, Limit, Lot, Pack, RespirationPoint
from coldbox.project.raw import Block
from coldbox.project.resolve.body import limits, listed
from coldbox.project.resolve.reader import Reader, Work, hint
from coldbox.project.resolve.rows import NOTHING, row, row_or_problem
from coldbox.tables import load
from coldbox.units.clock import Rate

PARTS = ("water", "protein", "fat", "carbohydrate", "fibre", "ash")
QUOTED = ("specific_heat_above", "specific_heat_below", "latent_heat", "freezing_point")
USUAL_CHILLING = 0.7  # the middle of what the handbook prints, 0.56 to 0.8 by product


def lot(work: Work, block: Block, name: str, box: Box) -> Lot:
    """One lot, complete."""
    reader = Reader(work, "lots", block.path, block)
    copied = any(key in block.values for key in ("product", *QUOTED)) or "composition" in block.children
    reader.on_library("goods", copied)
    product = reader.given("product")
    found: Mapping[str, Any] = NOTHING
    if isinstance(product, str):
        product, found = _product(reader, product)
    composition = _composition(reader, found, product)
    freezing_point = _from(reader, found, "freezing_point", "freezing_point_c", "{:g} °C", product)
    stored, arrives = _amounts(reader)
    packaging, packaging_mass = _packaging(reader, arrives)
    made = Lot(
        name=name,
        product=product if isinstance(product, str) else None,
        composition=composition,
        respiration=_respiration(reader, found, product),
        transpiration=_from(reader, found, "transpiration", "transpiration", "", product) or 0.0,
        freezing_point=freezing_point,
        specific_heat_above=_from(reader, found, "specific_heat_above", "specific_heat_above", "{:g} J/kgK", product),
        specific_heat_below=_from(reader, found, "specific_heat_below", "specific_heat_below", "{:g} J/kgK", product),
        latent_heat=_from(reader, found, "latent_heat", "latent_heat", "{:g} J/kg", product),
        conductivity=_from(reader, found, "conductivity", "conductivity", "{:g} W/mK", product),
        density=_from(reader, found, "density", "density", "{:g} kg/m³", product),
        safe_above_c=_from(reader, found, "safe_above", "safe_above_c", "{:g} °C", product),
        stored=stored,
        arrives=arrives,
        **_arrival(reader, found, product, arrives),
        start_temperature=_start(reader, box),
        packaging=packaging,
        packaging_mass=packaging_mass,
        piece=tuple(reader.value("piece")),
        pieces=_count(reader.given("pieces")),
        exposed=listed(reader.value("exposed")),
        shape=reader.given("shape"),
        half_thickness=reader.given("half_thickness"),
        air_film=reader.value("air_film"),
        wrap=reader.value("wrap"),
        limits=_limits(reader, found, product),
    )
    _known_enough(reader, made, box, bool(found))
    return made


def _product(reader: Reader, product: str) -> tuple[str, Mapping[str, Any]]:
    """The product and its row in the table. Goods of the shop library are found by their name too, and may name a
    product in turn; one that stands with its own composition or figures is only a name."""
    try:
        return product, row("foods", product)
    except UnknownName:
        if reader.children("composition", "lots.composition") or any(reader.has(key) for key in QUOTED):
            return product, NOTHING
        library = reader.work.library
        try:
            block = library.row("goods", product)
        except UnknownName:
            names = (*load.names("foods"), *load.aliases("foods"), *library.names("goods"))
            reader.problem(
                "product",
                f'"{product}" is neither among the foods nor in the shop library.{hint(product, names)}'
                " Or give its composition, or its specific heats.",
            )
            return product, {"missing": True}
        reader.on(block, library.said("goods", block))
        named = block.values.get("product")
        return (product, NOTHING) if named is None else _of_library(reader, str(named.value))


def _of_library(reader: Reader, product: str) -> tuple[str, Mapping[str, Any]]:
    """The row of a product that a row of the library names."""
    return product, row_or_problem(reader, "product", "foods", product, "The shop library names it.")


def _from(reader: Reader, found: Mapping[str, Any], key: str, column: str, form: str, product: Any) -> Any:
    """The value given, else that of the product; None where neither has it."""
    value = found.get(column)
    if value is None or reader.has(key):
        return reader.given(key)
    return reader.fall(key, value, form.format(value) if form else f"{value:g}", f"foods table, {product}", "table")


def _composition(reader: Reader, found: Mapping[str, Any], product: Any) -> Composition | None:
    blocks = reader.children("composition", "lots.composition")
    if not blocks:
        if "water" not in found:
            return None
        reader.fall("composition", None, f"{100 * found['water']:g} % water", f"foods table, {product}", "table")
        return Composition(**{part: found[part] for part in PARTS})
    parts = blocks[0]
    shares = {part: parts.given(part) for part in PARTS}
    filled = {part: 0.0 if share is None else share for part, share in shares.items()}
    total = sum(filled.values()) - filled["fibre"]
    said = reader.work.said_about(parts.path)
    if not said and abs(total - 1.0) > 0.01 + 1e-9:
        parts.problem(
            "",
            f"The shares without fibre sum to {100 * total:.4g} %; they must make 100 %, within 1 %."
            " (Fibre is part of the carbohydrate.)",
        )
    if not said and filled["fibre"] > filled["carbohydrate"] + 1e-9:
        parts.problem(
            "fibre",
            f"Fibre is part of the carbohydrate: {100 * filled['fibre']:g} % cannot be more than"
            f" {100 * filled['carbohydrate']:g} %.",
        )
    return Composition(**filled)


def _respiration(reader: Reader, found: Mapping[str, Any], product: Any) -> tuple[RespirationPoint, ...]:
    points = reader.children("respiration", "lots.respiration")
    if points:
        pairs = [(point.given("at"), point.given("heat")) for point in points]
        complete = sorted(pair for pair in pairs if None not in pair)
        if len(points) < 2:
            reader.problem("respiration", "Respiration needs two temperatures at least: between them it is drawn.")
        elif any(one[0] == other[0] for one, other in zip(complete, complete[1:], strict=False)):
            reader.problem("respiration", f"Two of these points are at {_twice(complete):g} °C: keep one of them.")
        return tuple(RespirationPoint(at_c=at, w_per_kg=heat) for at, heat in complete)
    given = found.get("respiration", ())
    if given:
        reader.fall("respiration", None, f"{len(given)} points", f"foods table, {product}", "table")
    return tuple(RespirationPoint(at_c=at, w_per_kg=heat) for at, heat in given)


def _twice(pairs: list[tuple[Any, Any]]) -> Any:
    return next(one[0] for one, other in zip(pairs, pairs[1:], strict=False) if one[0] == other[0])


def _amounts(reader: Reader) -> tuple[Any, Any]:
    if not reader.has("stored") and not reader.has("arrives"):
        work = reader.work
        if not work.said(f"{reader.path}.stored") and not work.said(f"{reader.path}.arrives"):
            reader.missing("stored", 'Write what is stored, such as "800 kg", or what arrives, such as "200 kg/day".')
    arrives = reader.quiet("arrives")
    return reader.quiet("stored"), getattr(arrives, "per_second", arrives)


def _arrival(reader: Reader, found: Mapping[str, Any], product: Any, arrives: Any) -> dict[str, Any]:
    """When and how warm it comes in; all of it without effect where nothing arrives."""
    takes = reader.value if arrives else reader.quiet
    temperature = reader.given("arrival_temperature")
    if arrives and temperature is None:
        reader.missing("arrival_temperature", 'It arrives: write how warm it comes in, such as "12 °C".')
        temperature = math.nan
    chilling = reader.given("chilling_factor")
    if chilling is None:
        chilling = found.get("chilling_factor", USUAL_CHILLING)
        if arrives and "chilling_factor" in found:
            reader.fall("chilling_factor", chilling, f"{100 * chilling:g} %", f"foods table, {product}", "table")
        elif arrives:
            reader.fall("chilling_factor", chilling, f"{100 * chilling:g} %", "in the middle of the handbook's values")
    return {
        "arrival_time": takes("arrival_time"),
        "arrival_temperature": temperature,
        "pulldown": takes("pulldown"),
        "chilling_factor": chilling,
    }


def _start(reader: Reader, box: Box) -> Any:
    if box.powered:
        return reader.given("start_temperature")  # else from the day before
    text = f"{box.temperature:g} °C"
    return reader.fall("start_temperature", box.temperature, text, "the wanted one; nothing cools this box before")


def _packaging(reader: Reader, arrives: Any) -> tuple[str, Any]:
    """The packaging and its mass: kg a day where goods arrive, else kg in all."""
    word = reader.quiet("packaging")
    mass = reader.quiet("packaging_mass")
    if not reader.has("packaging_mass"):
        if word != "none":
            reader.missing("packaging_mass", f'Write the mass of the {word}, such as "45 kg" or "45 kg/day".')
        return word, 0.0
    if word == "none":
        reader.problem("packaging_mass", 'A mass of packaging needs its kind, such as packaging = "cardboard".')
    entered = reader.typed.get("packaging_mass") or reader.beneath["packaging_mass"]
    daily = entered.kind in ("mass_rate", "mass_per_day") or isinstance(mass, Rate)
    if daily and not arrives:
        reader.problem(
            "packaging_mass", 'Nothing arrives each day: write the mass of all the packaging, such as "45 kg".'
        )
    if not daily and arrives and mass:
        reader.problem("packaging_mass", 'This lot arrives: write what comes with it each day, such as "45 kg/day".')
    return word, getattr(mass, "per_second", mass) * 86400.0 if daily else mass


def _count(value: Any) -> Any:
    return None if value is None else float(value)


def _limits(reader: Reader, found: Mapping[str, Any], product: Any) -> tuple[Limit, ...]:
    own = limits(reader)
    if own or reader.work.said_about(f"{reader.path}.limits"):
        return own
    made = []
    for one in found.get("limit", ()):
        side = "above" if "above" in one else "below"
        made.append(Limit(side=side, limit_c=float(one[side]), where=one["where"], allowed_s=0.0))  # type: ignore[arg-type]
    if made:
        text = ", ".join(f"{one.where} not {one.side} {one.limit_c:g} °C" for one in made)
        reader.fall("limits", None, text, f"foods table, {product}", "table")
    return tuple(made)


def _known_enough(reader: Reader, lot: Lot, box: Box, in_table: bool) -> None:
    """Whether its heat can be computed: a composition with a freezing point, or the figures that count here."""
    point = lot.freezing_point
    if point is not None and point > 0 and lot.composition is not None and lot.composition.water > 0:
        reader.problem(
            "freezing_point",
            f'Water in food freezes at 0 °C or below, never at {point:g} °C. Write it such as "-0.5 °C".',
        )
    if in_table or reader.work.said_about(f"{reader.path}.composition") or reader.work.said(f"{reader.path}.product"):
        return
    if lot.composition is not None:
        if lot.freezing_point is None and lot.specific_heat_above is None and lot.composition.water > 0:
            reader.missing(
                "freezing_point", 'A composition needs the temperature where it begins to freeze: "-0.5 °C".'
            )
        return
    if lot.specific_heat_above is None and lot.specific_heat_below is None:
        if not any(reader.work.said(f"{reader.path}.{key}") for key in QUOTED):
            reader.missing("product", "Write a product of the table, a composition, or specific_heat_above.")
        return
    coldest = min(at for at in (box.temperature, lot.arrival_temperature, lot.start_temperature) if at is not None)
    warmest = max(at for at in (box.temperature, lot.arrival_temperature, lot.start_temperature) if at is not None)
    if lot.specific_heat_above is not None and coldest >= (0.0 if point is None else point):
        return
    if (
        lot.specific_heat_below is not None
        and lot.specific_heat_above is None
        and point is not None
        and warmest <= point
    ):
        return
    for key in QUOTED:
        if getattr(lot, key) is None:
            reader.missing(
                key, "Between the temperatures of this lot it may freeze: all four quoted figures are needed."
            )


def pack(work: Work, block: Block, name: str, box: Box) -> Pack:
    """One pack, complete."""
    reader = Reader(work, "packs", block.path, block)
    reader.on_library("packs", "kind" in block.values)
    kind = reader.given("kind") or ""
    if not kind:
        reader.missing("kind", "Write ice, eutectic, dry ice or own.")
    found: Mapping[str, Any] = NOTHING
    if kind and kind != "own":
        found = row("packs", kind)
    source = f"packs table, {kind}"
    figures = {}
    for key, unit in (
        ("melts_from", "°C"),
        ("melts_to", "°C"),
        ("latent_heat", "J/kg"),
        ("specific_heat_frozen", "J/kgK"),
        ("specific_heat_melted", "J/kgK"),
    ):
        if key in found:
            figures[key] = reader.fall(key, found[key], f"{found[key]:g} {unit}", source, "table")
        elif kind == "own":
            figures[key] = reader.need(
                key, "A pack of your own needs its melting range, latent heat and specific heats."
            )
        else:
            figures[key] = math.nan
    if figures["melts_from"] > figures["melts_to"]:
        reader.problem(
            "melts_from" if reader.has("melts_from") else "melts_to",
            f"It cannot begin to melt at {figures['melts_from']:g} °C and be melted at {figures['melts_to']:g} °C:"
            " melts_from is the lower one.",
        )
    return Pack(
        name=name,
        kind=kind,
        mass=reader.need("mass", 'Write the mass of one, such as "5 kg".'),
        count=reader.value("count"),
        frozen=reader.value("frozen"),
        start_temperature=_pack_start(reader, box, found, figures["melts_from"]),
        place=reader.value("place"),
        area=reader.given("area"),
        air_film=reader.value("air_film"),
        **figures,
    )


def _pack_start(reader: Reader, box: Box, found: Mapping[str, Any], melts_from: float) -> Any:
    """How cold a pack starts: dry ice where it sublimes, another as cold as the room, or as it melts where that is
    colder and the pack is frozen."""
    if reader.has("start_temperature"):
        return reader.given("start_temperature")
    if found.get("sublimes"):
        return reader.fall("start_temperature", melts_from, f"{melts_from:g} °C", "dry ice is as cold as that")
    if box.temperature > melts_from and reader.quiet("frozen") > 0:
        return reader.fall(
            "start_temperature", melts_from, f"{melts_from:g} °C", "frozen, in a room warmer than it melts"
        )
    if not box.powered:
        return reader.fall("start_temperature", box.temperature, f"{box.temperature:g} °C", "the room's")
    return None
