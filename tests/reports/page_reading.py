"""Reads a page back: its elements with their attributes, its text, and its drawings."""

from __future__ import annotations

import re
from dataclasses import dataclass, field
from html import unescape
from html.parser import HTMLParser
from typing import NamedTuple

VOID = {"meta", "br", "input", "link", "img", "hr"}
RAW = {"script", "style"}


class Element(NamedTuple):
    """A start tag: name and attributes."""

    name: str
    attributes: dict[str, str]


@dataclass
class Page(HTMLParser):
    """A page as a list of start tags, with the text outside of script and style."""

    elements: list[Element] = field(default_factory=list)
    pieces: list[str] = field(default_factory=list)
    inside: str = ""

    def __post_init__(self) -> None:
        super().__init__(convert_charrefs=True)

    def handle_starttag(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        """Note a start tag."""
        self.elements.append(Element(tag, {name: value or "" for name, value in attrs}))
        self.inside = tag if tag in RAW else self.inside
        self.pieces.append(" " if tag in ("td", "th", "tr", "p", "li", "dd", "dt", "small", "div") else "")

    def handle_endtag(self, tag: str) -> None:
        """Leave a script or style."""
        self.inside = "" if tag in RAW else self.inside

    def handle_data(self, data: str) -> None:
        """Note text."""
        if not self.inside:
            self.pieces.append(data)

    @property
    def text(self) -> str:
        """The text, runs of space as one."""
        return re.sub(r"\s+", " ", "".join(self.pieces))

    def named(self, name: str) -> list[Element]:
        """The elements of a name."""
        return [one for one in self.elements if one.name == name]

    @property
    def shape(self) -> list[str]:
        """The names of all start tags, in order."""
        return [one.name for one in self.elements]


def read(page: str) -> Page:
    """A page taken apart."""
    made = Page()
    made.feed(page)
    made.close()
    return made


def drawings(page: str, kind: str = "") -> list[str]:
    """The drawings of a page as text, those of one kind only where it is named."""
    return re.findall(rf'<svg class="draw {kind}[^"]*" role="img".*?</svg>', page, re.S)


def titles(page: str) -> list[tuple[str, str]]:
    """Accessible name and description of every drawing."""
    found = re.findall(r'role="img"[^>]*><title>(.*?)</title><desc>(.*?)</desc>', page, re.S)
    return [(unescape(name), unescape(told)) for name, told in found]


def section(page: str, anchor: str) -> str:
    """The text of one section."""
    start = page.index(f'<section id="{anchor}"')
    return read(page[start : page.index("</section>", start)]).text
