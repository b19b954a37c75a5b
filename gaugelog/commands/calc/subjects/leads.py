"""`gaugelog calc leads`: what lead wires take, add and drift."""

from __future__ import annotations

import re
from typing import Any

from gaugelog.commands.calc.bounds import NOT_NEGATIVE, NOT_ZERO, POSITIVE
from gaugelog.commands.calc.choosing import need, only_one
from gaugelog.commands.calc.dimensions import (
    AREA,
    DIFFERENCE,
    DISTANCE,
    FACTOR,
    OUTPUT,
    PERCENT,
    RATIO,
    RESISTANCE,
    RESISTANCE_PER_LENGTH,
    STRAIN,
    TEMPERATURE,
)
from gaugelog.commands.calc.model import Answer, Argument, Subject, Values
from gaugelog.commands.calc.quantities import NotUnderstood, understand
from gaugelog.commands.calc.sheet import Sheet
from gaugelog.physics import conductors, leads
from gaugelog.physics.layouts import LAYOUTS

CONDUCTORS = ("class 1", "class 2", "class 5", "class 5 tinned")
_AWG = re.compile(r"\s*([+-]?\d+(?:\.\d+)?)\s*AWG\s*|\s*AWG\s*([+-]?\d+(?:\.\d+)?)\s*", re.I)


def _size(text: str) -> tuple[tuple[str, float], str]:
    """A wire's size: its gauge number, or its area in mm²."""
    match = _AWG.fullmatch(text)
    found = understand(f"{match[1] or match[2]} AWG" if match else text, AREA)
    if match:
        number = float(match[1] or match[2])
        return ("AWG", number), f"{number:g} AWG ({found.shown})"
    if found.value <= 0:
        raise NotUnderstood(f"must be greater than zero, not {found.shown}")
    # Sizes of a table are compared as typed: 0.5 mm² must not become 0.49999…
    return ("mm²", round(found.value * 1e6, 9)), found.shown


def _compute(values: Values) -> Answer:
    sheet, grid, layout = Sheet(), values["resistance"], values["layout"]
    wire = _wire(sheet, values)
    loss = sheet.by(leads.sensitivity_loss, layout, grid, wire)
    sheet.put("sensitivity lost", loss, PERCENT, 4)
    multiplier = sheet.by(leads.correction_factor, layout, grid, wire)
    sheet.put("multiply readings by", multiplier, RATIO, 6)
    effective = sheet.by(leads.effective_factor, layout, grid, wire, values["factor"])
    sheet.put("factor to set", effective, RATIO)
    if layout.startswith("quarter"):
        _quarter(sheet, values, wire)
    drift = sheet.by(
        leads.sensitivity_drift, layout, grid, wire, conductors.COPPER_COEFFICIENT, values["rise"]
    )
    sheet.put("sensitivity changes with the rise", drift, PERCENT, 4)
    sheet.warn(leads.desensitisation_notices(layout, grid, wire))
    return sheet.answer()


def _quarter(sheet: Sheet, values: Values, wire: float) -> None:
    """Offset and drift: two wires beside the grid, or the difference of one in each arm."""
    grid, factor = values["resistance"], values["factor"]
    two = values["layout"] == "quarter two-wire"
    own, neighbour = (2 * wire, 0.0) if two else (wire + values["unequal"], wire)
    offset = sheet.by(leads.initial_offset, grid, own, grid, neighbour)
    sheet.put("offset", offset, OUTPUT)
    drift = sheet.by(
        leads.temperature_strain,
        *(grid, own, neighbour, conductors.COPPER_COEFFICIENT, values["rise"], factor),
    )
    sheet.put("drift with the rise", drift, STRAIN)


def _wire(sheet: Sheet, values: Values) -> float:
    """Resistance of one wire, by the best of what is known."""
    if only_one(values, "loop", "per_metre", "area") == "loop":
        found = sheet.by(conductors.from_loop, values["loop"])
    else:
        need(values, "length", why="with per_metre and area")
        found = _by_length(sheet, values)
    wire = float(found.resistance)
    sheet.put("one wire", wire, RESISTANCE)
    sheet.put("known from", found.basis)
    if values["cable"] is not None:
        wire = sheet.by(conductors.at_temperature, wire, values["cable"])
        sheet.put("one wire in the cable's warmth", wire, RESISTANCE)
        sheet.warn(conductors.at_temperature_notices(values["cable"]))
    return wire


def _by_length(sheet: Sheet, values: Values) -> Any:
    length = values["length"]
    if values["per_metre"] is not None:
        return sheet.by(conductors.from_reel, length, values["per_metre"])
    kind, size = values["area"]
    if kind == "AWG":
        return sheet.by(conductors.from_awg, length, size)
    return sheet.by(conductors.from_mm2, length, size, values["conductor"])


SUBJECT = Subject(
    "leads",
    "What lead wires take of the sensitivity, and what they add",
    (
        Argument("layout", "wires between bridge and module", choices=tuple(LAYOUTS)),
        Argument("resistance", "resistance of the grid", RESISTANCE, "350 ohm", bound=POSITIVE),
        Argument("factor", "gauge factor", FACTOR, "2.0", bound=NOT_ZERO),
        Argument("length", "length of the cable", DISTANCE, "", bound=NOT_NEGATIVE),
        Argument(
            "per_metre",
            "resistance of one wire, from the reel",
            RESISTANCE_PER_LENGTH,
            "",
            bound=POSITIVE,
        ),
        Argument(
            "area",
            "size of one wire, a last resort",
            default="",
            read=_size,
            example=AREA.example,
        ),
        Argument("conductor", "class by IEC 60228", choices=CONDUCTORS, default="class 5"),
        Argument(
            "loop", "measured resistance of two wires in series", RESISTANCE, "", bound=NOT_NEGATIVE
        ),
        Argument("cable", "temperature of the cable, for figures at 20 °C", TEMPERATURE, ""),
        Argument("rise", "how much warmer the cable gets", DIFFERENCE, "10 K"),
        Argument("unequal", "how much more the grid's wire has than its twin", RESISTANCE, "0 ohm"),
    ),
    _compute,
    renamed={"grid": "resistance", "celsius": "cable"},
)
