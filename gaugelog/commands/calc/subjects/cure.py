"""`gaugelog calc cure`: how long an adhesive cures and can be worked, by its own sheet."""

from __future__ import annotations

from gaugelog.commands.calc.bounds import NOT_NEGATIVE
from gaugelog.commands.calc.choosing import at_least_one
from gaugelog.commands.calc.dimensions import DIFFERENCE, TEMPERATURE, TIME
from gaugelog.commands.calc.lists import pairs
from gaugelog.commands.calc.model import Answer, Argument, Subject, Values
from gaugelog.commands.calc.sheet import Sheet
from gaugelog.physics import cure


def _compute(values: Values) -> Answer:
    at_least_one(values, "schedule", "open")
    sheet = Sheet()
    if values["schedule"] is not None:
        _cure(sheet, values)
    if values["open"] is not None:
        allowed = sheet.by(cure.working_time, values["temperature"], values["open"])
        sheet.put("time to work", allowed, TIME)
        _left(sheet, values, "time to work left", allowed)
    return sheet.answer()


def _cure(sheet: Sheet, values: Values) -> None:
    celsius, schedule = values["temperature"], values["schedule"]
    interpolate = values["interpolate"] == "yes"
    needed = sheet.by(cure.cure_time, celsius, schedule, interpolate)
    sheet.put("time to cure", needed, TIME)
    sheet.warn(cure.cure_time_notices(celsius, schedule))
    _left(sheet, values, "time to cure left", needed)
    if interpolate:
        sheet.warn(["Between listed temperatures by Arrhenius: only where the sheet allows it."])
        if len(schedule) == 2:
            colder, hotter = sorted(schedule)
            slope = sheet.by(cure.activation_temperature, colder, hotter)
            sheet.put("activation energy over R", slope, DIFFERENCE)


def _left(sheet: Sheet, values: Values, name: str, allowed: float) -> None:
    if values["elapsed"] is not None:
        left = sheet.by(cure.time_left, allowed, values["elapsed"])
        sheet.put(name, "none, it is over" if left <= 0 else left, TIME)


_LISTED = "24 degC = 24 h, 50 degC = 2 h"

SUBJECT = Subject(
    "cure",
    "Cure time at a temperature by the adhesive's own sheet, and the time left to work",
    (
        Argument("temperature", "of the adhesive", TEMPERATURE),
        Argument(
            "schedule",
            "temperatures and cure times that the sheet lists",
            default="",
            read=pairs(TEMPERATURE, TIME),
            example=_LISTED,
        ),
        Argument("interpolate", "the sheet allows it", choices=("no", "yes"), default="no"),
        Argument(
            "open",
            "temperatures and open times or pot lives that the sheet lists",
            default="",
            read=pairs(TEMPERATURE, TIME),
            example="20 degC = 30 min, 25 degC = 20 min",
        ),
        Argument("elapsed", "since mixing or closing", TIME, "", bound=NOT_NEGATIVE),
    ),
    _compute,
    renamed={"celsius": "temperature"},
)
