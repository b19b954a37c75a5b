"""Temperature: thermal output of a bonded gauge, factor over temperature, correcting for both.

Thermal output is strain indicated without load, as a ratio, at the gauge factor it was measured
with. Temperatures are in °C, coefficients of expansion in 1/K.
"""

from __future__ import annotations

from collections.abc import Sequence

from gaugelog.physics._maths import Number, magnitude, nominal
from gaugelog.physics._order import any_of, at_most
from gaugelog.physics.transverse import CALIBRATION_POISSON
from gaugelog.physics.validity import (
    Notice,
    OutOfDomain,
    above,
    between,
    finite,
    not_negative,
    not_zero,
    strictly_between,
)

ABSOLUTE_ZERO = -273.15
SCATTER_RATES: dict[str, float] = {
    "constantan": 0.27e-6,
    "modified nickel-chromium": 0.45e-6,
}
"""Scatter of thermal output within a lot, 2σ, per kelvin from the reference. Common practice."""

FAHRENHEIT_STEP = 1.8
"""Degrees Fahrenheit in a kelvin: a coefficient per °F is so many times larger per kelvin."""


def polynomial_output(celsius: Number, coefficients: Sequence[float]) -> Number:
    """Thermal output by a lot's polynomial: Σ a_i t^i, t in °C, a_0 first; ratio.

    Source: the lot's sheet; the polynomial form is common practice.

    >>> polynomial_output(10.0, [1e-6, 2e-6])
    2.1e-05
    """
    above("celsius", celsius, ABSOLUTE_ZERO)
    if not coefficients:
        raise OutOfDomain("coefficients", "must hold at least one number.")
    total: Number = 0.0
    for coefficient in reversed(coefficients):
        total = total * celsius + finite("coefficient", coefficient)
    return total


def polynomial_output_notices(celsius: Number, low: float, high: float) -> tuple[Notice, ...]:
    """A notice where a temperature lies beyond those a lot's polynomial was fitted over, °C."""
    at_most("low", finite("low", low), "high", finite("high", high))
    plain = nominal(finite("celsius", celsius))
    if not any_of((plain < low) | (plain > high)):
        return ()
    message = (
        f"The lot's thermal output is fitted from {low:g} to {high:g} °C; a polynomial tells "
        "nothing beyond."
    )
    return (Notice("polynomial output", message, "the lot's sheet"),)


def referred_output(celsius: Number, coefficients: Sequence[float], reference: Number) -> Number:
    """Thermal output counted from another temperature: output(t) − output(t_ref); ratio.

    Source: subtraction of `polynomial_output`.
    """
    return polynomial_output(celsius, coefficients) - polynomial_output(reference, coefficients)


def output_at_setting(output: Number, measured_with: Number, setting: Number) -> Number:
    """Thermal output as an instrument with another factor setting shows it: ε F0/F; ratio.

    Source: the resistance change is the same, ASTM E251 definition of gauge factor.
    """
    return (
        finite("output", output)
        * not_zero("measured_with", measured_with)
        / not_zero("setting", setting)
    )


def mismatch_output(article: Number, matched_to: Number, rise: Number) -> Number:
    """Thermal output of a self-compensated gauge on another material: (αs − αm) ΔT; ratio.

    An estimate: the grid's own curve is taken as flat on the material it is matched to. Source:
    Dally and Riley, Experimental Stress Analysis, temperature compensation (from memory).

    >>> round(mismatch_output(11.7e-6, 6e-6, 35.0) * 1e6, 1)
    199.5
    """
    difference = finite("article", article) - finite("matched_to", matched_to)
    return difference * finite("rise", rise)


def grid_output(
    grid_coefficient: Number,
    factor: Number,
    article: Number,
    grid: Number,
    rise: Number,
    sensitivity: Number = 0.0,
    poisson: float = CALIBRATION_POISSON,
) -> Number:
    """Thermal output from the grid's own constants; ratio.

    [β/F + (1 + Kt)/(1 − ν0 Kt) (αs − αg)] ΔT, β the temperature coefficient of resistance.
    Source: Dally and Riley, Experimental Stress Analysis, temperature compensation, with the
    transverse term (from memory).
    """
    kt = strictly_between("transverse sensitivity", sensitivity, -0.5, 0.5)
    across = (1 + kt) / (1 - between("poisson", poisson, -1.0, 0.5) * kt)
    own = finite("grid_coefficient", grid_coefficient) / not_zero("factor", factor)
    return (own + across * (finite("article", article) - finite("grid", grid))) * finite(
        "rise", rise
    )


def scatter(rate: Number, celsius: Number, reference: Number) -> Number:
    """Half-width (2σ) of thermal output within a lot: rate |t − t_ref|; ratio.

    `rate` in 1/K, such as one of `SCATTER_RATES`. Source: common practice.
    """
    away = finite("celsius", celsius) - finite("reference", reference)
    return not_negative("rate", rate) * magnitude(away)


def factor_at(factor: Number, coefficient: Number, rise: Number) -> Number:
    """Gauge factor at another temperature: F (1 + c ΔT), c in 1/K.

    Source: the lot's sheet; the linear form is common practice.
    """
    return not_zero("factor", factor) * (
        1 + finite("coefficient", coefficient) * finite("rise", rise)
    )


def corrected_strain(indicated: Number, output: Number, setting: Number, factor: Number) -> Number:
    """Mechanical strain from a reading: (ε̂ − ε_T) F_set/F(t); ratios.

    `output` is the thermal output at this temperature and at the factor that is set; `factor`
    the gauge factor at this temperature. Source: common practice; resistance change by ASTM E251.
    """
    return (
        (finite("indicated", indicated) - finite("output", output))
        * not_zero("setting", setting)
        / not_zero("factor", factor)
    )


def dummy_residue(active: Number, dummy: Number, active_rise: Number, dummy_rise: Number) -> Number:
    """Thermal output a dummy leaves: a ΔT_active − d ΔT_dummy; ratio.

    `active` and `dummy` are thermal output per kelvin of each grid on its own material.
    Source: two adjacent arms subtract; Dally and Riley (from memory).
    """
    return finite("active", active) * finite("active_rise", active_rise) - finite(
        "dummy", dummy
    ) * finite("dummy_rise", dummy_rise)


def per_kelvin(per_fahrenheit: Number) -> Number:
    """A coefficient per °F as one per kelvin: × 1.8.

    Source: definition of the degree Fahrenheit.
    """
    return FAHRENHEIT_STEP * finite("per_fahrenheit", per_fahrenheit)


def mismatch_output_notices(article: float, matched_to: float, rise: float) -> tuple[Notice, ...]:
    """Asks whether a class that fits badly per kelvin was meant per °F, where it then fits."""
    as_given = magnitude(mismatch_output(article, matched_to, rise))
    as_fahrenheit = magnitude(mismatch_output(article, per_kelvin(matched_to), rise))
    if as_given <= 3 * as_fahrenheit:
        return ()
    message = (
        f"Expansion class {matched_to * 1e6:g} leaves {as_given * 1e6:.1f} µm/m per kelvin; was "
        f"ppm/°F meant? Then it leaves {as_fahrenheit * 1e6:.1f} µm/m."
    )
    return (Notice("mismatch output", message, "common practice: classes in ppm/°F are sold too"),)
