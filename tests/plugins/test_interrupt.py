"""Ctrl-C stops the tool, whatever plugin is running; an exception that only looks like it does not."""

from __future__ import annotations

import os
import signal
import subprocess
import sys
import time
from pathlib import Path

import pytest

from circuitlint.isolation.containment import is_the_persons_wish, keyboard_heeded
from tests.plugins.hostile import rule

ASLEEP = 'import time\nsys.stderr.write("asleep\\n")\nsys.stderr.flush()\ntime.sleep(60)\nyield'
HOUSE = """\
format: 1
name: house
title: Rules of the house
edition: 2026-12-01
built_on: low-voltage-50hz
jurisdiction: nowhere
rules:
  house-check:
    severities: {nominal: minor, worst_case: minor, near_limit: observation, kind: minor, not_assessed: observation}
"""


def test_control_c_while_a_rule_runs_stops_the_review_at_once_without_a_traceback(tmp_path: Path) -> None:
    (tmp_path / "sleeper.py").write_text(rule(ASLEEP), encoding="utf-8")
    (tmp_path / "house.yaml").write_text(HOUSE, encoding="utf-8")
    call = [sys.executable, "-m", "circuitlint", "review", "--demo", "--plugin", "sleeper.py", "--ruleset", "house.yaml"]
    started = subprocess.Popen(call, cwd=tmp_path, stdout=subprocess.PIPE, stderr=subprocess.PIPE, text=True)
    assert started.stderr is not None
    assert started.stderr.readline() == "asleep\n"
    time.sleep(0.2)
    os.kill(started.pid, signal.SIGINT)
    printed, told = started.communicate(timeout=30)
    assert (started.returncode, printed, told) == (3, "", "circuitlint: stopped\n")


def test_an_interrupt_that_nobody_pressed_is_not_the_persons_wish() -> None:
    with keyboard_heeded():
        assert not is_the_persons_wish(KeyboardInterrupt())
        with pytest.raises(KeyboardInterrupt) as caught:
            signal.raise_signal(signal.SIGINT)
        assert is_the_persons_wish(caught.value)
        assert not is_the_persons_wish(SystemExit(0))
    with keyboard_heeded():
        assert not is_the_persons_wish(KeyboardInterrupt()), "a new run starts anew"
    assert signal.getsignal(signal.SIGINT) is signal.default_int_handler


def test_a_handler_that_somebody_else_has_set_is_left_alone() -> None:
    before = signal.signal(signal.SIGINT, signal.SIG_IGN)
    try:
        with keyboard_heeded():
            assert signal.getsignal(signal.SIGINT) is signal.SIG_IGN
    finally:
        signal.signal(signal.SIGINT, before)
