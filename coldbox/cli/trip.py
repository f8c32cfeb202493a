"""coldbox trip FILE"""

from __future__ import annotations

import argparse

from coldbox.cli import common

EXAMPLES = """\
examples:
  coldbox trip projects/island-round.toml
  coldbox trip projects/island-round.toml --at 05:30
  coldbox trip projects/island-round.toml --set 'trip.dry_bulb=36 °C'
  coldbox trip projects/island-round.toml --json"""


def arguments(parser: argparse.ArgumentParser) -> None:
    """Options of this command."""
    parser.add_argument("file", help="the project file")
    parser.add_argument("--at", metavar="CLOCK", help='when it leaves, such as "05:30"')
    common.draw_options(parser, common.USUAL_DRAWS)
    common.result_options(parser)
    parser.add_argument("--defaults", action="store_true", help="list the defaults used")
    parser.add_argument("--markdown", action="store_true", help="the result as Markdown")
    parser.add_argument("--csv", metavar="OUT", help="write the temperatures through time to a file")


def run(options: argparse.Namespace) -> int:
    """Print the trip; 1 when a limit is crossed on the way or a finding of this box is a danger."""
    pairs = [*options.set, *([f"trip.starts={options.at}"] if options.at else [])]
    project = common.open_project(options.file, pairs)

    from coldbox.cli import timed

    return timed.run(project, "trip", options)
