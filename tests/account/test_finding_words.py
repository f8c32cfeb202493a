"""Findings speak the reader's units: the same sentence in SI and in IP, its figures turned late."""

from __future__ import annotations

import json
import re
from pathlib import Path

import pytest

from coldbox.account.entry import Figure, Finding
from coldbox.account.load import load
from coldbox.cli.main import main
from coldbox.project import store

PROJECTS = Path(__file__).parents[2] / "projects"
SI_UNITS = re.compile(r"\d (°C|W|kW|kg|m²K/W|W/m²K|K|mm|m)\b(?! \(R)")
BOTH = re.compile(r"\d °C \(\d+ °F\)")  # guidance that is known by both figures


def test_a_figure_in_both_systems() -> None:
    text = ("it falls to ", Figure(value=-18.0, kind="temperature"), "; the rule asks for ")
    asked = Figure(value=25 * 0.1761101838, kind="resistance", digits=3, both=True)
    found = Finding(level="note", id="a", text=(*text, asked), rule="")
    assert found.words() == "it falls to -18 °C; the rule asks for 4.4 m²K/W (R-25)"
    assert found.words("IP") == "it falls to -0.4 °F; the rule asks for R-25"


@pytest.mark.parametrize("example", sorted(path.stem for path in PROJECTS.glob("*.toml")))
def test_no_finding_of_an_example_speaks_si_to_readers_of_ip(example: str) -> None:
    for finding in load(store.open(str(PROJECTS / f"{example}.toml"), {})).findings:
        told = BOTH.sub("", finding.words("IP"))
        assert not SI_UNITS.search(told), told
        if isinstance(finding.text, tuple) and any(isinstance(one, Figure) for one in finding.text):
            assert finding.words("IP") != finding.words("SI")


@pytest.mark.parametrize("words", [("load",), ("load", "--markdown"), ("check",)])
def test_commands_print_findings_in_the_units_asked_for(
    words: tuple[str, ...], capsys: pytest.CaptureFixture[str]
) -> None:
    file = str(PROJECTS / "long-quay-freezer.toml")
    main([*words, file, "--units", "IP"])
    told = " ".join(capsys.readouterr().out.split())
    assert "would settle at 36.2 °F" in told and "its foam has R-22.7, the rule asks for R-32" in told
    main([*words, file])
    assert "would settle at 2.3 °C" in " ".join(capsys.readouterr().out.split())


def test_json_stays_in_si(capsys: pytest.CaptureFixture[str]) -> None:
    main(["load", str(PROJECTS / "long-quay-freezer.toml"), "--units", "IP", "--json"])
    texts = [one["text"] for one in json.loads(capsys.readouterr().out)["findings"]]
    assert any("would settle at 2.3 °C" in text for text in texts)
