"""Options and printing that several commands share."""

from __future__ import annotations

import argparse
import os
import sys
from typing import TYPE_CHECKING, Literal

from coldbox.errors import BadProject, Problem

if TYPE_CHECKING:
    from coldbox.paper.document import Document
    from coldbox.project.model import Project


USUAL_DRAWS = 500
MOST_DRAWS = 200_000


def result_options(parser: argparse.ArgumentParser) -> None:
    """--units, --json, --set."""
    parser.add_argument("--units", choices=("SI", "IP"), help="show SI or IP, whatever the project says")
    parser.add_argument("--json", action="store_true", help="the result as JSON, always SI")
    set_option(parser)


def set_option(parser: argparse.ArgumentParser) -> None:
    """--set KEY=VALUE, as often as wanted."""
    parser.add_argument(
        "--set",
        action="append",
        default=[],
        metavar="KEY=VALUE",
        help="change one input for this run, such as --set 'doors.main.width=1.2 m'",
    )


def draw_options(parser: argparse.ArgumentParser, usual: int) -> None:
    """--draws and --seed."""
    none = "; 0: none" if usual else ""
    parser.add_argument(
        "--draws",
        type=int,
        default=usual,
        metavar="N",
        help=f"how many draws of what is unsure (usually {usual}{none})",
    )
    parser.add_argument("--seed", type=int, default=1, metavar="S", help="another seed, other draws (usually 1)")


def check_draws(options: argparse.Namespace) -> None:
    """Raises BadProject for a count or a seed that will not do."""
    wrong = []
    if not 0 <= options.draws <= MOST_DRAWS:
        wrong.append(Problem(f"{options.draws} draws will not do. Write 0 to {MOST_DRAWS}.", file="--draws"))
    if options.seed < 0:
        wrong.append(Problem(f"{options.seed} is no seed. Write a whole number from 0 up.", file="--seed"))
    if wrong:
        raise BadProject(wrong)


def with_outage(options: argparse.Namespace) -> list[str]:
    """The --set options, with --at and --asked among them."""
    keys = (("outage.at", options.at), ("outage.asked", options.asked))
    return [*options.set, *(f"{key}={value}" for key, value in keys if value)]


def settings(pairs: list[str]) -> dict[str, str]:
    """--set options as key paths and texts. Raises BadProject for one without an equals sign."""
    wrong = [
        Problem(f'"{pair}" has no value. Write --set KEY=VALUE.', file="--set") for pair in pairs if "=" not in pair
    ]
    if wrong:
        raise BadProject(wrong)
    return {key.strip(): value.strip() for key, value in (pair.split("=", 1) for pair in pairs)}


def open_project(file: str, pairs: list[str]) -> Project:
    """The project of a file with the options of this run."""
    from coldbox.project import store

    return store.open(file, settings(pairs))


def system_of(options: argparse.Namespace, project: Project) -> Literal["SI", "IP"]:
    """SI or IP: the option's, else the project's."""
    return "IP" if (options.units or project.units) == "IP" else "SI"


def print_document(document: Document) -> None:
    """A document as text on standard output, as wide as the terminal says, in ASCII where it must be."""
    from coldbox.paper import text

    encoding = (sys.stdout.encoding or "ascii").lower()
    ascii_only = "utf" not in encoding
    page = text.render(document, width=columns(), ascii_only=ascii_only)
    sys.stdout.write(page.encode(encoding, "replace").decode(encoding) if ascii_only else page)


def columns() -> int:
    """Width to print in: COLUMNS, else the terminal's, at least 60 and at most 120; 80 through a pipe."""
    told = os.environ.get("COLUMNS", "")
    width = int(told) if told.isdigit() else os.get_terminal_size().columns if sys.stdout.isatty() else 80
    return max(60, min(width, 120))


def print_json(value: object) -> None:
    """A value as JSON on standard output: a key or an item a line, two levels deep."""
    import json

    # Without `indent` json works in C; with it, in Python, which would cost as much as the account itself.
    encode = json.JSONEncoder(ensure_ascii=False, allow_nan=False).encode

    def lines(one: object, levels: int) -> str:
        if levels and isinstance(one, dict) and one:
            inside = ",\n".join(
                f"{' ' * (3 - levels)}{encode(key)}: {lines(item, levels - 1)}" for key, item in one.items()
            )
            return f"{{\n{inside}\n{' ' * (2 - levels)}}}"
        if levels and isinstance(one, list) and one and isinstance(one[0], dict):
            inside = ",\n".join(f"{' ' * (3 - levels)}{lines(item, 0)}" for item in one)
            return f"[\n{inside}\n{' ' * (2 - levels)}]"
        return encode(one)

    sys.stdout.write(lines(value, 2) + "\n")


def write_text(path: str, text: str) -> None:
    """A result into a file, whole or not at all."""
    from coldbox.project import store

    store.write_text(path, text)
