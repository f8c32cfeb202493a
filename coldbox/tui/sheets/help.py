"""What the help says by where one is, and the page of keys."""

from __future__ import annotations

from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from coldbox.tui.layer import Layer
    from coldbox.tui.shell import Shell

TOPICS: dict[str, str] = {
    "carton": (
        "The carton is the box, unfolded: four walls in a row, the ceiling folded up from the front, the floor folded"
        " down. The figure on a face is the heat that comes through it at the box's peak hour; the shade says how much"
        " that is for each square metre. Doors are gaps in the outline, what is inside stands beside.\n"
        "Move with the arrows: from face to face, onto what is in them, and into the box. Enter opens what is under"
        " the cursor. Add puts something new where the cursor is.\n"
        "The line at the bottom answers: the refrigeration the box needs, and how long it holds without power. Both"
        " follow what you type."
    ),
    "sheet": (
        "A sheet holds the fields of one thing. Move with Up and Down, then type: a value with any unit you like. What"
        " was understood stands below, with the usual range and what the field means. Enter takes it, Esc leaves it"
        " as it was. A wrong entry is told here and changes nothing.\n"
        "What stands behind a value: nothing where you typed it; default, what holds until you type something;"
        " library, from the shop library; fitted, from a logger record. One key goes back to the default, two raise"
        " and lower a value a step, and the answer moves along.\n"
        "Where a word is expected, Enter opens a list that filters as you type."
    ),
    "load": (
        "The day as 24 bars, by what the heat comes from; the peak hour is marked. Below it every entry, the largest"
        " first: its watts at the peak hour, its share of the day. The entry under the cursor shows how it came about:"
        " method, formula, the numbers of this project, and the source. Enter opens the thing it belongs to."
    ),
    "outage": (
        "What happens when the power goes: the temperature of the air and of each lot against time, the limits as"
        " lines, and where the first is crossed. The band says how unsure that is: between its edges lie eight of ten"
        " draws. Left and Right read the curve off."
    ),
    "trip": (
        "The legs and stops of a trip as a strip, and under it the temperatures on the same clock. Left and Right move"
        " along the trip and read off what holds there."
    ),
    "machine": "Here the units that could cool this box will stand, ranked, with the balance point drawn.",
    "paper": "Here the report will stand as it prints.",
    "first": (
        "The projects of this folder, each with the capacity it needs, how long it holds without power and how many"
        " findings it has. Type to filter, Enter opens. A project that cannot be read says why.\n"
        "New starts a project from an example or from the least that computes; duplicate copies the one under the"
        " cursor."
    ),
    "lists": "Type to filter; Up and Down move; Enter takes the line, Esc leaves everything as it was.",
    "questions": "Type the letter of an answer, or move to it and press Enter. Esc changes nothing.",
    "reading": "Up and Down move through the text. Copy takes all of it.",
}

VALUES = (
    "Units may be written as you are used to: 4 in, 101.6 mm, 10 cm; -18 °C or 0 °F; 500 cfm, 850 m³/h; R-25, RSI 4.4;"
    " 1 1/2 hp. Decimals with a comma or a point. A spread may follow: 0.2/h ± 50 %."
)


def about(shell: Shell, layer: Layer) -> list[tuple[str, str]]:
    """The help that belongs to a layer, its keys first."""
    lines = [("text", line) for line in TOPICS.get(layer.topic, "").split("\n")]
    lines += [("text", ""), ("title", "Keys here")]
    lines += [("text", f"{keys}\t{words}") for where, words, keys in _listed(shell) if where == layer.where]
    lines += [("text", ""), ("title", "Keys everywhere")]
    lines += [("text", f"{keys}\t{words}") for where, words, keys in _listed(shell) if where == "everywhere"]
    return [*lines, ("text", ""), ("title", "Values"), ("text", VALUES)]


def keys(shell: Shell) -> list[tuple[str, str]]:
    """Every key, by where it holds."""
    lines: list[tuple[str, str]] = [
        ("dim", f"Another key for an action: in {shell.settings.path}, by the name in brackets."),
    ]
    for where, heading in PLACES.items():
        rows = [(words, names) for place, words, names in _listed(shell, ids=True) if place == where]
        if rows:
            lines += [("text", ""), ("title", heading)]
            lines += [("text", f"{names}\t{words}") for words, names in rows]
    return lines


PLACES = {
    "everywhere": "Everywhere",
    "page": "On every page",
    "first": "On the first page",
    "carton": "On the carton",
    "sheet": "In a sheet of fields",
    "list": "In a list or a question",
    "reading": "In a text",
}


def _listed(shell: Shell, *, ids: bool = False) -> list[tuple[str, str, str]]:
    return [
        (action.where, f"{action.words} [{action.id}]" if ids else action.words, shell.keymap.shown(action.id))
        for action in shell.keymap.actions
    ]
