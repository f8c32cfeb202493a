"""TOML text to `Raw`: every key looked up among the declarations, every value read, every problem told at once."""

from __future__ import annotations

import tomllib
from collections.abc import Mapping
from typing import Any

from coldbox.errors import Problem
from coldbox.project import sentences
from coldbox.project.fields import BY_KEY, TABLES, TOP_TABLES, Field, Table, example
from coldbox.project.linemap import DOTS, Key, LineMap, refuse_deep_keys
from coldbox.project.raw import Block, Entered, Raw
from coldbox.project.setting import OPTION, Option, named, put
from coldbox.project.values import System, Wrong, from_text, from_toml
from coldbox.project.words import clean, fault_of_name

MOST_PROBLEMS = 300  # told; more would not be read
MOST_KNOWN = 5000  # values of a document kept for the next reading
Known = tuple[str, str, str]  # table, key and text of a value
_MARK = "\ufeff"  # byte-order mark


def read(text: str, file: str, options: Mapping[str, str] = {}) -> tuple[Raw, list[Problem]]:  # noqa: B006  only read
    """What a project file says, with everything that is wrong in it.

    text     the file's text
    file     its name, for the problems
    options  values for this run by key path, as one would type them; they win over the file
    result   the file's blocks, without what is wrong in them; all problems, in the order of the lines
    example  read('format = 1', "quay.toml", {"box.temperature": "-20 °C"})
    """
    text = text.removeprefix(_MARK)
    problems: list[Problem] = []
    document: dict[str, Any]
    source = text
    try:
        if text.count(".") > DOTS:
            refuse_deep_keys(text)
        document = tomllib.loads(text)
    except (ValueError, RecursionError):
        from coldbox.project import broken

        document, source, problems = broken.load(text, file)
        if not document:
            return Raw(file=file, text=text, blocks={}), problems
    if options:
        problems += put(document, options)
    units = document.get("units")
    walk = _Walk(file, LineMap(source), problems, "IP" if units == "IP" else "SI")
    blocks = walk.document(document)
    if walk.untold:
        walk.problems.append(Problem(f"… and {walk.untold} more of the kind. Mend these first.", file=file))
    problems.sort(key=lambda problem: (problem.file != OPTION, problem.line or 0))
    return Raw(file=file, text=text, blocks=blocks), problems


def of_document(
    document: Mapping[str, Any], file: str, known: dict[Known, Entered] | None = None
) -> tuple[Raw, list[Problem]]:
    """The same of a document that is edited and has no text yet: its problems tell no lines.

    document  as tomllib gives it
    file      its name, for the problems
    known     values read before, by field and text; those that are read now are put in. An edit changes one of them
    """
    walk = _Walk(file, LineMap(""), [], "IP" if document.get("units") == "IP" else "SI", known)
    blocks = walk.document(dict(document))
    return Raw(file=file, text="", blocks=blocks), walk.problems


class _Walk:
    """One pass over a document. A `key` is the path in the document, a `path` the one printed."""

    __slots__ = ("file", "known", "lines", "problems", "system", "untold")

    def __init__(
        self,
        file: str,
        lines: LineMap,
        problems: list[Problem],
        system: System,
        known: dict[Known, Entered] | None = None,
    ) -> None:
        self.file, self.lines, self.problems, self.system = file, lines, problems, system
        self.known = known  # only of documents without a text: a value of a text knows its line
        self.untold = 0

    def full(self) -> bool:
        return len(self.problems) >= MOST_PROBLEMS

    def problem(self, sentence: str, path: str, key: Key) -> None:
        if self.full():
            self.untold += 1
            return
        self.problems.append(Problem(sentence, file=self.file, line=self.lines.line(key) if key else 1, path=path))

    # Tables

    def document(self, document: dict[str, Any]) -> dict[str, tuple[Block, ...]]:
        """The top of the file: its own keys, and every table."""
        top = {key: value for key, value in document.items() if key not in TOP_TABLES}
        blocks: dict[str, tuple[Block, ...]] = {"": (self.block("", top, "", (), ""),)}
        for name in TOP_TABLES:
            if name in document:
                blocks[name] = self.blocks(TABLES[name], document[name], name, (name,))
        if "box" not in document:
            keys = "length, width, height, temperature, construction and neighbour"
            self.problem(f"There is no [box]. Write one with {keys} below it.", "box", ())
        return blocks

    def blocks(self, table: Table, value: Any, path: str, key: Key) -> tuple[Block, ...]:
        """What stands under the name of a table, in the form that the table has."""
        if table.form == "one":
            if isinstance(value, dict):
                return (self.block(table.name, value, path, key, ""),)
        elif table.form == "named":
            if isinstance(value, dict):
                return self.by_name(table, value, path, key)
        elif isinstance(value, list):
            return self.listed(table, value, path, key)
        self.problem(sentences.wrong_form(table, value, path), path, key)
        return ()

    def by_name(self, table: Table, value: dict[str, Any], path: str, key: Key) -> tuple[Block, ...]:
        """`[constructions.NAME]`."""
        blocks = []
        if len(value) > table.limit:
            self.problem(f"There are {len(value)} {path}; at most {table.limit} are read.", path, key)
            return ()
        for name, inside in value.items():
            here, there = f"{path}.{clean(name)}", (*key, name)
            fault = fault_of_name(name)
            if fault is not None:
                self.problem(f'"{clean(name)}" {fault}', here, there)
            elif table.only and name not in table.only:
                self.problem(sentences.unknown_name(name, table.only, path), here, there)
            elif not isinstance(inside, dict):
                self.problem(sentences.no_table(inside, table, here, name), here, there)
            else:
                blocks.append(self.block(table.name, inside, here, there, name))
        return tuple(blocks)

    def listed(self, table: Table, items: list[Any], path: str, key: Key) -> tuple[Block, ...]:
        """`[[doors]]`, or a list of tables in place."""
        if len(items) > table.limit:
            self.problem(f"There are {len(items)} {path}; at most {table.limit} are read.", path, key)
            return ()
        blocks = []
        first: dict[str, int] = {}
        for index, (item, called) in enumerate(zip(items, named(table, items), strict=True)):
            name, here, there = called, f"{path}[{index + 1}]", (*key, index)
            if not isinstance(item, dict):
                self.problem(sentences.no_table(item, table, path), here, there)
                continue
            if name in first:
                before = self.lines.line((*key, first[name], "name"))
                where = f" in line {before}" if before else ""
                self.problem(f'"{name}" is a name used twice among the {path}: first{where}. Give this one another.',
                             f"{here}.name", (*there, "name"))  # fmt: skip
                name = ""
            elif name:
                first[name] = index
            blocks.append(self.block(table.name, item, f"{path}.{name}" if name else here, there, name or here))
        return tuple(blocks)

    def block(self, table: str, data: dict[str, Any], path: str, key: Key, name: str) -> Block:
        """The keys of one table."""
        declared = BY_KEY[table]
        before = f"{path}." if path else ""
        values: dict[str, Entered] = {}
        children: dict[str, tuple[Block, ...]] = {}
        for word, value in data.items():
            field = declared.get(word)
            here, there = f"{before}{word}", (*key, word)
            if field is None:
                sentence = "" if self.full() else sentences.unknown(table, word, value, path)
                self.problem(sentence, f"{before}{clean(word)}", there)
            elif field.structural and not isinstance(value, Option):
                children[word] = self.blocks(TABLES[f"{table}.{word}"], value, here, there)
            elif word == "construction" and isinstance(value, dict):
                children[word] = (self.block("constructions", value, here, there, here),)
            else:
                entered = self.value(field, value, here, there)
                if entered is not None:
                    values[word] = entered
        for field in declared.values():
            # What is copied from the shop library may leave its keys there: `resolve` knows which it has.
            if field.required and field.key not in data and "library" not in data:
                self.problem(f"{field.key} is missing. Write one, such as {example(field)}.", before + field.key, key)
        line = self.lines.line(key) if key else None
        return Block(table=table, path=path, name=name, line=line, values=values, children=children)

    # Values

    def value(self, field: Field, value: Any, path: str, key: Key) -> Entered | None:
        """One value; None, and a problem, when it will not do."""
        if isinstance(value, Option):
            return self.option(field, value)
        seen = (field.table, field.key, value) if isinstance(value, str) else None
        if self.known is not None and seen is not None and seen in self.known:
            return self.known[seen]
        try:
            entered = from_toml(field, value, self.typed(value, key), self.lines.line(key), self.system)
        except Wrong as wrong:
            self.problem(str(wrong), path, key)
            return None
        if self.known is not None and seen is not None:
            if len(self.known) > MOST_KNOWN:
                self.known.clear()
            self.known[seen] = entered
        return entered

    def typed(self, value: Any, key: Key) -> str:
        """A value as it stands in the file; only numbers, dates and yes/no are asked for."""
        if isinstance(value, (str, list, dict)):
            return ""
        return self.lines.source(key) or str(value)

    def option(self, field: Field, option: Option) -> Entered | None:
        if field.structural:
            number = "[1]" if field.kind == "list" else ""
            inside = f"{number}.{next(iter(BY_KEY[field.path]))}"
            sentence = f"{field.key} holds tables. Set one value in it, such as {option.path}{inside}."
        else:
            try:
                return from_text(field, str(option), self.system, option=True)
            except Wrong as wrong:
                sentence = str(wrong)
        self.problems.append(Problem(sentence, file=OPTION, path=clean(option.path)))
        return None
