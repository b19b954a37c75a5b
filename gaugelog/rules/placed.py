"""Place and axis as laid out against the plan's tolerance, with the effect in µm/m."""

from __future__ import annotations

from collections.abc import Mapping
from math import degrees

from gaugelog.ledger.base import Quantity
from gaugelog.ledger.points import PointPlanned
from gaugelog.ledger.routes import AXIS, PLACE_X, PLACE_Y, RouteStep
from gaugelog.ledger.view import View
from gaugelog.physics.placement import axis_error, misalignment_error
from gaugelog.rules.article import article_of

SOURCE = "Mohr's circle of uniaxial stress; Timoshenko and Goodier (from memory)"


def placed_troubles(
    step: RouteStep, entered: Mapping[str, Quantity], planned: PointPlanned
) -> tuple[str, ...]:
    """Every way in which the layout lies outside its tolerance; nothing where it is not asked for.

    `entered` are the quantities of the step by the name of their input.
    """
    given = {item.type: entered[item.name] for item in step.inputs if item.name in entered}
    place = planned.place
    wanted = (
        (PLACE_X, place.x, place.tolerance),
        (PLACE_Y, place.y, place.tolerance),
        (AXIS, place.angle, place.angle_tolerance),
    )
    return tuple(
        f"The {name} is {given[name]}, planned {aim} ± {tolerance}."
        for name, aim, tolerance in wanted
        if name in given and abs(_off(name, given[name], aim)) > tolerance.si() * (1 + 1e-9)
    )


def axis_effect(
    step: RouteStep, entered: Mapping[str, Quantity], planned: PointPlanned, poisson: float
) -> str:
    """What the axis as laid out does to the reading at the largest strain, in a sentence.

    For uniaxial stress along the planned axis. Empty where no axis was entered or it is as planned.
    """
    off = [
        _off(AXIS, entered[item.name], planned.place.angle)
        for item in step.inputs
        if item.type == AXIS and item.name in entered
    ]
    if not off or off[0] == 0:
        return ""
    strain = max((planned.strain_min.si(), planned.strain_max.si()), key=abs)
    error = float(misalignment_error(strain, -poisson * strain, 0.0, off[0]))
    off_degrees = degrees(off[0])
    return (
        f"axis {off_degrees:+.2g}° off: {error * 1e6:+.2g} µm/m at {strain * 1e6:.0f} µm/m, "
        "uniaxial stress along the axis"
    )


def poisson_at(view: View, planned: PointPlanned) -> float:
    """Poisson's ratio of the article a point lies on. Raises Refused when it is not known."""
    return article_of(view, planned).material.poisson_ratio.si()


def _off(name: str, found: Quantity, aim: Quantity) -> float:
    """How far off it lies, SI unit; an axis has no head and no tail, so half a turn is none."""
    if name == AXIS:
        return float(axis_error(found.si(), aim.si()))
    return found.si() - aim.si()
