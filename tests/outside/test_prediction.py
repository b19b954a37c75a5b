"""Zero, strain, shunt and leak of every layout, held to a circuit simulator over 500 circuits.

The simulator's netlists are written from the pictures below, not from the program's own network.
"""

from __future__ import annotations

from dataclasses import dataclass
from pathlib import Path

import numpy as np
import pytest

from gaugelog.physics import circuit, layouts, prediction
from gaugelog.physics.arrangements import ARRANGEMENTS
from gaugelog.physics.circuit import Circuit, Element
from gaugelog.physics.network import Network, Resistor
from tests.foreign import needs
from tests.outside.cases import Case, case
from tests.outside.spice import Bench, resistances, voltages

CHECKS = (
    layouts.layout,
    layouts.layout_for,
    circuit.circuit_of,
    prediction.network_of,
    prediction.output,
    prediction.strained_output,
    prediction.added_strain,
    prediction.sensitivity,
    prediction.resistance_error,
    prediction.supply_resistance,
)
FULL_SCALE = 2e-3
"""Volt per volt; the program must agree to a millionth of it."""

PICTURES = {
    "quarter two-wire": "w supply- a, w signal+ b, 1 a b, 2 signal+ supply+, 3 supply+ signal-, "
    "4 signal- supply-",
    "quarter three-wire": "w supply- a, w signal+ b, w completion b, 1 a b, "
    "2 completion supply+, 3 supply+ signal-, 4 signal- supply-",
    "half three-wire": "w supply- a, w signal+ b, w supply+ c, 1 a b, 2 b c, "
    "3 supply+ signal-, 4 signal- supply-",
    "half five-wire": "w supply- a, w signal+ b, w supply+ c, w sense- a, w sense+ c, 1 a b, "
    "2 b c, 3 half+ signal-, 4 signal- half-",
    "opposite four-wire": "w supply- a, w signal+ b, w supply+ c, w signal- d, 1 a b, "
    "2 signal+ supply+, 3 c d, 4 signal- supply-",
    "full four-wire": "w supply- a, w signal+ b, w supply+ c, w signal- d, 1 a b, 2 b c, 3 c d, "
    "4 d a",
    "full six-wire": "w supply- a, w signal+ b, w supply+ c, w signal- d, w sense- a, w sense+ c, "
    "1 a b, 2 b c, 3 c d, 4 d a",
}
"""Each layout as drawn: `w` a wire from its pin, a digit an arm, between two corners."""

TABS = {"a": "supply- tab", "b": "signal+ tab", "c": "supply+ tab", "d": "signal- tab"}
"""The program's name of each corner at the article."""


@dataclass(frozen=True)
class Trial:
    """A circuit as built and as drawn, and a resistor between two of its corners."""

    circuit: Circuit
    drawn: Network
    shunt: float
    corners: tuple[str, str]

    def bench(self, *, shunted: bool) -> Bench:
        """The drawn circuit on the simulator's bench, buffers where the module has them."""
        added = Resistor("shunt", *self.corners, self.shunt)
        whole = self.drawn.joined(added) if shunted else self.drawn
        followers = (("half+", "sense+"), ("half-", "sense-")) if "half+" in whole.nodes else ()
        return Bench(whole, supply=("supply+", "supply-"), followers=followers)

    def measured(self, volts: dict[str, float]) -> float:
        """The signal as a part of the voltage at the sense pins, or at the supply pins."""
        high, low = volts.get("sense+", 1.0), volts.get("sense-", 0.0)
        return (volts["signal+"] - volts["signal-"]) / (high - low)

    @property
    def between(self) -> tuple[str, str]:
        """The shunt's two nodes in the program's words."""
        first, second = (TABS.get(corner, corner) for corner in self.corners)
        return first, second


def _trial(draw: np.random.Generator, name: str) -> Trial:
    strokes = [stroke.split() for stroke in PICTURES[name].split(", ")]
    arms: dict[int, tuple[Element, ...]] = {}
    drawn, wires, corners = [], {}, set[str]()
    grid = float(draw.choice([120.0, 350.0, 1000.0]))
    for place, (what, start, end) in enumerate(strokes):
        if not {"half+", "half-"} & {start, end}:
            corners |= {start, end} - {"signal-"} if name == "half five-wire" else {start, end}
        if what == "w":
            wires[start] = float(draw.uniform(0.05, 10.0))
            drawn.append(Resistor(f"w{place}", start, end, wires[start]))
        else:
            arms[int(what)] = _random_arm(draw, what, grid)
            total = sum(
                each.resistance * (1 + each.factor * each.strain) for each in arms[int(what)]
            )
            drawn.append(Resistor(f"a{what}", start, end, total))
    first, second = draw.permutation(len(corners))[:2]
    pair = sorted(corners)[first], sorted(corners)[second]
    built = Circuit(layouts.layout(name), (arms[1], arms[2], arms[3], arms[4]), wires)
    return Trial(built, Network(tuple(drawn)), float(10 ** draw.uniform(3.5, 7)), pair)


def _random_arm(draw: np.random.Generator, number: str, grid: float) -> tuple[Element, ...]:
    """A strained grid, sometimes with a trim in series."""
    factor, strain = float(draw.uniform(1.8, 3.5)), float(draw.uniform(-3e-3, 3e-3))
    resistance = grid * float(draw.uniform(0.995, 1.005))
    arm = (Element(f"grid {number}", "grid", resistance, factor, strain),)
    trim = Element(f"trim {number}", "trim", float(draw.uniform(0.1, 2.0)))
    return (*arm, trim) if draw.random() < 0.5 else arm


def _trials(count: int) -> list[Trial]:
    draw = np.random.default_rng(7)
    names = list(PICTURES)
    return [_trial(draw, names[place % len(names)]) for place in range(count)]


@needs("ngspice")
def test_500_random_circuits_read_what_the_simulator_says(tmp_path: Path) -> None:
    """Every layout: unequal arms and wires, series elements, strain; then a resistor anywhere."""
    trials = _trials(500)
    plain = voltages([each.bench(shunted=False) for each in trials], tmp_path)
    shunted = voltages([each.bench(shunted=True) for each in trials], tmp_path)
    for each, before, after in zip(trials, plain, shunted, strict=True):
        zero = each.measured(before)
        found = prediction.output(each.circuit)
        assert zero == pytest.approx(found, rel=0, abs=1e-6 * FULL_SCALE)
        setting = 2.0
        shown = prediction.added_strain(each.circuit, each.shunt, each.between, setting)
        expected = (each.measured(after) - zero) * 4 / setting
        assert expected == pytest.approx(shown, rel=0, abs=1e-6 * FULL_SCALE)


@needs("ngspice")
def test_the_supply_sees_what_the_simulator_says(tmp_path: Path) -> None:
    trials = [each for each in _trials(70) if "half+" not in each.drawn.nodes]
    expected = resistances([(each.drawn, "supply+", "supply-") for each in trials], tmp_path)
    for each, ohm in zip(trials, expected, strict=True):
        assert ohm == pytest.approx(prediction.supply_resistance(each.circuit), rel=1e-9)


@needs("ngspice")
@pytest.mark.parametrize(
    ("name", "wires", "picture"),
    [
        ("quarter two-wire", 2, "quarter two-wire"),
        ("quarter three-wire", 3, "quarter three-wire"),
        ("half with dummy", 3, "half three-wire"),
        ("half bending", 5, "half five-wire"),
        ("half Poisson", 3, "half three-wire"),
        ("opposite arms", 4, "full four-wire"),
        ("full bending", 6, "full six-wire"),
        ("full torsion", 4, "full four-wire"),
        ("full Poisson", 4, "full four-wire"),
    ],
)
def test_each_arrangement_loses_what_the_simulator_says(
    name: str, wires: int, picture: str, tmp_path: Path
) -> None:
    """Sensitivity with wires, as the simulator's slope over ±200 µm/m against ideal equal arms."""
    grid, factor, wire, poisson, step = 350.0, 2.1, 4.0, 0.3, 2e-4
    shares = ARRANGEMENTS[name].shares(poisson)
    readings = [
        _drawn_output(picture, grid, wire, [factor * share * strain for share in shares], tmp_path)
        for strain in (step, -step)
    ]
    one, two, three, four = shares
    ideal = factor * (one - two + three - four) / 4
    expected = (readings[0] - readings[1]) / (2 * step) / ideal
    wired = circuit.circuit_of(name, wires, grid, factor, wire)
    assert picture == layouts.layout_for(name, wires).name
    assert expected == pytest.approx(prediction.sensitivity(wired, name, poisson), rel=1e-6)
    strained = prediction.strained_output(wired, name, step, poisson)
    assert readings[0] == pytest.approx(strained, abs=1e-12)


def _drawn_output(
    picture: str, grid: float, wire: float, changes: list[float], folder: Path
) -> float:
    resistors = tuple(
        Resistor(
            f"r{place}", start, end, wire if what == "w" else grid * (1 + changes[int(what) - 1])
        )
        for place, (what, start, end) in enumerate(
            stroke.split() for stroke in PICTURES[picture].split(", ")
        )
    )
    drawn = Network(resistors)
    trial = Trial(circuit.circuit_of("quarter two-wire", 2, 1.0, 2.0), drawn, 1.0, ("a", "b"))
    return trial.measured(voltages([trial.bench(shunted=False)], folder)[0])


@needs("ngspice")
def test_the_resistance_that_explains_a_zero_nulls_the_difference(tmp_path: Path) -> None:
    """Put where the program says, the resistance makes the simulator read the measured zero."""
    wired = circuit.circuit_of("quarter three-wire", 3, 351.2, 2.1, 1.0, 350.0)
    extra = prediction.resistance_error(wired, 1.35e-3, "grid 1")
    network = prediction.network_of(wired).changed("grid 1", 351.2 + extra)
    volts = voltages([Bench(network, supply=("supply+", "supply-"))], tmp_path)[0]
    assert 1.35e-3 == pytest.approx(volts["signal+"] - volts["signal-"], abs=1e-6)


def test_leads_of_the_three_wire_circuit_warm_without_effect() -> None:
    given = case("C03-10")
    change = _warmed(given.value("RL_each"), given.value("RL_each"), given)
    given.expect("indicated", change)


def test_unequal_leads_leave_the_residue_of_the_case() -> None:
    given = case("C03-11")
    change = _warmed(given.value("RL1"), given.value("RL2"), given)
    given.expect("indicated_change", change)


def _warmed(first: float, second: float, given: Case) -> float:
    """µm/m indicated by a three-wire bridge when the leads in both arms warm."""
    value = given.value
    growth = 1 + value("alpha") * value("dT")
    outputs = []
    for part in (1.0, growth):
        wired = circuit.circuit_of("quarter three-wire", 3, value("Rg"), value("GF"))
        leads = {"supply-": first * part, "completion": second * part, "signal+": first * part}
        outputs.append(prediction.output(Circuit(wired.layout, wired.arms, leads)))
    return float((outputs[1] - outputs[0]) * 4e6 / value("GF"))


def test_a_shunt_at_the_far_end_shows_what_the_case_says() -> None:
    given = case("C04-08")
    wired = circuit.circuit_of(
        "quarter three-wire",
        3,
        given.value("Rg"),
        given.value("GF"),
        given.value("RL_each"),
        given.value("Rd"),
    )
    tabs = ("supply- tab", "signal+ tab")
    found = prediction.added_strain(wired, given.value("Rs"), tabs, given.value("GF"))
    given.expect("indicated", 1e6 * found)
