"""Report kinds of plugins: offered by name, and apart from the others when they fail."""

from __future__ import annotations

from pathlib import Path

import pytest

from circuitlint.cli import main

PLUGIN = """
import sys
from circuitlint.authoring import offers


def tags(record):
    {body}


@offers
def circuitlint_reports():
    return {{"tags": tags}}
"""


def review(folder: Path, body: str, *more: str) -> int:
    (folder / "tags.py").write_text(PLUGIN.format(body=body), encoding="utf-8")
    return main(["review", "--demo", "--hold-at", "never", "--plugin", str(folder / "tags.py"), *more])


def test_a_report_kind_of_a_plugin_is_asked_for_by_name(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    assert review(tmp_path, 'return "".join(one.tag + "\\n" for one in record.circuits)', "--report", "tags") == 0
    assert capsys.readouterr().out.startswith("=R3-Y1\n")


BAD = {
    "raises": ('raise LookupError("no tags")', "no tags"),
    "exits": ("sys.exit(0)", "it ends the program"),
    "interrupts": ("raise KeyboardInterrupt", "KeyboardInterrupt"),
    "prints": ('print("here"); return ""', "prints to standard output"),
    "gives no text": ("return 7", "gave int, not text"),
}


@pytest.mark.parametrize("misbehaviour", BAD)
def test_a_report_kind_that_fails_is_named_and_the_other_reports_are_written(
    misbehaviour: str, tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    body, told = BAD[misbehaviour]
    page, record = tmp_path / "page.html", tmp_path / "record.json"
    status = review(tmp_path, body, "--report", "tags", "--report", f"html={page}", "--report", f"json={record}")
    printed, complaint = capsys.readouterr()
    assert status == 3
    assert printed == ""
    assert f"the report kind 'tags' of the plugin 'tags' failed: {told}" in complaint or told in complaint
    assert "'tags'" in complaint
    assert page.stat().st_size > 1000 and record.stat().st_size > 1000


def test_a_report_kind_that_changes_its_record_changes_no_other_report(
    tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    before, after = tmp_path / "before.json", tmp_path / "after.json"
    body = 'record.counts.clear(); record.circuits[0].coverage.clear(); return "done"'
    assert review(tmp_path, body, "--report", f"json={before}", "--report", "tags", "--report", f"json={after}") == 0
    assert capsys.readouterr().out == "done"
    assert before.read_bytes() == after.read_bytes()


def test_the_name_of_a_shipped_kind_is_not_taken(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    (tmp_path / "tags.py").write_text(PLUGIN.format(body="return 'mine'").replace('"tags":', '"text":'), encoding="utf-8")
    assert main(["review", "--demo", "--hold-at", "never", "--plugin", str(tmp_path / "tags.py")]) in (0, 3)
    assert "mine" not in capsys.readouterr().out
