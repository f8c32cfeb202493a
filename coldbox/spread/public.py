"""The timeline with its spread, as it is called from Python."""

from __future__ import annotations

from typing import Literal, cast

from coldbox.project.model import Project
from coldbox.spread import hold
from coldbox.timeline.results import Outage, Trip


def outage(
    project: Project,
    *,
    draws: int = hold.DRAWS,
    seed: int = hold.SEED,
    kind: Literal["outage", "pulldown", "recovery"] = "outage",
    processes: int = 1,
) -> Outage:
    """How long a box holds without power, who fails first, and how sure that is.

    project    as `coldbox.open` gives it
    draws      of all that is unsure; 0: only the run with every input at its middle
    seed       another seed, other draws; the same, the same answer to the last digit
    kind       "pulldown": from warm, with power; "recovery": until all is cold again after the outage
    processes  more than one are started anew, which asks a script for `if __name__ == "__main__"`
    result     single figures of the middle run, arrays of all draws, `spread` with percentiles and what moves it
    raises     BadProject, OutOfValidity
    example    outage(project, draws=2000, seed=1).spread.hours.p10
    """
    return hold.run(project, kind, count=draws, seed=seed, processes=processes)


def trip(project: Project, *, draws: int = hold.DRAWS, seed: int = hold.SEED, processes: int = 1) -> Trip:
    """A trip leg by leg: whether everything keeps its limits, and how sure that is. Arguments as for `outage`."""
    return cast(Trip, hold.run(project, "trip", count=draws, seed=seed, processes=processes))
