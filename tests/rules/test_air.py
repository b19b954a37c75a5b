"""Dew point and adhesive windows before bonding."""

from __future__ import annotations

import pytest

from gaugelog.ledger.base import Quantity
from gaugelog.ledger.routes import AIR, HUMIDITY, SURFACE, RouteStep, StepInput
from gaugelog.ledger.stock import ConsumableReceived
from gaugelog.rules.air import air_troubles

STEP = RouteStep(
    id="bond",
    title="Bond",
    subject="grid",
    instruction="Bond.",
    inputs=(
        StepInput(name="air", kind="quantity", prompt="Air", unit="degC", type=AIR),
        StepInput(name="damp", kind="quantity", prompt="Humidity", unit="%RH", type=HUMIDITY),
        StepInput(name="steel", kind="quantity", prompt="Surface", unit="degC", type=SURFACE),
    ),
)


def _entered(air: str, damp: str, steel: str) -> dict[str, Quantity]:
    return {
        "air": Quantity(value=air, unit="degC"),
        "damp": Quantity(value=damp, unit="%RH"),
        "steel": Quantity(value=steel, unit="degC"),
    }


def _adhesive(**window: Quantity) -> ConsumableReceived:
    return ConsumableReceived(
        id="c",
        label="AD-1",
        type="adhesive",
        maker="m",
        name="n",
        received_on="2026-01-01",
        **window,  # type: ignore[arg-type]
    )


def test_a_surface_near_the_dew_point_is_refused() -> None:
    # Dew point of 20 °C, 80 % RH is 16.4 °C (WMO-No. 8, Magnus form); 3 K above by ISO 8502-4.
    (told,) = air_troubles(STEP, _entered("20", "80", "18.5"), ())
    assert "dew point of 16.4 °C" in told
    assert "at least 19.5 °C" in told


def test_a_warmer_surface_is_accepted() -> None:
    assert air_troubles(STEP, _entered("20", "80", "20.0"), ()) == ()


def test_air_outside_the_adhesives_window_is_refused() -> None:
    # Common practice: cyanoacrylate wants about 30 to 65 % relative humidity.
    lot = _adhesive(
        humidity_min=Quantity(value="30", unit="%RH"), humidity_max=Quantity(value="65", unit="%RH")
    )
    told = air_troubles(STEP, _entered("20", "70", "24"), (lot,))
    assert told == ("AD-1: The relative humidity of 70 % is above the 65 % allowed.",)


@pytest.mark.parametrize("missing", ["damp", "steel"])
def test_the_lots_temperature_is_judged_though_the_rest_was_not_entered(missing: str) -> None:
    lot = _adhesive(temperature_max=Quantity(value="35", unit="degC"))
    entered = {**_entered("39", "50", "38")}
    del entered[missing]
    told = air_troubles(STEP, entered, (lot,))
    assert ("AD-1: The temperature of 39 °C is above the 35 °C allowed.",) == told


def test_the_lots_humidity_is_judged_though_the_air_was_not_entered() -> None:
    lot = _adhesive(humidity_max=Quantity(value="65", unit="%RH"))
    told = air_troubles(STEP, {"damp": Quantity(value="70", unit="%RH")}, (lot,))
    assert ("AD-1: The relative humidity of 70 % is above the 65 % allowed.",) == told


def test_a_wet_surface_is_told_with_what_it_needs() -> None:
    (told,) = air_troubles(STEP, _entered("20", "80", "15"), ())
    assert "below the dew point of 16.4 °C: it is wet; it needs at least 19.5 °C" in told
    assert "ISO 8502-4" in told


def test_a_step_that_asks_for_no_air_is_never_refused_for_it() -> None:
    bare = STEP.model_copy(update={"inputs": ()})
    assert air_troubles(bare, {}, (_adhesive(),)) == ()
