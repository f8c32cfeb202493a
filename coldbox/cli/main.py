"""The command line: which command, and what becomes of what goes wrong."""

from __future__ import annotations

import argparse
import os
import sys
from collections.abc import Sequence
from importlib import import_module

from coldbox import __version__
from coldbox.errors import ColdboxError

DONE, CROSSED, BAD_INPUT, FAULT = 0, 1, 2, 3

COMMANDS = {
    "new": "a project from an example or another project",
    "load": "the account of a day's heat and the capacity it asks for",
    "check": "errors and findings of project files",
    "compare": "projects side by side, with what differs",
    "sources": "every method and table with its source",
}

EXAMPLES = """\
examples:
  coldbox new shed --like quay        start from an example
  coldbox check projects/shed.toml    what is wrong, what to watch for
  coldbox load projects/shed.toml     every watt, and the capacity
  coldbox sources --fields            every key a project file may hold

Exit status: 0 done; 1 done, and something of this box is dangerous; 2 bad input or usage; 3 a fault of the program."""


def main(arguments: Sequence[str] | None = None) -> int:
    """Run one command and return its exit status."""
    given = list(sys.argv[1:] if arguments is None else arguments)
    try:
        return _guarded(given)
    except SystemExit as stop:
        return stop.code if isinstance(stop.code, int) else BAD_INPUT


def _parser(chosen: str | None) -> argparse.ArgumentParser:
    """The parser; only the chosen command's own module is imported."""
    parser = argparse.ArgumentParser(
        prog="coldbox",
        description="Heat gain and refrigeration capacity of cold rooms and insulated boxes.",
        epilog=EXAMPLES,
        formatter_class=argparse.RawDescriptionHelpFormatter,
    )
    parser.add_argument("--version", action="version", version=f"coldbox {__version__}")
    commands = parser.add_subparsers(dest="command", metavar="command", title="commands")
    for name, line in COMMANDS.items():
        sub = commands.add_parser(
            name, help=line, description=line, formatter_class=argparse.RawDescriptionHelpFormatter
        )
        if name == chosen:
            module = import_module(f"coldbox.cli.{name}")
            sub.epilog = module.EXAMPLES
            module.arguments(sub)
            sub.set_defaults(run=module.run)
    return parser


def _guarded(given: list[str]) -> int:
    chosen = next((word for word in given if not word.startswith("-")), None)
    parser = _parser(chosen if chosen in COMMANDS else None)
    options = parser.parse_args(given)
    if options.command is None:
        parser.print_help(sys.stderr)
        return BAD_INPUT
    try:
        status: int = options.run(options)
        sys.stdout.flush()
        return status
    except ColdboxError as error:
        print(error, file=sys.stderr)
        return BAD_INPUT
    except BrokenPipeError:
        os.dup2(os.open(os.devnull, os.O_WRONLY), sys.stdout.fileno())
        return DONE
    except KeyboardInterrupt:
        print("coldbox: stopped.", file=sys.stderr)
        return 128 + 2
    except OSError as error:
        print(f"coldbox: {error.filename or 'output'}: {error.strerror or error}", file=sys.stderr)
        return BAD_INPUT
    except Exception as error:
        return _fault(error)


def _fault(error: Exception) -> int:
    """Say in one line that this is ours, and leave the details in a file."""
    import tempfile
    import traceback

    with tempfile.NamedTemporaryFile("w", prefix="coldbox-fault-", suffix=".txt", delete=False) as report:
        traceback.print_exception(error, file=report)
    print(f"coldbox: a fault of this program ({type(error).__name__}); details in {report.name}", file=sys.stderr)
    return FAULT
