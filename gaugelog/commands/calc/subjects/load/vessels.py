"""Pressure vessels: stresses and strains of a pressure, and the pressure of a strain."""

from __future__ import annotations

from gaugelog.commands.calc.bounds import POSITIVE, SOLID
from gaugelog.commands.calc.choosing import only_one
from gaugelog.commands.calc.dimensions import (
    LENGTH,
    MODULUS,
    POISSONS_RATIO,
    STRAIN,
    STRESS,
)
from gaugelog.commands.calc.model import Answer, Argument, Subject, Values
from gaugelog.commands.calc.sheet import Sheet
from gaugelog.errors import Fault, Faulty
from gaugelog.physics import vessels


def _constants(values: Values) -> tuple[float, float]:
    return values["modulus"], values["poisson"]


def _wall(sheet: Sheet, values: Values, found: vessels.WallStress) -> None:
    sheet.put("stress round the vessel", found.hoop, STRESS)
    sheet.put("stress along it", found.axial, STRESS)
    strain = sheet.by(vessels.wall_strain, found, *_constants(values))
    sheet.put("strain round the vessel", strain.hoop, STRAIN, 6)
    sheet.put("strain along it", strain.axial, STRAIN, 6)


def _thin_cylinder(values: Values) -> Answer:
    sheet, size, closed = Sheet(), (values["radius"], values["wall"]), values["ends"] == "closed"
    way = only_one(values, "pressure", "hoop", "axial")
    pressure = values["pressure"]
    if way == "hoop":
        pressure = sheet.by(
            vessels.pressure_from_hoop, values["hoop"], *_constants(values), *size, closed
        )
    elif way == "axial":
        if not closed:
            raise Faulty([Fault("axial", "tells no pressure where the ends are open.")])
        pressure = sheet.by(
            vessels.pressure_from_axial, values["axial"], *_constants(values), *size
        )
    if way != "pressure":
        sheet.put("pressure", pressure, STRESS)
    _wall(sheet, values, sheet.by(vessels.thin_cylinder_stress, pressure, *size, closed))
    sheet.warn(vessels.thin_wall_notices(*size))
    return sheet.answer()


def _thin_sphere(values: Values) -> Answer:
    sheet, size = Sheet(), (values["radius"], values["wall"])
    _wall(sheet, values, sheet.by(vessels.thin_sphere_stress, values["pressure"], *size))
    sheet.warn(vessels.thin_wall_notices(*size))
    return sheet.answer()


def _thick_cylinder(values: Values) -> Answer:
    sheet, inner, outer = Sheet(), values["inner"], values["outer"]
    at = outer if values["at"] is None else values["at"]
    found = sheet.by(
        vessels.thick_cylinder_stress,
        *(values["pressure"], inner, outer, at, values["ends"] == "closed"),
        outside_pressure=values["outside"],
    )
    sheet.put("stress through the wall", found.radial, STRESS)
    _wall(sheet, values, found)
    return sheet.answer()


_MATERIAL = (
    Argument("modulus", "of elasticity", MODULUS, bound=POSITIVE),
    Argument("poisson", "Poisson's ratio", POISSONS_RATIO, bound=SOLID),
)
_THIN = (
    Argument("radius", "inside", LENGTH, bound=POSITIVE),
    Argument("wall", "thickness", LENGTH, bound=POSITIVE),
)
_ENDS = Argument("ends", "of the vessel", choices=("closed", "open"), default="closed")
_PRESSURE = Argument("pressure", "above the outside's", STRESS, example="1 MPa")

KINDS = {
    "thin cylinder": Subject(
        "load",
        "A thin cylinder: stresses and strains of a pressure, or the pressure of a strain",
        (
            *_MATERIAL,
            *_THIN,
            _ENDS,
            Argument("pressure", "or give hoop or axial", STRESS, "", example="1 MPa"),
            Argument("hoop", "strain round the vessel", STRAIN, ""),
            Argument("axial", "strain along it, of a closed vessel", STRAIN, ""),
        ),
        _thin_cylinder,
        renamed={"strain": "hoop, axial"},
    ),
    "thin sphere": Subject(
        "load",
        "A thin sphere under pressure",
        (*_MATERIAL, *_THIN, _PRESSURE),
        _thin_sphere,
    ),
    "thick cylinder": Subject(
        "load",
        "A thick cylinder under pressure",
        (
            *_MATERIAL,
            Argument("inner", "radius", LENGTH, bound=POSITIVE),
            Argument("outer", "radius", LENGTH, bound=POSITIVE),
            Argument(
                "at", "radius asked for; the outer where left out", LENGTH, "", bound=POSITIVE
            ),
            _ENDS,
            _PRESSURE,
            Argument("outside", "pressure outside", STRESS, "0 MPa"),
        ),
        _thick_cylinder,
    ),
}
