"""Bars and beams: strain of a load, and the load of a strain."""

from __future__ import annotations

from collections.abc import Callable

from gaugelog.commands.calc.bounds import NOT_NEGATIVE, POISSON, POSITIVE
from gaugelog.commands.calc.choosing import given, need, only_one
from gaugelog.commands.calc.dimensions import (
    AREA,
    FORCE,
    LENGTH,
    MODULUS,
    POISSONS_RATIO,
    STRAIN,
    STRESS,
    TORQUE,
)
from gaugelog.commands.calc.model import Answer, Argument, Subject, Values
from gaugelog.commands.calc.sheet import Sheet
from gaugelog.errors import Fault, Faulty
from gaugelog.physics import loads

MODULUS_OF_PART = Argument("modulus", "of elasticity", MODULUS, bound=POSITIVE)
LOAD = Argument("load", "force; or give the strain", FORCE, "")
STRAIN_OF_GRID = Argument("strain", "along the grid; or give the load", STRAIN, "")


def _bar(values: Values) -> Answer:
    sheet, area = Sheet(), values["area"]
    if len(given(values, "load", "strain", "modulus")) != 2:
        raise Faulty([Fault("load, strain, modulus", "give two of the three.")])
    if values["modulus"] is None:
        found = sheet.by(loads.bar_modulus, values["load"], values["strain"], area)
        sheet.put("modulus of elasticity", found, MODULUS)
        strain = values["strain"]
    elif values["strain"] is None:
        strain = sheet.by(loads.bar_strain, values["load"], values["modulus"], area)
        sheet.put("strain along the bar", strain, STRAIN, 6)
    else:
        strain = values["strain"]
        force = sheet.by(loads.bar_force, strain, values["modulus"], area)
        sheet.put("force", force, FORCE, 6)
    if values["poisson"] is not None:
        across = sheet.by(loads.lateral_strain, strain, values["poisson"])
        sheet.put("strain across the bar", across, STRAIN, 6)
    return sheet.answer()


def _section(sheet: Sheet, values: Values) -> float:
    """Section modulus of the rectangle or the round bar that was given."""
    if only_one(values, "width", "diameter") == "width":
        need(values, "depth", why="with width")
        return float(sheet.by(loads.rectangle_modulus, values["width"], values["depth"]))
    return float(sheet.by(loads.round_modulus, values["diameter"], values["bore"]))


def _bent(values: Values, moment_of: Callable[[Sheet, float], float], span: str) -> Answer:
    """Strain from the load by its moment, or the load from the strain."""
    sheet = Sheet()
    section = _section(sheet, values)
    per_newton = moment_of(sheet, 1.0)
    if only_one(values, "load", "strain") == "load":
        moment = moment_of(sheet, values["load"])
        sheet.put("moment at the gauge", moment, TORQUE, 6)
        strain = sheet.by(loads.bending_strain, moment, values["modulus"], section)
        sheet.put("strain along the beam", strain, STRAIN, 6)
    else:
        moment = sheet.by(loads.bending_moment, values["strain"], values["modulus"], section)
        sheet.put("moment at the gauge", moment, TORQUE, 6)
        if per_newton == 0:
            raise Faulty([Fault("gauge_at", "lies where no load bends the beam.")])
        sheet.put("load", moment / per_newton, FORCE, 6)
    sheet.put("stress", sheet.by(loads.bending_stress, moment, section), STRESS, 6)
    depth = values["depth"] if values["depth"] is not None else values["diameter"]
    sheet.warn(loads.bending_notices(abs(values[span]), depth))
    return sheet.answer()


def _cantilever(values: Values) -> Answer:
    def moment(sheet: Sheet, load: float) -> float:
        return float(sheet.by(loads.cantilever_moment, load, values["distance"]))

    return _bent(values, moment, "distance")


def _supported(values: Values) -> Answer:
    def moment(sheet: Sheet, load: float) -> float:
        return float(
            sheet.by(
                loads.simply_supported_moment,
                *(load, values["span"], values["load_at"], values["gauge_at"]),
            )
        )

    return _bent(values, moment, "span")


def _four_point(values: Values) -> Answer:
    def moment(sheet: Sheet, load: float) -> float:
        return float(sheet.by(loads.four_point_moment, load, values["arm"]))

    return _bent(values, moment, "arm")


def _pair(values: Values) -> Answer:
    """Tip load from two gauges along a cantilever."""
    sheet = Sheet()
    section = _section(sheet, values)
    load = sheet.by(
        loads.cantilever_load,
        *(values["nearer_root"], values["nearer_load"], values["spacing"]),
        *(values["modulus"], section),
    )
    sheet.put("load", load, FORCE, 6)
    return sheet.answer()


_SECTION = (
    Argument("width", "of a rectangular beam", LENGTH, "", bound=POSITIVE),
    Argument("depth", "of a rectangular beam, as it bends", LENGTH, "", bound=POSITIVE),
    Argument("diameter", "of a round beam", LENGTH, "", bound=POSITIVE),
    Argument("bore", "of a round beam", LENGTH, "0 mm", bound=NOT_NEGATIVE),
)
_BENT = (LOAD, STRAIN_OF_GRID, MODULUS_OF_PART, *_SECTION)
_RENAMED = {"outer": "diameter", "inner": "bore"}

KINDS = {
    "bar": Subject(
        "load",
        "A pulled bar: strain, force or modulus",
        (
            LOAD,
            STRAIN_OF_GRID,
            Argument(
                "modulus", "of elasticity; or give load and strain", MODULUS, "", bound=POSITIVE
            ),
            Argument("area", "of the bar", AREA, bound=POSITIVE, example="100 mm2"),
            Argument("poisson", "Poisson's ratio", POISSONS_RATIO, "", bound=POISSON),
        ),
        _bar,
        renamed={"force": "load"},
    ),
    "cantilever": Subject(
        "load",
        "A cantilever: strain of a load, or load of a strain",
        (*_BENT, Argument("distance", "from load to the grid's middle", LENGTH, bound=POSITIVE)),
        _cantilever,
        renamed=_RENAMED,
    ),
    "cantilever pair": Subject(
        "load",
        "A cantilever with two gauges: its load, wherever that sits",
        (
            Argument("nearer_root", "strain nearer the root", STRAIN),
            Argument("nearer_load", "strain nearer the load", STRAIN),
            Argument("spacing", "between the grids' middles", LENGTH, bound=POSITIVE),
            MODULUS_OF_PART,
            *_SECTION,
        ),
        _pair,
        renamed=_RENAMED,
    ),
    "supported beam": Subject(
        "load",
        "A beam on two supports with one load between them",
        (
            *_BENT,
            Argument("span", "between the supports", LENGTH, bound=POSITIVE),
            Argument("load_at", "from the left support", LENGTH, bound=NOT_NEGATIVE),
            Argument("gauge_at", "from the left support", LENGTH, bound=NOT_NEGATIVE),
        ),
        _supported,
        renamed=_RENAMED,
    ),
    "four-point": Subject(
        "load",
        "Four-point bending, the gauge between the inner rollers",
        (*_BENT, Argument("arm", "from an inner to an outer roller", LENGTH, bound=POSITIVE)),
        _four_point,
        renamed=_RENAMED,
    ),
}
