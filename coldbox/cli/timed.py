"""What outage and trip have in common: run with draws and progress, print, exit status."""

from __future__ import annotations

import argparse
import os
from typing import TYPE_CHECKING

from coldbox.cli import common
from coldbox.cli.progress import Progress
from coldbox.spread import hold
from coldbox.timeline.results import Outage, Trip

if TYPE_CHECKING:
    from coldbox.paper.document import Document
    from coldbox.project.model import Project
    from coldbox.timeline.results import Kind

MOST_PROCESSES = 2  # more gain little: each brings its own memory through the same bus


def run(project: Project, kind: Kind, options: argparse.Namespace) -> int:
    """Compute, write what was asked for, and return the exit status."""
    common.check_draws(options)
    if options.defaults:
        from coldbox.paper.load import defaults_document

        _show(defaults_document(project, for_load=False), options)
        return 0
    processes = min(os.cpu_count() or 1, MOST_PROCESSES)
    with Progress(kind) as progress:
        found = hold.run(project, kind, count=options.draws, seed=options.seed, processes=processes, go_on=progress)
    if options.csv:
        from coldbox.paper import data, moments

        common.write_text(options.csv, data.csv_text(moments.series_rows(found)))
    if options.json:
        from coldbox.paper import data

        common.print_json(data.trip_json(found) if isinstance(found, Trip) else data.outage_json(found))
    else:
        _print(found, options)
    return int(found.fails or any(one.level == "danger" and not one.standing for one in found.findings))


def _print(found: Outage, options: argparse.Namespace) -> None:
    system = common.system_of(options, found.project)
    if isinstance(found, Trip):
        from coldbox.paper import trip

        document = trip.document(found, system)
    else:
        from coldbox.paper import outage

        document = outage.document(found, system)
    _show(document, options)


def _show(document: Document, options: argparse.Namespace) -> None:
    if options.markdown:
        from coldbox.paper import markdown

        print(markdown.render(document), end="")
    else:
        common.print_document(document)
