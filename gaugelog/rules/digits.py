"""Computed numbers as decimal text, with the digits that decided."""

from __future__ import annotations

import math
from decimal import ROUND_HALF_EVEN, Decimal

from gaugelog.ledger.base import UNITS, Quantity

DIGITS = 9
"""Significant digits that are kept: more than any meter gives, fewer than rounding noise."""


def decimal_text(value: float, digits: int = DIGITS) -> str:
    """A finite number as plain decimal text, never in exponent form when it is of common size.

    >>> decimal_text(0.1 + 0.2)
    '0.3'
    >>> decimal_text(3.4e-08, 4)
    '0.000000034'
    """
    if not math.isfinite(value):
        raise ValueError(f"{value} can't be kept as a decimal number")
    text = f"{value + 0.0:.{digits}g}"  # + 0.0: zero has no sign
    if "e" not in text:
        return text
    return format(Decimal(text), "f") if 1e-9 < abs(value) < 1e15 else text


def probability_text(text: str, places: int = 3) -> str:
    """A probability (decimal text) to so many places; never rounded to certainty.

    >>> probability_text("4.8e-33"), probability_text("0.94163"), probability_text("1")
    ('< 0.001', '0.942', '> 0.999')
    """
    value, step = Decimal(text), Decimal(1).scaleb(-places)
    if value >= 1 - step / 2:
        return f"> {1 - step}"
    if value <= step / 2:
        return f"< {step}"
    return format(value.quantize(step, ROUND_HALF_EVEN), "f")


def quantity(value_si: float, unit: str, digits: int = DIGITS) -> Quantity:
    """An SI value as a quantity in `unit`."""
    return Quantity(value=decimal_text(value_si / float(UNITS[unit]), digits), unit=unit)
