"""coldbox check FILE..."""

from __future__ import annotations

import argparse
import sys
from collections.abc import Iterator
from typing import TYPE_CHECKING, Literal

from coldbox.cli import common
from coldbox.errors import ColdboxError

if TYPE_CHECKING:
    from coldbox.project.model import Project
    from coldbox.project.shop import Difference
    from coldbox.scene.finding import Finding
    from coldbox.timeline.results import Kind

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
    from coldbox.paper import check, data

    status = 0
    results = []
    for file in options.files:
        try:
            project, differences = _read(file, options.set)
            found = tuple(_findings(project, differences))
        except ColdboxError as error:
            status = 2
            print(error, file=sys.stderr)
            continue
        if any(finding.level == "danger" and not finding.standing for finding in found):
            status = max(status, 1)
        if options.json:
            results.append({"file": file, "findings": [data.finding_json(finding) for finding in found]})
        else:
            common.print_document(check.document(file, found, common.system_of(options, project)))
    if options.json:
        common.print_json(results)
    return status


def _read(file: str, pairs: list[str]) -> tuple[Project, list[Difference]]:
    """The project of a file, and where it differs from the shop library."""
    from coldbox.project import codec, shop, store
    from coldbox.project.resolve import resolve

    raw, problems = codec.read(store.read_text(file), file, common.settings(pairs))
    library = shop.library(file)
    return resolve(raw, problems, library), shop.differences(raw, library)


def _findings(project: Project, differences: list[Difference]) -> Iterator[Finding]:
    """Of the account, of a run with every input at its middle, of the shop library; each said once."""
    from coldbox.account.load import load
    from coldbox.scene.finding import Finding

    said = set()
    for finding in (*load(project).findings, *_over_time(project)):
        if (finding.text, finding.path) not in said:
            said.add((finding.text, finding.path))
            yield finding
    for one in differences:
        level: Literal["note", "caution"] = "note" if one.kind == "moved on" else "caution"
        yield Finding(level=level, id=f"library {one.kind}", text=one.text, rule="shop library", path=one.path)


def _over_time(project: Project) -> Iterator[Finding]:
    """What an outage comes to, and a trip where there is one."""
    from coldbox.scene.finding import Finding
    from coldbox.spread import hold

    kinds: tuple[Kind, ...] = ("outage",) if project.trip is None else ("outage", "trip")
    for kind in kinds:
        try:
            yield from hold.run(project, kind, count=0).findings
        except ColdboxError as error:
            text = f"the {kind} cannot be computed: {str(error).strip()}"
            yield Finding(level="caution", id=f"no {kind}", text=text, rule="", path=kind)
