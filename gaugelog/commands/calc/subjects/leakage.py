"""`gaugelog calc leakage`: the strain poor insulation feigns, the insulation an error needs."""

from __future__ import annotations

from gaugelog.commands.calc.engine import Answer, Argument, Figure, Formula, Subject, Values
from gaugelog.commands.calc.quantities import INSULATION, RATIO, RESISTANCE, STRAIN
from gaugelog.errors import Fault, Faulty


def _compute(values: Values) -> Answer:
    from gaugelog.physics import leakage

    grid, factor = values["resistance"], values["factor"]
    insulation, permitted, later = values["insulation"], values["permitted"], values["later"]
    if insulation is None and permitted is None:
        raise Faulty([Fault("insulation, permitted", "give at least one of the two.")])
    figures: list[Figure] = []
    formulas: list[Formula] = []
    warnings: list[str] = []
    if insulation is not None:
        figures.append(
            Figure("apparent strain", leakage.leakage_strain(grid, factor, insulation), STRAIN)
        )
        formulas.append(leakage.leakage_strain)
        warnings += [notice.message for notice in leakage.leakage_strain_notices(insulation)]
    if insulation is not None and later is not None:
        drift = leakage.leakage_drift(grid, factor, insulation, later)
        figures.append(Figure("drift to the later value", drift, STRAIN))
        formulas.append(leakage.leakage_drift)
    if permitted is not None:
        needed = leakage.insulation_needed(grid, factor, permitted)
        figures.append(Figure("insulation needed", needed, INSULATION))
        formulas.append(leakage.insulation_needed)
    return Answer(tuple(figures), tuple(formulas), tuple(warnings))


SUBJECT = Subject(
    "leakage",
    "Strain that poor insulation feigns, or the insulation a permitted error needs",
    (
        Argument("resistance", "resistance of the grid", RESISTANCE, "350 ohm"),
        Argument("factor", "gauge factor", RATIO, "2.0"),
        Argument("insulation", "insulation resistance to the article", INSULATION, ""),
        Argument("later", "insulation at a later time", INSULATION, ""),
        Argument("permitted", "permitted error", STRAIN, ""),
    ),
    _compute,
)
