"""Transverse sensitivity: what is put on comes off again, in any pattern and by any formula."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from math import nan, pi
from typing import Any

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from uncertainties import ufloat

from gaugelog.physics import plane, rosette, transverse
from gaugelog.physics.plane import PlaneStrain
from gaugelog.physics.validity import OutOfDomain
from tests.physics.kinds import assert_takes_every_kind

STRAIN = st.floats(-2e-3, 2e-3)
KT = st.floats(-0.1, 0.1)
POISSON = st.floats(0.2, 0.35)
RATIO = st.floats(-3.0, 3.0)


def _readings(state: PlaneStrain, angles: Sequence[float], kts: Sequence[float]) -> list[float]:
    """What grids at `angles` read of a state, each with its own sensitivity."""
    return [
        transverse.indicated_strain(
            plane.strain_along(state, angle), plane.strain_along(state, angle + pi / 2), kt
        )
        for angle, kt in zip(angles, kts, strict=True)
    ]


@given(STRAIN, KT, POISSON)
def test_on_the_calibration_beam_a_grid_reads_right(
    strain: float, kt: float, poisson: float
) -> None:
    shown = transverse.indicated_strain(strain, -poisson * strain, kt, poisson)
    assert strain == pytest.approx(shown, abs=1e-18)
    assert 0.0 == transverse.uncorrected_error(kt, -poisson, poisson)


@given(STRAIN, RATIO, KT)
def test_one_grid_comes_back_where_the_biaxiality_is_known(
    strain: float, ratio: float, kt: float
) -> None:
    shown = transverse.indicated_strain(strain, ratio * strain, kt)
    assert strain == pytest.approx(transverse.single_grid_strain(shown, kt, ratio), abs=1e-17)
    error = strain * transverse.uncorrected_error(kt, ratio)
    assert shown - strain == pytest.approx(error, abs=1e-17)


@given(STRAIN, STRAIN, KT, KT)
def test_a_tee_comes_back(along: float, across: float, one: float, two: float) -> None:
    readings = _readings(PlaneStrain(along, across, 0.0), (0.0, pi / 2), (one, two))
    found = transverse.tee_strains((readings[0], readings[1]), (one, two))
    assert [along, across] == pytest.approx(list(found), abs=1e-15)


@given(STRAIN, STRAIN, STRAIN, st.lists(KT, min_size=5, max_size=5))
def test_any_grids_come_back_with_their_own_sensitivities(
    x: float, y: float, shear: float, kts: list[float]
) -> None:
    state, angles = PlaneStrain(x, y, shear), [0.0, 0.5, 1.1, 1.9, 2.6]
    for count in (3, 4, 5):
        readings = _readings(state, angles[:count], kts[:count])
        found = transverse.corrected_state(readings, angles[:count], kts[:count])
        assert [x, y, shear] == pytest.approx([found.x, found.y, found.shear], abs=1e-14)


@given(STRAIN, STRAIN, STRAIN, KT)
def test_the_closed_forms_are_the_general_one_for_their_pattern(
    one: float, two: float, three: float, kt: float
) -> None:
    for formula, pattern in (
        (transverse.rectangular_strains, "rectangular"),
        (transverse.delta_strains, "delta"),
    ):
        angles = rosette.grid_angles(pattern)
        general = transverse.corrected_strains([one, two, three], angles, [kt] * 3)
        assert list(general) == pytest.approx(list(formula((one, two, three), kt)), abs=1e-15)


@given(STRAIN, KT)
def test_a_shear_pair_comes_back(shear: float, kt: float) -> None:
    readings = _readings(PlaneStrain(0.0, 0.0, shear), (pi / 4, -pi / 4), (kt, kt))
    found = (readings[0] - readings[1]) * transverse.shear_pair_factor(kt)
    assert shear == pytest.approx(found, abs=1e-17)


def test_what_a_spare_grid_disagrees_by_stays_in_the_corrected_strains() -> None:
    angles = [0.0, pi / 4, pi / 2, 3 * pi / 4]
    strains = transverse.corrected_strains([4e-4, 3e-4, -2e-4, -8.5e-5], angles, [0.02] * 4)
    fit = rosette.fit_rosette(strains, angles)
    assert fit.scatter is not None
    assert 7.5e-6 == pytest.approx(fit.scatter * (1 - 0.02) / (1 - 0.285 * 0.02), rel=1e-9)


def test_without_sensitivity_nothing_changes() -> None:
    readings = (4e-4, 3e-4, -2e-4)
    assert readings == transverse.rectangular_strains(readings, 0.0)
    assert readings == pytest.approx(transverse.delta_strains(readings, 0.0))
    angles = rosette.grid_angles("delta")
    assert readings == transverse.corrected_strains(readings, angles, [0.0] * 3)


def test_every_formula_takes_floats_arrays_and_uncertain_numbers() -> None:
    angles = [0.0, 0.9, 2.0]

    def general(*given: float) -> object:
        return transverse.corrected_state(given[:3], angles, given[3:]).shear

    assert_takes_every_kind(transverse.indicated_strain, 4e-4, -2e-4, 0.01)
    assert_takes_every_kind(transverse.single_grid_strain, 4e-4, 0.01, -0.5)
    assert_takes_every_kind(transverse.uncorrected_error, 0.01, -0.5)
    assert_takes_every_kind(transverse.shear_pair_factor, 0.01)
    assert_takes_every_kind(
        lambda *given: transverse.rectangular_strains(given[:3], given[3])[1],
        *(4e-4, 3e-4, -2e-4, 0.01),
    )
    assert_takes_every_kind(general, 4e-4, 3e-4, -2e-4, 0.01, 0.02, -0.01)


def test_arrays_of_readings_and_uncertain_sensitivities_go_together() -> None:
    readings = [np.array([4e-4, 1e-4]), np.array([3e-4, 2e-4]), np.array([-2e-4, 5e-5])]
    kts = [ufloat(0.01, 0.002), 0.01, 0.01]
    found = transverse.corrected_strains(readings, rosette.grid_angles("delta"), kts)
    plain = transverse.delta_strains((4e-4, 3e-4, -2e-4), 0.01)
    assert plain[0] == pytest.approx(found[0][0].nominal_value, abs=1e-16)
    assert found[0][0].std_dev > 0


TRIPLE = (1e-4, 2e-4, 3e-4)
PAIR: Any = TRIPLE[:2]


@pytest.mark.parametrize(
    ("call", "sentence"),
    [
        (lambda: transverse.indicated_strain(nan, 0.0, 0.01), "along must be a finite"),
        (lambda: transverse.indicated_strain(0.0, 0.0, 0.5), "transverse sensitivity must lie"),
        (lambda: transverse.indicated_strain(0.0, 0.0, 0.1, nan), "poisson must be a finite"),
        (lambda: transverse.shear_pair_factor(0.1, 0.6), "poisson must lie between -1 and 0.5"),
        (lambda: transverse.shear_pair_factor(-0.5), "transverse sensitivity must lie"),
        (lambda: transverse.single_grid_strain(0.0, 0.1, nan), "biaxiality must be a finite"),
        (lambda: transverse.uncorrected_error(nan, 0.0), "transverse sensitivity must be a finite"),
        (lambda: transverse.tee_strains((nan, 0.0), (0.0, 0.0)), "reading 1 must be a finite"),
        (lambda: transverse.delta_strains((0.0, 0.0, nan), 0.1), "reading 3 must be a finite"),
        (lambda: transverse.rectangular_strains(PAIR, 0.1), "readings must be three, not 2"),
        (
            lambda: transverse.corrected_state(TRIPLE, [0.0, 1.0, 2.0], [0.01]),
            "sensitivities must be one for each",
        ),
        (
            lambda: transverse.corrected_state(TRIPLE, [0.0, 0.0, 2.0], [0.01] * 3),
            "angles must hold three different directions",
        ),
        (
            lambda: transverse.corrected_state([1e-4, nan, 0.0], [0.0, 1.0, 2.0], [0.01] * 3),
            "reading 2 must be a finite",
        ),
    ],
)
def test_what_cannot_be_is_refused_by_name(call: Callable[[], object], sentence: str) -> None:
    with pytest.raises(OutOfDomain, match=f"^{sentence}"):
        call()
