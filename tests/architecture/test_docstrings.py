"""Every public function of the physics says what it computes, from what, in which units, and who published it."""

from __future__ import annotations

import ast
import doctest
import importlib
import re
from pathlib import Path

import pytest

import coldbox.physics

FOLDER = Path(coldbox.physics.__file__).parent
MODULES = sorted(path.stem for path in FOLDER.glob("*.py") if path.stem != "__init__")
# Words by which a docstring may say what a figure is measured in: a unit, or that it has none.
UNITS = re.compile(
    r"°|\bK\b|\bm\b|m²|m³|\bW\b|W/|\bJ\b|J/|kg|\bPa\b|\bs\b|1/s|\bh\b|hours?|minutes|months?|degrees|share|number|count|"
    r"unit|0\.\.1|0 to 1|1\.\.12|\bday\b|word|whether|emissivit|absorptance|directions?\b|names?\b"
)


def _functions():
    for module in MODULES:
        for node in ast.parse((FOLDER / f"{module}.py").read_text(encoding="utf-8")).body:
            if isinstance(node, ast.FunctionDef) and not node.name.startswith("_"):
                yield pytest.param(node, id=f"{module}.{node.name}")


FUNCTIONS = list(_functions())


def arguments(node):
    given = node.args
    return [argument.arg for argument in (*given.posonlyargs, *given.args, *given.kwonlyargs)]


TEXTS = {parameter.values[0].name: ast.get_docstring(parameter.values[0]) or "" for parameter in FUNCTIONS}


def explained(argument, names, text, depth=3):
    """Named itself, or within "first … last", or by "prefix_…", or in a function the text points to ("as `other`")."""
    if re.search(rf"\b{argument}\b", text):
        return True
    for first, last in re.findall(r"\b(\w+) … (\w+)\b", text):
        if first in names and last in names and names.index(first) < names.index(argument) < names.index(last):
            return True
    if any(argument.startswith(prefix) for prefix in re.findall(r"\b(\w+_)…", text)):
        return True
    others = re.findall(r"\bas (?:for |in |of )?`(\w+)`", text) if depth else []
    return any(explained(argument, names, TEXTS.get(other, ""), depth - 1) for other in others)


@pytest.mark.parametrize("node", FUNCTIONS)
def test_docstring(node):
    text = ast.get_docstring(node)
    assert text, "has no docstring"
    first, *rest = text.split("\n")
    assert first.endswith((".", ":")) or first.rstrip().endswith("K."), "first line is no sentence"
    assert not rest or rest[0] == "", "first line runs on"
    silent = [name for name in arguments(node) if not explained(name, arguments(node), text)]
    assert not silent, f"says nothing of {silent}"
    source = re.search(r"\bSource: (\S.*)", text)
    assert source, "names no source"
    if arguments(node) and "no formula" not in source[1]:
        assert UNITS.search(text), "names no unit"


@pytest.mark.parametrize("node", FUNCTIONS)
def test_signature_is_typed(node):
    given = (*node.args.posonlyargs, *node.args.args, *node.args.kwonlyargs)
    assert node.returns is not None
    assert not [argument.arg for argument in given if argument.annotation is None]


@pytest.mark.parametrize("node", FUNCTIONS)
def test_function_fits_a_screen(node):
    """Sixty lines at most, its docstring apart: then it can be read without turning pages."""
    head = node.body[0].end_lineno - node.lineno
    assert node.end_lineno - node.lineno - head <= 60


@pytest.mark.parametrize("module", MODULES)
def test_examples_are_true(module):
    result = doctest.testmod(importlib.import_module(f"coldbox.physics.{module}"))
    assert result.failed == 0


@pytest.mark.parametrize("module", MODULES)
def test_module_is_a_small_room(module):
    lines = (FOLDER / f"{module}.py").read_text(encoding="utf-8").splitlines()
    assert len(lines) <= 450
    assert ast.get_docstring(ast.parse("\n".join(lines))), "the module does not say what it holds"
