"""The Wheatstone bridge: exact output of four arms, and strain from output and back.

Arms are numbered round the bridge, 1 and 3 opposite; the output is a ratio of the supply (V/V),
e/E = R1/(R1 + R2) − R4/(R3 + R4). Multiply by 1000 for mV/V.
"""

from __future__ import annotations

from gaugelog.physics._maths import Number, is_zero, sqrt
from gaugelog.physics.arrangements import Shares, arrangement, bridge_factor
from gaugelog.physics.validity import (
    Notice,
    above,
    finite,
    largest,
    not_zero,
    positive,
    strictly_between,
)

ARM_NAMES = ("arm_1", "arm_2", "arm_3", "arm_4")
BRIDGE_SOURCE = "Dally and Riley, Experimental Stress Analysis, Wheatstone bridge (from memory)"
NONLINEARITY_NOTED = 0.001
"""Part of a strain that the non-linearity must pass before a notice names it."""


def output_ratio(arm_1: Number, arm_2: Number, arm_3: Number, arm_4: Number) -> Number:
    """Exact output of any four arms: e/E = R1/(R1 + R2) − R4/(R3 + R4).

    Units: ohm in, V/V out; nothing draws current from the output.
    Source: Dally and Riley, Experimental Stress Analysis, Wheatstone bridge (from memory).

    >>> output_ratio(350.0, 350.0, 350.0, 350.0)
    0.0
    """
    for name, value in zip(ARM_NAMES, (arm_1, arm_2, arm_3, arm_4), strict=True):
        positive(name, value)
    return arm_1 / (arm_1 + arm_2) - arm_4 / (arm_3 + arm_4)


def current_output(arm_1: Number, arm_2: Number, arm_3: Number, arm_4: Number) -> Number:
    """Exact output of four arms on a constant current: (R1 R3 − R2 R4)/(R1 + R2 + R3 + R4).

    Units: ohm in, volt per ampere of supply out.
    Source: Dally and Riley, Experimental Stress Analysis, constant-current bridge (from memory).

    >>> current_output(352.0, 350.0, 350.0, 350.0)
    0.4992867332382311
    """
    for name, value in zip(ARM_NAMES, (arm_1, arm_2, arm_3, arm_4), strict=True):
        positive(name, value)
    return (arm_1 * arm_3 - arm_2 * arm_4) / (arm_1 + arm_2 + arm_3 + arm_4)


def linear_ratio(
    arms: tuple[Number, Number, Number, Number], changes: tuple[Number, Number, Number, Number]
) -> Number:
    """Change of output to first order, arms of any value, from relative changes ΔR/R of each.

    R1R2/(R1 + R2)² (x1 − x2) + R3R4/(R3 + R4)² (x3 − x4). Units: ohm and ratios in, V/V out.
    Source: Dally and Riley, Experimental Stress Analysis, Wheatstone bridge (from memory).
    """
    one, two, three, four = (positive(name, arm) for name, arm in zip(ARM_NAMES, arms, strict=True))
    first, second, third, fourth = (finite("changes", change) for change in changes)
    near = one * two / (one + two) ** 2 * (first - second)
    far = three * four / (three + four) ** 2 * (third - fourth)
    return near + far


def strain_output(
    strain: Number, factor: Number, name: str, poisson: Number = 0.0, initial: Number = 0.0
) -> Number:
    """Exact output of an arrangement of equal grids under the strain it looks for.

    Each arm is R(1 + K s ε) with its share s; `initial` is the output before loading, taken to
    sit in arms 1 and 2. Units: ratio in, V/V out.
    Source: Dally and Riley, Experimental Stress Analysis, Wheatstone bridge (from memory).

    >>> round(5000 * strain_output(0.002, 2.0, "quarter three-wire"), 8)
    4.99001996
    """
    change = not_zero("factor", factor) * finite("strain", strain)
    one, two, three, four = _changed_arms(arrangement(name).shares(poisson), change)
    return output_ratio(_initial_skew(initial) * one, two, three, four)


def indicated_strain(
    ratio: Number, setting: Number, name: str = "quarter three-wire", poisson: Number = 0.0
) -> Number:
    """Strain a linear instrument shows: ε = 4 (e/E)/(K B), with B the bridge factor.

    `setting` is the instrument's gauge factor. Units: V/V in, ratio out.
    Source: Dally and Riley, Experimental Stress Analysis, Wheatstone bridge (from memory).

    >>> indicated_strain(0.0005, 2.0)
    0.001
    """
    factor = not_zero("setting", setting) * bridge_factor(name, poisson)
    return 4 * finite("ratio", ratio) / factor


def actual_strain(
    ratio: Number, factor: Number, name: str, poisson: Number = 0.0, initial: Number = 0.0
) -> Number:
    """Strain that gives an output: `strain_output` turned round, its non-linearity undone.

    `initial` is the output before loading, taken to sit in arms 1 and 2. Units: V/V in, ratio
    out. Source: Dally and Riley, Experimental Stress Analysis, Wheatstone bridge (from memory).
    """
    not_zero("factor", factor)
    _, two, three, _ = arrangement(name).shares(poisson)
    skew = _initial_skew(initial)
    quotient = _full_quotient(ratio, skew) if three else _half_quotient(ratio, skew)
    if is_zero(two):
        return (quotient - 1) / factor
    return (quotient - 1) / (1 - two * quotient) / factor


def nonlinearity_of_indicated(
    strain: Number, factor: Number, name: str, poisson: Number = 0.0
) -> Number:
    """Non-linearity as a part of the indicated strain: (ε − ε_indicated)/ε_indicated.

    Zero for half and full bending and for torsion; K ε/2 for a quarter bridge. Units: ratios.
    Source: Dally and Riley, Experimental Stress Analysis, Wheatstone bridge (from memory).
    """
    indicated = _seen(not_zero("strain", strain), factor, name, poisson)
    return (strain - indicated) / indicated


def nonlinearity_of_actual(
    strain: Number, factor: Number, name: str, poisson: Number = 0.0
) -> Number:
    """Non-linearity as a part of the actual strain: (ε − ε_indicated)/ε.

    Texts mean now this, now `nonlinearity_of_indicated`; they differ. Units: ratios.
    Source: Dally and Riley, Experimental Stress Analysis, Wheatstone bridge (from memory).
    """
    return (not_zero("strain", strain) - _seen(strain, factor, name, poisson)) / strain


def indicated_strain_notices(
    strain: Number, factor: Number, name: str, poisson: Number = 0.0
) -> tuple[Notice, ...]:
    """A notice where a linear scale misreads the strain by more than 0.1 % of it."""
    size = largest(strain)
    worst = largest(nonlinearity_of_actual(size, factor, name, poisson)) if size else 0.0
    if worst <= NONLINEARITY_NOTED:
        return ()
    message = (
        f"The non-linearity of the bridge is {worst:.2%} of a strain of {size * 1e6:.0f} µm/m; "
        "a linear scale leaves it in the reading."
    )
    return (Notice("indicated strain", message, BRIDGE_SOURCE),)


def _seen(strain: Number, factor: Number, name: str, poisson: Number) -> Number:
    return indicated_strain(strain_output(strain, factor, name, poisson), factor, name, poisson)


def _changed_arms(shares: Shares, change: Number) -> Shares:
    """Each arm as a multiple of its resting value; none may be driven below nothing."""
    one, two, three, four = (
        1.0 if is_zero(share) else 1 + above("strain times factor", change * share, -1.0)
        for share in shares
    )
    return one, two, three, four


def _initial_skew(initial: Number) -> Number:
    """R1/R2 that gives the output before loading while arms 3 and 4 are equal."""
    strictly_between("initial", initial, -0.5, 0.5)
    return (1 + 2 * initial) / (1 - 2 * initial)


def _half_quotient(ratio: Number, skew: Number) -> Number:
    """Growth of R1/R2 when only arms 1 and 2 change."""
    strictly_between("ratio", ratio, -0.5, 0.5)
    return (1 + 2 * ratio) / (1 - 2 * ratio) / skew


def _full_quotient(ratio: Number, skew: Number) -> Number:
    """Growth t of R1/R2 and R3/R4 alike: the positive root of u(1−r)t² − r(1+u)t − (1+r) = 0."""
    strictly_between("ratio", ratio, -1.0, 1.0)
    middle = ratio * (1 + skew)
    root = sqrt(middle**2 + 4 * skew * (1 - ratio**2))
    return (middle + root) / (2 * skew * (1 - ratio))
