"""A real editing process killed at random moments: the file is whole, and nothing that was kept is lost."""

from __future__ import annotations

import random
import tomllib
from pathlib import Path

import editing
import pytest
from editing import PLACES, process

from coldbox.project import journal


def test_kills(folder: Path, monkeypatch: pytest.MonkeyPatch, pytestconfig: pytest.Config) -> None:
    """`--kills 1000` for more. One file through all of them: each session goes on from what the killed one left.

    The number in the file counts edits. An edit is kept when the journal has it, so what is found by the next session
    is the last one that was told as kept, or the one that was begun.
    """
    monkeypatch.setenv("XDG_STATE_HOME", str(folder / "state"))
    shop = folder / "shop"
    shop.mkdir()
    file = shop / "a.toml"
    file.write_text(editing.TEXT)
    seed = random.randrange(2**32)
    draw = random.Random(seed)
    told = {"saved": 0, "kept": 0, "begun": 0}
    for _ in range(pytestconfig.getoption("kills")):
        hear, tell = PLACES.Pipe(duplex=False)
        editor = process(editing.work_on, tell, str(file), draw.randrange(2**32))
        tell.close()
        assert hear.recv()[0] == "found"
        editor.join(draw.expovariate(1 / 0.02))
        editor.kill()
        editor.join()
        while True:
            try:
                what, number = hear.recv()
            except EOFError:
                break
            told[what] = number
        on_disk = editing.count(tomllib.loads(file.read_text()))
        assert told["saved"] <= on_disk <= told["begun"], seed
        left = journal.find(file)
        recovered = on_disk if left is None else editing.count(left.document)
        assert told["kept"] <= recovered <= told["begun"], seed
        told |= {"begun": recovered, "kept": recovered}
        assert "# by hand" in file.read_text() and "# counts" in file.read_text()
    assert told["saved"] > 0
