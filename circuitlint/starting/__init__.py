"""The small starting project that `circuitlint begin` writes, kept as one file of names and texts."""

from __future__ import annotations

from importlib.resources import files

from circuitlint.definition.text import Builder, parse

NAME = "project.yaml"


def project() -> dict[str, str]:
    """Every file of the project, by its path within the folder."""
    text = parse((files(__name__) / NAME).read_bytes(), NAME)
    made = Builder(text).build(text.root)
    assert isinstance(made, dict), "the project is shipped as a mapping of names to texts"
    return {str(name): str(content) for name, content in made.items()}


def to_be_run(name: str) -> bool:
    """Whether a file of the project is a program."""
    return name.startswith(("ci/", "hooks/"))
