"""Hypothesis strategies: any record, with any text and any finite number, whose parts name each other rightly."""

from __future__ import annotations

import unicodedata
from typing import Any

from hypothesis import strategies as st

from circuitlint.review import record as r
from circuitlint.si import DIMENSIONS
from tests.reports.building import CAUTIONS, FORMULAS, LIMITS, RULES, SOURCES, circuit, record
from tests.reports.records import HOSTILE

TEXTS = st.one_of(st.text(max_size=40), st.sampled_from((HOSTILE, "=R3-Y1", "", "load.coil", "線圈", "a" * 200)))
NUMBERS = st.floats(allow_nan=False, allow_infinity=False)
NAMES = st.sampled_from(sorted(DIMENSIONS))
SOME = st.one_of(st.none(), NUMBERS)


def several(strategy: st.SearchStrategy[Any], most: int = 3) -> st.SearchStrategy[tuple[Any, ...]]:
    """A short tuple."""
    return st.lists(strategy, max_size=most).map(tuple)


PLACES = st.builds(r.Place, file=TEXTS, line=st.integers(1, 10**6), column=st.integers(1, 500), path=TEXTS)
INPUTS = st.builds(r.Input, symbol=st.sampled_from("RXZPS"), value=NUMBERS, angle=SOME, dimension=NAMES, what=TEXTS)
FIGURES = st.builds(
    r.Figure, name=TEXTS, of=TEXTS, state=TEXTS, dimension=NAMES, nominal=NUMBERS, lowest=NUMBERS, highest=NUMBERS,
    formula=st.sampled_from(("", *FORMULAS)), inputs=several(INPUTS), moved_by=TEXTS, note=TEXTS,
)  # fmt: skip
CHECKS = st.builds(
    r.Check, id=TEXTS, rule=st.sampled_from(sorted(RULES)), state=TEXTS, figure=TEXTS, of=TEXTS,
    sense=st.sampled_from(("at least", "at most", "")), dimension=st.one_of(st.just(""), NAMES),
    nominal=SOME, worst=SOME,
    limit=st.one_of(st.none(), st.sampled_from(tuple(LIMITS.values()))),
    result=st.sampled_from(("conforms", "nonconforming", "not assessed")),
    basis=st.sampled_from((None, "nominal", "worst case", "near the limit", "matter of kind", "missing data")),
    severity=st.sampled_from((None, *r.SEVERITIES)), margin=SOME, nominal_margin=SOME, moved_by=TEXTS,
    share_beyond=st.one_of(st.none(), st.floats(0, 1)), share_beyond_uncertainty=st.one_of(st.none(), st.floats(0, 1)),
    needs=several(TEXTS), what=TEXTS, why=TEXTS, help=TEXTS, place=PLACES, concession=st.sampled_from((None, 0)),
)  # fmt: skip
PHASORS = st.builds(r.Phasor, name=st.sampled_from(("voltage", "current", "power")), of=TEXTS, state=TEXTS,
                    real=NUMBERS, imaginary=NUMBERS)  # fmt: skip
CURVES = st.builds(r.Curve, name=TEXTS, of=TEXTS, state=TEXTS, dimension=NAMES, times=several(NUMBERS),
                   values=several(NUMBERS), note=TEXTS)  # fmt: skip
REGIONS = st.builds(r.Region, of=TEXTS, state=TEXTS, across=TEXTS, up=TEXTS, points=several(st.tuples(NUMBERS, NUMBERS)))
CIRCUITS = st.builds(
    circuit, TEXTS, TEXTS, several(CHECKS, 4),
    figures=several(FIGURES), phasors=several(PHASORS), curves=several(CURVES),
    regions=several(REGIONS), not_solved=TEXTS, held=st.booleans(), fed_from=TEXTS, place=PLACES,
)  # fmt: skip
CONCESSIONS = st.builds(
    r.ConcessionRecord, tag=TEXTS, rule=TEXTS, by=TEXTS, reason=TEXTS, until=TEXTS, place=PLACES,
    state=st.sampled_from(("in force", "expired", "matches nothing", "too broad")),
)  # fmt: skip


def steers(character: str) -> bool:
    """Whether a character other than a line's end steers a terminal or a reader."""
    return character != "\n" and unicodedata.category(character) in ("Cc", "Cf", "Zl", "Zp")


@st.composite
def records(draw: st.DrawFn, most: int = 3) -> r.Record:
    """A record of up to so many circuits."""
    return record(
        draw(several(CIRCUITS, most)),
        title=draw(TEXTS), statement=draw(TEXTS), held=draw(st.booleans()),
        hold_at=draw(st.sampled_from((*r.SEVERITIES, "never"))),
        concessions=(draw(CONCESSIONS), *draw(several(CONCESSIONS, 2))),
        problems=draw(several(st.builds(r.Problem, plugin=TEXTS, rule=TEXTS, what=TEXTS, circuits=several(TEXTS)))),
        cautions={**CAUTIONS, draw(TEXTS): draw(TEXTS)}, sources=SOURCES, formulas=FORMULAS,
    )  # fmt: skip
