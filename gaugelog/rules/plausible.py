"""What can't be this gauge's value is refused before it is a reading."""

from __future__ import annotations

from gaugelog.errors import Fault, Faulty
from gaugelog.ledger.base import Quantity
from gaugelog.ledger.stock import LotReceived

FARTHEST = 0.05
"""Part of the nominal resistance beyond which a value is no reading of this gauge.

Lots are held to 0.15 to 0.5 %, bonding moves a grid by some tenths of a per cent (common
practice); 5 % is far outside both, and an open or shorted grid is not typed as a number near it.
"""

_USUAL = (120.0, 175.0, 350.0, 700.0, 1000.0)


def demand_plausible(check: str, value: Quantity | None, lot: LotReceived, where: str) -> None:
    """Raise Faulty when `value` can't be a `check` of a gauge of `lot`, saying what it may be."""
    if value is None:
        return
    size = value.si()
    if check == "insulation" and size <= 0:
        raise Faulty([Fault(where, f"{value} is no insulation.", "Type what the meter shows.")])
    nominal = lot.nominal_resistance.si()
    if check != "resistance" or abs(size - nominal) <= FARTHEST * nominal:
        return
    raise Faulty(
        [
            Fault(
                where,
                f"{value} can't be a gauge of lot {lot.label}, nominally {lot.nominal_resistance}.",
                _guess(size, nominal),
            )
        ]
    )


def _guess(size: float, nominal: float) -> str:
    for shift in (10.0, 0.1, 100.0, 0.01, 1e3, 1e-3):
        if abs(size * shift - nominal) <= FARTHEST * nominal:
            return "A decimal point slipped, or the unit is not the meter's: type it again."
    for usual in _USUAL:
        if abs(size - usual) <= FARTHEST * usual:
            return f"It is like a {usual:g} Ω gauge: look whether this is the right gauge."
    return "Look at the gauge, the leads and the meter, and type what it shows."
