"""Every figure from outside that this tool is held against, one test per case."""

from __future__ import annotations

import tomllib
from collections import Counter
from pathlib import Path

import numpy as np
import pytest

import coldbox
from coldbox.paper import checks

CASES = list(checks.cases())
SOURCES = tomllib.loads((Path(coldbox.__file__).parent / "tables" / "sources.toml").read_text(encoding="utf-8"))


@pytest.mark.parametrize("case", CASES, ids=[str(case["id"]) for case in CASES])
def test_case(case):
    result = checks.check(case)
    assert result.passed, (
        f"{result.where}: expected {result.expected}, computed {result.computed}, off by {result.deviation:.4g},"
        f" allowed {result.tolerance:.4g}. {result.remark}"
    )


def test_ids_are_unique():
    twice = [name for name, count in Counter(case["id"] for case in CASES).items() if count > 1]
    assert not twice


def test_sources_resolve():
    lost = {case["id"]: case["source"] for case in CASES if case["source"] not in SOURCES}
    assert not lost


def test_regressions_never_stand_alone():
    """Our own output may be pinned only beside a figure from outside for the same function."""
    outside = {case["call"] for case in CASES if case["kind"] != "regression"}
    assert not [case["id"] for case in CASES if case["kind"] == "regression" and case["call"] not in outside]


def test_library_cases_name_a_version():
    """In its row among the sources, or in the remark."""
    libraries = [case for case in CASES if case["kind"] == "library"]
    texts = {case["id"]: SOURCES[case["source"]]["where"] + case.get("remark", "") for case in libraries}
    assert not [name for name, text in texts.items() if not any(letter.isdigit() for letter in text)]


BASE = {
    "id": "x",
    "method": "panels",
    "kind": "analytic",
    "source": "iso-6946",
    "where": "here",
    "trust": "C",
    "call": "coldbox.units.clock.Span",
    "inputs": {"start_h": 1.0, "end_h": 2.0, "share": 0.5},
    "part": "share",
    "expected": 0.5,
    "tolerance": 0.001,
}


def test_the_runner_can_fail():
    assert checks.check(BASE).passed
    assert not checks.check({**BASE, "expected": 0.502}).passed
    assert checks.check({**BASE, "times": 2.0, "expected": 1.0}).passed
    assert not checks.check({**BASE, "inputs": {**BASE["inputs"], "share": float("nan")}}).passed
    lists = {**BASE, "inputs": {**BASE["inputs"], "share": [0.5, 0.6]}}
    assert checks.check({**lists, "expected": [0.5, 0.6]}).passed
    worse = checks.check({**lists, "expected": [0.5, 0.7]})
    assert not worse.passed
    np.testing.assert_allclose(worse.deviation, 0.1)


@pytest.mark.parametrize(
    "change",
    [
        {"relative_tolerance": 0.1},
        {"kind": "hearsay"},
        {"trust": "Z"},
        {"method": "alchemy"},
        {"inptus": {}},
    ],
    ids=lambda change: next(iter(change)),
)
def test_a_faulty_case_is_refused(tmp_path, change):
    import tomli_w

    (tmp_path / "bad.toml").write_text(tomli_w.dumps({"case": [{**BASE, **change}]}), encoding="utf-8")
    with pytest.raises(checks.CaseFault):
        list(checks.cases(tmp_path))


@pytest.mark.parametrize("call", ["os.system", "coldbox.paper.checks.importlib.import_module", "coldbox.paper._part"])
def test_nothing_outside_coldbox_can_be_called(call):
    with pytest.raises(checks.CaseFault):
        checks.check({**BASE, "call": call})
