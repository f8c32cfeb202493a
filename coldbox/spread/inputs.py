"""Which inputs are unsure, and by how much: each ± of the file, and the factors of `[spreads]` where it gives none."""

from __future__ import annotations

from collections.abc import Callable, Iterator, Mapping
from typing import Final, Literal

import numpy as np

from coldbox.physics.number import Number
from coldbox.project.draw import numeric_paths
from coldbox.project.model import Lot, Project, Spreads
from coldbox.project.origins import declaration
from coldbox.record import Record
from coldbox.scene.openings import open_share

FILMS_R: Final = 0.17  # m²K/W, both films of a quoted U
LEAST_R: Final = 0.5  # m²K/W; less is glass or bare sheet, which no foam makes unsure
WATER: Final = 0.98  # of so much water the freezing point is known
HIGHEST_FREEZING_C: Final = -0.05
ENTHALPY: Final = "*.enthalpy"  # no key of the file: a factor on all heat contents of goods
FILMS: Final = "*.films"  # likewise: a factor on all films

FACTOR_LABELS: Final[Mapping[str, str]] = {
    "foam": "conductivity of the foam",
    "ageing": "ageing of the foam",
    "air": "leakage and air change",
    "openings": "how often doors are open",
    "ambient": "temperature around",
    "enthalpy": "heat content of the goods",
    "freezing_point": "freezing point of the goods",
    "films": "surface films",
}


class Target(Record):
    """A number that a draw sets."""

    path: str
    middle: float
    half_width: float
    low: float = -np.inf
    high: float = np.inf
    quoted: float = 0.0  # of a body with one figure: its resistance; what is drawn is then a factor on its conductivity
    films: float = 0.0  # m²K/W that the figure holds beside it
    per_resistance: bool = False  # whether the figure is a U, not an R


class Column(Record):
    """One unsure input: one draw, which may set several numbers."""

    key: str  # key path; of a factor "spreads.foam"
    label: str
    shape: Literal["normal", "even"]
    targets: tuple[Target, ...]


def columns(project: Project) -> tuple[Column, ...]:
    """Every unsure input of a project, by key path.

    project: complete, without draws. Result: the inputs with a ± of their own, then the factors of `[spreads]` that
    have something to act on and are not ± 0. A number with a ± of its own, ± 0 too, is left alone by the factors.
    """
    numbers = numeric_paths(project)
    own = tuple(_own(project, path, float(numbers[path])) for path in sorted(project.spreads) if _drawn(project, path))
    return (*own, *_factors(project, numbers))


def left_out(project: Project) -> tuple[str, ...]:
    """Key paths with a ± that nothing can be drawn for: clock times, minutes of limits, what follows from the rest."""
    numbers = numeric_paths(project)
    return tuple(path for path in sorted(project.spreads) if path not in numbers and project.spreads[path].half_width)


def _drawn(project: Project, path: str) -> bool:
    return project.spreads[path].half_width > 0.0 and path in numeric_paths(project)


def _own(project: Project, path: str, middle: float) -> Column:
    spread = project.spreads[path]
    field = declaration(path)
    low = -np.inf if field is None or field.low is None else field.low
    high = np.inf if field is None or field.high is None else field.high
    target = Target(path=path, middle=middle, half_width=spread.half_width, low=low, high=high)
    return Column(key=path, label=_label(path, field.label if field else ""), shape=spread.shape, targets=(target,))


def _label(path: str, label: str) -> str:
    """Whose figure it is, in words: "leakage", "loft temperature"."""
    inner = path.partition(".")[2].rpartition(".")[0]
    return f"{inner} {label or path.rpartition('.')[2]}".strip()


def _factors(project: Project, numbers: Mapping[str, Number]) -> Iterator[Column]:
    free = {path: float(value) for path, value in numbers.items() if path not in project.spreads}
    for name in Spreads.names():
        width = float(getattr(project.spread_factors, name))
        targets = tuple(_TARGETS[name](project, free, width)) if width > 0.0 else ()
        if targets:
            yield Column(key=f"spreads.{name}", label=FACTOR_LABELS[name], shape="normal", targets=targets)


_Free = Mapping[str, float]


def _foam(project: Project, free: _Free, width: float) -> Iterator[Target]:
    """Foam layers; quoted figures of insulated bodies, whose resistance is drawn."""
    for path in _foam_layers(project):
        yield from _scaled(f"{path}.conductivity", free, width)
    for path in free:
        if path.endswith((".r_value", ".u_value")) or path == "box.k_value":
            yield from _quoted(path, free[path], width)


def _quoted(path: str, figure: float, width: float) -> Iterator[Target]:
    """One figure for a whole body: its own resistance goes as 1 / conductivity, the films in a U stay."""
    if figure <= 0.0:
        return
    per_resistance = not path.endswith(".r_value")
    films = FILMS_R if per_resistance else 0.0
    own = 1.0 / figure - films if per_resistance else figure
    if own > LEAST_R:
        yield Target(
            path=path, middle=1.0, half_width=width, low=0.1, quoted=own, films=films, per_resistance=per_resistance
        )


def _foam_layers(project: Project) -> Iterator[str]:
    """Key path of each foam layer; of a construction that stands inline, with its place as its name."""
    for name, made in project.constructions.items():
        for number, layer in enumerate(made.layers, 1):
            if layer.foam and layer.conductivity is not None:
                yield from (f"constructions.{name}.layers[{number}]", f"{name}.layers[{number}]")


def _ageing(project: Project, free: _Free, width: float) -> Iterator[Target]:
    for path in _foam_layers(project):
        yield from _added(f"{path}.ageing", free, width, low=0.0)


def _air(_project: Project, free: _Free, width: float) -> Iterator[Target]:
    paths = ["box.leakage", "box.air_change", *(path for path in free if path.endswith(".gasket_leakage"))]
    for path in paths:
        yield from _scaled(path, free, width)


def _openings(project: Project, free: _Free, width: float) -> Iterator[Target]:
    """How often doors pass people and how long they stand open; never more than all the time."""
    for number, door in enumerate(project.doors, 1):
        share = float(np.max(open_share(door)))
        most = np.inf if share <= 0.0 else max(1.0, (1.0 - 1e-9) / share)
        for key in ("passages", "stood_open"):
            for path in (f"doors.{door.name}.{key}", f"doors[{number}].{key}"):
                if f"{path.rpartition('.')[0]}.open_each" in free:
                    yield from _scaled(path, free, width, most=most)


def _ambient(_project: Project, free: _Free, width: float) -> Iterator[Target]:
    """Outdoors and the rooms behind, all warmer or all colder together."""
    for path in free:
        if path.endswith(".dry_bulb") or (path.startswith("neighbours.") and path.endswith(".temperature")):
            yield from _added(path, free, width)


def _enthalpy(project: Project, _free: _Free, width: float) -> Iterator[Target]:
    if project.lots:
        yield Target(path=ENTHALPY, middle=1.0, half_width=width, low=0.1)


def _freezing_point(project: Project, free: _Free, width: float) -> Iterator[Target]:
    for number, lot in enumerate(project.lots, 1):
        if _freezes(lot):
            for path in (f"lots.{lot.name}.freezing_point", f"lots[{number}].freezing_point"):
                yield from _added(path, free, width, high=HIGHEST_FREEZING_C)


def _freezes(lot: Lot) -> bool:
    """Whether a freezing point shapes its heat, and is not simply water's."""
    if lot.freezing_point is None or float(lot.freezing_point) > HIGHEST_FREEZING_C:
        return False
    if lot.composition is None:
        return lot.specific_heat_below is not None and lot.latent_heat is not None
    return float(lot.composition.water) < WATER


def _films(_project: Project, _free: _Free, width: float) -> Iterator[Target]:
    yield Target(path=FILMS, middle=1.0, half_width=width, low=0.1)


def _scaled(path: str, free: _Free, width: float, *, most: float = np.inf) -> Iterator[Target]:
    """A number that is unsure by a share of itself, never above `most` times it."""
    value = free.get(path)
    if value:
        yield Target(path=path, middle=value, half_width=width * abs(value), low=0.0, high=most * value)


def _added(path: str, free: _Free, width: float, *, low: float = -np.inf, high: float = np.inf) -> Iterator[Target]:
    """A number that is unsure by so much, whatever it is."""
    if path in free:
        yield Target(path=path, middle=free[path], half_width=width, low=low, high=high)


_TARGETS: Final[Mapping[str, Callable[[Project, _Free, float], Iterator[Target]]]] = {
    "foam": _foam,
    "ageing": _ageing,
    "air": _air,
    "openings": _openings,
    "ambient": _ambient,
    "enthalpy": _enthalpy,
    "freezing_point": _freezing_point,
    "films": _films,
}
