"""`gaugelog calc holedrill`: residual stress from the strains that a drilled hole relieves."""

from __future__ import annotations

from gaugelog.commands.calc.bounds import NOT_NEGATIVE, POSITIVE, SOLID
from gaugelog.commands.calc.choosing import given, need
from gaugelog.commands.calc.dimensions import (
    ANGLE,
    LENGTH,
    MODULUS,
    POISSONS_RATIO,
    RATIO,
    STRAINS,
    STRESS,
)
from gaugelog.commands.calc.model import Answer, Argument, Subject, Values
from gaugelog.commands.calc.sheet import Sheet
from gaugelog.errors import Fault, Faulty
from gaugelog.physics import holedrill, kirsch


def _compute(values: Values) -> Answer:
    if len(values["readings"]) != 3:
        raise Faulty([Fault("readings", f"must be three, not {len(values['readings'])}.")])
    sheet = Sheet()
    through, coefficients = _coefficients(sheet, values)
    found = sheet.by(
        holedrill.uniform_stress,
        *(*values["readings"], *coefficients, values["modulus"], values["poisson"]),
    )
    sheet.put("P, mean stress", found.mean, STRESS, 6)
    sheet.put("Q, half the difference", found.difference, STRESS, 6)
    sheet.put("T, shear stress", found.shear, STRESS, 6)
    sheet.put("largest stress", found.largest, STRESS, 6)
    sheet.put("smallest stress", found.smallest, STRESS, 6)
    direction = "none: alike in every direction" if found.angle is None else found.angle
    sheet.put("direction of the largest, from grid 1 to grid 2", direction, ANGLE)
    _warn(sheet, values, found, through)
    return sheet.answer()


def _coefficients(sheet: Sheet, values: Values) -> tuple[bool, tuple[float, float]]:
    """Whether the hole goes through, and ā and b̄: computed then, typed for a blind hole."""
    if given(values, "a_bar", "b_bar"):
        need(values, "a_bar", "b_bar", why="for a blind hole, from your copy of the standard")
        return False, (values["a_bar"], values["b_bar"])
    need(values, "hole", "circle", why="for a through hole; a blind hole needs a_bar and b_bar")
    a_bar, b_bar = sheet.by(
        kirsch.through_hole_coefficients,
        *(values["hole"], _grid(values), values["poisson"]),
    )
    sheet.put("ā of the through hole", a_bar, RATIO)
    sheet.put("b̄ of the through hole", b_bar, RATIO)
    return True, (a_bar, b_bar)


def _grid(values: Values) -> kirsch.DrillGrid:
    """The real grid where its size is typed, else that of type A on the circle."""
    if given(values, "near", "far", "width"):
        need(values, "near", "far", "width", why="for a grid of its own size")
        return kirsch.DrillGrid(values["near"], values["far"], values["width"])
    circle, plain = values["circle"], kirsch.TYPE_A
    return kirsch.DrillGrid(plain.near * circle, plain.far * circle, plain.width * circle)


def _warn(sheet: Sheet, values: Values, found: holedrill.DrilledStress, through: bool) -> None:
    hole, circle = values["hole"], values["circle"]
    if hole is not None and circle is not None:
        sheet.warn(holedrill.hole_size_notices(hole, circle))
    if values["eccentricity"] is not None:
        need(values, "circle", why="with eccentricity")
        sheet.warn(holedrill.eccentricity_notices(values["eccentricity"], circle))
    if values["yield_strength"] is not None:
        sheet.warn(holedrill.near_yield_notices(found, values["yield_strength"], through))


SUBJECT = Subject(
    "holedrill",
    "Residual stress, uniform with depth, from a hole drilled in a rosette",
    (
        Argument("readings", "relieved strain of grids 1, 2, 3", STRAINS, many=True),
        Argument("modulus", "of elasticity", MODULUS, bound=POSITIVE),
        Argument("poisson", "Poisson's ratio", POISSONS_RATIO, bound=SOLID),
        Argument("hole", "its diameter, when it goes through", LENGTH, "", bound=POSITIVE),
        Argument("circle", "diameter of the gauge circle", LENGTH, "", bound=POSITIVE),
        Argument("near", "end of the grid, from the hole's middle", LENGTH, "", bound=POSITIVE),
        Argument("far", "end of the grid, from the hole's middle", LENGTH, "", bound=POSITIVE),
        Argument("width", "of the grid", LENGTH, "", bound=POSITIVE),
        Argument("a_bar", "of a blind hole, from the standard", RATIO, "", bound=POSITIVE),
        Argument("b_bar", "of a blind hole, from the standard", RATIO, "", bound=POSITIVE),
        Argument("eccentricity", "of the hole", LENGTH, "", bound=NOT_NEGATIVE),
        Argument("yield_strength", "of the article", STRESS, "", bound=POSITIVE),
    ),
    _compute,
    renamed={"hole_diameter": "hole"},
)
