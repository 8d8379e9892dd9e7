"""Load kinds and extra figures of plugins: they take full part, and where they fail they lose only what is theirs."""

from __future__ import annotations

import json
from pathlib import Path
from typing import Any

import pytest

from circuitlint.definition.reading import read_text
from circuitlint.engine import Review, review
from circuitlint.errors import InputError
from circuitlint.limits.reading import read_ruleset, resolve
from circuitlint.plugins import Gathered, gather
from circuitlint.reports import kinds as reports
from circuitlint.review.record import Record

LAMP = '''
import numpy as np
from circuitlint.authoring import DataSheet, Entry, ExtraFigures, Key, LoadKind, Plan, Source, fields, formula, offers, si

OHM = Source("Ohm's law", known="derived")


class Lamp(Entry):
    resistance: fields.Resistance
    {validator}


@formula("Z", "{{R}}", source=OHM, resistance="R")
def lamp_impedance(*, resistance: si.Ohm) -> si.ComplexOhm:
    {impedance_formula}


@formula("g", "1 / {{I}}", source=OHM, current="I")
def glow(*, current: si.Ampere) -> si.Ratio:
    {figure_formula}


class LampKind(LoadKind[Lamp]):
    name = "lamp"
    model = Lamp

    def data(self, part, place, into):
        into.state(f"{{place}}.resistance", part.resistance)
        {data}

    def impedance(self, plan, place):
        {impedance}
        return plan.sheet.put("impedance phasor", place, lamp_impedance, figure=False, resistance=plan.datum(f"{{place}}.resistance"))

    def figures(self, plan, place):
        plan.sheet.put("glow", place, glow, current=Key("current", place))
        {figures}

    def label(self, part):
        {label}


class Extra(ExtraFigures):
    name = "inverse-current"
    gives = ("inverse-current",)

    def figures(self, plan, place):
        {extra}


@offers
def circuitlint_load_kinds():
    return [LampKind()]


@offers
def circuitlint_figures():
    return [Extra()]
'''
GOOD = {
    "validator": "pass",
    "impedance_formula": "return resistance + 0j",
    "figure_formula": "return 1.0 / current",
    "data": "pass",
    "impedance": "pass",
    "figures": "pass",
    "label": 'return ("lit",)',
    "extra": 'plan.sheet.put("inverse-current", place, glow, current=Key("current", place))',
}
RULE = """

from circuitlint.authoring import RATIO, LimitSpec, Rule, ask, at_most


class Lit(Rule):
    name = "lit"
    title = purpose = applies_to = helps = "light"
    figures = ("asks for",)
    states = ("cold",)
    needs = ()
    limits = {"most": LimitSpec(RATIO, "most light")}

    def check(self, circuit, limits):
        yield at_most(ask(circuit, "asks for", "cold"), limits.get("most"))


@offers
def circuitlint_rules():
    return [Lit]
"""
LIT = """\
format: 1
name: lit
title: light
edition: 2026-12-01
jurisdiction: nowhere
statement: others prevail
sources: {house: {known: common practice}}
rules:
  lit:
    required: true
    severities: {nominal: minor, worst_case: minor, near_limit: observation, kind: minor, not_assessed: observation}
    limits: {most: {value: "10", source: house}}
"""
HEAD = """\
format: 1
supplies:
  shore: {system: single-phase, voltage: 230 V ± 10 %, frequency: 50 Hz ± 1 %}
circuits:
"""
COIL = """\
  - tag: COIL
    fed_from: shore
    ambient: 20 degC
    cable: {section: 1.5 mm2, length: 40 m, conductor: copper, insulation: pvc-70, method: C, ambient: 30 degC, grouped_circuits: 1}
    load: {coil: {resistance: 50 ohm ± 5 %, inductance: 0.4 H ± 10 %, armature: none, temperature_rise: 40 K}}
"""
LAMPS = """\
  - tag: LAMP
    fed_from: shore
    cable: []
    load: {lamp: {resistance: 100 ohm ± 10 %}}
  - tag: BOTH
    fed_from: shore
    ambient: 20 degC
    cable: []
    load:
      series:
        - coil: {resistance: 50 ohm ± 5 %, inductance: 0.4 H ± 10 %, armature: none, temperature_rise: 40 K}
        - lamp: {resistance: 100 ohm ± 10 %}
"""


def lamp(folder: Path, **changed: str) -> Gathered:
    """What is gathered from the lamp's plugin with some of its lines changed."""
    lines = {name: text.replace("\n", "\n        ") for name, text in {**GOOD, **changed}.items()}
    (folder / "lamp.py").write_text(LAMP.format(**lines), encoding="utf-8")
    return gather([str(folder / "lamp.py")])


def reviewed(gathered: Gathered, text: str = HEAD + COIL + LAMPS) -> Record:
    installation = read_text(text, "lamps.yaml", gathered.models())
    made = review(installation, resolve("low-voltage-50hz", gathered.rulesets), gathered, Review("major", "2026-12-01"))
    for kind in ("text", "json", "sarif", "html"):
        assert reports.render(kind, made)
    return made


def circuit(record: Record, tag: str) -> Any:
    (found,) = [one for one in record.circuits if one.tag == tag]
    return found


def figure(record: Record, tag: str, name: str, state: str, of: str = "") -> float | None:
    found = [one for one in circuit(record, tag).figures if (one.name, one.state, one.of) == (name, state, of)]
    return found[0].nominal if found else None


def checks_as_bytes(record: Record, tag: str) -> bytes:
    return json.dumps([check.model_dump(mode="json", exclude={"place"}) for check in circuit(record, tag).checks]).encode()


@pytest.fixture(scope="module")
def alone() -> Record:
    """The coil's circuit without any plugin."""
    return reviewed(gather(), HEAD + COIL)


def test_a_load_kind_from_outside_takes_full_part(tmp_path: Path, alone: Record) -> None:
    gathered = lamp(tmp_path)
    assert [one.failed for one in gathered.plugins] == ["", ""]
    record = reviewed(gathered)
    assert record.problems == ()
    assert figure(record, "LAMP", "current", "cold") == pytest.approx(2.3, rel=1e-12)
    assert figure(record, "LAMP", "glow", "cold", "load.lamp") == pytest.approx(1 / 2.3, rel=1e-12)
    assert figure(record, "LAMP", "inverse-current", "cold") == pytest.approx(1 / 2.3, rel=1e-12)
    total = abs(150.0 + 2j * 3.141592653589793 * 50 * 0.4)
    assert figure(record, "BOTH", "current", "cold") == pytest.approx(230.0 / total, rel=1e-9)
    assert record.formulas["lamp/glow"].equation == "1 / {I}"
    assert record.circuits[1].tree.parts[-1].values == ("lit",)
    assert checks_as_bytes(record, "COIL") == checks_as_bytes(alone, "COIL")


def test_a_figure_of_a_plugin_has_its_worst_case_like_any_other(tmp_path: Path) -> None:
    record = reviewed(lamp(tmp_path))
    (glow,) = [one for one in circuit(record, "LAMP").figures if (one.name, one.state) == ("glow", "cold")]
    assert glow.lowest == pytest.approx(1 / (2.3 * 1.1 / 0.9), rel=1e-9)
    assert glow.highest == pytest.approx(1 / (2.3 * 0.9 / 1.1), rel=1e-9)


KIND_FAILS = {
    "data raises": ("data", "raise LookupError('no plate')", "no plate"),
    "data of others overwritten": (
        "data", "into.data['supply.voltage'] = into.data[f'{place}.resistance']", "data that others stated"),
    "data of others taken out": ("data", "into.data.clear()", "data that others stated"),
    "data put elsewhere": ("data", "into.state('load.coil.resistance', part.resistance)", "not under load"),
    "data that are no numbers": (
        "data", "into.assume(f'{place}.x', si.RATIO, float('nan'), 1.0, 1.0, OHM)", "not a finite number"),
    "label gives a text": ("label", "return 'lit'", "label gives 'lit'"),
    "label raises": ("label", "raise SystemExit(0)", "it ends the program"),
    "impedance raises": ("impedance", "raise SystemExit(0)", "it ends the program"),
    "impedance of another key": ("impedance", "return Key('impedance', place)", "impedance gives Key"),
    "impedance never written": ("impedance", "return Key('impedance phasor', place)", "writes no 'impedance phasor'"),
    "impedance that is no key": ("impedance", "return 7", "impedance gives 7"),
    "lines of others taken out": ("impedance", "plan.sheet.lines.clear()", "lines that others wrote"),
    "a formula that raises": ("impedance_formula", "raise ValueError('too dark')", "too dark"),
    "a formula that gives no number": ("impedance_formula", "return resistance * float('nan')", "no finite number"),
    "a formula that gives None": ("impedance_formula", "return None", "gives object"),
    "a formula of another shape": ("impedance_formula", "return np.zeros((3, 5, 7))", "gives float64 of shape"),
    "a formula that changes what is put in": ("impedance_formula", "resistance *= 0; return resistance", "read-only"),
}  # fmt: skip


@pytest.mark.parametrize("misbehaviour", KIND_FAILS)
def test_a_load_kind_that_fails_loses_its_own_circuits_and_names_its_plugin(
    misbehaviour: str, tmp_path: Path, alone: Record
) -> None:
    place, line, told = KIND_FAILS[misbehaviour]
    record = reviewed(lamp(tmp_path, **{place: line}))
    assert checks_as_bytes(record, "COIL") == checks_as_bytes(alone, "COIL")
    assert record.problems and {one.plugin for one in record.problems} == {"lamp"}
    assert any(told in one.what for one in record.problems)
    concerned = {tag for one in record.problems for tag in one.circuits}
    assert concerned and "COIL" not in concerned
    for tag in concerned:
        assert circuit(record, tag).coverage["voltage-drop"] == "not assessed"
    assert record.held


FIGURES_FAIL = {
    "a guess that nothing settles": (
        "impedance", "plan.sheet.put('x', place, glow, current=plan.sheet.guess('g', place, si.CURRENT))", "never settles"),
    "figures raise": ("figures", "raise LookupError('no glow')", "no glow"),
    "a figure of the circuit overwritten": (
        "figures", "plan.sheet.put('current', '', glow, current=Key('current', place))", "written already"),
    "a figure of another part": (
        "figures", "plan.sheet.put('new', 'load', glow, current=Key('current', place))", "which is not its part"),
    "a figure from nowhere": ("figures", "plan.sheet.put('new', place, glow, current=Key('draught', place))", "nobody wrote"),
    "a wrong argument": ("figures", "plan.sheet.put('new', place, glow, voltage=Key('current', place))", "which takes current"),
    "the same figure twice": ("figures", "plan.sheet.put('glow', place, glow, current=Key('current', place))", "twice"),
    "a formula that is none": ("figures", "plan.sheet.put('new', place, abs, current=Key('current', place))", "not a line"),
    "others' lines taken out": ("figures", "del plan.sheet.lines[0]", "lines that others wrote"),
    "a formula that raises": ("figure_formula", "raise SystemExit(0)", "it ends the program"),
    "a formula that gives no number": ("figure_formula", "return current * float('inf')", "no finite number"),
    "a formula that gives a phasor": ("figure_formula", "return current * 1j", "complex"),
    "a formula that changes what is put in": ("figure_formula", "current *= 0.0; return current", "read-only"),
}  # fmt: skip


@pytest.mark.parametrize("misbehaviour", FIGURES_FAIL)
def test_own_figures_that_fail_are_lacking_and_everything_else_stands(
    misbehaviour: str, tmp_path: Path, alone: Record
) -> None:
    place, line, told = FIGURES_FAIL[misbehaviour]
    sound = reviewed(lamp(tmp_path))
    record = reviewed(lamp(tmp_path, **{place: line}))
    assert checks_as_bytes(record, "COIL") == checks_as_bytes(alone, "COIL")
    for tag in ("LAMP", "BOTH"):
        assert checks_as_bytes(record, tag) == checks_as_bytes(sound, tag)
    assert figure(record, "LAMP", "glow", "cold", "load.lamp") is None
    assert figure(record, "LAMP", "current", "cold") == figure(sound, "LAMP", "current", "cold")
    assert any("plugin 'lamp'" in one.what and told in one.what for one in record.problems)


EXTRA_FAILS = {
    "it raises": ("raise LookupError('no current')", "no current"),
    "it exits": ("raise SystemExit(0)", "it ends the program"),
    "a figure it does not give": ("plan.sheet.put('other', place, glow, current=Key('current', place))", "not among those"),
    "a figure that is there": ("plan.sheet.put('current', place, glow, current=Key('current', place))", "written already"),
    "feedback": ("plan.sheet.guess('g', place, si.CURRENT)", "feeds figures back"),
    "no number": (
        "plan.sheet.put('inverse-current', place, dark, current=Key('current', place))", "no finite number"),
}  # fmt: skip


@pytest.mark.parametrize("misbehaviour", EXTRA_FAILS)
def test_extra_figures_that_fail_are_lacking_and_no_check_changes(misbehaviour: str, tmp_path: Path) -> None:
    line, told = EXTRA_FAILS[misbehaviour]
    dark = 'pass\n\n\n@formula("d", "0 / 0 · {{I}}", source=OHM, current="I")\ndef dark(*, current: si.Ampere) -> si.Ratio:\n'
    dark += "    return current * np.nan\n"
    sound = reviewed(lamp(tmp_path))
    (tmp_path / "bad").mkdir()
    text = LAMP.format(**{**GOOD, "extra": line}).replace("class LampKind", dark.removeprefix("pass").replace("{{", "{")
                                                          .replace("}}", "}") + "\n\nclass LampKind")
    (tmp_path / "bad" / "lamp.py").write_text(text, encoding="utf-8")
    record = reviewed(gather([str(tmp_path / "bad" / "lamp.py")]))
    for tag in ("COIL", "LAMP", "BOTH"):
        assert checks_as_bytes(record, tag) == checks_as_bytes(sound, tag)
        assert figure(record, tag, "inverse-current", "cold") is None
        assert figure(sound, tag, "inverse-current", "cold") is not None
    assert any(one.plugin == "lamp" and told in one.what for one in record.problems)
    assert record.held == sound.held, "no required rule asks for the figure"


def test_an_extra_figure_that_a_required_rule_asks_for_holds_the_review_when_it_fails(tmp_path: Path) -> None:
    rule = RULE.replace("asks for", "inverse-current")
    (tmp_path / "lamp.py").write_text(LAMP.format(**{**GOOD, "extra": "raise LookupError('no current')"}) + rule)
    gathered = gather([str(tmp_path / "lamp.py")])
    gathered.rulesets["lit"] = read_ruleset(LIT.encode(), "lit.yaml")
    installation = read_text(HEAD + COIL, "coil.yaml", gathered.models())
    record = review(installation, resolve("lit", gathered.rulesets), gathered, Review("major", "2026-12-01"))
    assert record.circuits[0].coverage == {"lit": "not assessed"}
    assert record.held and not record.circuits[0].held


def test_a_model_that_cannot_read_its_entry_is_a_fault_that_names_the_plugin(tmp_path: Path) -> None:
    gathered = lamp(tmp_path, validator="def model_post_init(self, context):\n    raise SystemExit(0)")
    with pytest.raises(InputError, match="load kind 'lamp' of the plugin 'lamp' cannot read this: it ends the program"):
        reviewed(gathered)
    reviewed(gathered, HEAD + COIL)


@pytest.mark.parametrize(
    ("line", "told"),
    [
        ('name = "lamp"', ""),
        ('name = "coil"', "taken by circuitlint itself"),
        ('name = "series"', "a meaning of its own"),
        ('name = "ceiling lamp"', "accepted: lower case with underscores"),
    ],
)
def test_a_load_kind_with_a_name_that_will_not_do_is_refused(line: str, told: str, tmp_path: Path) -> None:
    text = LAMP.format(**GOOD).replace('name = "lamp"', line)
    (tmp_path / "lamp.py").write_text(text, encoding="utf-8")
    failed = gather([str(tmp_path / "lamp.py")]).plugins[-1].failed
    assert told in failed and bool(told) == bool(failed)


def test_two_plugins_cannot_have_a_load_kind_or_a_figure_of_one_name(tmp_path: Path) -> None:
    for name in ("first", "second"):
        (tmp_path / f"{name}.py").write_text(LAMP.format(**GOOD), encoding="utf-8")
    gathered = gather([str(tmp_path / "first.py"), str(tmp_path / "second.py")])
    assert gathered.plugins[-2].failed == ""
    assert "the load kind name 'lamp' is taken by first" in gathered.plugins[-1].failed
    assert "the figure name 'inverse-current of the circuit' is taken by first" in gathered.plugins[-1].failed


ON_A_BOARD = (HEAD.replace("circuits:\n", "boards:\n  DB: {fed_from: shore, cable: [{section: 6 mm2, length: 24 m, conductor: copper}]}\n")
              + "circuits:\n" + (COIL + LAMPS).replace("fed_from: shore", "fed_from: DB"))  # fmt: skip


@pytest.mark.parametrize(
    "changed",
    [{"impedance": "raise SystemExit(0)"}, {"impedance_formula": "return resistance * float('nan')"}, {"data": "1 / 0"}],
    ids=["it exits", "it gives no number", "its data fail"],
)
def test_what_shares_a_board_with_a_load_that_cannot_be_known_is_not_assessed_rather_than_passed(
    changed: dict[str, str], tmp_path: Path
) -> None:
    sound = reviewed(lamp(tmp_path), ON_A_BOARD)
    assert circuit(sound, "COIL").coverage["voltage-drop"] == "conforms"
    record = reviewed(lamp(tmp_path, **changed), ON_A_BOARD)
    assert circuit(record, "COIL").coverage["voltage-drop"] == "not assessed"
    needs = {need for check in circuit(record, "COIL").checks if check.rule == "voltage-drop" for need in check.needs}
    assert needs == {"the data of LAMP", "the data of BOTH"}
