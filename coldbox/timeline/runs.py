"""One run from start to end: the network and its drivers made, the state of the start, what to look at, the trace."""

from __future__ import annotations

from collections.abc import Callable
from typing import Final, Literal

import numpy as np

from coldbox.errors import BadProject, Problem
from coldbox.physics.number import FloatArray, Number
from coldbox.project.model import Limit, Project
from coldbox.record import Record
from coldbox.scene import Scene
from coldbox.scene.build import build
from coldbox.tables import load
from coldbox.timeline import solver
from coldbox.timeline.begin import begin
from coldbox.timeline.course import Course, middle
from coldbox.timeline.drivers import Hours
from coldbox.timeline.network import Body, Factors, Rig, draws_of, rig
from coldbox.timeline.surroundings import placed
from coldbox.timeline.types import Plan, Signal, Trace, Watch

GoOn = Callable[[float], bool]
HOUR_S: Final = 3600.0
# How far apart the instants of the series lie, by how long the run is.
APART_S: Final = ((12.0, 300.0), (96.0, 900.0), (240.0, 1800.0), (1e9, 3600.0))
# Food-safety guidance for what spoils, watched beside the project's own limits.
GUIDANCE_C: Final = 40.0 * 5.0 / 9.0 - 160.0 / 9.0  # 40 °F
GUIDANCE_S: Final = 2.0 * HOUR_S
SPOILS: Final = ("meat", "fish", "dairy", "frozen")


class Watched(Record):
    """A limit that is watched: whose, on which signal, by which watch."""

    body: Body | None  # None: of the box
    limit: Limit
    signal: int
    watch: int


class Run(Record):
    """A run with everything that tells what its figures are."""

    project: Project
    course: Course
    rig: Rig
    hours: Hours
    plan: Plan
    trace: Trace
    limits: tuple[Watched, ...]
    still_warm: tuple[Watched, ...]  # limits of today's goods that have not come within them yet: not counted
    guidance: tuple[Watched, ...]  # food-safety guidance, where it applies
    not_watched: tuple[str, ...]
    reached: int | None  # watch of the air's temperature coming down; None: not asked
    signals: dict[tuple[str, str, str], int]  # (kind, name, where) to signal


def run(
    project: Project,
    course: Course,
    *,
    factors: Factors | None = None,
    capacity_w: Number | None = None,
    warm: bool = False,
    back_at_k: Number | None = None,
    series: bool = True,
    go_on: GoOn | None = None,
) -> Run:
    """A run of a project through a course.

    capacity_w: what the machine takes out while it runs; None: that of the project. warm: from a box as warm as its
    surroundings, with only goods that are put in warm. back_at_k: watches when the air first comes below its
    temperature and so much more. series: whether to keep all figures through time, or those of the limits alone.
    go_on: told the share done, False stops. Raises BadProject, OutOfValidity, Stopped.
    """
    factors = Factors() if factors is None else factors
    draws = draws_of(project, factors)
    scene = build(placed(project, course.settings[0][1]))
    start_c = _warm_start(scene) if warm else scene.room.temperature_c
    made = rig(project, scene, course, draws=draws, factors=factors, start_c=start_c, stock="warm" if warm else "usual")
    hours = Hours(made, course, factors, _capacity(project, course, capacity_w))
    state = begin(made, hours, course.start_s, normal_days=project.box.powered or warm, goods_before=not warm)
    looks = _Looks(made, course, series)
    reached = looks.coming_down(project.box.temperature + back_at_k) if back_at_k is not None else None
    plan = Plan(
        start_s=course.start_s,
        end_s=course.end_s,
        marks=course.marks(),
        changes=made.changes,
        signals=tuple(looks.signals),
        watches=tuple(looks.watches),
        times_s=_times(course),
        go_on=go_on,
    )
    trace = solver.run(made.network, hours, plan, state)
    still = tuple(one for one in looks.limits if _still_beyond(one, trace))
    return Run(
        project=project,
        course=course,
        rig=made,
        hours=hours,
        plan=plan,
        trace=trace,
        limits=tuple(one for one in looks.limits if one.watch not in {warm.watch for warm in still}),
        still_warm=still,
        guidance=tuple(one for one in looks.guidance if _within_at_first(one, trace)),
        not_watched=tuple(looks.not_watched),
        reached=reached,
        signals=looks.known,
    )


def _still_beyond(one: Watched, trace: Trace) -> bool:
    """Whether goods of the day's intake are yet to come within a limit when the run begins, in the first draw."""
    if one.body is None or one.body.kind != "intake" or one.body.lot.start_temperature is not None:
        return False
    first, limit = float(trace.first[one.signal, 0]), middle(one.limit.limit_c)
    return first > limit if one.limit.side == "above" else first < limit


def _within_at_first(one: Watched, trace: Trace) -> bool:
    """Whether goods are cold enough when the run begins for guidance to count from there; what comes later is."""
    later = one.body is not None and one.body.kind == "coming"
    return later or float(trace.first[one.signal, 0]) <= middle(one.limit.limit_c)


def _capacity(project: Project, course: Course, capacity_w: Number | None) -> Number | None:
    if not any(on for _, on in course.power):
        return None
    found = project.machine.capacity if capacity_w is None else capacity_w
    if found is None:
        text = 'The machine runs in this, and nothing tells its capacity: write it, such as "4 kW".'
        raise BadProject([Problem(text, file=project.file, path="machine.capacity")])
    return found


def _warm_start(scene: Scene) -> Number:
    """The day's mean of what surrounds a box, each surface by what it conducts."""
    heat: Number = 0.0
    whole: Number = 0.0
    for one in scene.body.surfaces:
        site = scene.project.site
        if one.behind in scene.airs:
            behind: Number = scene.airs[one.behind].temperature_c
        else:
            assert site is not None, "nothing on the ground without a site"
            behind = site.ground_temperature
        hours = np.asarray(behind)
        if hours.ndim:
            behind = np.mean(hours, axis=-1, keepdims=True) if hours.ndim > 1 else float(np.mean(hours))
        through = one.effective_area / one.resistance
        heat, whole = heat + through * behind, whole + through
    return heat / whole


def _times(course: Course) -> list[float]:
    """Instants of the series: the start, the end, whole steps of the clock between, and what happens."""
    length = course.end_s - course.start_s
    apart = next(step for until, step in APART_S if length <= until * HOUR_S)
    first = np.floor(course.start_s / apart) + 1.0
    found = {course.start_s, course.end_s, *(float(at) for at in np.arange(first * apart, course.end_s, apart))}
    found |= set(course.marks()) | {one.at_s for one in course.happenings}
    return sorted(at for at in found if course.start_s <= at <= course.end_s)


class _Looks:
    """The signals and watches of a run."""

    def __init__(self, made: Rig, course: Course, series: bool) -> None:
        self.signals: list[Signal] = []
        self.watches: list[Watch] = []
        self.known: dict[tuple[str, str, str], int] = {}
        self.limits: list[Watched] = []
        self.guidance: list[Watched] = []
        self.not_watched: list[str] = []
        self.made, self.course = made, course
        self.signal("air", "", "air", Signal(what="air"))
        if series:
            self._everything()
        for body in made.bodies:
            for limit in body.lot.limits:
                self._limit(body, limit)
            if _spoils(body) and (body.kind == "intake" or self._within(body, "above", GUIDANCE_C)):
                limit = Limit(side="above", limit_c=GUIDANCE_C, where="surface", allowed_s=GUIDANCE_S)
                self.guidance.append(self._watched(body, limit))
        for limit in made.project.box.limits:
            self.limits.append(self._watched(None, limit))

    def signal(self, kind: str, name: str, where: str, made: Signal) -> int:
        key = (kind, name, where)
        if key not in self.known:
            self.known[key] = len(self.signals)
            self.signals.append(made)
        return self.known[key]

    def of_body(self, body: Body | None, where: str) -> int:
        if body is None or where == "air":
            return self.signal("air", "", "air", Signal(what="air"))
        return self.signal("lot", body.label, where, Signal(what="lot", where=_WHERE[where], row=body.row))

    def coming_down(self, limit: Number) -> int:
        self.watches.append(Watch(signal=self.of_body(None, "air"), side="below", limit=limit))
        return len(self.watches) - 1

    def _everything(self) -> None:
        self.signal("humidity ratio", "", "", Signal(what="humidity ratio"))
        for body in self.made.bodies:
            for where in ("surface", "mean", "core"):
                self.of_body(body, where)
        for name, row in self.made.pack_rows.items():
            self.signal("pack mass", name, "", Signal(what="pack mass", row=row))
            self.signal("pack frozen", name, "", Signal(what="pack frozen", row=row))
        if self.made.dry_ice:
            self.signal("carbon dioxide", "", "", Signal(what="carbon dioxide"))

    def _limit(self, body: Body, limit: Limit) -> None:
        if body.kind == "coming" and not self._within(body, limit.side, limit.limit_c):
            self.not_watched.append(
                f"{body.label} comes in at {middle(body.start_c):.1f} °C, beyond its limit of"
                f" {middle(limit.limit_c):.1f} °C: that limit is not watched for it"
            )
            return
        self.limits.append(self._watched(body, limit))

    def _within(self, body: Body, side: str, limit_c: Number) -> bool:
        start, limit = middle(body.start_c), middle(limit_c)
        return start <= limit if side == "above" else start >= limit

    def _watched(self, body: Body | None, limit: Limit) -> Watched:
        signal = self.of_body(body, limit.where if body is not None else "air")
        self.watches.append(
            Watch(signal=signal, side=limit.side, limit=limit.limit_c, allowed_s=float(limit.allowed_s))
        )
        return Watched(body=body, limit=limit, signal=signal, watch=len(self.watches) - 1)


_WHERE: Final[dict[str, Literal["surface", "mean", "core", "air"]]] = {
    "surface": "surface", "mean": "mean", "core": "core", "air": "air",
}  # fmt: skip


def _spoils(body: Body) -> bool:
    product = body.lot.product
    if product is None or product not in (*load.names("foods"), *load.aliases("foods")):
        return False
    return load.row("foods", product).get("group") in SPOILS


def last_beyond(times_s: FloatArray, values: FloatArray, limit: Number, side: str) -> FloatArray:
    """Seconds at which figures (time, draw) are beyond a limit for the last time, (draw,).

    Straight between instants; -inf: never beyond; inf: beyond at the end.
    """
    over = (values - np.ravel(limit)) * (1.0 if side == "above" else -1.0)
    beyond = over > 0.0
    last = len(times_s) - 1 - np.argmax(beyond[::-1], axis=0)
    each = np.arange(values.shape[1])
    after = np.minimum(last + 1, len(times_s) - 1)
    high, low = over[last, each], over[after, each]
    share = np.where(high > low, high / np.where(high > low, high - low, 1.0), 0.0)
    found = times_s[last] + share * (times_s[after] - times_s[last])
    found = np.where(beyond[-1], np.inf, found)
    return np.asarray(np.where(beyond.any(axis=0), found, -np.inf))
