"""The steps of a diagnosis, held to a circuit simulator and to a general optimiser."""

from __future__ import annotations

import math
from collections.abc import Sequence
from pathlib import Path

import numpy as np
import pytest
from numpy.typing import NDArray
from scipy.optimize import minimize_scalar

from gaugelog.physics import (
    defects,
    pin_fit,
    pin_network,
    pin_next,
    pin_trials,
    suspects,
    transfer,
)
from gaugelog.physics.circuit import circuit_of
from gaugelog.physics.network import Network, Resistor, resistance_between
from gaugelog.physics.pin_fit import Figures
from gaugelog.physics.pin_trials import SIZE_COST, Bench
from gaugelog.physics.suspects import CEILING, Ends, Suspect
from tests.foreign import needs
from tests.outside.spice import resistances

CHECKS = (
    transfer.solve,
    transfer.strength,
    transfer.changed_resistance,
    suspects.suspects,
    defects.found,
    defects.ohm,
    pin_fit.model,
    pin_fit.fit,
    pin_fit.predict,
    pin_trials.bench_of,
    pin_trials.terminals_of,
    pin_trials.ranked,
    pin_trials.grouped,
    pin_next.next_measurement,
)
TABS = ("supply+ tab", "supply- tab", "signal+ tab", "signal- tab")
SIZES = {"open": math.inf, "across": 470.0, "joint": 25.0, "value": 120.0}
ENDS: tuple[Ends, ...] = (
    ("supply+", "supply-"),
    ("supply+", "signal+"),
    ("supply-", "signal+"),
    ("signal-", "signal+"),
)


def _bench(name: str = "full bending") -> Bench:
    return pin_trials.bench_of(circuit_of(name, 4, 350.0, 2.0, 2.0), 0.001, 0.02, False)


def _changed(network: Network, suspect: Suspect, size: float) -> Network:
    """The network with a defect built in, resistor by resistor."""
    if suspect.family == "across":
        return network.joined(Resistor("path", *suspect.ends, size))
    wanted = suspect.present + size if suspect.family == "joint" else size
    return network.changed(suspect.where[0], wanted)


@needs("ngspice")
def test_every_suspect_moves_the_figures_as_the_simulator_says(tmp_path: Path) -> None:
    """Each open, path, joint and wrong value of a full bridge is built into the simulator."""
    bench = _bench()
    every = suspects.suspects(bench.network, bench.pins, frozenset())
    metal = {pin_network.ARTICLE, pin_network.SHIELD}
    tried = [each for each in every if each.family in SIZES and not metal & {*each.ends}]
    assert 60 > len(tried) > 30
    given = pin_fit.model(bench.solved, bench.network, bench.spread, ENDS, tried)
    wanted = np.array([_wanted(each) for each in tried])
    strengths = transfer.strength(given.present, given.own, wanted)
    predicted = pin_fit.predict(given, strengths)
    asked = [
        (_tied(_changed(bench.network, each, SIZES[each.family])), *ends)
        for each in tried
        for ends in ENDS
    ]
    expected = np.reshape(resistances(asked, tmp_path), (len(tried), len(ENDS)))
    closed = np.minimum(predicted, CEILING)
    assert np.minimum(expected, CEILING) == pytest.approx(closed, rel=1e-6)
    finite = transfer.changed_resistance(given.present, given.own, strengths)
    assert wanted == pytest.approx(finite, rel=1e-3)


def _wanted(suspect: Suspect) -> float:
    """The resistance that a suspect's change leads to."""
    size = SIZES[suspect.family]
    return min(suspect.present + size if suspect.family == "joint" else size, transfer.AIR)


def _tied(network: Network) -> Network:
    """Opens taken out and every node tied by 1 TΩ, so that the simulator can solve it."""
    first, *others = network.nodes
    kept = tuple(each for each in network.resistors if math.isfinite(each.resistance))
    return Network((*kept, *(Resistor(f"tie {node}", first, node, 1e12) for node in others)))


@needs("ngspice")
def test_a_swap_reads_as_the_simulator_says(tmp_path: Path) -> None:
    bench = _bench("full Poisson")
    assert {*TABS, *bench.pins, "ARTICLE", "SHIELD"} == {*pin_trials.terminals_of(bench)}
    swaps = [each for each in bench.suspected if each.family == "swapped"]
    assert 6 == len(swaps)
    network = bench.network.changed("grid 1", 300.0)
    for each in swaps:
        first, second = each.where
        rewired = Network(
            tuple(
                Resistor(
                    part.name,
                    {first: second, second: first}.get(part.start, part.start),
                    part.end,
                    part.resistance,
                )
                for part in network.resistors
            )
        )
        expected = resistances([(rewired, *ends) for ends in ENDS], tmp_path)
        touched = each.touched(ENDS)
        found = [resistance_between(network, *ends) for ends in touched]
        assert expected == pytest.approx(found, rel=1e-9)


def _figures(bench: Bench, planted: Network, seed: int) -> Figures:
    """Readings of a planted network by a 0.2 % meter."""
    draw = np.random.default_rng(seed)
    exact = np.array([resistance_between(planted, *ends) for ends in ENDS])
    sigma = 0.002 * exact
    overload = np.zeros(len(ENDS), dtype=bool)
    return Figures(ENDS, exact + sigma * draw.standard_normal(len(ENDS)), sigma, overload)


def _misfit(bench: Bench, figures: Figures, changed: Network, suspect: Suspect) -> float:
    """Chi-squared with the covariance that meter and parts make, slopes by finite differences."""
    predicted = _read(changed)
    slopes = []
    for each, spread in zip(bench.network.resistors, bench.spread, strict=True):
        if each.name in suspect.where:
            continue
        moved = _read(changed.changed(each.name, each.resistance * (1 + 1e-5)))
        slopes.append((moved - predicted) / (1e-5 * each.resistance) * spread)
    covariance = np.diag(figures.sigma**2) + np.array(slopes).T @ np.array(slopes)
    left = figures.ohm - predicted
    return float(left @ np.linalg.solve(covariance, left))


def _read(network: Network) -> NDArray[np.float64]:
    return np.array([resistance_between(network, *ends) for ends in ENDS])


@pytest.mark.parametrize("family", ["across", "joint", "value"])
def test_the_fitted_size_is_a_general_optimisers(family: str) -> None:
    """scipy minimises the whole chi-squared, its covariance remade at every trial size."""
    bench = _bench()
    tried = [each for each in bench.suspected if each.family == family][:6]
    for place, suspect in enumerate(tried):
        if {pin_network.ARTICLE, pin_network.SHIELD} & {*suspect.ends}:
            continue
        figures = _figures(bench, _changed(bench.network, suspect, SIZES[family]), place)
        given = pin_fit.model(bench.solved, bench.network, bench.spread, ENDS, [suspect])
        result = pin_fit.fit(given, figures)
        best = minimize_scalar(
            lambda size, suspect=suspect, figures=figures: _misfit(
                bench, figures, _changed(bench.network, suspect, size), suspect
            ),
            bounds=(0.5 * SIZES[family], 1.5 * SIZES[family]),
            method="bounded",
        )
        joint = suspect.present if family == "joint" else 0.0
        assert best.x == pytest.approx(float(result.size[0]) - joint, rel=5e-3)
        assert best.fun == pytest.approx(float(result.misfit[0]), abs=0.05)


def test_the_ranking_is_a_brute_force_ranking() -> None:
    """Sound, opens and swaps have no size: numpy's chi-squared ranks them as the program does."""
    bench = _bench("full Poisson")
    figures = _figures(bench, bench.network.changed("grid 3", 410.0), 5)
    trials = [each for each in pin_trials.ranked(bench, figures) if not each.suspect.sized]
    brute = [_brute(bench, figures, each.suspect) for each in trials]
    near = [place for place, each in enumerate(trials) if each.misfit < 1e6]
    assert len(near) > 4
    assert [brute[place] for place in near] == pytest.approx(
        [trials[place].misfit for place in near], rel=1e-3
    )
    assert sorted(brute[place] for place in near) == [brute[place] for place in near]
    best = pin_trials.ranked(bench, figures)[0]
    assert best.misfit - SIZE_COST < min(brute)


def _brute(bench: Bench, figures: Figures, suspect: Suspect) -> float:
    touched = suspect.touched(ENDS)
    network = bench.network
    if suspect.family == "open":
        network = network.changed(suspect.where[0], transfer.AIR)
    return _misfit_at(bench, figures, network, touched, suspect)


def _misfit_at(
    bench: Bench, figures: Figures, network: Network, touched: Sequence[Ends], suspect: Suspect
) -> float:
    solved = transfer.solve(network)
    pairs = solved.incidence(touched)
    predicted = solved.along(pairs)
    parts = solved.incidence([(each.start, each.end) for each in network.resistors])
    values = np.array([each.resistance for each in network.resistors])
    slopes = (solved.between(pairs, parts) / values) ** 2 * bench.spread
    slopes[:, [each.name in suspect.where for each in network.resistors]] = 0.0
    covariance = np.diag(figures.sigma**2) + slopes @ slopes.T
    left = figures.ohm - predicted
    return float(left @ np.linalg.solve(covariance, left))


def test_what_is_grouped_lies_within_three_sigma() -> None:
    """Three standard uncertainties, figure by figure (common practice), by plain arithmetic."""
    bench = _bench()
    figures = _figures(bench, bench.network.changed("grid 2", 390.0), 6)
    groups = pin_trials.grouped(pin_trials.ranked(bench, figures), figures)
    for group in groups:
        best = min(group, key=lambda each: each.misfit)
        for each in group:
            apart = np.abs(each.predicted - best.predicted) / figures.sigma
            assert np.all(apart <= 3.0)
    further = pin_next.next_measurement(bench, figures, groups)
    assert further is not None
    assert further.between is None or not {further.between} & {*ENDS}


def test_a_found_defect_is_named_by_its_size() -> None:
    """SI prefixes; a path under a fiftieth of an arm is a short (common practice)."""
    path = Suspect("across", ("supply+", "signal+"), ("supply+", "signal+"))
    assert "short" == defects.found(path, 2.0, 350.0).kind
    assert "leak" == defects.found(path, 2e6, 350.0).kind
    assert "2 MΩ" == defects.ohm(2e6)
    assert "2 kΩ" == defects.ohm(2e3)
    assert "2.0 Ω" == defects.ohm(2.0)
    joint = Suspect("joint", ("grid 1",), ("a", "b"), 350.0)
    assert 10.0 == pytest.approx(defects.found(joint, 360.0, 350.0).size or 0.0)


def test_changes_of_one_resistance_follow_sherman_and_morrison() -> None:
    """Against a fresh inverse by numpy of the changed network's nodal matrix."""
    network = pin_network.pin_network(circuit_of("full bending", 4, 350.0, 2.0, 3.0))
    solved = transfer.solve(network, (pin_network.ARTICLE, pin_network.SHIELD))
    ends = [("supply+", "signal-"), ("supply-", "signal+")]
    figures = solved.incidence(ends)
    for each in network.resistors:
        change = solved.incidence([(each.start, each.end)])
        own = solved.along(change)
        present = np.array([each.resistance])
        for wanted in (0.01, 100.0, 400.0, 1e8):
            s = transfer.strength(present, own, np.array([wanted]))
            moved = solved.between(figures, change)[:, 0]
            found = solved.along(figures) - s * moved**2
            fresh = transfer.solve(network.changed(each.name, wanted))
            assert fresh.along(fresh.incidence(ends)) == pytest.approx(found, rel=1e-6)
            back = transfer.changed_resistance(present, own, s)
            assert wanted == pytest.approx(float(back[0]), rel=1e-6)
