"""A plugin's report kind behind a guard: it works on a copy of the record, prints nothing of its own, and fails in words."""

from __future__ import annotations

from collections.abc import Callable

from circuitlint.errors import PluginError
from circuitlint.isolation.containment import PRINTED, describe, is_the_persons_wish, overheard
from circuitlint.review.record import Record


class GuardedReport:
    """A report kind of a plugin. Raises PluginError where it fails, prints, or gives something else than text."""

    def __init__(self, name: str, render: Callable[[Record], str], plugin: str) -> None:
        self.title, self.render = f"the report kind {name!r} of the plugin {plugin!r}", render

    def __call__(self, record: Record) -> str:
        """The report as text."""
        copy = record.model_copy(deep=True)
        try:
            with overheard() as ear:
                made: object = self.render(copy)
        except BaseException as error:
            if is_the_persons_wish(error):
                raise
            raise PluginError(f"{self.title} failed: {describe(error)}") from None
        if ear.heard:
            raise PluginError(f"{self.title} failed: {PRINTED}")
        if not isinstance(made, str):
            raise PluginError(f"{self.title} gave {type(made).__name__}, not text")
        return made
