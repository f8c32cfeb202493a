"""coldbox sources"""

from __future__ import annotations

import argparse

from coldbox.cli import common

EXAMPLES = """\
examples:
  coldbox sources                 methods and tables with their sources
  coldbox sources foods           the rows of one table
  coldbox sources --fields        every key of the project file
  coldbox sources --fields doors  those of one table
  coldbox sources --checked       every check from outside, with its deviation"""


def arguments(parser: argparse.ArgumentParser) -> None:
    """Options of this command."""
    parser.add_argument("table", nargs="?", help="only this table")
    kind = parser.add_mutually_exclusive_group()
    kind.add_argument("--fields", action="store_true", help="every key a project file may hold")
    kind.add_argument("--checked", action="store_true", help="every check from outside, with its deviation")
    parser.add_argument("--json", action="store_true", help="as JSON")


def run(options: argparse.Namespace) -> int:
    """Print what was asked for; 1 when a check from outside fails."""
    from coldbox.paper import sources

    if options.checked:
        from coldbox.paper import checks

        results = checks.run()
        if options.json:
            common.print_json([dict(result) for result in results])
        else:
            common.print_document(sources.checked(results))
        return int(any(not result.passed for result in results))
    if options.json:
        common.print_json(sources.fields_json(options.table) if options.fields else sources.sources_json(options.table))
    else:
        common.print_document(sources.fields(options.table) if options.fields else sources.overview(options.table))
    return 0
