"""Transverse sensitivity: what a grid reads of the strain across it, and how to take it off.

A gauge factor is measured in uniaxial stress on a beam of Poisson's ratio ν0; in any other field
a grid of transverse sensitivity Kt reads ε̂ (1 − ν0 Kt) = ε + Kt ε_across.
"""

from __future__ import annotations

from collections.abc import Sequence

from gaugelog.physics._maths import Number
from gaugelog.physics.plane import PlaneStrain
from gaugelog.physics.rosette import rosette_state
from gaugelog.physics.validity import OutOfDomain, between, finite, strictly_between

CALIBRATION_POISSON = 0.285
"""Poisson's ratio of the beam on which gauge factors are usually measured. Common practice."""


def indicated_strain(
    along: Number, across: Number, sensitivity: Number, poisson: float = CALIBRATION_POISSON
) -> Number:
    """What a grid reads in any field: (ε + Kt ε_across)/(1 − ν0 Kt); ratios.

    Source: definition of transverse sensitivity and gauge factor, ASTM E251 (from memory).
    """
    kt = _sensitivity(sensitivity)
    return (finite("along", along) + kt * finite("across", across)) / _beam(poisson, kt)


def single_grid_strain(
    indicated: Number,
    sensitivity: Number,
    biaxiality: Number,
    poisson: float = CALIBRATION_POISSON,
) -> Number:
    """Strain along one grid where the ratio of strain across to along is known; ratios.

    ε = ε̂ (1 − ν0 Kt)/(1 + Kt r). Source: as `indicated_strain`.
    """
    kt = _sensitivity(sensitivity)
    below = 1 + kt * finite("biaxiality", biaxiality)
    return finite("indicated", indicated) * _beam(poisson, kt) / below


def uncorrected_error(
    sensitivity: Number, biaxiality: Number, poisson: float = CALIBRATION_POISSON
) -> Number:
    """Error of a grid that is not corrected, as a part of its strain: Kt (r + ν0)/(1 − ν0 Kt).

    Source: as `indicated_strain`; in per cent in the literature of transverse sensitivity.
    """
    kt = _sensitivity(sensitivity)
    below = _beam(poisson, kt)
    return kt * (finite("biaxiality", biaxiality) + poisson) / below


def tee_strains(
    readings: tuple[Number, Number],
    sensitivities: tuple[Number, Number],
    poisson: float = CALIBRATION_POISSON,
) -> tuple[Number, Number]:
    """Strains along two grids at right angles, each with its own Kt; ratios.

    ε1 = [(1 − ν0 K1) ε̂1 − K1 (1 − ν0 K2) ε̂2]/(1 − K1 K2). Source: two equations of
    `indicated_strain` solved.
    """
    (one, two), (k1, k2) = readings, (_sensitivity(item) for item in sensitivities)
    first = _beam(poisson, k1) * finite("reading 1", one)
    second = _beam(poisson, k2) * finite("reading 2", two)
    below = 1 - k1 * k2
    return (first - k1 * second) / below, (second - k2 * first) / below


def rectangular_strains(
    readings: tuple[Number, Number, Number],
    sensitivity: Number,
    poisson: float = CALIBRATION_POISSON,
) -> tuple[Number, Number, Number]:
    """Strains along grids at 0, 45, 90°, one Kt for all; ratios.

    ε1 = (1 − ν0 Kt)/(1 − Kt²) (ε̂1 − Kt ε̂3), ε2 = … [(1 + Kt) ε̂2 − Kt (ε̂1 + ε̂3)].
    Source: three equations of `indicated_strain` solved; ASTM E1561 notes.
    """
    one, two, three = _three(readings)
    kt = _sensitivity(sensitivity)
    share = _beam(poisson, kt) / (1 - kt**2)
    return (
        share * (one - kt * three),
        share * ((1 + kt) * two - kt * (one + three)),
        share * (three - kt * one),
    )


def delta_strains(
    readings: tuple[Number, Number, Number],
    sensitivity: Number,
    poisson: float = CALIBRATION_POISSON,
) -> tuple[Number, Number, Number]:
    """Strains along grids at 0, 60, 120°, one Kt for all; ratios.

    ε1 = (1 − ν0 Kt)/(1 − Kt²) [(1 + Kt/3) ε̂1 − 2/3 Kt (ε̂2 + ε̂3)], and so round.
    Source: three equations of `indicated_strain` solved.
    """
    one, two, three = _three(readings)
    kt = _sensitivity(sensitivity)
    share = _beam(poisson, kt) / (1 - kt**2)
    total = one + two + three
    first, second, third = (
        share * ((1 + kt / 3) * each - 2 / 3 * kt * (total - each)) for each in (one, two, three)
    )
    return first, second, third


def corrected_strains(
    readings: Sequence[Number],
    angles: Sequence[float],
    sensitivities: Sequence[Number],
    poisson: float = CALIBRATION_POISSON,
) -> tuple[Number, ...]:
    """Strains along three or more grids at any angles, each with its own Kt; ratios.

    ε_i = [(1 − ν0 K_i) ε̂_i − K_i S]/(1 − K_i), with S = εx + εy, the same for every grid. What
    spare readings disagree by stays in them, for `rosette.fit_rosette` to find. `readings` n
    ratios, `angles` n radians. Source: equations of `indicated_strain`, ε_across = S − ε.
    """
    if not len(readings) == len(angles) == len(sensitivities):
        raise OutOfDomain("sensitivities", "must be one for each reading and angle.")
    each_kt = [_sensitivity(kt) for kt in sensitivities]
    own = [
        _beam(poisson, kt) * finite(f"reading {number}", reading) / (1 - kt)
        for number, (reading, kt) in enumerate(zip(readings, each_kt, strict=True), start=1)
    ]
    shares = [kt / (1 - kt) for kt in each_kt]
    # S is the sum of a state that is linear in the strains, which are linear in S.
    both = _sum_of(own, angles) / (1 + _sum_of(shares, angles))
    return tuple(strain - share * both for strain, share in zip(own, shares, strict=True))


def corrected_state(
    readings: Sequence[Number],
    angles: Sequence[float],
    sensitivities: Sequence[Number],
    poisson: float = CALIBRATION_POISSON,
) -> PlaneStrain:
    """State from three or more grids at any angles, each with its own Kt, by least squares.

    Source: `corrected_strains`, then `rosette.rosette_state`.
    """
    return rosette_state(corrected_strains(readings, angles, sensitivities, poisson), angles)


def shear_pair_factor(sensitivity: Number, poisson: float = CALIBRATION_POISSON) -> Number:
    """What to multiply the shear from two grids at ±45° by: (1 − ν0 Kt)/(1 − Kt).

    Source: the difference of two equations of `indicated_strain`.
    """
    kt = _sensitivity(sensitivity)
    return _beam(poisson, kt) / (1 - kt)


def _sensitivity(value: Number) -> Number:
    return strictly_between("transverse sensitivity", value, -0.5, 0.5)


def _beam(poisson: Number, kt: Number) -> Number:
    """1 − ν0 Kt: what the calibration beam's own strain across has put into the gauge factor."""
    return 1 - between("poisson", poisson, -1.0, 0.5) * kt


def _three(readings: Sequence[Number]) -> tuple[Number, Number, Number]:
    if len(readings) != 3:
        raise OutOfDomain("readings", f"must be three, not {len(readings)}.")
    one, two, three = (finite(f"reading {n}", item) for n, item in enumerate(readings, start=1))
    return one, two, three


def _sum_of(strains: Sequence[Number], angles: Sequence[float]) -> Number:
    """εx + εy of the state that these strains along the grids make."""
    state = rosette_state(strains, angles)
    return state.x + state.y
