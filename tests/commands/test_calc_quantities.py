"""Quantities typed at the bench are understood, or refused in one sentence."""

from __future__ import annotations

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.commands.calc import dimensions as d
from gaugelog.commands.calc import quantities as q


@pytest.mark.parametrize(
    ("typed", "dimension", "value"),
    [
        ("350 ohm", d.RESISTANCE, 350.0),
        ("350Ω", d.RESISTANCE, 350.0),
        ("100 kohm", d.RESISTANCE, 100e3),
        ("12.5 GΩ", d.INSULATION, 12.5e9),
        ("12.5 Mohm", d.INSULATION, 12.5e6),
        ("0.5 mm2", d.AREA, 0.5e-6),
        ("0.5 mm²", d.AREA, 0.5e-6),
        ("350 ue", d.STRAIN, 350e-6),
        ("350 µm/m", d.STRAIN, 350e-6),
        ("−90 ue", d.STRAIN, -90e-6),
        ("0.1 %", d.STRAIN, 1e-3),
        ("20 degC", d.TEMPERATURE, 20.0),
        ("68 degF", d.TEMPERATURE, 20.0),
        ("68 °F", d.TEMPERATURE, 20.0),
        ("9 degF", d.DIFFERENCE, 5.0),
        ("35 K", d.DIFFERENCE, 35.0),
        ("6 ppm/K", d.EXPANSION, 6e-6),
        ("9 ppm/degF", d.EXPANSION, 16.2e-6),
        ("9 ppm/°F", d.EXPANSION, 16.2e-6),
        ("45 deg", d.ANGLE, math.pi / 4),
        ("0.85 mV/V", d.OUTPUT, 0.85e-3),
        ("206 GPa", d.STRESS, 206e9),
        ("1 W/in2", d.POWER_DENSITY, 1550.0031000062),
        ("5 %", d.RATIO, 0.05),
        ("2.1", d.RATIO, 2.1),
        ("1e3 ohm", d.RESISTANCE, 1000.0),
        (".5 mm", d.LENGTH, 0.5e-3),
    ],
)
def test_a_quantity_is_understood(typed: str, dimension: d.Dimension, value: float) -> None:
    assert value == pytest.approx(q.understand(typed, dimension).value, rel=1e-12)


def test_a_wire_size_is_its_area() -> None:
    # ASTM B258 table: 28 AWG has 0.0126 in diameter, 0.0804 mm² (from memory).
    assert pytest.approx(0.0810e-6, rel=5e-3) == q.understand("28 AWG", d.AREA).value


@pytest.mark.parametrize(
    ("typed", "dimension", "sentence"),
    [
        ("350", d.RESISTANCE, "the unit is missing"),
        ("350 V", d.RESISTANCE, "no unit of resistance"),
        ("350 furlongs", d.RESISTANCE, "no unit of resistance"),
        ("12.5 mohm", d.INSULATION, "milli or mega"),
        ("many ohm", d.RESISTANCE, "not a number with a unit"),
        ("nan ohm", d.RESISTANCE, "not a number with a unit"),
        ("1,5 ohm", d.RESISTANCE, "decimal point"),
        ("1e999 ohm", d.RESISTANCE, "too large"),
        ("28 AWG", d.LENGTH, "wire size; length is asked for, like 3 mm"),
        ("", d.RESISTANCE, "not a number with a unit"),
        ("5 ohm; import os", d.RESISTANCE, "no unit"),
    ],
)
def test_what_is_not_understood_is_told(typed: str, dimension: d.Dimension, sentence: str) -> None:
    with pytest.raises(q.NotUnderstood, match=sentence):
        q.understand(typed, dimension)


@given(st.text(max_size=30))
def test_any_text_is_understood_or_told(typed: str) -> None:
    try:
        found = q.understand(typed, d.RESISTANCE)
    except q.NotUnderstood:
        return
    assert math.isfinite(found.value)


@given(st.floats(min_value=1e-3, max_value=1e9))
def test_what_is_shown_can_be_typed_again(value: float) -> None:
    shown = q.show(value, d.RESISTANCE, digits=17)
    assert value == pytest.approx(q.understand(shown, d.RESISTANCE).value, rel=1e-12)
