"""`gaugelog calc` on loads, waves, heat, noise, drilled holes, dew and cure."""

from __future__ import annotations

import pytest

from tests.commands.calculated import answer, faults, places, shown, value

BEAM = {"modulus": "200 GPa", "width": "20 mm", "depth": "5 mm"}
SHAFT = {"what": "shaft", "diameter": "50 mm", "modulus": "200 GPa", "poisson": "0.3"}
VESSEL = {
    "what": "thin cylinder",
    "radius": "500 mm",
    "wall": "10 mm",
    "modulus": "200 GPa",
    "poisson": "0.3",
}
GRID = {"length": "3 mm", "width": "2.5 mm"}
RUN = (
    "0 kN = 0 mV/V, 5 kN = 1.0 mV/V, 10 kN = 2.0 mV/V, 5 kN = 1.001 mV/V; "
    "0 kN = 0 mV/V, 5 kN = 1.002 mV/V, 10 kN = 2.001 mV/V"
)
DRILLED = {"readings": "-180, -150, -60 ue", "modulus": "200 GPa", "poisson": "0.3"}
SHEET = "24 degC = 24 h, 50 degC = 2 h"


@pytest.mark.parametrize(
    ("kind", "placed"),
    [
        ("cantilever", {"distance": "100 mm"}),
        ("supported beam", {"span": "1 m", "load_at": "0.5 m", "gauge_at": "0.3 m"}),
        ("four-point", {"arm": "100 mm"}),
    ],
)
def test_a_beams_load_and_strain_go_both_ways(kind: str, placed: dict[str, str]) -> None:
    strain = shown("load", what=kind, **BEAM, **placed, load="123 N")["strain along the beam"]
    back = value("load", "load", what=kind, **BEAM, **placed, strain=strain)
    assert 123.0 == pytest.approx(back, rel=1e-5)


def test_a_gauge_where_no_load_bends_the_beam_tells_no_load() -> None:
    placed = {"span": "1 m", "load_at": "0.5 m", "gauge_at": "0 m"}
    assert ["gauge_at"] == places("load", what="supported beam", **BEAM, **placed, strain="1 ue")


def test_a_bar_takes_two_of_three() -> None:
    bar = {"what": "bar", "area": "100 mm2"}
    assert (
        "500 µm/m" == shown("load", **bar, load="10 kN", modulus="200 GPa")["strain along the bar"]
    )
    assert "10 kN" == shown("load", **bar, strain="500 ue", modulus="200 GPa")["force"]
    assert ["load, strain, modulus"] == places("load", **bar, load="10 kN")


def test_a_section_is_a_rectangle_or_round() -> None:
    cantilever = {"what": "cantilever", "modulus": "200 GPa", "distance": "1 m", "load": "1 N"}
    assert ["width, diameter"] == places("load", **cantilever)
    assert ["depth"] == places("load", **cantilever, width="1 mm")
    hollow = shown("load", **cantilever, diameter="10 mm", bore="8 mm")
    # W = π (10⁴ − 8⁴)/320 = 57.96 mm³, M = 1 N·m.
    assert "86.2628 µm/m" == hollow["strain along the beam"]


def test_torque_comes_from_one_grid_a_pair_or_its_shear() -> None:
    strain = shown("load", **SHAFT, torque="500 N*m")
    by_strain = value("torque", "load", **SHAFT, strain=strain["strain along the grid"])
    by_shear = value("torque", "load", **SHAFT, pair=strain["shear strain"])
    assert 500.0 == pytest.approx(by_strain, rel=1e-5) == pytest.approx(by_shear, rel=1e-5)
    pair = {**SHAFT, "what": "shear pair"}
    common = value("torque", "load", **pair, plus="182.417 ue", minus="-82.417 ue")
    assert 500.0 == pytest.approx(common, rel=1e-5)


def test_pressure_and_strain_of_a_vessel_go_both_ways() -> None:
    told = shown("load", **VESSEL, pressure="2 MPa")
    assert "100 MPa" == told["stress round the vessel"]
    for name, figure in (("hoop", "strain round the vessel"), ("axial", "strain along it")):
        back = value("pressure", "load", **VESSEL, **{name: told[figure]})
        assert 2e6 == pytest.approx(back, rel=1e-5)
    assert ["axial"] == places("load", **VESSEL, ends="open", axial="1 ue")


def test_a_thick_cylinder_is_asked_at_its_outside_unless_said_otherwise() -> None:
    thick = {
        "what": "thick cylinder",
        "modulus": "200 GPa",
        "poisson": "0.3",
        "inner": "50 mm",
        "outer": "100 mm",
        "pressure": "30 MPa",
    }
    # Lamé: 2 p ri²/(ro² − ri²) outside, p (ri² + ro²)/(ro² − ri²) inside.
    assert "20 MPa" == shown("load", **thick)["stress round the vessel"]
    assert "50 MPa" == shown("load", **thick, at="50 mm")["stress round the vessel"]
    assert faults("load", **thick, at="200 mm")


def test_a_comparison_run_is_fitted_and_is_no_calibration() -> None:
    found = answer("load", what="run", run=RUN)
    told = {each.name: each.shown for each in found.figures}
    assert "0.20005 mV/V" == told["output per kN"]
    assert "0.04999 %" == told["hysteresis, of full scale"]
    assert ("This comparison is not a calibration.",) == found.warnings
    once = shown("load", what="run", run="0 kN = 0 mV/V, 5 kN = 1 mV/V", through_zero="yes")
    assert "the run can't tell" == once["repeatability, of full scale"]


@pytest.mark.parametrize("run", ["5 kN", "5 = 1 mV/V", "5 kN = 1 V", "1 kN = 1 mV/V", ";"])
def test_a_run_that_cannot_be_fitted_is_told(run: str) -> None:
    assert ["run"] == places("load", what="run", run=run)


def test_a_cells_strain_and_output_go_both_ways() -> None:
    cell = {"what": "cell", "arrangement": "full bending"}
    assert "2 mV/V" == shown("load", **cell, strain="1000 ue")["output, linear form"]
    assert "1000 µm/m" == shown("load", **cell, output="2 mV/V")["strain that it needs"]


def test_heat_is_judged_by_the_class_of_article() -> None:
    found = answer("excitation", **GRID, supply="5 V", heat_sink="thick steel")
    told = {each.name: each.shown for each in found.figures}
    assert "17.857 mW" == told["heat in the grid"]
    assert "4.0342 V" == told["largest supply, steady"]
    assert found.warnings


def test_pulses_and_carriers_are_typed_by_their_peak() -> None:
    steady = value("largest supply, steady", "excitation", **GRID, heat_sink="thick steel")
    for form, peak in ((("pulses", "25 %"), 2.0), (("carrier", ""), 2**0.5)):
        typed = {"form": form[0], "duty": form[1], "heat_sink": "thick steel"}
        found = value("largest supply, steady", "excitation", **GRID, **typed)
        assert steady * peak == pytest.approx(found)
    assert ["duty"] == places("excitation", **GRID, supply="5 V", form="pulses")
    heated = shown("excitation", **GRID, supply="10 V", form="pulses", duty="25 %")
    assert "17.857 mW" == heated["heat in the grid"]


def test_a_constant_current_heats_too() -> None:
    assert "35 mW" == shown("excitation", **GRID, current="10 mA")["heat in the grid"]
    assert ["supply, current, heat_sink"] == places("excitation", **GRID)
    assert ["supply, current"] == places("excitation", **GRID, current="1 mA", supply="1 V")


def test_noise_adds_up_to_the_smallest_strain() -> None:
    noise = {"what": "noise", "corner": "1 kHz"}
    # Nyquist: √(4 k T R B) with 350 Ω at 23 °C and 1571 Hz.
    assert "94.825 nV" == shown("excitation", **noise)["noise of the bridge, r.m.s."]
    told = shown(
        "excitation", **noise, bits="24", span="10 mV/V", amplifier="8 nV/Hz^0.5", readings="16"
    )
    assert "0.13238 µm/m" == told["all of it as strain, r.m.s."]
    assert "0.033094 µm/m" == told["mean of the readings, r.m.s."]
    assert ["span"] == places("excitation", **noise, bits="24")


def test_a_zero_that_walks_tells_the_largest_supply() -> None:
    steps = "2 V = 0 ue / 0.5 ue, 5 V = 1 ue / 2 ue, 10 V = 2 um/m / 14 um/m"
    told = shown("excitation", what="zero", steps=steps)
    assert "5 V" == told["largest supply with a steady zero"]
    assert "10 V" == told["first supply at which it walks"]
    calm = shown("excitation", what="zero", steps="2 V = 0 ue / 0 ue, 3 V = 0 ue / 0 ue")
    assert "none" == calm["first supply at which it walks"]
    assert ["steps"] == places("excitation", what="zero", steps="2 V = 0 ue")


def test_waves_pass_grid_and_module() -> None:
    told = shown(
        "wave",
        modulus="200 GPa",
        density="7850 kg/m3",
        length="3 mm",
        frequency="50 kHz",
        loss="1 %",
        corner="100 kHz",
        velocity="1 m/s",
    )
    assert "-198.12 µm/m" == told["strain behind the front"]
    assert "89.4427 %" == told["part the module leaves"]
    assert "350.9 kHz" == told["lowest corner of the module"]
    assert "0.59435 µs" == told["time to pass the grid"]


def test_plates_and_twisted_shafts_carry_waves_at_their_own_speed() -> None:
    steel = {"modulus": "200 GPa", "density": "7850 kg/m3"}
    assert ["poisson"] == places("wave", **steel, body="plate")
    plate = value("speed of the wave", "wave", **steel, body="plate", poisson="0.3")
    twist = value("speed of the wave", "wave", **steel, body="twisted shaft", poisson="0.3")
    assert 5291.3 == pytest.approx(plate, rel=1e-4)
    assert 3130.4 == pytest.approx(twist, rel=1e-4)


def test_a_blind_hole_needs_coefficients_and_a_through_hole_its_size() -> None:
    assert ["hole", "circle"] == places("holedrill", **DRILLED)
    assert ["b_bar"] == places("holedrill", **DRILLED, a_bar="0.158")
    assert ["readings"] == places(
        "holedrill", **{**DRILLED, "readings": "1, 2 ue"}, a_bar="0.1", b_bar="0.4"
    )


def test_a_hole_off_the_middle_or_near_yield_is_told() -> None:
    found = answer(
        "holedrill",
        **DRILLED,
        hole="2 mm",
        circle="5 mm",
        eccentricity="0.1 mm",
        yield_strength="160 MPa",
    )
    assert 2 == len(found.warnings)


def test_a_grid_of_its_own_size_counts() -> None:
    own = shown(
        "holedrill",
        **DRILLED,
        hole="2 mm",
        circle="5 mm",
        near="1.7275 mm",
        far="3.2725 mm",
        width="1.545 mm",
    )
    assert "0.1581" == own["ā of the through hole"]
    assert ["far", "width"] == places(
        "holedrill", **DRILLED, hole="2 mm", circle="5 mm", near="1 mm"
    )


def test_a_surface_near_the_dew_point_is_not_bonded_on() -> None:
    found = answer("dewpoint", air="20 degC", humidity="50 %", surface="11 degC", dampest="45 %")
    told = {each.name: each.shown for each in found.figures}
    assert "no" == told["fit to bond or coat on"]
    assert 2 == len(found.warnings)
    wet = shown("dewpoint", air="20 degC", dew_point="9.2 degC", surface="5 degC")
    assert "wet" == wet["relative humidity at the surface"]


def test_cure_takes_the_next_lower_listed_temperature_unless_allowed_to_interpolate() -> None:
    assert "24 h" == shown("cure", temperature="30 degC", schedule=SHEET)["time to cure"]
    told = shown("cure", temperature="30 degC", schedule=SHEET, interpolate="yes", elapsed="2 h")
    assert "13.024 h" == told["time to cure"]
    assert "11.024 h" == told["time to cure left"]
    assert ["temperature"] == places("cure", temperature="20 degC", schedule=SHEET)


def test_open_time_runs_out() -> None:
    told = shown(
        "cure", temperature="22 degC", open="20 degC = 30 min, 25 degC = 20 min", elapsed="30 min"
    )
    assert "20 min" == told["time to work"]
    assert "none, it is over" == told["time to work left"]
    assert ["schedule, open"] == places("cure", temperature="22 degC")
