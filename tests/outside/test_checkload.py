"""A directional check load held to Hooke's law and to every order tried in turn."""

from __future__ import annotations

from itertools import permutations
from math import radians

import numpy as np
import pytest

from gaugelog.physics import checkload, rosette

CHECKS = (
    checkload.uniaxial_readings,
    checkload.explaining_orders,
    checkload.exchanged_grids,
    checkload.order_sentence,
)


def test_a_uniaxial_check_is_the_compliance_of_hookes_law_turned() -> None:
    # Independent program: NumPy, strain tensor of uniaxial stress projected on each grid.
    modulus, poisson, axis = 206e9, 0.3, 0.35
    pulled = np.array([np.cos(axis), np.sin(axis)])
    stress = 61.8e6 * np.outer(pulled, pulled)
    strain = ((1 + poisson) * stress - poisson * np.trace(stress) * np.eye(2)) / modulus
    angles = [radians(each) for each in (0.0, 45.0, 90.0, 200.0)]
    ways = [np.array([np.cos(angle), np.sin(angle)]) for angle in angles]
    wanted = [way @ strain @ way for way in ways]
    found = checkload.uniaxial_readings(61.8e6 / modulus, poisson, angles, axis)
    assert wanted == pytest.approx(list(found))


def test_a_directional_check_load_finds_grids_1_and_3_exchanged() -> None:
    # Hooke's law: uniaxial +300 along grid 1 with ν = 0.3 expects 300, 105, −90 µm/m.
    angles = rosette.grid_angles("rectangular")
    expected = [1e6 * each for each in checkload.uniaxial_readings(300e-6, 0.3, angles)]
    assert [300.0, 105.0, -90.0] == pytest.approx(expected)
    orders = checkload.explaining_orders([-90.0, 105.0, 300.0], expected, 10.0)
    assert ((3, 2, 1),) == orders
    assert (3, 2, 1) == checkload.exchanged_grids([-90.0, 105.0, 300.0], expected, 10.0)
    assert "grids 1 and 3 exchanged" == checkload.order_sentence(orders)


def test_the_orders_found_are_those_of_every_order_tried_in_turn() -> None:
    # Independent program: itertools.permutations, all of them, on 300 random check loads.
    random = np.random.default_rng(5)
    for _ in range(300):
        count = int(random.integers(2, 6))
        expected = random.integers(-4, 5, count) * 50.0
        readings = random.permutation(expected) + random.normal(0, 20, count)
        wanted = {
            order
            for order in permutations(range(1, count + 1))
            if all(abs(readings[i] - expected[grid - 1]) <= 30.0 for i, grid in enumerate(order))
        }
        found = checkload.explaining_orders(list(readings), list(expected), 30.0)
        assert len(found) == len(wanted)
        assert wanted == set(found)
