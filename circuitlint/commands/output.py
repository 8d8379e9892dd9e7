"""Where reports go, how wide, how coloured, and who is told of progress."""

from __future__ import annotations

import contextlib
import os
import shutil
import sys
import tempfile
from collections.abc import Callable

from circuitlint.errors import CircuitlintError, InputError


def put(text: str, file: str) -> None:
    """Write a report whole or not at all; standard output where no file is named."""
    if not file:
        try:
            sys.stdout.buffer.write(text.encode("utf-8", "backslashreplace"))
            sys.stdout.buffer.flush()
        except BrokenPipeError:
            # The reader went away, which changes nothing about what is held.
            os.dup2(os.open(os.devnull, os.O_WRONLY), sys.stdout.fileno())
        except OSError as error:
            raise CircuitlintError(f"standard output cannot be written: {error.strerror}") from None
        return
    file = os.path.realpath(file)
    if os.path.lexists(file) and not os.path.isfile(file):
        raise InputError(f"{file}: the report cannot be written: this is not a regular file")
    folder = os.path.dirname(file) or "."
    try:
        handle, name = tempfile.mkstemp(dir=folder, prefix=".circuitlint-", suffix=".part")
    except OSError as error:
        raise InputError(f"{file}: the report cannot be written: {error.strerror}") from None
    try:
        with os.fdopen(handle, "wb") as out:
            out.write(text.encode("utf-8", "backslashreplace"))
        os.chmod(name, 0o666 & ~_umask())
        os.replace(name, file)
    except OSError as error:
        with contextlib.suppress(OSError):
            os.unlink(name)
        raise InputError(f"{file}: the report cannot be written: {error.strerror}") from None


def _umask() -> int:
    mask = os.umask(0)
    os.umask(mask)
    return mask


def columns() -> int:
    """Columns of the terminal, between 60 and 140; 80 where standard output is none."""
    return min(140, max(60, shutil.get_terminal_size((80, 24)).columns)) if sys.stdout is not None and sys.stdout.isatty() else 80


def colour() -> bool:
    """Whether standard output wants colour: a terminal, no NO_COLOR, not a dumb one."""
    return sys.stdout is not None and sys.stdout.isatty() and not os.environ.get("NO_COLOR") and os.environ.get("TERM") != "dumb"


def progress(total: int) -> Callable[[int, int], None]:
    """A bar on standard error where that is a terminal and the work is long."""
    if total < 200 or not sys.stderr.isatty():
        return lambda done, whole: None

    def tell(done: int, whole: int) -> None:
        if done % 50 == 0 or done == whole:
            filled = 30 * done // whole
            end = "\n" if done == whole else ""
            print(f"\r[{'#' * filled}{' ' * (30 - filled)}] {done} of {whole}", end=end, file=sys.stderr, flush=True)

    return tell
