"""coldbox compare FILE FILE..."""

from __future__ import annotations

import argparse

from coldbox.cli import common

EXAMPLES = """\
examples:
  coldbox compare projects/quay.toml projects/shed.toml
  coldbox compare projects/quay.toml --set 'box.temperature=-22 °C'"""


def arguments(parser: argparse.ArgumentParser) -> None:
    """Options of this command."""
    parser.add_argument("files", nargs="+", metavar="FILE", help="two to six project files; one with --set")
    common.result_options(parser)


def run(options: argparse.Namespace) -> int:
    """Print results side by side, then every input that differs."""
    from coldbox.account.load import load
    from coldbox.errors import BadProject, Problem
    from coldbox.paper import compare

    if len(options.files) == 1 and options.set:
        projects = [common.open_project(options.files[0], []), common.open_project(options.files[0], options.set)]
        heads = ["as it is", "with --set"]
    else:
        projects = [common.open_project(file, options.set) for file in options.files]
        heads = [project.name for project in projects]
    if not 2 <= len(projects) <= 6:
        raise BadProject([Problem(f"{len(projects)} project given. Name two to six files, or one with --set.")])
    loads = [load(project) for project in projects]
    if options.json:
        common.print_json(compare.as_json(heads, loads))
    else:
        common.print_document(compare.document(heads, loads, common.system_of(options, projects[0])))
    return 0
