"""One finding of a plan check."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

Level = Literal["ok", "warning", "refusal"]


@dataclass(frozen=True, slots=True)
class PlanFinding:
    """One thing found about the plan: about what, what, the figure that decided, its source."""

    level: Level
    subject: str
    what: str
    figure: str = ""
    source: str = ""
