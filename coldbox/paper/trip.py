"""A trip as a document: whether it keeps its limits, who comes nearest, how sure; then leg by leg."""

from __future__ import annotations

from collections.abc import Iterator
from typing import Literal

from coldbox.paper.document import Block, Column, Document, Heading, Paragraph, Table
from coldbox.paper.outage import details, first_words, spread_of, then_words, told_findings
from coldbox.paper.sure import duration, eight_in_ten, sure_words
from coldbox.timeline.results import LegResult, Trip
from coldbox.units import compass_point, show

System = Literal["SI", "IP"]


def document(found: Trip, system: System) -> Document:
    """A trip, figures in SI or IP."""
    blocks = [*_answer(found, system), Heading(text="Leg by leg"), _legs(found, system), *details(found, system)]
    return Document(title=found.project.name, blocks=tuple(blocks))


def _answer(found: Trip, system: System) -> Iterator[Block]:
    spread = spread_of(found)
    range_ = f" ({eight_in_ten(spread.hours, found.horizon_h)}, 8 in 10)" if spread is not None else ""
    arrives = show(found.start_clock_h + found.horizon_h, "clock")
    if found.hold_h is None:
        kept = "Keeps every limit" if found.limits else "Nothing has a limit"
        yield Heading(text=f"{kept} on the way: {duration(found.horizon_h)}, until {arrives}", level=1)
    elif found.hold_h <= 0.0:
        yield Heading(text="Beyond a limit from the start", level=1)
    else:
        at = show(found.start_clock_h + found.hold_h, "clock")
        yield Heading(
            text=f"Holds {duration(found.hold_h)} of {duration(found.horizon_h)}{range_}: until {at}", level=1
        )
    yield Paragraph(text=first_words(found, system), indent=1)
    if spread is None:
        yield Paragraph(text="how sure: not looked into; --draws 500 tells", indent=1)
    else:
        sure = sure_words(spread.never, spread)
        yield Paragraph(text=f"every limit kept to the end: {sure}", indent=1)
    for line in then_words(found, system):
        yield Paragraph(text=line, indent=1)
    yield from told_findings(found, system)
    temperature = show(float(found.trace.air_c[0]), "temperature", system)
    yield Paragraph(
        text=f"{found.project.name}; leaves at {found.start_clock} with {temperature} inside, back at {arrives}."
    )


def _legs(found: Trip, system: System) -> Table:
    columns = (
        Column(title="", gives=True),
        Column(title="from"),
        Column(title="to"),
        Column(title="warmest air", align="right"),
        Column(title="nearest to its limit", gives=True),
        Column(title="margin", align="right"),
    )
    return Table(columns=columns, rows=tuple(_row(found, leg, system) for leg in found.legs))


def _row(found: Trip, leg: LegResult, system: System) -> tuple[str, ...]:
    nearest = margin = "-"
    if leg.worst_c is not None and leg.margin_k is not None:
        place = leg.worst_where if leg.worst_lot in (None, "box") else f"{leg.worst_lot} {leg.worst_where}"
        nearest = f"{place} {show(leg.worst_c, 'temperature', system)}"
        margin = show(leg.margin_k, "difference", system)
    label = f"stop: {leg.label}" if leg.kind == "stop" else leg.label
    return (
        label if leg.heading is None or leg.kind == "stop" else f"{label}, {compass_point(leg.heading)}",
        show(found.start_clock_h + leg.from_h, "clock"),
        show(found.start_clock_h + leg.to_h, "clock"),
        show(leg.air_highest_c, "temperature", system),
        nearest,
        margin,
    )
