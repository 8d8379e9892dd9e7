"""Whatever a plugin raises, exits with or prints is told from what the tool does, and from a person who presses Ctrl-C."""

from __future__ import annotations

import contextlib
import io
import os
import re
import signal
import sys
import threading
from collections.abc import Iterator
from types import FrameType
from typing import BinaryIO

from circuitlint.errors import PluginError

PRINTED = "it prints to standard output, which belongs to the report; what it printed went to standard error"


_OWN_FILES = (os.path.join(os.path.dirname(os.path.dirname(__file__)), ""), "<frozen", contextlib.__file__)
_ADDRESS = re.compile(r" at 0x[0-9a-fA-F]+")


class _Keyboard:
    """Whether Ctrl-C was pressed, as told by the signal and not by an exception."""

    pressed = False


def _note_and_raise(number: int, frame: FrameType | None) -> None:
    _Keyboard.pressed = True
    raise KeyboardInterrupt


@contextlib.contextmanager
def keyboard_heeded() -> Iterator[None]:
    """While inside, a real Ctrl-C is known from a KeyboardInterrupt that a plugin raises by itself.

    Does nothing outside the main thread, inside itself, or where somebody else handles the signal.
    """
    mine = threading.current_thread() is threading.main_thread() and signal.getsignal(signal.SIGINT) is signal.default_int_handler
    if not mine:
        yield
        return
    _Keyboard.pressed = False
    signal.signal(signal.SIGINT, _note_and_raise)
    try:
        yield
    finally:
        signal.signal(signal.SIGINT, signal.default_int_handler)


def is_the_persons_wish(error: BaseException) -> bool:
    """Whether the exception stands for a real Ctrl-C, which nothing may contain."""
    return isinstance(error, KeyboardInterrupt) and _Keyboard.pressed


class Ear(io.TextIOBase):
    """Stands in for standard output while plugins run. What they print goes to standard error; `heard` says that they did."""

    def __init__(self) -> None:
        self.heard = False

    def write(self, text: str) -> int:
        """Pass the text on."""
        self.heard = True
        with contextlib.suppress(Exception):
            sys.stderr.write(text)
        return len(text)

    def writable(self) -> bool:
        """Yes."""
        return True

    @property
    def buffer(self) -> BinaryIO:
        """Where bytes go: standard error too."""
        self.heard = True
        return sys.stderr.buffer

    def drain(self) -> bool:
        """Whether anything was printed since the last time one asked."""
        heard, self.heard = self.heard, False
        return heard


@contextlib.contextmanager
def overheard() -> Iterator[Ear]:
    """Standard output stands aside for an `Ear`, and is back in its place afterwards, whatever a plugin put there."""
    before, ear = sys.stdout, Ear()
    sys.stdout = ear
    try:
        yield ear
    finally:
        sys.stdout = before


def describe(error: BaseException) -> str:
    """An exception in one line: kind, message, and the place in the plugin's own file; the same line on every machine."""
    text = _message(error)
    trace = error.__traceback__
    place = ""
    while trace is not None:
        file = trace.tb_frame.f_code.co_filename
        if not file.startswith(_OWN_FILES):
            place = f" ({os.path.basename(file)}, line {trace.tb_lineno})"
        trace = trace.tb_next
    if isinstance(error, PluginError):
        return text
    if isinstance(error, SystemExit):
        return f"it ends the program: SystemExit: {text}{place}"
    return f"{type(error).__name__}: {text}{place}"


def _message(error: BaseException) -> str:
    try:
        text = "".join(one if one.isprintable() else "?" for one in " ".join(str(error).split()))
    except BaseException as second:
        if is_the_persons_wish(second):
            raise
        return "its message cannot be read"
    return _ADDRESS.sub("", text)[:300] or "no message"
