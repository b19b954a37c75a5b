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

    `amount` is in the unit of the limit. `share` is the same as a part of the room that the limits
    leave: half the band between two limits, else the limit itself; none where that is zero.
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
    rules = [limit for limit in reading.limits if limit.rules]
    lows = [limit.at_least for limit in rules if limit.at_least is not None]
    highs = [limit.at_most for limit in rules if limit.at_most is not None]
    found = [(judged.si() - low.si(), low) for low in lows]
    found += [(high.si() - judged.si(), high) for high in highs]
    if not found:
        return None
    distance, limit = min(found, key=lambda each: each[0])
    room = _room(lows, highs, limit)
    return Margin(quantity(distance, limit.unit, _DIGITS), distance / room if room else None)


def _room(lows: list[Quantity], highs: list[Quantity], nearest: Quantity) -> float:
    if lows and highs:
        return (min(high.si() for high in highs) - max(low.si() for low in lows)) / 2
    return abs(nearest.si())
