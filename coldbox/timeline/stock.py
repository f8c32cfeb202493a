"""Goods, coolants and fittings for the timeline: their size, films, curves and conductivities."""

from __future__ import annotations

from typing import Final, Literal

import numpy as np

from coldbox.physics import food
from coldbox.physics.number import Number
from coldbox.project.model import Lot, Pack
from coldbox.scene.goods import ChenCurve, Goods, QuotedCurve, SensibleCurve, goods
from coldbox.tables import load
from coldbox.timeline.types import ConductivityPart, CurvePart, LotPart, PackPart

# Where neither a composition nor a figure tells: watery goods.
USUAL_CONDUCTIVITY: Final = 0.5  # W/mK
USUAL_DENSITY: Final = 900.0  # kg/m³
COLDEST_FIT_C: Final = -39.0  # Choi and Okos's components reach down to -40 °C
FIT_POINTS: Final = 12
FROZEN_K: Final = 0.5  # so far below a plateau goods are frozen
NO_HEAT: Final = 1e-9  # W/kg for a point of respiration at 0, which has no logarithm

# Steel racks and trolleys: sheet of 2 mm, both sides in the air.
STEEL_SPECIFIC_HEAT: Final = 480.0  # J/kgK
STEEL_AREA: Final = 2.0 / (7850.0 * 0.002)  # m²/kg
STEEL_FILM: Final = 6.0  # W/m²K

# Coolant whose area nobody gives: plates of this thickness with both faces in the air, or lumps with all six.
PLATE_AROUND: Final = 0.025  # m, lining the box
PLATE_ABOVE: Final = 0.05
LUMP_AMONG: Final = 0.05
OWN_DENSITY: Final = 1000.0  # kg/m³ of a coolant that no table knows

Shape = Literal["slab", "cylinder", "sphere"]
_AXES: Final = {"slab": 1.0, "cylinder": 2.0, "sphere": 3.0}


class Unknown:
    """What had to be assumed, as sentences."""

    def __init__(self) -> None:
        self.said: list[str] = []

    def say(self, text: str) -> None:
        """Keeps a sentence once."""
        if text not in self.said:
            self.said.append(text)


def packed_density(lot: Lot, kind: Goods, whole: Number, at_c: Number, unknown: Unknown) -> Number:
    """kg/m³ of the goods as they lie: by the number of pieces, else as given, else from the composition."""
    length, width, height = lot.piece
    if lot.pieces is not None and np.all(np.greater(whole, 0.0)):
        return whole / (lot.pieces * length * width * height)
    cold = np.clip(at_c, COLDEST_FIT_C, 100.0)
    found = kind.density(cold)
    if found is None:
        unknown.say(f"the density of {lot.name} is not told: {USUAL_DENSITY:g} kg/m³, as of watery goods")
        return USUAL_DENSITY
    return found


def half_thickness(lot: Lot) -> tuple[Shape, Number]:
    """Shape and half thickness (or radius), m: as given, else volume over the surface that sees air.

    A cylinder or sphere without a half thickness gets the radius that has this ratio: d = n V / S, n = 1, 2, 3.
    """
    shape: Shape = lot.shape or "slab"
    if lot.half_thickness is not None:
        return shape, lot.half_thickness
    length, width, height = lot.piece
    seen: Number = 0.0
    if "top" in lot.exposed:
        seen = seen + length * width
    if "bottom" in lot.exposed:
        seen = seen + length * width
    if "sides" in lot.exposed:
        seen = seen + 2.0 * height * (length + width)
    return shape, _AXES[shape] * length * width * height / seen


def lot_part(
    lot: Lot, label: str, mass: Number, whole: Number, start_c: Number, unknown: Unknown, *, enthalpy: Number = 1.0,
    films: Number = 1.0,
) -> LotPart:  # fmt: skip
    """A body of goods.

    mass: kg at the start; whole: kg that `pieces` belongs to. enthalpy, films: factors on its heat contents and on its
    film. Packaging counts with the goods, by the kg.
    """
    kind = goods(lot)
    shape, half = half_thickness(lot)
    curve = curve_part(kind)
    packed = packaging_per_kg(lot)
    return LotPart(
        name=label,
        mass=mass,
        start_c=start_c,
        shape=shape,
        half_thickness=half,
        density=packed_density(lot, kind, whole, start_c, unknown),
        film=1.0 / (1.0 / (films * lot.air_film) + lot.wrap),
        curve=curve.replace(
            specific_heat_above=enthalpy * (curve.specific_heat_above + packed),
            specific_heat_below=enthalpy * (curve.specific_heat_below + packed),
            latent_heat=enthalpy * curve.latent_heat,
        ),
        conductivity=conductivity_part(kind, unknown, lot.name),
        respiration_at_c=kind.at_c,
        respiration_w_per_kg=tuple(np.maximum(heat, NO_HEAT) for heat in kind.w_per_kg),
    )


def packaging_per_kg(lot: Lot) -> Number:
    """Heat capacity of the packaging that a kg of the lot comes with, J/kgK."""
    goods_kg = lot.arrives * 86400.0 if np.any(np.greater(lot.arrives, 0.0)) else lot.stored
    if lot.packaging == "none" or not np.all(np.greater(goods_kg, 0.0)):
        return 0.0
    return lot.packaging_mass * float(str(load.row("packaging", lot.packaging)["specific_heat"])) / goods_kg


def curve_part(kind: Goods) -> CurvePart:
    """The goods' own curve of heat content. Without a freezing point one specific heat serves at every temperature."""
    curve = kind.curve
    if isinstance(curve, ChenCurve):
        solids = 1.0 - curve.water
        return CurvePart(
            chen=True,
            freezing_point_c=curve.freezing_point_c,
            specific_heat_above=curve.specific_heat_above,
            specific_heat_below=1550.0 + 1260.0 * solids,
            latent_heat=food.FUSION * (curve.water - food.bound_water(curve.protein)),
            melts_over_k=0.0,
        )
    if isinstance(curve, QuotedCurve):
        return CurvePart(
            chen=False,
            freezing_point_c=curve.freezing_point_c,
            specific_heat_above=curve.specific_heat_above,
            specific_heat_below=curve.specific_heat_below,
            latent_heat=curve.latent_heat,
            melts_over_k=food.FREEZES_OVER_K,
        )
    assert isinstance(curve, SensibleCurve), "three curves there are"
    return CurvePart(
        chen=False,
        freezing_point_c=0.0,
        specific_heat_above=curve.specific_heat,
        specific_heat_below=curve.specific_heat,
        latent_heat=0.0,
        melts_over_k=food.FREEZES_OVER_K,
    )


def conductivity_part(kind: Goods, unknown: Unknown, name: str) -> ConductivityPart:
    """Conductivity by the thawed share r: as given, or fitted to Levy's from -39 °C to the freezing point.

    Chen's curve: least squares of k - k(r = 1) in (r - 1) and (r - 1)², exact where the goods are thawed. A plateau:
    thawed and frozen. Above freezing the conductivity stays that at the freezing point.
    """
    if kind.quoted_conductivity is not None or kind.composition is None:
        warm: Number | None = kind.quoted_conductivity
        if warm is None:
            unknown.say(f"the conductivity of {name} is not told: {USUAL_CONDUCTIVITY:g} W/mK, as of watery goods")
            warm = USUAL_CONDUCTIVITY
        return ConductivityPart(warm=warm, linear=0.0, square=0.0)
    point = kind.freezing_point_c
    if point is None:
        return ConductivityPart(warm=_known(kind, 5.0), linear=0.0, square=0.0)
    thawed = _known(kind, point)
    if not isinstance(kind.curve, ChenCurve):
        frozen = _known(kind, np.maximum(point - FROZEN_K, COLDEST_FIT_C))
        return ConductivityPart(warm=thawed, linear=thawed - frozen, square=0.0)
    least = point / COLDEST_FIT_C
    s2 = s3 = s4 = y1 = y2 = np.zeros(())
    for step in range(1, FIT_POINTS + 1):
        # Evenly in r: near the freezing point, where most of the change is, as well as in the deep cold.
        r = 1.0 - (1.0 - least) * step / FIT_POINTS
        x, y = r - 1.0, _known(kind, point / r) - thawed
        s2, s3, s4 = s2 + x**2, s3 + x**3, s4 + x**4
        y1, y2 = y1 + x * y, y2 + x**2 * y
    whole = s2 * s4 - s3 * s3
    return ConductivityPart(warm=thawed, linear=(y1 * s4 - y2 * s3) / whole, square=(y2 * s2 - y1 * s3) / whole)


def _known(kind: Goods, temperature_c: Number) -> Number:
    found = kind.conductivity(temperature_c)
    assert found is not None, "a composition tells the conductivity"
    return found


def pack_part(
    pack: Pack, room_c: Number, inside_area: Number, floor_area: Number, *, there: bool, films: Number = 1.0
) -> PackPart:
    """A coolant as one lump. there: whether it is in the box at the start."""
    mass = pack.mass * pack.count
    area = pack.area * pack.count if pack.area is not None else usual_area(pack, inside_area, floor_area)
    start = room_c if pack.start_temperature is None else pack.start_temperature
    return PackPart(
        name=pack.name,
        mass=mass if there else 0.0 * mass,
        start_c=start,
        frozen=pack.frozen,
        exchange=films * pack.air_film * area,
        whole_mass=mass,
        curve=CurvePart(
            chen=False,
            freezing_point_c=pack.melts_to,
            specific_heat_above=pack.specific_heat_melted,
            specific_heat_below=pack.specific_heat_frozen,
            latent_heat=pack.latent_heat,
            melts_over_k=np.subtract(pack.melts_to, pack.melts_from),
        ),
        sublimes=sublimes(pack),
    )


def sublimes(pack: Pack) -> bool:
    """Whether it turns into gas: dry ice."""
    return pack.kind != "own" and bool(load.row("packs", pack.kind).get("sublimes", False))


def usual_area(pack: Pack, inside_area: Number, floor_area: Number) -> Number:
    """m² of all of a coolant that see air, by its mass and its place.

    Around: plates of 25 mm, both faces, at most twice the box's inside. Above: plates of 50 mm, both faces, at most
    twice the ceiling. Among: lumps of 50 mm. Common practice, from memory.
    """
    density = OWN_DENSITY
    if pack.kind != "own":
        density = float(str(load.row("packs", pack.kind).get("density", OWN_DENSITY)))
    volume = pack.mass * pack.count / density
    if pack.place == "around":
        return np.minimum(2.0 * volume / PLATE_AROUND, 2.0 * inside_area)
    if pack.place == "above":
        return np.minimum(2.0 * volume / PLATE_ABOVE, 2.0 * floor_area)
    return 6.0 * volume / LUMP_AMONG


def fittings_part(mass: Number, room_c: Number, films: Number = 1.0) -> PackPart:
    """Steel racks and the like, which warm and cool with the air."""
    return PackPart(
        name="fittings",
        mass=mass,
        start_c=room_c,
        frozen=0.0,
        exchange=films * STEEL_FILM * STEEL_AREA * mass,
        whole_mass=mass,
        curve=CurvePart(
            chen=False,
            freezing_point_c=0.0,
            specific_heat_above=STEEL_SPECIFIC_HEAT,
            specific_heat_below=STEEL_SPECIFIC_HEAT,
            latent_heat=0.0,
            melts_over_k=0.0,
        ),
        sublimes=False,
    )
