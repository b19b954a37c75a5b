"""Forms of supply: direct, carrier, pulsed and constant current, by heat and by output.

What heats a grid is the effective (r.m.s.) voltage; what a module reads may be the peak.
"""

from __future__ import annotations

from gaugelog.physics._maths import Number, nominal, sqrt
from gaugelog.physics._order import any_of
from gaugelog.physics.bridge import ARM_NAMES
from gaugelog.physics.validity import Notice, between, finite, positive

CARRIER_MARGIN = 5.0
"""How many times the carrier's frequency must exceed that of the strain (common practice)."""


def effective_of_carrier(peak: Number) -> Number:
    """Effective voltage of a sine carrier from its peak: Ê/√2.

    Units: volt. Source: root mean square of a sine, any text on circuits.
    """
    return finite("peak", peak) / sqrt(2.0)


def effective_of_pulses(peak: Number, duty: Number) -> Number:
    """Effective voltage of a supply that is on for a part `duty` of the time: Ê √duty.

    Holds for heat while the pulses follow each other faster than the grid warms and cools.
    Units: volt and ratio in, volt out. Source: root mean square of a rectangular wave.

    >>> effective_of_pulses(10.0, 0.25)
    5.0
    """
    return finite("peak", peak) * sqrt(_duty(duty))


def pulse_peak(effective: Number, duty: Number) -> Number:
    """Peak of a pulsed supply that heats as much as a steady one: E/√duty.

    Units: volt and ratio in, volt out. Source: as `effective_of_pulses`, turned round.
    """
    return finite("effective", effective) / sqrt(_duty(duty))


def effective_of_pulses_notices(period: Number, settling: Number) -> tuple[Notice, ...]:
    """A notice where pulses are so slow that each heats the grid by itself.

    `settling` is the time constant with which the bonded grid warms, seconds: milliseconds on
    metal, longer on plastic (common practice).
    """
    if not any_of(nominal(positive("period", period)) > nominal(positive("settling", settling))):
        return ()
    return (
        Notice(
            "pulsed supply",
            "The pulses are slower than the grid warms and cools; judge the heat by the peak "
            "voltage, not by the mean.",
            "common practice",
        ),
    )


def carrier_bandwidth(carrier: Number) -> Number:
    """Highest frequency of strain that a carrier transmits: a fifth of the carrier's.

    Units: hertz. Source: common practice (amplitude modulation needs side bands on either side).
    """
    return positive("carrier", carrier) / CARRIER_MARGIN


def constant_current_output(
    current: Number, arm_1: Number, arm_2: Number, arm_3: Number, arm_4: Number
) -> Number:
    """Exact output of a bridge fed with constant current: I (R1 R3 − R2 R4)/(R1 + R2 + R3 + R4).

    A quarter bridge is half as non-linear as on constant voltage. Units: ampere and ohm in,
    volt out. Source: Dally and Riley, Experimental Stress Analysis, constant-current Wheatstone
    bridge (from memory).
    """
    for name, value in zip(ARM_NAMES, (arm_1, arm_2, arm_3, arm_4), strict=True):
        positive(name, value)
    loop = arm_1 + arm_2 + arm_3 + arm_4
    return finite("current", current) * (arm_1 * arm_3 - arm_2 * arm_4) / loop


def single_grid_output(current: Number, grid: Number, factor: Number, strain: Number) -> Number:
    """Change of voltage over one grid that carries constant current: I R K ε, no non-linearity.

    Units: ampere, ohm and ratios in, volt out. Source: Dally and Riley, Experimental Stress
    Analysis, potentiometer circuit at constant current (from memory).
    """
    change = finite("factor", factor) * finite("strain", strain)
    return finite("current", current) * positive("grid", grid) * change


def _duty(duty: Number) -> Number:
    return between("duty", positive("duty", duty), 0.0, 1.0)
