"""From what a file says to a complete project: names looked up, defaults filled in, rules across fields kept.

Everything wrong is gathered and told in one go. Where something is missing, nan stands in for it, which breaks no
comparison, until the end of the reading; then the problems are raised and no nan gets out.
"""

from __future__ import annotations

import os
from collections.abc import Callable, Iterable
from functools import partial
from typing import Any, TypeVar

from coldbox.errors import BadProject, Problem
from coldbox.project import sizes
from coldbox.project.model import WALLS, Box, Door, Face, Lot, Origin, Panel, Project
from coldbox.project.raw import Block, Raw
from coldbox.project.resolve import body, course, goods, inside, openings, rules
from coldbox.project.resolve.constructions import Walls
from coldbox.project.resolve.openings import Opening, title
from coldbox.project.resolve.reader import Reader, Work
from coldbox.project.resolve.surroundings import Behind, neighbours, own_names, site
from coldbox.project.shop import Library

__all__ = ["resolve"]

_Thing = TypeVar("_Thing")


def resolve(raw: Raw, problems: Iterable[Problem], library: Library) -> Project:
    """The project of a file, complete.

    raw       what the file says, read field by field
    problems  what that reading found wrong
    library   the shop library, asked only for what the file names
    result    the project; `origins` has an entry for each value typed, looked up or filled in that has an effect
    raises    BadProject with every problem of the file, in its order
    """
    work = Work(raw.file, list(problems), library)
    project = _Resolving(work, raw).project()
    work.problems.extend(library.problems)
    if work.problems:
        raise BadProject(_in_order(work.problems, raw.file))
    return project


def _in_order(problems: Iterable[Problem], file: str) -> list[Problem]:
    once = list(dict.fromkeys(problems))
    return sorted(once, key=lambda one: (one.file != file, one.line is None, one.line or 0))


class _Resolving:
    """One run of `resolve`: the parts that several steps need."""

    def __init__(self, work: Work, raw: Raw) -> None:
        self.work, self.blocks = work, raw.blocks
        self.top = Reader(work, "", "", self.one(""))
        stem = os.path.splitext(os.path.basename(raw.file))[0]
        self.name = str(self.top.given("name") or stem)
        rooms = neighbours(work, self.many("neighbours"), own_names(raw.file, self.name))
        self.behind = Behind(work, rooms)
        self.walls = Walls(work, self.many("constructions"))
        self.box, self.common = body.box(work, self.one("box"), self.walls)
        self.faces = body.faces(work, self.many("faces"), self.common, self.walls, self.behind)

    def one(self, table: str) -> Block | None:
        return next(iter(self.blocks.get(table, ())), None)

    def many(self, table: str) -> tuple[Block, ...]:
        return self.blocks.get(table, ())

    def each(self, table: str, make: Callable[[Work, Block, str], _Thing], word: str = "") -> tuple[_Thing, ...]:
        """Every block of a table made into a thing, with its name."""
        blocks = self.many(table)
        return tuple(make(self.work, block, title(block, word or table, len(blocks) == 1)) for block in blocks)

    def project(self) -> Project:
        work, box, top = self.work, self.box, self.top
        panels, doors = self._cut_out()
        lots: tuple[Lot, ...] = self.each("lots", partial(goods.lot, box=box), "lot")
        packs = self.each("packs", partial(goods.pack, box=box), "pack")
        fresh = self.each(
            "ventilation", partial(openings.ventilation, common=self.common, behind=self.behind), "fresh air"
        )
        machine = inside.machine(work, self.one("machine"), box)
        things = course.Things(
            doors=[one.name for one in doors], lots=[one.name for one in lots], packs=[one.name for one in packs]
        )
        outage = course.outage(work, self.one("outage"), things, self.behind)
        trip = course.trip(work, self.one("trip"), things, {one.name: float(one.stored) for one in lots})
        moving = Reader(work, "trip", "trip", self.one("trip")) if trip is not None else None
        place = site(work, self.one("site"), self.behind, moving)
        self._about_the_sun(panels, doors)
        return Project(
            file=work.file,
            name=self.name,
            units=top.value("units"),
            customer=top.given("customer") or "",
            by=top.given("by") or "",
            notes=top.given("notes") or "",
            site=place,
            box=box,
            constructions=self.walls.all(),
            neighbours=self.behind.named,
            faces=self.faces,
            panels=panels,
            doors=doors,
            lots=lots,
            packs=packs,
            people=self.each("people", inside.people),
            lights=self.each("lights", inside.light),
            motors=self.each("motors", inside.motor, "motor"),
            trucks=self.each("trucks", inside.motor, "truck"),
            heaters=self.each("heaters", partial(inside.heater, floor_behind=self.faces["floor"].neighbour), "heater"),
            ventilation=fresh,
            quoted=self.each("quoted", inside.quoted, "quoted"),
            machine=machine,
            outage=outage,
            trip=trip,
            sizing=course.sizing(work, self.one("sizing"), box, machine),
            money=course.money(work, self.one("money")),
            spread_factors=course.spreads(work, self.one("spreads")),
            fit=course.fit(work, self.one("fit")),
            origins=work.origins,
            spreads=work.spreads,
        )

    def _cut_out(self) -> tuple[tuple[Panel, ...], tuple[Door, ...]]:
        """Panels and doors, in a box whose inside is known once the panels' constructions are."""
        in_panels = self._openings("panels", "panel")
        in_doors = self._openings("doors", "door")
        made = self.walls.made
        cut = [(opening.face.name, opening.construction) for _, opening in in_panels]
        thickness = sizes.wall_thickness(self.box, self.faces, cut, made)
        within = sizes.inside(self.box, thickness)
        panels = tuple(openings.panel(opening, name, within) for name, opening in in_panels)
        doors = tuple(openings.door(opening, name) for name, opening in in_doors)
        if rules.sizes(self.common.reader, self.box, within, thickness):
            readers = [opening.reader for _, opening in (*in_panels, *in_doors)]
            both: list[tuple[Reader, Panel | Door]] = list(zip(readers, (*panels, *doors), strict=True))
            for reader, thing in both:
                rules.fits(reader, thing, within)
            rules.cut_out(self.faces, both, within, _notch(self.box))
        for (_, opening), door in zip(in_doors, doors, strict=True):
            rules.open_time(opening.reader, door)
        floor = Reader(
            self.work, "faces", "faces.floor", next((b for b in self.many("faces") if b.name == "floor"), None)
        )
        place = self.one("site")
        rules.ground_inside(floor, self.faces["floor"], place is not None and "ground_temperature" in place.values)
        return panels, doors

    def _openings(self, table: str, word: str) -> list[tuple[str, Opening]]:
        blocks = self.many(table)
        return [
            (
                title(block, word, len(blocks) == 1),
                Opening(Reader(self.work, table, block.path, block), self.faces, self.common, self.walls, self.behind),
            )
            for block in blocks
        ]

    def _about_the_sun(self, panels: tuple[Panel, ...], doors: tuple[Door, ...]) -> None:
        """Says that the worst bearing counts, where a wall is in the sun and the file gives none."""
        seen: list[Face | Panel | Door] = [*self.faces.values(), *panels, *doors]
        walls = (*WALLS,)
        in_sun = any(one.neighbour == "outdoors" and getattr(one, "face", one.name) in walls for one in seen)
        if in_sun and self.box.bearing is None and not self.work.said("box.bearing"):
            reason = "the front may face anywhere, so the one with the most sun counts"
            self.work.origins["box.bearing"] = Origin(kind="default", text="the worst of 16", reason=reason)


def _notch(box: Box) -> Any:
    length, width = box.notch_length, box.notch_width
    return 0.0 if length is None or width is None else length * width
