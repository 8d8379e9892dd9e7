"""`part: NAME` is replaced by what stands under `parts:`, entry by entry, so that each keeps its own line.

What stands beside `part:` goes over the part. Parts may refer to parts; a circle is a fault.
"""

from __future__ import annotations

import difflib
from collections.abc import Mapping

import yaml

from circuitlint.definition.text import Text, child, fault_at, key_node
from circuitlint.errors import Fault


def nearest(word: str, words: list[str]) -> str:
    """The nearest known word, for the end of an error, or an empty text."""
    close = difflib.get_close_matches(word, words, n=1, cutoff=0.6)
    return close[0] if close else ""


def parts_of(text: Text) -> dict[str, yaml.Node]:
    """The parts named in one file."""
    node = child(text.root, "parts")
    if not isinstance(node, yaml.MappingNode):
        return {}
    return {key.value: value for key, value in node.value if isinstance(key, yaml.ScalarNode)}


class Substitution:
    """Puts parts in place of references, within one set of files."""

    def __init__(self, parts: Mapping[str, yaml.Node]) -> None:
        self.parts = parts
        self.used: set[str] = set()
        self.faults: list[Fault] = []

    def apply(self, node: yaml.Node | None, file: str, inside: tuple[str, ...] = (), depth: int = 0) -> yaml.Node | None:
        """The node with every reference below it replaced. The given node is left as it is."""
        if depth > 60 or not isinstance(node, (yaml.MappingNode, yaml.SequenceNode)):
            return node
        if isinstance(node, yaml.SequenceNode):
            items = [self.apply(item, file, inside, depth + 1) for item in node.value]
            if all(new is old for new, old in zip(items, node.value, strict=True)):
                return node
            return yaml.SequenceNode(node.tag, items, node.start_mark, node.end_mark)
        reference = child(node, "part")
        if isinstance(reference, yaml.ScalarNode):
            return self._replace(node, reference, file, inside, depth)
        pairs = [(key, self.apply(value, file, inside, depth + 1)) for key, value in node.value]
        if all(new[1] is old[1] for new, old in zip(pairs, node.value, strict=True)):
            return node
        return yaml.MappingNode(node.tag, pairs, node.start_mark, node.end_mark)

    def _replace(
        self, node: yaml.Node, reference: yaml.Node, file: str, inside: tuple[str, ...], depth: int
    ) -> yaml.Node | None:
        name = reference.value
        own = [(key, value) for key, value in node.value if key.value != "part"]
        found = self.parts.get(name)
        if found is None or name in inside:
            if found is None:
                close = nearest(name, list(self.parts))
                accepted = f"did you mean {close!r}?" if close else f"one of {', '.join(sorted(self.parts)) or 'no parts'}"
                self.faults.append(fault_at(reference, file, f"no part is named {name!r}", accepted))
            else:
                circle = " -> ".join((*inside, name))
                self.faults.append(fault_at(reference, file, f"parts refer to each other in a circle: {circle}"))
            return yaml.MappingNode(node.tag, own, node.start_mark, node.end_mark)
        self.used.add(name)
        base = self.apply(found, file, (*inside, name), depth + 1)
        if not isinstance(base, yaml.MappingNode):
            self.faults.append(fault_at(found, file, f"the part {name!r} is not a mapping", "`key: value` lines"))
            return yaml.MappingNode(node.tag, own, node.start_mark, node.end_mark)
        over = {key.value for key, _ in own}
        pairs = [(key, value) for key, value in base.value if key.value not in over]
        pairs += [(key, self._over(base, key.value, self.apply(value, file, inside, depth + 1))) for key, value in own]
        return yaml.MappingNode(node.tag, pairs, node.start_mark, node.end_mark)

    def _over(self, base: yaml.Node, key: str, value: yaml.Node | None) -> yaml.Node | None:
        """A mapping beside `part:` goes over the part's mapping of the same key, key by key."""
        under = child(base, key)
        if not isinstance(under, yaml.MappingNode) or not isinstance(value, yaml.MappingNode):
            return value
        over = {inner.value for inner, _ in value.value}
        pairs = [(inner, kept) for inner, kept in under.value if inner.value not in over]
        pairs += [(inner, self._over(under, inner.value, new)) for inner, new in value.value]
        return yaml.MappingNode(value.tag, pairs, value.start_mark, value.end_mark)


def part_key(text: Text, name: str) -> yaml.Node | None:
    """The key node under which a part is named."""
    return key_node(child(text.root, "parts"), name)
