"""Insulation beyond its limit: the fall since earlier stages, flagged."""

from __future__ import annotations

from collections.abc import Sequence

from gaugelog.ledger.base import Quantity
from gaugelog.ledger.readings import ReadingTaken
from gaugelog.rules.trend import insulation_trend


def fall_flags(
    earlier: Sequence[ReadingTaken], stage: str, value: Quantity | None, qualifier: str
) -> tuple[str, ...]:
    """The flag of a fall of insulation since the stages before, if it is one to look into.

    A bound counts by what it bounds: more than 20 GΩ fell from 20 GΩ at least; a reading that is
    only known to lie above a value is no fall.
    """
    if value is None or qualifier not in {"=", "<"}:
        return ()
    stages = [
        (each.stage, each.value.si())
        for each in earlier
        if each.value is not None and each.qualifier in {"=", ">"} and each.value.si() > 0
    ]
    fall = insulation_trend([*stages, (stage, value.si())])
    return (fall.sentence,) if fall is not None and fall.after == stage else ()
