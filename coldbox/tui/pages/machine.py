"""The machine: its place."""

from __future__ import annotations

from coldbox.tui.pages.coming import Coming


class Page(Coming):
    """What will stand here."""

    title = "Machine"
    topic = "machine"
    words = (
        "Not available yet.",
        "Here the units of the shop library will stand, ranked by how they fit this box: the balance point drawn, the"
        " hours they run, the temperature the room settles at, the energy a day.",
        "Until then: the required capacity stands at the bottom; hold it against the data sheet of the unit at the"
        " room's temperature and the outdoor temperature of the design day.",
    )
