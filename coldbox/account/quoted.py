"""Printed figures that stand in for entries of the account."""

from __future__ import annotations

from coldbox.account.entry import GROUPS, Entry, Input
from coldbox.account.shapes import day
from coldbox.errors import BadProject, Problem
from coldbox.project.model import Quoted
from coldbox.scene import Scene


def apply(scene: Scene, entries: list[Entry]) -> list[Entry]:
    """The entries with each quoted figure in place of those it replaces; its remark tells what our own method gave.

    Raises BadProject where one names an entry that this account does not have.
    """
    placed, unmet = put_in_place(scene, entries)
    if unmet:
        raise BadProject(_nothing_to_replace(scene, quoted, name, entries) for quoted, name in unmet)
    return placed


def put_in_place(scene: Scene, entries: list[Entry]) -> tuple[list[Entry], list[tuple[Quoted, str]]]:
    """As `apply`, with the names that met no entry returned instead of raised (a group's name may meet none)."""
    unmet: list[tuple[Quoted, str]] = []
    standing = list(entries)
    added: list[Entry] = []
    for quoted in scene.project.quoted:
        gone = [entry for entry in standing if _replaced(entry, quoted)]
        standing = [entry for entry in standing if not _replaced(entry, quoted)]
        unmet += [
            (quoted, name)
            for name in quoted.replaces
            if name not in GROUPS and not any(_matches(entry, name) for entry in gone)
        ]
        added.append(_entry(quoted, gone))
    return standing + added, unmet


def _replaced(entry: Entry, quoted: Quoted) -> bool:
    return any(_matches(entry, name) for name in quoted.replaces)


def _matches(entry: Entry, name: str) -> bool:
    """A group's name stands for all its entries, an id for itself and for what lies under it."""
    return name in (entry.group, entry.id) or entry.id.startswith(f"{name}.")


def _nothing_to_replace(scene: Scene, quoted: Quoted, name: str, entries: list[Entry]) -> Problem:
    path = f"quoted.{quoted.name}.replaces"
    origin = scene.project.origins.get(path)
    ids = ", ".join(entry.id for entry in entries)
    return Problem(
        f'"{name}" is no entry of this account. Write a group ({", ".join(GROUPS)}) or one of: {ids}.',
        file=scene.project.file,
        line=origin.line if origin else None,
        path=path,
    )


def _entry(quoted: Quoted, gone: list[Entry]) -> Entry:
    watts = day(quoted.power * quoted.hours.shares())
    own = sum(entry.hours_w.mean() for entry in gone)
    return Entry(
        id=f"quoted.{quoted.name}",
        group=quoted.group,
        label=quoted.name,
        sensible_w=watts * (1.0 - quoted.latent),
        latent_w=watts * quoted.latent,
        moisture_kg_per_day=sum((entry.moisture_kg_per_day for entry in gone), 0.0),
        method="quoted figure",
        source=f"quoted: {quoted.source}",
        formula="P over its hours",
        inputs=(
            Input(key="power_w", label="P", value=quoted.power, kind="power"),
            Input(key="instead_of_w", label="our own methods, mean", value=own, kind="power"),
        ),
        remark=f"stands in for {', '.join(entry.id for entry in gone)}" if gone else "",
    )
