"""No gauge is tested at more than its lot and the criteria allow."""

from __future__ import annotations

from dataclasses import replace

import pytest

from gaugelog.errors import Faulty
from gaugelog.ledger.base import Quantity
from gaugelog.ledger.instruments import InstrumentAdded, InstrumentRange
from gaugelog.rules.limits import Basis
from gaugelog.rules.voltage import range_within, voltage_bounds
from tests.rules.test_accuracy import METER
from tests.rules.test_verdicts import CRITERIA, LOT, POINT, q


def _tester(*ranges: tuple[str, str]) -> InstrumentAdded:
    spans = tuple(
        InstrumentRange(
            name=f"{reach} GΩ",
            quantity="insulation",
            low=q("0", "Gohm"),
            high=q(reach, "Gohm"),
            gain=q("10", "%"),
            offset=q("0", "Gohm"),
            resolution=q("1", "Mohm"),
            test_voltage=q(voltage, "V"),
        )
        for reach, voltage in ranges
    )
    return METER.model_copy(update={"label": "IT", "ranges": spans})


def _basis(lot: str | None, criteria: str | None) -> Basis:
    checks = tuple(
        each.model_copy(update={"largest_test_voltage": q(criteria, "V")}) if criteria else each
        for each in CRITERIA.checks
    )
    return replace(
        Basis(POINT, LOT, CRITERIA, "laboratory"),
        lot=LOT.model_copy(update={"test_voltage_max": q(lot, "V") if lot else None}),
        criteria=CRITERIA.model_copy(update={"checks": checks}),
    )


def _taken(tester: InstrumentAdded, value: Quantity, basis: Basis) -> str:
    bounds = voltage_bounds(basis, "insulation", "bonded")
    return range_within(bounds, tester, "insulation", value, "=").range.name


@pytest.mark.parametrize(
    ("lot", "criteria", "told"),
    [
        ("50", None, ["tests at 500 V; lot L-1 allows 50 V at most"]),
        (None, "100", ["tests at 500 V; the criteria (common practice) allows 100 V at most"]),
        ("50", "100", ["lot L-1 allows 50 V", "the criteria (common practice) allows 100 V"]),
    ],
)
def test_too_high_a_voltage_is_refused_with_both_figures(
    lot: str | None, criteria: str | None, told: list[str]
) -> None:
    with pytest.raises(Faulty) as caught:
        _taken(_tester(("20", "500")), q("18", "Gohm"), _basis(lot, criteria))
    assert len(told) == len(caught.value.faults)
    for what, fault in zip(told, caught.value.faults, strict=True):
        assert what in str(fault)


@pytest.mark.parametrize(("lot", "criteria"), [("500", "500"), (None, None), ("1000", None)])
def test_a_voltage_on_the_bound_or_without_one_is_let_through(
    lot: str | None, criteria: str | None
) -> None:
    assert "20 GΩ" == _taken(_tester(("20", "500")), q("18", "Gohm"), _basis(lot, criteria))


def test_a_tester_with_several_voltages_is_taken_on_the_one_that_is_allowed() -> None:
    tester = _tester(("20", "500"), ("40", "50"))
    assert "40 GΩ" == _taken(tester, q("18", "Gohm"), _basis("50", None))


def test_a_value_that_no_range_reaches_is_told_as_such() -> None:
    with pytest.raises(Faulty) as caught:
        _taken(_tester(("20", "50")), q("30", "Gohm"), _basis("50", None))
    assert "has no range that reaches 30 GΩ" in str(caught.value.faults[0])
