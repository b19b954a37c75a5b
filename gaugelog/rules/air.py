"""Air and surface at a step: dew point, and the windows of the consumables that are used."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from math import ceil

from gaugelog.ledger.base import Quantity
from gaugelog.ledger.routes import AIR, HUMIDITY, SURFACE, RouteStep
from gaugelog.ledger.stock import ConsumableReceived
from gaugelog.physics.surroundings import DEW_MARGIN, Window, dew_point, window_troubles

SOURCE = "ISO 8502-4: at least 3 K above the dew point (common practice for bonding)"


def air_troubles(
    step: RouteStep, entered: Mapping[str, Quantity], used: Sequence[ConsumableReceived]
) -> tuple[str, ...]:
    """Everything about air and surface that forbids a step; nothing where they are not asked for.

    `entered` are the quantities of the step by the name of their input.
    """
    stands_for = {item.type: entered[item.name] for item in step.inputs if item.name in entered}
    air, humidity = stands_for.get(AIR), stands_for.get(HUMIDITY)
    if air is None or humidity is None:
        return ()
    surface = stands_for.get(SURFACE)
    troubles = _dew(air, humidity, surface) if surface is not None else ()
    for lot in used:
        found = window_troubles(_window(lot), air.si(), humidity.si())
        troubles += tuple(f"{lot.label}: {each}" for each in found)
    return troubles


def _dew(air: Quantity, humidity: Quantity, surface: Quantity) -> tuple[str, ...]:
    point = float(dew_point(air.si(), humidity.si()))
    needed = ceil((point + DEW_MARGIN) * 10) / 10
    if surface.si() >= point + DEW_MARGIN:
        return ()
    return (
        f"The surface at {surface} is too near the dew point of {point:.1f} °C; it needs at least "
        f"{needed:.1f} °C ({SOURCE}).",
    )


def _window(lot: ConsumableReceived) -> Window:
    coldest, hottest = lot.temperature_min, lot.temperature_max
    driest, dampest = lot.humidity_min, lot.humidity_max
    return Window(
        None if coldest is None else coldest.si(),
        None if hottest is None else hottest.si(),
        None if driest is None else driest.si(),
        None if dampest is None else dampest.si(),
    )
