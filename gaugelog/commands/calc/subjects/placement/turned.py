"""A grid turned from its direction, or beside its place."""

from __future__ import annotations

from math import pi

from gaugelog.commands.calc.bounds import POISSON, POSITIVE
from gaugelog.commands.calc.choosing import need, only_one
from gaugelog.commands.calc.dimensions import (
    ANGLE,
    GRADIENT,
    LENGTH,
    PERCENT,
    POISSONS_RATIO,
    STRAIN,
)
from gaugelog.commands.calc.model import Answer, Argument, Subject, Values
from gaugelog.commands.calc.sheet import Sheet
from gaugelog.physics import placement, plane

_NOTHING = 1e-12
"""Strain too small to give an error as a part of it."""


def _turned(values: Values) -> Answer:
    sheet, off, intended = Sheet(), values["off"], values["intended"]
    if only_one(values, "first", "poisson") == "poisson":
        share = sheet.by(placement.uniaxial_misalignment, values["poisson"], intended, off)
        sheet.put("error, of the strain meant", share, PERCENT)
    else:
        need(values, "second", why="with first")
        _turned_in_field(sheet, values)
    sheet.warn(placement.misalignment_notices(off))
    return sheet.answer()


def _turned_in_field(sheet: Sheet, values: Values) -> None:
    field = values["first"], values["second"], values["intended"]
    error = sheet.by(placement.misalignment_error, *field, values["off"])
    sheet.put("shown less meant", error, STRAIN)
    if abs(_along(values)) > _NOTHING:
        share = sheet.by(placement.misalignment_share, *field, values["off"])
        sheet.put("error, of the strain meant", share, PERCENT)
    if values["permitted"] is not None:
        largest = sheet.by(placement.largest_misalignment, *field, values["permitted"])
        told = "any" if largest >= pi / 2 else largest
        sheet.put("largest turn for the permitted error", told, ANGLE)


def _along(values: Values) -> float:
    """The strain that was meant."""
    state = plane.PlaneStrain(values["first"], values["second"], 0.0)
    return float(plane.strain_along(state, values["intended"]))


def _beside(values: Values) -> Answer:
    sheet = Sheet()
    error = sheet.by(
        placement.misplacement_error,
        *(values["gradient"], values["gradient_across"], values["off"], values["off_across"]),
    )
    sheet.put("shown less meant", error, STRAIN)
    return sheet.answer()


KINDS = {
    "turned": Subject(
        "placement",
        "A grid turned from its direction",
        (
            Argument("off", "how far it is turned", ANGLE),
            Argument("intended", "direction meant, from the first principal", ANGLE, "0 deg"),
            Argument("poisson", "for uniaxial stress", POISSONS_RATIO, "", bound=POISSON),
            Argument("first", "principal strain", STRAIN, ""),
            Argument("second", "principal strain", STRAIN, ""),
            Argument("permitted", "error of strain", STRAIN, "", bound=POSITIVE),
        ),
        _turned,
    ),
    "beside": Subject(
        "placement",
        "A grid beside its place in a strain that changes",
        (
            Argument("gradient", "of the strain along the grid", GRADIENT),
            Argument("off", "how far it lies off along the grid", LENGTH),
            Argument("gradient_across", "of the strain across the grid", GRADIENT, "0 ue/mm"),
            Argument("off_across", "how far it lies off across", LENGTH, "0 mm"),
        ),
        _beside,
    ),
}
