"""Thermal output and factor over temperature held to handbook tables and published relations."""

from __future__ import annotations

import numpy as np
import pytest

from gaugelog.physics import temperature
from tests.outside.cases import case

CHECKS = (
    temperature.polynomial_output,
    temperature.polynomial_output_notices,
    temperature.referred_output,
    temperature.output_at_setting,
    temperature.mismatch_output,
    temperature.mismatch_output_notices,
    temperature.grid_output,
    temperature.scatter,
    temperature.factor_at,
    temperature.corrected_strain,
    temperature.dummy_residue,
    temperature.per_kelvin,
)
MICRO = 1e6


def test_coefficients_per_fahrenheit_are_those_of_the_table() -> None:
    # Callister's table gives both columns, rounded to 0.1.
    found = case("C06-01")
    per_kelvin = [temperature.per_kelvin(each) for each in found.expected["ppm_per_F"]["value"]]
    assert found.expected["ppm_per_K"]["value"] == pytest.approx(per_kelvin, abs=0.1)


def test_a_steel_matched_gauge_on_aluminium() -> None:
    found = case("C06-03")
    output = temperature.mismatch_output(
        found.value("alpha_s") / MICRO, found.value("alpha_match") / MICRO, found.value("dT")
    )
    found.expect("thermal_output", output * MICRO)


def test_thermal_output_from_the_grids_own_constants() -> None:
    found = case("C06-05")
    output = temperature.grid_output(
        found.value("beta_G") / MICRO,
        found.value("F_G"),
        found.value("alpha_s") / MICRO,
        found.value("alpha_g") / MICRO,
        found.value("dT"),
        found.value("Kt"),
        found.value("nu0"),
    )
    found.expect("thermal_output", output * MICRO)


def test_thermal_output_at_another_factor_setting() -> None:
    found = case("C06-07")
    output = temperature.output_at_setting(
        found.value("thermal_output_at_2") / MICRO, 2.0, found.value("GF_setting")
    )
    found.expect("adjusted", output * MICRO)


def test_the_factor_over_temperature_and_the_strain_it_corrects() -> None:
    found = case("C06-08")
    factor = temperature.factor_at(found.value("GF_24"), found.value("tc") / 1e4, found.value("dT"))
    found.expect("GF_T", factor)
    strain = temperature.corrected_strain(
        found.value("indicated") / MICRO, 0.0, found.value("GF_24"), factor
    )
    found.expect("corrected", strain * MICRO)


def test_the_scatter_within_a_lot() -> None:
    found = case("C06-09")
    widths = [
        temperature.scatter(rate / MICRO, found.value("T"), found.value("Tref")) * MICRO
        for rate in found.value("rate")
    ]
    assert found.expected["half_width_2sigma"]["value"] == pytest.approx(widths, rel=0, abs=0.5)
    assert sorted(temperature.SCATTER_RATES.values()) == pytest.approx(
        [rate / MICRO for rate in found.value("rate")]
    )


def test_a_lots_polynomial_is_evaluated_as_numpy_does() -> None:
    # Independent program: numpy.polynomial, coefficients of an invented lot.
    coefficients = [-31.8e-6, 2.77e-6, -6.55e-8, 3.28e-10, -3.26e-13]
    points = np.linspace(-40.0, 150.0, 39)
    wanted = np.polynomial.polynomial.polyval(points, coefficients)
    assert np.allclose(wanted, temperature.polynomial_output(points, coefficients))
    referred = temperature.referred_output(points, coefficients, 24.0)
    at_reference = np.polynomial.polynomial.polyval(24.0, coefficients)
    assert np.allclose(wanted - at_reference, referred)


def test_a_polynomial_is_told_to_end_where_its_data_end() -> None:
    # Independent program: numpy.polynomial keeps the range of its data as `domain`; a cubic fitted
    # to a saturating curve goes astray soon beyond (why lots name a range is common practice).
    data = np.linspace(0.0, 100.0, 21)
    truth = np.polynomial.Polynomial.fit(data, np.tanh(data / 30) * 1e-4, 3)
    low, high = truth.domain
    coefficients = [float(each) for each in truth.convert().coef]
    inside, beyond = (temperature.polynomial_output(t, coefficients) for t in (high, 2 * high))
    assert inside == pytest.approx(np.tanh(high / 30) * 1e-4, rel=0.05)
    assert abs(beyond - 1e-4) > 1e-4
    assert () == temperature.polynomial_output_notices(data, low, high)
    for outside in (low - 1, high + 1):
        assert "0 to 100 °C" in temperature.polynomial_output_notices(outside, low, high)[0].message


def test_a_class_per_fahrenheit_is_recognised() -> None:
    # Worked by hand: (11.7 − 6) · 35 = 199.5, and (11.7 − 10.8) · 35 = 31.5 µm/m.
    assert temperature.mismatch_output(11.7e-6, 6e-6, 35.0) * MICRO == pytest.approx(199.5)
    notices = temperature.mismatch_output_notices(11.7e-6, 6e-6, 35.0)
    assert "ppm/°F" in notices[0].message
    assert "31.5" in notices[0].message
    assert temperature.mismatch_output_notices(11.7e-6, 11e-6, 35.0) == ()


def test_a_dummy_leaves_the_difference_of_two_temperatures() -> None:
    # Dally and Riley (from memory): adjacent arms subtract. 12 µm/m/K · (10 − 9) K.
    residue = temperature.dummy_residue(12e-6, 12e-6, 10.0, 9.0)
    assert residue * MICRO == pytest.approx(12.0)
