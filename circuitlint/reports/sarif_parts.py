"""The small objects that a SARIF log is made of: messages, locations, file names as URIs, units, levels."""

from __future__ import annotations

import re
from typing import Any
from urllib.parse import quote

from circuitlint.reports.terminal import printable, prose
from circuitlint.reports.words import percent
from circuitlint.review.record import Check, Circuit, Place, Severity
from circuitlint.si import DIMENSIONS

LEVELS: dict[Severity, str] = {"major": "error", "minor": "warning", "observation": "note"}


def told(circuit: Circuit, check: Check) -> str:
    """A check in a line: circuit, what is, margin or gap, what would help."""
    serves = f" ({circuit.serves})" if circuit.serves else ""
    sentences = [f"{circuit.tag}{serves}: {check.what}"]
    if check.margin is not None:
        sentences.append(f"margin {percent(check.margin)} in the worst case")
    if check.result == "not assessed" and check.why:
        sentences.append(check.why)
    if check.help:
        sentences.append(f"what would help: {check.help}")
    return "; ".join(sentences)


def unit(dimension: str) -> dict[str, str]:
    """The SI unit that magnitudes of a dimension are in, as a property."""
    known = DIMENSIONS.get(dimension)
    return {"unit": known.symbol or "1"} if known is not None else {}


def location(place: Place, files: dict[str, int], tag: str = "", of: str = "") -> dict[str, Any]:
    """Where a part stands: file, line, column, and the circuit it belongs to (3.28)."""
    artifact: dict[str, Any] = {"uri": uri(place.file)}
    if place.file in files:
        artifact["index"] = files[place.file]
    region = {"startLine": max(1, place.line), "startColumn": max(1, place.column)}
    made: dict[str, Any] = {"physicalLocation": {"artifactLocation": artifact, "region": region}}
    if tag:
        path = f"{tag}/{of}" if of else tag
        made["logicalLocations"] = [{"name": printable(tag), "fullyQualifiedName": printable(path), "kind": "object"}]
    return made


def uri(file: str) -> str:
    """A file name as a URI reference: relative names stay relative, absolute ones get their scheme."""
    name = file.replace("\\", "/")
    if re.match(r"[A-Za-z]:/", name):
        return f"file:///{name[:2]}{quote(name[2:], safe='/', errors='surrogatepass')}"
    quoted = quote(name, safe="/", errors="surrogatepass")
    if name.startswith("/"):
        return f"file://{quoted}" if not name.startswith("//") else f"file:{quoted}"
    return quoted or "."


def about(rule: str, rules: dict[str, int]) -> dict[str, Any]:
    """Which rule a notification is about (3.58.3), where the rule is in the log."""
    return {"associatedRule": {"id": rule, "index": rules[rule]}} if rule in rules else {}


def message(text: str) -> dict[str, str]:
    """Plain text as a message: braces doubled (3.11.5), and nothing that a reader would take for a link (3.11.6)."""
    plain = prose(text).replace("{", "{{").replace("}", "}}").replace("](", "] (")
    return {"text": plain or "no text"}
