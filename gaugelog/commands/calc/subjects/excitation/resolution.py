"""Noise of a circuit, and the walk of its zero as the supply is raised."""

from __future__ import annotations

from gaugelog.commands.calc.bounds import NOT_NEGATIVE, NOT_ZERO, POSITIVE, whole
from gaugelog.commands.calc.choosing import need
from gaugelog.commands.calc.dimensions import (
    COUNT,
    FACTOR,
    FREQUENCY,
    NOISE_DENSITY,
    OUTPUT,
    RESISTANCE,
    SIGNAL,
    STRAIN,
    TEMPERATURE,
    VOLTAGE,
)
from gaugelog.commands.calc.lists import zero_steps
from gaugelog.commands.calc.model import Answer, Argument, Subject, Values
from gaugelog.commands.calc.sheet import Sheet
from gaugelog.physics import noise, zerowatch

_GRID = Argument("resistance", "of the grid", RESISTANCE, "350 ohm", bound=POSITIVE)


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


KINDS = {
    "noise": Subject(
        "excitation",
        "Noise of a circuit, and the smallest strain it can show",
        (
            _GRID,
            Argument("supply", "across the bridge", VOLTAGE, "5 V", bound=POSITIVE),
            Argument("factor", "gauge factor", FACTOR, "2.0", bound=NOT_ZERO),
            Argument("bridge_factor", "1 for a quarter bridge", FACTOR, "1", bound=POSITIVE),
            Argument("corner", "of the low pass", FREQUENCY, bound=POSITIVE),
            Argument("order", "of the low pass", COUNT, "1", bound=whole(1, 20)),
            Argument("temperature", "of the grids", TEMPERATURE, "23 degC"),
            Argument("amplifier", "its noise at the input", NOISE_DENSITY, "", bound=NOT_NEGATIVE),
            Argument("bits", "of the converter", COUNT, "", bound=whole(1, 32)),
            Argument("span", "of the converter, end to end", OUTPUT, "", bound=POSITIVE),
            Argument("readings", "that are averaged", COUNT, "1", bound=whole(1, 1_000_000)),
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
