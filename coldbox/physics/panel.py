"""Heat through panels: layers, air spaces, surface films, and the conductance of a wall with its films."""

from __future__ import annotations

from coldbox.physics.number import Number


def u_value(resistance: Number, inside_film: Number, outside_film: Number) -> Number:
    """Thermal transmittance of a plane wall, W/(m²·K).

    U = 1 / (R_si + R + R_se)

    resistance: of the layers alone, m²K/W. inside_film, outside_film: surface resistances, m²K/W. All broadcast.
    Source: ISO 6946, eq. 1 and 4 (numbers from memory).
    >>> round(u_value(4.0, 0.13, 0.04), 4)
    0.2398
    """
    return 1.0 / (inside_film + resistance + outside_film)
