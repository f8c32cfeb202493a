"""The paper: its place."""

from __future__ import annotations

from coldbox.tui.pages.coming import Coming


class Page(Coming):
    """What will stand here."""

    title = "Paper"
    topic = "paper"
    words = (
        "Not available yet.",
        "Here the report will stand as it prints: the account, sources, checks and cautions.",
        "Until then: coldbox load FILE --how prints the account with formulas and sources, and --markdown makes a"
        " text that a word processor takes.",
    )
