"""The command line: which command, and what becomes of what goes wrong."""

from __future__ import annotations

import argparse
import os
import sys
from collections.abc import Sequence
from importlib import import_module
from typing import TYPE_CHECKING

from coldbox import __version__
from coldbox.errors import ColdboxError

if TYPE_CHECKING:
    from _typeshed import SupportsWrite

DONE, CROSSED, BAD_INPUT, FAULT = 0, 1, 2, 3

COMMANDS = {
    "new": "a project from an example or another project",
    "load": "the account of a day's heat and the capacity it asks for",
    "outage": "how long it holds without power, who fails first, how sure that is",
    "trip": "a trip leg by leg: whether everything keeps its limits",
    "check": "errors and findings of project files",
    "compare": "projects side by side, with what differs",
    "sources": "every method and table with its source",
}

EXAMPLES = """\
examples:
  coldbox new shed --like quay        start from an example
  coldbox check projects/shed.toml    what is wrong, what to watch for
  coldbox load projects/shed.toml     every watt, and the capacity
  coldbox outage projects/shed.toml   how long it holds, how sure
  coldbox sources --fields            every key a project file may hold

Exit status: 0 done; 1 done, and a limit is crossed before the power is back
or the asked time is over, or something of this box is dangerous;
2 bad input or usage; 3 a fault of the program; 130 stopped with Ctrl-C."""


def main(arguments: Sequence[str] | None = None) -> int:
    """Run one command and return its exit status."""
    given = list(sys.argv[1:] if arguments is None else arguments)
    try:
        status = _run(given)
        sys.stdout.flush()
        return status
    except SystemExit as stop:
        return stop.code if isinstance(stop.code, int) else BAD_INPUT
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


class _Help(argparse.RawDescriptionHelpFormatter):
    """Help as wide as the terminal, which argparse by itself asks with modules that cost more than all of its own."""

    def __init__(self, prog: str) -> None:
        from coldbox.cli.common import columns

        super().__init__(prog, width=columns() - 2)


class _Parser(argparse.ArgumentParser):
    """A parser whose help goes the way of all results: argparse itself keeps quiet about a full disk."""

    def _print_message(self, message: str, file: SupportsWrite[str] | None = None) -> None:
        (file or sys.stderr).write(message)


def _parser() -> argparse.ArgumentParser:
    """What is asked when no command stands first: its help lists them, and no command's module is imported."""
    lines = "\n".join(f"  {name:<8}  {line}" for name, line in COMMANDS.items())
    parser = _Parser(
        prog="coldbox",
        usage="coldbox [-h] [--version] command ...",
        description=f"Heat gain and refrigeration capacity of cold rooms and insulated boxes.\n\ncommands:\n{lines}",
        epilog=EXAMPLES,
        formatter_class=_Help,
    )
    parser.add_argument("--version", action="version", version=f"coldbox {__version__}")
    parser.add_argument("command", nargs="?", help="one of the above; coldbox COMMAND --help says more")
    return parser


def _command(name: str, rest: list[str]) -> argparse.Namespace:
    """The options of one command; only its own module is imported."""
    module = import_module(f"coldbox.cli.{name}")
    parser = _Parser(prog=f"coldbox {name}", description=COMMANDS[name], epilog=module.EXAMPLES, formatter_class=_Help)
    module.arguments(parser)
    parser.set_defaults(run=module.run)
    return parser.parse_args(rest)


def _run(given: list[str]) -> int:
    if not given or given[0] not in COMMANDS:
        return _without_command(given)
    options = _command(given[0], given[1:])
    status: int = options.run(options)
    return status


def _without_command(given: list[str]) -> int:
    parser = _parser()
    word = parser.parse_args(given[:1]).command
    if word is None:
        parser.print_help(sys.stderr)
    else:
        from difflib import get_close_matches

        near = get_close_matches(word, COMMANDS, 1)
        hint = f' Nearest: "{near[0]}".' if near else ""
        print(f'coldbox: "{word}" is no command.{hint} There are: {", ".join(COMMANDS)}.', file=sys.stderr)
    return BAD_INPUT


def _fault(error: Exception) -> int:
    """Say in one line that this is ours, and leave the details in a file."""
    import tempfile
    import traceback

    with tempfile.NamedTemporaryFile("w", prefix="coldbox-fault-", suffix=".txt", delete=False) as report:
        traceback.print_exception(error, file=report)
    print(f"coldbox: a fault of this program ({type(error).__name__}); details in {report.name}", file=sys.stderr)
    return FAULT
