"""`gaugelog calc` on strain: thermal, transverse, rosette with its drawing, placement."""

from __future__ import annotations

from pathlib import Path
from xml.etree import ElementTree

import pytest

from gaugelog.commands.calc.engine import work_out
from gaugelog.commands.calc.mohr import draw
from gaugelog.commands.calc.subjects import SUBJECTS
from tests.commands.calculated import answer, faults, places, shown, value
from tests.commands.conftest import Command

STEEL = {"article": "11.7 ppm/K", "matched": "10.8 ppm/K"}
READ = {"readings": "400, 300, -200 ue", "pattern": "rectangular"}
GRID = {"what": "turned", "off": "5 deg"}


def test_a_reading_is_freed_of_thermal_output_and_the_factors_change() -> None:
    told = shown(
        "thermal",
        temperature="104 degC",
        reference="24 degC",
        polynomial="0",
        factor="2.07",
        setting="2.07",
        factor_slope="0.0093 %/K",
        indicated="1000 ue",
    )
    # 0.93 % in 100 K: 2.0854 and 992.6 µm/m (closed form, the lot's sheet's own way).
    assert "2.085401" == told["gauge factor at the temperature"]
    assert "992.615 µm/m" == told["mechanical strain"]


def test_a_dummy_in_the_same_warmth_leaves_nothing() -> None:
    typed = {"temperature": "43 degC", **STEEL}
    assert "0 µm/m" == shown("thermal", **typed, dummy="43 degC")["residue of grid and dummy"]
    assert "-8.9996 µm/m" == shown("thermal", **typed, dummy="53 degC")["residue of grid and dummy"]


def test_a_class_typed_per_kelvin_but_meant_per_fahrenheit_is_asked_about() -> None:
    told = answer("thermal", temperature="43 degC", article="11.7 ppm/K", matched="6 ppm/K")
    assert any("°F" in each for each in told.warnings)


def test_scatter_comes_from_the_alloy() -> None:
    told = shown(
        "thermal", temperature="135 degC", reference="24 degC", alloy="constantan", **STEEL
    )
    assert "29.97 µm/m" == told["scatter within the lot, 2σ"]


def test_thermal_output_needs_one_way_to_it() -> None:
    assert ["polynomial, matched, grid_coefficient"] == places("thermal", temperature="40 degC")
    assert ["article"] == places("thermal", temperature="40 degC", matched="6 ppm/K")


def test_own_sensitivities_agree_with_the_closed_form_where_alike() -> None:
    typed = {"grids": "rectangular", "readings": "700, -150, 250 ue"}
    one = shown("transverse", **typed, transverse="1 %")
    each = shown("transverse", **typed, transverse="1 %, 1 %, 1.0000001 %")
    assert "695.582 µm/m" == one["grid 1, corrected"] == each["grid 1, corrected"]


def test_general_grids_and_a_tee_are_corrected() -> None:
    tee = shown("transverse", grids="tee", readings="1000, -300 ue", transverse="1 %")
    assert "1000.24 µm/m" == tee["grid 1, corrected"]
    odd = shown(
        "transverse",
        grids="general",
        angles="0, 45, 90 deg",
        readings="700, -150, 250 ue",
        transverse="1 %",
    )
    assert "695.582 µm/m" == odd["grid 1, corrected"]


def test_numbers_of_readings_and_sensitivities_must_fit() -> None:
    assert ["readings"] == places("transverse", grids="tee", readings="1 ue", transverse="1 %")
    assert ["transverse"] == places(
        "transverse", grids="delta", readings="1, 2, 3 ue", transverse="1 %, 1 %"
    )


def test_a_rosette_alike_in_every_direction_has_no_direction() -> None:
    told = shown("rosette", readings="300, 300, 300 ue", pattern="rectangular")
    assert told["direction of the largest, from grid 1"].startswith("none")


def test_a_rosette_numbered_clockwise_turns_the_direction() -> None:
    clockwise = value(
        "direction of the largest, from grid 1", "rosette", **READ, numbering="clockwise"
    )
    through = value(
        "direction of the largest, from grid 1", "rosette", **READ, seen_from="other side"
    )
    plain = value("direction of the largest, from grid 1", "rosette", **READ)
    assert -plain == pytest.approx(clockwise) == pytest.approx(through)


def test_a_fourth_grid_checks_the_other_three() -> None:
    told = shown("rosette", readings="400, 300, -200, -85 ue", angles="0, 45, 90, 135 deg")
    assert "5 µm/m" in told["scatter of the readings"]
    assert "-3.75 µm/m" == told["reading 1 less the fit"]


def test_spare_grids_that_disagree_beyond_their_uncertainty_are_told() -> None:
    typed = {"readings": "400, 300, -200, -85 ue", "angles": "0, 45, 90, 135 deg"}
    for transverse in ({}, {"transverse": "1 %"}):
        told = answer("rosette", **typed, **transverse, uncertainty="3 ue")
        assert any("scatter by 7.5" in each for each in told.warnings)
        fine = answer("rosette", **typed, **transverse, uncertainty="4 ue")
        assert not any("scatter" in each for each in fine.warnings)


def test_transverse_sensitivity_comes_off_before_the_circle() -> None:
    told = shown("rosette", pattern="delta", readings="1018, 224, -1527 ue", transverse="2 %")
    assert "1036.6 µm/m" == told["grid 1, transverse corrected"]
    tee = shown("rosette", pattern="tee", readings="1000, -300 ue", transverse="1 %")
    assert "1000.2 µm/m" == tee["largest principal strain"]


def test_a_layer_has_stresses_in_its_own_axes() -> None:
    told = shown(
        "rosette",
        **READ,
        modulus="140 GPa",
        modulus_across="10 GPa",
        poisson="0.3",
        shear_modulus="5 GPa",
    )
    assert {"stress along the fibre", "stress across the fibre"} <= set(told)
    # ½ atan2(2 · 2.0, 55.76 + 0.81) MPa: far from the 16.8° of the strain.
    assert "2.023°" == told["direction of the largest stress, from the fibre"]
    assert "von Mises stress" not in told


def test_doubts_of_the_grids_reach_the_principal_values() -> None:
    told = shown("rosette", **READ, uncertainty="3 ue")
    assert "2.6 µm/m" == told["u of the largest"]
    unclear = answer(
        "rosette", readings="300, 300.1, 300 ue", pattern="rectangular", uncertainty="3 ue"
    )
    assert any("no direction is told" in each for each in unclear.warnings)


@pytest.mark.parametrize(
    ("typed", "place"),
    [
        ({"readings": "1, 2 ue", "pattern": "delta"}, "readings"),
        ({"readings": "1, 2, 3 ue"}, "pattern, angles"),
        ({"readings": "1, 2, 3 ue", "angles": "0, 0, 90 deg"}, "angles"),
        ({**READ, "modulus": "206 GPa"}, "poisson"),
        ({**READ, "transverse": "1 %, 2 %"}, "transverse"),
        ({"readings": "1, 2, 3 mV/V", "pattern": "delta"}, "readings"),
        ({"readings": ",".join(["1 ue"] * 13), "angles": ",".join(["1 deg"] * 13)}, "readings"),
    ],
)
def test_a_rosette_that_cannot_be_is_told(typed: dict[str, str], place: str) -> None:
    assert [place] == places("rosette", **typed)


def test_a_check_load_finds_grids_as_planned_or_in_no_order() -> None:
    check = {"what": "check", "pattern": "rectangular", "strain": "300 ue", "poisson": "0.3"}
    assert "grids as planned" == shown("rosette", **check, readings="301, 100, -93 ue")["answer"]
    assert "no exchange" in shown("rosette", **check, readings="301, 200, 10 ue")["answer"]


def test_a_check_load_says_what_it_cannot_tell() -> None:
    check = {"what": "check", "pattern": "delta", "strain": "300 ue", "poisson": "0.3"}
    told = shown("rosette", **check, readings="300, 7.5, 7.5 ue")["answer"]
    assert "grids as planned, or grids 2 and 3 exchanged: this load cannot tell" == told


def test_the_drawing_is_well_formed_and_tells_the_figures(tmp_path: Path, command: Command) -> None:
    file = tmp_path / "circle.svg"
    told = command(
        "calc", "rosette", *(f"{name}={text}" for name, text in READ.items()), "--plot", str(file)
    )
    assert 0 == told.code
    root = ElementTree.parse(file)  # noqa: S314 our own drawing
    words = [each.text for each in root.iter("{http://www.w3.org/2000/svg}text")]
    assert {"460.6", "−260.6", "ε₁ at +16.8° from grid 1", "3 (90°)"} <= set(words)


@pytest.mark.parametrize("readings", ["0, 0, 0 ue", "3000, 2900, 2600 ue", "1e-9, 1e-9, 1e-9 ue"])
def test_any_state_is_drawn(readings: str) -> None:
    worked = work_out(SUBJECTS["rosette"], {**READ, "readings": readings})
    assert draw(worked).startswith("<svg")
    assert "nan" not in draw(worked)


def test_only_a_rosette_is_drawn_and_into_a_place_that_can_be(
    tmp_path: Path, command: Command
) -> None:
    assert 3 == command("calc", "leakage", "permitted=1 ue", "--plot", str(tmp_path / "x")).code
    nowhere = command(
        "calc",
        "rosette",
        *(f"{name}={text}" for name, text in READ.items()),
        "--plot",
        str(tmp_path / "no" / "where.svg"),
    )
    assert 6 == nowhere.code
    assert "can't be written" in nowhere.err


def test_a_turned_grid_errs_as_mohrs_circle_says() -> None:
    told = shown("placement", **GRID, first="1000 ue", second="-300 ue", permitted="10 ue")
    assert "-9.875 µm/m" == told["shown less meant"]
    assert "5.0316°" == told["largest turn for the permitted error"]
    even = shown("placement", **GRID, first="100 ue", second="100 ue", permitted="10 ue")
    assert "any" == even["largest turn for the permitted error"]


def test_a_field_without_strain_along_the_grid_gives_no_share() -> None:
    told = shown("placement", **GRID, first="100 ue", second="-100 ue", intended="45 deg")
    assert ["shown less meant"] == list(told)


def test_a_turned_grid_needs_a_field() -> None:
    assert ["first, poisson"] == places("placement", **GRID)
    assert ["second"] == places("placement", **GRID, first="1 ue")


@pytest.mark.parametrize(
    ("typed", "figure", "expected"),
    [
        (
            {"what": "beside", "gradient": "20 ue/mm", "off": "0.5 mm"},
            "shown less meant",
            "10 µm/m",
        ),
        (
            {"what": "wave", "length": "3 mm", "wavelength": "30 mm", "loss": "1 %"},
            "longest grid for the permitted loss",
            "2.3426 mm",
        ),
        (
            {"what": "peak", "length": "6 mm", "distance": "10 mm", "fallen": "75 %"},
            "reach of the peak",
            "20 mm",
        ),
        (
            {
                "what": "hole",
                "hole": "10 mm",
                "near": "0 mm",
                "width": "1 um",
                "length": "1 um",
                "poisson": "0.3",
            },
            "part of the edge's strain shown",
            "99.974 %",
        ),
        (
            {
                "what": "stiffening",
                "modulus": "3 GPa",
                "thickness": "1 mm",
                "layer_modulus": "4 GPa",
                "layer": "60 um",
                "permitted": "1 %",
            },
            "strain left, pulled and kept straight",
            "92.593 %",
        ),
        (
            {"what": "height", "thickness": "1 mm", "height": "50 um", "indicated": "110 ue"},
            "strain of the surface",
            "100 µm/m",
        ),
        (
            {
                "what": "curved",
                "radius": "10 mm",
                "height": "15 um",
                "layer": "40 um",
                "layer_expansion": "60 ppm/K",
                "article": "12 ppm/K",
            },
            "strain left by bending round",
            "1500 µm/m",
        ),
    ],
)
def test_placement_has_a_kind_for_each_trouble(
    typed: dict[str, str], figure: str, expected: str
) -> None:
    assert expected == shown("placement", **typed)[figure]


def test_a_welded_carrier_takes_up_strain_over_its_ends() -> None:
    # λ = √(E t h/G) = 1.118 mm (Volkersen 1938, from memory).
    name = "length over which strain comes across"
    welded = {
        "what": "welded",
        "length": "6 mm",
        "carrier": "20 mm",
        "modulus": "200 GPa",
        "thickness": "125 um",
    }
    bond = {"shear_modulus": "1 GPa", "bond": "50 um"}
    assert "1.118 mm" == shown("placement", **welded, **bond)[name]
    spots = {"spot": "20 kN/mm", "pitch": "1 mm", "rows": "1 mm"}
    assert "1.118 mm" == shown("placement", **welded, **spots)[name]
    short = answer("placement", **{**welded, "carrier": "7 mm"}, **bond)
    assert short.warnings
    assert ["pitch", "rows"] == places("placement", **welded, spot="1 kN/mm")


def test_a_kind_that_is_none_lists_those_there_are() -> None:
    (fault,) = faults("placement", what="upside down")
    assert "what" == fault.where
    assert "stiffening" in fault.remedy
