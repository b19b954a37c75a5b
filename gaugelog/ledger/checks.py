"""The kinds of check: what is measured, on what, in which units, judged against what."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

from gaugelog.ledger.routes import (
    BANDWIDTH,
    FIRST_WIRE,
    GAUGE_TEMPERATURE,
    PRESSED,
    ZERO_BEFORE,
)

Judged = Literal["value", "change", "prediction"]


@dataclass(frozen=True, slots=True)
class CheckKind:
    """One kind of check.

    `quantity` is what an instrument must measure.
    `units` are those a reading may be typed in; the first is that of the criteria's figures.
    `physics` names what may add to the criteria's figure.
    """

    name: str
    quantity: str
    units: tuple[str, ...]
    judged: Judged
    physics: tuple[str, ...] = ()
    relative: bool = False
    """The criteria may give the figure in per cent."""
    beside: tuple[str, ...] = ()
    """Types of the quantities that are entered in the same step and kept with the reading."""
    counted: str = ""
    """What the criteria's figure may be counted over: `per` (a time) or `bandwidth`."""

    @property
    def attribute(self) -> bool:
        """Whether it is no number that is read but a mark: which channel answered."""
        return not self.units


_OHMS = ("ohm", "kohm")
_STRAIN = ("um/m",)

CHECKS: dict[str, CheckKind] = {
    kind.name: kind
    for kind in (
        CheckKind("resistance", "resistance", _OHMS, "change", ("lot tolerance",), relative=True),
        CheckKind(
            "insulation",
            "insulation",
            ("ohm", "kohm", "Mohm", "Gohm", "Tohm"),
            "value",
            ("permitted error",),
        ),
        CheckKind("lead loop", "resistance", _OHMS, "prediction", relative=True),
        CheckKind("lead symmetry", "resistance", ("ohm",), "value", beside=(FIRST_WIRE,)),
        CheckKind("zero offset", "bridge output", ("mV/V",), "prediction"),
        CheckKind("shunt", "strain", _STRAIN, "prediction"),
        CheckKind(
            "zero drift",
            "strain",
            _STRAIN,
            "value",
            ("permitted error",),
            beside=(GAUGE_TEMPERATURE,),
            counted="per",
        ),
        CheckKind("press", "strain", _STRAIN, "value", beside=(ZERO_BEFORE, PRESSED)),
        CheckKind(
            "noise",
            "strain",
            _STRAIN,
            "value",
            ("permitted error",),
            beside=(BANDWIDTH,),
            counted="bandwidth",
        ),
        CheckKind("polarity", "strain", _STRAIN, "value"),
        CheckKind("channel", "", (), "value"),
    )
}
"""Every kind of check by its name."""

SIGNED = frozenset({"zero offset", "shunt", "zero drift", "press", "lead symmetry", "polarity"})
"""Checks whose readings may be below zero."""
