"""The checks from outside: every case of tests/published, what it expects and what this tool computes.

A case names a function of coldbox, its inputs, and a figure that did not come from this code. Tests run them all, and
`coldbox sources --checked` prints them, so the two can never tell different stories.
"""

from __future__ import annotations

import importlib
import tomllib
from collections.abc import Callable, Iterator, Mapping, Sequence
from pathlib import Path
from types import ModuleType
from typing import Any, cast

import numpy as np

from coldbox.errors import ColdboxError, FileTrouble
from coldbox.physics.number import FloatArray
from coldbox.record import Record

FOLDER = Path(__file__).resolve().parents[2] / "tests" / "published"
KINDS = ("published", "analytic", "library", "common practice", "regression")
TRUST = {
    "R": "read in the document",
    "T": "read in a public copy of the document",
    "S": "read in a page that quotes the document",
    "P": "partly read",
    "M": "from memory, not read in print",
    "C": "closed form",
    "L": "reference library",
}
METHODS = (
    "units",
    "moist air",
    "panels",
    "box shape",
    "ground",
    "sun",
    "outside surface",
    "conduction through the day",
    "doors and air",
    "product",
    "inside",
    "load",
    "moisture and frost",
)
_FIELDS = {
    "id", "method", "kind", "source", "where", "trust", "call", "inputs", "part", "times",
    "expected", "tolerance", "relative_tolerance", "remark",
}  # fmt: skip


class CheckResult(Record):
    """One case and how it came out. `expected` and `computed` are numbers, words or arrays of one shape."""

    id: str
    method: str
    kind: str
    source: str
    where: str
    trust: str
    expected: Any
    computed: Any  # None when the tool refused
    deviation: float  # the largest absolute deviation; nan where there is no number to compare
    tolerance: float  # what was allowed there
    passed: bool
    remark: str


class CaseFault(ColdboxError):
    """A case that cannot be run: its file is wrong, not the tool."""

    def __init__(self, case: str, fault: str) -> None:
        self.case, self.fault = case, fault
        super().__init__(case, fault)

    def __str__(self) -> str:
        return f"Case {self.case}: {self.fault}"


def cases(folder: Path = FOLDER) -> Iterator[Mapping[str, Any]]:
    """All cases of a folder, file by file in order of name. A file with a `format` is a project that cases use."""
    files = sorted(folder.glob("*.toml"))
    if not files:
        raise FileTrouble(str(folder), "no published cases here; they come with the source checkout, not with a wheel")
    for file in files:
        content = tomllib.loads(file.read_text(encoding="utf-8"))
        if "format" in content:
            continue
        if set(content) != {"case"}:
            raise CaseFault(file.name, f"holds {sorted(content)}; only [[case]] belongs here")
        for case in content["case"]:
            yield _sound(case, file.name)


def run(folder: Path = FOLDER) -> list[CheckResult]:
    """Every case, computed and compared."""
    return [check(case, folder) for case in cases(folder)]


def check(case: Mapping[str, Any], folder: Path = FOLDER) -> CheckResult:
    """One case, computed and compared. When the tool refuses the inputs the case fails and its remark says why."""
    remark = str(case.get("remark", ""))
    try:
        computed = _called(case, folder)
    except CaseFault:
        raise
    except ColdboxError as refusal:
        computed, remark = None, f"Refused: {refusal}"
    expected: Any = _value(case["expected"], folder)
    computed, deviation, tolerance, passed = _compare(case, computed, expected)
    return CheckResult(
        id=case["id"],
        method=case["method"],
        kind=case["kind"],
        source=case["source"],
        where=case["where"],
        trust=case["trust"],
        expected=expected,
        computed=computed,
        deviation=deviation,
        tolerance=tolerance,
        passed=passed,
        remark=remark,
    )


def _sound(case: Mapping[str, Any], file: str) -> Mapping[str, Any]:
    """The case itself, if its fields are those a case may and must have."""
    name = f"{case.get('id', '?')} in {file}"
    unknown = set(case) - _FIELDS
    missing = {"id", "method", "kind", "source", "where", "trust", "call", "expected"} - set(case)
    if unknown or missing:
        raise CaseFault(name, f"unknown {sorted(unknown)}, missing {sorted(missing)}")
    if not isinstance(case["expected"], str | bool) and ("tolerance" in case) == ("relative_tolerance" in case):
        raise CaseFault(name, "needs exactly one of tolerance and relative_tolerance")
    for field, known in (("kind", KINDS), ("trust", tuple(TRUST)), ("method", METHODS)):
        if case[field] not in known:
            raise CaseFault(name, f'{field} "{case[field]}" is none of {", ".join(known)}')
    return case


def _called(case: Mapping[str, Any], folder: Path) -> Any:
    """What the named function gives for the inputs, down to the wanted part."""
    inputs = {name: _value(value, folder) for name, value in case.get("inputs", {}).items()}
    call = str(case["call"])
    result = _project(folder / str(inputs["file"])) if call == "project" else _function(call)(**inputs)
    part = str(case.get("part", ""))
    return _part(result, part.split("."), call) if part else result


def _project(file: Path) -> Any:
    """The load of a project file, as the JSON page gives it."""
    coldbox = importlib.import_module("coldbox")
    data = importlib.import_module("coldbox.paper.data")
    return data.load_json(coldbox.load(coldbox.open(file)))


def _function(name: str) -> Callable[..., Any]:
    """A function or record of coldbox by its dotted name; nothing outside coldbox can be named."""
    first, *rest = name.split(".")
    if first != "coldbox" or any(step.startswith("_") for step in rest):
        raise CaseFault(name, "only public names of coldbox can be called")
    found: Any = importlib.import_module(first)
    for depth, step in enumerate(rest, start=2):
        if isinstance(found, ModuleType) and not hasattr(found, step):
            found = importlib.import_module(".".join((first, *rest[: depth - 1])))
        else:
            found = getattr(found, step)
    if not callable(found) or not str(getattr(found, "__module__", "")).startswith("coldbox"):
        raise CaseFault(name, "is no function of coldbox")
    return cast("Callable[..., Any]", found)


def _value(value: Any, folder: Path) -> Any:
    """An input as the function takes it: lists of numbers are arrays; a table with a `call` is that call's result."""
    if isinstance(value, Mapping):
        if "call" in value:
            return _called(value, folder)
        return {name: _value(item, folder) for name, item in value.items()}
    if isinstance(value, list):
        if _numbers(value):
            return np.asarray(value, dtype=np.float64)
        return tuple(_value(item, folder) for item in value)
    return value


def _numbers(value: list[Any]) -> bool:
    return bool(value) and all(
        _numbers(item) if isinstance(item, list) else isinstance(item, int | float) and not isinstance(item, bool)
        for item in value
    )


def _part(result: Any, steps: Sequence[str], call: str) -> Any:
    """Walk into a result: keys, attributes, indices, and items of a list by their `id` (which may hold dots)."""
    if not steps:
        return result
    for length in range(len(steps), 0, -1):
        step = ".".join(steps[:length])
        if isinstance(result, Mapping):
            inner = result.get(step, _NOTHING)
        elif isinstance(result, list | tuple | np.ndarray) and step.lstrip("-").isdigit():
            inner = result[int(step)]
        elif isinstance(result, list | tuple) and not hasattr(result, step):
            inner = next((item for item in result if _id(item) == step), _NOTHING)
        else:
            inner = getattr(result, step, _NOTHING)
        if inner is not _NOTHING:
            return _part(inner, steps[length:], call)
    raise CaseFault(call, f'the result has no "{".".join(steps)}"')


_NOTHING = object()


def _id(item: Any) -> Any:
    return item.get("id") if isinstance(item, Mapping) else getattr(item, "id", None)


def _compare(case: Mapping[str, Any], computed: Any, expected: Any) -> tuple[Any, float, float, bool]:
    """Computed value as compared, largest deviation, tolerance where it lies, and whether all of it is within."""
    if isinstance(expected, str | bool) or computed is None:
        return computed, float("nan"), 0.0, computed is not None and bool(computed == expected)
    got: FloatArray = np.asarray(computed, dtype=np.float64) * float(case.get("times", 1.0))
    want: FloatArray = np.asarray(expected, dtype=np.float64)
    if got.shape != want.shape:
        raise CaseFault(case["id"], f"the result has shape {got.shape}, what is expected {want.shape}")
    allowed = np.broadcast_to(
        np.asarray(case["tolerance"] if "tolerance" in case else np.abs(want) * case["relative_tolerance"]), want.shape
    )
    away = np.abs(got - want)
    worst = np.unravel_index(int(np.argmax(away - allowed)), want.shape)
    shown = float(got) if got.ndim == 0 else got
    return shown, float(away[worst]), float(allowed[worst]), bool(np.all(away <= allowed))
