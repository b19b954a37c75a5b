"""The outside cases of `cases.json`: inputs, expected values, tolerance, source, provenance.

Each was printed by a published source, or is closed-form arithmetic on a source's formula; cases
marked `memory` were recalled, not read again. The file is kept as it came: never tune to it.
"""

from __future__ import annotations

import json
from dataclasses import dataclass
from functools import cache
from pathlib import Path
from typing import Any

import pytest

_FILE = Path(__file__).with_name("cases.json")


@dataclass(frozen=True)
class Case:
    """One outside case: `value(name)` of an input, `expect(name, found)` for each result."""

    id: str
    title: str
    source: str
    provenance: str
    inputs: dict[str, Any]
    expected: dict[str, Any]

    def value(self, name: str) -> Any:
        """The input called `name`, in the unit the case gives."""
        return self.inputs[name]["value"]

    def expect(self, name: str, found: float) -> None:
        """Hold `found` to the expected value `name` within the case's own tolerance."""
        wanted = self.expected[name]
        assert wanted["value"] == pytest.approx(found, rel=0, abs=wanted["tol_abs"]), (
            f"{self.id} {self.title}: {name} by {self.source} ({self.provenance})"
        )


@cache
def _all() -> dict[str, Case]:
    rows = json.loads(_FILE.read_text(encoding="utf-8"))
    return {
        row["id"]: Case(
            row["id"],
            row["title"],
            row["source"],
            row["provenance"],
            row["inputs"],
            row["expected"],
        )
        for row in rows
    }


def case(identifier: str) -> Case:
    """The case with this identifier, such as `C04-08`."""
    return _all()[identifier]


def identifiers() -> list[str]:
    """Every case's identifier, in the file's order."""
    return list(_all())
