"""Balance of a bridge: the arm or trim that nulls it, strain by the null method, the dummy."""

from __future__ import annotations

from gaugelog.physics._maths import Number
from gaugelog.physics.bridge import ARM_NAMES, indicated_strain, output_ratio
from gaugelog.physics.validity import above, not_zero, one_of, positive

ARM_NUMBERS = (1, 2, 3, 4)


def balancing_arm(arms: tuple[Number, Number, Number, Number], arm: int) -> Number:
    """Resistance of one arm that nulls the bridge: the product of its neighbours by its opposite.

    `arm` is 1 to 4; its own value in `arms` does not count. Units: ohm. Source: R1 R3 = R2 R4,
    the balance of the Wheatstone bridge; Dally and Riley (from memory).

    >>> balancing_arm((1.0, 350.0, 350.0, 351.0), 1)
    351.0
    """
    one_of("arm", arm, ARM_NUMBERS)
    before, after, opposite = ((arm + step) % 4 for step in (2, 0, 1))
    for number in (before, after, opposite):
        positive(ARM_NAMES[number], arms[number])
    return arms[before] * arms[after] / arms[opposite]


def balancing_trim(arms: tuple[Number, Number, Number, Number], arm: int) -> Number:
    """Resistance to add in series in one arm so that the bridge is nulled.

    Negative where the arm is too large already: trim a neighbour instead. Units: ohm.
    Source: as `balancing_arm`.
    """
    return balancing_arm(arms, arm) - positive(ARM_NAMES[arm - 1], arms[arm - 1])


def balancing_parallel(arms: tuple[Number, Number, Number, Number], arm: int) -> Number:
    """Resistor that nulls the bridge when it lies across one arm: 1/(1/R_wanted − 1/R).

    The arm must be larger than the value that nulls. Units: ohm. Source: as `balancing_arm`,
    with the resistance of two resistors side by side.
    """
    wanted = balancing_arm(arms, arm)
    name = ARM_NAMES[arm - 1]
    here = positive(name, arms[arm - 1])
    spare = above(f"{name} less the value that nulls", here - wanted, 0.0)
    return wanted * here / spare


def strain_by_null(before: Number, after: Number, factor: Number, arm: int) -> Number:
    """Strain of the grid in arm 1 from the adjustable arm's value at balance, before and after.

    A neighbour (arm 2 or 4) follows R1 in proportion, the opposite arm 3 as its inverse; exact,
    without non-linearity. Units: ohm in, ratio out. Source: R1 R3 = R2 R4; Dally and Riley
    (from memory).
    """
    one_of("arm", arm, (2, 3, 4))
    positive("before", before)
    positive("after", after)
    growth = before / after if arm == 3 else after / before
    return (growth - 1) / not_zero("factor", factor)


def dummy_error(active: Number, dummy: Number, factor: Number) -> Number:
    """Strain indicated by a half bridge when active grid and dummy differ in thermal output.

    `active` and `dummy` are the apparent strains of the two grids, each at its own temperature;
    the dummy lies in arm 2. Exact; near active − dummy. Units: ratios.
    Source: the exact output of the bridge; Dally and Riley (from memory).

    >>> dummy_error(0.0001, 0.0001, 2.0)
    0.0
    """
    not_zero("factor", factor)
    above("active times factor", active * factor, -1.0)
    above("dummy times factor", dummy * factor, -1.0)
    return indicated_strain(output_ratio(1 + factor * active, 1 + factor * dummy, 1.0, 1.0), factor)
