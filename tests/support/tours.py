"""The way from an empty folder to a sized freezer with two doors, goods and sun, as a user would go it."""

from __future__ import annotations

from screens import Driven

SI = {
    "length": "6 m", "width": "5 m", "height": "3 m", "temperature": "-20 °C", "bearing": "S", "door": "1.2 m",
    "second": "900 mm", "passages": "60/day", "arrives": "900 kg/day", "warm": "-12 °C", "stored": "8000 kg",
    "limit": "-12 °C",
}  # fmt: skip
IP = {
    "length": "19 ft 8 in", "width": "16 ft", "height": "10 ft", "temperature": "-4 °F", "bearing": "S",
    "door": "4 ft", "second": "36 in", "passages": "60/day", "arrives": "2000 lb/day", "warm": "10 °F",
    "stored": "18000 lb", "limit": "10 °F",
}  # fmt: skip


def build(driven: Driven, say: dict[str, str], *, system: str) -> None:
    """From the first page to a freezer outdoors, everything typed in one system of units, then saved."""
    driven.press("ctrl+n", "enter").type("quay").press("enter")
    if system == "IP":
        driven.press("U")
    driven.to_thing("place and weather").pick("place", "Halifax")
    driven.to_thing("box")
    for key in ("length", "width", "height", "bearing", "temperature"):
        driven.field(key, say[key])
    driven.pick("construction", "pir150").pick("neighbour", "outdoors")
    driven.to_thing("floor").field("construction", "freezer slab").pick("neighbour", "ground")
    driven.press("escape").press("home")
    _to(driven, "faces.front")
    driven.add("door").field("name", "quay door").field("width", say["door"]).field("passages", say["passages"])
    driven.press("escape")
    _to(driven, "faces.back")
    driven.add("door").field("name", "back door").field("width", say["second"])
    driven.press("escape")
    driven.add("goods").field("name", "cod").pick("product", "frozen fish").field("arrives", say["arrives"])
    driven.field("arrival_temperature", say["warm"]).field("stored", say["stored"])
    driven.press("escape", "ctrl+s")


def _to(driven: Driven, path: str) -> None:
    """Walk over the carton with the arrows until the cursor stands on a thing."""
    page = driven.shell.page
    for keys in (("left",) * 4, ("right",) * 5, ("up",) * 4, ("down",) * 6):
        for key in keys:
            if page.at == path:  # type: ignore[attr-defined]
                return
            driven.press(key)
    assert page.at == path, page.at  # type: ignore[attr-defined]
