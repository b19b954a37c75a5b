"""The JSON schema of the record's data, shipped as `templates/record.schema.json`.

`python -m gaugelog.documents.schema` prints it; a test holds the shipped file to the models.
"""

from __future__ import annotations

import json
import sys
from typing import Any

from gaugelog.documents.content.model import RECORD_FORMAT, RecordContent
from gaugelog.documents.shipped import template_bytes

SCHEMA_FILE = "record.schema.json"


def model_schema() -> dict[str, Any]:
    """The schema as the models have it now."""
    schema = RecordContent.model_json_schema()
    return {
        "$schema": "https://json-schema.org/draft/2020-12/schema",
        "title": RECORD_FORMAT,
        **{name: each for name, each in schema.items() if name != "title"},
    }


def shipped_schema() -> dict[str, Any]:
    """The schema as it is shipped."""
    schema: dict[str, Any] = json.loads(template_bytes(SCHEMA_FILE))
    return schema


if __name__ == "__main__":
    json.dump(model_schema(), sys.stdout, indent=1, ensure_ascii=False)
    sys.stdout.write("\n")
