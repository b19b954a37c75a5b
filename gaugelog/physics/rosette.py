"""Rosettes: the plane state of strain from the readings of three or more grids.

Angles are built angles in radians from grid 1, counter-clockwise for the viewer of the gauges;
`grid_angles` gives them for the usual patterns however they are numbered and seen.
"""

from __future__ import annotations

import importlib
from collections.abc import Sequence
from dataclasses import dataclass
from math import cos, pi, sin, sqrt
from typing import Literal

from gaugelog.physics._maths import Number, nominal
from gaugelog.physics._maths import sqrt as root
from gaugelog.physics._order import any_of
from gaugelog.physics.plane import PlaneStrain, strain_along
from gaugelog.physics.validity import Notice, OutOfDomain, finite, largest, not_negative, one_of

Numbering = Literal["counter-clockwise", "clockwise"]
Viewing = Literal["gauge side", "other side"]

PATTERNS: dict[str, tuple[float, ...]] = {
    "tee": (0.0, pi / 2),
    "rectangular": (0.0, pi / 4, pi / 2),
    "delta": (0.0, pi / 3, 2 * pi / 3),
}
"""Built angles of the usual patterns, radians from grid 1."""

_LEAST_SPREAD = 1e-6
"""How far from parallel, as a singular value, grids must be to tell a state."""


@dataclass(frozen=True, slots=True)
class RosetteFit:
    """A state fitted to more readings than it needs.

    `residuals` are readings less fit, in the readings' order; `scatter` is the standard
    deviation they show (None where no reading is spare); ratios.
    """

    state: PlaneStrain
    residuals: tuple[Number, ...]
    scatter: Number | None


def grid_angles(
    pattern: str, numbering: Numbering = "counter-clockwise", seen_from: Viewing = "gauge side"
) -> tuple[float, ...]:
    """Built angles of a pattern for the viewer, radians, grid 1 first.

    Numbered clockwise, or seen through the article from the other side, the angles turn the
    other way. Source: ASTM E1561 (numbering counter-clockwise); common practice.
    """
    one_of("numbering", numbering, ("counter-clockwise", "clockwise"))
    one_of("seen_from", seen_from, ("gauge side", "other side"))
    angles = PATTERNS[one_of("pattern", pattern, tuple(PATTERNS))]
    turned = (numbering == "clockwise") != (seen_from == "other side")
    return tuple(-angle if turned and angle else angle for angle in angles)


def rectangular_state(one: Number, two: Number, three: Number) -> PlaneStrain:
    """State from grids at 0, 45, 90°: εx = ε1, εy = ε3, γ = 2 ε2 − ε1 − ε3; ratios.

    Source: ASTM E1561, rectangular rosette (from memory).
    """
    shear = 2 * finite("two", two) - finite("one", one) - finite("three", three)
    return PlaneStrain(one, three, shear)


def delta_state(one: Number, two: Number, three: Number) -> PlaneStrain:
    """State from grids at 0, 60, 120°: εy = (2 ε2 + 2 ε3 − ε1)/3, γ = 2 (ε2 − ε3)/√3; ratios.

    Source: ASTM E1561, delta rosette (from memory).
    """
    across = (2 * finite("two", two) + 2 * finite("three", three) - finite("one", one)) / 3
    return PlaneStrain(one, across, 2 * (two - three) / sqrt(3))


def tee_state(one: Number, two: Number) -> PlaneStrain:
    """State from grids along and across the known principal axes: no shear; ratios.

    Source: ASTM E1561 (two grids serve where the principal directions are known).
    """
    return PlaneStrain(finite("one", one), finite("two", two), 0 * one)


def rosette_state(readings: Sequence[Number], angles: Sequence[float]) -> PlaneStrain:
    """State from any three or more grids, by least squares: min Σ (ε(θi) − εi)².

    `readings` are ratios (n floats, arrays of one shape, or uncertain numbers), `angles` n
    radians. Source: least squares on `plane.strain_along`; ASTM E1561 for three grids.
    """
    matrix = _inverse_of([_row(angle) for angle in _checked(readings, angles)])
    x, y, shear = (
        sum(weight * reading for weight, reading in zip(line, readings, strict=True))
        for line in matrix
    )
    return PlaneStrain(x, y, shear)


def fit_rosette(readings: Sequence[Number], angles: Sequence[float]) -> RosetteFit:
    """The state by least squares, and what it leaves of each reading: the redundancy check.

    Source: as `rosette_state`.
    """
    state = rosette_state(readings, angles)
    residuals = tuple(
        reading - strain_along(state, angle)
        for reading, angle in zip(readings, angles, strict=True)
    )
    spare = len(readings) - 3
    squares = sum(residual**2 for residual in residuals)
    return RosetteFit(state, residuals, root(squares / spare) if spare else None)


def fit_rosette_notices(fit: RosetteFit, permitted: Number) -> tuple[Notice, ...]:
    """A notice where spare readings disagree by more than `permitted`, a ratio.

    Source: least squares; what may be permitted is the readings' own standard uncertainty.
    """
    not_negative("permitted", permitted)
    if fit.scatter is None or not any_of(nominal(fit.scatter) > nominal(permitted)):
        return ()
    message = (
        f"The grids scatter by {1e6 * largest(fit.scatter):.3g} µm/m about one state of strain, "
        f"more than {1e6 * largest(permitted):.3g} µm/m: a grid, its angle or its wiring is wrong."
    )
    return (Notice("rosette fit", message, "least squares, spare readings"),)


def _row(angle: float) -> tuple[float, float, float]:
    return (cos(angle) ** 2, sin(angle) ** 2, sin(angle) * cos(angle))


def _checked(readings: Sequence[Number], angles: Sequence[float]) -> list[float]:
    if len(readings) != len(angles):
        raise OutOfDomain("angles", "must have one angle for each reading.")
    for number, reading in enumerate(readings, start=1):
        finite(f"reading {number}", reading)
    return [float(finite(f"angle {number}", angle)) for number, angle in enumerate(angles, start=1)]


def _inverse_of(rows: Sequence[Sequence[float]]) -> list[list[float]]:
    """The least-squares inverse (Moore and Penrose); refuses grids that are too alike."""
    numpy = importlib.import_module("numpy")
    matrix = numpy.array(rows, dtype=float)
    if matrix.shape[0] < matrix.shape[1] or (
        numpy.linalg.svd(matrix, compute_uv=False).min() < _LEAST_SPREAD
    ):
        raise OutOfDomain("angles", "must hold three different directions of grids.")
    inverse: list[list[float]] = numpy.linalg.pinv(matrix).tolist()
    return inverse
