"""`gaugelog calc` on circuits: bridge, leads, shunt, leakage, pins, budget, conformity."""

from __future__ import annotations

import pytest

from tests.commands.calculated import answer, faults, places, shown, value

POISSON = {"arrangement": "full Poisson", "strain": "1000 ue"}
FULL = {"arrangement": "full bending", "wires": "4"}
QUARTER = {"arrangement": "quarter three-wire", "wires": "3"}
LONG = {"layout": "quarter two-wire", "resistance": "120 ohm", "length": "50 m"}


def test_strain_and_output_go_both_ways() -> None:
    output = shown("bridge", arrangement="quarter three-wire", strain="15228 ue")["output"]
    back = value("actual strain", "bridge", arrangement="quarter three-wire", output=output)
    assert 15228e-6 == pytest.approx(back, rel=1e-6)


def test_an_initial_unbalance_does_not_count_as_strain() -> None:
    placed = {"arrangement": "quarter three-wire", "initial": "0.5 mV/V"}
    output = shown("bridge", strain="1000 ue", **placed)["output"]
    assert 1e-3 == pytest.approx(value("actual strain", "bridge", output=output, **placed))


def test_a_grid_across_needs_poissons_ratio() -> None:
    assert ["poisson"] == places("bridge", **POISSON)
    # K ε (1 + ν)/(2 + K ε (1 − ν)), exact.
    assert "1.299091 mV/V" == shown("bridge", **POISSON, poisson="0.3")["output"]


def test_four_arms_are_nulled_by_a_trim_or_a_resistor_across() -> None:
    above = shown("bridge", arms="351, 350, 350, 350 ohm", adjust="2")
    assert "351 Ω" == above["arm 2 that nulls it"]
    assert "1 Ω" == above["resistor in series in arm 2"]
    below = shown("bridge", arms="351, 350, 350, 350 ohm", adjust="1")
    assert "1.2285e+05 Ω" == below["resistor across arm 1"]


def test_arms_are_four() -> None:
    assert "must be four, not 3." == faults("bridge", arms="350, 350, 350 ohm")[0].what


def test_annealed_constantan_reads_on_where_foil_would_not() -> None:
    # ΔR/R = (1 + ε)² − 1: 21 % at 10 % strain (Dally and Riley, from memory).
    typed = {"arrangement": "quarter two-wire", "grid": "annealed constantan"}
    there = shown("bridge", **typed, strain="10 %")
    assert "21 %" == there["change of resistance"]
    assert 0.1 == pytest.approx(value("actual strain", "bridge", **typed, output=there["output"]))


def test_a_semiconductor_bends_and_loses_factor_as_it_warms() -> None:
    typed = {
        "arrangement": "quarter two-wire",
        "grid": "semiconductor",
        "factor": "119.5",
        "second": "4000",
    }
    there = shown("bridge", **typed, strain="1000 ue")
    assert "12.35 %" == there["change of resistance"]
    back = value("actual strain", "bridge", **typed, output=there["output"])
    assert 1e-3 == pytest.approx(back, rel=1e-6)
    warm = shown("bridge", **typed, strain="1000 ue", temperature="50 degC")
    # K T₀/T with 298.15 K and 323.15 K.
    assert "110.255" == warm["factor at 50 °C"]
    assert answer("bridge", **typed, strain="4000 ue").warnings


def test_other_grids_are_for_balanced_quarter_bridges() -> None:
    other = {"grid": "semiconductor", "strain": "1 ue"}
    assert ["grid"] == places("bridge", arrangement="half bending", **other)
    assert ["second"] == places("bridge", arrangement="quarter two-wire", **other)


def test_only_one_of_strain_output_and_arms_is_taken() -> None:
    placed = {"arrangement": "half bending"}
    assert ["strain, output, arms"] == places("bridge", **placed)
    assert ["strain, output, arms"] == places("bridge", **placed, strain="1 ue", output="1 mV/V")


def test_wire_sizes_say_where_their_resistance_is_from() -> None:
    assert "28 AWG solid, ASTM B258" == shown("leads", **LONG, area="28 AWG")["known from"]
    told = shown("leads", **LONG, area="0.5 mm2", conductor="class 5 tinned")
    assert "0.5 mm² class 5 tinned, IEC 60228 (largest allowed)" == told["known from"]
    assert "2.005 Ω" == told["one wire"]


def test_a_warm_cable_has_more_resistance() -> None:
    warm = shown("leads", **LONG, area="0.5 mm2", cable="45 degC")
    assert "2.1416 Ω" == warm["one wire in the cable's warmth"]


@pytest.mark.parametrize("size", ["0 mm2", "-1 mm2", "99 AWG", "28 swg", "AWG"])
def test_a_wire_size_that_cannot_be_is_told(size: str) -> None:
    assert ["area"] == places("leads", **LONG, area=size)


def test_sense_wires_lose_nothing() -> None:
    assert "0 %" == shown("leads", layout="full six-wire", loop="20 ohm")["sensitivity lost"]


def test_length_is_asked_for_with_a_reel() -> None:
    assert ["length"] == places("leads", layout="full four-wire", per_metre="0.1 ohm/m")


def test_a_shunt_has_a_tolerance_and_warms() -> None:
    told = shown("shunt", shunt="100 kohm", tolerance="0.1 %", coefficient="15 ppm/K", rise="20 K")
    assert "99870.03 Ω" == told["resistor at least"]
    assert "100130 Ω" == told["resistor at most"]


def test_a_shunt_at_the_module_over_reads_through_long_wires() -> None:
    at = {"resistance": "120 ohm", "shunt": "59880 ohm", "wire": "1.5 ohm"}
    simple = shown("shunt", **at)["indicated, three-wire, across the module's pins"]
    solved = shown("shunt", **at, wires="3", between="signal+ to supply-")
    assert "-1038.5 µm/m" == simple == solved["indicated, shunt from signal+ to supply-"]
    assert "98.765 %" == solved["sensitivity left by the wires"]


@pytest.mark.parametrize(
    "between", ["signal+", "signal+ to signal+", " to supply-", "mars to moon"]
)
def test_a_shunt_spans_two_terminals_of_the_circuit(between: str) -> None:
    assert 1 == len(faults("shunt", shunt="100 kohm", wires="3", between=between))


def test_leakage_tells_drift_fall_and_neighbours() -> None:
    told = shown("leakage", insulation="1 Gohm", later="10 Mohm", other="0", shield="0.5")
    assert "100" == told["times it has fallen"]
    assert "0 µm/m" == told["apparent strain, leak to the shield"]
    assert "-0.175 µm/m" == told["apparent strain, leak to the other grid"]
    assert any(
        "tenfold" in each
        for each in answer("leakage", insulation="1 Gohm", later="10 Mohm").warnings
    )


def test_later_needs_an_earlier_insulation() -> None:
    assert ["insulation"] == places("leakage", permitted="1 ue", later="1 Mohm")


def test_pins_without_readings_give_the_table_to_measure_against() -> None:
    told = shown("pins", **FULL)
    assert 6 + 2 == len(told)
    assert "264.5 Ω" == told["supply+ to signal+"] == told["3/4 rule: supply to signal"]


def test_pins_name_a_poor_joint_and_what_it_means() -> None:
    told = shown(
        "pins", **QUARTER, readings="signal+ to supply- = 352 ohm, signal+ to completion = 12 ohm"
    )
    assert "joint with 10.0 Ω too much at completion wire" == told["answer 1"]
    assert "cold or corroded joint" in told["answer 1 means"]
    assert "2 Ω" == told["signal+ to completion should read"]
    assert told["answer 2"].endswith("(far behind)")
    assert told["next"].startswith("nothing more to measure")


def test_pins_ask_for_the_next_measurement() -> None:
    told = shown("pins", **FULL, readings="supply+ to supply- = 352 ohm")
    assert told["next"].startswith("Measure between ")


def test_pins_find_a_leak_to_the_article_and_own_up_to_what_they_cannot_explain() -> None:
    read = "supply+ to supply- = 352 ohm; signal+ to ARTICLE = 1 Mohm ± 1 % k=2"
    assert "leak of" in shown("pins", **FULL, readings=read)["answer 1"]
    odd = "supply+ to supply- = 263 ohm; supply+ to signal+ = OL; signal+ to article > 20 Mohm"
    assert answer("pins", **FULL, readings=odd).warnings


@pytest.mark.parametrize(
    ("reading", "sentence"),
    [
        ("supply+ = 5 ohm", "is no reading"),
        ("supply+ to nowhere = 5 ohm", "is no terminal"),
        ("supply+ to Supply+ = 5 ohm", "one terminal twice"),
        ("supply+ to signal+ = 5", "unit is missing"),
        ("supply+ to signal+ = -5 ohm", "not negative"),
        ("supply+ to signal+ = ± 5 ohm", "needs a resistance"),
        ("supply+ to sense+ = 5 ohm", "no terminal of this circuit"),
        (",;", "must hold 1 to 60"),
    ],
)
def test_a_reading_that_is_none_is_told(reading: str, sentence: str) -> None:
    found = faults("pins", **FULL, readings=reading)
    assert ["readings"] == [fault.where for fault in found]
    assert sentence in found[0].what


def test_shares_of_a_budget_come_largest_first() -> None:
    found = answer(
        "budget",
        strain="1000 ue",
        factor="2.05 ± 1 %",
        setting="2.05",
        thermal="0 ue ± 10 ue normal",
        readings="1000, 1002, 999, 1001 ue",
        draws="20000",
    )
    told = {each.name: each.shown for each in found.figures}
    assert ["thermal", "factor", "repeatability"] == [
        name.removeprefix("share of ") for name in told if name.startswith("share of")
    ]
    assert "74.8 %, u = 10 µm/m (normal)" == told["share of thermal"]
    assert "11.6 µm/m" == told["standard uncertainty u"] == told["Monte Carlo, u"]
    assert () == found.warnings


def test_budget_and_simulation_that_disagree_are_told() -> None:
    found = answer("budget", strain="100 ue", misalignment="± 10 deg")
    assert ["trust the simulation"] == [each[-21:-1] for each in found.warnings]
    assert "100 to 103.87 µm/m" in found.warnings[0]


def test_the_same_seed_gives_the_same_simulation() -> None:
    typed = {"strain": "100 ue", "gain": "1 ± 1 %", "draws": "1000"}
    one, same = (shown("budget", **typed, seed="7") for _ in range(2))
    assert one == same
    assert one != shown("budget", **typed, seed="8")


def test_a_budget_without_doubts_says_so() -> None:
    assert "Nothing here is uncertain" in answer("budget", strain="100 ue").warnings[0]


def test_two_readings_of_one_meter_share_its_offset() -> None:
    typed = {
        "of": "difference",
        "before": "350.4",
        "after": "351.2",
        "gain": "0.05 %",
        "offset": "0.1",
        "resolution": "0.01",
    }
    assert "0.004089" == shown("budget", **typed)["standard uncertainty of the change"]
    assert (
        "0.2249" == shown("budget", **typed, meter="another")["standard uncertainty of the change"]
    )


def test_a_censored_reading_has_no_probability() -> None:
    told = shown("conformity", value="20", uncertainty="0.2", at_least="10", qualifier=">")
    assert "pass" == told["verdict"]
    assert "probability of conformance" not in told
    assert ["at_least, at_most"] == places("conformity", value="1", uncertainty="0")
