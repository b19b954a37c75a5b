"""Large strain, held to a wire of constant volume and to identities of the textbooks."""

from __future__ import annotations

import numpy as np
import pytest
from scipy import integrate, optimize

from gaugelog.physics import largestrain

CHECKS = (
    largestrain.factor_at_strain,
    largestrain.large_change,
    largestrain.large_strain,
    largestrain.large_strain_of_indicated,
    largestrain.large_change_notices,
    largestrain.factor_at_strain_notices,
)


@pytest.mark.parametrize("strain", [-0.1, 0.02, 0.1, 0.2])
def test_the_change_is_that_of_a_wire_drawn_out(strain: float) -> None:
    """scipy.integrate.solve_ivp: dR/R = 2 dL/L for constant volume and resistivity."""
    drawn = integrate.solve_ivp(
        lambda length, resistance: 2 * resistance / length,
        (1.0, 1.0 + strain),
        [1.0],
        rtol=1e-11,
        atol=1e-13,
    )
    expected = drawn.y[0, -1] - 1
    assert expected == pytest.approx(largestrain.large_change(2.0, strain), rel=1e-8)
    found = largestrain.factor_at_strain(2.0, strain)
    assert expected / strain == pytest.approx(found, rel=1e-8)


def test_the_factor_at_ten_per_cent_is_that_of_the_textbook() -> None:
    """Dally and Riley, post-yield grids: K = 2 + ε for annealed constantan (from memory)."""
    assert 2.1 == pytest.approx(largestrain.factor_at_strain(2.0, 0.1))
    assert () == largestrain.factor_at_strain_notices(0.01)
    assert "has grown by 5.0%" in largestrain.factor_at_strain_notices(0.1)[0].message


@pytest.mark.parametrize("change", [-0.3, 0.05, 0.21, 0.6])
@pytest.mark.parametrize("factor", [2.0, 2.12])
def test_strain_is_where_scipy_finds_the_change(change: float, factor: float) -> None:
    """scipy.optimize.brentq on K ε + ε²."""
    expected = optimize.brentq(lambda e: factor * e + e**2 - change, -0.5, 1.0, xtol=1e-14)
    assert expected == pytest.approx(largestrain.large_strain(factor, change), rel=1e-10)


@pytest.mark.parametrize("strain", [-0.15, 0.03, 0.1, 0.2])
def test_a_quarter_bridge_of_factor_two_shows_a_hyperbolic_tangent(strain: float) -> None:
    """Identity: (u² − 1)/(u² + 1) = tanh(ln u), so the reading is tanh of the true strain.

    numpy.tanh; u = 1 + ε. Handbooks say that it is near the true strain (from memory).
    """
    shown = float(np.tanh(np.log1p(strain)))
    assert strain == pytest.approx(largestrain.large_strain_of_indicated(shown, 2.0, 2.0))
    assert np.log1p(strain) == pytest.approx(shown, rel=0.015)


def test_limits_of_annealed_grids_are_kept() -> None:
    """Common practice: annealed constantan on polyimide to 5 % short, 10 % and more long grids."""
    assert () == largestrain.large_change_notices(0.05, 0.05)
    assert 1 == len(largestrain.large_change_notices(0.051, 0.05))
    assert () == largestrain.large_change_notices(0.10, 0.10)
