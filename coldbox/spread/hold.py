"""Outages, pull-downs, recoveries and trips with draws: the same timeline for the middle and every draw, in blocks.

Each block begins with the middle, so that what the timeline decides by it is decided alike in all of them. Blocks and
processes change no digit.
"""

from __future__ import annotations

from collections.abc import Callable, Sequence
from typing import TYPE_CHECKING, Any, Final

import numpy as np

from coldbox.account.cautions import standing
from coldbox.account.load import load
from coldbox.errors import ColdboxError, Stopped
from coldbox.physics.number import FloatArray
from coldbox.project.model import Project
from coldbox.record import Record
from coldbox.scene.build import build
from coldbox.scene.finding import Finding
from coldbox.spread.draws import Draws, draws
from coldbox.spread.influence import Driver, drivers
from coldbox.spread.inputs import left_out
from coldbox.spread.percentiles import Chance, Percentiles, chance, percentiles
from coldbox.timeline.network import Factors
from coldbox.timeline.results import Kind, Outage
from coldbox.units import show

if TYPE_CHECKING:
    from multiprocessing.connection import Connection

DRAWS: Final = 500
SEED: Final = 1
BLOCK: Final = 1000  # draws that stay near the processor, and that a stop waits for at most
DAY_S: Final = 86400.0
WORTH_A_PROCESS: Final = 2 * BLOCK  # draws below which starting another takes longer than it saves

GoOn = Callable[[float], bool]
_DRAWN: Final = ("hold_draws_h", "first_draws", "reached_draws_h")


class HoldSpread(Record):
    """How sure the answer of a run is: how long it holds, or when it is reached. Hours count from its start."""

    draws: int
    seed: int
    hours: Percentiles
    never: Chance  # of draws in which nothing is crossed, or it is not reached, within the run
    asked: Chance | None  # that it holds so long as asked, or is reached by then; None: beyond the horizon
    drivers: tuple[Driver, ...]
    limits: tuple[Percentiles, ...]  # of each of the result's limits: when it is crossed, or last back within it
    first_shares: tuple[float, ...]  # of each of the limits: in what share of draws it is the first crossed
    left_out: tuple[str, ...]  # key paths whose ± nothing can be drawn for


def run(
    project: Project,
    kind: Kind = "outage",
    *,
    count: int = DRAWS,
    seed: int = SEED,
    processes: int = 1,
    block: int = BLOCK,
    go_on: GoOn | None = None,
) -> Outage:
    """A run of the timeline with its spread.

    project: complete, without draws. count: draws beside the middle; 0: none, and no spread. processes: how many at
    most; more than one are spawned, which asks a script for the usual `if __name__ == "__main__"`. go_on: told the
    share done now and then; False stops. Result: the timeline's, single figures of the middle, arrays of the draws
    without it, `spread` a HoldSpread. Raises what the timeline raises; Stopped.
    """
    project, said, facts = _with_machine(project, kind)
    found = _run(project, kind, count, seed, processes, block, go_on)
    return found.replace(
        notes=(*said, *found.notes),
        findings=(*found.findings, *_standing(project)),
        facts={**found.facts, **facts},
    )


def _run(project: Project, kind: Kind, count: int, seed: int, processes: int, block: int, go_on: GoOn | None) -> Outage:
    if count == 0:
        return engine(kind)(project, go_on=go_on)
    starts = range(1, count + 1, block)
    job = _Job(project=project, kind=kind, count=count, seed=seed, block=block)
    if processes > 1 and len(starts) > 1 and count >= WORTH_A_PROCESS:
        parts = _spawned(job, starts, min(processes, len(starts)), go_on)
    else:
        drawn = draws(project, count, seed)
        parts = {start: _block(job, drawn, start, _sharing(go_on, at, len(starts))) for at, start in enumerate(starts)}
    whole = _joined([parts[start] for start in starts])
    return whole.replace(project=project, draws=count, spread=_spread(whole, draws(project, count, seed)))


def engine(kind: Kind) -> Callable[..., Outage]:
    """The run of the timeline for a kind."""
    from coldbox.timeline.outage import outage, pulldown, recovery
    from coldbox.timeline.trip import trip

    runs: dict[Kind, Callable[..., Outage]] = {
        "outage": outage, "pulldown": pulldown, "recovery": recovery, "trip": trip,
    }  # fmt: skip
    return runs[kind]


def _with_machine(project: Project, kind: Kind) -> tuple[Project, tuple[str, ...], dict[str, float]]:
    """The project with a machine where one runs and none is named: as large as the load asks for.

    With what to say of it and, for a pull-down, what the machine takes out and what a day puts in, W.
    """
    named = project.machine.capacity is not None
    if kind != "pulldown" and (named or not _runs(project, kind)):
        return project, (), {}
    asked = load(project)
    capacity = project.machine.capacity if named else asked.required_capacity_w
    assert capacity is not None, "named, or asked for"
    watts = float(np.ravel(capacity)[0])
    facts = {}
    if kind == "pulldown":
        facts = {"machine_w": watts, "day_puts_in_w": max(float(asked.counted_daily_j), 0.0) / DAY_S}
    if named:
        return project, (), facts
    told = f"no machine is named: the {show(watts, 'power', project.units, 3)} that the load asks for are taken"
    return project.replace(machine=project.machine.replace(capacity=watts)), (told,), facts


def _runs(project: Project, kind: Kind) -> bool:
    """Whether a machine runs at some time of this."""
    from coldbox.timeline.legs import trip_course
    from coldbox.timeline.outage import course

    found = trip_course(project)[0] if kind == "trip" else course(project)
    return any(on for _, on in found.power)


def _standing(project: Project) -> tuple[Finding, ...]:
    """What is always said of such a box."""
    return tuple(standing(build(project)))


class _Job(Record):
    """What every block of a run has in common."""

    project: Project
    kind: Kind
    count: int
    seed: int
    block: int


def _sharing(go_on: GoOn | None, at: int, of: int) -> GoOn | None:
    """A block's own share as a share of all."""
    if go_on is None:
        return None
    tell = go_on
    return lambda share: tell((at + share) / of)


def _block(job: _Job, drawn: Draws, start: int, go_on: GoOn | None) -> Outage:
    """One block; figures through time are kept of the first alone."""
    stop = min(start + job.block, job.count + 1)
    factors = Factors(enthalpy=drawn.enthalpy_of(start, stop), films=drawn.films_of(start, stop))
    found = engine(job.kind)(drawn.part(start, stop), factors=factors, go_on=go_on, series=start == 1)
    return _without_middle(found, stop - start + 1)


def _without_middle(found: Outage, rows: int) -> Outage:
    """The same with the middle taken out of all arrays of draws, which then really are that long."""

    def cut(values: Any) -> Any:
        return None if values is None else np.array(np.broadcast_to(values, (rows,))[1:])

    return found.replace(
        **{name: cut(getattr(found, name)) for name in _DRAWN},
        limits=tuple(
            one.replace(crossed_draws_h=cut(one.crossed_draws_h), back_draws_h=cut(one.back_draws_h))
            for one in found.limits
        ),
        packs=tuple(one.replace(spent_draws_h=cut(one.spent_draws_h)) for one in found.packs),
    )


def _joined(parts: Sequence[Outage]) -> Outage:
    """Blocks put together: the first one's figures, all draws, the worst heat balance."""
    first = parts[0]

    def chain(values: Sequence[Any]) -> Any:
        return None if values[0] is None else np.concatenate(values)

    return first.replace(
        **{name: chain([getattr(part, name) for part in parts]) for name in _DRAWN},
        limits=tuple(
            one.replace(
                crossed_draws_h=chain([part.limits[at].crossed_draws_h for part in parts]),
                back_draws_h=chain([part.limits[at].back_draws_h for part in parts]),
            )
            for at, one in enumerate(first.limits)
        ),
        packs=tuple(
            one.replace(spent_draws_h=chain([part.packs[at].spent_draws_h for part in parts]))
            for at, one in enumerate(first.packs)
        ),
        heat_balance_error=max(part.heat_balance_error for part in parts),
        notes=tuple(dict.fromkeys(note for part in parts for note in part.notes)),
    )


def _spread(whole: Outage, drawn: Draws) -> HoldSpread:
    coming_back = whole.kind in ("pulldown", "recovery")
    found = whole.reached_draws_h if coming_back else whole.hold_draws_h
    hours: FloatArray = np.full(drawn.count, np.inf) if found is None else found
    first = np.full(drawn.count, -1) if whole.first_draws is None else whole.first_draws
    asked = None
    if whole.asked_h <= whole.horizon_h:
        asked = chance(-hours, -whole.asked_h) if coming_back else chance(hours, whole.asked_h)
    back = [one.back_draws_h if coming_back else one.crossed_draws_h for one in whole.limits]
    return HoldSpread(
        draws=drawn.count,
        seed=drawn.seed,
        hours=percentiles(hours),
        never=chance(hours, np.inf),
        asked=asked,
        drivers=drivers(drawn, hours, whole.horizon_h),
        limits=tuple(percentiles(np.full(drawn.count, np.inf) if one is None else one) for one in back),
        first_shares=tuple(float(np.mean(first == at)) for at in range(len(whole.limits))),
        left_out=left_out(drawn.project),
    )


def _spawned(job: _Job, starts: Sequence[int], processes: int, go_on: GoOn | None) -> dict[int, Outage]:
    """All blocks, shared out among processes of their own; whatever ends this ends them at once."""
    import multiprocessing
    import signal
    from multiprocessing.connection import wait

    context = multiprocessing.get_context("spawn")
    workers: list[Any] = []
    listening: list[Connection] = []
    parts: dict[int, Outage] = {}
    shares = dict.fromkeys(starts, 0.0)
    try:
        for number in range(processes):
            ours, theirs = context.Pipe(duplex=False)
            worker = context.Process(target=_work, args=(theirs, job, starts[number::processes]), daemon=True)
            # Ctrl-C is heard by all processes of a terminal; a new one must not hear it before it can ignore it.
            signal.pthread_sigmask(signal.SIG_BLOCK, {signal.SIGINT})
            try:
                worker.start()
            finally:
                signal.pthread_sigmask(signal.SIG_UNBLOCK, {signal.SIGINT})
            theirs.close()
            workers.append(worker)
            listening.append(ours)
        while listening:
            ready = wait(listening)
            for pipe in [one for one in listening if one in ready]:
                try:
                    start, said = pipe.recv()
                except EOFError:
                    listening.remove(pipe)
                    continue
                if isinstance(said, Outage):
                    parts[start], shares[start] = said, 1.0
                elif isinstance(said, str):
                    raise ColdboxError(said)
                else:
                    shares[start] = said
                if go_on is not None and not go_on(sum(shares.values()) / len(shares)):
                    raise Stopped
        if len(parts) < len(shares):
            raise ColdboxError("A process of this run ended before its work: too little memory, or it was killed.")
        return parts
    finally:
        for worker in workers:
            worker.terminate()
        for worker in workers:
            worker.join()


def _work(pipe: Connection, job: _Job, starts: Sequence[int]) -> None:
    """What a process of its own does: its blocks one by one, each share and result told through the pipe."""
    import signal

    signal.signal(signal.SIGINT, signal.SIG_IGN)  # the first process hears it too, and ends this one

    def telling(start: int) -> GoOn:
        def tell(share: float) -> bool:
            pipe.send((start, share))
            return True

        return tell

    try:
        drawn = draws(job.project, job.count, job.seed)
        for start in starts:
            pipe.send((start, _block(job, drawn, start, telling(start))))
    except ColdboxError as error:
        pipe.send((0, str(error)))  # as text: not every error can be made anew from its parts
    except (BrokenPipeError, ConnectionError):
        pass  # nobody listens any more
