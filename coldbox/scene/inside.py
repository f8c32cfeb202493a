"""What people give off, and what of a motor's power ends in the room."""

from __future__ import annotations

import numpy as np

from coldbox.physics.number import Number
from coldbox.project.model import Motor
from coldbox.tables.load import row, rows


def heat_of_a_person(room_c: Number) -> tuple[Number, Number, str]:
    """Heat of one person at work in a cold room, its latent part, and the source's key.

    q = a - b t, the handbook's line; the latent share falls with the temperature (table `people`).
    room_c: °C, any shape. Returns W, W and text. Source: ASHRAE Handbook, Refrigeration, Refrigerated-facility loads.
    """
    line = row("people", "heat by room temperature")
    total = float(str(line["at_zero_w"])) - float(str(line["fall_w_per_k"])) * room_c
    table = [at for at in rows("people").values() if "latent_share" in at]
    shares = sorted((float(str(at["at_c"])), float(str(at["latent_share"]))) for at in table)
    latent = np.interp(room_c, [at for at, _ in shares], [share for _, share in shares])
    return total, total * latent, str(line["source"])


def share_inside(motor: Motor) -> tuple[Number, str]:
    """Share of the power drawn that ends in the room: all, what the shaft carries in, or what the motor loses."""
    if motor.place == "inside":
        return 1.0, "as-given"
    table = rows("motors")
    sizes = sorted((float(str(size["up_to_w"])), float(str(size["efficiency"]))) for size in table.values())
    drawn = [shaft / efficiency for shaft, efficiency in sizes]  # the table goes by power at the shaft
    efficiency = np.interp(motor.power, drawn, [value for _, value in sizes])
    source = str(next(iter(table.values()))["source"])
    return (efficiency if motor.place == "load only" else 1.0 - efficiency), source
