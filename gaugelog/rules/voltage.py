"""The voltage a gauge may be tested at: what its lot and the criteria allow, and the meter's."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from gaugelog.errors import Fault, Faulty
from gaugelog.ledger.base import Quantity
from gaugelog.ledger.instruments import InstrumentAdded, InstrumentRange
from gaugelog.rules.accuracy import RangeTaken, range_for
from gaugelog.rules.limits import Basis, criteria_for


@dataclass(frozen=True, slots=True)
class VoltageBound:
    """The largest test voltage by one authority, `lot L-3504` or `the criteria`."""

    largest: Quantity
    by: str


def voltage_bounds(basis: Basis, check: str, stage: str) -> tuple[VoltageBound, ...]:
    """Every bound on the voltage of a check at a stage; none where nobody sets one."""
    found = [
        VoltageBound(item.largest_test_voltage, f"the criteria ({item.source})")
        for item in criteria_for(basis, check, stage)
        if item.largest_test_voltage is not None
    ]
    if basis.lot.test_voltage_max is not None:
        found.insert(0, VoltageBound(basis.lot.test_voltage_max, f"lot {basis.lot.label}"))
    return tuple(found)


def range_within(
    bounds: Sequence[VoltageBound],
    instrument: InstrumentAdded,
    check: str,
    value: Quantity | None,
    qualifier: str,
) -> RangeTaken:
    """The range that a reading was taken on, of those whose test voltage is allowed.

    Raises Faulty with both figures when only a range with too high a voltage reaches the value.
    """
    allowed = tuple(each for each in instrument.ranges if not _exceeded(each, bounds))
    harmless = instrument.model_copy(update={"ranges": allowed})
    try:
        return range_for(harmless, check, value, qualifier)
    except Faulty:
        span = range_for(instrument, check, value, qualifier)
        raise Faulty(
            [
                Fault(
                    f"{instrument.label}, range {span.range.name}",
                    f"tests at {span.range.test_voltage}; {bound.by} allows {bound.largest} "
                    "at most.",
                    "Take a tester with less voltage, and look whether the gauge took harm.",
                )
                for bound in _exceeded(span.range, bounds)
            ]
        ) from None


def _exceeded(span: InstrumentRange, bounds: Sequence[VoltageBound]) -> list[VoltageBound]:
    voltage = span.test_voltage
    if voltage is None:
        return []
    return [each for each in bounds if voltage.si() > each.largest.si() * (1 + 1e-9)]
