"""Whole answers pinned, one example in SI and one in IP units: regression, and no proof that a figure is right.

What proves figures stands in tests/published and beside each method. This only shows that an answer has changed, so
that nobody changes one unaware. To pin anew, once the reason is known and written into the commit:
PIN=1 python -m pytest tests/golden
"""

from __future__ import annotations

import json
import os
from pathlib import Path
from typing import Any

import pytest

from coldbox.cli.main import main

ROOT = Path(__file__).parents[2]
PINNED = Path(__file__).parent
EXAMPLES = ("long-quay-freezer", "cookhouse-cooler")

pytestmark = pytest.mark.regression


def _answer(capsys: pytest.CaptureFixture[str], *words: str) -> str:
    assert main(list(words)) == 0
    return capsys.readouterr().out


def _to_nine_digits(value: Any) -> Any:
    """Figures as they are on every machine: the last digits hang on its library of functions."""
    if isinstance(value, float):
        return float(f"{value:.9g}") + 0.0
    if isinstance(value, dict):
        return {key: _to_nine_digits(one) for key, one in value.items()}
    return [_to_nine_digits(one) for one in value] if isinstance(value, list) else value


def _pinned(name: str, text: str) -> str:
    file = PINNED / name
    if os.environ.get("PIN"):
        file.write_text(text, encoding="utf-8")
    return file.read_text(encoding="utf-8")


@pytest.mark.parametrize("example", EXAMPLES)
def test_the_text_of_a_load(example: str, capsys: pytest.CaptureFixture[str], monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setenv("COLUMNS", "80")
    text = _answer(capsys, "load", str(ROOT / "projects" / f"{example}.toml"), "--how")
    assert text == _pinned(f"{example}.txt", text)


@pytest.mark.parametrize("example", EXAMPLES)
def test_the_json_of_a_load(example: str, capsys: pytest.CaptureFixture[str]) -> None:
    told = json.loads(_answer(capsys, "load", str(ROOT / "projects" / f"{example}.toml"), "--json"))
    text = json.dumps(_to_nine_digits(told), ensure_ascii=False, indent=1) + "\n"
    assert text == _pinned(f"{example}.json", text)
