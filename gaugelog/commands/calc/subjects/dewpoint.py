"""`gaugelog calc dewpoint`: dew point, the surface's distance from it, the window of a sheet."""

from __future__ import annotations

from gaugelog.commands.calc.bounds import HUMID, NOT_NEGATIVE
from gaugelog.commands.calc.choosing import only_one
from gaugelog.commands.calc.dimensions import DIFFERENCE, HUMIDITY, TEMPERATURE
from gaugelog.commands.calc.model import Answer, Argument, Subject, Values
from gaugelog.commands.calc.sheet import Sheet
from gaugelog.physics import surroundings


def _compute(values: Values) -> Answer:
    sheet, air = Sheet(), values["air"]
    if only_one(values, "humidity", "dew_point") == "humidity":
        humidity = values["humidity"]
        dew = sheet.by(surroundings.dew_point, air, humidity)
        sheet.put("dew point", dew, TEMPERATURE, 4)
    else:
        humidity = sheet.by(surroundings.humidity_at, air, values["dew_point"])
        sheet.put("relative humidity", humidity, HUMIDITY, 4)
        dew = values["dew_point"]
    sheet.warn(surroundings.dew_point_notices(air))
    if values["surface"] is not None:
        _at_surface(sheet, values, humidity, dew)
    window = surroundings.Window(
        *(values[name] for name in ("coldest", "hottest", "driest", "dampest"))
    )
    sheet.warn(sheet.by(surroundings.window_troubles, window, air, humidity))
    return sheet.answer()


def _at_surface(sheet: Sheet, values: Values, humidity: float, dew: float) -> None:
    air, surface = values["air"], values["surface"]
    margin = sheet.by(surroundings.dew_margin, surface, air, humidity)
    sheet.put("surface above the dew point by", margin, DIFFERENCE, 4)
    at_surface = sheet.by(surroundings.humidity_at, surface, dew)
    wet = "wet" if at_surface >= 1 else at_surface
    sheet.put("relative humidity at the surface", wet, HUMIDITY, 4)
    troubles = sheet.by(surroundings.dew_troubles, surface, air, humidity, values["margin"])
    sheet.put("fit to bond or coat on", "no" if troubles else "yes")
    sheet.warn(troubles)


SUBJECT = Subject(
    "dewpoint",
    "Dew point of the air, and whether a surface is dry enough to bond on",
    (
        Argument("air", "temperature of the air", TEMPERATURE),
        Argument("humidity", "relative, of the air", HUMIDITY, "", bound=HUMID),
        Argument("dew_point", "where a meter shows it", TEMPERATURE, ""),
        Argument("surface", "temperature of the surface", TEMPERATURE, ""),
        Argument("margin", "asked for above the dew point", DIFFERENCE, "3 K", bound=NOT_NEGATIVE),
        Argument("coldest", "that the sheet allows", TEMPERATURE, ""),
        Argument("hottest", "that the sheet allows", TEMPERATURE, ""),
        Argument("driest", "that the sheet allows", HUMIDITY, ""),
        Argument("dampest", "that the sheet allows", HUMIDITY, ""),
    ),
    _compute,
    renamed={
        "celsius": "air",
        "dew_celsius": "dew_point",
        "surface_celsius": "surface",
        "air_celsius": "air",
    },
)
