"""What warmth does to a circuit's zero: thermal output of each grid, lead wires, their doubt."""

from __future__ import annotations

from dataclasses import dataclass, replace
from math import hypot, sqrt

from gaugelog.physics.bridge import indicated_strain
from gaugelog.physics.circuit import Circuit
from gaugelog.physics.conductors import at_temperature
from gaugelog.physics.drift import warming_output
from gaugelog.physics.prediction import STEP, output
from gaugelog.physics.temperature import SCATTER_RATES

SCATTER = SCATTER_RATES["constantan"] / 2
"""Standard scatter of thermal output within a lot, per kelvin. Common practice."""
UNKNOWN_CURVE = 1e-6 / sqrt(3)
"""Standard uncertainty per kelvin where only the expansion class is known. Common practice."""


@dataclass(frozen=True, slots=True)
class GridWarmth:
    """How one grid answers warmth: its name in the circuit, its lot, and the lot's figures.

    `coefficients` are those of the lot's polynomial as ratios, °C, the constant first; empty
    where there is none. `matched_to` is None where the lot has no expansion class either.
    """

    name: str
    lot: str
    coefficients: tuple[float, ...]
    measured_with: float
    factor: float
    article: float
    matched_to: float | None

    @property
    def known(self) -> bool:
        """Whether anything is known of it."""
        return bool(self.coefficients) or self.matched_to is not None

    def change(self, start: float, end: float) -> float:
        """Change of its thermal output between two temperatures, °C; a ratio."""
        matched = self.article if self.matched_to is None else self.matched_to
        return float(
            warming_output(
                start,
                end,
                self.coefficients,
                self.measured_with,
                self.factor,
                self.article,
                matched,
            )
        )


@dataclass(frozen=True, slots=True)
class Warmth:
    """A circuit and how its grids answer warmth, all of them as warm as each other."""

    circuit: Circuit
    grids: tuple[GridWarmth, ...]
    setting: float
    arrangement: str
    poisson: float = 0.0

    def feigned(self, start: float, end: float) -> float:
        """Strain that warming the grids from `start` to `end` °C feigns; a ratio."""
        return sum(
            self._share(grid.name) * grid.change(start, end) for grid in self.grids if grid.known
        )

    def wires(self, start: float, end: float) -> float:
        """Strain that warming the lead wires from `start` to `end` °C feigns; a ratio."""
        cold, hot = (self._leads_at(celsius) for celsius in (start, end))
        return self._strain(hot) - self._strain(cold)

    def uncertainty(self, start: float, end: float) -> float:
        """Standard uncertainty of what is feigned: scatter of each grid, doubt of a lot's curve.

        The doubt is one for all grids of a lot, so it cancels where they compensate each other.
        """
        shares = {grid.name: self._share(grid.name) for grid in self.grids}
        scatter = sqrt(sum(share**2 for share in shares.values())) * SCATTER
        curves: dict[str, float] = {}
        for grid in self.grids:
            if not grid.coefficients:
                curves[grid.lot] = curves.get(grid.lot, 0.0) + shares[grid.name]
        curve = sqrt(sum(share**2 for share in curves.values())) * UNKNOWN_CURVE
        return hypot(scatter, curve) * abs(end - start)

    @property
    def unknown(self) -> tuple[str, ...]:
        """Lots of which nothing is known."""
        return tuple(dict.fromkeys(grid.lot for grid in self.grids if not grid.known))

    def _share(self, name: str) -> float:
        """Indicated strain for each unit of thermal output of one grid."""
        part = self.circuit.element(name)
        moved = self.circuit.altered(name, float(part.resistance) * (1 + part.factor * STEP))
        return (self._strain(moved) - self._strain(self.circuit)) / STEP

    def _leads_at(self, celsius: float) -> Circuit:
        wires = {
            pin: at_temperature(resistance, celsius)
            for pin, resistance in self.circuit.wires.items()
        }
        return replace(self.circuit, wires=wires)

    def _strain(self, circuit: Circuit) -> float:
        found = indicated_strain(output(circuit), self.setting, self.arrangement, self.poisson)
        return float(found)
