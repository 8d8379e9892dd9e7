"""Files and folders to one validated installation; every fault of every file in one go, in file order."""

from __future__ import annotations

import os
from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass, field
from pathlib import Path as FilePath
from typing import Any, BinaryIO

import yaml
from pydantic import BaseModel, ValidationError

from circuitlint.definition.faults import faults_of
from circuitlint.definition.loads import CORE_KINDS, DocumentEntry, document_model
from circuitlint.definition.models import Board, Cable, CircuitEntry, Concession, Meter, Supply
from circuitlint.definition.parts import Substitution, nearest, part_key, parts_of
from circuitlint.definition.text import Builder, Step, Text, child, fault_at, follow, parse, spell
from circuitlint.errors import DefinitionError, Fault, InputError

SUFFIXES = (".yaml", ".yml")


@dataclass(frozen=True, slots=True)
class Spot:
    """A place in a file: file, line and column counted from 1, path of keys."""

    file: str
    line: int
    column: int
    path: str


@dataclass(frozen=True, slots=True)
class CircuitDefinition:
    """One circuit of the installation with the nodes it was read from."""

    entry: CircuitEntry
    file: str
    index: int
    node: yaml.Node | None

    def spot(self, path: Sequence[Step] = ()) -> Spot:
        """Where a part of the circuit stands; the nearest entry above it that is really there."""
        found = fault_at(follow(self.node, path), self.file, "")
        return Spot(found.file, found.line, found.column, spell(("circuits", self.index, *path)))


@dataclass(frozen=True, slots=True)
class ConcessionDefinition:
    """One concession with its place."""

    entry: Concession
    spot: Spot


@dataclass(slots=True)
class Installation:
    """All that a set of files defines."""

    title: str = ""
    ruleset: str | None = None
    supplies: dict[str, Supply] = field(default_factory=dict)
    boards: dict[str, Board] = field(default_factory=dict)
    circuits: list[CircuitDefinition] = field(default_factory=list)
    concessions: list[ConcessionDefinition] = field(default_factory=list)
    documents: list[tuple[str, str]] = field(default_factory=list)
    """File name and SHA-256 of each file."""


def read_paths(
    paths: Iterable[str], kinds: Mapping[str, type[BaseModel]] = CORE_KINDS, stdin: BinaryIO | None = None
) -> Installation:
    """Read files, folders (their `.yaml` and `.yml` files, in order of name) and `-` for standard input.

    Raises InputError when a path cannot be read or a folder holds no definition, DefinitionError with every fault.
    """
    return read_contents(read_contents_of(paths, stdin), kinds)


def read_contents_of(paths: Iterable[str], stdin: BinaryIO | None = None) -> list[tuple[str, bytes]]:
    """Names and bytes of the files that the paths name. Raises InputError when one cannot be read."""
    contents: list[tuple[str, bytes]] = []
    for path in paths:
        if path == "-":
            if stdin is None:
                raise InputError("standard input is not at hand")
            contents.append(("-", stdin.read()))
        else:
            contents.extend((name, _content(name)) for name in _files(path))
    return contents


def _files(path: str) -> list[str]:
    if not os.path.isdir(path):
        return [path]
    seen: set[str] = set()
    names: list[str] = []

    def complain(error: OSError) -> None:
        raise InputError(f"{error.filename}: the folder cannot be read: {error.strerror}") from None

    for folder, folders, files in os.walk(path, onerror=complain, followlinks=True):
        real = os.path.realpath(folder)
        if real in seen:
            folders.clear()
            continue
        seen.add(real)
        folders[:] = sorted(name for name in folders if not name.startswith("."))
        names += [os.path.join(folder, name) for name in sorted(files) if name.endswith(SUFFIXES) and name[0] != "."]
    if not names:
        raise InputError(f"{path}: the folder holds no definition; accepted: files ending in {' or '.join(SUFFIXES)}")
    return names


def _content(name: str) -> bytes:
    try:
        if os.path.exists(name) and not os.path.isfile(name):
            raise InputError(f"{name}: this is not a regular file; accepted: a YAML file, a folder, or - for standard input")
        return FilePath(name).read_bytes()
    except OSError as error:
        raise InputError(f"{name}: the file cannot be read: {error.strerror}") from None
    except ValueError:
        raise InputError(f"{name!r}: this is not a file name") from None


def read_text(text: str, file: str = "definition.yaml", kinds: Mapping[str, type[BaseModel]] = CORE_KINDS) -> Installation:
    """Read a definition given as text. Raises DefinitionError with every fault."""
    return read_contents([(file, text.encode("utf-8", "surrogatepass"))], kinds)


def read_contents(
    contents: Sequence[tuple[str, bytes]], kinds: Mapping[str, type[BaseModel]] = CORE_KINDS
) -> Installation:
    """Read named byte strings as one installation. Raises DefinitionError with every fault, in file order."""
    model = document_model(kinds)
    texts = [parse(content, os.fspath(FilePath(name).as_posix()) if name != "-" else "-") for name, content in contents]
    parts: dict[str, yaml.Node] = {}
    for text in texts:
        for name, node in parts_of(text).items():
            if name in parts:
                text.fault(part_key(text, name), f"the part {name!r} is named twice", "each name once over all files")
            parts.setdefault(name, node)
    substitution = Substitution(parts)
    installation = Installation(documents=[(text.file, text.sha256) for text in texts])
    read: list[tuple[Text, yaml.Node | None, dict[str, Any] | None, DocumentEntry | None]] = []
    for text in texts:
        read.append(_read_one(text, model, substitution))
    _check_unused(parts, substitution, kinds, texts)
    _check_references(read)
    faults = {fault for text in texts for fault in text.faults} | set(substitution.faults)
    if faults:
        order = {text.file: number for number, text in enumerate(texts)}
        raise DefinitionError(faults=sorted(faults, key=lambda fault: (order.get(fault.file, len(order)), fault)))
    for text, root, _, entry in read:
        if entry is not None:
            _add(installation, text, root, entry)
    return installation


def _read_one(
    text: Text, model: type[DocumentEntry], substitution: Substitution
) -> tuple[Text, yaml.Node | None, dict[str, Any] | None, DocumentEntry | None]:
    if text.root is None:
        if not text.faults:
            text.faults.append(Fault(text.file, 1, 1, "the file is empty", "a definition that begins with `format: 1`"))
        return text, None, None, None
    builder = Builder(text)
    before = builder.build(text.root)
    if not isinstance(before, dict):
        if not text.faults:
            text.fault(text.root, "the file is not a mapping", "a definition that begins with `format: 1`")
        return text, None, None, None
    root: yaml.Node | None = text.root
    data = before
    if substitution.parts and not text.faults:
        kept = [(key, value) for key, value in text.root.value if key.value != "parts"]
        bare = yaml.MappingNode(text.root.tag, kept, text.root.start_mark, text.root.end_mark)
        root = substitution.apply(bare, text.file)
        widened = Builder(text)
        widened.budget += sum(1000 for _ in substitution.used) + 100 * text.size
        data = widened.build(root)
    if not isinstance(data, dict):
        return text, root, None, None
    data.pop("parts", None)
    try:
        return text, root, data, model.model_validate(data)
    except ValidationError as error:
        text.faults.extend(faults_of(error, model, root, text.file))
        return text, root, data, None


def _check_unused(
    parts: Mapping[str, yaml.Node], substitution: Substitution, kinds: Mapping[str, type[BaseModel]], texts: Sequence[Text]
) -> None:
    """A part that no circuit uses is held against the model its keys fit, so that a misspelt key shows all the same."""
    scratch = Text("", "", 10_000_000, None)
    candidates: list[type[BaseModel]] = [Cable, Meter, *kinds.values()]
    known_wrappers = {*kinds, "series", "parallel", "name", "part"}
    for name, node in parts.items():
        if name in substitution.used:
            continue
        file = next((text.file for text in texts if part_key(text, name) is not None), "")
        data = Builder(scratch).build(node)
        if not isinstance(data, dict):
            substitution.faults.append(fault_at(node, file, f"the part {name!r} is not a mapping", "`key: value` lines"))
            continue
        entries: list[tuple[Any, yaml.Node | None]] = [(data, node)]
        if known_wrappers & set(data):
            entries = [(value, child(node, key)) for key, value in data.items() if key in kinds]
            fitting = [kinds[key] for key in data if key in kinds]
        else:
            best = max(candidates, key=lambda model: len(set(model.model_fields) & set(data)))
            fitting = [best]
        for (value, inner), model in zip(entries, fitting, strict=True):
            try:
                model.model_validate(value)
            except ValidationError as error:
                incomplete = {"missing", "nameplate"}
                wanted = [one for one in error.errors(include_url=False) if one["type"] not in incomplete]
                if wanted:
                    faults = faults_of(error, model, inner, file)
                    told = [fault for fault, one in zip(faults, error.errors(include_url=False), strict=True) if one in wanted]
                    substitution.faults.extend(told)


def _check_references(
    read: Sequence[tuple[Text, yaml.Node | None, dict[str, Any] | None, DocumentEntry | None]],
) -> None:
    """Names used against names given, and tags used twice, on the plain data so that they show beside other faults."""
    origins: dict[str, Any] = {}
    for text, root, data, _ in read:
        for group, word in (("supplies", "supply"), ("boards", "board")):
            given = data.get(group) if data else None
            for name, entry in given.items() if isinstance(given, dict) else ():
                if name in origins:
                    text.fault(follow(root, (group, name)), f"the {word} {name!r} has a name that is taken", "each name once")
                origins[name] = entry if isinstance(entry, dict) else {}
    tags: dict[str, str] = {}
    for text, root, data, _ in read:
        boards = data.get("boards") if data else None
        for name, board in boards.items() if isinstance(boards, dict) else ():
            if isinstance(board, dict):
                _check_origin(text, root, ("boards", name, "fed_from"), board.get("fed_from"), origins)
                _check_circle(text, root, name, origins)
        circuits = data.get("circuits") if data else None
        if isinstance(circuits, dict):
            circuits = [circuits]
        for index, circuit in enumerate(circuits if isinstance(circuits, list) else ()):
            if isinstance(circuit, dict):
                _check_tag(text, root, index, circuit.get("tag"), tags)
                origin = circuit.get("fed_from")
                _check_origin(text, root, ("circuits", index, "fed_from"), origin, origins)
                _check_phase(text, root, index, circuit, origins)


def _check_origin(text: Text, root: yaml.Node | None, path: tuple[Step, ...], origin: Any, origins: Mapping[str, Any]) -> None:
    if isinstance(origin, str) and origin not in origins:
        close = nearest(origin, list(origins))
        accepted = f"did you mean {close!r}?" if close else f"one of {', '.join(origins) or 'no supplies yet'}"
        text.fault(follow(root, path), f"no supply or board is named {origin!r}", accepted)


def _check_circle(text: Text, root: yaml.Node | None, name: str, origins: Mapping[str, Any]) -> None:
    way = [name]
    while (origin := origins.get(way[-1], {}).get("fed_from")) is not None and isinstance(origin, str):
        way.append(origin)
        if origin in way[:-1]:
            if origin == name:
                text.fault(follow(root, ("boards", name, "fed_from")), f"the feeding runs in a circle: {' from '.join(way)}",
                           "a chain of boards that ends at a supply")
            return


def _system_of(origin: Any, origins: Mapping[str, Any]) -> str:
    seen: set[str] = set()
    while isinstance(origin, str) and origin in origins and origin not in seen:
        seen.add(origin)
        if "system" in origins[origin]:
            return str(origins[origin]["system"])
        origin = origins[origin].get("fed_from")
    return ""


def _check_phase(text: Text, root: yaml.Node | None, index: int, circuit: Mapping[str, Any], origins: Mapping[str, Any]) -> None:
    system = _system_of(circuit.get("fed_from"), origins)
    for word in ("phase", "connection"):
        if circuit.get(word) is not None and system in ("dc", "single-phase"):
            text.fault(follow(root, ("circuits", index, word)), f"a {system} supply has no {word}", f"no `{word}`")
    if circuit.get("phase") is not None and circuit.get("connection") is not None:
        text.fault(follow(root, ("circuits", index, "connection")), "a two-wire circuit is neither star nor delta",
                   "`phase`, or `connection`")


def _check_tag(text: Text, root: yaml.Node | None, index: int, tag: Any, tags: dict[str, str]) -> None:
    if not isinstance(tag, str):
        return
    if tag in tags:
        where = f"the tag {tag!r} is used twice; first in {tags[tag]}"
        text.fault(follow(root, ("circuits", index, "tag")), where, "each tag once over all files")
        return
    spot = fault_at(follow(root, ("circuits", index, "tag")), text.file, "")
    tags[tag] = f"{spot.file}:{spot.line}"


def _add(installation: Installation, text: Text, root: yaml.Node | None, entry: DocumentEntry) -> None:
    installation.title = installation.title or entry.title
    installation.ruleset = installation.ruleset or entry.ruleset
    installation.supplies.update(entry.supplies)
    installation.boards.update(entry.boards)
    circuits: list[CircuitEntry] = getattr(entry, "circuits", [])
    nodes = child(root, "circuits")
    for index, circuit in enumerate(circuits):
        node = child(nodes, index) if isinstance(nodes, yaml.SequenceNode) else nodes
        installation.circuits.append(CircuitDefinition(circuit, text.file, index, node))
    for index, concession in enumerate(entry.concessions):
        place = fault_at(follow(root, ("concessions", index)), text.file, "")
        spot = Spot(place.file, place.line, place.column, spell(("concessions", index)))
        installation.concessions.append(ConcessionDefinition(concession, spot))
