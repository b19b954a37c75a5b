"""The range a reading was taken on, and what it leaves uncertain."""

from __future__ import annotations

import math

import pytest

from gaugelog.errors import Faulty
from gaugelog.ledger.base import Quantity
from gaugelog.ledger.instruments import InstrumentAdded, InstrumentRange
from gaugelog.rules.accuracy import range_for


def q(value: str, unit: str) -> Quantity:
    """A quantity."""
    return Quantity(value=value, unit=unit)


def _range(
    name: str, quantity: str, high: Quantity, low: Quantity | None = None
) -> InstrumentRange:
    return InstrumentRange(
        name=name,
        quantity=quantity,
        low=low or q("0", high.unit),
        high=high,
        gain=q("0.05", "%"),
        offset=q("0.1", high.unit),
        resolution=q("0.01", high.unit),
    )


METER = InstrumentAdded(
    id="m",
    label="RM-2",
    type="meter",
    maker="m",
    serial="1",
    certificate_number="c",
    calibrated_by="l",
    calibrated_on="2026-01-01",
    due="2027-01-01",
    ranges=(
        _range("4 kΩ", "resistance", q("4", "kohm")),
        _range("400 Ω", "resistance", q("400", "ohm")),
        _range("±5 mV/V", "bridge output", q("5", "mV/V")),
    ),
)


@pytest.mark.parametrize(
    ("value", "qualifier", "name"),
    [
        (q("350.12", "ohm"), "=", "400 Ω"),
        (q("400", "ohm"), "=", "400 Ω"),
        (q("400.01", "ohm"), "=", "4 kΩ"),
        (q("0.35", "kohm"), "=", "400 Ω"),
        (None, "overload", "4 kΩ"),
    ],
)
def test_the_finest_range_that_reaches_is_taken(
    value: Quantity | None, qualifier: str, name: str
) -> None:
    assert name == range_for(METER, "resistance", value, qualifier).range.name


def test_a_signed_reading_is_reached_on_either_side_of_zero() -> None:
    found = range_for(METER, "zero offset", q("-4.9", "mV/V"), "=")
    assert "±5 mV/V" == found.range.name
    with pytest.raises(Faulty):
        range_for(METER, "zero offset", q("-5.1", "mV/V"), "=")


def test_a_resistance_below_zero_is_on_no_range() -> None:
    with pytest.raises(Faulty):
        range_for(METER, "resistance", q("-1", "ohm"), "=")


def test_what_the_meter_does_not_reach_or_measure_is_told() -> None:
    with pytest.raises(Faulty) as beyond:
        range_for(METER, "resistance", q("5", "kohm"), "=")
    assert "RM-2: has no range that reaches 5 kΩ." in str(beyond.value.faults[0])
    assert "0 Ω to 400 Ω; 0 kΩ to 4 kΩ" in beyond.value.faults[0].remedy
    with pytest.raises(Faulty) as other:
        range_for(METER, "insulation", q("5", "Gohm"), "=")
    assert "does not measure insulation" in other.value.faults[0].what


def test_gain_offset_and_resolution_are_combined_as_rectangular() -> None:
    # GUM 4.3.7: a/√3 for ±(0.05 % · 350 + 0.1) Ω; 0.01/√12 Ω for the step of the display.
    expected = math.hypot((0.0005 * 350 + 0.1) / math.sqrt(3), 0.01 / math.sqrt(12))
    found = range_for(METER, "resistance", q("350", "ohm"), "=")
    assert expected == pytest.approx(found.uncertainty(350.0), rel=1e-9)
