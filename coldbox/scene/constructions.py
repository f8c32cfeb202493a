"""Constructions as they stand in a wall: each layer's resistance at its temperature, aged and damp, and its mass."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

import numpy as np

from coldbox.errors import OutOfValidity
from coldbox.physics import panel
from coldbox.physics.number import Number
from coldbox.physics.panel import Direction
from coldbox.project.model import Construction, Layer
from coldbox.scene.draws import least, matters
from coldbox.scene.types import Sheet

Mask = bool | np.bool_ | np.ndarray[tuple[Any, ...], np.dtype[np.bool_]]

OUTSIDE_FILM = 0.04
QUOTED_FILMS = 0.13 + OUTSIDE_FILM  # in a quoted u_value, m²K/W (ISO 6946)
# A quoted R or U counts as one layer of foam: rigid polyurethane (ISO 10456, from memory).
FOAM_DENSITY = 35.0
FOAM_SPECIFIC_HEAT = 1400.0


def by_direction(face: str, inwards: Mask, figure: Callable[[Direction], Number]) -> Number:
    """The figure for the direction the heat flows in: down or up through ceiling and floor, level through walls.

    inwards: true where heat flows into the box, one for all draws or one each.
    """
    if face not in ("ceiling", "floor"):
        return figure("horizontal")
    into: Direction = "down" if face == "ceiling" else "up"
    out: Direction = "up" if face == "ceiling" else "down"
    if isinstance(inwards, bool | np.bool_):
        return figure(into if inwards else out)
    if inwards.all():
        return figure(into)
    if not inwards.any():
        return figure(out)
    return np.where(inwards, figure(into), figure(out))


def sheets(
    construction: Construction,
    face: str,
    *,
    inside_c: Number,
    behind_c: Number,
) -> tuple[Sheet, ...]:
    """The layers of a construction between the air inside and the air behind, outside first.

    Resistances that depend on temperature (declared foams, air spaces) are found twice: first with every layer at the
    mean of both sides, then at the temperatures that these resistances give, with films of 0.13 and 0.04 m²K/W.
    inside_c, behind_c: °C, daily means.
    Raises OutOfValidity for a quoted U-value that its films alone would exceed.
    """
    if not construction.layers:
        return (_quoted(construction),)
    layers = construction.layers
    difference = behind_c - inside_c
    mean = 0.5 * (behind_c + inside_c)
    inwards = difference >= 0.0
    found = [_resistance(layer, face, mean, 0.25 * difference, inwards) for layer in layers]
    if any(layer.conductivity is None or matters(layer.temperature_factor) for layer in layers):
        total = QUOTED_FILMS + sum(found, 0.0)
        passed: Number = OUTSIDE_FILM
        again = []
        for layer, resistance in zip(layers, found, strict=True):
            at = panel.temperature_inside_wall(behind_c, inside_c, passed + 0.5 * resistance, total)
            again.append(_resistance(layer, face, at, difference * resistance / total, inwards))
            passed = passed + resistance
        found = again
    return tuple(
        Sheet(
            material=layer.material,
            thickness=layer.thickness,
            resistance=resistance,
            heat_capacity=0.0 if layer.conductivity is None else layer.thickness * layer.density * layer.specific_heat,
            foam=layer.foam,
        )
        for layer, resistance in zip(layers, found, strict=True)
    )


def foam_resistance(construction: Construction, mean_c: float) -> Number:
    """Resistance of a construction's foam alone at a mean temperature, aged and damp, m²K/W.

    A quoted R or U is all foam. mean_c: °C. Source: 10 CFR 431.304, which rates panels by the R of their foam.
    """
    if not construction.layers:
        return _quoted(construction).resistance
    foams = [_resistance(layer, "wall", mean_c, 0.0, True) for layer in construction.layers if layer.foam]
    return sum(foams, 0.0)


def total_resistance(layers: tuple[Sheet, ...]) -> Number:
    """Sum of the layers' resistances, m²K/W, without films."""
    return sum((layer.resistance for layer in layers), 0.0)


def inside_of_foam(layers: tuple[Sheet, ...]) -> Number:
    """Resistance from under the outermost foam to the inside face, m²K/W; of all layers where there is no foam."""
    for place, layer in enumerate(layers):
        if layer.foam:
            return total_resistance(layers[place:])
    return total_resistance(layers)


def _quoted(construction: Construction) -> Sheet:
    if construction.r_value is not None:
        resistance = construction.r_value
    elif construction.u_value is not None:
        resistance = 1.0 / construction.u_value - QUOTED_FILMS
        if least(resistance) <= 0.0:
            raise OutOfValidity(
                "a U-value with films",
                float(np.max(construction.u_value)),
                0.0,
                1.0 / QUOTED_FILMS,
                "W/m²K",
                "ISO 6946",
            )
    else:
        raise OutOfValidity("layers of a construction", 0.0, 1.0, 99.0, "", "A construction without a quoted figure")
    return Sheet(
        material="foam",
        thickness=construction.thickness,
        resistance=resistance,
        heat_capacity=construction.thickness * FOAM_DENSITY * FOAM_SPECIFIC_HEAT,
        foam=True,
    )


def _resistance(layer: Layer, face: str, mean_c: Number, difference_k: Number, inwards: Mask) -> Number:
    if layer.conductivity is None:
        emissivity = layer.emissivity
        assert emissivity is not None, "an air space has an emissivity"
        return by_direction(
            face,
            inwards,
            lambda direction: panel.airspace_resistance(
                layer.thickness, direction, emissivity, mean_c=mean_c, difference_k=np.abs(difference_k)
            ),
        )
    if not matters(layer.temperature_factor):
        # Typed values and plain materials hold at any temperature, also beyond the conversion's range.
        conductivity = layer.conductivity * (1.0 + layer.ageing) * (1.0 + layer.moisture)
        return panel.layer_resistance(layer.thickness, conductivity)
    conductivity = panel.foam_conductivity(
        layer.conductivity, layer.temperature_factor, mean_c, 1.0 + layer.ageing, 1.0 + layer.moisture
    )
    return panel.layer_resistance(layer.thickness, conductivity)
