"""Roots in brackets: many at once, of awkward functions, and a refusal where there is none."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from coldbox.errors import NoRoot
from coldbox.physics.roots import bracketed


def test_many_at_once():
    squares = np.array([[0.0, 2.0, 9.0], [1e-8, 1e8, 0.25]])
    found = bracketed(lambda x: x * x - squares, 0.0, 1e5, tolerance=1e-12, what="square root")
    np.testing.assert_allclose(found, np.sqrt(squares), atol=2e-11)


@pytest.mark.parametrize(
    "function, low, high, expected",
    [
        (lambda x: x**9, -1.0, 2.0, 0.0),  # flat at the root
        (lambda x: np.cbrt(x - 0.3), -1.0, 4.0, 0.3),  # upright there
        (lambda x: np.where(x < 0.7, -1.0, 1e6), 0.0, 1.0, 0.7),  # a jump
        (lambda x: np.exp(-40.0 * x) - 1e-9, 0.0, 1.0, 9.0 * np.log(10.0) / 40.0),
        (lambda x: x * np.tan(x) - 1.0, 0.1, 1.5, 0.860333589),  # textbooks' first root of a slab at Bi 1
    ],
    ids=["flat", "upright", "jump", "steep", "tan"],
)
def test_awkward_functions(function, low, high, expected):
    found = bracketed(function, low, high, tolerance=1e-10, what="root")
    assert found == pytest.approx(expected, abs=1e-9)


def test_work_is_bounded():
    calls = 0

    def counted(x):
        nonlocal calls
        calls += 1
        return np.exp(x) - np.linspace(1.1, 5e4, 1000)

    bracketed(counted, 0.0, 20.0, tolerance=1e-10, what="logarithm")
    assert calls < 40


@given(root=st.floats(-90, 90), power=st.integers(0, 3), scale=st.floats(1e-6, 1e6))
def test_finds_what_is_there(root, power, scale):
    found = bracketed(
        lambda x: scale * (x - root) * np.abs(x - root) ** power, -100.0, 100.0, tolerance=1e-9, what="root"
    )
    assert found == pytest.approx(root, abs=1.1e-9)


def test_either_order_of_the_bracket():
    assert bracketed(lambda x: x - 1.0, 3.0, 0.0, tolerance=1e-12, what="root") == pytest.approx(1.0)


@pytest.mark.parametrize("function", [lambda x: x * x + 1.0, lambda x: x * np.nan], ids=["none", "nan"])
def test_no_root_is_refused(function):
    with pytest.raises(NoRoot, match="No root"):
        bracketed(function, -1.0, 1.0, tolerance=1e-9, what="root")


def test_one_empty_bracket_among_many_is_refused():
    with pytest.raises(NoRoot):
        bracketed(lambda x: x - np.array([0.5, 2.0]), 0.0, 1.0, tolerance=1e-9, what="root")
