"""How long an adhesive takes to cure, and how long it can be worked.

A schedule is what the consumable's sheet lists: pairs of temperature (°C) and time (s), hotter
being faster. Between two listed temperatures the next lower one counts, because it asks for the
longer time; Arrhenius' law counts only where the consumable allows it. Nothing is extrapolated.
"""

from __future__ import annotations

from itertools import pairwise
from math import exp, log

from gaugelog.physics.validity import Notice, OutOfDomain, above, finite, not_negative, positive

ABSOLUTE_ZERO = -273.15
"""In °C."""

Schedule = tuple[tuple[float, float], ...]
"""Listed temperatures in °C with their times in seconds."""


def cure_time(celsius: float, schedule: Schedule, interpolate: bool = False) -> float:
    """Time to cure at a temperature: that of the next lower temperature listed.

    With `interpolate` (only where the consumable allows it) Arrhenius' law between the two
    neighbours, ln t linear in 1/T. Colder than listed is refused; hotter than listed takes the
    time of the hottest (see `cure_time_notices`). Units: °C and schedule in, seconds out.
    Source: next lower listed temperature, common practice; Arrhenius' law, Atkins, Physical
    Chemistry (from memory).

    >>> cure_time(30.0, ((24.0, 86400.0), (50.0, 7200.0)))
    86400.0
    """
    listed = _listed(schedule)
    finite("celsius", celsius)
    if celsius < listed[0][0]:
        raise OutOfDomain(
            "celsius", f"must be at least {listed[0][0]:g}, the coldest cure that is listed."
        )
    if interpolate:
        for colder, hotter in pairwise(listed):
            if celsius < hotter[0]:
                return arrhenius_time(celsius, colder, hotter)
    return next(time for listed_at, time in reversed(listed) if listed_at <= celsius)


def cure_time_notices(celsius: float, schedule: Schedule) -> tuple[Notice, ...]:
    """A notice for a cure hotter than any that is listed."""
    hottest = _listed(schedule)[-1][0]
    if celsius <= hottest:
        return ()
    message = (
        f"No cure is listed above {hottest:g} °C; the time for {hottest:g} °C is shown, "
        "and the adhesive may not bear the heat."
    )
    return (Notice("cure time", message, "the consumable's own schedule"),)


def arrhenius_time(
    celsius: float, colder: tuple[float, float], hotter: tuple[float, float]
) -> float:
    """Time between two known ones by Arrhenius' law: ln t is linear in 1/T.

    `colder` and `hotter` are pairs of °C and seconds with the temperature between them. Units:
    °C and seconds in, seconds out. Source: Arrhenius' law, Atkins, Physical Chemistry (from
    memory).
    """
    (low, slow), (high, fast) = _listed((colder, hotter))
    if not low <= celsius <= high:
        raise OutOfDomain("celsius", f"must lie between {low:g} and {high:g}, not {celsius:g}.")
    share = (_inverse(low) - _inverse(celsius)) / (_inverse(low) - _inverse(high))
    return exp(log(slow) + share * (log(fast) - log(slow)))


def activation_temperature(colder: tuple[float, float], hotter: tuple[float, float]) -> float:
    """Activation energy over the gas constant, E/R, from two cure times, in kelvin.

    E/R = ln(t1/t2)/(1/T1 − 1/T2). Source: Arrhenius' law, Atkins, Physical Chemistry (from
    memory).
    """
    (low, slow), (high, fast) = _listed((colder, hotter))
    return log(slow / fast) / (_inverse(low) - _inverse(high))


def working_time(celsius: float, schedule: Schedule) -> float:
    """Open time or pot life at a temperature: that of the next higher temperature listed.

    The hotter, the shorter, so the next higher one is the safe side. Hotter than listed is
    refused; colder than listed takes the time of the coldest. Units: °C in, seconds out.
    Source: common practice.

    >>> working_time(22.0, ((20.0, 1800.0), (25.0, 1200.0)))
    1200.0
    """
    listed = _listed(schedule)
    finite("celsius", celsius)
    if celsius > listed[-1][0]:
        raise OutOfDomain(
            "celsius", f"must be at most {listed[-1][0]:g}, the hottest that is listed."
        )
    return next(time for listed_at, time in listed if listed_at >= celsius)


def time_left(allowed: float, elapsed: float) -> float:
    """What is left of an open time, a pot life or a cure; negative when it is over.

    Units: seconds. Source: arithmetic.

    >>> time_left(1200.0, 1500.0)
    -300.0
    """
    return not_negative("allowed", allowed) - not_negative("elapsed", elapsed)


def _listed(schedule: Schedule) -> Schedule:
    """The schedule from cold to hot; refuses one in which hotter is not faster."""
    if not schedule:
        raise OutOfDomain("schedule", "must list at least one temperature with its time.")
    for celsius, time in schedule:
        above("schedule temperature", celsius, ABSOLUTE_ZERO)
        positive("schedule time", time)
    listed = tuple(sorted(schedule))
    for (low, slow), (high, fast) in pairwise(listed):
        if low == high:
            raise OutOfDomain("schedule", f"must list each temperature once, not {low:g} twice.")
        if fast > slow:
            raise OutOfDomain("schedule", f"must not take longer at {high:g} than at {low:g} °C.")
    return listed


def _inverse(celsius: float) -> float:
    """1/T of a temperature in °C."""
    return 1 / (celsius - ABSOLUTE_ZERO)
