"""`gaugelog calc excitation`: heat in a grid, the largest supply, noise, the walk of the zero."""

from __future__ import annotations

from gaugelog.commands.calc.model import Family
from gaugelog.commands.calc.subjects.excitation import heat, resolution

SUBJECT = Family(
    "excitation",
    "Heat in a grid and its largest supply; noise and resolution; the walk of the zero",
    "what",
    {**heat.KINDS, **resolution.KINDS},
    default="heat",
)
