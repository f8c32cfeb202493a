"""Findings of a project as a document."""

from __future__ import annotations

from collections.abc import Iterator

from coldbox.account.entry import Finding
from coldbox.paper.document import Block, Document, Heading
from coldbox.paper.load import LEVELS, System, findings_blocks


def document(file: str, findings: tuple[Finding, ...], system: System) -> Document:
    """What `coldbox check` says of a file that has no errors, its figures in SI or IP."""
    return Document(title=file, blocks=tuple(_blocks(file, findings, system)))


def _blocks(file: str, findings: tuple[Finding, ...], system: System) -> Iterator[Block]:
    counts = [(level, sum(finding.level == level for finding in findings)) for level in LEVELS]
    told = ", ".join(f"{count} {level}{'s' if count > 1 else ''}" for level, count in counts if count)
    yield Heading(text=f"{file}: no errors. {told or 'Nothing to object to'}.", level=1)
    yield from findings_blocks(findings, system)
