"""One name for each function of mathematics, whatever kind of number comes."""

from __future__ import annotations

import math
import subprocess
import sys

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from uncertainties import ufloat, unumpy

from gaugelog.physics import _maths
from tests.physics.kinds import assert_takes_every_kind

SINGLE = {
    "sin": math.sin,
    "cos": math.cos,
    "tan": math.tan,
    "arcsin": math.asin,
    "arccos": math.acos,
    "arctan": math.atan,
    "sqrt": math.sqrt,
    "exp": math.exp,
    "expm1": math.expm1,
    "log": math.log,
    "log1p": math.log1p,
    "log10": math.log10,
}


@pytest.mark.parametrize("name", SINGLE)
def test_each_function_is_the_standard_librarys(name: str) -> None:
    for value in (0.1, 0.5, 0.9):
        assert SINGLE[name](value) == getattr(_maths, name)(value)


@pytest.mark.parametrize("name", SINGLE)
def test_each_function_takes_every_kind_of_number(name: str) -> None:
    assert_takes_every_kind(getattr(_maths, name), 0.4)


@pytest.mark.parametrize("name", ["arctan2", "hypot"])
def test_functions_of_two_take_every_kind_of_number(name: str) -> None:
    assert_takes_every_kind(getattr(_maths, name), 0.4, -0.7)


def test_arrays_of_uncertain_numbers_go_through() -> None:
    values = unumpy.uarray([0.3, 0.4], [0.01, 0.02])
    found = _maths.sin(values)
    assert math.sin(0.3) == pytest.approx(found[0].nominal_value)
    assert 0.02 * math.cos(0.4) == pytest.approx(found[1].std_dev)
    assert [0.3, 0.4] == pytest.approx(list(_maths.nominal(values)))


@given(st.floats(-10, 10), st.floats(-10, 10))
def test_the_quadrant_is_right(x: float, y: float) -> None:
    angle = _maths.arctan2(y, x)
    length = _maths.hypot(x, y)
    assert x == pytest.approx(length * _maths.cos(angle), abs=1e-9)
    assert y == pytest.approx(length * _maths.sin(angle), abs=1e-9)


def test_a_magnitude_has_no_sign() -> None:
    assert 2.0 == _maths.magnitude(-2.0)
    assert [2.0, 3.0] == list(_maths.magnitude(np.array([-2.0, 3.0])))
    assert_takes_every_kind(_maths.magnitude, -0.4)


def test_a_condition_chooses_one_or_element_by_element() -> None:
    assert 1.0 == _maths.where(True, 1.0, 2.0)
    assert 2.0 == _maths.where(False, 1.0, 2.0)
    assert [1.0, 2.0] == list(_maths.where(np.array([True, False]), 1.0, 2.0))


def test_nominal_leaves_the_uncertainty_aside() -> None:
    assert 3.0 == _maths.nominal(ufloat(3.0, 0.1))
    assert 3.0 == _maths.nominal(3.0)


def test_the_formulas_load_no_array_library_for_one_figure() -> None:
    program = (
        "import sys\n"
        "from gaugelog.physics import bridge, circuit, prediction, leads, shunt, leakage, pins\n"
        "prediction.output(circuit.circuit_of('full bending', 6, 350.0, 2.0, 1.0))\n"
        "print(*({'numpy', 'uncertainties', 'scipy'} & set(sys.modules)))\n"
    )
    done = subprocess.run(
        [sys.executable, "-c", program], capture_output=True, text=True, check=False
    )
    assert "" == done.stderr
    assert "" == done.stdout.strip()
