"""How far a reading lies inside its limits: what the person and the reviewer look at first."""

from __future__ import annotations

from dataclasses import dataclass

from gaugelog.ledger.base import Quantity
from gaugelog.ledger.readings import ReadingTaken
from gaugelog.rules.digits import quantity

_DIGITS = 3


@dataclass(frozen=True, slots=True)
class Margin:
    """The distance to the nearest limit; below zero when it lies beyond.

    `amount` is in the unit of the limit, `share` the same as a part of that limit; none where
    the limit is zero.
    """

    amount: Quantity
    share: float | None


def margin_of(reading: ReadingTaken) -> Margin | None:
    """The margin of what was judged to the nearest limit that rules.

    None where no limit rules, or the meter gave no value.
    """
    judged = reading.result or reading.value
    if judged is None:
        return None
    found = [
        (side * (judged.si() - limit.si()), limit)
        for ruling in reading.limits
        if ruling.rules
        for side, limit in ((1, ruling.at_least), (-1, ruling.at_most))
        if limit is not None
    ]
    if not found:
        return None
    distance, limit = min(found, key=lambda each: each[0])
    bound = abs(limit.si())
    return Margin(quantity(distance, limit.unit, _DIGITS), distance / bound if bound else None)
