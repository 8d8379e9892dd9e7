"""The page around an account of readings or a test sheet: one file, no script, nothing asked for from elsewhere."""

from __future__ import annotations

import base64
import hashlib
from collections.abc import Iterable, Sequence
from functools import cache
from importlib import resources

from circuitlint.reports.page.text import escape


@cache
def _style() -> str:
    return resources.files("circuitlint.reports").joinpath("readings.css").read_text(encoding="utf-8").strip()


def page(kind: str, title: str, header: str, body: str) -> str:
    """The whole document. `header` and `body` are markup; `kind` and `title` are escaped here."""
    style = _style()
    allowed = "sha256-" + base64.b64encode(hashlib.sha256(style.encode()).digest()).decode("ascii")
    return (
        '<!DOCTYPE html>\n<html lang="en">\n<head>\n<meta charset="utf-8">\n'
        f"<meta http-equiv=\"Content-Security-Policy\" content=\"default-src 'none'; style-src '{allowed}'; base-uri 'none'; "
        "form-action 'none'\">\n"
        '<meta name="viewport" content="width=device-width, initial-scale=1">\n'
        f"<title>{escape(title)}: {escape(kind.lower())}</title>\n<style>{style}</style>\n</head>\n<body>\n"
        f'<main class="paper"><header><p class="kind">{escape(kind)}</p><h1>{escape(title)}</h1>{header}</header>\n{body}\n'
        "</main>\n</body>\n</html>\n"
    )


def facts(pairs: Iterable[tuple[str, str]]) -> str:
    """A row of facts; those without a value are left out. Escaped here."""
    cells = "".join(f"<div><dt>{escape(name)}<dd>{escape(value)}</div>" for name, value in pairs if value)
    return f'<dl class="facts">{cells}</dl>'


def table(name: str, head: Sequence[tuple[str, str]], rows: Iterable[str], kind: str = "") -> str:
    """A table in a box that scrolls by itself. `head` holds words and class of each column; `rows` are markup."""
    cells = "".join(f'<th scope="col"{f" class={css}" if css else ""}>{escape(words)}' for words, css in head)
    css = f' class="{kind}"' if kind else ""
    return (f'<div class="wide" tabindex="0" role="region" aria-label="{escape(name)}"><table{css} aria-label="{escape(name)}">'
            f"<thead><tr>{cells}</thead><tbody>{''.join(rows)}</tbody></table></div>")


def signatures(roles: Sequence[str]) -> str:
    """The block for name, date and signature."""
    rows = "".join(f'<tr><th scope="row">{escape(who)}<td><td><td>' for who in roles)
    return ('<table class="sign" aria-label="Name, date and signature"><thead><tr><th scope="col">Signed as<th scope="col">Name'
            f'<th scope="col">Date<th scope="col">Signature</thead><tbody>{rows}</tbody></table>')
