"""From strain to reading and back: all that stands between a surface and what a module shows.

What the module will show is worked out from the planned strain (`expected_reading`); what the
strain then is taken to be is worked back through the same formulas (`estimated_strain`). A budget
asks how far the way back goes astray.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from math import pi, sqrt

from gaugelog.physics._maths import Number
from gaugelog.physics.arrangements import arrangement, bridge_factor
from gaugelog.physics.bridge import actual_strain, indicated_strain, strain_output
from gaugelog.physics.leads import desensitisation
from gaugelog.physics.plane import PlaneStrain, strain_along
from gaugelog.physics.shunt import simulated_strain
from gaugelog.physics.strain import strain_from_resistances
from gaugelog.physics.temperature import factor_at, output_at_setting
from gaugelog.physics.transverse import CALIBRATION_POISSON
from gaugelog.physics.transverse import indicated_strain as felt_strain
from gaugelog.physics.validity import finite, not_zero, positive

TERMS: dict[str, tuple[str, str]] = {
    "factor": ("gauge factor at the reference temperature", ""),
    "factor_slope": ("relative change of the gauge factor per kelvin", "1/K"),
    "celsius": ("temperature of the grid when read", "°C"),
    "transverse": ("transverse sensitivity of the grid", ""),
    "biaxiality": ("strain across the axis asked for over strain along it", ""),
    "misalignment": ("angle between the grid and the axis asked for", "rad"),
    "shear": ("shear strain in those axes over strain along the axis", ""),
    "thermal": ("thermal output at the planned temperature and the factor that is set", "strain"),
    "thermal_slope": ("slope of the thermal output there", "strain/K"),
    "scatter": ("scatter of one gauge's thermal output in its lot", "strain"),
    "resistance": ("resistance of one grid", "ohm"),
    "wire": ("resistance of one lead wire", "ohm"),
    "wire_drift": ("drift of the wires of the grid's arm against its neighbour's", "ohm"),
    "leak": ("leakage across the grid that appeared since the zero", "S"),
    "shunt_error": ("relative error of the shunt resistor that set the scale", ""),
    "gain": ("gain of the instrument", ""),
    "zero": ("zero error and drift of the instrument", "strain"),
    "resolution": ("rounding of the display", "strain"),
    "nonlinearity": ("non-linearity that the instrument leaves uncorrected", "strain"),
    "repeatability": ("scatter of repeated readings", "strain"),
}
"""Every input of the reading and of the budget: what it is, and its unit."""


@dataclass(frozen=True, slots=True)
class PlannedCircuit:
    """What is exactly known of a circuit: its plan and how it is built.

    `strain` is the planned strain, `celsius` the planned temperature, `setting` the instrument's
    gauge factor, `layout` the lead wires as `leads.desensitisation` names them, `shunt` the
    resistor in ohm that set the scale, if one did. `factor_poisson` is that of the beam on which
    the gauge factor was found.
    """

    strain: float
    celsius: float
    arrangement: str = "quarter three-wire"
    layout: str = "quarter three-wire"
    setting: float = 2.0
    poisson: float = 0.3
    reference_celsius: float = 23.0
    factor_poisson: float = CALIBRATION_POISSON
    resistance: float = 350.0
    shunt: float | None = None

    def __post_init__(self) -> None:
        not_zero("strain", self.strain)
        finite("celsius", self.celsius)
        not_zero("setting", self.setting)
        positive("resistance", self.resistance)
        arrangement(self.arrangement)
        if self.shunt is not None:
            positive("shunt", self.shunt)

    def nominal(self) -> dict[str, float]:
        """A value for every term: as planned, and nothing where nothing is planned."""
        given = {
            "factor": self.setting,
            "celsius": self.celsius,
            "biaxiality": -self.poisson,
            "resistance": self.resistance,
            "gain": 1.0,
        }
        return {name: given.get(name, 0.0) for name in TERMS}


def expected_reading(circuit: PlannedCircuit, terms: Mapping[str, Number]) -> Number:
    """What the instrument shows at the planned strain, as strain at its setting.

    `terms` has a value for every name in `TERMS`. Units: ratio out. Source: the formulas of
    `bridge`, `leads`, `plane`, `shunt`, `strain`, `temperature` and `transverse`, each with its
    own source.
    """
    felt = circuit.strain * _response(circuit, terms)
    seen = felt + _apparent(circuit, terms)
    ratio = strain_output(seen, _factor_as_wired(circuit, terms), *_bridge(circuit))
    shown = indicated_strain(ratio, circuit.setting, *_bridge(circuit))
    return (shown - _instrument(terms)) / (terms["gain"] * _shunt_gain(circuit, terms))


def estimated_strain(
    circuit: PlannedCircuit, reading: Number, terms: Mapping[str, Number]
) -> Number:
    """The strain that a reading stands for: `expected_reading` turned round, step by step.

    Units: ratio in and out. Source: as `expected_reading`.
    """
    shown = reading * terms["gain"] * _shunt_gain(circuit, terms) + _instrument(terms)
    ratio = shown * circuit.setting * bridge_factor(*_bridge(circuit)) / 4
    seen = actual_strain(ratio, _factor_as_wired(circuit, terms), *_bridge(circuit))
    felt = seen - _apparent(circuit, terms)
    return felt / _response(circuit, terms)


def _bridge(circuit: PlannedCircuit) -> tuple[str, float]:
    return circuit.arrangement, circuit.poisson


def _factor_as_wired(circuit: PlannedCircuit, terms: Mapping[str, Number]) -> Number:
    """Gauge factor at the grid's temperature, less what the wires take."""
    left = desensitisation(circuit.layout, terms["resistance"], terms["wire"])
    return _warm_factor(circuit, terms) * left


def _warm_factor(circuit: PlannedCircuit, terms: Mapping[str, Number]) -> Number:
    rise = terms["celsius"] - circuit.reference_celsius
    return factor_at(terms["factor"], terms["factor_slope"], rise)


def _response(circuit: PlannedCircuit, terms: Mapping[str, Number]) -> Number:
    """What the grid feels, set askew and feeling across, over the strain along the axis."""
    field = PlaneStrain(1.0, terms["biaxiality"], terms["shear"])
    askew = terms["misalignment"]
    along, across = strain_along(field, askew), strain_along(field, askew + pi / 2)
    return felt_strain(along, across, terms["transverse"], circuit.factor_poisson)


def _apparent(circuit: PlannedCircuit, terms: Mapping[str, Number]) -> Number:
    """Strain that the circuit feigns: temperature, wires and leakage, each in its share."""
    factor = bridge_factor(*_bridge(circuit))
    grids = arrangement(circuit.arrangement).outside
    signs = sum(1 if arm % 2 else -1 for arm in grids)
    stated = terms["thermal"] + terms["thermal_slope"] * (terms["celsius"] - circuit.celsius)
    warm = output_at_setting(stated, circuit.setting, _warm_factor(circuit, terms))
    one_arm = terms["scatter"] * sqrt(len(grids)) + _wire_strain(terms) + _leak_strain(terms)
    return (warm * signs + one_arm) / factor


def _wire_strain(terms: Mapping[str, Number]) -> Number:
    grid = terms["resistance"]
    return strain_from_resistances(grid, grid + terms["wire_drift"], terms["factor"])


def _leak_strain(terms: Mapping[str, Number]) -> Number:
    """By the leakage itself, which may be nothing, or less than at the zero."""
    grid = terms["resistance"]
    return strain_from_resistances(grid, grid / (1 + grid * terms["leak"]), terms["factor"])


def _shunt_gain(circuit: PlannedCircuit, terms: Mapping[str, Number]) -> Number:
    """True over nominal strain of the shunt that set the scale; 1 without one."""
    if circuit.shunt is None:
        return 1.0
    arm = terms["resistance"], terms["factor"]
    true = circuit.shunt * (1 + terms["shunt_error"])
    return simulated_strain(*arm, true) / simulated_strain(*arm, circuit.shunt)


def _instrument(terms: Mapping[str, Number]) -> Number:
    """What the instrument adds to a reading."""
    return terms["zero"] + terms["resolution"] + terms["nonlinearity"] + terms["repeatability"]
