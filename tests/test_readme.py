"""What README.md and DEVELOPERS.md show is what happens."""

from __future__ import annotations

import os
import subprocess
import sys
from collections.abc import Iterator
from pathlib import Path

import pytest

from tests import documents
from tests.documents import ROOT, Block, DocumentError, agrees, blocks, command, commands

DOCUMENTS = ("README.md", "DEVELOPERS.md")
# Commands that set something up or run the whole suite: .ci/run runs each of these, by name, out of the document.
RUN_BY_CI = {"README.md": {"demo", "tests"}, "DEVELOPERS.md": {"develop", "check", "benchmarks"}}
# Commands that need an environment of their own: tests/authors/test_walk.py runs them.
RUN_BY_WALK = {"README.md": set[str](), "DEVELOPERS.md": {"walk"}}


def run(line: str, folder: Path) -> subprocess.CompletedProcess[str]:
    """A command line as a person would run it in a folder, with this environment's programs found first."""
    programs = os.pathsep.join((str(Path(sys.executable).parent), os.environ["PATH"]))
    environment = {**os.environ, "PATH": programs, "NO_COLOR": "1", "PYTHONUTF8": "1"}
    return subprocess.run(
        ["bash", "-c", line], cwd=folder, env=environment, capture_output=True, text=True, encoding="utf-8", timeout=300
    )


def demo_command() -> str:
    """The last step of README's first command, without the folder its environment is in."""
    return command("README.md", "demo").rpartition("&&")[2].strip().removeprefix(".venv/bin/")


def test_the_first_paragraph_tells_the_job_before_anything_is_run() -> None:
    text = (ROOT / "README.md").read_text(encoding="utf-8")
    heading, _, rest = text.partition("\n")
    assert heading == "# circuitlint"
    opening = rest.strip().partition("\n\n")[0]
    assert len(opening.split()) >= 30, "the job paragraph comes first"
    assert not opening.startswith(("#", "```", "<", "|", "-"))


@pytest.mark.parametrize("name", ["demo", "tests"])
def test_a_set_up_command_is_one_line_from_a_bare_python_on(name: str) -> None:
    line = command("README.md", name)
    steps = [step.strip() for step in line.split("&&")]
    assert steps[0].startswith("python3 -m venv ")
    assert len(steps) >= 3
    assert not set(";|\n`$") & set(line), "steps are chained with && and nothing else"


def test_the_demo_prints_in_an_empty_folder_what_the_readme_shows_and_ends_with_status_0(tmp_path: Path) -> None:
    shown = blocks("README.md")
    first = next(at for at, each in enumerate(shown) if (each.kind, each.name) == ("command", "demo"))
    written = shown[first + 1]
    assert (written.kind, written.name) == ("output", "demo"), "the demo's output follows its command"
    done = run(demo_command(), tmp_path)
    assert done.returncode == 0, done.stderr
    assert done.stderr == ""
    assert agrees(written.text, done.stdout), f"README.md shows another output; the real one is:\n{done.stdout}"
    assert "nonconforming" in done.stdout or "held" in done.stdout, "the demo shows findings"
    assert list(tmp_path.iterdir()) == [], "the demo leaves nothing behind"


def test_the_second_command_runs_the_tests() -> None:
    assert command("README.md", "tests").endswith("/bin/pytest")


@pytest.mark.parametrize("document", DOCUMENTS)
def test_every_block_says_what_it_is(document: str) -> None:
    shown = blocks(document)
    unmarked = [each for each in shown if not each.kind and each.language not in documents.FREE_LANGUAGES]
    assert [f"{document}, line {each.line}: {each.language}" for each in unmarked] == []
    outputs = {each.name for each in shown if each.kind == "output"}
    assert outputs <= {each.name for each in shown if each.kind == "command"}, "an output of no command"


@pytest.mark.parametrize("document", DOCUMENTS)
def test_the_blocks_of_a_document_run_in_order_and_print_what_it_shows(document: str, tmp_path: Path) -> None:
    wrong = []
    printed: dict[str, str] = {}
    ran = 0
    for each in blocks(document):
        if each.kind == "file":
            target = tmp_path / each.name
            assert tmp_path in target.resolve().parents, f"{each.name} is outside the folder"
            target.parent.mkdir(parents=True, exist_ok=True)
            target.write_text(each.text, encoding="utf-8")
        elif each.kind == "output" and each.name in printed and not agrees(each.text, printed[each.name]):
            wrong.append(f"{document}, line {each.line}: the real output is\n{printed[each.name]}")
        elif each.kind in ("command", "run") and each.name not in RUN_BY_CI[document] | RUN_BY_WALK[document]:
            printed[each.name] = ""
            for line in _lines_to_run(each, tmp_path):
                done = run(line, tmp_path)
                ran += 1
                printed[each.name] += done.stdout
                # 1 is the tool's word that something is held, which a document may well show.
                if done.returncode > (1 if each.kind == "command" else 0):
                    wrong.append(f"{document}, line {each.line}: {line}: status {done.returncode}\n{done.stderr}")
    assert wrong == []
    assert ran, f"{document} shows nothing that runs"


def _lines_to_run(each: Block, folder: Path) -> Iterator[str]:
    if each.kind == "run":
        program = folder / f".{each.name}.py"
        program.write_text(each.text, encoding="utf-8")
        yield f"python {program.name}"
        return
    for line in commands(each):
        assert line.startswith(("circuitlint ", "pytest ")), f"line {each.line}: nobody runs {line!r}"
        yield line


@pytest.mark.parametrize("document", DOCUMENTS)
def test_the_commands_left_to_ci_are_there_and_ci_runs_each(document: str) -> None:
    script = (ROOT / ".ci" / "run").read_text(encoding="utf-8")
    for name in RUN_BY_CI[document]:
        assert command(document, name)
        assert f"{document} {name}" in script


def test_a_line_of_dots_stands_for_lines_left_out_and_for_nothing_else() -> None:
    printed = "a\nb\nc\nd\n"
    for written in ("a\nb\nc\nd\n", "a\n...\nd\n", "...\nb\nc\n...\n", "a\n...\nc\n...\n", "a  \nb\n...\nc\nd"):
        assert agrees(written, printed), written
    for written in ("a\nb\nd\n", "a\n...\nc\n", "...\nc\n...\nb\n...\n", "b\n...\n", "a\nb\nc\n...\nc\nd\n", ""):
        assert not agrees(written, printed), written


def test_a_document_that_breaks_the_marking_is_refused(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(documents, "ROOT", tmp_path)
    faults = {
        "<!-- command: x -->\ntext\n": "no block follows",
        "<!-- comand: x -->\n```\na\n```\n": "none of",
        "```sh\na\n": "not closed",
        "<!-- command: x -->\n": "no block follows",
    }
    for text, told in faults.items():
        (tmp_path / "README.md").write_text(text, encoding="utf-8")
        with pytest.raises(DocumentError, match=told):
            blocks("README.md")
    (tmp_path / "README.md").write_text("1. First:\n\n   <!-- command: x -->\n   ```sh\n   $ a && b\n   ```\n")
    assert command("README.md", "x") == "a && b"
    with pytest.raises(DocumentError, match="0 blocks"):
        command("README.md", "y")
    with pytest.raises(DocumentError, match="missing"):
        blocks("DEVELOPERS.md")
