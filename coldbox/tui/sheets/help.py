"""What the help says, by where one is."""

from __future__ import annotations

TOPICS: dict[str, str] = {
    "carton": (
        "The carton is the box, unfolded: four walls in a row, the ceiling folded up from the front, the floor folded"
        " down. The figure on a face is the heat that comes through it at the box's peak hour, with its doors, air and"
        " sun where there is room; the shade says how much that is for each square metre. Doors are gaps in the"
        " outline, what is inside stands beside.\n"
        "Move the cursor with the arrows: from face to face, onto what is in them, and into the box. Enter opens what"
        " is under the cursor. Add puts something new where the cursor is.\n"
        "The line at the bottom answers: the refrigeration the box needs, and how long it holds without power. Both"
        " follow what you type."
    ),
    "sheet": (
        "A sheet holds the fields of one thing. Move with Up and Down, then type: a value with any unit you like."
        " What was understood stands below, with the usual range and what the field means. Enter takes it, Esc"
        " leaves it as it was. A wrong entry is told here and changes nothing.\n"
        "How a value stands: plain is typed by you; slanted or dim, marked (default), is what holds until you type"
        " something; (library) came from the shop library; (fitted) from a logger record. One key goes back to the"
        " default, two raise and lower a value a step and the answer moves along.\n"
        "Where words are expected, Enter opens a list that filters as you type."
    ),
    "load": (
        "The day as 24 bars, by what the heat comes from; the peak hour is marked. Below it every entry, the largest"
        " first: its watts at the peak hour, its share of the day. The cursor on an entry shows how it came about:"
        " method, formula, the numbers of this project, and the source. Enter opens the thing it belongs to."
    ),
    "outage": (
        "What happens when the power goes: the temperature of the air and of each lot against time, the limits as"
        " lines, and where the first is crossed. The band says how unsure it is: between its edges lie eight of ten"
        " draws. Left and Right read the curve off."
    ),
    "trip": (
        "The legs and stops of a trip as a strip, and under it the temperatures on the same clock. Left and Right"
        " move along the trip and read off what holds there."
    ),
    "machine": "Units that could cool this box, ranked, with the balance point drawn.",
    "paper": "The report as it will print.",
    "first": (
        "The projects of this folder, each with the capacity it needs, how long it holds without power and how many"
        " findings it has. Type to filter. Enter opens. A project that cannot be read says why; it opens all the"
        " same as far as it can.\n"
        "New starts a project from an example or from nothing; duplicate copies the one under the cursor."
    ),
    "lists": "Type to filter; Up and Down move; Enter takes the line, Esc leaves everything as it was.",
    "questions": "Type the letter of an answer, or move to it and press Enter. Esc changes nothing.",
    "reading": "Up and Down move through the text. Copy takes all of it to the clipboard of your terminal.",
}

VALUES = (
    "Values\n"
    "Units may be written as you are used to: 4 in, 101.6 mm, 10 cm; -18 °C or 0 °F; 500 cfm, 850 m³/h; R-25,"
    " RSI 4.4; 1 1/2 hp. Decimals with a comma or a point. A spread may follow: 0.2/h ± 50 %."
)
