"""`circuitlint schema`: JSON Schema of the file formats, for editors."""

from __future__ import annotations

import argparse
import json
from typing import Any

from circuitlint.commands.output import put
from circuitlint.definition.loads import document_model
from circuitlint.limits.models import RulesetFile
from circuitlint.plugins import gather
from circuitlint.readings.models import ReadingsFile
from circuitlint.reports import json_record, readings_json


def add(commands: Any) -> None:
    """Add the command to the parser."""
    one = commands.add_parser("schema", help="JSON Schema of the files, for editors", description=_schema.__doc__)
    one.add_argument("of", nargs="?", choices=("definition", "ruleset", "record", "readings", "readings-record"),
                     default="definition")
    one.add_argument("--plugin", action="append", default=[], metavar="PATH")
    one.set_defaults(command=_schema)


def _schema(arguments: argparse.Namespace) -> int:
    """Print the JSON Schema of a file format."""
    if arguments.of == "definition":
        schema = document_model(gather(arguments.plugin).models()).model_json_schema()
        schema["properties"]["parts"] = {"type": "object", "description": "Parts used by name with `part: NAME`."}
    elif arguments.of == "readings":
        schema = ReadingsFile.model_json_schema()
    elif arguments.of == "readings-record":
        schema = readings_json.schema()
    else:
        schema = RulesetFile.model_json_schema() if arguments.of == "ruleset" else json_record.schema()
    schema["$schema"] = "https://json-schema.org/draft/2020-12/schema"
    put(json.dumps(schema, indent=2, ensure_ascii=False) + "\n", "")
    return 0
