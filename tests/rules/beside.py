"""Criteria and a module for the checks whose result is worked out of more than one reading."""

from __future__ import annotations

from gaugelog.ledger.base import Quantity
from gaugelog.ledger.campaign import CheckCriterion
from gaugelog.ledger.instruments import InstrumentRange
from gaugelog.rules.accuracy import RangeTaken
from gaugelog.rules.limits import Basis
from gaugelog.rules.verdicts import Taken
from tests.rules.test_verdicts import CRITERIA, LOT, POINT, q

STRAIN = RangeTaken(
    "QB-1",
    InstrumentRange(
        name="±20 000 µm/m",
        quantity="strain",
        low=q("0", "um/m"),
        high=q("20000", "um/m"),
        gain=q("0.05", "%"),
        offset=q("2", "um/m"),
        resolution=q("0.1", "um/m"),
    ),
)
OHMS = RangeTaken(
    "RM-2",
    InstrumentRange(
        name="400 Ω",
        quantity="resistance",
        low=q("0", "ohm"),
        high=q("400", "ohm"),
        gain=q("0.05", "%"),
        offset=q("0.1", "ohm"),
        resolution=q("0.01", "ohm"),
    ),
)


def basis(check: str, stage: str = "on channel", **figures: Quantity) -> Basis:
    """A point whose criteria have these figures for one check."""
    item = CheckCriterion(check=check, stage=stage, source="common practice", **figures)  # type: ignore[arg-type]
    return Basis(POINT, LOT, CRITERIA.model_copy(update={"checks": (item,)}), "field")


def strain(value: str) -> Taken:
    """A strain as read on the module, µm/m."""
    return Taken(q(value, "um/m"), "=", STRAIN)


def ohms(value: str) -> Taken:
    """A resistance as read on the meter."""
    return Taken(q(value, "ohm"), "=", OHMS)
