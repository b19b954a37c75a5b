"""What may be offered again, and for how long."""

from __future__ import annotations

from datetime import timedelta

import pytest

from gaugelog.ledger.routes import AIR, BOND_LINE, HUMIDITY, SURFACE, InputKind, StepInput
from gaugelog.rules.carried import carried_as, carries_for


def _input(kind: InputKind, type_: str = "", name: str = "x") -> StepInput:
    return StepInput(name=name, kind=kind, prompt="?", type=type_)


@pytest.mark.parametrize("kind", ["reading", "gauge", "text", "yes"])
def test_what_belongs_to_one_step_is_never_carried(kind: InputKind) -> None:
    assert carries_for(_input(kind)) is None


@pytest.mark.parametrize("type_", [SURFACE, BOND_LINE, ""])
def test_what_belongs_to_one_place_is_never_carried(type_: str) -> None:
    assert carries_for(_input("quantity", type_)) is None


def test_the_air_holds_half_an_hour_and_a_meter_or_a_lot_a_shift() -> None:
    assert timedelta(minutes=30) == carries_for(_input("quantity", AIR))
    assert timedelta(minutes=30) == carries_for(_input("quantity", HUMIDITY))
    assert timedelta(hours=8) == carries_for(_input("instrument", "resistance"))
    assert timedelta(hours=8) == carries_for(_input("consumable", "adhesive"))


def test_values_are_carried_by_what_they_stand_for_not_by_the_name_of_a_field() -> None:
    assert carried_as(_input("instrument", "strain", "a")) == carried_as(
        _input("instrument", "strain", "b")
    )
    assert carried_as(_input("instrument", "strain")) != carried_as(
        _input("instrument", "insulation")
    )
