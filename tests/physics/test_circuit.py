"""Circuits and layouts: what fits together, what is refused, and what a circuit must read."""

from __future__ import annotations

import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.physics import prediction
from gaugelog.physics.arrangements import ARRANGEMENTS
from gaugelog.physics.bridge import actual_strain, indicated_strain, output_ratio
from gaugelog.physics.circuit import Circuit, Element, circuit_of
from gaugelog.physics.layouts import LAYOUTS, layout, layout_for
from gaugelog.physics.validity import OutOfDomain
from tests.physics.kinds import assert_takes_every_kind

WIRES = {"quarter two-wire": (2,), "quarter three-wire": (3,)}
CHOICES = [
    (name, wires)
    for name, each in ARRANGEMENTS.items()
    for wires in WIRES.get(name, {"half": (3, 5), "full": (4, 6)}.get(each.kind, ()))
]
CHOICE = st.sampled_from(CHOICES)


@given(CHOICE, st.floats(100.0, 1000.0), st.floats(-3e-3, 3e-3), st.floats(0.0, 0.45))
def test_without_wires_a_circuit_is_the_bare_bridge(
    choice: tuple[str, int], grid: float, strain: float, poisson: float
) -> None:
    name, wires = choice
    wired = circuit_of(name, wires, grid, 2.0)
    found = prediction.strained_output(wired, name, strain, poisson)
    assert strain == pytest.approx(actual_strain(found, 2.0, name, poisson), abs=1e-12)


@given(CHOICE, st.floats(0.1, 20.0))
def test_equal_arms_and_wires_are_balanced_but_for_two_wires(
    choice: tuple[str, int], wire: float
) -> None:
    name, wires = choice
    zero = prediction.output(circuit_of(name, wires, 350.0, 2.0, wire))
    assert (wire / (700 + 2 * wire) / 1 if wires == 2 else 0.0) == pytest.approx(zero, abs=1e-12)


@given(CHOICE, st.floats(0.1, 20.0))
def test_remote_sense_loses_nothing_and_other_wires_something(
    choice: tuple[str, int], wire: float
) -> None:
    name, wires = choice
    kept = prediction.sensitivity(circuit_of(name, wires, 350.0, 2.0, wire), name, 0.3)
    if layout_for(name, wires).sensed:
        assert 1.0 == pytest.approx(kept, abs=1e-9)
    else:
        assert kept < 1.0


@given(st.floats(1e4, 1e8), st.sampled_from(["supply- tab", "signal+ tab", "supply+"]))
def test_a_resistor_added_either_way_round_shows_the_same(ohm: float, other: str) -> None:
    wired = circuit_of("quarter three-wire", 3, 350.0, 2.0, 1.5)
    if other == "supply- tab":
        other = "signal-"
    there = prediction.added_strain(wired, ohm, ("supply- tab", other), 2.0)
    back = prediction.added_strain(wired, ohm, (other, "supply- tab"), 2.0)
    assert there == pytest.approx(back, abs=1e-15)


def test_elements_in_series_are_one_arm() -> None:
    """A grid with a trim of 0.4 Ω unbalances as 350.4 Ω would."""
    whole = circuit_of("full bending", 4, 350.0, 2.0)
    trimmed = (*whole.arms[0], Element("trim 1", "trim", 0.4))
    circuit = Circuit(whole.layout, (trimmed, *whole.arms[1:]), whole.wires)
    expected = output_ratio(350.4, 350.0, 350.0, 350.0)
    assert expected == pytest.approx(prediction.output(circuit), abs=1e-15)
    assert "trim 1" in {each.name for each in prediction.network_of(circuit).resistors}


def test_a_three_wire_quarter_bridge_predicts_its_zero() -> None:
    """Issue B: 351.2 Ω against 350.00 Ω, wires 1.0 Ω, factor 2.10: +0.853 mV/V, +1625 µm/m."""
    wired = circuit_of("quarter three-wire", 3, 351.2, 2.1, 1.0, 350.0)
    zero = prediction.output(wired)
    assert 0.853 == pytest.approx(1e3 * zero, abs=5e-4)
    assert 1625 == pytest.approx(1e6 * indicated_strain(zero, 2.1), abs=0.5)
    swapped = -zero
    assert -0.853 == pytest.approx(1e3 * swapped, abs=5e-4)
    assert 0.70 == pytest.approx(prediction.resistance_error(wired, 1.35e-3, "grid 1"), abs=5e-3)


@pytest.mark.parametrize(
    ("between", "expected"),
    [
        (("supply- tab", "signal+ tab"), -988.6),
        (("completion", "supply+"), 988.6),
        (("supply-", "signal+"), -1038.5),
    ],
)
def test_the_place_of_a_shunt_decides_what_it_shows(
    between: tuple[str, str], expected: float
) -> None:
    """Issue B: 59 880 Ω on a three-wire 120 Ω grid, 1.5 Ω a wire, factor 2."""
    wired = circuit_of("quarter three-wire", 3, 120.0, 2.0, 1.5)
    shown = prediction.added_strain(wired, 59880.0, between, 2.0)
    assert expected == pytest.approx(1e6 * shown, abs=0.05)


def test_two_long_thin_wires_unbalance_by_what_the_issue_says() -> None:
    """Issue B: 120 Ω, 50 m of 0.14 mm² at 0.017241 Ω·mm²/m: 6.157 Ω a wire, 24.40 mV/V."""
    wire = 50 * 0.017241 / 0.14
    zero = prediction.output(circuit_of("quarter two-wire", 2, 120.0, 2.0, wire))
    assert 24.40 == pytest.approx(1e3 * zero, abs=5e-3)
    three = circuit_of("quarter three-wire", 3, 120.0, 2.0, wire)
    kept = prediction.sensitivity(three, "quarter three-wire")
    assert 4.88 == pytest.approx(100 * (1 - kept), abs=5e-3)


def test_every_kind_of_number_goes_through_a_circuit() -> None:
    def strain_with_leads(grid: float, wire: float, completion: float) -> float:
        wired = circuit_of("quarter three-wire", 3, grid, 2.0, wire, completion)
        shown: float = prediction.added_strain(wired, 1e5, ("supply-", "signal+"), 2.0)
        return shown

    assert_takes_every_kind(strain_with_leads, 351.0, 1.5, 350.0)
    assert_takes_every_kind(
        lambda grid, wire: prediction.supply_resistance(
            circuit_of("full bending", 6, grid, 2.0, wire)
        ),
        350.0,
        3.0,
    )


def test_a_dummy_and_a_completion_are_called_what_they_are() -> None:
    half = circuit_of("half with dummy", 3, 350.0, 2.0, completion=1000.0)
    kinds = [(each.name, each.kind, each.resistance) for each in half.elements]
    expected = [("grid 1", "grid", 350.0), ("dummy 2", "dummy", 350.0)]
    assert expected == kinds[:2]
    assert ("resistor 3", "completion", 1000.0) == kinds[2]


@pytest.mark.parametrize(
    ("call", "sentence"),
    [
        (lambda: layout("full five-wire"), "layout must be one of quarter two-wire"),
        (lambda: layout_for("full bending", 5), "wires of circuit full bending must number 4 or"),
        (lambda: circuit_of("half bending", 3, -1.0, 2.0), "resistance of grid 1 must be greater"),
        (lambda: circuit_of("half bending", 3, 1.0, 2.0, -1.0), "resistance of the supply. wire"),
        (
            lambda: circuit_of("half bending", 3, 1.0, 2.0).strained({"grid 9": 0.0}),
            "strains name no element: grid 9",
        ),
        (
            lambda: circuit_of("half bending", 3, 1.0, 2.0).strained({"grid 1": float("nan")}),
            "strain of grid 1 must be a finite number",
        ),
        (
            lambda: circuit_of("half bending", 3, 1.0, 2.0).altered("grid 9", 1.0),
            "element must be one of grid 1, grid 2, resistor 3, resistor 4, not 'grid 9'",
        ),
        (
            lambda: Circuit(LAYOUTS["half three-wire"], ((), (), (), ()), {}),
            "wires of circuit half three-wire must be supply",
        ),
        (
            lambda: Circuit(
                LAYOUTS["quarter two-wire"], ((), (), (), ()), {"supply-": 1.0, "signal+": 1.0}
            ),
            "arms must each hold an element; arm 1 is empty",
        ),
        (
            lambda: prediction.added_strain(
                circuit_of("half bending", 5, 350.0, 2.0), 1e5, ("signal+", "signal-"), 2.0
            ),
            "added may not join the module's buffered half bridge",
        ),
        (
            lambda: prediction.added_strain(
                circuit_of("half bending", 3, 350.0, 2.0), 1e5, ("signal+", "shield"), 2.0
            ),
            "between must name two nodes",
        ),
    ],
)
def test_what_does_not_fit_is_refused_by_name(call: object, sentence: str) -> None:
    assert callable(call)
    with pytest.raises(OutOfDomain, match=sentence):
        call()


def test_an_element_stands_in_a_circuit_once() -> None:
    whole = circuit_of("full bending", 4, 350.0, 2.0)
    with pytest.raises(OutOfDomain, match="arms must name each element once; grid 1 recurs"):
        Circuit(whole.layout, (whole.arms[0] * 2, *whole.arms[1:]), whole.wires)


def test_a_circuit_without_a_grid_has_no_sensitivity() -> None:
    arm = (Element("resistor", "completion", 350.0),)
    wires = dict.fromkeys(LAYOUTS["full four-wire"].wires, 0.0)
    two, three, four = ((Element(f"resistor {n}", "completion", 350.0),) for n in (2, 3, 4))
    bare = Circuit(LAYOUTS["full four-wire"], (arm, two, three, four), wires)
    with pytest.raises(OutOfDomain, match="circuit has no grid"):
        prediction.sensitivity(bare, "full bending")
