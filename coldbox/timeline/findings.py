"""What a careful colleague would say of a run: gas, food, medicine. Advice that defers to those who decide."""

from __future__ import annotations

from collections.abc import Iterator
from typing import Final

import numpy as np

from coldbox.physics.number import FloatArray
from coldbox.scene.finding import Figure, Finding
from coldbox.timeline.course import clock, middle
from coldbox.timeline.outcome import HOUR_S, PPM, Outcome, first_of
from coldbox.units import show

# Carbon dioxide by volume: where it is dangerous at once, for a quarter of an hour, and for a workday.
GAS: Final = (
    (40_000.0, "danger", "immediately dangerous to life", "NIOSH IDLH"),
    (30_000.0, "danger", "the most for 15 minutes", "ACGIH TLV-STEL"),
    (5_000.0, "caution", "the most over a workday", "OSHA PEL"),
)  # fmt: skip
STANDS_IN_M3: Final = 2.0  # a box a person can stand in; common practice
FREEZING_C: Final = 0.0


def findings(found: Outcome) -> tuple[Finding, ...]:
    """Everything about this run, the middle of its draws."""
    return (*_gas(found), *_still_warm(found), *_spoiling(found), *_vaccine(found))


def _gas(found: Outcome) -> Iterator[Finding]:
    gas = found.carbon_dioxide()
    if gas is None:
        return
    path = f"packs.{found.run.rig.dry_ice[0]}"
    if middle(found.run.rig.scene.body.volume) >= STANDS_IN_M3:
        inside = found.through_time().carbon_dioxide_ppm
        said = None if inside is None else _too_much(found, inside, "in the room", path)
        if said is not None:
            yield said
    else:
        yield Finding(
            level="caution",
            id="carbon-dioxide-inside",
            text=f"inside the box carbon dioxide reaches {_share(gas.box_ppm)}: open it where air moves, face away",
            rule="NIOSH IDLH 40 000 ppm",
            path=path,
        )
    if gas.around is not None:
        said = _too_much(found, found.around()[1], f"around it, in {gas.around},", path)
        if said is not None:
            yield said
    else:
        yield Finding(
            level="caution",
            id="carbon-dioxide-around",
            text=(
                Figure(value=gas.gas_kg, kind="mass"),
                " of dry ice turns into gas where the box stands: tell the volume and the air change of that room or"
                " cab to see how much carbon dioxide it comes to, and ventilate it",
            ),
            rule="OSHA PEL 5 000 ppm",
            path="neighbours",
        )


def _too_much(found: Outcome, ppm: FloatArray, where: str, path: str) -> Finding | None:
    """The highest of the limits that a course of concentrations passes: from when, and the most it comes to."""
    most = int(np.argmax(ppm))
    for limit, level, meaning, rule in GAS:
        if ppm[most] >= limit:
            keep_out = "keep out" if level == "danger" else "stay no longer than you must"
            hours = found.hours(found.trace.times_s)
            since, at = (found.clock(float(hours[row])) for row in (int(np.argmax(ppm >= limit)), most))
            return Finding(
                level="danger" if level == "danger" else "caution",
                id="carbon-dioxide",
                text=f"carbon dioxide {where} is over {show(limit, 'count')} ppm, {meaning}, from {since} and reaches"
                f" {_share(float(ppm[most]))} at {at}: {keep_out}, ventilate, ask your safety officer",
                rule=rule,
                path=path,
            )
    return None


def _share(ppm: float) -> str:
    return f"{show(round(ppm, -2), 'count')} ppm" if ppm < 0.1 * PPM else f"{100.0 * ppm / PPM:.0f} %"


def _still_warm(found: Outcome) -> Iterator[Finding]:
    """Today's goods that the machine had not brought within their limits yet."""
    bodies = list({one.body.label: one.body for one in found.run.still_warm if one.body is not None}.values())
    if not bodies:
        return
    names = "; ".join(body.label for body in bodies)
    yield Finding(
        level="caution",
        id="still-warm",
        text=f"not counted, beyond a limit when this begins: {names}. Look there first",
        rule="common practice",
        path=f"lots.{bodies[0].lot.name}" if len(bodies) == 1 else "lots",
    )


def _spoiling(found: Outcome) -> Iterator[Finding]:
    """Food that spoils above 4 °C (40 °F) for more than two hours in sum."""
    for one in found.run.guidance:
        at = first_of(found.hours(found.trace.crossed_s[one.watch]))
        if at is None or one.body is None:
            continue
        yield Finding(
            level="caution",
            id="food-guidance",
            text=f"{one.body.label} has been above 4 °C (40 °F) at its surface for two hours by {found.clock(at)}: the"
            " guidance for power cuts is to discard it then; refreeze only what is still at or below that or has ice"
            " crystals. When in doubt throw it out; your food authority decides",
            rule="USDA FSIS and FDA, food safety in a power outage",
            path=f"lots.{one.body.lot.name}",
        )


def _vaccine(found: Outcome) -> Iterator[Finding]:
    """Freezing destroys many vaccines; warmth uses up their time."""
    project = found.run.project
    for body in found.run.rig.bodies:
        if body.lot.product != "vaccine" and "vaccine" not in project.box.rules:
            continue
        key = ("lot", body.label, "surface")
        if key not in found.run.signals:
            continue
        at = found.run.signals[key]
        lowest, when = float(found.trace.lowest[at, 0]), float(found.trace.lowest_at_s[at, 0])
        if lowest <= FREEZING_C:
            yield Finding(
                level="danger",
                id="vaccine-frozen",
                text=f"{body.label} is at or below 0 °C (32 °F) at its surface by {clock(when)}: many vaccines are"
                " destroyed by freezing. Condition the ice packs until water moves in them; what may have frozen is"
                " set aside for your programme to decide on",
                rule="WHO, how to use passive containers and coolant packs",
                path=f"lots.{body.lot.name}",
            )
        highest = float(found.trace.highest[at, 0])
        if highest > 8.0 and np.isfinite(highest):
            first = found.trace.series[:, at, 0] > 8.0
            since = float(found.hours(found.trace.times_s[int(np.argmax(first))])) if first.any() else 0.0
            yield Finding(
                level="caution",
                id="vaccine-warm",
                text=f"{body.label} is above 8 °C (46 °F) from {clock(found.start_s + HOUR_S * since)} on: tell your"
                " programme how long; vial monitors and the maker decide what may still be used",
                rule="WHO, temperature range of vaccines 2 to 8 °C",
                path=f"lots.{body.lot.name}",
            )
