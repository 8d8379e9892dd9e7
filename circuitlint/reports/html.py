"""The review record as one self-contained page.

Everything stands in the one file: no address is asked for anything, and the page reads without its script, which only
filters and sorts. The same record gives the same bytes.
"""

from __future__ import annotations

import hashlib

from circuitlint.errors import RecordError
from circuitlint.reports import json_record
from circuitlint.reports.page.circuit import circuits
from circuitlint.reports.page.closing import equations, not_assessed, signatures
from circuitlint.reports.page.findings import findings, margins_chart
from circuitlint.reports.page.overview import reviewed, summary, title_block
from circuitlint.reports.page.phasor import Reference
from circuitlint.reports.page.sheet import References
from circuitlint.reports.page.shell import Section, document
from circuitlint.review.record import Record


def digest_of(record: Record) -> str:
    """SHA-256 of the record in hexadecimal: that of the file the report kind `json` writes.

    A record that JSON cannot hold, since a number in it is not finite, is told by its text as a model instead.
    """
    try:
        text = json_record.render(record)
    except RecordError:
        text = repr(record)
    return hashlib.sha256(text.encode()).hexdigest()


def render(record: Record, reference: Reference = "current") -> str:
    """The page as text, to be written as UTF-8. `reference` is what the phasor diagrams draw to the right."""
    digest = digest_of(record)
    references = References(record.formulas, record.sources)
    anchors = {one.tag: number for number, one in reversed(list(enumerate(record.circuits, 1)))}
    return document(record.title, digest, title_block(record, digest), (
        Section("reviewed", "What was reviewed", reviewed(record, references)),
        Section("summary", "Summary", summary(record)),
        Section("findings", "Findings", findings(record, anchors, references)),
        Section("margins", "Margins of all checks", margins_chart(record, anchors)),
        Section("circuits", "Circuits", circuits(record, references, reference)),
        Section("equations", "Equations and sources", equations(record, references)),
        Section("open", "What was not assessed", not_assessed(record, anchors)),
        Section("sign", "Name, date, signature", signatures(digest)),
    ))  # fmt: skip
