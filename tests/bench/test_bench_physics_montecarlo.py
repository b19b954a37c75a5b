"""A million Monte Carlo draws of a circuit's strain against the bare NumPy arithmetic of them."""

from __future__ import annotations

import math

import numpy
import pytest

from gaugelog.physics.circuit_budget import all_inputs, strain_model
from gaugelog.physics.estimates import normal, rectangular
from gaugelog.physics.montecarlo import simulate
from gaugelog.physics.reading import PlannedCircuit, expected_reading
from tests.bench.compare import compare

DRAWS = 1_000_000
PLAN = PlannedCircuit(1000e-6, 80.0, setting=2.1)
HALF_WIDTHS = {
    "factor": (2.1, 0.021),
    "factor_slope": (1e-4, 2e-5),
    "celsius": (80.0, 2.0),
    "transverse": (0.006, 0.002),
    "biaxiality": (-0.3, 0.03),
    "misalignment": (0.0, math.radians(2)),
    "wire": (2.0, 0.1),
    "gain": (1.0, 0.001),
}
SPREADS = {"thermal": (-30e-6, 5e-6), "scatter": (0.0, 7.7e-6), "repeatability": (0.0, 1e-6)}
INPUTS = {
    **{name: rectangular(*pair) for name, pair in HALF_WIDTHS.items()},
    **{name: normal(*pair) for name, pair in SPREADS.items()},
}


def _bare() -> tuple[float, float, float, float]:
    """The same draws and the same arithmetic, written out for this one circuit."""
    random = numpy.random.default_rng(1)
    x = {n: random.uniform(v - a, v + a, DRAWS) for n, (v, a) in HALF_WIDTHS.items()}
    x |= {n: random.normal(v, u, DRAWS) for n, (v, u) in SPREADS.items()}
    reading = expected_reading(
        PLAN, {n: each.value for n, each in all_inputs(PLAN, INPUTS).items()}
    )
    ratio = (reading * x["gain"] + x["repeatability"]) * 2.1 / 4
    factor = x["factor"] * (1 + x["factor_slope"] * (x["celsius"] - 23))
    seen = ((1 + 2 * ratio) / (1 - 2 * ratio) - 1) / (factor * 350 / (350 + x["wire"]))
    felt = seen - x["thermal"] * 2.1 / factor - x["scatter"]
    mean, half = (1 + x["biaxiality"]) / 2, (1 - x["biaxiality"]) / 2
    turn = half * numpy.cos(2 * x["misalignment"])
    response = (mean + turn + x["transverse"] * (mean - turn)) / (1 - 0.285 * x["transverse"])
    strain = felt / response
    low, high = numpy.quantile(strain, (0.025, 0.975))
    return float(strain.mean()), float(strain.std(ddof=1)), float(low), float(high)


def _ours() -> tuple[float, float, float, float]:
    found = simulate(strain_model(PLAN, INPUTS), all_inputs(PLAN, INPUTS), draws=DRAWS)
    return found.mean, found.uncertainty, found.low, found.high


@pytest.mark.bench
@pytest.mark.xdist_group("bench")
def test_a_million_draws_cost_no_more_than_twice_the_bare_arithmetic(
    capsys: pytest.CaptureFixture[str],
) -> None:
    assert _bare() == pytest.approx(_ours(), rel=1e-3)
    found = compare(_ours, _bare, repeats=5)
    with capsys.disabled():
        print(f"\n{found.line('a million Monte Carlo draws of a circuit')}")
    assert found.ratio <= 2.0
