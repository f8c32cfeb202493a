"""Files that lack or spoil anything at all end in problems with their place, never in anything else."""

from __future__ import annotations

import math
import re

from hypothesis import given, settings
from hypothesis import strategies as st
from typed import BOXES, project

from coldbox.errors import BadProject
from coldbox.project import codec
from coldbox.project.raw import Block, Raw
from coldbox.project.resolve import resolve
from coldbox.project.shop import Library

TEXTS = [file.read_text(encoding="utf-8") for file in BOXES]
SPOILED = ['"nowhere"', "7", "true", '""', "[]", "{}", '"-999 °C"', '"0 m"', '"50 %"', '"always"', '"never"', "-1"]


def _told(call: object) -> None:
    try:
        call()  # type: ignore[operator]
    except BadProject as bad:
        assert bad.problems
        for problem in bad.problems:
            assert problem.file == "typed.toml"
            assert problem.text
            assert "nan" not in re.findall(r"[a-z]+", problem.text)


@settings(max_examples=150, deadline=None)
@given(text=st.sampled_from(TEXTS), data=st.data())
def test_values_spoiled_or_lines_lost(text: str, data: st.DataObject) -> None:
    lines = text.split("\n")
    for _ in range(data.draw(st.integers(1, 4))):
        at = data.draw(st.integers(0, len(lines) - 1))
        values = [match.span() for match in re.finditer(r'"[^"]*"', lines[at])]
        if values and data.draw(st.booleans()):
            start, end = data.draw(st.sampled_from(values))
            lines[at] = lines[at][:start] + data.draw(st.sampled_from(SPOILED)) + lines[at][end:]
        else:
            lines[at] = ""
    _told(lambda: project("\n".join(lines)))


def _thinned(block: Block, drop: st.DataObject) -> Block:
    values = {key: value for key, value in block.values.items() if drop.draw(st.integers(0, 9)) > 0}
    children = {
        key: tuple(_thinned(one, drop) for one in below)
        for key, below in block.children.items()
        if drop.draw(st.integers(0, 9)) > 0
    }
    return block.replace(values=values, children=children)


@settings(max_examples=100, deadline=None)
@given(text=st.sampled_from(TEXTS), data=st.data())
def test_a_reading_with_holes_that_nobody_told_about(text: str, data: st.DataObject) -> None:
    """Even then every hole is told, and no nan gets out."""
    raw, problems = codec.read(text, "typed.toml")
    assert not problems
    blocks = {
        table: tuple(_thinned(block, data) for block in blocks if data.draw(st.integers(0, 14)) > 0)
        for table, blocks in raw.blocks.items()
    }

    def call() -> None:
        found = resolve(Raw(file="typed.toml", text=text, blocks=blocks), [], Library(None))
        assert math.isfinite(float(found.box.temperature))
        for construction in found.constructions.values():
            assert math.isfinite(float(construction.thickness))

    _told(call)
