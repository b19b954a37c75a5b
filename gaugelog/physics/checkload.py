"""A check load in a known direction: whether each grid of a rosette is wired where it should be.

A load whose strain is known tells every grid what to read. Readings that fit in another order
than the planned one tell which grids are exchanged. An order gives for each place, from the
first, the number of the grid that is wired there.
"""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from itertools import islice
from typing import TypeAlias

from gaugelog.physics._maths import Number
from gaugelog.physics.arrangements import POISSON_HIGH, POISSON_LOW
from gaugelog.physics.plane import PlaneStrain, strain_along
from gaugelog.physics.validity import OutOfDomain, between, finite, not_negative

Order: TypeAlias = tuple[int, ...]

_MOST_ORDERS = 120
"""Orders looked for: all there are of five grids."""


def uniaxial_readings(
    strain: Number, poisson: Number, angles: Sequence[float], axis: float = 0.0
) -> tuple[Number, ...]:
    """What each grid reads under uniaxial stress along `axis` (radians); strain as a ratio.

    Source: Hooke's law, εy = −ν εx, and `plane.strain_along`.

    >>> [round(each) for each in uniaxial_readings(300.0, 0.3, (0.0, 0.7853981634, 1.5707963268))]
    [300, 105, -90]
    """
    between("poisson", poisson, POISSON_LOW, POISSON_HIGH)
    state = PlaneStrain(finite("strain", strain), -poisson * strain, 0.0 * strain)
    finite("axis", axis)
    return tuple(
        strain_along(state, finite(f"angle {number}", angle) - axis)
        for number, angle in enumerate(angles, start=1)
    )


def explaining_orders(
    readings: Sequence[float], expected: Sequence[float], tolerance: float
) -> tuple[Order, ...]:
    """Every order of the grids that explains the readings, those with fewest grids moved first.

    `tolerance` is how far a reading may lie from the expected strain; ratios. Several orders mean
    that this load cannot tell them apart. Source: common practice, a check load in a known
    direction.

    >>> explaining_orders([-90.0, 105.0, 300.0], [300.0, 105.0, -90.0], 10.0)
    ((3, 2, 1),)
    """
    not_negative("tolerance", tolerance)
    if len(readings) != len(expected):
        raise OutOfDomain("expected", "must have as many strains as there are readings.")
    wanted = [finite(f"expected {n}", strain) for n, strain in enumerate(expected, start=1)]
    fitting = [
        [grid for grid, strain in enumerate(wanted, 1) if abs(reading - strain) <= tolerance]
        for reading in (finite(f"reading {n}", each) for n, each in enumerate(readings, start=1))
    ]
    found = islice(_orders(fitting, ()), _MOST_ORDERS)
    return tuple(sorted(found, key=lambda order: (len(_moved(order)), order)))


def exchanged_grids(
    readings: Sequence[float], expected: Sequence[float], tolerance: float
) -> Order | None:
    """The one order other than the planned that explains a check load; None where there is none.

    None too where the readings fit as planned, or in several orders. Source: as
    `explaining_orders`.
    """
    orders = explaining_orders(readings, expected, tolerance)
    return orders[0] if len(orders) == 1 and _moved(orders[0]) else None


def order_sentence(orders: Sequence[Order]) -> str:
    """Orders that explain a check load, in words. Source: none, a wording.

    >>> order_sentence([(3, 2, 1)])
    'grids 1 and 3 exchanged'
    """
    if not orders:
        return "no exchange of grids explains the readings"
    told = ", or ".join(_words(order) for order in orders)
    return f"{told}: this load cannot tell" if len(orders) > 1 else told


def _orders(fitting: Sequence[Sequence[int]], taken: Order) -> Iterator[Order]:
    """Every way to give each place one of the grids that fit it, no grid twice."""
    if len(taken) == len(fitting):
        yield taken
        return
    for grid in fitting[len(taken)]:
        if grid not in taken:
            yield from _orders(fitting, (*taken, grid))


def _moved(order: Order) -> list[int]:
    return [place for place, grid in enumerate(order, start=1) if grid != place]


def _words(order: Order) -> str:
    moved = _moved(order)
    if not moved:
        return "grids as planned"
    if len(moved) == 2:
        return f"grids {moved[0]} and {moved[1]} exchanged"
    return f"grids {_listed([order[place - 1] for place in moved])} wired at {_listed(moved)}"


def _listed(numbers: Sequence[int]) -> str:
    return f"{', '.join(str(each) for each in numbers[:-1])} and {numbers[-1]}"
