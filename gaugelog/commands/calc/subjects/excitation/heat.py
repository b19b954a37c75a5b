"""Heat in a grid, and the largest supply that its article carries off."""

from __future__ import annotations

from gaugelog.commands.calc.bounds import NOT_NEGATIVE, POSITIVE, Bound
from gaugelog.commands.calc.choosing import given, need
from gaugelog.commands.calc.dimensions import (
    CURRENT,
    LENGTH,
    POWER,
    POWER_DENSITY,
    RATIO,
    RESISTANCE,
    SHARE,
    VOLTAGE,
)
from gaugelog.commands.calc.model import Answer, Argument, Subject, Values
from gaugelog.commands.calc.sheet import Sheet
from gaugelog.errors import Fault, Faulty
from gaugelog.physics import excitation, supplies

_DUTY = Bound("must be more than 0 and no more than 1", lambda value: 0 < value <= 1)
_GRID = Argument("resistance", "of the grid", RESISTANCE, "350 ohm", bound=POSITIVE)


def _heat(values: Values) -> Answer:
    sheet = Sheet()
    if len(given(values, "supply", "current")) > 1:
        raise Faulty([Fault("supply, current", "give one of the two at most.")])
    if values["heat_sink"] is None and not given(values, "supply", "current"):
        raise Faulty([Fault("supply, current, heat_sink", "give at least one of the three.")])
    power = _power(sheet, values)
    if power is not None:
        density = sheet.by(excitation.power_density, power, values["length"], values["width"])
        sheet.put("heat in the grid", power, POWER)
        sheet.put("heat on its area", density, POWER_DENSITY)
        inches = sheet.by(excitation.watts_per_square_inch, density)
        sheet.put("the same in W/in²", inches, RATIO, 4)
    if values["heat_sink"] is not None:
        _sink(sheet, values, power)
    return sheet.answer()


def _power(sheet: Sheet, values: Values) -> float | None:
    grid = values["resistance"]
    if values["current"] is not None:
        return float(sheet.by(excitation.current_power, values["current"], grid))
    if values["supply"] is None:
        return None
    effective = _effective(sheet, values)
    drawn = sheet.by(excitation.supply_current, effective, *[grid] * 4)
    sheet.put("current that four such arms draw", drawn, CURRENT)
    return float(
        sheet.by(excitation.grid_power, effective, grid, values["neighbour"], values["wires"])
    )


def _effective(sheet: Sheet, values: Values) -> float:
    """The steady voltage that heats as much; carriers and pulses are typed by their peak."""
    supply, form = values["supply"], values["form"]
    if form == "direct":
        return float(supply)
    if form == "carrier":
        effective = sheet.by(supplies.effective_of_carrier, supply)
    else:
        need(values, "duty", why="with pulses")
        effective = sheet.by(supplies.effective_of_pulses, supply, values["duty"])
    sheet.put("heats like a steady", effective, VOLTAGE)
    return float(effective)


def _sink(sheet: Sheet, values: Values, power: float | None) -> None:
    """The largest supply that the class of article carries off, careful and bold."""
    sink = sheet.by(excitation.heat_sink, values["heat_sink"])
    size = values["length"], values["width"]
    grid = values["resistance"]
    for word, density in (("steady", sink.steady), ("at most", sink.most)):
        largest = sheet.by(excitation.largest_supply, density, grid, *size, values["neighbour"])
        sheet.put(f"largest supply, {word}", _typed(sheet, values, largest), VOLTAGE)
    current = sheet.by(excitation.largest_current, sink.steady, grid, *size)
    sheet.put("largest current in the grid, steady", current, CURRENT)
    if power is not None:
        sheet.warn(excitation.power_density_notices(excitation.power_density(power, *size), sink))


def _typed(sheet: Sheet, values: Values, effective: float) -> float:
    """An effective voltage as the form of the supply is typed: by its peak."""
    if values["form"] == "carrier":
        return float(effective / supplies.effective_of_carrier(1.0))
    if values["form"] == "pulses":
        need(values, "duty", why="with pulses")
        return float(sheet.by(supplies.pulse_peak, effective, values["duty"]))
    return effective


KINDS = {
    "heat": Subject(
        "excitation",
        "Heat in a grid, and the largest supply its article carries off",
        (
            _GRID,
            Argument("length", "of the grid, the active length", LENGTH, bound=POSITIVE),
            Argument("width", "of the grid, over all strands", LENGTH, bound=POSITIVE),
            Argument("supply", "across the bridge; the peak of carrier or pulses", VOLTAGE, ""),
            Argument("current", "constant, through the grid", CURRENT, ""),
            Argument(
                "form",
                "of the supply",
                default="direct",
                choices=("direct", "carrier", "pulses"),
            ),
            Argument("duty", "part of the time that pulses are on", SHARE, "", bound=_DUTY),
            Argument(
                "heat_sink",
                "class of article",
                default="",
                choices=tuple(excitation.HEAT_SINKS),
            ),
            Argument(
                "neighbour",
                "arm in series with the grid, if another",
                RESISTANCE,
                "",
                bound=POSITIVE,
            ),
            Argument("wires", "all wires in that branch", RESISTANCE, "0 ohm", bound=NOT_NEGATIVE),
        ),
        _heat,
        renamed={"grid": "resistance"},
    ),
}
