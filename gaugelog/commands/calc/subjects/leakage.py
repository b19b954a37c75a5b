"""`gaugelog calc leakage`: the strain poor insulation feigns, the insulation an error needs."""

from __future__ import annotations

from gaugelog.commands.calc.bounds import NOT_ZERO, PART_OR_ALL, POSITIVE
from gaugelog.commands.calc.choosing import at_least_one, need
from gaugelog.commands.calc.dimensions import (
    FACTOR,
    INSULATION,
    RATIO,
    RESISTANCE,
    STRAIN,
)
from gaugelog.commands.calc.model import Answer, Argument, Subject, Values
from gaugelog.commands.calc.sheet import Sheet
from gaugelog.physics import leakage

_FALL_LOOKED_INTO = 10.0


def _compute(values: Values) -> Answer:
    at_least_one(values, "insulation", "permitted")
    for name in ("later", "other", "shield"):
        if values[name] is not None:
            need(values, "insulation", why=f"with {name}")
    sheet, grid, factor = Sheet(), values["resistance"], values["factor"]
    if values["insulation"] is not None:
        _of_insulation(sheet, values)
    if values["permitted"] is not None:
        needed = sheet.by(leakage.insulation_needed, grid, factor, values["permitted"])
        sheet.put("insulation needed", needed, INSULATION)
    return sheet.answer()


def _of_insulation(sheet: Sheet, values: Values) -> None:
    grid, factor, insulation = values["resistance"], values["factor"], values["insulation"]
    apparent = sheet.by(leakage.leakage_strain, grid, factor, insulation)
    sheet.put("apparent strain", apparent, STRAIN)
    sheet.warn(leakage.leakage_strain_notices(insulation))
    if values["later"] is not None:
        _of_change(sheet, values)
    if values["other"] is not None:
        apart = sheet.by(
            leakage.grid_to_grid_strain, grid, factor, insulation, values["tab"], values["other"]
        )
        sheet.put("apparent strain, leak to the other grid", apart, STRAIN)
    if values["shield"] is not None:
        shielded = sheet.by(
            leakage.shield_leak_strain, grid, factor, insulation, values["shield"], values["tab"]
        )
        sheet.put("apparent strain, leak to the shield", shielded, STRAIN)


def _of_change(sheet: Sheet, values: Values) -> None:
    grid, factor = values["resistance"], values["factor"]
    before, after = values["insulation"], values["later"]
    drift = sheet.by(leakage.leakage_drift, grid, factor, before, after)
    sheet.put("drift to the later value", drift, STRAIN)
    fall = sheet.by(leakage.insulation_fall, before, after)
    sheet.put("times it has fallen", fall, RATIO)
    if fall > _FALL_LOOKED_INTO:
        sheet.warn(["A fall of more than tenfold is looked into (common practice)."])


SUBJECT = Subject(
    "leakage",
    "Strain that poor insulation feigns, or the insulation a permitted error needs",
    (
        Argument("resistance", "resistance of the grid", RESISTANCE, "350 ohm", bound=POSITIVE),
        Argument("factor", "gauge factor", FACTOR, "2.0", bound=NOT_ZERO),
        Argument(
            "insulation", "insulation resistance to the article", INSULATION, "", bound=POSITIVE
        ),
        Argument("later", "insulation at a later time", INSULATION, "", bound=POSITIVE),
        Argument("permitted", "permitted error", STRAIN, "", bound=NOT_ZERO),
        Argument(
            "other",
            "potential of another grid's tab that it leaks to, as a share of the supply",
            RATIO,
            "",
            bound=PART_OR_ALL,
            example="0.5",
        ),
        Argument(
            "shield",
            "potential of a shield that it leaks to, as a share of the supply",
            RATIO,
            "",
            bound=PART_OR_ALL,
            example="0.5",
        ),
        Argument(
            "tab",
            "potential of the grid's signal tab",
            RATIO,
            "0.5",
            bound=PART_OR_ALL,
            example="0.5",
        ),
    ),
    _compute,
    renamed={"grid": "resistance"},
)
