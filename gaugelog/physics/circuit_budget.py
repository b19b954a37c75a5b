"""The budget of a circuit's strain at its planned strain and temperature.

Each input of the way from reading to strain (`reading.estimated_strain`) that is not exactly
known adds its part, through the very formulas that correct the reading.
"""

from __future__ import annotations

from collections.abc import Mapping

from gaugelog.physics._maths import Number
from gaugelog.physics.estimates import Correlations, Estimate, exactly
from gaugelog.physics.reading import TERMS, PlannedCircuit, estimated_strain, expected_reading
from gaugelog.physics.uncertainty import Budget, Model, budget
from gaugelog.physics.validity import one_of


def circuit_budget(
    circuit: PlannedCircuit,
    inputs: Mapping[str, Estimate],
    correlations: Correlations | None = None,
) -> Budget:
    """The budget of the circuit's strain: `inputs` by the names in `TERMS`, the others exact.

    The budget's value is the planned strain. Units: those of `TERMS` in, ratio out. Source:
    JCGM 100:2008, 5 and 8, on the formulas of this room.
    """
    whole = all_inputs(circuit, inputs)
    return budget(strain_model(circuit, whole), whole, correlations)


def strain_model(circuit: PlannedCircuit, inputs: Mapping[str, Estimate]) -> Model:
    """The formula that turns the planned reading into strain, for a budget or a simulation.

    Source: `estimated_strain` at the reading that `expected_reading` gives.
    """
    values = {name: each.value for name, each in all_inputs(circuit, inputs).items()}
    reading = expected_reading(circuit, values)

    def model(**terms: Number) -> Number:
        return estimated_strain(circuit, reading, terms)

    return model


def all_inputs(circuit: PlannedCircuit, inputs: Mapping[str, Estimate]) -> dict[str, Estimate]:
    """The inputs of a budget, those left out as planned and exact; refuses unknown names.

    Source: common practice; a budget lists every input it takes as exact.
    """
    for name in inputs:
        one_of("input", name, tuple(TERMS))
    return {**{name: exactly(value) for name, value in circuit.nominal().items()}, **inputs}


def shared_correlation(one: Budget, other: Budget, shared: tuple[str, ...]) -> float:
    """Correlation of two circuits' strains through the inputs that both share.

    r = Σ ci cj u²/(ui uj) over the inputs called `shared` (one lot's factor, one temperature, one
    module's gain). Units: none. Source: JCGM 100:2008, F.1.2.3.
    """
    common = sum(_signed(one, name) * _signed(other, name) for name in shared)
    scale = one.uncertainty * other.uncertainty
    return max(-1.0, min(1.0, common / scale)) if scale else 0.0


def _signed(found: Budget, name: str) -> float:
    """What one input contributes, with the sign of its sensitivity; nothing if it is exact."""
    for part in found.parts:
        if part.name == name:
            return part.sensitivity * part.estimate.uncertainty
    return 0.0
