"""coldbox load FILE"""

from __future__ import annotations

import argparse

from coldbox.cli import common

EXAMPLES = """\
examples:
  coldbox load projects/quay.toml
  coldbox load projects/quay.toml --units IP
  coldbox load projects/quay.toml --how            formulas and inputs too
  coldbox load projects/quay.toml --defaults
  coldbox load projects/quay.toml --set 'box.temperature=-20 °C' --json
  coldbox load projects/quay.toml --draws 500      how sure it is
  coldbox load projects/quay.toml --csv hours.csv"""


def arguments(parser: argparse.ArgumentParser) -> None:
    """Options of this command."""
    parser.add_argument("file", help="the project file")
    common.result_options(parser)
    common.draw_options(parser, 0)
    parser.add_argument("--how", action="store_true", help="each entry's formula and inputs too")
    parser.add_argument("--defaults", action="store_true", help="list the defaults used")
    parser.add_argument("--markdown", action="store_true", help="the account as Markdown")
    parser.add_argument("--csv", metavar="OUT", help="write the 24 hours of every entry to a file")


def run(options: argparse.Namespace) -> int:
    """Print the load; 1 when a finding of this box is a danger."""
    common.check_draws(options)
    project = common.open_project(options.file, options.set)

    from coldbox.account.load import load as account_load

    load = account_load(project)
    spread = None
    if options.draws:
        from coldbox.spread.capacity import capacity_spread

        spread = capacity_spread(project, options.draws, options.seed)
    if options.csv:
        from coldbox.paper import data

        common.write_text(options.csv, data.csv_text(data.load_series(load)))
    if options.json:
        from coldbox.paper import data

        common.print_json(data.load_json(load, spread))
    else:
        from coldbox.paper import load as paper

        system = common.system_of(options, project)
        document = (
            paper.defaults_document(project, for_load=True)
            if options.defaults
            else paper.document(load, system, how=options.how, spread=spread)
        )
        if options.markdown:
            from coldbox.paper import markdown

            print(markdown.render(document), end="")
        else:
            common.print_document(document)
    return int(any(finding.level == "danger" and not finding.standing for finding in load.findings))
