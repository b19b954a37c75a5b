"""`gaugelog calc budget`: where the uncertainty of a circuit's strain comes from, largest first."""

from __future__ import annotations

from dataclasses import replace

from gaugelog.commands.calc.bounds import NOT_NEGATIVE, NOT_ZERO, PART, POISSON, POSITIVE, whole
from gaugelog.commands.calc.dimensions import (
    ANGLE,
    CONDUCTANCE,
    COUNT,
    DIFFERENCE,
    EXPANSION,
    FACTOR,
    PERCENT,
    POISSONS_RATIO,
    RATIO,
    RESISTANCE,
    SHARE,
    STRAIN,
    STRAINS,
    TEMPERATURE,
    Dimension,
)
from gaugelog.commands.calc.model import Answer, Argument, Family, Subject, Values
from gaugelog.commands.calc.sheet import Sheet
from gaugelog.commands.calc.stated import HELP, stated
from gaugelog.physics import change, circuit_budget, estimates, montecarlo
from gaugelog.physics.arrangements import ARRANGEMENTS
from gaugelog.physics.layouts import LAYOUTS
from gaugelog.physics.reading import TERMS, PlannedCircuit
from gaugelog.physics.uncertainty import Budget

_UNITS: dict[str, Dimension] = {
    "": RATIO,
    "1/K": EXPANSION,
    "°C": TEMPERATURE,
    "rad": ANGLE,
    "strain": STRAIN,
    "strain/K": EXPANSION,
    "ohm": RESISTANCE,
    "S": CONDUCTANCE,
}

_EXAMPLES = {
    "factor": "2.05 ± 1 %",
    "factor_slope": "0.01 %/K ± 0.002 %/K",
    "celsius": "± 3 K",
    "transverse": "0.6 % ± 0.2 %",
    "biaxiality": "-0.3 ± 0.02",
    "misalignment": "± 2 deg",
    "shear": "± 0.05",
    "thermal": "40 ue ± 10 ue normal",
    "thermal_slope": "0.5 ue/K ± 0.1 ue/K",
    "scatter": "± 6 ue k=2",
    "resistance": "350 ohm ± 0.3 %",
    "wire": "1 ohm ± 0.1 ohm",
    "wire_drift": "± 2 milliohm",
    "leak": "± 0.1 nS",
    "shunt_error": "± 0.1 %",
    "gain": "1 ± 0.05 %",
    "zero": "± 1 ue",
    "resolution": "± 0.5 ue",
    "nonlinearity": "± 0.5 ue",
    "repeatability": "± 1 ue normal dof=4",
}


def _term(name: str) -> Argument:
    """The argument of one term of the reading: a value, a width, or both."""
    what, unit = TERMS[name]
    dimension = _UNITS[unit]
    width = DIFFERENCE if dimension is TEMPERATURE else dimension
    return Argument(name, what, default="", read=stated(dimension, width), example=_EXAMPLES[name])


def _circuit(values: Values) -> Answer:
    circuit = PlannedCircuit(
        strain=values["strain"],
        celsius=values["temperature"],
        arrangement=values["arrangement"],
        layout=values["layout"],
        setting=values["setting"],
        poisson=values["poisson"],
        reference_celsius=values["reference"],
        resistance=_planned_resistance(values),
        shunt=values["shunt"],
    )
    inputs = _inputs(circuit, values)
    sheet = Sheet()
    found = sheet.by(circuit_budget.circuit_budget, circuit, inputs)
    _result(sheet, values, found)
    _shares(sheet, found)
    if found.uncertainty:
        _simulated(sheet, values, circuit, inputs, found)
    else:
        sheet.warn(["Nothing here is uncertain: give widths, like factor='2.05 ± 1 %'."])
    return sheet.answer()


def _planned_resistance(values: Values) -> float:
    typed = values["resistance"]
    return 350.0 if typed is None or typed.value is None else float(typed.value)


def _inputs(circuit: PlannedCircuit, values: Values) -> dict[str, estimates.Estimate]:
    """What was typed of each term; repeated readings stand for the repeatability."""
    nominal = circuit.nominal()
    inputs = {name: values[name].around(nominal[name]) for name in TERMS if values[name]}
    if values["readings"] is not None:
        mean = estimates.from_readings(values["readings"])
        inputs["repeatability"] = replace(mean, value=0.0)
    return inputs


def _result(sheet: Sheet, values: Values, found: Budget) -> None:
    confidence = values["confidence"]
    sheet.put("strain", found.value, STRAIN, 6)
    sheet.put("standard uncertainty u", found.uncertainty, STRAIN, 3)
    if found.uncertainty:
        sheet.put("degrees of freedom", found.dof if found.dof < 1e6 else "very many", None, 3)
        sheet.put("coverage factor k", found.coverage(confidence), RATIO, 3)
        sheet.put(f"U for {100 * confidence:.4g} % of cases", found.expanded(confidence), STRAIN, 3)
        sheet.put("U as part of the strain", found.expanded(confidence) / abs(found.value), PERCENT)


def _shares(sheet: Sheet, found: Budget) -> None:
    for part in found.parts:
        share = f"{100 * part.share:.1f} %, u = {part.contribution * 1e6:.3g} µm/m"
        sheet.put(f"share of {part.name}", f"{share} ({part.estimate.shape.word})")
    if abs(found.shift) > found.uncertainty / 10:
        sheet.put("curvature moves the mean by", found.shift, STRAIN, 3)


def _simulated(
    sheet: Sheet,
    values: Values,
    circuit: PlannedCircuit,
    inputs: dict[str, estimates.Estimate],
    found: Budget,
) -> None:
    """The same by Monte Carlo; a warning where both disagree."""
    whole_inputs = circuit_budget.all_inputs(circuit, inputs)
    simulated = sheet.by(
        montecarlo.simulate,
        *(circuit_budget.strain_model(circuit, whole_inputs), whole_inputs),
        draws=int(values["draws"]),
        seed=int(values["seed"]),
        confidence=values["confidence"],
    )
    sheet.put("Monte Carlo, mean", simulated.mean, STRAIN, 6)
    sheet.put("Monte Carlo, u", simulated.uncertainty, STRAIN, 3)
    sheet.put("Monte Carlo, from", simulated.low, STRAIN, 6)
    sheet.put("Monte Carlo, to", simulated.high, STRAIN, 6)
    if sheet.by(montecarlo.agreement_notices, found, simulated):
        middle, half = found.value + found.shift, found.expanded(simulated.confidence)
        sheet.warn(
            [
                f"Budget and simulation disagree: {(middle - half) * 1e6:.5g} to "
                f"{(middle + half) * 1e6:.5g} µm/m against {simulated.low * 1e6:.5g} to "
                f"{simulated.high * 1e6:.5g} µm/m; trust the simulation."
            ]
        )


def _difference(values: Values) -> Answer:
    """Two readings of one meter: what both share cancels."""
    sheet, before, after = Sheet(), values["before"], values["after"]
    meter = values["gain"], values["offset"], values["resolution"]
    same = values["meter"] == "same"
    uncertainty = sheet.by(change.difference_uncertainty, before, after, same, *meter)
    alone = sheet.by(change.instrument_uncertainty, after, *meter)
    sheet.put("change", after - before, RATIO, 6)
    if before:
        sheet.put("change, of the first", sheet.by(change.relative_change, before, after), PERCENT)
    sheet.put("standard uncertainty of the change", uncertainty, RATIO, 4)
    sheet.put("of one reading alone", alone, RATIO, 4)
    sheet.put("U of the change, k = 2", 2 * uncertainty, RATIO, 4)
    return sheet.answer()


_PLAN = (
    Argument("strain", "planned", STRAIN, bound=NOT_ZERO),
    Argument("temperature", "planned, of the grid", TEMPERATURE, "23 degC"),
    Argument("reference", "of the gauge factor", TEMPERATURE, "23 degC"),
    Argument(
        "arrangement",
        "of the bridge",
        choices=tuple(ARRANGEMENTS),
        default="quarter three-wire",
    ),
    Argument("layout", "of the wires", choices=tuple(LAYOUTS), default="quarter three-wire"),
    Argument("setting", "the instrument's gauge factor", FACTOR, "2.0", bound=NOT_ZERO),
    Argument("poisson", "Poisson's ratio of the article", POISSONS_RATIO, "0.3", bound=POISSON),
    Argument("shunt", "resistor that set the scale", RESISTANCE, "", bound=POSITIVE),
)
_HOW = (
    Argument("readings", "repeated, in place of repeatability", STRAINS, "", many=True),
    Argument("confidence", "share of cases that U holds", SHARE, "95 %", bound=PART),
    Argument(
        "draws",
        "of the simulation",
        COUNT,
        "200000",
        bound=whole(1000, 10_000_000),
        example="1000000",
    ),
    Argument("seed", "of the simulation", COUNT, "1", bound=whole(0, 2**31)),
)
_KINDS = {
    "circuit": Subject(
        "budget",
        "Uncertainty of a circuit's strain at its planned strain and temperature",
        (*_PLAN, *(_term(name) for name in TERMS), *_HOW),
        _circuit,
        renamed={"celsius": "temperature"},
        note=HELP,
    ),
    "difference": Subject(
        "budget",
        "Uncertainty of a change between two readings",
        (
            Argument("before", "first reading, all in one unit of your choice", RATIO),
            Argument("after", "second reading, same unit", RATIO),
            Argument("meter", "of the two readings", choices=("same", "another"), default="same"),
            Argument("gain", "accuracy of reading, ±", SHARE, "0 %", bound=NOT_NEGATIVE),
            Argument("offset", "accuracy beside it, ±, same unit", RATIO, "0", bound=NOT_NEGATIVE),
            Argument("resolution", "step of the display", RATIO, "0", bound=NOT_NEGATIVE),
        ),
        _difference,
        renamed={"gain_fraction": "gain"},
    ),
}

SUBJECT = Family(
    "budget",
    "Uncertainty budget of a circuit's strain, shares largest first, GUM and Monte Carlo",
    "of",
    _KINDS,
    default="circuit",
)
