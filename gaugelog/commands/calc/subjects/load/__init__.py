"""`gaugelog calc load`: strain of a load and load of a strain on parts of common shapes."""

from __future__ import annotations

from gaugelog.commands.calc.model import Family
from gaugelog.commands.calc.subjects.load import beams, cells, shafts, vessels

SUBJECT = Family(
    "load",
    "Loads on bars, beams, shafts and vessels by their strain; load cells and comparison runs",
    "what",
    {**beams.KINDS, **shafts.KINDS, **vessels.KINDS, **cells.KINDS},
)
