"""How sure an answer is, in words, and what moves it."""

from __future__ import annotations

from collections.abc import Iterator
from typing import TYPE_CHECKING, Final, Literal

from coldbox.paper.document import Block, Column, Heading, Paragraph, Table
from coldbox.units import show

if TYPE_CHECKING:  # each command loads only its own half
    from coldbox.spread.capacity import CapacitySpread
    from coldbox.spread.hold import HoldSpread
    from coldbox.spread.influence import Driver
    from coldbox.spread.percentiles import Chance, Percentiles

System = Literal["SI", "IP"]

ROUNDS_MIN: Final = (1.0, 2.0, 5.0, 10.0, 15.0, 30.0, 60.0)
MOST_DRIVERS: Final = 6
NOTHING_MOVES: Final = "No input moves it more than chance does."
_COLUMNS: Final = (
    Column(title="input", gives=True),
    Column(title="where lowest", align="right"),
    Column(title="where highest", align="right"),
)


def duration(hours: float) -> str:
    """Hours as people say them: "18 h 20 min"."""
    return show(hours * 3600.0, "duration")


def rough(hours: float | None, error: float | None, horizon_h: float) -> str:
    """A percentile no finer than its own sampling error; beyond the horizon it says so."""
    if hours is None:
        return f"beyond {duration(horizon_h)}"
    fine = [one for one in ROUNDS_MIN if error is not None and one <= error * 60.0]
    step = fine[-1] if fine and hours * 60.0 > 10.0 * fine[-1] else 1.0
    return duration(round(hours * 60.0 / step) * step / 60.0)


def eight_in_ten(found: Percentiles, horizon_h: float) -> str:
    """From the 10th to the 90th percentile: "15 h 20 to 21 h 40 min"."""
    low, high = rough(found.p10, found.p10_error, horizon_h), rough(found.p90, found.p90_error, horizon_h)
    if low == high:
        return low
    if low.endswith(" min") and high.endswith(" min"):  # the unit once, where both have it
        low = low.removesuffix(" min")
    return f"{low} to {high}"


def asked_words(spread: HoldSpread | None, asked_h: float, verb: str, *, within: bool = False) -> str:
    """The third line: how sure that it holds as long as asked, or is reached within that."""
    if spread is None:
        return f"how sure: not looked into; --draws 500 tells how sure the asked {duration(asked_h)} are"
    if spread.asked is None:
        never = f"in {percent(spread.never.share)} of {spread.draws} draws {verb} to the end"
        return f"how sure: the asked {duration(asked_h)} are beyond what was looked at; {never}"
    return f"{'within ' if within else ''}the asked {duration(asked_h)}: {sure_words(spread.asked, spread)}"


def sure_words(found: Chance, spread: HoldSpread) -> str:
    """A chance with its error; where all draws agree, and are many, no certainty beyond what they can tell."""
    how = f"{spread.draws} draws, seed {spread.seed}"
    if found.share in (0.0, 1.0) and found.error < 0.01:
        return f"{'over 99 %' if found.share else 'under 1 %'} sure ({how})"
    points = max(1, round(100.0 * found.error))
    return f"{percent(found.share)} sure (± {points} point{'s' if points > 1 else ''}; {how})"


def percent(share: float) -> str:
    """A share in whole percent, never rounded to certainty."""
    if 0.0 < share < 0.005:
        return "under 1 %"
    if 0.995 <= share < 1.0:
        return "over 99 %"
    return f"{share * 100.0:.0f} %"


def driver_blocks(spread: HoldSpread) -> Iterator[Block]:
    """What moves the hours most, as a table, lowest and highest fifth of each input."""
    yield Heading(text="What moves it")
    if not spread.drivers:
        beyond = spread.never.share == 1.0
        text = "All draws lie beyond the horizon: nothing moves it into it." if beyond else NOTHING_MOVES
        yield Paragraph(text=text)
    else:
        rows = tuple(
            (_named(one), _signed(one.at_lowest), _signed(one.at_highest)) for one in spread.drivers[:MOST_DRIVERS]
        )
        yield Table(columns=_COLUMNS, rows=rows)
        if spread.drivers[0].beyond:
            yield Paragraph(
                text=f"{percent(spread.never.share)} of the draws lie beyond the horizon and count as the horizon here."
            )
    if spread.left_out:
        yield Paragraph(text=f"Not drawn, since a ± means nothing there: {', '.join(spread.left_out)}.")


def _named(driver: Driver) -> str:
    """Its key path, which is what somebody would change; of a factor with what it stands for."""
    return f"{driver.label} ({driver.key})" if driver.key.startswith("spreads.") else driver.key


def _signed(hours: float) -> str:
    return f"{'-' if hours < 0 else '+'} {duration(round(abs(hours) * 60.0) / 60.0)}"


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
