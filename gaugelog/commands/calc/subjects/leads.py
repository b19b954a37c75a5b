"""`gaugelog calc leads`: what lead wires take, add and drift."""

from __future__ import annotations

from gaugelog.commands.calc.engine import Answer, Argument, Figure, Formula, Subject, Values
from gaugelog.commands.calc.quantities import (
    AREA,
    DIFFERENCE,
    DISTANCE,
    OUTPUT,
    RATIO,
    RESISTANCE,
    RESISTANCE_PER_LENGTH,
    STRAIN,
)
from gaugelog.errors import Fault, Faulty

LAYOUTS = (
    "quarter two-wire",
    "quarter three-wire",
    "half three-wire",
    "half five-wire",
    "full four-wire",
    "full six-wire",
)


def _compute(values: Values) -> Answer:
    from gaugelog.physics import leads

    layout, grid, factor = values["layout"], values["resistance"], values["factor"]
    wire, basis, formula = _wire(values)
    figures = [
        Figure("one wire", wire, RESISTANCE),
        Figure("known from", basis),
        Figure("sensitivity lost", 100 * leads.sensitivity_loss(layout, grid, wire)),
        Figure("multiply readings by", leads.correction_factor(layout, grid, wire), RATIO, 6),
        Figure("factor to set", leads.effective_factor(layout, grid, wire, factor), RATIO),
    ]
    formulas: list[Formula] = [formula, leads.sensitivity_loss, leads.effective_factor]
    if layout == "quarter two-wire":
        drift = leads.temperature_strain(grid, 2 * wire, 0.0, 0.00393, values["rise"], factor)
        figures += [
            Figure("offset", leads.initial_offset(grid, 2 * wire, grid), OUTPUT),
            Figure("drift with the rise", drift, STRAIN),
        ]
        formulas += [leads.initial_offset, leads.temperature_strain]
    notices = leads.desensitisation_notices(layout, grid, wire)
    return Answer(_percent(figures), tuple(formulas), tuple(item.message for item in notices))


def _percent(figures: list[Figure]) -> tuple[Figure, ...]:
    return tuple(
        Figure(item.name, f"{item.value:.4g} %") if item.name == "sensitivity lost" else item
        for item in figures
    )


def _wire(values: Values) -> tuple[float, str, Formula]:
    from gaugelog.physics import conductors

    given = [name for name in ("loop", "per_metre", "area") if values[name] is not None]
    if len(given) != 1:
        raise Faulty([Fault("loop, per_metre, area", "give one of the three.")])
    if given == ["loop"]:
        found = conductors.from_loop(values["loop"])
        return float(found.resistance), found.basis, conductors.from_loop
    if values["length"] is None:
        raise Faulty([Fault("length", "is missing.", "It is needed with per_metre and area.")])
    if given == ["per_metre"]:
        found = conductors.from_reel(values["length"], values["per_metre"])
        return float(found.resistance), found.basis, conductors.from_reel
    per_metre = conductors.per_metre_of_area(values["area"])
    return (
        float(per_metre * values["length"]),
        "area and annealed copper at 20 °C (IEC 60028)",
        conductors.per_metre_of_area,
    )


SUBJECT = Subject(
    "leads",
    "What lead wires take of the sensitivity, and what they add",
    (
        Argument("layout", "wires between bridge and module", choices=LAYOUTS),
        Argument("resistance", "resistance of the grid", RESISTANCE, "350 ohm"),
        Argument("factor", "gauge factor", RATIO, "2.0"),
        Argument("length", "length of the cable", DISTANCE, ""),
        Argument("per_metre", "resistance of one wire, from the reel", RESISTANCE_PER_LENGTH, ""),
        Argument("area", "area of one wire, a last resort", AREA, ""),
        Argument("loop", "measured resistance of two wires in series", RESISTANCE, ""),
        Argument("rise", "how much warmer the cable gets", DIFFERENCE, "10 K"),
    ),
    _compute,
)
