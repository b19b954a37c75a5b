"""Quantities typed at the bench are understood, or refused in one sentence."""

from __future__ import annotations

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.commands.calc import quantities as q


@pytest.mark.parametrize(
    ("typed", "dimension", "value"),
    [
        ("350 ohm", q.RESISTANCE, 350.0),
        ("350Ω", q.RESISTANCE, 350.0),
        ("100 kohm", q.RESISTANCE, 100e3),
        ("12.5 GΩ", q.INSULATION, 12.5e9),
        ("12.5 Mohm", q.INSULATION, 12.5e6),
        ("0.5 mm2", q.AREA, 0.5e-6),
        ("0.5 mm²", q.AREA, 0.5e-6),
        ("350 ue", q.STRAIN, 350e-6),
        ("350 µm/m", q.STRAIN, 350e-6),
        ("−90 ue", q.STRAIN, -90e-6),
        ("0.1 %", q.STRAIN, 1e-3),
        ("20 degC", q.TEMPERATURE, 20.0),
        ("68 degF", q.TEMPERATURE, 20.0),
        ("68 °F", q.TEMPERATURE, 20.0),
        ("9 degF", q.DIFFERENCE, 5.0),
        ("35 K", q.DIFFERENCE, 35.0),
        ("6 ppm/K", q.EXPANSION, 6e-6),
        ("9 ppm/degF", q.EXPANSION, 16.2e-6),
        ("9 ppm/°F", q.EXPANSION, 16.2e-6),
        ("45 deg", q.ANGLE, math.pi / 4),
        ("0.85 mV/V", q.OUTPUT, 0.85e-3),
        ("206 GPa", q.STRESS, 206e9),
        ("1 W/in2", q.POWER_DENSITY, 1550.0031000062),
        ("5 %", q.RATIO, 0.05),
        ("2.1", q.RATIO, 2.1),
        ("1e3 ohm", q.RESISTANCE, 1000.0),
        (".5 mm", q.LENGTH, 0.5e-3),
    ],
)
def test_a_quantity_is_understood(typed: str, dimension: q.Dimension, value: float) -> None:
    assert value == pytest.approx(q.understand(typed, dimension).value, rel=1e-12)


def test_a_wire_size_is_its_area() -> None:
    # ASTM B258 table: 28 AWG has 0.0126 in diameter, 0.0804 mm² (from memory).
    assert pytest.approx(0.0810e-6, rel=5e-3) == q.understand("28 AWG", q.AREA).value


@pytest.mark.parametrize(
    ("typed", "dimension", "sentence"),
    [
        ("350", q.RESISTANCE, "the unit is missing"),
        ("350 V", q.RESISTANCE, "no unit of resistance"),
        ("350 furlongs", q.RESISTANCE, "no unit of resistance"),
        ("12.5 mohm", q.INSULATION, "milli or mega"),
        ("many ohm", q.RESISTANCE, "not a number with a unit"),
        ("nan ohm", q.RESISTANCE, "not a number with a unit"),
        ("1,5 ohm", q.RESISTANCE, "no unit"),
        ("1e999 ohm", q.RESISTANCE, "too large"),
        ("28 AWG", q.LENGTH, "not a length"),
        ("", q.RESISTANCE, "not a number with a unit"),
        ("5 ohm; import os", q.RESISTANCE, "no unit"),
    ],
)
def test_what_is_not_understood_is_told(typed: str, dimension: q.Dimension, sentence: str) -> None:
    with pytest.raises(q.NotUnderstood, match=sentence):
        q.understand(typed, dimension)


@given(st.text(max_size=30))
def test_any_text_is_understood_or_told(typed: str) -> None:
    try:
        found = q.understand(typed, q.RESISTANCE)
    except q.NotUnderstood:
        return
    assert math.isfinite(found.value)


@given(st.floats(min_value=1e-3, max_value=1e9))
def test_what_is_shown_can_be_typed_again(value: float) -> None:
    shown = q.show(value, q.RESISTANCE, digits=17)
    assert value == pytest.approx(q.understand(shown, q.RESISTANCE).value, rel=1e-12)
