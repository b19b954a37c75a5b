"""`gaugelog calc shunt`: the strain a shunt stands for and shows, or the resistor for a strain."""

from __future__ import annotations

from gaugelog.commands.calc.engine import Answer, Argument, Figure, Subject, Values
from gaugelog.commands.calc.quantities import OUTPUT, RATIO, RESISTANCE, STRAIN
from gaugelog.errors import Fault, Faulty


def _compute(values: Values) -> Answer:
    given = [name for name in ("shunt", "strain") if values[name] is not None]
    if len(given) != 1:
        raise Faulty([Fault("shunt, strain", "give one of the two; the other is worked out.")])
    return _of_shunt(values, values["shunt"]) if given == ["shunt"] else _for_strain(values)


def _for_strain(values: Values) -> Answer:
    from gaugelog.physics import resistors, shunt

    exact = shunt.shunt_for_strain(values["resistance"], values["factor"], values["strain"])
    nearest = resistors.nearest_e96(exact)
    rest = _of_shunt(values, nearest)
    return Answer(
        (
            Figure("shunt for exactly that", exact, RESISTANCE, 7),
            Figure("nearest of the E96 series", nearest, RESISTANCE, 7),
            *rest.figures,
        ),
        (shunt.shunt_for_strain, resistors.nearest_e96, *rest.formulas),
        rest.warnings,
    )


def _of_shunt(values: Values, resistor: float) -> Answer:
    from gaugelog.physics import shunt

    grid, factor, wire = values["resistance"], values["factor"], values["wire"]
    arm = int(values["arm"])
    figures = [
        Figure("simulated at the gauge", shunt.simulated_strain(grid, factor, resistor), STRAIN),
        Figure(
            "indicated by a linear scale",
            shunt.shunt_indicated_strain(grid, resistor, factor, arm),
            STRAIN,
        ),
        Figure("change of output", shunt.shunt_output(grid, resistor, arm), OUTPUT),
    ]
    if wire:
        figures.append(
            Figure(
                "indicated, three-wire, across the module's pins",
                shunt.shunt_at_module_strain(grid, wire, resistor, factor),
                STRAIN,
            )
        )
    notices = shunt.shunt_indicated_strain_notices(grid, resistor)
    return Answer(
        tuple(figures),
        (shunt.simulated_strain, shunt.shunt_indicated_strain, shunt.shunt_output),
        tuple(notice.message for notice in notices),
    )


SUBJECT = Subject(
    "shunt",
    "Strain a shunt stands for and shows, or the resistor for a wanted strain",
    (
        Argument("resistance", "resistance of the arm", RESISTANCE, "350 ohm"),
        Argument("factor", "gauge factor", RATIO, "2.0"),
        Argument("shunt", "the shunt resistor", RESISTANCE, ""),
        Argument("strain", "the strain wanted", STRAIN, ""),
        Argument("arm", "the arm it spans", choices=("1", "2", "3", "4"), default="1"),
        Argument("wire", "resistance of one lead wire", RESISTANCE, "0 ohm"),
    ),
    _compute,
)
