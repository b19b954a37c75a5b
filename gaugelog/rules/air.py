"""Air and surface at a step: dew point, and the windows of the consumables that are used."""

from __future__ import annotations

from collections.abc import Mapping, Sequence

from gaugelog.ledger.base import Quantity
from gaugelog.ledger.routes import AIR, HUMIDITY, SURFACE, RouteStep
from gaugelog.ledger.stock import ConsumableReceived
from gaugelog.physics.surroundings import Window, dew_troubles, window_troubles

SOURCE = "ISO 8502-4: at least 3 K above the dew point (common practice for bonding)"


def air_troubles(
    step: RouteStep, entered: Mapping[str, Quantity], used: Sequence[ConsumableReceived]
) -> tuple[str, ...]:
    """Everything about air and surface that forbids a step; nothing where they are not asked for.

    Each part that was entered is judged; only the dew point needs all three.
    `entered` are the quantities of the step by the name of their input.
    """
    stands_for = {item.type: entered[item.name] for item in step.inputs if item.name in entered}
    air, humidity = stands_for.get(AIR), stands_for.get(HUMIDITY)
    surface = stands_for.get(SURFACE)
    troubles = _dew(air, humidity, surface)
    for lot in used:
        found = window_troubles(_window(lot), _si(air), _si(humidity))
        troubles += tuple(f"{lot.label}: {each}" for each in found)
    return troubles


def _dew(
    air: Quantity | None, humidity: Quantity | None, surface: Quantity | None
) -> tuple[str, ...]:
    if air is None or humidity is None or surface is None:
        return ()
    found = dew_troubles(surface.si(), air.si(), humidity.si())
    return tuple(f"{each} ({SOURCE})" for each in found)


def _si(given: Quantity | None) -> float | None:
    return None if given is None else given.si()


def _window(lot: ConsumableReceived) -> Window:
    bounds = lot.temperature_min, lot.temperature_max, lot.humidity_min, lot.humidity_max
    return Window(*map(_si, bounds))
