"""`gaugelog calc thermal`: thermal output, factor over temperature, and a reading freed of both."""

from __future__ import annotations

from gaugelog.commands.calc.bounds import NOT_NEGATIVE, NOT_ZERO, SMALL
from gaugelog.commands.calc.choosing import need, only_one
from gaugelog.commands.calc.dimensions import (
    EXPANSION,
    FACTOR,
    RATIO,
    SHARE,
    STRAIN,
    TEMPERATURE,
)
from gaugelog.commands.calc.model import Answer, Argument, Subject, Values
from gaugelog.commands.calc.sheet import Sheet
from gaugelog.physics import balance, temperature

_MICRO = 1e-6


def _compute(values: Values) -> Answer:
    sheet = Sheet()
    output = _output(sheet, values, values["temperature"])
    factor = _factor(sheet, values)
    if values["dummy"] is not None:
        output = _less_dummy(sheet, values, output)
    _scatter(sheet, values)
    if values["indicated"] is not None:
        strain = sheet.by(
            temperature.corrected_strain, values["indicated"], output, values["setting"], factor
        )
        sheet.put("mechanical strain", strain, STRAIN, 6)
    return sheet.answer()


def _output(sheet: Sheet, values: Values, celsius: float) -> float:
    """Thermal output as the instrument shows it, by the lot's curve or an estimate."""
    way = only_one(values, "polynomial", "matched", "grid_coefficient")
    if way == "polynomial":
        output = _by_polynomial(sheet, values, celsius)
    elif way == "matched":
        output = _by_mismatch(sheet, values, celsius)
    else:
        output = _by_grid(sheet, values, celsius)
    sheet.put("thermal output", output, STRAIN)
    return output


def _by_polynomial(sheet: Sheet, values: Values, celsius: float) -> float:
    coefficients = [each * _MICRO for each in values["polynomial"]]
    stated = sheet.by(temperature.referred_output, celsius, coefficients, values["reference"])
    sheet.put("thermal output by the lot", stated, STRAIN)
    found = sheet.by(
        temperature.output_at_setting, stated, values["measured_with"], values["setting"]
    )
    return float(found)


def _by_mismatch(sheet: Sheet, values: Values, celsius: float) -> float:
    need(values, "article", why="with matched")
    rise = celsius - values["reference"]
    sheet.warn(temperature.mismatch_output_notices(values["article"], values["matched"], rise))
    sheet.warn(["An estimate from mismatch alone: the lot's own curve is better."])
    found = sheet.by(temperature.mismatch_output, values["article"], values["matched"], rise)
    return float(found)


def _by_grid(sheet: Sheet, values: Values, celsius: float) -> float:
    need(values, "article", "grid_expansion", why="with grid_coefficient")
    found = sheet.by(
        temperature.grid_output,
        *(values["grid_coefficient"], values["factor"], values["article"]),
        *(values["grid_expansion"], celsius - values["reference"], values["transverse"]),
    )
    return float(found)


def _factor(sheet: Sheet, values: Values) -> float:
    rise = values["temperature"] - values["reference"]
    factor = sheet.by(temperature.factor_at, values["factor"], values["factor_slope"], rise)
    if values["factor_slope"]:
        sheet.put("gauge factor at the temperature", factor, RATIO, 7)
    return float(factor)


def _less_dummy(sheet: Sheet, values: Values, active: float) -> float:
    """What a half bridge shows when its dummy is at another temperature."""
    quiet = Sheet()
    dummy = _output(quiet, values, values["dummy"])
    sheet.put("thermal output of the dummy", dummy, STRAIN)
    residue = sheet.by(balance.dummy_error, active, dummy, values["setting"])
    sheet.put("residue of grid and dummy", residue, STRAIN)
    return float(residue)


def _scatter(sheet: Sheet, values: Values) -> None:
    rate = values["scatter"]
    if values["alloy"] is not None and rate is None:
        rate = temperature.SCATTER_RATES[values["alloy"]]
    if rate is not None:
        half = sheet.by(temperature.scatter, rate, values["temperature"], values["reference"])
        sheet.put("scatter within the lot, 2σ", half, STRAIN)


SUBJECT = Subject(
    "thermal",
    "Thermal output of a bonded gauge, and a reading corrected for it",
    (
        Argument("temperature", "of the grid", TEMPERATURE),
        Argument("reference", "temperature of the zero", TEMPERATURE, "23 degC"),
        Argument(
            "polynomial",
            "the lot's curve: µm/m for powers of °C, constant first",
            RATIO,
            "",
            many=True,
            example="-31.8, 2.77, -0.0655, 3.28e-4",
        ),
        Argument("measured_with", "factor that the curve holds for", FACTOR, "2.0", bound=NOT_ZERO),
        Argument("setting", "the instrument's gauge factor", FACTOR, "2.0", bound=NOT_ZERO),
        Argument("article", "expansion of the article", EXPANSION, ""),
        Argument("matched", "expansion that the gauge is matched to", EXPANSION, ""),
        Argument("grid_coefficient", "of the grid's resistance", EXPANSION, ""),
        Argument("grid_expansion", "expansion of the grid", EXPANSION, ""),
        Argument("transverse", "sensitivity of the grid", SHARE, "0 %", bound=SMALL),
        Argument("factor", "gauge factor at the reference", FACTOR, "2.0", bound=NOT_ZERO),
        Argument(
            "factor_slope",
            "of the factor with temperature",
            EXPANSION,
            "0 ppm/K",
            example="0.01 %/K",
        ),
        Argument("indicated", "strain indicated", STRAIN, ""),
        Argument("dummy", "temperature of a dummy alike", TEMPERATURE, ""),
        Argument(
            "alloy", "for its usual scatter", default="", choices=tuple(temperature.SCATTER_RATES)
        ),
        Argument("scatter", "of the lot, 2σ", EXPANSION, "", bound=NOT_NEGATIVE),
    ),
    _compute,
)
