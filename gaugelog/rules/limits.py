"""Limits of a reading: the criteria's figure, what physics demands; the strictest rules."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass

from gaugelog.ledger.base import Quantity
from gaugelog.ledger.campaign import CheckCriterion, CriteriaAgreed
from gaugelog.ledger.points import PointPlanned
from gaugelog.ledger.readings import LimitFound
from gaugelog.ledger.stock import LotReceived
from gaugelog.physics.conformity import Limits
from gaugelog.physics.leakage import insulation_needed
from gaugelog.rules.digits import decimal_text

LEAKAGE_SOURCE = "leakage across the grid, R (1/(K |ε|) − 1); parallel resistance and ASTM E251"


@dataclass(frozen=True, slots=True)
class Basis:
    """What limits are computed from: the point as planned, the gauge's lot, the surroundings.

    `grid` is the number of the grid that is read, of a gauge that has several.
    """

    point: PointPlanned
    lot: LotReceived
    criteria: CriteriaAgreed
    surroundings: str
    grid: int = 1

    @property
    def factor(self) -> float:
        """The gauge factor of the grid."""
        return self.lot.grid(self.grid).gauge_factor.si()


def criteria_for(basis: Basis, check: str, stage: str) -> list[CheckCriterion]:
    """The criteria that apply to a check at a stage in these surroundings."""
    return [
        item
        for item in basis.criteria.checks
        if (item.check, item.stage) == (check, stage)
        and item.surroundings in {"any", basis.surroundings}
    ]


def limits_for(basis: Basis, check: str, stage: str) -> tuple[LimitFound, ...]:
    """Every limit that applies, the ruling ones marked. Empty when the criteria ask for none."""
    found = [
        limit
        for criterion in criteria_for(basis, check, stage)
        for limit in _of_criterion(basis, check, criterion)
    ]
    return _ruled(found)


def _of_criterion(basis: Basis, check: str, item: CheckCriterion) -> Iterator[LimitFound]:
    if item.at_least is not None or item.at_most is not None:
        yield LimitFound(
            origin="criteria",
            at_least=item.at_least,
            at_most=item.at_most,
            source=item.source,
            rules=False,
        )
    if "permitted error" in item.physics:
        yield _for_permitted_error(basis, check)
    if "lot tolerance" in item.physics and check == "resistance":
        yield _for_lot_tolerance(basis, item)


def _for_permitted_error(basis: Basis, check: str) -> LimitFound:
    if check != "insulation":
        return LimitFound(
            origin="permitted error",
            at_most=basis.point.permitted_error,
            source="the point's permitted error",
            rules=False,
        )
    nominal = basis.lot.nominal_resistance.si()
    needed = float(insulation_needed(nominal, basis.factor, basis.point.permitted_error.si()))
    return LimitFound(
        origin="permitted error",
        at_least=Quantity(value=decimal_text(needed / 1e6), unit="Mohm"),
        source=f"{LEAKAGE_SOURCE}; {basis.point.permitted_error} permitted",
        formula="leakage.insulation_needed",
        rules=False,
    )


def _for_lot_tolerance(basis: Basis, item: CheckCriterion) -> LimitFound:
    nominal = basis.lot.nominal_resistance.si()
    half = nominal * basis.lot.resistance_tolerance.si()
    return LimitFound(
        origin="prediction",
        at_least=Quantity(value=decimal_text(nominal - half), unit="ohm"),
        at_most=Quantity(value=decimal_text(nominal + half), unit="ohm"),
        source=f"lot {basis.lot.label}: {basis.lot.nominal_resistance} "
        f"± {basis.lot.resistance_tolerance}; {item.source}",
        formula="nominal (1 ± tolerance)",
        rules=False,
    )


def strictest(found: Sequence[LimitFound]) -> Limits | None:
    """The strictest lower and upper limit, SI units; None when there is none."""
    lowers = [limit.at_least.si() for limit in found if limit.at_least is not None]
    uppers = [limit.at_most.si() for limit in found if limit.at_most is not None]
    if not lowers and not uppers:
        return None
    return Limits(max(lowers, default=None), min(uppers, default=None))


def _ruled(found: list[LimitFound]) -> tuple[LimitFound, ...]:
    limits = strictest(found)
    if limits is None:
        return ()
    marked = []
    lower, upper = limits.lower, limits.upper
    for limit in found:
        rules = _is(limit.at_least, lower) or _is(limit.at_most, upper)
        if _is(limit.at_least, lower):
            lower = None  # of two alike, the first rules
        if _is(limit.at_most, upper):
            upper = None
        marked.append(limit.model_copy(update={"rules": rules}))
    return tuple(marked)


def _is(side: Quantity | None, limit: float | None) -> bool:
    return side is not None and limit is not None and side.si() == limit
