"""Quarter bridges with other grids than metal foil: semiconductors, annealed constantan."""

from __future__ import annotations

from gaugelog.commands.calc.choosing import need
from gaugelog.commands.calc.dimensions import OUTPUT, PERCENT, RATIO, STRAIN
from gaugelog.commands.calc.model import Answer, Values
from gaugelog.commands.calc.sheet import Sheet
from gaugelog.errors import Fault, Faulty
from gaugelog.physics import bridge, largestrain, semiconductor

FOIL, ANNEALED, SEMICONDUCTOR = "metal foil", "annealed constantan", "semiconductor"
GRIDS = (FOIL, ANNEALED, SEMICONDUCTOR)


def answer_of(values: Values, given: str) -> Answer:
    """Output from strain or strain from output, `given` being what was typed."""
    _check(values)
    sheet = Sheet()
    way = _annealed if values["grid"] == ANNEALED else _semiconductor
    way(sheet, values, values["strain"] if given == "strain" else None)
    return sheet.answer()


def _annealed(sheet: Sheet, values: Values, strain: float | None) -> None:
    """Large strain, under which the factor grows."""
    factor = values["factor"]
    if strain is None:
        shown = _linear(sheet, values, factor)
        found = sheet.by(largestrain.large_strain_of_indicated, shown, factor, factor)
        sheet.put("actual strain", found, STRAIN, 6)
    else:
        _output(sheet, sheet.by(largestrain.large_change, factor, strain))


def _semiconductor(sheet: Sheet, values: Values, strain: float | None) -> None:
    """A factor that changes with temperature and bends with strain."""
    celsius = values["temperature"]
    if celsius is None:
        celsius = semiconductor.REFERENCE_CELSIUS
    factor = sheet.by(semiconductor.factor_at, values["factor"], celsius)
    second = sheet.by(semiconductor.second_order_at, values["second"], celsius)
    sheet.put(f"factor at {celsius:g} °C", factor, RATIO, 6)
    if strain is None:
        _linear(sheet, values, factor)
        # A quarter bridge turned round: e/E = x/(4 + 2x).
        change = 4 * values["output"] / (1 - 2 * values["output"])
        strain = float(sheet.by(semiconductor.semiconductor_strain, factor, second, change))
        sheet.put("actual strain", strain, STRAIN, 6)
    else:
        _output(sheet, sheet.by(semiconductor.semiconductor_change, factor, second, strain))
    slope = sheet.by(semiconductor.slope_at, factor, second, strain)
    sheet.put("factor for small changes about it", slope, RATIO, 6)
    sheet.warn(
        semiconductor.semiconductor_notices(values["factor"], values["second"], strain, celsius)
    )


def _linear(sheet: Sheet, values: Values, factor: float) -> float:
    shown = sheet.by(bridge.indicated_strain, values["output"], factor)
    sheet.put("strain a linear scale shows", shown, STRAIN, 6)
    return float(shown)


def _output(sheet: Sheet, change: float) -> None:
    sheet.put("change of resistance", change, PERCENT, 6)
    output = sheet.by(bridge.output_ratio, 1 + change, 1.0, 1.0, 1.0)
    sheet.put("output", output, OUTPUT, 7)


def _check(values: Values) -> None:
    """Refuse what the formulas of these grids do not hold for, and ask for what they need."""
    if not values["arrangement"].startswith("quarter") or values["initial"]:
        raise Faulty(
            [Fault("grid", f"“{values['grid']}” is for a balanced quarter bridge without initial.")]
        )
    if values["grid"] == SEMICONDUCTOR:
        need(values, "second", why="for a semiconductor, from its sheet")
