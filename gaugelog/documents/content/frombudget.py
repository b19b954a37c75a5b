"""The budget of a point's strain and its corrections, as the record shows them."""

from __future__ import annotations

from typing import TYPE_CHECKING

from gaugelog.documents.content.model import BudgetShown, CorrectionShown, PartShown
from gaugelog.ledger.base import Quantity
from gaugelog.physics.reading import TERMS
from gaugelog.rules.budget import STANDARD, PointBudget, point_budget
from gaugelog.rules.digits import decimal_text

if TYPE_CHECKING:
    from gaugelog.ledger.points import PointRow
    from gaugelog.ledger.view import View

LEAST_SHARE = 0.0005
"""Part of the variance below which an input is not listed."""


def budget_shown(view: View, point: PointRow) -> BudgetShown | None:
    """The budget of a point as the record shows it; None while no gauge is in place."""
    found = point_budget(view, point)
    return None if found is None else _shown(found)


def _shown(found: PointBudget) -> BudgetShown:
    budget = found.budget
    return BudgetShown(
        strain=_micro(found.strain, 6),
        expanded=_micro(budget.expanded(), 2),
        coverage=decimal_text(budget.coverage(), 3),
        parts=tuple(
            PartShown(
                name=TERMS[part.name][0],
                contribution=_micro(part.contribution, 2),
                share=f"{100 * part.share:.1f}",
            )
            for part in budget.parts
            if part.share >= LEAST_SHARE
        ),
        corrections=tuple(
            CorrectionShown(name=each.name, value=each.value, source=each.source)
            for each in found.corrections
        ),
        standard=STANDARD,
    )


def _micro(strain: float, digits: int) -> Quantity:
    return Quantity(value=decimal_text(strain * 1e6, digits), unit="um/m")
