"""The document around the sections: head with its content policy, skip link, contents, main part, foot."""

from __future__ import annotations

import base64
import hashlib
from collections.abc import Iterable
from functools import cache
from importlib import resources
from typing import NamedTuple

from circuitlint.reports.page import margins, marks
from circuitlint.reports.page.overview import DEFERENCE
from circuitlint.reports.page.text import escape


class Section(NamedTuple):
    """A section: its anchor, its heading, its content as markup."""

    anchor: str
    heading: str
    content: str


@cache
def _file(name: str) -> str:
    return resources.files("circuitlint.reports.page").joinpath(name).read_text(encoding="utf-8").strip()


def _hash(text: str) -> str:
    return "sha256-" + base64.b64encode(hashlib.sha256(text.encode()).digest()).decode("ascii")


def policy(style: str, script: str) -> str:
    """What the page may load and run: nothing but its own style sheet and script, known by their digests."""
    return f"default-src 'none'; style-src '{_hash(style)}'; script-src '{_hash(script)}'; base-uri 'none'; form-action 'none'"


def document(title: str, digest: str, header: str, sections: Iterable[Section]) -> str:
    """The whole page. `digest` is hexadecimal and stands at the foot of every printed sheet."""
    style = _file("page.css").replace("DIGEST", digest[:16])
    script = _file("page.js")
    listed = list(sections)
    contents = "".join(f'<li><a href="#{one.anchor}">{one.heading}</a>' for one in listed)
    parts = "".join(
        f'<section id="{one.anchor}" aria-labelledby="h-{one.anchor}"><h2 id="h-{one.anchor}">'
        f'<span class="no">{number}</span> {one.heading}</h2>'
        f"{one.content}</section>"
        for number, one in enumerate(listed, 1)
    )
    shown = f"{escape(title)}: review record" if title.strip() else "Review record"
    return (
        '<!DOCTYPE html>\n<html lang="en">\n<head>\n<meta charset="utf-8">\n'
        f'<meta http-equiv="Content-Security-Policy" content="{policy(style, script)}">\n'
        '<meta name="viewport" content="width=device-width, initial-scale=1">\n'
        f'<meta name="referrer" content="no-referrer">\n<title>{shown}</title>\n<style>{style}</style>\n'
        "</head>\n<body>\n"
        f'<a class="skip" href="#findings">Skip to the findings</a>\n{margins.shared(marks.shapes())}\n'
        f'<div class="paper">{header}\n<nav aria-label="Contents"><ol>{contents}</ol></nav>\n<main>{parts}</main>\n'
        f"<footer><p>{DEFERENCE}</p></footer></div>\n<script>{script}</script>\n</body>\n</html>\n"
    )
