"""YAML text to plain data in which every entry still knows its file, line and column.

Every scalar stays text: what `0.36 H` or `2027-06-30` or `6` means is decided by the model that wants it, never by YAML's
own guesses. Aliases are expanded within a bound, tags and merge keys are refused, and a key given twice is a fault.
"""

from __future__ import annotations

import hashlib
import io
from collections.abc import Iterable, Sequence
from dataclasses import dataclass, field
from typing import Any, TypeAlias

import yaml

from circuitlint.errors import Fault

Step: TypeAlias = str | int
Path: TypeAlias = tuple[Step, ...]

LARGEST_FILE = 256 * 1024 * 1024
DEEPEST = 60
_PLAIN_TAGS = frozenset(f"tag:yaml.org,2002:{kind}" for kind in ("str", "int", "float", "bool", "null", "timestamp", "value"))
_NULLS = frozenset({"", "~", "null", "Null", "NULL"})


def loader() -> Any:
    """The C loader where PyYAML has it, else the Python one; both safe, both give the same nodes."""
    return getattr(yaml, "CSafeLoader", yaml.SafeLoader)


class _NamedBytes(io.BytesIO):
    """Bytes that know their file's name, which PyYAML copies into every mark."""

    def __init__(self, content: bytes, name: str) -> None:
        super().__init__(content)
        self.name = name


@dataclass(slots=True)
class Text:
    """One file's text as a tree of YAML nodes, with the faults found on the way."""

    file: str
    sha256: str
    size: int
    root: yaml.Node | None
    faults: list[Fault] = field(default_factory=list)

    def fault(self, node: yaml.Node | None, what: str, accepted: str = "") -> None:
        """Note a fault at a node's first character."""
        self.faults.append(fault_at(node, self.file, what, accepted))


def fault_at(node: yaml.Node | None, file: str, what: str, accepted: str = "") -> Fault:
    """A fault at a node's first character, or at the top of the file."""
    if node is None or node.start_mark is None:
        return Fault(file, 1, 1, what, accepted)
    mark = node.start_mark
    return Fault(mark.name or file, mark.line + 1, mark.column + 1, what, accepted)


def parse(content: bytes, file: str) -> Text:
    """Parse one file. Never raises for bad content: faults are collected in the result."""
    text = Text(file, hashlib.sha256(content).hexdigest(), len(content), None)
    if len(content) > LARGEST_FILE:
        text.faults.append(Fault(file, 1, 1, f"the file has {len(content)} bytes", f"up to {LARGEST_FILE} bytes"))
        return text
    try:
        decoded = content.decode("utf-8-sig")
    except UnicodeDecodeError as error:
        line = content.count(b"\n", 0, error.start) + 1
        column = error.start - (content.rfind(b"\n", 0, error.start) + 1) + 1
        text.faults.append(Fault(file, line, column, "the text is not UTF-8", "a text file in UTF-8"))
        return text
    if too_deep := _flow_depth(decoded):
        text.faults.append(Fault(file, *too_deep, "brackets are nested too deeply", f"at most {DEEPEST} levels"))
        return text
    try:
        text.root = yaml.compose(_NamedBytes(decoded.encode(), file), Loader=loader())
    except yaml.MarkedYAMLError as error:
        mark = error.problem_mark or error.context_mark
        line, column = (mark.line + 1, mark.column + 1) if mark else (1, 1)
        what = " ".join(str(part) for part in (error.context, error.problem) if part)
        text.faults.append(Fault(file, line, column, f"the file is not YAML: {what}", "YAML, indented with spaces"))
    except yaml.YAMLError as error:
        position = getattr(error, "position", 0)
        line = decoded.count("\n", 0, position) + 1
        reason = str(error).splitlines()[0]
        text.faults.append(Fault(file, line, 1, f"the file is not YAML: {reason}", "YAML, one document, printable text"))
    except RecursionError:
        text.faults.append(Fault(file, 1, 1, "the file is nested too deeply", f"at most {DEEPEST} levels"))
    return text


def _flow_depth(decoded: str) -> tuple[int, int] | None:
    """Line and column where brackets pass the bound. Cheap, and only looked at when there are many."""
    if decoded.count("[") + decoded.count("{") <= DEEPEST:
        return None
    depth = 0
    for number, line in enumerate(decoded.split("\n"), 1):
        if "[" not in line and "{" not in line and "]" not in line and "}" not in line:
            continue
        for column, letter in enumerate(line, 1):
            if letter in "[{":
                depth += 1
                if depth > DEEPEST * 4:
                    return number, column
            elif letter in "]}":
                depth = max(0, depth - 1)
    return None


class Builder:
    """Plain data from nodes: dict, list, str or None."""

    def __init__(self, text: Text) -> None:
        self.text = text
        self.budget = text.size + 10_000
        self.open: set[int] = set()

    def build(self, node: yaml.Node | None, depth: int = 0) -> Any:
        """Data of one node. Faults go to the text; a faulty entry becomes None."""
        if node is None:
            return None
        if isinstance(node, yaml.ScalarNode):
            if node.tag not in _PLAIN_TAGS:
                return self._refuse_tag(node)
            value = node.value
            return None if node.style is None and value in _NULLS else value
        self.budget -= 1
        if id(node) in self.open:
            self.text.fault(node, "an alias refers to itself", "data without circles")
            return None
        if depth > DEEPEST:
            self.text.fault(node, "the data are nested too deeply", f"at most {DEEPEST} levels")
            return None
        if self.budget < 0:
            if self.budget > -1_000_000_000:
                self.text.fault(node, "aliases multiply the data beyond the size of the file", "parts named under `parts:`")
                self.budget = -2_000_000_000
            return None
        self.open.add(id(node))
        try:
            if isinstance(node, yaml.SequenceNode):
                if not node.tag.endswith(":seq"):
                    return self._refuse_tag(node)
                self.budget -= len(node.value)
                return [self.build(item, depth + 1) for item in node.value]
            if not node.tag.endswith(":map"):
                return self._refuse_tag(node)
            return self._mapping(node, depth)
        finally:
            self.open.discard(id(node))

    def _mapping(self, node: yaml.Node, depth: int) -> dict[str, Any]:
        data: dict[str, Any] = {}
        self.budget -= len(node.value)
        for key, value in node.value:
            if not isinstance(key, yaml.ScalarNode):
                self.text.fault(key, "a key is not a plain word", "a word followed by a colon")
            elif key.tag == "tag:yaml.org,2002:merge":
                self.text.fault(key, "the merge key << is not used here", "`part: NAME`, with the part under `parts:`")
            elif key.value in data:
                self.text.fault(key, f"the key {key.value!r} stands twice", "each key once")
            else:
                data[key.value] = self.build(value, depth + 1)
        return data

    def _refuse_tag(self, node: yaml.Node) -> None:
        self.text.fault(node, f"the tag {node.tag!r} is not used here", "plain YAML without tags")


def child(node: yaml.Node | None, step: Step) -> yaml.Node | None:
    """The value node of a key, or the item of a list; None where there is none."""
    if isinstance(node, yaml.MappingNode):
        for key, value in node.value:
            if key.value == step:
                return value  # type: ignore[no-any-return]
    elif isinstance(node, yaml.SequenceNode) and isinstance(step, int) and 0 <= step < len(node.value):
        return node.value[step]  # type: ignore[no-any-return]
    return None


def key_node(node: yaml.Node | None, step: Step) -> yaml.Node | None:
    """The key node of a key in a mapping; None where there is none."""
    if isinstance(node, yaml.MappingNode):
        for key, _value in node.value:
            if key.value == step:
                return key  # type: ignore[no-any-return]
    return None


def follow(root: yaml.Node | None, path: Sequence[Step]) -> yaml.Node | None:
    """The deepest node along a path that is really there.

    A step 0 on a mapping stays where it is, since a single entry may stand where a list is wanted.
    """
    node = root
    for step in path:
        deeper = child(node, step)
        if deeper is None:
            if step == 0 and isinstance(node, yaml.MappingNode):
                continue
            return node
        node = deeper
    return node


def spell(path: Iterable[Step]) -> str:
    """A path as a person writes it: `circuits[3].load.coil`."""
    words = ""
    for step in path:
        if isinstance(step, int):
            words += f"[{step}]"
        else:
            words += f".{step}" if words else step
    return words
