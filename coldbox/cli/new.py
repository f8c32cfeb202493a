"""coldbox new NAME"""

from __future__ import annotations

import argparse

EXAMPLES = """\
examples:
  coldbox new shed                    the least that computes, to fill in
  coldbox new shed --like quay        from an example
  coldbox new shed --like projects/yard.toml"""


def arguments(parser: argparse.ArgumentParser) -> None:
    """Options of this command."""
    parser.add_argument("name", help="name of the new project; its file is NAME.toml")
    parser.add_argument("--like", metavar="X", help="an example or a project to start from")


def run(options: argparse.Namespace) -> int:
    """Write a new project file and say where it is."""
    from coldbox.project import fresh

    path = fresh.create(options.name, options.like)
    print(f"{path}: written. Next: coldbox check {path}; coldbox load {path}")
    return 0
