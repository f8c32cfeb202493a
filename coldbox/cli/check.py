"""coldbox check FILE..."""

from __future__ import annotations

import argparse
import sys

from coldbox.cli import common
from coldbox.errors import ColdboxError

EXAMPLES = """\
examples:
  coldbox check projects/quay.toml
  coldbox check projects/*.toml"""


def arguments(parser: argparse.ArgumentParser) -> None:
    """Options of this command."""
    parser.add_argument("files", nargs="+", metavar="FILE", help="project files")
    common.result_options(parser)


def run(options: argparse.Namespace) -> int:
    """Print errors and findings of every file; 2 when one has errors, 1 when one has a danger of its own."""
    from coldbox.account.load import load
    from coldbox.paper import check, data

    status = 0
    results = []
    for file in options.files:
        try:
            project = common.open_project(file, options.set)
            found = load(project).findings
        except ColdboxError as error:
            status = 2
            print(error, file=sys.stderr)
            continue
        if any(finding.level == "danger" and not finding.standing for finding in found):
            status = max(status, 1)
        if options.json:
            results.append({"file": file, "findings": [data.finding_json(finding) for finding in found]})
        else:
            common.print_document(check.document(file, found))
    if options.json:
        common.print_json(results)
    return status
