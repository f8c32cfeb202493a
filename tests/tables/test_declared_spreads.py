"""The spreads table gives the reasons for the half-widths that a project falls back on: both say the same figures."""

from __future__ import annotations

import pytest

from coldbox.project.fields import field
from coldbox.tables import load


@pytest.mark.parametrize("name", load.names("spreads"))
def test_a_declared_default_is_the_row_of_the_table(name):
    row = load.row("spreads", name)
    figure = row["half_width"]
    shown = f"{100 * figure:g} %" if row["unit"] == "share" else f"{figure:g} K"
    assert field(f"spreads.{name}").default == shown
