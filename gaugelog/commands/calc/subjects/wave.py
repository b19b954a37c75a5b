"""`gaugelog calc wave`: strain that runs along a part, and how fast grid and module follow it."""

from __future__ import annotations

from gaugelog.commands.calc.bounds import NOT_NEGATIVE, PART, POISSON, POSITIVE
from gaugelog.commands.calc.choosing import need, only_one
from gaugelog.commands.calc.dimensions import (
    DENSITY,
    FREQUENCY,
    LENGTH,
    MODULUS,
    MOMENT,
    PERCENT,
    POISSONS_RATIO,
    SHARE,
    SPEED,
    STRAIN,
)
from gaugelog.commands.calc.model import Answer, Argument, Subject, Values
from gaugelog.commands.calc.sheet import Sheet
from gaugelog.physics import dynamics


def _compute(values: Values) -> Answer:
    sheet = Sheet()
    speed = _speed(sheet, values)
    sheet.put("speed of the wave", speed, SPEED, 6)
    if values["velocity"] is not None:
        strain = sheet.by(dynamics.strain_of_velocity, values["velocity"], speed)
        sheet.put("strain behind the front", strain, STRAIN)
    if values["frequency"] is not None:
        sheet.put("length of the wave", speed / values["frequency"], LENGTH)
    if values["length"] is not None:
        _grid(sheet, values, speed)
    if values["corner"] is not None:
        _module(sheet, values, speed)
    if values["frequency"] is not None and values["loss"] is not None:
        corner = sheet.by(dynamics.corner_for_loss, values["frequency"], values["loss"])
        sheet.put("lowest corner of the module", corner, FREQUENCY)
    return sheet.answer()


def _speed(sheet: Sheet, values: Values) -> float:
    if only_one(values, "speed", "modulus") == "speed":
        return float(values["speed"])
    need(values, "density", why="with modulus")
    material = values["modulus"], values["density"]
    if values["body"] == "bar":
        return float(sheet.by(dynamics.bar_wave_speed, *material))
    need(values, "poisson", why=f"for a {values['body']}")
    formulas = {"plate": dynamics.plate_wave_speed, "twisted shaft": dynamics.torsion_wave_speed}
    return float(sheet.by(formulas[values["body"]], *material, values["poisson"]))


def _grid(sheet: Sheet, values: Values, speed: float) -> None:
    """What the grid's length makes of the wave."""
    length, frequency = values["length"], values["frequency"]
    if frequency is not None:
        share = sheet.by(dynamics.wave_average, length, frequency, speed)
        sheet.put("part of the amplitude shown", share, PERCENT, 7)
        sheet.warn(dynamics.wave_average_notices(length, frequency, speed))
        if values["diameter"] is not None:
            sheet.warn(dynamics.bar_wave_speed_notices(frequency, values["diameter"], speed))
    if values["loss"] is not None:
        highest = sheet.by(dynamics.frequency_for_loss, length, speed, values["loss"])
        sheet.put("highest frequency for the loss", highest, FREQUENCY, 6)
    sheet.put("time to pass the grid", sheet.by(dynamics.transit_time, length, speed), MOMENT)
    rise = sheet.by(dynamics.grid_rise_time, length, speed, values["own_rise"])
    sheet.put("rise time of the grid", rise, MOMENT)


def _module(sheet: Sheet, values: Values, speed: float) -> None:
    """What the module's low pass makes of it, and both together."""
    corner, frequency, length = values["corner"], values["frequency"], values["length"]
    if frequency is not None:
        gain = sheet.by(dynamics.first_order_gain, frequency, corner)
        sheet.put("part the module leaves", gain, PERCENT, 6)
    own = sheet.by(dynamics.rise_of_corner, corner)
    sheet.put("rise time of the module", own, MOMENT)
    if length is not None:
        grid = dynamics.grid_rise_time(length, speed, values["own_rise"])
        both = sheet.by(dynamics.combined_rise, grid, own)
        sheet.put("rise time of both", both, MOMENT)


SUBJECT = Subject(
    "wave",
    "Strain waves: what a grid's length and a module's bandwidth leave of them",
    (
        Argument(
            "body",
            "that the wave runs in",
            default="bar",
            choices=("bar", "plate", "twisted shaft"),
        ),
        Argument("speed", "of the wave, where it is known", SPEED, "", bound=POSITIVE),
        Argument("modulus", "of elasticity", MODULUS, "", bound=POSITIVE),
        Argument("density", "of the part", DENSITY, "", bound=POSITIVE),
        Argument("poisson", "Poisson's, for plate and shaft", POISSONS_RATIO, "", bound=POISSON),
        Argument("length", "of the grid", LENGTH, "", bound=POSITIVE),
        Argument("frequency", "of the wave", FREQUENCY, "", bound=POSITIVE),
        Argument("loss", "of amplitude permitted", SHARE, "", bound=PART, example="1 %"),
        Argument("diameter", "of the bar", LENGTH, "", bound=POSITIVE),
        Argument("velocity", "of the matter behind the front", SPEED, ""),
        Argument("corner", "of the module's low pass", FREQUENCY, "", bound=POSITIVE),
        Argument("own_rise", "of grid and bond themselves", MOMENT, "0 us", bound=NOT_NEGATIVE),
    ),
    _compute,
)
