"""How much of a gauge's thermal output its circuit shows: gauges in adjacent arms cancel it."""

from __future__ import annotations

from gaugelog.ledger.circuits import CircuitPlanned
from gaugelog.physics.arrangements import bridge_factor

SOURCE = "equal gauges in adjacent arms, equally warm; common practice"


def thermal_share(circuit: CircuitPlanned, poisson: float) -> float:
    """Strain that the circuit shows over the thermal output that each of its gauges has alike.

    1 for one gauge, 0 where adjacent arms cancel. Gauges in arms 1 and 3 count up, in 2 and 4
    down; resistors have no thermal output to speak of.
    """
    arms = [
        number
        for number, arm in enumerate(circuit.arms, start=1)
        if any(element.grid is not None for element in arm)
    ]
    signs = sum(1 if number % 2 else -1 for number in arms)
    return signs / float(bridge_factor(circuit.arrangement, poisson))
