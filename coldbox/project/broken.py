"""Texts that are no TOML: what the reader of the standard library stumbled over, in our words, with its line."""

from __future__ import annotations

import re
import tomllib

from coldbox.errors import Problem
from coldbox.project.linemap import DOTS, Key, LineMap, refuse_deep_keys
from coldbox.project.words import clean

_DEEP = 30  # brackets within brackets: the format needs four
_SENTENCES = (
    ("Cannot overwrite a value", "This key is written twice in the same table. Keep one of the two."),
    ("Duplicate inline table key", "This key is written twice in the same table. Keep one of the two."),
    ("Cannot declare", "This table is written twice. Give one of the two another name, or put their keys together."),
    ("Cannot mutate immutable", "This adds to a table that is already complete. Write all of its keys in one place."),
    ("Unterminated string", 'A text begins here and does not end. Close it with a quote: "…".'),
    ("Illegal character", 'A text may not hold this sign, or its closing quote is missing. Write it on one line: "…".'),
    ("Found invalid character", "This sign may not stand here. Write plain letters."),
    ("Unescaped '\\'", "A backslash in quotes begins a code. Write two of them for one."),
    ("Invalid hex value", "A backslash code in this text is wrong. Write two backslashes for one."),
    ("Escaped character", "A backslash code in this text is wrong. Write two backslashes for one."),
    ("Invalid date or datetime", "This is no date. Put text in quotes."),
    ("Unclosed array", "A list begins here or above and does not end. Close it with ]."),
    ("Unclosed inline table", "A table in braces does not end, or lacks a comma. Close it with }."),
    ("Expected ']", "A table's name stands in brackets: [box], or [[doors]] for one of several."),
    ("Expected '='", "A key is followed by = and its value. Write key = value, or put the text in quotes."),
    ("Invalid initial character", "A key begins with a letter. Put a name with other signs in quotes."),
    ("Invalid statement", "A line holds a key with its value, a table's name in brackets, or a comment after #."),
    ("Expected newline", "There is more on this line than one value. Put the whole value in quotes."),
    ("Invalid value", 'There is no value here that can be read. Put text in quotes: "…".'),
)  # fmt: skip


def load(text: str, file: str) -> tuple[dict[str, object], str, list[Problem]]:
    """The document of a TOML text, as far as it can be had.

    A value that somebody forgot to put in quotes (`at = 14:00`) is a problem, and is then read as if quoted, so that
    everything else that is wrong comes to light in the same go.

    text    the file's text
    file    its name, for the problems
    result  the document, empty when it cannot be read; the text it was read from; the problems
    """
    problems: list[Problem] = []
    try:
        refuse_deep_keys(text)
        return tomllib.loads(text), text, problems
    except tomllib.TOMLDecodeError as first:
        error = first
        mended = _quoted(text, file, problems)
        if mended is not None:
            try:
                return tomllib.loads(mended), mended, problems
            except tomllib.TOMLDecodeError as another:
                error = another
            except (RecursionError, ValueError):
                pass  # the first error is told
        problems.append(_told(text, file, error))
    except RecursionError:
        problems.append(_problem(file, text, _deep_line(text), "Brackets or keys stand in one another far too deep."
                                 " Write lists of plain values, or of tables, as the examples do."))  # fmt: skip
    except ValueError:  # an integer with thousands of digits
        line = next((n for n, row in enumerate(text.split("\n"), 1) if re.search(r"\d{4000}", row)), 1)
        problems.append(_problem(file, text, line, "A number with thousands of digits is no quantity. Write a few."))
    return {}, text, problems


def _quoted(text: str, file: str, problems: list[Problem]) -> str | None:
    """The text with quotes around what lacks them, a problem for each; None when nothing lacks them."""
    places = LineMap(text)
    pieces = []
    done = 0
    for key, (_, start, end) in sorted(places.spots.items(), key=lambda item: item[1][1]):
        bare = text[start:end]
        if bare[:1] in ("", "[", "{", '"', "'") or start < done or _reads(bare):
            continue
        name = next((part for part in reversed(key) if isinstance(part, str)), "")
        found = clean(bare)
        if bare.lower() in ("true", "false"):
            said = f"is written small: {clean(name)} = {bare.lower()}."
            new = bare.lower()
        else:
            said = f'stands without quotes. Put it in quotes: {clean(name)} = "{found}".'
            new = '"' + bare.replace("\\", "\\\\").replace('"', '\\"') + '"'
        problems.append(Problem(f"{found} {said}", file=file, line=places.line(key),
                                path=display(key)))  # fmt: skip
        pieces += [text[done:start], new]
        done = end
    return "".join((*pieces, text[done:])) if pieces else None


def _reads(bare: str) -> bool:
    try:
        tomllib.loads(f"x = {bare}")
    except ValueError:
        return False
    return True


def display(key: Key) -> str:
    """A key as a path to print, counted from 1: `doors[2].width`."""
    path = ""
    for part in key:
        path += f"[{part + 1}]" if isinstance(part, int) else f".{clean(part)}" if path else clean(part)
    return path


def _told(text: str, file: str, error: tomllib.TOMLDecodeError) -> Problem:
    message = str(error)
    place = re.search(r"\(at line (\d+), column \d+\)$", message)
    line = int(place.group(1)) if place else max(text.rstrip().count("\n") + 1, 1)
    sentence = next((ours for start, ours in _SENTENCES if message.startswith(start)), None)
    if sentence is None:
        sentence = f"This cannot be read: {clean(message.partition(' (at')[0].lower(), 100)}."
    return _problem(file, text, line, sentence)


def _problem(file: str, text: str, line: int, sentence: str) -> Problem:
    places = LineMap(text)
    here = [key for key, spot in places.spots.items() if places.line_at(spot[0]) == line]
    return Problem(sentence, file=file, line=line, path=display(here[0]) if here else "")


def _deep_line(text: str) -> int:
    depth = 0
    for number, row in enumerate(text.split("\n"), 1):
        depth += row.count("[") + row.count("{") - row.count("]") - row.count("}")
        if depth > _DEEP or row.count("[") > _DEEP or row.count("{") > _DEEP or row.count(".") > DOTS:
            return number
    return 1
