"""Pot life: a lot that was mixed too long ago is refused, one that nobody timed is flagged."""

from __future__ import annotations

import pytest

from gaugelog.ledger.base import Quantity
from gaugelog.ledger.routes import MIXED, RouteStep, StepInput
from gaugelog.ledger.stock import ConsumableReceived
from gaugelog.rules.mixed import mixed_troubles, unmixed_flags
from tests.rules.test_verdicts import q

STEP = RouteStep(
    id="coat",
    title="Coat",
    subject="place",
    instruction="Coat.",
    inputs=(
        StepInput(name="mixed", kind="quantity", prompt="Since", unit="min", type=MIXED),
        StepInput(name="other", kind="quantity", prompt="Other", unit="min"),
    ),
)


def _lot(label: str, pot_life: Quantity | None) -> ConsumableReceived:
    return ConsumableReceived(
        id=label,
        label=label,
        type="coating",
        maker="m",
        name="n",
        received_on="2026-01-01",
        pot_life=pot_life,
    )


LOTS = (_lot("CT-1", q("45", "min")), _lot("CT-2", None), _lot("CT-3", q("1", "h")))


@pytest.mark.parametrize(
    ("since", "told"),
    [
        ("45", ()),
        ("46", ("CT-1 was mixed 46 min ago; its pot life is 45 min (its data sheet).",)),
        ("60", ("CT-1 was mixed 60 min ago; its pot life is 45 min (its data sheet).",)),
    ],
)
def test_a_lot_is_used_within_its_pot_life(since: str, told: tuple[str, ...]) -> None:
    assert told == mixed_troubles(STEP, {"mixed": q(since, "min")}, LOTS)
    assert [] == unmixed_flags(STEP, {"mixed": q(since, "min")}, LOTS)


def test_every_lot_past_its_pot_life_is_told() -> None:
    assert 2 == len(mixed_troubles(STEP, {"mixed": q("61", "min")}, LOTS))


@pytest.mark.parametrize("entered", [{}, {"other": q("500", "min")}])
def test_a_pot_life_that_nobody_timed_is_flagged(entered: dict[str, Quantity]) -> None:
    assert () == mixed_troubles(STEP, entered, LOTS)
    assert [
        "CT-1 has a pot life of 45 min, and no time since it was mixed was entered.",
        "CT-3 has a pot life of 1 h, and no time since it was mixed was entered.",
    ] == unmixed_flags(STEP, entered, LOTS)
