"""The margin of a reading to the nearest limit that rules."""

from __future__ import annotations

import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.ledger.base import Quantity
from gaugelog.ledger.readings import LimitFound, ReadingTaken, Verdict
from gaugelog.rules.margin import margin_of


def _q(text: str) -> Quantity:
    value, unit = text.split()
    return Quantity(value=value, unit=unit)


def _limit(low: str = "", high: str = "", rules: bool = True) -> LimitFound:
    return LimitFound(
        origin="criteria",
        at_least=_q(low) if low else None,
        at_most=_q(high) if high else None,
        source="here",
        rules=rules,
    )


def _reading(value: str, *limits: LimitFound, result: str = "") -> ReadingTaken:
    return ReadingTaken(
        id="r",
        point="p",
        subject="g",
        step="s",
        check="insulation",
        stage="bonded",
        attempt=1,
        typed=value,
        qualifier="=" if value else "overload",
        value=_q(value) if value else None,
        instrument="i",
        range="1",
        observed_at="2026-11-17T08:00:00Z",
        observed_by="t",
        limits=limits,
        result=_q(result) if result else None,
        verdict=Verdict(word="pass", blocks=False, rule="insulation 1"),
    )


def test_the_margin_is_the_distance_in_the_unit_of_the_limit() -> None:
    found = margin_of(_reading("1500 Mohm", _limit(low="1 Gohm")))
    assert found is not None
    assert _q("0.5 Gohm") == found.amount
    assert found.share == pytest.approx(0.5)


def test_beyond_the_limit_it_is_below_zero() -> None:
    found = margin_of(_reading("0.4 Gohm", _limit(low="1 Gohm")))
    assert found is not None
    assert "-0.6" == found.amount.value
    assert found.share == pytest.approx(-0.6)


def test_the_nearer_of_two_limits_counts_and_one_that_does_not_rule_never() -> None:
    found = margin_of(
        _reading("349 ohm", _limit("348 ohm", "352 ohm"), _limit("348.9 ohm", rules=False))
    )
    assert found is not None
    assert _q("1 ohm") == found.amount


def test_what_was_judged_counts_rather_than_the_value() -> None:
    found = margin_of(_reading("350 ohm", _limit("-0.5 %", "0.5 %"), result="0.1 %"))
    assert found is not None
    assert _q("0.4 %") == found.amount


def test_a_limit_of_zero_gives_no_share() -> None:
    found = margin_of(_reading("2 ohm", _limit(low="0 ohm")))
    assert found is not None
    assert found.share is None


def test_without_a_limit_or_a_value_there_is_none() -> None:
    assert margin_of(_reading("2 ohm")) is None
    assert margin_of(_reading("", _limit(low="1 Gohm"))) is None


@pytest.mark.parametrize(("value", "share"), [("350", 1.0), ("350.5", 0.5), ("352", -1.0)])
def test_between_two_limits_the_share_is_of_half_the_band(value: str, share: float) -> None:
    found = margin_of(_reading(f"{value} ohm", _limit("349 ohm", "351 ohm")))
    assert found is not None
    assert share == pytest.approx(found.share)


@given(st.integers(0, 4000))
def test_the_share_is_below_zero_exactly_outside_the_limits(tenths: int) -> None:
    found = margin_of(_reading(f"{tenths / 10:.1f} ohm", _limit("100 ohm", "300 ohm")))
    assert found is not None
    assert found.share is not None
    assert (found.share >= -1e-12) == (100 <= tenths / 10 <= 300)
