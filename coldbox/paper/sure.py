"""How sure an answer is, in words, and what moves it."""

from __future__ import annotations

from collections.abc import Iterator
from typing import TYPE_CHECKING, Final, Literal

from coldbox.paper.document import Block, Column, Heading, Paragraph, Table
from coldbox.units import show

if TYPE_CHECKING:  # each command loads only its own half
    from coldbox.spread.capacity import CapacitySpread
    from coldbox.spread.influence import Driver

System = Literal["SI", "IP"]

MOST_DRIVERS: Final = 6
_COLUMNS: Final = (
    Column(title="input", gives=True),
    Column(title="where lowest", align="right"),
    Column(title="where highest", align="right"),
)


def _named(driver: Driver) -> str:
    """Its key path, which is what somebody would change; of a factor with what it stands for."""
    return f"{driver.label} ({driver.key})" if driver.key.startswith("spreads.") else driver.key


def capacity_blocks(spread: CapacitySpread, system: System) -> Iterator[Block]:
    """How sure a capacity is, and what moves it; without the safety allowance."""

    def power(watts: float | None) -> str:
        return show(0.0 if watts is None else watts, "power", system, 3)

    found = spread.required_w
    yield Heading(text="How sure")
    yield Paragraph(
        text=f"Without the safety allowance {power(spread.middle_w)}; 8 in 10: {power(found.p10)} to {power(found.p90)}"
        f" ({found.draws} draws, seed {spread.seed}). Half lie below {power(found.p50)}, ± {power(found.p50_error)}"
        " since draws are few."
    )
    if spread.drivers:

        def signed(watts: float) -> str:
            return f"{'-' if watts < 0 else '+'} {power(abs(watts))}"

        rows = tuple(
            (_named(one), signed(one.at_lowest), signed(one.at_highest)) for one in spread.drivers[:MOST_DRIVERS]
        )
        yield Table(columns=_COLUMNS, rows=rows)
