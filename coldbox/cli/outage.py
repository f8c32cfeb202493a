"""coldbox outage FILE"""

from __future__ import annotations

import argparse
from typing import TYPE_CHECKING

from coldbox.cli import common

if TYPE_CHECKING:
    from coldbox.timeline.results import Kind

EXAMPLES = """\
examples:
  coldbox outage projects/net-loft-full.toml
  coldbox outage projects/net-loft-full.toml --asked 36h --at 22:00
  coldbox outage projects/net-loft-full.toml --draws 5000 --seed 7
  coldbox outage projects/net-loft-full.toml --recovery --set outage.lasts=30h
  coldbox outage projects/net-loft-full.toml --pulldown
  coldbox outage projects/weekend-parcel.toml --json
  coldbox outage projects/milk-van.toml --csv trace.csv"""


def arguments(parser: argparse.ArgumentParser) -> None:
    """Options of this command."""
    parser.add_argument("file", help="the project file")
    other = parser.add_mutually_exclusive_group()
    other.add_argument("--pulldown", action="store_true", help="power on and warm inside: when it is cold")
    other.add_argument("--recovery", action="store_true", help="power back after the outage: when all is cold again")
    parser.add_argument("--at", metavar="CLOCK", help='when the power goes, such as "22:00"')
    parser.add_argument("--asked", metavar="TIME", help='how long it should hold, such as "24 h"')
    common.draw_options(parser, common.USUAL_DRAWS)
    common.result_options(parser)
    parser.add_argument("--defaults", action="store_true", help="list the defaults used")
    parser.add_argument("--markdown", action="store_true", help="the result as Markdown")
    parser.add_argument("--csv", metavar="OUT", help="write the temperatures through time to a file")


def run(options: argparse.Namespace) -> int:
    """Print the outage; 1 when a limit is crossed too early or a finding of this box is a danger."""
    project = common.open_project(options.file, common.with_outage(options))

    from coldbox.cli import timed

    kind: Kind = "pulldown" if options.pulldown else "recovery" if options.recovery else "outage"
    return timed.run(project, kind, options)
