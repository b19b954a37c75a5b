"""`gaugelog calc excitation`: heat in a grid, the largest supply, noise, the walk of the zero."""

from __future__ import annotations

from gaugelog.commands.calc.bounds import NOT_NEGATIVE, NOT_ZERO, POSITIVE, Bound, whole
from gaugelog.commands.calc.choosing import given, need
from gaugelog.commands.calc.dimensions import (
    CURRENT,
    FREQUENCY,
    LENGTH,
    NOISE_DENSITY,
    OUTPUT,
    POWER,
    POWER_DENSITY,
    RATIO,
    RESISTANCE,
    SIGNAL,
    STRAIN,
    TEMPERATURE,
    VOLTAGE,
)
from gaugelog.commands.calc.lists import zero_steps
from gaugelog.commands.calc.model import Answer, Argument, Family, Subject, Values
from gaugelog.commands.calc.sheet import Sheet
from gaugelog.errors import Fault, Faulty
from gaugelog.physics import excitation, noise, supplies, zerowatch

_DUTY = Bound("must be more than 0 and no more than 1", lambda value: 0 < value <= 1)


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


def _noise(values: Values) -> Answer:
    sheet, grid = Sheet(), values["resistance"]
    band = sheet.by(noise.noise_bandwidth, values["corner"], int(values["order"]))
    sheet.put("noise bandwidth", band, FREQUENCY)
    source = sheet.by(noise.source_resistance, *[grid] * 4)
    own = sheet.by(noise.johnson_noise, source, values["temperature"], band)
    sheet.put("noise of the bridge, r.m.s.", own, SIGNAL)
    parts = [own]
    if values["amplifier"] is not None:
        parts.append(sheet.by(noise.amplifier_noise, values["amplifier"], band))
        sheet.put("noise of the amplifier, r.m.s.", parts[-1], SIGNAL)
    if values["bits"] is not None:
        need(values, "span", why="with bits")
        step = sheet.by(noise.digital_step, values["span"], int(values["bits"]))
        sheet.put("step of the converter", step, OUTPUT)
        parts.append(sheet.by(noise.step_noise, step * values["supply"]))
        sheet.put("noise of the step, r.m.s.", parts[-1], SIGNAL)
    _as_strain(sheet, values, sheet.by(noise.combined_noise, *parts))
    return sheet.answer()


def _as_strain(sheet: Sheet, values: Values, total: float) -> None:
    strain = sheet.by(
        noise.strain_noise, total, values["supply"], values["factor"], values["bridge_factor"]
    )
    sheet.put("all of it as strain, r.m.s.", strain, STRAIN)
    sheet.put("peak to peak", sheet.by(noise.peak_to_peak, strain), STRAIN)
    if values["readings"] > 1:
        mean = sheet.by(noise.averaged_noise, strain, int(values["readings"]))
        sheet.put("mean of the readings, r.m.s.", mean, STRAIN)


def _zero(values: Values) -> Answer:
    """The test in which the supply is raised and the zero is watched."""
    sheet = Sheet()
    steps = [zerowatch.ZeroStep(*step) for step in values["steps"]]
    for step in steps:
        sheet.put(f"walk of the zero at {step.supply:g} V", step.walk, STRAIN, 4)
    found = sheet.by(zerowatch.judge_steps, steps, values["permitted"])
    steady = "none" if found.steady is None else found.steady
    unsteady = "none" if found.unsteady is None else found.unsteady
    sheet.put("largest supply with a steady zero", steady, VOLTAGE)
    sheet.put("first supply at which it walks", unsteady, VOLTAGE)
    if len({step.supply for step in steps}) > 1:
        _slope(sheet, values, steps)
    return sheet.answer()


def _slope(sheet: Sheet, values: Values, steps: list[zerowatch.ZeroStep]) -> None:
    slope = sheet.by(zerowatch.heating_slope, steps)
    sheet.put("strain feigned per V²", slope, STRAIN, 4)
    if slope:
        supply = sheet.by(zerowatch.supply_for_shift, slope, values["permitted"])
        sheet.put("supply that feigns the permitted strain", supply, VOLTAGE, 4)


_GRID = Argument("resistance", "of the grid", RESISTANCE, "350 ohm", bound=POSITIVE)
_KINDS = {
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
            Argument("duty", "part of the time that pulses are on", RATIO, "", bound=_DUTY),
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
    "noise": Subject(
        "excitation",
        "Noise of a circuit, and the smallest strain it can show",
        (
            _GRID,
            Argument("supply", "across the bridge", VOLTAGE, "5 V", bound=POSITIVE),
            Argument("factor", "gauge factor", RATIO, "2.0", bound=NOT_ZERO),
            Argument("bridge_factor", "1 for a quarter bridge", RATIO, "1", bound=POSITIVE),
            Argument("corner", "of the low pass", FREQUENCY, bound=POSITIVE),
            Argument("order", "of the low pass", RATIO, "1", bound=whole(1, 20)),
            Argument("temperature", "of the grids", TEMPERATURE, "23 degC"),
            Argument("amplifier", "its noise at the input", NOISE_DENSITY, "", bound=NOT_NEGATIVE),
            Argument("bits", "of the converter", RATIO, "", bound=whole(1, 32)),
            Argument("span", "of the converter, end to end", OUTPUT, "", bound=POSITIVE),
            Argument("readings", "that are averaged", RATIO, "1", bound=whole(1, 1_000_000)),
        ),
        _noise,
    ),
    "zero": Subject(
        "excitation",
        "The supply raised while the zero is watched",
        (
            Argument(
                "steps",
                "supply, zero at once, zero after the dwell",
                read=zero_steps,
                example="2 V = 0 ue / 0.5 ue, 5 V = 1 ue / 2 ue",
            ),
            Argument("permitted", "walk of the zero", STRAIN, "2 ue", bound=POSITIVE),
        ),
        _zero,
    ),
}

SUBJECT = Family(
    "excitation",
    "Heat in a grid and its largest supply; noise and resolution; the walk of the zero",
    "what",
    _KINDS,
    default="heat",
)
