"""The shortest file that holds a block of a given table, made from the field declarations."""

from __future__ import annotations

from typing import NamedTuple

from coldbox.project.fields import FIELDS, TABLES
from coldbox.project.fields.examples import typed


class Made(NamedTuple):
    """A file's text, the key path of the block in it, and the line of its header (1 for the top of the file)."""

    text: str
    path: str
    line: int


def holding(table: str, *lines: str, without: tuple[str, ...] = ()) -> Made:
    """A file with a block of `table`, its required keys less `without`, and `lines` put at its very end."""
    rows = [] if "format" in without else ["format = 1"]
    if not table:
        rows = [*rows, *lines]
        return Made("\n".join([*rows, "[box]", 'temperature = "4 °C"', ""]), "", 1)
    if table.partition(".")[0] != "box":
        rows += ["[box]", 'temperature = "4 °C"']
    header = path = ""
    line = 1
    for part in table.split("."):
        whole = f"{header}.{part}" if header else part
        header, path = whole, f"{path}.{part}" if path else part
        declared = _declared(header)
        if declared.form == "named":
            name = "left" if part == "faces" else "a"
            header, path = f"{header}.{name}", f"{path}.{name}"
        elif declared.form == "list":
            path += "[1]"
        line = len(rows) + 1
        rows.append(f"[[{header}]]" if declared.form == "list" else f"[{header}]")
        needed = [field for field in FIELDS[declared.name] if field.required]
        if declared.name != table:
            rows += [f"{field.key} = {typed(field)}" for field in needed]
        else:
            rows += [f"{field.key} = {typed(field)}" for field in needed if field.key not in without]
        if declared.named_after and declared.named_after not in without:
            kind = next(field for field in FIELDS[declared.name] if field.key == declared.named_after)
            if kind.required:  # then the block is called after it
                path = f"{path.rpartition('[')[0]}.{typed(kind).strip(chr(34))}"
    return Made("\n".join([*rows, *lines, ""]), path, line)


def _declared(header: str):  # noqa: ANN202  the declaration of a header, names left out
    parts = [part for part in header.split(".") if part not in ("a", "left")]
    return TABLES[".".join(parts)]
