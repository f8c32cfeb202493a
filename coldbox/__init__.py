"""Heat gain, refrigeration capacity and hold time of cold rooms and insulated boxes.

    import coldbox
    project = coldbox.open("projects/quay.toml")
    load = coldbox.load(project)
    outage = coldbox.outage(project, draws=2000, seed=1)

The public names are loaded on first use, so that importing this costs nothing.
"""

from __future__ import annotations

from typing import TYPE_CHECKING

__version__ = "0.1.0"
__all__ = ["__version__", "load", "open", "outage", "trip"]

if TYPE_CHECKING:
    from coldbox.account.load import load
    from coldbox.project.store import open
    from coldbox.spread.public import outage, trip

_HOMES = {
    "load": "coldbox.account.load",
    "open": "coldbox.project.store",
    "outage": "coldbox.spread.public",
    "trip": "coldbox.spread.public",
}


def __getattr__(name: str) -> object:
    if name in _HOMES:
        from importlib import import_module

        return getattr(import_module(_HOMES[name]), name)
    raise AttributeError(f"module 'coldbox' has no attribute {name!r}")
