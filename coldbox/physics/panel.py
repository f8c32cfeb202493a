"""Heat through panels: layers, air spaces, surface films, and the conductance of a wall with its films."""

from __future__ import annotations

from typing import Literal

import numpy as np

from coldbox.physics import constants
from coldbox.physics.number import Number
from coldbox.physics.validity import within

Direction = Literal["up", "horizontal", "down"]  # of the heat flow, not of the wall

_STEFAN_BOLTZMANN = float(constants.STEFAN_BOLTZMANN)
_ZERO = float(constants.ZERO_CELSIUS)

# ISO 6946 (from memory; its rounded tables follow from these, which the published cases check).
# Convection at an inside surface, W/(m²·K).
_INSIDE_CONVECTION = {"up": 5.0, "horizontal": 2.5, "down": 0.7}
# Air spaces: factor x thickness^power with 5 K or less across, factor x difference^exponent x thickness^power above.
_SPACE_SMALL = {"up": 1.95, "horizontal": 1.25, "down": 0.12}
_SPACE_LARGE = {"up": (1.14, 1 / 3), "horizontal": (0.73, 1 / 3), "down": (0.09, 0.187)}
_SPACE_POWER = {"up": 0.0, "horizontal": 0.0, "down": -0.44}
_STILL_AIR = 0.025  # W/(m·K), conduction through the air of a thin space


def foam_conductivity(
    conductivity: Number, temperature_factor: Number, mean_c: Number, ageing: Number = 1.0, moisture: Number = 1.0
) -> Number:
    """Conductivity of an insulation as it serves: at its mean temperature, aged, damp. W/(m·K).

    λ = λ_10 · exp(f_T (t - 10)) · F_a · F_m

    conductivity: λ_10, W/(m·K) declared at a mean temperature of 10 °C. temperature_factor: f_T, 1/K. mean_c: t, °C,
    of the layer. ageing, moisture: multipliers. All broadcast. Valid for means from -60 to 80 °C, else OutOfValidity;
    the standard's own f_T were made for 0 to 30 °C and are carried on beyond.
    Source: ISO 10456, eq. 1 and 2 (from memory).
    >>> round(float(foam_conductivity(0.022, 0.0055, -5.0)), 5)
    0.02026
    """
    within(
        mean_c, -60.0, 80.0, quantity="the mean temperature of a layer", unit="°C",
        method="The temperature conversion of conductivity (ISO 10456)",
    )  # fmt: skip
    return conductivity * np.exp(temperature_factor * (mean_c - 10.0)) * ageing * moisture


def layer_resistance(thickness: Number, conductivity: Number) -> Number:
    """Resistance of a solid layer, m²K/W.

    R = d / λ

    thickness: d, m. conductivity: λ, W/(m·K), above zero, else OutOfValidity. Both broadcast.
    Source: ISO 6946, eq. 3 (number from memory).
    >>> layer_resistance(0.1, 0.025)
    4.0
    """
    within(conductivity, 1e-6, 1e6, quantity="conductivity", unit="W/(m·K)", method="Conduction through a layer")
    return thickness / conductivity


def effective_emissivity(first: Number, second: Number) -> Number:
    """Emissivity between two parallel surfaces, share of a black pair.

    E = 1 / (1/ε_1 + 1/ε_2 - 1)

    first, second: emissivities, 0 < ε <= 1, else OutOfValidity. Both broadcast.
    Source: ISO 6946, annex on air layers (from memory); closed form of two grey infinite planes.
    >>> round(effective_emissivity(0.9, 0.9), 3)
    0.818
    """
    for emissivity in (first, second):
        within(emissivity, 1e-4, 1.0, quantity="emissivity", unit="", method="Radiation between surfaces")
    return 1.0 / (1.0 / first + 1.0 / second - 1.0)


def black_film(mean_c: Number) -> Number:
    """Radiative film coefficient between black surfaces, W/(m²·K).

    h_r0 = 4 σ T³

    mean_c: mean temperature of surface and surroundings, °C; the result has its shape. Valid from -100 to 200 °C, else
    OutOfValidity.
    Source: ISO 6946, annex on surface resistances (from memory); Stefan-Boltzmann law, linearised.
    >>> round(black_film(20.0), 2)
    5.71
    """
    within(mean_c, -100.0, 200.0, quantity="mean temperature", unit="°C", method="The radiative film")
    return 4.0 * _STEFAN_BOLTZMANN * (mean_c + _ZERO) ** 3


def inside_film(direction: Direction, emissivity: Number = 0.9, mean_c: Number = 20.0) -> Number:
    """Resistance between still air and a surface, m²K/W.

    R_s = 1 / (h_c + ε h_r0), h_c = 5.0 upwards, 2.5 horizontal, 0.7 downwards

    direction: of the heat flow. emissivity: ε, 0..1. mean_c: °C. Both broadcast. Errors as `black_film`.
    Source: ISO 6946, annex on surface resistances (from memory); at ε 0.9 and 20 °C it gives 0.10, 0.13 and 0.17.
    >>> round(inside_film("horizontal"), 2)
    0.13
    """
    within(emissivity, 0.0, 1.0, quantity="emissivity", unit="", method="The surface film (ISO 6946)")
    return 1.0 / (_INSIDE_CONVECTION[direction] + emissivity * black_film(mean_c))


def outside_film(wind: Number, emissivity: Number = 0.9, mean_c: Number = 10.0) -> Number:
    """Resistance between an outside surface and the open air, m²K/W.

    R_se = 1 / (4 + 4 v + ε h_r0)

    wind: v beside the surface, m/s, at least 0. emissivity: ε, 0..1. mean_c: °C. All broadcast. Valid for winds up to
    30 m/s, else OutOfValidity.
    Source: ISO 6946, annex on surface resistances (from memory); at 4 m/s it gives 0.04.
    >>> round(outside_film(4.0), 2)
    0.04
    """
    within(wind, 0.0, 30.0, quantity="wind", unit="m/s", method="The outside film (ISO 6946)")
    within(emissivity, 0.0, 1.0, quantity="emissivity", unit="", method="The outside film (ISO 6946)")
    return 1.0 / (4.0 + 4.0 * wind + emissivity * black_film(mean_c))


def airspace_resistance(
    thickness: Number, direction: Direction, emissivity: Number, mean_c: Number = 10.0, difference_k: Number = 5.0
) -> Number:
    """Resistance of an unventilated air space between large surfaces, m²K/W.

    R = 1 / (h_a + E h_r0); h_a the larger of 0.025/d and, with 5 K or less across it, 1.95 upwards, 1.25 horizontal,
    0.12 d^-0.44 downwards; beyond 5 K 1.14 Δ^⅓, 0.73 Δ^⅓ and 0.09 Δ^0.187 d^-0.44.

    thickness: d, m, above 0 up to 0.3. direction: of the heat flow. emissivity: E, effective, of
    `effective_emissivity`: a foil on one side lowers it. mean_c: °C. difference_k: Δ between the faces, K. All
    broadcast. Valid up to 0.3 m, else OutOfValidity.
    Source: ISO 6946, annex on air layers (from memory); its table of unventilated layers follows from it.
    >>> round(airspace_resistance(0.025, "horizontal", 0.818), 2)
    0.18
    """
    within(thickness, 1e-6, 0.3, quantity="the thickness of an air space", unit="m", method="ISO 6946")
    within(emissivity, 0.0, 1.0, quantity="emissivity", unit="", method="The air space (ISO 6946)")
    factor, exponent = _SPACE_LARGE[direction]
    large = factor * np.maximum(difference_k, 5.0) ** exponent
    convection = np.where(np.asarray(difference_k) > 5.0, large, _SPACE_SMALL[direction])
    convection = convection * thickness ** _SPACE_POWER[direction]
    found = 1.0 / (np.maximum(convection, _STILL_AIR / thickness) + emissivity * black_film(mean_c))
    return found if found.ndim else float(found)


def u_value(resistance: Number, inside_film: Number, outside_film: Number) -> Number:
    """Thermal transmittance of a plane wall, W/(m²·K).

    U = 1 / (R_si + R + R_se)

    resistance: R of the layers alone, m²K/W. inside_film, outside_film: surface resistances, m²K/W. All broadcast.
    Source: ISO 6946, eq. 1 and 4 (numbers from memory).
    >>> round(u_value(4.0, 0.13, 0.04), 4)
    0.2398
    """
    return 1.0 / (inside_film + resistance + outside_film)


def conductance(
    area: Number,
    effective_area: Number,
    outside_area: Number,
    resistance: Number,
    inside_film: Number,
    outside_film: Number,
) -> Number:
    """Conductance of a wall of a box from air to air, W/K, with each film on the area it covers.

    UA = 1 / (R_si / A_i + R / A + R_se / A_e)

    area: A_i, inside, m². effective_area: A of the layers, m², with its part of edges and corners. outside_area: A_e,
    m². resistance: R of the layers, m²K/W. inside_film, outside_film: m²K/W. All broadcast.
    Source: resistances in series; the areas after the conduction shape factors of box walls.
    >>> round(conductance(10.0, 10.5, 11.0, 4.0, 0.13, 0.04), 3)
    2.515
    """
    return 1.0 / (inside_film / area + resistance / effective_area + outside_film / outside_area)


def evacuated_extra(edge_psi: Number, outline: Number) -> Number:
    """What creeps around evacuated panels along their envelopes, beside what their middles let pass, W/K.

    ψ · l

    edge_psi: ψ of one edge of one panel, W/(m·K). outline: l, length of all their edges, m; a joint between two panels
    counts twice. Both broadcast.
    Source: EN 17140, annex on the edge effect (from memory).
    >>> evacuated_extra(0.01, 6.0)
    0.06
    """
    return edge_psi * outline


def bridges(psi: Number, length: Number, chi: Number = 0.0, count: Number = 0.0) -> Number:
    """What joints and metal through a wall add to its conductance, W/K.

    ψ · l + χ · n

    psi: ψ of the joint, W/(m·K). length: l, m. chi: χ of one bolt or bracket, W/K. count: n. All broadcast.
    Source: ISO 14683, eq. 1 (from memory).
    >>> bridges(0.02, 10.0, 0.005, 4)
    0.22
    """
    return psi * length + chi * count


def temperature_inside_wall(near_c: Number, far_c: Number, before: Number, total: Number) -> Number:
    """Temperature at some depth of a wall in the steady state, °C: at a surface, or between two layers.

    t = t_near + (t_far - t_near) R_before / R_total

    near_c, far_c: air on the near and the far side, °C. before: R_before, resistance from the near air to that depth,
    its film included, m²K/W. total: R_total from air to air, m²K/W, above zero, else OutOfValidity. All broadcast.
    Source: resistances in series.
    >>> temperature_inside_wall(-20.0, 30.0, 1.0, 5.0)
    -10.0
    """
    within(total, 1e-9, 1e9, quantity="resistance", unit="m²K/W", method="A wall in the steady state")
    return near_c + (far_c - near_c) * before / total
