"""What each package pulls in when it is imported in a fresh process, and the one way imports may run."""

from __future__ import annotations

import subprocess
import sys
from pathlib import Path

import pytest

import coldbox

ROOT = Path(coldbox.__file__).parents[1]
PACKAGE = ROOT / "coldbox"

# Never loaded by anything that computes: screens, heavy readers and writers, test-only libraries.
NEVER = {
    "textual", "rich", "pint", "tomli_w", "scipy", "hypothesis", "pytest", "psychrolib", "pvlib", "CoolProp", "ht",
    "fluids", "pandas", "matplotlib", "dataclasses", "asyncio", "http", "urllib.request", "ssl", "socket",
    "multiprocessing", "unittest", "typing_extensions",
}  # fmt: skip
# What the computing packages have no use for until somebody asks: the page as JSON, CSV.
LATER = {"json", "csv", "argparse", "difflib"}
LAYERS = (
    "errors",
    "record",
    "units",
    "physics",
    "tables",
    "project",
    "scene",
    "account",
    "timeline",
    "spread",
    "paper",
    "cli",
)
# Numpy itself loads some of these on some versions: what it brings is not ours to answer for.
PROBE = """
import sys, numpy
before = set(sys.modules)
import importlib
for name in {names!r}:
    importlib.import_module(name)
print(*sorted(set(sys.modules) - before))
"""


def modules_of(layer):
    """Every module of a layer, so that one that nobody imports yet is looked at too."""
    file = PACKAGE / f"{layer}.py"
    if file.exists():
        return [f"coldbox.{layer}"]
    found = []
    for path in sorted((PACKAGE / layer).rglob("*.py")):
        parts = path.relative_to(ROOT).with_suffix("").parts
        found.append(".".join(parts[:-1] if parts[-1] == "__init__" else parts))
    return found


def loaded(*names):
    """Modules that importing these adds to a fresh process that already has numpy."""
    code = PROBE.format(names=list(names))
    done = subprocess.run([sys.executable, "-c", code], cwd=ROOT, capture_output=True, text=True, check=False)
    assert done.returncode == 0, done.stderr
    return set(done.stdout.split())


def among(modules, forbidden):
    return sorted(name for name in modules if any(name == one or name.startswith(f"{one}.") for one in forbidden))


# The one file that may: it is loaded when somebody hands over a quantity of that library, or a rare unit.
ON_DEMAND = {"coldbox.units.pint_bridge": "pint"}


def test_libraries_on_demand_are_in_one_file_each():
    for name, library in ON_DEMAND.items():
        users = [path for path in PACKAGE.rglob("*.py") if f"import {library}\n" in path.read_text(encoding="utf-8")]
        assert [".".join(path.relative_to(ROOT).with_suffix("").parts) for path in users] == [name]


@pytest.mark.parametrize("layer", LAYERS)
def test_a_layer_starts_without_what_it_does_not_use(layer):
    assert not among(loaded(*(name for name in modules_of(layer) if name not in ON_DEMAND)), NEVER)


@pytest.mark.parametrize("layer", LAYERS[: LAYERS.index("paper")])
def test_a_layer_loads_nothing_above_it(layer):
    above = [f"coldbox.{other}" for other in LAYERS[LAYERS.index(layer) + 1 :]]
    # Records and errors stand at the bottom in no order of their own.
    above = [name for name in above if layer != "errors" or name != "coldbox.record"]
    assert not among(loaded(*modules_of(layer)), above)


# The files of the screens that know the toolkit; what they show is decided without it.
TOOLKIT = {"coldbox.tui.app", "coldbox.tui.looks", "coldbox.tui.widgets.surface"}


def test_only_a_few_files_know_the_toolkit():
    users = {
        ".".join(path.relative_to(ROOT).with_suffix("").parts)
        for path in PACKAGE.rglob("*.py")
        if any(
            f"{word} {library}" in path.read_text(encoding="utf-8")
            for library in ("textual", "rich")
            for word in ("from", "import")
        )
    }
    assert users == TOOLKIT
    rest = [name for name in modules_of("tui") if name not in users]
    assert not among(loaded(*rest), {"textual", "rich", "pint", "scipy"})


def test_physics_knows_numpy_only():
    added = loaded(*modules_of("physics"))
    ours = {name for name in added if name.startswith("coldbox")}
    assert not among(ours, ["coldbox.tables", "coldbox.project", "coldbox.units", "coldbox.scene"])
    assert not among(added, LATER | {"tomllib"})


@pytest.mark.parametrize("name", ["coldbox", "coldbox.account", "coldbox.scene", "coldbox.project", "coldbox.units"])
def test_the_core_starts_light(name):
    assert not among(loaded(name), NEVER | LATER)


def test_the_package_itself_loads_next_to_nothing():
    done = subprocess.run(
        [sys.executable, "-c", "import sys, coldbox; print('numpy' in sys.modules)"],
        cwd=ROOT,
        capture_output=True,
        text=True,
        check=True,
    )
    assert done.stdout.strip() == "False"


def test_imports_run_one_way():
    """The contract in pyproject.toml, held by import-linter."""
    lint = Path(sys.executable).with_name("lint-imports")
    done = subprocess.run([str(lint), "--no-cache"], cwd=ROOT, capture_output=True, text=True, check=False)
    assert done.returncode == 0, done.stdout + done.stderr


def test_no_import_prints_or_reads_the_world(tmp_path):
    """Importing everything writes nothing, wherever one stands."""
    names = [name for layer in LAYERS for name in modules_of(layer) if not name.endswith("__main__")]
    code = f"import importlib\nfor name in {names!r}:\n    importlib.import_module(name)\n"
    environment = {"PYTHONPATH": str(ROOT), "PYTHONDONTWRITEBYTECODE": "1", "HOME": str(tmp_path)}
    done = subprocess.run(
        [sys.executable, "-c", code], cwd=tmp_path, env=environment, capture_output=True, text=True, check=False
    )
    assert done.returncode == 0, done.stderr
    assert done.stdout == "" and done.stderr == ""
    assert not list(tmp_path.iterdir())
