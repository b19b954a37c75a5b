"""What is typed beside plain quantities: widths, lists of pairs, words; and units of one kind."""

from __future__ import annotations

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.commands.calc import dimensions as d
from gaugelog.commands.calc.lists import pairs, zero_steps
from gaugelog.commands.calc.quantities import NotUnderstood, show, understand
from gaugelog.commands.calc.stated import stated
from gaugelog.physics.estimates import Shape


@pytest.mark.parametrize(
    ("typed", "value", "uncertainty", "shape"),
    [
        ("2.05", 2.05, 0.0, Shape.RECTANGULAR),
        ("2.05 ± 0.01", 2.05, 0.01 / math.sqrt(3), Shape.RECTANGULAR),
        ("2.05 +- 1 %", 2.05, 0.0205 / math.sqrt(3), Shape.RECTANGULAR),
        ("2.05 +/- 0.01 triangular", 2.05, 0.01 / math.sqrt(6), Shape.TRIANGULAR),
        ("2.05 ± 0.01 arcsine", 2.05, 0.01 / math.sqrt(2), Shape.ARCSINE),
        ("2.05 ± 0.01 normal", 2.05, 0.01, Shape.NORMAL),
        ("2.05 ± 0.01 k=2", 2.05, 0.005, Shape.NORMAL),
        ("0.6 % ± 0.2 %", 0.006, 0.002 / math.sqrt(3), Shape.RECTANGULAR),
        ("± 1 %", 2.0, 0.02 / math.sqrt(3), Shape.RECTANGULAR),
    ],
)
def test_a_width_is_of_the_value_unless_the_value_is_a_share(
    typed: str, value: float, uncertainty: float, shape: Shape
) -> None:
    found = stated(d.RATIO)(typed)[0].around(2.0)
    assert value == pytest.approx(found.value)
    assert shape is found.shape
    assert uncertainty == pytest.approx(found.uncertainty)


def test_few_readings_have_degrees_of_freedom() -> None:
    found, told = stated(d.STRAIN)("5 ue ± 1 ue normal dof=3")
    assert 3 == found.around(0.0).dof
    assert "5 µm/m ± 1 µm/m (normal) with 3 degrees of freedom" == told


def test_a_width_about_nothing_is_taken_as_it_stands() -> None:
    assert 0.01 / math.sqrt(3) == pytest.approx(stated(d.RATIO)("± 1 %")[0].around(0.0).uncertainty)


def test_a_temperature_has_a_width_in_kelvin() -> None:
    read = stated(d.TEMPERATURE, d.DIFFERENCE)
    assert "23 °C ± 2 K (rectangular)" == read("23 degC ± 2 K")[1]
    with pytest.raises(NotUnderstood, match="temperature difference"):
        read("23 degC ± 2 %")


@pytest.mark.parametrize(
    "typed", ["±", "2 ±", "2 ± -1", "2 ± 1 k=0", "2 ± x", "2 ± 1 round", "", "normal"]
)
def test_a_width_that_is_none_is_told(typed: str) -> None:
    with pytest.raises(NotUnderstood):
        stated(d.RATIO)(typed)


@given(st.text(max_size=30))
def test_any_width_is_understood_or_told(typed: str) -> None:
    try:
        found, _ = stated(d.RESISTANCE)(typed)
    except NotUnderstood:
        return
    assert math.isfinite(found.width)


def test_pairs_are_read_in_order() -> None:
    found, told = pairs(d.TEMPERATURE, d.TIME)("24 degC = 24 h, 122 degF=2 h")
    assert [24.0, 86400.0, 50.0, 7200.0] == pytest.approx([*found[0], *found[1]])
    assert "24 °C = 24 h, 50 °C = 2 h" == told


@pytest.mark.parametrize("typed", ["24 degC", "24 = 5 h", "24 degC = 5", "24 degC = 5 h,"])
def test_a_pair_that_is_none_is_told(typed: str) -> None:
    with pytest.raises(NotUnderstood):
        pairs(d.TEMPERATURE, d.TIME)(typed)


def test_a_stroke_within_a_unit_does_not_part_two_zeros() -> None:
    steps, told = zero_steps("2 V = 0 um/m / 1 um/m")
    assert [2.0, 0.0, 1e-6] == pytest.approx(list(steps[0]))
    assert "2 V = 0 µm/m / 1 µm/m" == told


@pytest.mark.parametrize(
    ("typed", "dimension"),
    [
        ("0.85 mV/V", d.STRAIN),
        ("850 ue", d.OUTPUT),
        ("5 deg", d.STRAIN),
        ("5 %", d.ANGLE),
        ("5 deg", d.RATIO),
        ("5 ue", d.HUMIDITY),
        ("5 V", d.RATIO),
    ],
)
def test_one_bare_ratio_is_not_taken_for_another(typed: str, dimension: d.Dimension) -> None:
    with pytest.raises(NotUnderstood, match="is no unit of"):
        understand(typed, dimension)


@pytest.mark.parametrize(
    ("typed", "dimension", "value"),
    [
        ("20 ue/mm", d.GRADIENT, 0.02),
        ("0.01 %/K", d.EXPANSION, 1e-4),
        ("5e-6 /K", d.EXPANSION, 5e-6),
        ("5e-6 1/degF", d.EXPANSION, 9e-6),
        ("8 nV/Hz^0.5", d.NOISE_DENSITY, 8e-9),
        ("10 Mpsi", d.MODULUS, 68.94757e9),
        ("10 kNm", d.TORQUE, 1e4),
        ("1 t/m^3", d.DENSITY, 1000.0),
        ("20 μm/m", d.STRAIN, 20e-6),  # the Greek letter, not the micro sign
        ("350 Ω", d.RESISTANCE, 350.0),  # the ohm sign, not the Greek letter
        ("1 in", d.LENGTH, 0.0254),
    ],
)
def test_compound_and_look_alike_units_are_understood(
    typed: str, dimension: d.Dimension, value: float
) -> None:
    assert value == pytest.approx(understand(typed, dimension).value)


def test_below_absolute_zero_nothing_is_measured() -> None:
    with pytest.raises(NotUnderstood, match="absolute zero"):
        understand("-300 degC", d.TEMPERATURE)


@pytest.mark.parametrize(
    ("value", "dimension", "told"),
    [
        (90.0, d.TIME, "1.5 min"),
        (86400.0, d.TIME, "24 h"),
        (20.0, d.TIME, "20 s"),
        (12.5e9, d.INSULATION, "12.5 GΩ"),
        (0.785398163, d.ANGLE, "45°"),
        (-0.0, d.STRESS, "0 MPa"),
        (2e-5, d.THICKNESS, "20 µm"),
    ],
)
def test_a_value_is_shown_in_the_unit_that_suits_its_size(
    value: float, dimension: d.Dimension, told: str
) -> None:
    assert told == show(value, dimension)


def test_a_share_is_shown_as_it_was_typed() -> None:
    assert "5 %" == understand("5 %", d.RATIO).shown
    assert "0.05" == understand("0.05", d.RATIO).shown
