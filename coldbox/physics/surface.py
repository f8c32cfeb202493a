"""Films and the heat balance of a surface: sun, long-wave exchange, convection, and what enters the panel."""

from __future__ import annotations

import math
from typing import Literal

import numpy as np

from coldbox.errors import NoRoot
from coldbox.physics import constants, periodic
from coldbox.physics.number import FloatArray, Number
from coldbox.physics.periodic import ComplexArray
from coldbox.physics.validity import within
from coldbox.record import Record

Facing = Literal["vertical", "unstable", "stable"]

_ZERO = float(constants.ZERO_CELSIUS)
_SIGMA = float(constants.STEFAN_BOLTZMANN)
_GRAVITY = float(constants.GRAVITY)
_GAS = float(constants.GAS_CONSTANT_DRY_AIR)
_PRESSURE = float(constants.STANDARD_PRESSURE)
_C_AIR = float(constants.SPECIFIC_HEAT_DRY_AIR)

# Rounds of a fixed point that gains a digit or more in each; reaching the bound means the inputs make no sense.
_ROUNDS = 60
# Rows of 24 hours balanced at once, so that they stay in the processor's cache.
_ROWS = 1024
_BALANCE = "outside surface temperature that balances"


class BalancedSurface(Record):
    """Outside surfaces of a day that repeats, each at the temperature where its heat balances."""

    surface_c: FloatArray  # (…, 24) °C
    inside_w_per_m2: FloatArray  # (…, 24) into the room, per m² of outside surface
    air_c: Number
    convection: Number  # W/(m²K)
    emissivity: Number
    room_c: Number
    panel: periodic.Response

    @property
    def into_w_per_m2(self) -> FloatArray:
        """Heat entering the outside of the panel, (…, 24) W/m²."""
        return periodic.through_day(self.panel.admittance, self.surface_c, self.room_c)

    @property
    def sol_air_c(self) -> FloatArray:
        """Sol-air temperature, (…, 24) °C: the air and surroundings that would send in the same heat without sun.

        t_e = t_s + q / (h_c + ε σ (T_a + T_s)(T_a² + T_s²)), q the heat entering the panel.
        """
        air, own = np.asarray(self.air_c) + _ZERO, self.surface_c + _ZERO
        film = self.convection + self.emissivity * _SIGMA * (air + own) * (air * air + own * own)
        return np.asarray(self.surface_c + self.into_w_per_m2 / film)


class Films(Record):
    """Both films of a steady panel and the surfaces they leave it at."""

    inside_film: FloatArray  # m²K/W
    outside_film: FloatArray
    inside_surface_c: FloatArray
    outside_surface_c: FloatArray


def sky_temperature(air_c: Number, dew_point_c: Number, hour: Number, pressure: Number = _PRESSURE) -> FloatArray:
    """Radiating temperature of a clear sky, °C. An overcast sky is taken at air temperature.

    ε = 0.711 + 0.56 (t_dp / 100) + 0.73 (t_dp / 100)² + 0.013 cos(2π h / 24) + 0.00012 (p - 1000); T_sky = T_a ε^(1/4)

    air_c, dew_point_c: t_dp, °C. hour: h, hours after midnight, sun time. pressure: Pa (p in hPa). All broadcast.
    Dew points from -30 to 35 °C, where the parabola still rises and stays below 1, else OutOfValidity; the
    measurements it was fitted to lie within.
    Source: P. Berdahl and M. Martin, Solar Energy 32, 1984 (from memory).
    """
    within(dew_point_c, -30.0, 35.0, quantity="the dew point", unit="°C", method="Sky temperature (Berdahl and Martin)")
    share = dew_point_c / 100.0
    emissivity = 0.711 + share * (0.56 + 0.73 * share) + 0.00012 * (pressure / 100.0 - 1000.0)
    emissivity = emissivity + 0.013 * np.cos(2.0 * math.pi / 24.0 * hour)
    return np.asarray((air_c + _ZERO) * np.sqrt(np.sqrt(emissivity)) - _ZERO)


def sky_view(tilt: Number) -> Number:
    """Share of what a surface sees that is sky; the rest is ground.

    F_sky = (1 + cos Σ) / 2

    tilt: Σ, degrees, 0 facing up, 180 down; any shape, the result has it.
    Source: view factor of a tilted plane, any heat-transfer textbook.
    """
    return 0.5 * (1.0 + np.cos(np.pi / 180.0 * tilt))


def wind_convection(wind: Number) -> Number:
    """Convection coefficient of an outside surface in wind, W/(m²K).

    h_c = 4 + 4 v

    wind: v beside the surface, m/s, any shape; the result has it. From 0 to 60 m/s, else OutOfValidity.
    Source: ISO 6946, annex on surface resistances (from memory).
    """
    within(wind, 0.0, 60.0, quantity="the wind", unit="m/s", method="Outside film (ISO 6946)")
    return 4.0 + 4.0 * wind


def radiative(emissivity: Number, mean_c: Number) -> Number:
    """Radiation coefficient between a surface and black surroundings, W/(m²K).

    h_r = 4 ε σ T_m³

    emissivity: ε, or the effective one of two surfaces. mean_c: of the two temperatures, °C. Both broadcast.
    Source: Stefan-Boltzmann law, ISO 6946 annex on surface resistances.
    """
    return 4.0 * emissivity * _SIGMA * (mean_c + _ZERO) ** 3


def natural_convection(
    difference_k: Number, length: Number, facing: Facing, mean_c: Number, pressure: Number = _PRESSURE
) -> FloatArray:
    """Convection coefficient of a surface in still air, W/(m²K).

    Ra = g |Δ| L³ / (T_m ν a); h = Nu k / L with
    vertical: Nu = (0.825 + 0.387 Ra^(1/6) / (1 + (0.492 / Pr)^(9/16))^(8/27))²
    unstable (warm and facing up, cold and facing down): Nu = max(0.54 Ra^(1/4), 0.15 Ra^(1/3))
    stable (warm and facing down, cold and facing up): Nu = 0.27 Ra^(1/4)

    difference_k: Δ, surface less air, sign ignored. length: L, m: height of a vertical surface, area over perimeter of
    a horizontal one. mean_c: °C of the film, properties of dry air there. pressure: Pa. All but `facing` broadcast.
    Ra to 1e12 (vertical), 1e11 (unstable), 1e10 (stable), else OutOfValidity. The horizontal laws were measured from
    1e4 and 1e5 up: there the difference is some hundredths of a kelvin, and they are carried on down to zero.
    Source: Churchill and Chu 1975, eq. 9; McAdams, Heat Transmission, 1954, with Lloyd and Moran 1974 for L
    (from memory).
    """
    if facing not in ("vertical", "unstable", "stable"):
        raise ValueError(f"no facing {facing!r}")
    within(length, 1e-6, math.inf, quantity="the length of the surface", unit="m", method="Natural convection")
    kelvin = mean_c + _ZERO
    viscosity = 1.458e-6 * kelvin**1.5 / (kelvin + 110.4)
    conductivity = 2.64638e-3 * kelvin**1.5 / (kelvin + 245.4 * 10.0 ** (-12.0 / kelvin))
    density = pressure / (_GAS * kelvin)
    prandtl = viscosity * _C_AIR / conductivity
    rayleigh = np.asarray(_GRAVITY * np.abs(difference_k) * length**3 / kelvin * prandtl * (density / viscosity) ** 2)
    highest = {"vertical": 1e12, "unstable": 1e11, "stable": 1e10}[facing]
    within(rayleigh, 0.0, highest, quantity="the Rayleigh number", unit="", method=f"Natural convection ({facing})")
    if facing == "vertical":
        nusselt = (0.825 + 0.387 * rayleigh ** (1 / 6) / (1.0 + (0.492 / prandtl) ** (9 / 16)) ** (8 / 27)) ** 2
    elif facing == "unstable":
        nusselt = np.maximum(0.54 * rayleigh**0.25, 0.15 * np.cbrt(rayleigh))
    else:
        nusselt = 0.27 * rayleigh**0.25
    return np.asarray(nusselt * conductivity / length)


def sol_air(air_c: Number, absorbed: Number, film: Number, lost_to_sky: Number = 0.0) -> Number:
    """Sol-air temperature of a surface whose combined film is known beforehand, °C.

    t_e = t_a + α I / h_o - ε ΔR / h_o

    air_c: t_a, °C. absorbed: α I, W/m². film: h_o, W/(m²K), convection and radiation together. lost_to_sky: ε ΔR, what
    the surface would radiate to sky and ground beyond what it would to surroundings at air temperature, W/m². All
    broadcast. Film above 0, else OutOfValidity.
    Source: ASHRAE Fundamentals, Nonresidential cooling and heating load calculations, sol-air temperature (copy).
    >>> round(sol_air(35.0, 510.0, 17.0, 63.0), 2)
    61.29
    """
    within(film, 1e-9, math.inf, quantity="the film", unit="W/(m²K)", method="Sol-air temperature")
    return air_c + (absorbed - lost_to_sky) / film


def balance(
    *,
    air_c: Number,
    sky_c: Number,
    absorbed: Number,
    emissivity: Number,
    sky_share: Number,
    convection: Number,
    room_c: Number,
    panel: periodic.Response,
    ground_c: Number | None = None,
    tolerance_k: float = 1e-9,
) -> BalancedSurface:
    """Temperature of outside surfaces through a day that repeats, and what passes into the room.

    α I + ε σ (F_sky (T_sky⁴ - T_s⁴) + (1 - F_sky)(T_gnd⁴ - T_s⁴)) + h_c (T_a - T_s) = F⁻¹[Y · F(T_s - T_i)]

    Solved by a fixed point: with N the left side, h̄ the day's mean of the film h = h_c + 4 ε σ T_s³, and θ = T_s - T_i,
    T_s grows by (F⁻¹[h̄ / (h̄ + Y) · F(N + h̄ θ)] - h̄ θ) / h until no hour moves by more than tolerance_k. For a light
    panel this is Newton's method; behind heavy masonry each round gains about one digit.

    air_c, sky_c: °C; absorbed: α I, W/m²; ground_c: of ground and surroundings, air temperature if None; (…, 24) or
    steady. emissivity: ε long-wave; sky_share: F_sky; convection: h_c, W/(m²K); room_c: T_i, steady, °C; (…, 1).
    panel: of `response`, behind the outside surface, without an outside film. All broadcast: surfaces stacked on the
    first axis, draws before the hours. Result: BalancedSurface, (…, 24); the mean of inside_w_per_m2 is
    u (mean T_s - T_i) exactly. Convection above 0, emissivity 0 to 1, absorbed sun 0 to 10 kW/m², temperatures from
    -150 to 150 °C, else OutOfValidity; NoRoot when 60 rounds do not reach the tolerance.
    Source: heat balance of a surface, Stefan-Boltzmann law; panel by ISO 13786.
    """
    within(emissivity, 0.0, 1.0, quantity="the emissivity", unit="", method="Surface balance")
    within(convection, 1e-3, math.inf, quantity="the convection", unit="W/(m²K)", method="Surface balance")
    within(absorbed, 0.0, 1e4, quantity="the absorbed sun", unit="W/m²", method="Surface balance")
    around_c = air_c if ground_c is None else ground_c
    for level in (air_c, sky_c, room_c, around_c):
        within(level, -150.0, 150.0, quantity="a temperature", unit="°C", method="Surface balance")
    given: tuple[Number, ...] = (air_c, sky_c, absorbed, emissivity, sky_share, convection, room_c, around_c)
    shape = np.broadcast_shapes(*(np.shape(value) for value in given), (*panel.admittance.shape[:-1], 24))
    surface_c, inside = np.empty(shape), np.empty(shape)
    for part in periodic.blocks(shape, _ROWS):
        air, sky, sun, grey, share, film, room, around = (periodic.cut(value, part) for value in given)
        sky4, around4 = _fourth(sky), _fourth(around)
        emitted = grey * _SIGMA
        gained = sun + emitted * (around4 + share * (sky4 - around4)) + film * (air + _ZERO)
        # First guess: surroundings, sun and room through films of about the right size.
        u = periodic.cut(panel.u, part)
        guess = (film * air + 5.0 * grey * around + u * room + sun) / (film + 5.0 * grey + u)
        theta = np.array(np.broadcast_to(guess - room, inside[part].shape))
        _settle(theta, gained, emitted, film, room + _ZERO, periodic.cut(panel.admittance, part), tolerance_k)
        surface_c[part] = theta + room
        inside[part] = periodic.to_hours(periodic.cut(panel.transfer, part) * periodic.to_harmonics(theta))
    return BalancedSurface(
        surface_c=surface_c,
        inside_w_per_m2=inside,
        air_c=air_c,
        convection=convection,
        emissivity=emissivity,
        room_c=room_c,
        panel=panel,
    )


def _fourth(temperature_c: Number) -> Number:
    squared = (temperature_c + _ZERO) * (temperature_c + _ZERO)
    return squared * squared


def _settle(
    theta: FloatArray,
    gained: Number,
    emitted: Number,
    film: Number,
    room_k: Number,
    admittance: ComplexArray,
    tolerance_k: float,
) -> None:
    """Bring `theta`, surface less room (…, 24) K, to where gains, ε σ T⁴, h_c T and the panel's heat balance."""
    kelvin = theta + room_k
    mean_film = (film + 4.0 * emitted * kelvin * kelvin * kelvin).mean(axis=-1, keepdims=True)
    damped = mean_film / (mean_film + admittance)
    for _ in range(_ROUNDS):
        np.add(theta, room_k, out=kelvin)
        radiated = kelvin * kelvin
        radiated *= kelvin
        radiated *= emitted
        own = radiated + film
        own *= kelvin
        np.subtract(gained, own, out=own)
        held = theta * mean_film
        own += held
        step = periodic.to_hours(damped * periodic.to_harmonics(own))
        step -= held
        radiated *= 4.0
        radiated += film
        step /= radiated
        theta += step
        if max(float(step.max()), -float(step.min())) < tolerance_k:
            return
    raise NoRoot(_BALANCE, float(np.min(theta + room_k)) - _ZERO, float(np.max(theta + room_k)) - _ZERO)


def steady_surface(air_c: Number, room_c: Number, resistance: Number, film: Number) -> Number:
    """Temperature of the surface of a panel that stands in air, in the steady state, °C; held against the dew point.

    t_s = t_a - (t_a - t_i) R_film / (R_film + R)

    air_c: t_a beside the surface; room_c: t_i on the other side, °C. resistance: R, from the surface to the air on
    the other side, that film included; film: R_film of the surface, m²K/W. All broadcast; so does the result.
    Films and resistances above 0, else OutOfValidity.
    Source: one-dimensional steady conduction.
    >>> round(steady_surface(30.0, -20.0, 2.0, 0.125), 2)
    27.06
    """
    for value, low in ((resistance, 0.0), (film, 1e-9)):
        within(value, low, math.inf, quantity="a resistance", unit="m²K/W", method="Steady surface temperature")
    return air_c - (air_c - room_c) * (film / (film + resistance))


def natural_films(
    outside_c: Number,
    inside_c: Number,
    resistance: Number,
    length: Number,
    facing: Facing,
    outside_emissivity: Number,
    inside_emissivity: Number,
    pressure: Number = _PRESSURE,
) -> Films:
    """Films of a panel between two still airs from natural convection and radiation, in the steady state, m²K/W.

    1 / R_film = h(|t_air - t_surface|) + ε σ (T_a + T_s)(T_a² + T_s²) on both sides, with h of `natural_convection`
    and the surfaces where q = (t_outside - t_inside) / (R_o + R + R_i) leaves them

    outside_c, inside_c: air, °C. resistance: R of the layers, m²K/W. length: m, `facing`: as for `natural_convection`;
    both sides of a horizontal panel face alike: a cold room's ceiling is stable on both, its floor unstable.
    outside_emissivity, inside_emissivity: ε against surroundings at air temperature. pressure: Pa. All but `facing`
    broadcast.
    Result: Films, to 1e-9 of each film. Raises OutOfValidity from the correlation, NoRoot when it does not settle.
    Source: `natural_convection`, Stefan-Boltzmann law.
    """
    within(resistance, 0.0, math.inf, quantity="the panel's resistance", unit="m²K/W", method="Natural films")
    difference = np.asarray(outside_c - inside_c)
    warm, cold = np.asarray(outside_c + _ZERO), np.asarray(inside_c + _ZERO)
    outer, inner = np.asarray(0.13), np.asarray(0.13)
    for _ in range(_ROUNDS):
        flow = difference / (outer + resistance + inner)
        out_drop, in_drop = flow * outer, flow * inner
        was = outer, inner
        outer = 1.0 / _still_film(warm, -out_drop, length, facing, outside_emissivity, pressure)
        inner = 1.0 / _still_film(cold, in_drop, length, facing, inside_emissivity, pressure)
        if bool(np.all(np.abs(outer - was[0]) <= 1e-9 * outer) and np.all(np.abs(inner - was[1]) <= 1e-9 * inner)):
            return Films(
                inside_film=inner,
                outside_film=outer,
                inside_surface_c=inside_c + in_drop,
                outside_surface_c=outside_c - out_drop,
            )
    raise NoRoot("films that agree with the temperatures", float(np.min(inside_c)), float(np.max(outside_c)))


def _still_film(
    air_k: FloatArray, rise: FloatArray, length: Number, facing: Facing, emissivity: Number, pressure: Number
) -> FloatArray:
    """Convection and radiation of a surface `rise` K above its air, W/(m²K)."""
    own = air_k + rise
    convection = natural_convection(rise, length, facing, air_k + 0.5 * rise - _ZERO, pressure)
    return np.asarray(convection + emissivity * _SIGMA * (air_k + own) * (air_k * air_k + own * own))
