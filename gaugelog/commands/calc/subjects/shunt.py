"""`gaugelog calc shunt`: the strain a shunt stands for and shows, or the resistor for a strain."""

from __future__ import annotations

from gaugelog.commands.calc.bounds import NOT_NEGATIVE, NOT_ZERO, POISSON, POSITIVE, whole
from gaugelog.commands.calc.choosing import need, only_one
from gaugelog.commands.calc.dimensions import (
    COUNT,
    DIFFERENCE,
    EXPANSION,
    FACTOR,
    OUTPUT,
    PERCENT,
    POISSONS_RATIO,
    RESISTANCE,
    SHARE,
    STRAIN,
)
from gaugelog.commands.calc.model import Answer, Argument, Subject, Values
from gaugelog.commands.calc.quantities import NotUnderstood
from gaugelog.commands.calc.sheet import Sheet
from gaugelog.physics import prediction, resistors, shunt
from gaugelog.physics.arrangements import ARRANGEMENTS
from gaugelog.physics.circuit import circuit_of


def _between(text: str) -> tuple[tuple[str, str], str]:
    """Two terminals, "signal+ to supply-"."""
    one, joint, other = (part.strip() for part in text.partition(" to "))
    if not (one and joint and other) or one == other:
        raise NotUnderstood(f"“{text}” is no pair of terminals; type it like signal+ to supply-")
    return (one, other), f"{one} to {other}"


def _compute(values: Values) -> Answer:
    sheet = Sheet()
    resistor = values["shunt"]
    if only_one(values, "shunt", "strain") == "strain":
        exact = sheet.by(
            shunt.shunt_for_strain, values["resistance"], values["factor"], values["strain"]
        )
        resistor = sheet.by(resistors.nearest_e96, exact)
        sheet.put("shunt for exactly that", exact, RESISTANCE, 7)
        sheet.put("nearest of the E96 series", resistor, RESISTANCE, 7)
    _readings(sheet, values, resistor)
    if values["tolerance"] or values["coefficient"]:
        _span(sheet, values, resistor)
    if values["between"] is not None:
        need(values, "wires", why="with between")
        _in_circuit(sheet, values, resistor)
    elif values["wire"]:
        _three_wire(sheet, values, resistor)
    return sheet.answer()


def _readings(sheet: Sheet, values: Values, resistor: float) -> None:
    """The three readings that are kept apart: simulated, indicated, change of output."""
    grid, factor, arm = values["resistance"], values["factor"], int(values["arm"])
    place = values["arrangement"], values["poisson"]
    simulated = sheet.by(shunt.simulated_strain, grid, factor, resistor)
    sheet.put("simulated at the gauge", simulated, STRAIN)
    indicated = sheet.by(shunt.shunt_indicated_strain, grid, resistor, factor, arm, *place)
    sheet.put("indicated by a linear scale", indicated, STRAIN)
    sheet.put("change of output", sheet.by(shunt.shunt_output, grid, resistor, arm), OUTPUT)
    sheet.warn(shunt.shunt_indicated_strain_notices(grid, resistor))


def _span(sheet: Sheet, values: Values, resistor: float) -> None:
    """What the resistor's tolerance and warmth leave open."""
    rise, grid, factor = values["rise"], values["resistance"], values["factor"]
    span = sheet.by(
        resistors.resistor_span, resistor, values["tolerance"], values["coefficient"], rise
    )
    sheet.put("resistor at least", span.least, RESISTANCE, 7)
    sheet.put("resistor at most", span.most, RESISTANCE, 7)
    for end, value in (("least", span.least), ("most", span.most)):
        simulated = shunt.simulated_strain(grid, factor, value)
        sheet.put(f"simulated with the {end}", simulated, STRAIN, 6)


def _three_wire(sheet: Sheet, values: Values, resistor: float) -> None:
    shown = sheet.by(
        shunt.shunt_at_module_strain,
        *(values["resistance"], values["wire"], resistor, values["factor"]),
    )
    sheet.put("indicated, three-wire, across the module's pins", shown, STRAIN)


def _in_circuit(sheet: Sheet, values: Values, resistor: float) -> None:
    """Between any two terminals of the circuit with its wires, by nodal analysis."""
    circuit = circuit_of(
        values["arrangement"],
        int(values["wires"]),
        *(values["resistance"], values["factor"], values["wire"]),
    )
    shown = sheet.by(
        prediction.added_strain,
        *(circuit, resistor, values["between"], values["factor"]),
        name=values["arrangement"],
        poisson=values["poisson"],
    )
    sheet.put(f"indicated, shunt from {' to '.join(values['between'])}", shown, STRAIN)
    left = sheet.by(prediction.sensitivity, circuit, values["arrangement"], values["poisson"])
    sheet.put("sensitivity left by the wires", left, PERCENT)


SUBJECT = Subject(
    "shunt",
    "Strain a shunt stands for and shows, or the resistor for a wanted strain",
    (
        Argument("resistance", "resistance of the arm", RESISTANCE, "350 ohm", bound=POSITIVE),
        Argument("factor", "gauge factor", FACTOR, "2.0", bound=NOT_ZERO),
        Argument("shunt", "the shunt resistor", RESISTANCE, "", bound=POSITIVE),
        Argument("strain", "the strain wanted", STRAIN, "", bound=NOT_ZERO),
        Argument("arm", "the arm it spans", choices=("1", "2", "3", "4"), default="1"),
        Argument(
            "arrangement",
            "how the grids lie in the bridge",
            choices=tuple(ARRANGEMENTS),
            default="quarter three-wire",
        ),
        Argument("poisson", "Poisson's, for Poisson arms", POISSONS_RATIO, "0", bound=POISSON),
        Argument("wire", "resistance of one lead wire", RESISTANCE, "0 ohm", bound=NOT_NEGATIVE),
        Argument("wires", "number of wires to the module", COUNT, "", bound=whole(2, 6)),
        Argument(
            "between",
            "terminals it spans; at the article they end in “tab”",
            default="",
            read=_between,
            example="signal+ to supply-",
        ),
        Argument("tolerance", "of the resistor", SHARE, "0 %", bound=NOT_NEGATIVE),
        Argument("coefficient", "of the resistor with temperature", EXPANSION, "0 ppm/K"),
        Argument("rise", "how much warmer the resistor gets", DIFFERENCE, "10 K"),
    ),
    _compute,
    renamed={"grid": "resistance"},
)
