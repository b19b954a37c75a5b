"""`gaugelog calc placement`: what turning, misplacing, averaging, stiffening and curvature do."""

from __future__ import annotations

from gaugelog.commands.calc.model import Family
from gaugelog.commands.calc.subjects.placement import averaged, parts, turned

SUBJECT = Family(
    "placement",
    "What a grid shows that is turned, misplaced, too long, welded, on a thin or curved part",
    "what",
    {**turned.KINDS, **averaged.KINDS, **parts.KINDS},
)
