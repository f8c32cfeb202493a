"""A project whose every number is drawn, in one call, is the same projects one by one."""

from __future__ import annotations

from pathlib import Path

import numpy as np
import pytest

import coldbox
from coldbox.account.entry import Load
from coldbox.project.draw import numeric_paths, with_values

PROJECTS = sorted((Path(__file__).parents[2] / "projects").glob("*.toml"))
FIGURES = (
    "daily_heat_j", "counted_daily_j", "cold_w", "run_hours", "safety", "peak_w", "by_daily_w", "by_peak_w",
    "by_atp_w", "required_capacity_w", "frost_kg_per_day", "ua_w_per_k", "k_w_per_m2k",
)  # fmt: skip
OF_ONE_HOUR = ("peak_surface_c", "peak_sol_air_c")  # of all draws in the hour when their mean is warmest
DRAWS = 3


@pytest.mark.parametrize("file", PROJECTS, ids=lambda file: file.stem)
def test_draw_by_draw(file: Path) -> None:
    project = coldbox.open(file)
    rng = np.random.default_rng(7)
    # Downwards only, since shares may stand at 100 %.
    drawn = {path: value * (1.0 - 0.02 * rng.random((DRAWS, 1))) for path, value in numeric_paths(project).items()}
    batch = coldbox.load(with_values(project, drawn))
    if "bearing_deg" in batch.facts:
        # All draws face one way, that of their mean; one by one each would look for its own.
        facing = float(np.mean(batch.facts["bearing_deg"]))
        project = coldbox.open(file, {"box.bearing": f"{facing}°"})
    for draw in range(DRAWS):
        single = coldbox.load(with_values(project, {path: float(value[draw, 0]) for path, value in drawn.items()}))
        _same(single, batch, draw)


def _same(single: Load, batch: Load, draw: int) -> None:
    assert [entry.id for entry in single.entries] == [entry.id for entry in batch.entries]
    scale = sum(np.abs(entry.hours_w) for entry in single.entries).max()
    for one, many in zip(single.entries, batch.entries, strict=True):
        for part in ("sensible_w", "latent_w"):
            hours = np.broadcast_to(getattr(many, part), (DRAWS, 24))[draw]
            np.testing.assert_allclose(getattr(one, part), hours, rtol=0, atol=1e-10 * scale, err_msg=one.id)
        assert [item.key for item in one.inputs] == [item.key for item in many.inputs]
        for mine, theirs in zip(one.inputs, many.inputs, strict=True):
            if mine.key not in OF_ONE_HOUR:
                _close(mine.value, theirs.value, draw, f"{one.id} {mine.key}")
    np.testing.assert_allclose(single.hours_w, batch.hours_w[draw], rtol=0, atol=1e-10 * scale)
    for name in FIGURES:
        figure = getattr(single, name)
        if figure is None:
            assert getattr(batch, name) is None
            continue
        assert np.shape(figure) == ()
        assert np.shape(getattr(batch, name)) in ((), (DRAWS,)), name
        _close(figure, getattr(batch, name), draw, name)
    for key, value in single.facts.items():
        _close(value, batch.facts[key], draw, key)


def _close(one: object, many: object, draw: int, what: str) -> None:
    steady = np.broadcast_to(np.reshape(np.asarray(many, dtype=float), -1), (DRAWS,))[draw]
    np.testing.assert_allclose(np.asarray(one, dtype=float).reshape(-1)[0], steady, rtol=1e-9, atol=1e-9, err_msg=what)
