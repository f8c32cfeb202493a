"""The program as a process: pipes that close, disks that are full, terminals that know no UTF-8."""

from __future__ import annotations

import json
import os
import subprocess
import sys
from collections.abc import Mapping
from pathlib import Path

import pytest

ROOT = Path(__file__).parents[2]
TUB = "projects/herring-tub.toml"
FREEZER = "projects/long-quay-freezer.toml"


def run(*words: str, out: int = subprocess.PIPE, env: Mapping[str, str] = {}) -> subprocess.CompletedProcess[bytes]:  # noqa: B006
    return subprocess.run(
        [sys.executable, "-m", "coldbox", *words],
        cwd=ROOT,
        env={**os.environ, "PYTHONPATH": str(ROOT), "PYTHONIOENCODING": "", **env},
        stdout=out,
        stderr=subprocess.PIPE,
        check=False,
        timeout=60,
    )


def test_results_on_one_stream_and_errors_on_the_other() -> None:
    good = run("load", TUB, "--json", env={"PYTHONUTF8": "1"})
    assert good.returncode == 0
    assert not good.stderr
    assert json.loads(good.stdout)["name"] == "Herring tub"
    bad = run("load", "projects/absent.toml")
    assert bad.returncode == 2
    assert not bad.stdout
    assert bad.stderr == b"projects/absent.toml: there is no such file.\n"


@pytest.mark.skipif(not os.path.exists("/dev/full"), reason="needs a device that is always full")
@pytest.mark.parametrize("words", [["load", TUB], ["load", TUB, "--json"], ["sources", "--fields"], ["--help"]])
def test_a_full_disk_is_one_line(words: list[str]) -> None:
    with open("/dev/full", "wb") as full:
        told = run(*words, out=full.fileno())
    assert told.returncode == 2
    assert told.stderr.count(b"\n") == 1
    assert b"No space left" in told.stderr


@pytest.mark.parametrize("words", [["load", FREEZER, "--how"], ["sources", "--fields"], ["sources", "--json"]])
def test_a_pipe_that_closes_is_silence(words: list[str]) -> None:
    reading, writing = os.pipe()
    os.close(reading)  # nobody listens
    try:
        told = run(*words, out=writing)
    finally:
        os.close(writing)
    assert told.returncode == 0
    assert not told.stderr


@pytest.mark.parametrize("words", [["load", TUB, "--how"], ["check", FREEZER], ["load", FREEZER, "--units", "IP"]])
def test_ascii_where_the_terminal_knows_no_more(words: list[str]) -> None:
    told = run(*words, env={"LC_ALL": "C", "PYTHONCOERCECLOCALE": "0", "PYTHONUTF8": "0", "PYTHONIOENCODING": "ascii"})
    assert told.returncode == 0, told.stderr
    text = told.stdout.decode("ascii")
    assert text.isascii()
    assert any(words in text for words in ("refrigeration", "come in", "no errors"))


def test_errors_too_where_the_terminal_knows_no_more(tmp_path: Path) -> None:
    file = tmp_path / "kühl.toml"
    file.write_text('format = 1\n[box]\ntemperature = "3 °X"\n', encoding="utf-8")
    told = run("check", str(file), env={"LC_ALL": "C", "PYTHONCOERCECLOCALE": "0", "PYTHONUTF8": "0"})
    assert told.returncode == 2
    assert b"box.temperature" in told.stderr
    assert b"Traceback" not in told.stderr


def test_the_same_answer_to_the_last_digit() -> None:
    first, second = (run("load", FREEZER, "--json", env={"PYTHONUTF8": "1", "PYTHONHASHSEED": seed}) for seed in "12")
    assert first.stdout == second.stdout
