"""An outage, a pull-down or a recovery as a document: how long, who first, how sure; then how it goes."""

from __future__ import annotations

from collections.abc import Iterator
from typing import TYPE_CHECKING, Final, Literal

import numpy as np

from coldbox.paper.document import Block, Column, Document, Heading, Paragraph, Table
from coldbox.paper.load import LEVELS, findings_blocks, source_words
from coldbox.paper.moments import SAME_MINUTE_H, clock_blocks, of_limits, place_of
from coldbox.paper.sure import asked_words, driver_blocks, duration, eight_in_ten
from coldbox.physics.number import Number
from coldbox.scene.goods import goods
from coldbox.timeline.results import LimitResult, Outage
from coldbox.units import show

if TYPE_CHECKING:
    from coldbox.spread.hold import HoldSpread

System = Literal["SI", "IP"]
MUCH_PPM: Final = 1e5


def document(found: Outage, system: System) -> Document:
    """An outage, pull-down or recovery, figures in SI or IP."""
    blocks = [*_answer(found, system), *details(found, system)]
    return Document(title=found.project.name, blocks=tuple(blocks))


def details(found: Outage, system: System) -> Iterator[Block]:
    """All that stands below the answer: limits, the clock, what moves it, what is inside, findings, sources."""
    if found.limits:
        yield Heading(text="Limits")
        yield _limits(found, system)
    yield Heading(text=f"By the clock, {show(0.0, 'temperature', system).split(' ')[-1]}")
    yield from clock_blocks(found, system)
    spread = spread_of(found)
    if spread is not None:
        yield from driver_blocks(spread)
    yield Heading(text="How it was computed")
    for line in _basis(found, system):
        yield Paragraph(text=line)
    yield from findings_blocks(found.findings, system, heading=True)
    yield Heading(text="Sources")
    for number, key in enumerate(_sources(found), 1):
        yield Paragraph(text=f"[{number}] {source_words(key)}", indent=1)


def spread_of(found: Outage) -> HoldSpread | None:
    """How sure it is, where draws were made."""
    spread: HoldSpread | None = found.spread
    return spread


# The answer


def _answer(found: Outage, system: System) -> Iterator[Block]:
    lines = _reached(found, system) if found.kind in ("pulldown", "recovery") else _holds(found, system)
    how_long, who, *others = lines
    yield Heading(text=how_long, level=1)
    verb = {"pulldown": "it does not get cold", "recovery": "it does not come back"}.get(found.kind, "it holds")
    yield Paragraph(text=who, indent=1)
    within = found.kind in ("pulldown", "recovery")
    yield Paragraph(text=asked_words(spread_of(found), found.asked_h, verb, within=within), indent=1)
    for line in others:
        yield Paragraph(text=line, indent=1)
    yield from told_findings(found, system)
    yield Paragraph(text=_what(found, system))


def _holds(found: Outage, system: System) -> Iterator[str]:
    spread = spread_of(found)
    range_ = f" ({eight_in_ten(spread.hours, found.horizon_h)}, 8 in 10)" if spread is not None else ""
    if found.hold_h is None:
        yield f"Holds beyond {duration(found.horizon_h)}, as far as it was looked at{range_}"
    elif found.hold_h <= 0.0:
        yield f"Does not hold: beyond a limit from the start{range_}"
    else:
        until = show(found.start_clock_h + found.hold_h, "clock")
        yield f"Holds {duration(found.hold_h)}{range_}: until {until}"
    yield first_words(found, system)
    yield from then_words(found, system)


def first_words(found: Outage, system: System) -> str:
    """Who first; or what comes nearest to its limit."""
    if not found.limits:
        return "nothing in it has a limit: write limits on a lot or on the box"
    crossed = [one for one in of_limits(found) if one.crossed_at_h is not None]
    if crossed:
        return f"first: {_crosses(crossed[0], system)}"
    nearest = min(found.limits, key=_margin)
    margin = show(max(_margin(nearest), 0.0), "difference", system)
    return f"nearest to its limit: {place_of(nearest)}, {margin} from {_degrees(nearest.limit_c, system)}"


def then_words(found: Outage, system: System) -> Iterator[str]:
    """Who comes next, and when."""
    crossed = [one for one in of_limits(found) if one.crossed_at_h is not None]
    if len(crossed) > 1:
        yield f"then: {_crosses(crossed[1], system)}, {crossed[1].at_clock}"


def _margin(limit: LimitResult) -> float:
    """Kelvin from the worst to the limit; below zero: beyond, for less than its minutes."""
    return limit.limit_c - limit.worst_c if limit.side == "above" else limit.worst_c - limit.limit_c


def _crosses(limit: LimitResult, system: System) -> str:
    """Whose, where, and which way: "cod surface passes -12 °C"."""
    verb = "passes" if limit.side == "above" else "falls below"
    minutes = f" for {show(limit.allowed_min * 60.0, 'duration')}" if limit.allowed_min else ""
    return f"{place_of(limit)} {verb} {_degrees(limit.limit_c, system)}{minutes}"


def _degrees(value: float, system: System) -> str:
    return show(value, "temperature", system)


def _reached(found: Outage, system: System) -> Iterator[str]:
    spread = spread_of(found)
    range_ = f" ({eight_in_ten(spread.hours, found.horizon_h)}, 8 in 10)" if spread is not None else ""
    cold, warm = ("Cold", "Not cold") if found.kind == "pulldown" else ("All back", "Not all back")
    if found.reached_h is None:
        yield f"{warm} within {duration(found.horizon_h)}, as far as it was looked at{range_}"
    else:
        yield f"{cold} after {duration(found.reached_h)}{range_}: {found.reached_clock}"
    yield _last_words(found, system)
    if found.kind == "pulldown" and not found.trace.lots:
        yield "empty: no goods are told to come in warm"
    yield from _balance(found, system)


def _last_words(found: Outage, system: System) -> str:
    """What comes last within its limits, or does not."""
    late = [one for one in found.limits if one.back_at_h is None and _beyond_at_end(one)]
    if late:
        ends = ", ".join(f"{place_of(one)} at {_degrees(one.end_c, system)}" for one in late[:3])
        return f"not back within its limit at the end: {ends}"
    back = [one for one in found.limits if one.back_at_h is not None]
    last = max(back, key=lambda one: one.back_at_h or 0.0) if back else None
    if found.kind == "pulldown" and found.reached_h is None:
        return f"the air is at {_degrees(float(found.trace.air_c[-1]), system)} in the end"
    lots_h = 0.0 if last is None or last.back_at_h is None else last.back_at_h
    if found.kind == "pulldown" and found.reached_h is not None and found.reached_h - lots_h > SAME_MINUTE_H:
        within = show(_middle(found.project.machine.band) / 2.0, "difference", system)
        at = _degrees(_middle(found.project.box.temperature), system)
        return f"last: the air, within {within} of {at} from {found.reached_clock}"
    if last is not None:
        return f"last: {place_of(last)}, within {_degrees(last.limit_c, system)} from {last.back_clock}"
    return "no limit is broken on the way" if found.limits else "nothing in it has a limit"


def _balance(found: Outage, system: System) -> Iterator[str]:
    """Whether the machine can hold at all what it is to pull down."""
    if "machine_w" not in found.facts or "day_puts_in_w" not in found.facts:
        return
    machine, day = (_middle(found.facts[key]) for key in ("machine_w", "day_puts_in_w"))
    out, into = (show(watts, "power", system, 3) for watts in (machine, day))
    if machine < day:
        yield f"it cannot stay cold: a day puts in {into}, the machine takes out {out}"
    else:
        yield f"it can stay cold: the machine takes out {out}, a day puts in {into}"


def _middle(value: Number) -> float:
    return float(np.ravel(value)[0])


def _beyond_at_end(limit: LimitResult) -> bool:
    past = limit.end_c - limit.limit_c
    return past > 0.0 if limit.side == "above" else past < 0.0


def told_findings(found: Outage, system: System) -> Iterator[Block]:
    """Dangers and what is not counted in full, other cautions and notes as counts."""
    own = [one for one in found.findings if not one.standing]
    for one in own:
        if one.level == "danger":
            yield Paragraph(text=f"DANGER {one.words(system)}", indent=1)
    for one in own:
        if one.id == "still-warm":  # what the answer above leaves out stands beside it
            yield Paragraph(text=one.words(system), indent=1)
    counts = [(level, sum(one.level == level and one.id != "still-warm" for one in own)) for level in LEVELS[1:]]
    said = ", ".join(f"{count} {level}{'s' if count > 1 else ''}" for level, count in counts if count)
    if said:
        yield Paragraph(text=f"{said}: see below", indent=1)


def _what(found: Outage, system: System) -> str:
    box = found.project.box
    at = _degrees(float(np.mean(box.temperature)), system)
    start = {"pulldown": "power on at", "recovery": "power off at"}.get(found.kind, "power off at")
    start = start if box.powered else "begins at"
    back = ""
    if found.power_back_h is not None and found.kind in ("outage", "recovery"):
        back = f", back after {duration(found.power_back_h)}"
    return f"{found.project.name}, {at}; {start} {found.start_clock}{back}; looked {duration(found.horizon_h)} ahead."


# Below it


def _limits(found: Outage, system: System) -> Table:
    coming_back = found.kind in ("pulldown", "recovery")
    spread = spread_of(found)
    rows = []
    for one in of_limits(found):
        when = one.back_clock if coming_back else one.at_clock
        row = [
            one.lot,
            f"{one.where} {one.side} {_degrees(one.limit_c, system)}"
            + (f", {show(one.allowed_min * 60.0, 'duration')}" if one.allowed_min else ""),
            _degrees(one.start_c, system),
            _degrees(one.worst_c, system),
            when or ("never beyond" if coming_back and not _beyond_at_end(one) else "not within"),
        ]
        if spread is not None:
            place = next(at for at, other in enumerate(found.limits) if other is one)
            never = coming_back and when is None and not _beyond_at_end(one)
            row.append("-" if never else eight_in_ten(spread.limits[place], found.horizon_h))
        rows.append(tuple(row))
    columns = [
        Column(title="lot", gives=True),
        Column(title="limit", gives=True),
        Column(title="at start", align="right"),
        Column(title="worst", align="right"),
        Column(title="back" if coming_back else "crossed"),
    ]
    if spread is not None:
        columns.append(Column(title="8 in 10", gives=True))
    return Table(columns=tuple(columns), rows=tuple(rows))


def _basis(found: Outage, system: System) -> Iterator[str]:
    if found.inside:
        yield f"Inside at {found.start_clock}: {'; '.join(found.inside)}."
    if found.stopped:
        yield f"Stopped: {', '.join(found.stopped)}."
    for pack in found.packs:
        spent = pack.spent_clock if found.kind != "pulldown" else None  # warm at the start, it may freeze again
        spent = f"spent at {spent}" if spent else f"{100.0 * pack.frozen:.0f} % of it frozen"
        yield f"{pack.id}: {show(pack.left_kg, 'mass', system, 3)} left at the end, {spent}."
    gas = found.carbon_dioxide
    if gas is not None:
        clock = show(found.start_clock_h + gas.box_at_h, "clock")
        around = ""
        if gas.around_ppm is not None:
            around = f", {_ppm(gas.around_ppm)} in {gas.around}"
        yield f"Carbon dioxide: {_ppm(gas.box_ppm)} in the box at {clock}{around}; {gas.gas_kg:.3g} kg turned into gas."
    for note in found.notes:
        yield f"{note[:1].upper()}{note[1:].rstrip('.')}."
    middle = "Single figures have every input at its middle. " if found.spread is not None else ""
    yield f"{middle}Heat balance closes to {_power_of_ten(found.heat_balance_error)}."


def _power_of_ten(value: float) -> str:
    figure, _, power = f"{max(value, 1e-16):.0e}".partition("e")
    return f"{figure}e{int(power)}"


def _ppm(value: float) -> str:
    """A concentration; from a tenth of the air on in percent, which nobody misreads."""
    return f"{show(round(value, -2), 'count')} ppm" if value < MUCH_PPM else f"{value / 1e4:.0f} %"


def _sources(found: Outage) -> list[str]:
    """Keys of what this run rests on."""
    project = found.project
    keys = ["trade-practice"] if not project.lots else [goods(lot).source for lot in project.lots]
    if any(lot.respiration for lot in project.lots):
        keys.append("usda-ah-66")
    if project.doors:
        keys.append("gosney-olama-1975")
    behind = {face.neighbour for face in project.faces.values()}
    if "ground" in behind:
        keys.append("iso-13370")
    if "outdoors" in behind and project.site is not None:
        keys += ["ashrae-f-clear-sky", "berdahl-martin-1984"]
    if found.carbon_dioxide is not None:
        keys.append("dry-ice-figures")
    keys.append("iso-6946")
    if found.spread is not None:
        keys.append("mckay-1979")
    return list(dict.fromkeys(keys))
