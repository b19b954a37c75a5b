"""Computed numbers as decimal text: no digit that decided is lost, whatever the size."""

from __future__ import annotations

from decimal import Decimal

import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.ledger.base import Quantity
from gaugelog.rules.digits import DIGITS, decimal_text, quantity


@pytest.mark.parametrize(
    ("value", "text"),
    [
        (0.1 + 0.2, "0.3"),
        (1.234e-5, "0.00001234"),
        (3.4e-8, "0.000000034"),
        (1.5e-10, "1.5e-10"),
        (1.5e12, "1500000000000"),
        (1e20, "1e+20"),
        (-0.0, "0"),
        (-2.5e-6, "-0.0000025"),
    ],
)
def test_a_number_is_plain_text_with_its_digits(value: float, text: str) -> None:
    assert text == decimal_text(value)


@pytest.mark.parametrize("value", [float("nan"), float("inf"), float("-inf")])
def test_what_is_no_number_is_not_kept(value: float) -> None:
    with pytest.raises(ValueError, match="decimal"):
        decimal_text(value)


@given(st.floats(allow_nan=False, allow_infinity=False))
def test_text_is_the_number_to_its_digits_and_fits_a_fact(value: float) -> None:
    text = decimal_text(value)
    assert float(text) == pytest.approx(value, rel=10.0 ** (1 - DIGITS))
    assert text == Quantity(value=text, unit="ohm").value
    assert len(Decimal(text).as_tuple().digits) <= 16


def test_a_quantity_is_told_in_the_unit_asked_for() -> None:
    assert "34.99965 MΩ" == str(quantity(34.99965e6, "Mohm"))
    assert "0.228 %" == str(quantity(0.00228310502, "%", 3))
