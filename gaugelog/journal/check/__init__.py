"""The check of the journal: eight numbered steps, every trouble with its step and its entry."""

from __future__ import annotations

from gaugelog.journal.check.report import Notice, Report, StepResult, Trouble
from gaugelog.journal.check.run import Progress, Rebuild, check

__all__ = ["Notice", "Progress", "Rebuild", "Report", "StepResult", "Trouble", "check"]
