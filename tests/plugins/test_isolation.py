"""A plugin that misbehaves is named and loses only itself: every other rule says, byte for byte, what it says without it."""

from __future__ import annotations

import json
from collections.abc import Callable, Iterable
from pathlib import Path
from typing import Any, NamedTuple

import pytest

from circuitlint.cli import main
from tests.plugins import hostile
from tests.plugins.hostile import LOADING, NAME, RUNNING, TOLD_OF_LOADING, TOLD_OF_RUNNING

HOUSE = """\
format: 1
name: house
title: Rules of the house
edition: 2026-12-01
built_on: low-voltage-50hz
jurisdiction: nowhere
rules:
  house-check:
    required: {required}
    severities: {{nominal: minor, worst_case: minor, near_limit: observation, kind: minor, not_assessed: observation}}
"""


class Run(NamedTuple):
    """One call: exit status, the record, and what went to standard error."""

    status: int
    record: Any
    told: str

    def results(self, *but: str) -> dict[str, bytes]:
        """Every circuit's checks and coverage as bytes, less those of the rules named."""
        return {
            one["tag"]: json.dumps(
                [[check for check in one["checks"] if check["rule"] not in but],
                 {rule: word for rule, word in one["coverage"].items() if rule not in but}]
            ).encode()
            for one in self.record["circuits"]
        }  # fmt: skip

    def words(self) -> dict[str, str]:
        """What became of the house's rule, circuit by circuit."""
        return {one["tag"]: one["coverage"].get(NAME, "") for one in self.record["circuits"]}


Call = Callable[..., Run]


@pytest.fixture
def call(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> Call:
    """Review the demo, with a plugin given as text, and a ruleset that names its rule."""

    def review(plugin: str = "", *more: str, required: bool = True, house: bool = True) -> Run:
        arguments = ["review", "--demo", "--report", "json"]
        if plugin:
            (tmp_path / "wild.py").write_text(plugin, encoding="utf-8")
            arguments += ["--plugin", str(tmp_path / "wild.py")]
        if house:
            (tmp_path / "house.yaml").write_text(HOUSE.format(required=str(required).lower()), encoding="utf-8")
            arguments += ["--ruleset", str(tmp_path / "house.yaml")]
        capsys.readouterr()
        status = main([*arguments, *more])
        printed, told = capsys.readouterr()
        return Run(status, json.loads(printed), told)

    return review


@pytest.fixture(scope="module")
def undisturbed(tmp_path_factory: pytest.TempPathFactory) -> dict[str, bytes]:
    """What the common rules say of the demo when no other plugin is there."""
    target = tmp_path_factory.mktemp("undisturbed") / "record.json"
    main(["review", "--demo", "--report", f"json={target}"])
    return Run(0, json.loads(target.read_text(encoding="utf-8")), "").results()


def culprits(run: Run) -> str:
    return "\n".join(f"{one['plugin']} {one['rule']} {one['what']}" for one in run.record["problems"])


def never_holding(folder: Path) -> int:
    """The exit status of the last call where nothing may hold."""
    where = ["--plugin", str(folder / "wild.py"), "--ruleset", str(folder / "house.yaml")]
    return main(["review", "--demo", *where, "--hold-at", "never", "--report", f"text={folder / 'report.txt'}"])


def tags(run: Run) -> Iterable[str]:
    return [tag for one in run.record["problems"] if one["rule"] == NAME for tag in one["circuits"]]


@pytest.mark.parametrize("misbehaviour", LOADING)
def test_a_plugin_that_does_not_load_is_named_and_its_required_rule_holds_the_review(
    misbehaviour: str, call: Call, undisturbed: dict[str, bytes], tmp_path: Path
) -> None:
    run = call(LOADING[misbehaviour])
    assert run.results(NAME) == undisturbed
    assert "wild" in culprits(run) and "wild" in run.told
    assert TOLD_OF_LOADING[misbehaviour] in culprits(run)
    assert set(run.words().values()) == {"not assessed"}
    assert run.record["held"]
    assert run.status == 1
    assert never_holding(tmp_path) == 3
    (listed,) = [one for one in run.record["plugins"] if one["name"] == "wild"]
    assert TOLD_OF_LOADING[misbehaviour] in listed["failed"]


@pytest.mark.parametrize("misbehaviour", RUNNING)
def test_a_rule_that_misbehaves_on_a_circuit_is_not_assessed_there_and_the_others_say_what_they_said(
    misbehaviour: str, call: Call, undisturbed: dict[str, bytes], tmp_path: Path
) -> None:
    run = call(hostile.rule(RUNNING[misbehaviour]))
    assert run.results(NAME) == undisturbed
    assert f"wild {NAME}" in culprits(run) and f"wild {NAME}" in run.told
    assert TOLD_OF_RUNNING[misbehaviour] in culprits(run)
    touched = set(tags(run))
    assert touched
    assert {tag for tag, word in run.words().items() if word == "not assessed"} == touched
    assert run.record["held"] and run.status == 1
    assert never_holding(tmp_path) == 3


def test_a_rule_that_fails_on_one_circuit_is_lost_there_only(call: Call) -> None:
    run = call(hostile.rule(RUNNING["an exception on one circuit"]))
    assert set(tags(run)) == {"=R3-Y1"}
    assert {word for tag, word in run.words().items() if tag != "=R3-Y1"} == {"nonconforming"}


def test_a_rule_without_end_is_stopped_and_not_started_again(call: Call) -> None:
    run = call(hostile.rule(RUNNING["no end"]))
    assert set(run.words().values()) == {"not assessed"}
    assert "is not run again" in culprits(run)


def test_a_rule_that_prints_is_named_spoils_no_report_and_loses_nothing(call: Call, undisturbed: dict[str, bytes]) -> None:
    run = call(hostile.rule(hostile.PRINTING), "--hold-at", "never")
    assert run.results(NAME) == undisturbed
    assert set(run.words().values()) == {"nonconforming"}
    assert "prints to standard output" in culprits(run)
    assert "so far so good" in run.told and "and so on" in run.told
    assert run.status == 3


def test_a_plugin_that_prints_while_loading_is_named(call: Call, undisturbed: dict[str, bytes]) -> None:
    run = call('print("hello")\n' + hostile.rule(hostile.NOTHING), "--hold-at", "never")
    assert run.results(NAME) == undisturbed
    assert "wild" in culprits(run) and "prints to standard output" in culprits(run)
    assert "hello" in run.told
    assert run.status == 3


def test_a_lost_rule_that_is_not_required_does_not_hold_and_does_not_pass_either(call: Call) -> None:
    for misbehaviour in ("load error",):
        run = call(LOADING[misbehaviour], "--hold-at", "never", required=False)
        assert run.status == 3
    run = call(hostile.rule(RUNNING["an exit"]), "--hold-at", "never", required=False)
    assert run.status == 3
    assert set(run.words().values()) == {"not assessed"}


def test_a_broken_plugin_whose_rule_nobody_asks_for_is_still_told(call: Call, undisturbed: dict[str, bytes]) -> None:
    run = call(LOADING["load error"], "--hold-at", "never", house=False)
    assert run.results() == undisturbed
    assert run.status == 3 and "wild" in run.told


def test_an_offered_rule_that_the_ruleset_does_not_name_is_told_and_not_run(call: Call, undisturbed: dict[str, bytes]) -> None:
    run = call(hostile.rule(hostile.NOTHING), "--hold-at", "never", house=False)
    assert run.results() == undisturbed
    assert run.status == 0
    assert f"the rule {NAME} of wild is not in the ruleset low-voltage-50hz" in run.told


def test_two_broken_plugins_are_both_named(call: Call, undisturbed: dict[str, bytes], tmp_path: Path) -> None:
    (tmp_path / "other.py").write_text("raise RuntimeError('gone')\n", encoding="utf-8")
    run = call(hostile.rule(RUNNING["an exit"]), "--plugin", str(tmp_path / "other.py"))
    assert run.results(NAME) == undisturbed
    assert "wild house-check" in culprits(run) and "other  the plugin failed: RuntimeError: gone" in culprits(run)


def test_a_rule_cannot_take_another_rules_name_while_it_runs(call: Call, undisturbed: dict[str, bytes]) -> None:
    run = call(hostile.rule('type(self).name = self.name = "voltage-drop"\nyield Fact("taken", "taken")'))
    assert run.results(NAME) == undisturbed
    assert set(run.words().values()) == {"nonconforming"}


def test_what_a_failing_rule_says_is_the_same_on_every_run(call: Call) -> None:
    text = hostile.rule("raise RuntimeError(object())\nyield")
    assert call(text).record == call(text).record
    assert "0x" not in culprits(call(text))


def test_a_rule_that_asks_for_much_changes_no_figure_that_another_rule_asks_for(call: Call, undisturbed: dict[str, bytes]) -> None:
    text = hostile.rule(hostile.NOTHING).replace(
        'figures = ("current",)', 'figures = ("impedance", "resistance", "reactance", "voltage", "active-power", "winding-loss")')
    text = text.replace('states = ("cold",)', 'states = ("cold", "steady", "switch-on", "stuck-open", "other-frequency")')
    assert call(text).results(NAME) == undisturbed
