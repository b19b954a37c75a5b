"""Averaging over a grid, held to printed cases and to SciPy's integrals and roots."""

from __future__ import annotations

import numpy as np
import pytest
from scipy import integrate, optimize, special

from gaugelog.physics import averaging
from tests.outside.cases import case

CHECKS = (
    averaging.sine_average,
    averaging.length_for_loss,
    averaging.longest_grid,
    averaging.parabola_average,
    averaging.reach_of_peak,
    averaging.linear_average,
    averaging.sine_average_notices,
    averaging.parabola_average_notices,
)


def test_a_sine_wave_is_averaged_as_the_case_says() -> None:
    given = case("C11-01")
    for length, expected in zip(
        given.value("L_over_lambda"), given.expected["ratio"]["value"], strict=True
    ):
        assert expected == pytest.approx(averaging.sine_average(length, 1.0), abs=1e-7)


def test_the_average_is_numpys_and_scipys_sinc() -> None:
    """numpy.sinc; scipy.special.spherical_jn of order 0."""
    lengths = np.linspace(0.0, 3.0, 400)
    found = averaging.sine_average(lengths, 1.0)
    assert np.sinc(lengths) == pytest.approx(found, abs=1e-14)
    assert special.spherical_jn(0, np.pi * lengths) == pytest.approx(found, abs=1e-14)


def test_beyond_half_a_wave_more_than_a_third_is_lost() -> None:
    """scipy.integrate.quad over a cosine: 2/π is left at L = λ/2, and then the notice comes."""
    left, _ = integrate.quad(lambda x: np.cos(2 * np.pi * x), -0.25, 0.25)
    assert 2 * left == pytest.approx(averaging.sine_average(0.5, 1.0))
    assert 2 * left < 2 / 3
    assert () == averaging.sine_average_notices(0.49, 1.0)
    assert 1 == len(averaging.sine_average_notices(0.51, 1.0))


@pytest.mark.parametrize("loss", [1e-6, 1e-4, 0.01, 0.05, 0.293, 0.5, 0.9, 0.999])
def test_the_length_for_a_loss_is_where_scipy_finds_it(loss: float) -> None:
    """scipy.optimize.brentq on numpy.sinc."""
    expected = optimize.brentq(lambda x: np.sinc(x) - 1 + loss, 1e-9, 1.0, xtol=1e-14)
    assert expected == pytest.approx(averaging.length_for_loss(loss), rel=1e-8)
    assert 0.2 * expected == pytest.approx(averaging.longest_grid(0.2, loss), rel=1e-8)


def test_a_parabolic_peak_is_averaged_as_the_case_says() -> None:
    given = case("C11-06")
    length, reach = given.value("L") * 1e-3, given.value("a") * 1e-3
    given.expect("ratio", averaging.parabola_average(length, reach))


@pytest.mark.parametrize("offset", [0.0, 0.002, -0.005])
def test_a_parabolic_peak_is_averaged_as_an_integral_says(offset: float) -> None:
    """scipy.integrate.quad."""
    length, reach = 0.006, 0.020
    area, _ = integrate.quad(
        lambda x: 1 - (x / reach) ** 2, offset - length / 2, offset + length / 2
    )
    found = averaging.parabola_average(length, reach, offset)
    assert area / length == pytest.approx(found)
    noticed = averaging.parabola_average_notices(length, reach)
    assert (area / length < 0.99 and offset == 0) == bool(noticed)


def test_the_reach_of_a_peak_is_that_of_numpys_parabola() -> None:
    """numpy.polyfit through the peak and two equal falls."""
    curve = np.polyfit([-0.004, 0.0, 0.004], [0.8, 1.0, 0.8], 2)
    zero = np.roots(curve).max()
    assert zero == pytest.approx(averaging.reach_of_peak(0.004, 0.8))


def test_an_even_gradient_is_averaged_as_an_integral_says() -> None:
    """scipy.integrate.quad over a grid of 6 mm whose middle lies 5 mm off."""
    area, _ = integrate.quad(lambda x: 1e-3 - 0.04 * x, 0.002, 0.008)
    assert area / 0.006 == pytest.approx(averaging.linear_average(1e-3, -0.04, 0.005))
