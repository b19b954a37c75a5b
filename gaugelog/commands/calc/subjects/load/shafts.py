"""Shafts in torsion: strain of a torque, and the torque of a strain or a shear pair."""

from __future__ import annotations

from gaugelog.commands.calc.bounds import NOT_NEGATIVE, POISSON, POSITIVE
from gaugelog.commands.calc.choosing import need, only_one
from gaugelog.commands.calc.dimensions import (
    ANGLE,
    LENGTH,
    MODULUS,
    POISSONS_RATIO,
    STRAIN,
    STRESS,
    TORQUE,
)
from gaugelog.commands.calc.model import Answer, Argument, Subject, Values
from gaugelog.commands.calc.sheet import Sheet
from gaugelog.physics import shafts, stress


def _stiffness(sheet: Sheet, values: Values) -> float:
    """Shear modulus, typed or from the modulus of elasticity."""
    if only_one(values, "shear_modulus", "modulus") == "shear_modulus":
        return float(values["shear_modulus"])
    need(values, "poisson", why="with modulus")
    found = sheet.by(stress.shear_modulus, values["modulus"], values["poisson"])
    sheet.put("shear modulus", found, MODULUS)
    return float(found)


def _torsion(values: Values) -> Answer:
    sheet, size = Sheet(), (values["diameter"], values["bore"])
    stiffness = _stiffness(sheet, values)
    way = only_one(values, "torque", "strain", "pair")
    torque = values["torque"]
    if way == "strain":
        torque = sheet.by(
            shafts.torque_from_strain, values["strain"], stiffness, values["angle"], *size
        )
    elif way == "pair":
        torque = sheet.by(shafts.torque_from_shear, values["pair"], stiffness, *size)
    if way != "torque":
        sheet.put("torque", torque, TORQUE, 6)
    sheet.put("shear stress", sheet.by(shafts.shear_stress, torque, *size), STRESS)
    shear = sheet.by(shafts.shear_strain, torque, stiffness, *size)
    sheet.put("shear strain", shear, STRAIN, 6)
    strain = sheet.by(shafts.strain_on_shaft, torque, stiffness, values["angle"], *size)
    sheet.put("strain along the grid", strain, STRAIN, 6)
    return sheet.answer()


def _pair(values: Values) -> Answer:
    """Torque from two grids, whose common part cancels."""
    sheet = Sheet()
    stiffness = _stiffness(sheet, values)
    torque = sheet.by(
        shafts.torque_from_pair,
        *(values["plus"], values["minus"], stiffness, values["diameter"], values["bore"]),
    )
    sheet.put("torque", torque, TORQUE, 6)
    return sheet.answer()


_SHAFT = (
    Argument("diameter", "of the shaft", LENGTH, bound=POSITIVE),
    Argument("bore", "of a hollow shaft", LENGTH, "0 mm", bound=NOT_NEGATIVE),
    Argument("shear_modulus", "or give modulus and poisson", MODULUS, "", bound=POSITIVE),
    Argument("modulus", "of elasticity", MODULUS, "", bound=POSITIVE),
    Argument("poisson", "Poisson's ratio", POISSONS_RATIO, "", bound=POISSON),
)
_RENAMED = {"outer": "diameter", "inner": "bore"}

KINDS = {
    "shaft": Subject(
        "load",
        "A shaft in torsion: strain of a torque, or torque of a strain",
        (
            *_SHAFT,
            Argument("torque", "or give strain or pair", TORQUE, ""),
            Argument("strain", "along a grid at an angle", STRAIN, ""),
            Argument("pair", "shear strain that a shear pair shows", STRAIN, ""),
            Argument("angle", "of the grid from the axis", ANGLE, "45 deg"),
        ),
        _torsion,
        renamed=_RENAMED,
    ),
    "shear pair": Subject(
        "load",
        "Torque from two grids at ±45° on a shaft",
        (
            *_SHAFT,
            Argument("plus", "strain of the grid at +45°", STRAIN),
            Argument("minus", "strain of the grid at −45°", STRAIN),
        ),
        _pair,
        renamed=_RENAMED,
    ),
}
