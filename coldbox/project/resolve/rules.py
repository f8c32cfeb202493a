"""Rules that need the whole box: what fits where, and what is left of the sizes."""

from __future__ import annotations

from collections.abc import Mapping

from coldbox.physics.number import Number
from coldbox.project.model import Box, Door, Face, Panel
from coldbox.project.resolve.reader import Reader
from coldbox.project.sizes import face_size

HAIR = 1e-6  # m, m²: what rounding of sizes may be over


def sizes(reader: Reader, box: Box, inside: Mapping[str, Number | None], thickness: Mapping[str, Number]) -> bool:
    """Whether something is left inside the walls, and no wall is thicker than the shortest inside side."""
    for axis, size in inside.items():
        if size is not None and size <= 0:
            walls = getattr(box, axis) - size
            reader.problem(
                axis,
                f"Of {1000 * getattr(box, axis):g} mm outside nothing is left inside walls of {1000 * walls:g} mm"
                ' together. Make it larger, or write measured = "inside".',
            )
            return False
    known = {axis: size for axis, size in inside.items() if size is not None}
    if len(known) < 3:
        return True
    axis = min(known, key=lambda one: known[one])
    shortest = known[axis]
    for face, thick in thickness.items():
        if thick > shortest + HAIR:
            reader.problem(
                "thickness" if box.k_value is not None else "construction",
                f"The {face} is {1000 * thick:g} mm thick, more than the shortest inside side,"
                f" {axis} {1000 * shortest:g} mm: no method holds for that. Make the box larger or its walls thinner.",
            )
            return False
    return True


def fits(reader: Reader, thing: Panel | Door, inside: Mapping[str, Number | None]) -> None:
    """Whether a panel or a door is smaller than its face."""
    across, upward = face_size(thing.face, inside)
    high = "deep" if thing.face in ("ceiling", "floor") else "high"
    for key, size, most, word in (("width", thing.width, across, "wide"), ("height", thing.height, upward, high)):
        if size is not None and most is not None and size > most + HAIR:
            reader.problem(
                key,
                f"It is {1000 * size:g} mm, and the {thing.face} is only {1000 * most:g} mm {word} inside.",
            )


def cut_out(
    faces: Mapping[str, Face],
    cut: list[tuple[Reader, Panel | Door]],
    inside: Mapping[str, Number | None],
    notch: Number,
) -> None:
    """Whether what is cut out of a face leaves something of it. `notch` is missing from floor and ceiling, m²."""
    for name in faces:
        across, upward = face_size(name, inside)
        here = [(reader, thing) for reader, thing in cut if thing.face == name]
        if across is None or upward is None or not here:
            continue
        whole = across * upward - (notch if name in ("ceiling", "floor") else 0.0)
        taken: Number = 0.0
        for reader, thing in here:
            before = taken
            taken = taken + (thing.area if isinstance(thing, Panel) else thing.width * thing.height * thing.count)
            if taken > whole + HAIR:
                more = f", and {before:.3g} m² are cut out already" if before else ""
                reader.problem("", f"It takes {taken - before:.3g} m² of the {name}, which has {whole:.3g} m²{more}.")
                break


def open_time(reader: Reader, door: Door) -> None:
    """Whether a door is open for no longer than there is time."""
    hours = sum((span.end_h - span.start_h) * span.share for span in door.hours.spans)
    share: Number = 0.0
    for key, rate, each in (("passages", door.passages, door.open_each), ("stood_open", door.stood_open, 1.0)):
        if rate.basis == "day" and rate.per_second > 0 and hours == 0:
            reader.problem(key, "This is spread over the hours of the door, and it has none. Write hours.")
            return
        share += rate.per_second * each * (1.0 if rate.basis == "hour" else 24.0 / hours if hours else 0.0)
    if share > 1.0 + 1e-9:
        reader.problem(
            "passages" if reader.has("passages") else "stood_open",
            f"The door would be open {100 * share:.0f} % of the time within its hours. Write fewer passages, a shorter"
            " open_each, or count for several doors.",
        )


def ground_inside(reader: Reader, face: Face, typed_temperature: bool) -> None:
    """A floor on the ground that no outdoor air borders follows the building above it, not the year outdoors."""
    edge = face.exposed_edge
    if edge is not None and edge == 0 and not typed_temperature:
        reader.problem(
            "exposed_edge",
            "Nothing of this floor's outline borders the outdoors, so the year outdoors says nothing about its ground."
            ' Write ground_temperature in [site], such as "12 °C".',
        )
