"""Each subject gives figures that a published source printed, or that its formula gives.

Sources and tolerances stand in `tests/outside/cases.json`; the others are named beside the row.
"""

from __future__ import annotations

import math

import pytest

from gaugelog.commands.calc.sources import name_of, source_of
from gaugelog.commands.calc.subjects import SUBJECTS
from tests.commands.calculated import answer, shown, value
from tests.outside.cases import case

MICRO, DEGREES, MEGA = 1e6, 180 / math.pi, 1e-6
PSI = 6894.757293168
SHAFT = {"diameter": "50 mm", "shear_modulus": "79.3 GPa", "torque": "500 N*m"}
DELTA = {"pattern": "delta", "readings": "1018, 224, -1527 ue"}
DRILLED = {
    "readings": "-180, -150, -60 ue",
    "a_bar": "0.158",
    "b_bar": "0.454",
    "modulus": "200 GPa",
    "poisson": "0.3",
}
GRID = {"length": "3 mm", "width": "3 mm"}

CASES: list[tuple[str, str, float, str, str, dict[str, str]]] = [
    (
        *("C02-03", "actual", MICRO, "bridge", "actual strain"),
        {"arrangement": "quarter three-wire", "output": "7.5 mV/V"},
    ),
    (
        *("C02-12", "out", 2e3, "bridge", "output"),
        {"arrangement": "opposite arms", "strain": "1000 ue"},
    ),
    ("C02-15", "out", 1e4, "bridge", "output", {"arms": "350.7, 349.2, 350.1, 350.9 ohm"}),
    (
        *("C03-08", "effective_GF", 1, "leads", "factor to set"),
        {"layout": "quarter two-wire", "resistance": "120 ohm", "loop": "2 ohm"},
    ),
    (
        *("C03-07", "indicated", MICRO, "leads", "drift with the rise"),
        {"layout": "quarter two-wire", "resistance": "120 ohm", "loop": "2.6778 ohm"},
    ),
    (
        *(
            "C04-08",
            "indicated",
            MICRO,
            "shunt",
            "indicated, shunt from signal+ tab to supply- tab",
        ),
        {
            "shunt": "174650 ohm",
            "between": "signal+ tab to supply- tab",
            "wire": "2 ohm",
            "wires": "3",
        },
    ),
    ("C04-09", "mV_per_V", 1e3, "shunt", "change of output", {"shunt": "100 kohm"}),
    (
        *("C05-01", "error", MICRO, "leakage", "drift to the later value"),
        {"resistance": "120 ohm", "insulation": "1000 Mohm", "later": "10 Mohm"},
    ),
    ("C05-02", "error", MICRO, "leakage", "apparent strain", {"insulation": "10 Mohm"}),
    (
        *("C06-03", "thermal_output", MICRO, "thermal", "thermal output"),
        {"temperature": "43 degC", "article": "23.6 ppm/K", "matched": "11.7 ppm/K"},
    ),
    (
        *("C06-05", "thermal_output", MICRO, "thermal", "thermal output"),
        {
            "temperature": "73 degC",
            "grid_coefficient": "-10 ppm/K",
            "factor": "2.1",
            "article": "11.7 ppm/K",
            "grid_expansion": "15 ppm/K",
            "transverse": "1 %",
        },
    ),
    (
        *("C06-07", "adjusted", MICRO, "thermal", "thermal output"),
        {
            "temperature": "24 degC",
            "reference": "23 degC",
            "polynomial": "0, -70",
            "setting": "2.1",
        },
    ),
    (
        *("C07-03", "error_percent", 100, "transverse", "error if left, of the strain"),
        {"grids": "single", "transverse": "3 %", "biaxiality": "-0.33"},
    ),
    (
        *("C07-01", "corrected_1", MICRO, "transverse", "grid 1, corrected"),
        {"grids": "delta", "transverse": "2 %", "readings": "1018, 224, -1527 ue"},
    ),
    (
        *("C07-09", "factor", 1, "transverse", "multiply the shear by"),
        {"grids": "shear pair", "transverse": "1 %"},
    ),
    ("C08-06", "e1", MICRO, "rosette", "largest principal strain", DELTA),
    ("C08-06", "e2", MICRO, "rosette", "smallest principal strain", DELTA),
    (
        *("C08-06", "s2", 1 / PSI, "rosette", "smallest principal stress"),
        {**DELTA, "modulus": "10 Mpsi", "poisson": "0.32"},
    ),
    (
        *("C08-10", "theta_p1", DEGREES, "rosette", "direction of the largest, from grid 1"),
        {"angles": "0, 60, 120 deg", "readings": "800, -200, 625 ue"},
    ),
    (
        *("C09-03", "error_percent", 100, "placement", "error, of the strain meant"),
        {"what": "turned", "off": "3 deg", "poisson": "0.3"},
    ),
    (
        *("C11-06", "ratio", 1, "placement", "part of the peak shown"),
        {"what": "peak", "length": "6 mm", "reach": "20 mm"},
    ),
    (
        *("C10-01", "P", 1e3, "excitation", "heat in the grid"),
        {**GRID, "supply": "5 V"},
    ),
    (
        *("C10-04", "density", 1e-3, "excitation", "heat on its area"),
        {**GRID, "supply": "5 V"},
    ),
    (
        *("C11-03", "f", 1e-3, "wave", "highest frequency for the loss"),
        {"length": "3 mm", "speed": "5000 m/s", "loss": "1 %"},
    ),
    (
        *("C11-05", "c", 1, "wave", "speed of the wave"),
        {"modulus": "200 GPa", "density": "7850 kg/m3"},
    ),
    (
        *("C15-01", "T", 1e-3, "load", "torque"),
        {
            "what": "shaft",
            "diameter": "96 mm",
            "angle": "20 deg",
            "shear_modulus": "27 GPa",
            "strain": "400 ue",
        },
    ),
    (
        *("C15-05", "p", 1 / PSI, "load", "pressure"),
        {
            "what": "thin cylinder",
            "radius": "200 in",
            "wall": "1 in",
            "axial": "170 ue",
            "modulus": "10 Mpsi",
            "poisson": "0.33",
        },
    ),
    (
        *("C15-06", "E", 1e-9, "load", "modulus of elasticity"),
        {"what": "bar", "load": "15 N", "strain": "2.75 ue", "area": "314.159265 mm2"},
    ),
    (
        *("C15-08", "P", 1, "load", "load"),
        {
            "what": "cantilever pair",
            "modulus": "208 GPa",
            "width": "30 mm",
            "depth": "5 mm",
            "spacing": "200 mm",
            "nearer_root": "1200 ue",
            "nearer_load": "900 ue",
        },
    ),
    ("C15-10", "gamma", MICRO, "load", "shear strain", {"what": "shaft", **SHAFT}),
    (
        *("C15-11", "strain", MICRO, "load", "strain along the beam"),
        {
            "what": "four-point",
            "width": "30 mm",
            "depth": "6 mm",
            "load": "200 N",
            "arm": "100 mm",
            "modulus": "200 GPa",
        },
    ),
    (
        *("C15-12", "strain", MICRO, "load", "strain round the vessel"),
        {
            "what": "thin sphere",
            "pressure": "2 MPa",
            "radius": "500 mm",
            "wall": "10 mm",
            "modulus": "200 GPa",
            "poisson": "0.3",
        },
    ),
    ("C14-05", "P", MEGA, "holedrill", "P, mean stress", DRILLED),
    ("C14-05", "s_min", MEGA, "holedrill", "smallest stress", DRILLED),
]


@pytest.mark.parametrize(
    ("identifier", "key", "scale", "subject", "figure", "typed"),
    CASES,
    ids=[f"{row[3]} {row[0]} {row[1]}" for row in CASES],
)
def test_a_published_figure_comes_out(
    identifier: str, key: str, scale: float, subject: str, figure: str, typed: dict[str, str]
) -> None:
    case(identifier).expect(key, scale * value(figure, subject, **typed))


PRINTED: list[tuple[str, str, dict[str, str], dict[str, str]]] = [
    (
        "a rectangular rosette on steel, as the issue of this project has it",
        "rosette",
        {
            "readings": "400, 300, -200 ue",
            "pattern": "rectangular",
            "modulus": "206 GPa",
            "poisson": "0.3",
        },
        {
            "largest principal strain": "460.56 µm/m",
            "smallest principal strain": "-260.56 µm/m",
            "direction of the largest, from grid 1": "16.85°",
            "largest principal stress": "86.56 MPa",
            "smallest principal stress": "-27.71 MPa",
            "stress along 0°": "76.97 MPa",
        },
    ),
    (
        "the same with grids 1 and 3 exchanged",
        "rosette",
        {
            "readings": "-200, 300, 400 ue",
            "pattern": "rectangular",
            "modulus": "206 GPa",
            "poisson": "0.3",
        },
        {
            "direction of the largest, from grid 1": "73.15°",
            "stress along 0°": "-18.11 MPa",
        },
    ),
    (
        "its check load",
        "rosette",
        {
            "what": "check",
            "readings": "-90, 105, 300 ue",
            "pattern": "rectangular",
            "strain": "300 ue",
            "poisson": "0.3",
        },
        {
            "grid 1 should read": "300 µm/m",
            "grid 2 should read": "105 µm/m",
            "grid 3 should read": "-90 µm/m",
            "answer": "grids 1 and 3 exchanged",
        },
    ),
    (
        "IEC 60228:2004, class 2, 0.5 mm²: 36.0 Ω/km",
        "leads",
        {
            "layout": "full four-wire",
            "length": "1 km",
            "area": "0.5 mm2",
            "conductor": "class 2",
        },
        {"one wire": "36 Ω"},
    ),
    (
        "an instrument maker's table of shunts, K = 2, 350 Ω: 174 650 Ω stands for 1000 µm/m",
        "shunt",
        {"strain": "1000 ue"},
        {"shunt for exactly that": "174650 Ω", "nearest of the E96 series": "174000 Ω"},
    ),
    (
        "ASTM E837, through hole, type A, hole 0.4 of the circle: 0.158 and 0.454 (from memory)",
        "holedrill",
        {**DRILLED, "a_bar": "", "b_bar": "", "hole": "2 mm", "circle": "5 mm"},
        {"ā of the through hole": "0.1581", "b̄ of the through hole": "0.45425"},
    ),
    (
        "the printed table of dew points: 20 °C and 50 % give 9.3 °C (from memory)",
        "dewpoint",
        {"air": "20 degC", "humidity": "50 %"},
        {"dew point": "9.255 °C"},
    ),
    (
        "a rate that doubles over ten kelvin about 298 K has 53 kJ/mol (Atkins): E/R about 6370 K",
        "cure",
        {
            "temperature": "25 degC",
            "schedule": "25 degC = 2 h, 35 degC = 1 h",
            "interpolate": "yes",
        },
        {"activation energy over R": "6368.3 K"},
    ),
    (
        "JCGM 100:2008, 4.3.7: anywhere within ±1 leaves 0.577",
        "budget",
        {"strain": "1 ue", "zero": "± 1 ue", "draws": "1000"},
        {"standard uncertainty u": "0.577 µm/m"},
    ),
    (
        "JCGM 106:2012, 7.4, motor oil: the probability of conformance is 0.66",
        "conformity",
        {"value": "13.6", "uncertainty": "1.8", "at_least": "12.5", "at_most": "16.3"},
        {"probability of conformance": "0.6626"},
    ),
    (
        "a book on tablet presses: one arm across supply or signal, 3/4 of an arm between",
        "pins",
        {"arrangement": "full bending", "wires": "4", "wire": "0 ohm"},
        {"supply+ to supply-": "350 Ω", "supply+ to signal-": "262.5 Ω"},
    ),
]


@pytest.mark.parametrize(
    ("subject", "typed", "expected"),
    [row[1:] for row in PRINTED],
    ids=[row[0] for row in PRINTED],
)
def test_figures_are_shown_as_their_source_has_them(
    subject: str, typed: dict[str, str], expected: dict[str, str]
) -> None:
    found = shown(subject, **typed)
    assert expected == {name: found[name] for name in expected}


def test_every_formula_behind_these_figures_names_its_source() -> None:
    rows = [(row[3], row[5]) for row in CASES] + [(row[1], row[2]) for row in PRINTED]
    formulas = {each for subject, typed in rows for each in answer(subject, **typed).formulas}
    assert len(formulas) > 50
    silent = [name_of(each) for each in formulas if source_of(each) == "see its docstring"]
    assert [] == silent
    assert [] == [name_of(each) for each in formulas if "`" in source_of(each)]


def test_every_subject_is_held_to_a_source() -> None:
    assert set(SUBJECTS) == {row[3] for row in CASES} | {row[1] for row in PRINTED}
