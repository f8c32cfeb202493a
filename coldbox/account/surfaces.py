"""The outsides of the envelope beside the air behind them: where they may sweat, and how warm the sun makes them."""

from __future__ import annotations

from collections.abc import Mapping

from coldbox.account.outdoors import Outdoors
from coldbox.account.shapes import day
from coldbox.physics import surface
from coldbox.physics.number import FloatArray, Number
from coldbox.record import Record
from coldbox.scene import Scene
from coldbox.scene import body as bodies
from coldbox.scene.draws import matters
from coldbox.scene.types import Surface


class SurfaceFact(Record):
    """The outside of a surface beside the air there: below the dew point it sweats. Figures float or (draws, 1)."""

    id: str
    label: str
    behind: str
    coldest_c: Number
    warmest_c: Number
    over_dew_point_k: Number  # least through the day of surface less dew point
    dew_point_c: Number  # in the hour of that least
    bridged: bool  # joints or bolts go through it, colder than this


def surface_fact(scene: Scene, one: Surface, solved: Outdoors | None, places: Mapping[str, int]) -> SurfaceFact:
    """The outside of one surface; steady unless it was solved through the day (`places`: id to place in the stack)."""
    made = one.construction
    bridged = made is not None and (matters(made.edge_loss) or (made.points > 0 and matters(made.point_loss)))
    place = places.get(one.id)
    if solved is not None and place is not None:
        return SurfaceFact(
            id=one.id,
            label=one.label,
            behind=one.behind,
            coldest_c=solved.steady(solved.coldest_c, place),
            warmest_c=solved.steady(solved.peak_surface_c, place),
            over_dew_point_k=solved.steady(solved.over_dew_point_k, place),
            dew_point_c=solved.steady(solved.dew_point_c, place),
            bridged=bridged,
        )
    air, film = scene.airs[one.behind], one.outside_film
    rest = one.outside_area / bodies.conductance(one) - film
    surface_c = day(surface.steady_surface(air.temperature_c, scene.room.temperature_c, rest, film))
    over = surface_c - air.dew_point_c
    nearest = int(over.reshape(-1, 24).mean(axis=0).argmin())
    return SurfaceFact(
        id=one.id,
        label=one.label,
        behind=one.behind,
        coldest_c=_ends(surface_c.min(axis=-1, keepdims=True)),
        warmest_c=_ends(surface_c.max(axis=-1, keepdims=True)),
        over_dew_point_k=_ends(over.min(axis=-1, keepdims=True)),
        dew_point_c=_ends(day(air.dew_point_c)[..., nearest : nearest + 1]),
        bridged=bridged,
    )


def _ends(figure: FloatArray) -> Number:
    return float(figure[0]) if figure.ndim == 1 else figure
