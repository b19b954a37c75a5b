"""`gaugelog calc bridge`: output under strain, strain from an output, four arms and their null."""

from __future__ import annotations

from gaugelog.commands.calc.bounds import NOT_ZERO, POISSON, POSITIVE
from gaugelog.commands.calc.choosing import need, only_one
from gaugelog.commands.calc.dimensions import (
    FACTOR,
    OUTPUT,
    PERCENT,
    POISSONS_RATIO,
    RATIO,
    RESISTANCE,
    STRAIN,
    TEMPERATURE,
)
from gaugelog.commands.calc.model import Answer, Argument, Subject, Values
from gaugelog.commands.calc.sheet import Sheet
from gaugelog.commands.calc.subjects.othergrids import FOIL, GRIDS, answer_of
from gaugelog.errors import Fault, Faulty
from gaugelog.physics import arrangements, balance, bridge, largestrain


def _compute(values: Values) -> Answer:
    ways = {"strain": _from_strain, "output": _from_output, "arms": _from_arms}
    given = only_one(values, *ways)
    if given != "arms":
        need(values, "arrangement", why="with strain and output")
        _check_poisson(values)
        if values["grid"] != FOIL:
            return answer_of(values, given)
    return ways[given](values)


def _check_poisson(values: Values) -> None:
    if arrangements.arrangement(values["arrangement"]).needs_poisson and values["poisson"] is None:
        raise Faulty([Fault("poisson", "is missing.", "A grid lies across: give Poisson's ratio.")])


def _placed(values: Values) -> tuple[str, float]:
    return values["arrangement"], values["poisson"] or 0.0


def _from_strain(values: Values) -> Answer:
    sheet, strain, factor = Sheet(), values["strain"], values["factor"]
    place, initial = _placed(values), values["initial"]
    output = sheet.by(bridge.strain_output, strain, factor, *place, initial)
    shown = sheet.by(bridge.indicated_strain, output - initial, factor, *place)
    sheet.put("output", output, OUTPUT, 7)
    sheet.put("bridge factor", sheet.by(arrangements.bridge_factor, *place), RATIO)
    sheet.put("strain a linear scale shows", shown, STRAIN, 6)
    if shown and not initial:
        part = sheet.by(bridge.nonlinearity_of_actual, strain, factor, *place)
        sheet.put("non-linearity, of the strain", part, PERCENT, 4)
    sheet.warn(bridge.indicated_strain_notices(strain, factor, *place))
    sheet.warn(largestrain.factor_at_strain_notices(strain))
    return sheet.answer()


def _from_output(values: Values) -> Answer:
    sheet, output, factor = Sheet(), values["output"], values["factor"]
    place, initial = _placed(values), values["initial"]
    shown = sheet.by(bridge.indicated_strain, output - initial, factor, *place)
    actual = sheet.by(bridge.actual_strain, output, factor, *place, initial)
    sheet.put("strain a linear scale shows", shown, STRAIN, 6)
    sheet.put("actual strain", actual, STRAIN, 6)
    sheet.warn(bridge.indicated_strain_notices(actual, factor, *place))
    sheet.warn(largestrain.factor_at_strain_notices(actual))
    return sheet.answer()


def _from_arms(values: Values) -> Answer:
    if len(values["arms"]) != 4:
        raise Faulty([Fault("arms", f"must be four, not {len(values['arms'])}.")])
    sheet, arms = Sheet(), values["arms"]
    sheet.put("output", sheet.by(bridge.output_ratio, *arms), OUTPUT, 7)
    shown = sheet.by(bridge.indicated_strain, bridge.output_ratio(*arms), values["factor"])
    sheet.put("as strain of one grid, linear scale", shown, STRAIN, 6)
    if values["adjust"] is not None:
        _null(sheet, arms, int(values["adjust"]))
    return sheet.answer()


def _null(sheet: Sheet, arms: tuple[float, float, float, float], adjusted: int) -> None:
    """What arm nulls the bridge, and the resistor that makes it so."""
    wanted = sheet.by(balance.balancing_arm, arms, adjusted)
    sheet.put(f"arm {adjusted} that nulls it", wanted, RESISTANCE, 7)
    if wanted > arms[adjusted - 1]:
        trim = sheet.by(balance.balancing_trim, arms, adjusted)
        sheet.put(f"resistor in series in arm {adjusted}", trim, RESISTANCE)
    elif wanted < arms[adjusted - 1]:
        across = sheet.by(balance.balancing_parallel, arms, adjusted)
        sheet.put(f"resistor across arm {adjusted}", across, RESISTANCE)


SUBJECT = Subject(
    "bridge",
    "Bridge output under strain, strain from an output, or four arms and what nulls them",
    (
        Argument(
            "arrangement",
            "how the grids lie in the bridge",
            default="",
            choices=tuple(arrangements.ARRANGEMENTS),
        ),
        Argument("factor", "gauge factor", FACTOR, "2.0", bound=NOT_ZERO),
        Argument("strain", "strain along the grid", STRAIN, ""),
        Argument("output", "measured output", OUTPUT, ""),
        Argument("grid", "that the bridge is made of", choices=GRIDS, default=FOIL),
        Argument("second", "second-order term of a semiconductor", RATIO, "", example="4000"),
        Argument("temperature", "of a semiconductor, its sheet's where left out", TEMPERATURE, ""),
        Argument("poisson", "Poisson's ratio, for Poisson arms", POISSONS_RATIO, "", bound=POISSON),
        Argument("initial", "output before loading", OUTPUT, "0 mV/V"),
        Argument(
            "arms",
            "four resistances round the bridge, 1 and 3 opposite",
            RESISTANCE,
            "",
            many=True,
            bound=POSITIVE,
            example="351.2, 350, 350, 350 ohm",
        ),
        Argument("adjust", "arm to null with", choices=("1", "2", "3", "4"), default=""),
    ),
    _compute,
)
