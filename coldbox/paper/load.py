"""The load as a document: the answer first, then the box, the account, the day, what to watch for."""

from __future__ import annotations

from collections.abc import Iterator
from typing import TYPE_CHECKING, Literal

import numpy as np

from coldbox.account.capacity import ATP_OUTSIDE_C
from coldbox.account.entry import GROUPS, Finding, Load
from coldbox.paper.box import box_lines
from coldbox.paper.document import Bars, Block, Column, Document, Heading, Paragraph, Table
from coldbox.project.model import Project
from coldbox.project.origins import defaults_used
from coldbox.tables.load import source
from coldbox.units import display_unit, show

if TYPE_CHECKING:
    from coldbox.spread.capacity import CapacitySpread

System = Literal["SI", "IP"]

GROUP_WORDS = {
    "transmission": "walls, floor and doors",
    "sun": "sun",
    "infiltration": "air through doors and cracks",
    "product": "product",
    "internal": "people, lights and motors",
    "equipment": "fans, defrost and heaters",
}
LEVELS: tuple[Literal["danger", "caution", "note"], ...] = ("danger", "caution", "note")


def document(load: Load, system: System, *, how: bool = False, spread: CapacitySpread | None = None) -> Document:
    """The whole account of a load without draws, figures in SI or IP; `how` adds each entry's formula and inputs,
    `spread` how sure the capacity is."""
    sources = _numbered_sources(load)
    blocks: list[Block] = [*_answer(load, system), Heading(text="The box and its day", level=2)]
    blocks += [Paragraph(text=line) for line in box_lines(load, system)]
    blocks += [Heading(text="The account", level=2), _account(load, system, sources), _day(load, system)]
    blocks += [Paragraph(text=line) for line in _after(load, system)]
    if spread is not None:
        from coldbox.paper.sure import capacity_blocks

        blocks += capacity_blocks(spread, system)
    blocks += findings_blocks(load.findings, system, heading=True)
    if how:
        blocks += _how(load, system, sources)
    blocks += _sources(sources)
    return Document(title=load.project.name, blocks=tuple(blocks))


def figure(value: object, kind: str, system: System, digits: int | None = None) -> str:
    """A figure as people read it; of draws, the mean."""
    return show(float(np.mean(value)) if isinstance(value, np.ndarray) else value, kind, system, digits)


def _answer(load: Load, system: System) -> Iterator[Block]:
    project = load.project

    def power(value: object) -> str:
        return figure(value, "power", system, 3)

    room = figure(project.box.temperature, "temperature", system)
    yield Heading(text=f"{project.name}, {room}: needs {power(load.required_capacity_w)} of refrigeration", level=1)
    margin = f"+ {figure(load.safety, 'share', system)}"
    mark = {load.governs: "<- governs"}
    rows = [
        (
            "peak hour " + _hour(load.peak_hour),
            f"{power(load.peak_w)} {margin}",
            power(load.by_peak_w),
            mark.get("peak", ""),
        ),
        (
            "daily heat",
            f"{figure(load.counted_daily_j, 'energy', system)} in {float(np.mean(load.run_hours)):g} h {margin}",
            power(load.by_daily_w),
            mark.get("daily", ""),
        ),
    ]
    if load.by_atp_w is not None:
        at = figure(ATP_OUTSIDE_C, "temperature", system)
        factor = "1.35" if project.sizing.tested_with_unit else "1.75"
        rows.append(
            ("ATP rule", f"{factor} x heat through the walls at {at}", power(load.by_atp_w), mark.get("atp", ""))
        )
    yield Table(
        columns=(
            Column(title="", gives=True),
            Column(title="", gives=True),
            Column(title="", align="right"),
            Column(title=""),
        ),
        rows=tuple(rows),
    )
    yield Paragraph(text=f"biggest: {_biggest(load)}", indent=1)
    counts = [(level, sum(f.level == level and not f.standing for f in load.findings)) for level in LEVELS]
    told = ", ".join(f"{count} {level}{'s' if count > 1 else ''}" for level, count in counts if count)
    yield Paragraph(
        text=f"{told}: see below" if told else "nothing to object to; the standing cautions are below", indent=1
    )


def _hour(hour: int) -> str:
    return f"{hour}-{hour + 1}"


def _biggest(load: Load) -> str:
    sums = {
        group: sum(float(np.maximum(e.hours_w, 0).sum()) for e in load.entries if e.group == group) for group in GROUPS
    }
    total = max(sum(sums.values()), 1e-9)
    ranked = sorted(((value, group) for group, value in sums.items() if value > 0), reverse=True)[:3]
    return ", ".join(f"{GROUP_WORDS[group]} {value / total:.0%}".replace("%", " %") for value, group in ranked)


def _account(load: Load, system: System, sources: dict[str, int]) -> Table:
    """Every entry by size, in one unit a column, so that the figures can be run down with a finger."""
    watt, kilowatt_hour = display_unit("power", system), display_unit("energy", system)
    ordered = sorted(load.entries, key=lambda entry: -abs(float(entry.hours_w.sum())))
    peaks = [float(entry.hours_w[load.peak_hour]) / watt.factor for entry in ordered]
    days = [float(entry.hours_w.sum()) * 3600.0 / kilowatt_hour.factor for entry in ordered]
    counted = max(sum(abs(value) for value in days), 1e-9)
    peak_places, day_places = _places(peaks, 3), _places(days, 4)
    rows = tuple(
        (
            entry.label,
            _fixed(peak, peak_places),
            _fixed(daily, day_places),
            f"{100.0 * daily / counted:.1f}",
            entry.method,
            f"[{sources[entry.source]}]",
        )
        for entry, peak, daily in zip(ordered, peaks, days, strict=True)
    )
    hour, daily = float(load.hours_w[load.peak_hour]), float(np.mean(load.daily_heat_j))
    return Table(
        columns=(
            Column(title="entry", gives=True),
            Column(title=f"{watt.unit} {_hour(load.peak_hour)}", align="right"),
            Column(title=f"{kilowatt_hour.unit}/day", align="right"),
            Column(title="%", align="right"),
            Column(title="method", gives=True),
            Column(title="source"),
        ),
        rows=rows,
        totals=(
            "all, rounded after adding",
            _fixed(hour / watt.factor, peak_places),
            _fixed(daily / kilowatt_hour.factor, day_places),
            "",
            "",
            "",
        ),
    )


def _places(values: list[float], digits: int) -> int:
    """Places behind the point that give the largest figure so many digits."""
    largest = max((abs(value) for value in values), default=0.0)
    return max(0, digits - len(f"{largest:.0f}"))


def _fixed(value: float, places: int) -> str:
    return f"{value:,.{places}f}".replace(",", " ")


def _day(load: Load, system: System) -> Bars:
    return Bars(
        label="day",
        values=tuple(float(value) for value in load.hours_w),
        lowest=figure(float(load.hours_w.min()), "power", system, 3),
        highest=figure(float(load.hours_w.max()), "power", system, 3),
    )


def _after(load: Load, system: System) -> Iterator[str]:
    frost = float(np.mean(load.frost_kg_per_day))
    parts = []
    if frost > 0.005:
        parts.append(f"Frost on the coil {figure(frost, 'mass', system, 3)} a day.")
    parts.append(f"UA {figure(load.ua_w_per_k, 'point_transmittance', system, 3)}.")
    parts.append(f"K {figure(load.k_w_per_m2k, 'transmittance', system, 3)} on the mean of inside and outside area.")
    yield " ".join(parts)
    if float(np.mean(load.cold_w)) > 0.5:
        taken = "counted" if load.project.box.credit_cold else "not counted in the capacity (credit_cold)"
        yield (
            f"Colder neighbours and night sky take off {figure(load.cold_w, 'power', system)} on average, {taken};"
            f" all entries together make {figure(load.daily_heat_j, 'energy', system)} a day."
        )
    used = len(defaults_used(load.project, for_load=True))
    if used:
        yield f"{used} defaults used: coldbox load --defaults"


def findings_blocks(findings: tuple[Finding, ...], system: System, *, heading: bool = False) -> Iterator[Block]:
    """Findings in order of danger, each with its rule and the key path it is about."""
    if not findings:
        return
    if heading:
        yield Heading(text="What to watch for", level=2)
    for level in LEVELS:
        for finding in findings:
            if finding.level == level:
                name = level.upper() if level == "danger" else level
                rule = f" ({finding.rule})" if finding.rule else ""
                path = f"  {finding.path}" if finding.path else ""
                yield Paragraph(text=f"{name}: {finding.words(system)}{rule}{path}", indent=1)


def _how(load: Load, system: System, sources: dict[str, int]) -> Iterator[Block]:
    yield Heading(text="How each entry came about", level=2)
    for entry in load.entries:
        yield Paragraph(text=f"{entry.label} ({entry.id}): {entry.method} [{sources[entry.source]}]")
        numbers = ", ".join(f"{item.label} {figure(item.value, item.kind, system)}" for item in entry.inputs)
        yield Paragraph(text=f"{entry.formula}; {numbers}", indent=1)
        if entry.remark:
            yield Paragraph(text=entry.remark, indent=1)


def _numbered_sources(load: Load) -> dict[str, int]:
    numbers: dict[str, int] = {}
    for entry in load.entries:
        numbers.setdefault(entry.source, len(numbers) + 1)
    return numbers


def _sources(sources: dict[str, int]) -> Iterator[Block]:
    yield Heading(text="Sources", level=2)
    for key, number in sources.items():
        yield Paragraph(text=f"[{number}] {source_words(key)}", indent=1)


def source_words(key: str) -> str:
    """A source in words: its title and where; of a quoted figure, what the file says."""
    if key.startswith("quoted: "):
        return key.removeprefix("quoted: ")
    found = source(key)
    memory = "; recalled, not read in print" if found["read"] == "memory" else ""
    return f"{found['title']} ({found['where']}{memory})"


def defaults_document(project: Project, *, for_load: bool) -> Document:
    """Every default that a load, or an outage or a trip as well, uses, with its reason."""
    used = defaults_used(project, for_load=for_load)
    rows = tuple((path, value, reason) for path, value, reason in used)
    columns = (Column(title="key", gives=True), Column(title="value", gives=True), Column(title="why", gives=True))
    head = Heading(text=f"{project.name}: {len(used)} defaults used", level=1)
    return Document(title=project.name, blocks=(head, Table(columns=columns, rows=rows)))
