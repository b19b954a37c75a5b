"""What a circuit shows of a leak across one of its grids, on the middle of what is possible."""

from __future__ import annotations

from gaugelog.physics.arrangements import bridge_factor
from gaugelog.physics.leakage import leakage_strain

SOURCE = "−R/(K (R + 2 Ri)) over the bridge factor, parallel resistance and ASTM E251 (from memory)"


def middle_leak(
    resistance: float, factor: float, insulation: float, arm: int, arrangement: str, poisson: float
) -> float:
    """Strain that the circuit shows, for a leakage half of what the insulation read allows.

    The leak may lie across the grid as a whole or not at all. In arm 2 or 4 it reads the other
    way; an arrangement with several active arms shows its part. Units: ohm in, ratio out.
    """
    one_arm = float(leakage_strain(resistance, factor, 2 * insulation))
    return (one_arm if arm % 2 else -one_arm) / float(bridge_factor(arrangement, poisson))
