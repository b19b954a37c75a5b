"""The kinds of check: what is measured, on what, in which units, judged against what."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

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
        CheckKind("lead symmetry", "resistance", ("ohm",), "value"),
        CheckKind("zero offset", "bridge output", ("mV/V",), "prediction"),
        CheckKind("shunt", "strain", _STRAIN, "prediction"),
        CheckKind("zero drift", "strain", _STRAIN, "value", ("permitted error",)),
        CheckKind("press", "strain", _STRAIN, "value"),
        CheckKind("noise", "strain", _STRAIN, "value", ("permitted error",)),
    )
}
"""Every kind of check by its name."""

SIGNED = frozenset({"zero offset", "shunt", "zero drift", "press", "lead symmetry"})
"""Checks whose readings may be below zero."""
