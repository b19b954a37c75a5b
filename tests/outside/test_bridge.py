"""The bridge, held to worked examples, to a circuit simulator and to a numeric solver."""

from __future__ import annotations

from pathlib import Path

import numpy as np
import pytest
from scipy.optimize import approx_fprime, brentq

from gaugelog.physics import arrangements, bridge
from gaugelog.physics.network import Network, Resistor
from tests.foreign import needs
from tests.outside.cases import case
from tests.outside.spice import Bench, voltages

CHECKS = (
    arrangements.arrangement,
    arrangements.bridge_factor,
    bridge.output_ratio,
    bridge.current_output,
    bridge.linear_ratio,
    bridge.strain_output,
    bridge.indicated_strain,
    bridge.actual_strain,
    bridge.nonlinearity_of_indicated,
    bridge.nonlinearity_of_actual,
    bridge.indicated_strain_notices,
)
QUARTER = "quarter three-wire"
EVERY = tuple(arrangements.ARRANGEMENTS)


def four_arms(values: tuple[float, float, float, float]) -> Network:
    """The bare bridge as the convention numbers it: arms 1 and 4 meet at supply minus."""
    corners = ("low", "plus", "high", "minus")
    return Network(
        tuple(
            Resistor(f"arm {place + 1}", corners[place], corners[(place + 1) % 4], value)
            for place, value in enumerate(values)
        )
    )


@needs("ngspice")
def test_any_four_arms_put_out_what_a_circuit_simulator_says(tmp_path: Path) -> None:
    draw = np.random.default_rng(1)
    arms = [tuple(draw.uniform(50, 5000) for _ in range(4)) for _ in range(500)]
    found = voltages(
        [Bench(four_arms((a, b, c, d)), supply=("high", "low")) for a, b, c, d in arms], tmp_path
    )
    for (one, two, three, four), volts in zip(arms, found, strict=True):
        expected = volts["plus"] - volts["minus"]
        assert expected == pytest.approx(bridge.output_ratio(one, two, three, four), abs=1e-9)


@needs("ngspice")
def test_on_a_constant_current_the_arms_put_out_what_a_circuit_simulator_says(
    tmp_path: Path,
) -> None:
    draw = np.random.default_rng(9)
    arms = [tuple(draw.uniform(50, 5000) for _ in range(4)) for _ in range(100)]
    found = voltages(
        [Bench(four_arms((a, b, c, d)), current=("high", "low")) for a, b, c, d in arms], tmp_path
    )
    for (one, two, three, four), volts in zip(arms, found, strict=True):
        expected = volts["plus"] - volts["minus"]
        assert expected == pytest.approx(bridge.current_output(one, two, three, four), rel=1e-9)


@needs("ngspice")
@pytest.mark.parametrize("name", EVERY)
def test_every_arrangement_puts_out_what_a_circuit_simulator_says(
    name: str, tmp_path: Path
) -> None:
    """The arms are written here from the textbook's picture of each arrangement, from memory."""
    draw = np.random.default_rng(len(name))
    pictures = {
        "quarter two-wire": "e000",
        "quarter three-wire": "e000",
        "half with dummy": "e000",
        "half bending": "eE00",
        "half Poisson": "ep00",
        "opposite arms": "e0e0",
        "full bending": "eEeE",
        "full torsion": "eEeE",
        "full Poisson": "epep",
    }
    trials = [
        (draw.uniform(-5e-3, 5e-3), draw.uniform(1.8, 3.5), draw.uniform(0.1, 0.45))
        for _ in range(20)
    ]
    benches = []
    for strain, factor, poisson in trials:
        felt = {"e": strain, "E": -strain, "p": -poisson * strain, "0": 0.0}
        one, two, three, four = (350 * (1 + factor * felt[mark]) for mark in pictures[name])
        benches.append(Bench(four_arms((one, two, three, four)), supply=("high", "low")))
    for (strain, factor, poisson), volts in zip(trials, voltages(benches, tmp_path), strict=True):
        found = bridge.strain_output(strain, factor, name, poisson)
        assert volts["plus"] - volts["minus"] == pytest.approx(found, abs=1e-11)
        back = bridge.actual_strain(volts["plus"] - volts["minus"], factor, name, poisson)
        assert strain == pytest.approx(back, abs=1e-10)


@pytest.mark.parametrize("name", EVERY)
def test_strain_from_output_agrees_with_a_numeric_solver(name: str) -> None:
    """scipy.optimize.brentq solves the four arms for strain, the unbalance in arm 1."""
    poisson, factor, initial = 0.3, 2.1, 0.004
    skew = brentq(lambda r: bridge.output_ratio(r, 1, 1, 1) - initial, 0.5, 2.0, xtol=1e-15)

    def left(strain: float, target: float) -> float:
        shares = arrangements.arrangement(name).shares(poisson)
        one, two, three, four = (1 + factor * share * strain for share in shares)
        return float(bridge.output_ratio(skew * one, two, three, four) - target)

    for target in (-0.003, 0.001, 0.012):
        expected = brentq(left, -0.02, 0.02, args=(target,), xtol=1e-15)
        found = bridge.actual_strain(target, factor, name, poisson, initial)
        assert expected == pytest.approx(found, abs=1e-12)


def test_the_linear_form_is_the_slope_of_the_exact_one() -> None:
    """Against scipy's finite differences, arms unequal."""
    arms = np.array([350.7, 349.2, 120.1, 121.9])
    slopes = approx_fprime(
        np.zeros(4), lambda x: bridge.output_ratio(*(arms * (1 + x))), epsilon=1e-6
    )
    one, two, three, four = (float(arm) for arm in arms)
    for place in range(4):
        change = [0.0] * 4
        change[place] = 1.0
        a, b, c, d = change
        found = bridge.linear_ratio((one, two, three, four), (a, b, c, d))
        assert slopes[place] == pytest.approx(found, abs=1e-6)


def test_the_single_gauge_exercise_gives_its_printed_millivolts() -> None:
    given = case("C02-01")
    change = given.value("GF") * given.value("strain") * 1e-6
    arm = given.value("R")
    ratio = bridge.linear_ratio((arm, arm, arm, arm), (change, 0.0, 0.0, 0.0))
    given.expect("out_linear", 1e3 * given.value("E") * ratio)


def test_large_tension_is_corrected_as_the_technical_note_prints() -> None:
    given = case("C02-03")
    indicated = given.value("indicated") * 1e-6
    ratio = indicated * given.value("GF") / 4
    actual = bridge.actual_strain(ratio, given.value("GF"), QUARTER)
    given.expect("actual", 1e6 * actual)
    given.expect("correction", 1e6 * (actual - indicated))


def test_the_non_linearity_is_as_large_as_the_technical_note_says() -> None:
    """Its percentages are of the indicated strain; of the actual they are 0.0999, 0.990, 9.09."""
    given = case("C02-05")
    strains = [strain * 1e-6 for strain in given.value("strain")]
    printed = given.expected["error_percent_of_indicated"]["value"]
    of_actual = (0.0999, 0.990, 9.09)
    for strain, indicated, actual in zip(strains, printed, of_actual, strict=True):
        found = 100 * bridge.nonlinearity_of_indicated(strain, 2.0, QUARTER)
        assert indicated == pytest.approx(found, abs=0.001)
        found = 100 * bridge.nonlinearity_of_actual(strain, 2.0, QUARTER)
        assert actual == pytest.approx(found, abs=0.005)
    assert () == bridge.indicated_strain_notices(strains[0] / 2, 2.0, QUARTER)
    assert "0.99%" in bridge.indicated_strain_notices(strains[1], 2.0, QUARTER)[0].message


def test_the_quarter_bridge_is_exact() -> None:
    given = case("C02-06")
    strain, factor = given.value("strain") * 1e-6, given.value("GF")
    ratio = bridge.strain_output(strain, factor, QUARTER)
    arm = given.value("R")
    linear = bridge.linear_ratio((arm, arm, arm, arm), (factor * strain, 0.0, 0.0, 0.0))
    given.expect("out_exact", 1e3 * given.value("E") * ratio)
    given.expect("out_linear", 1e3 * given.value("E") * linear)
    given.expect("indicated", 1e6 * bridge.indicated_strain(ratio, factor, QUARTER))


def test_the_bending_half_bridge_is_linear() -> None:
    given = case("C02-07")
    strain, factor = given.value("strain") * 1e-6, given.value("GF")
    ratio = bridge.strain_output(strain, factor, "half bending")
    given.expect("out", 1e3 * given.value("E") * ratio)
    bent = bridge.nonlinearity_of_actual(strain, factor, "half bending")
    given.expect("nonlinearity_percent", 100 * bent)


@pytest.mark.parametrize(
    ("identifier", "name", "strain"),
    [
        ("C02-09", "full bending", "strain"),
        ("C02-10", "full torsion", "gamma"),
        ("C02-12", "opposite arms", "strain"),
    ],
)
def test_full_bridges_put_out_what_the_texts_say(identifier: str, name: str, strain: str) -> None:
    given = case(identifier)
    felt = given.value(strain) * 1e-6
    felt = felt / 2 if strain == "gamma" else felt  # ε at 45° is half the shear strain
    ratio = bridge.strain_output(felt, given.value("GF"), name)
    given.expect("out", 1e3 * given.value("E") * ratio)


def test_tension_and_compression_read_differently() -> None:
    given = case("C02-14")
    for strain, indicated in zip(
        given.value("strain"), given.expected["indicated"]["value"], strict=True
    ):
        ratio = bridge.strain_output(strain * 1e-6, given.value("GF"), QUARTER)
        found = 1e6 * bridge.indicated_strain(ratio, given.value("GF"))
        assert indicated == pytest.approx(found, abs=0.001)


def test_four_unequal_arms_put_out_what_the_case_says() -> None:
    given = case("C02-15")
    ratio = bridge.output_ratio(*(given.value(f"R{number}") for number in (1, 2, 3, 4)))
    given.expect("out", 1e3 * given.value("E") * ratio)


def test_millivolts_per_volt_become_strain() -> None:
    given = case("C12-06")
    ratio, factor = given.value("mV_per_V") * 1e-3, given.value("GF")
    given.expect("quarter_linear", 1e6 * bridge.indicated_strain(ratio, factor, QUARTER))
    full = bridge.indicated_strain(ratio, factor, "full bending")
    given.expect("full_bridge", 1e6 * full)


@pytest.mark.parametrize(
    ("name", "factor"),
    [
        ("quarter two-wire", 1.0),
        ("half with dummy", 1.0),
        ("half bending", 2.0),
        ("half Poisson", 1.3),
        ("opposite arms", 2.0),
        ("full torsion", 4.0),
        ("full bending", 4.0),
        ("full Poisson", 2.6),
    ],
)
def test_bridge_factors_are_those_of_the_handbooks(name: str, factor: float) -> None:
    """Dally and Riley, Experimental Stress Analysis, table of bridge arrangements (from memory)."""
    assert factor == pytest.approx(arrangements.bridge_factor(name, 0.3))
    assert name == arrangements.arrangement(name).name
