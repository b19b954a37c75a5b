"""`gaugelog calc rosette`: principal strains and stresses, and grids exchanged by a check load."""

from __future__ import annotations

import math
from dataclasses import replace
from itertools import combinations

from gaugelog.commands.calc.bounds import (
    NOT_NEGATIVE,
    NOT_ZERO,
    POISSON,
    POSITIVE,
    SMALL,
    Bound,
)
from gaugelog.commands.calc.choosing import need
from gaugelog.commands.calc.dimensions import (
    ANGLE,
    MODULUS,
    POISSONS_RATIO,
    SHARE,
    STRAIN,
    STRAINS,
    STRESS,
)
from gaugelog.commands.calc.model import Answer, Argument, Family, Subject, Values
from gaugelog.commands.calc.sheet import Sheet
from gaugelog.commands.calc.subjects.rosettegrids import (
    angles_of,
    corrected_readings,
    state_of,
)
from gaugelog.errors import Fault, Faulty
from gaugelog.physics import checkload, plane, principal_budget, rosette, stress, transverse
from gaugelog.physics.estimates import normal

_MOST_EXCHANGED = 6
_ALIKE = "none: alike in every direction"
_CORRELATION = Bound("must lie between −1 and 1", lambda value: -1 <= value <= 1)


def _strains(values: Values) -> Answer:
    sheet = Sheet()
    state = state_of(values, sheet)
    found = sheet.by(plane.principal_strains, state)
    direction = _ALIKE if found.angle is None else found.angle
    sheet.put("largest principal strain", found.largest, STRAIN)
    sheet.put("smallest principal strain", found.smallest, STRAIN)
    sheet.put("direction of the largest, from grid 1", direction, ANGLE, 4)
    sheet.put("largest shear strain", found.max_shear, STRAIN)
    circle = sheet.by(plane.mohr_circle, state)
    sheet.put("Mohr's circle, centre", circle.centre, STRAIN)
    sheet.put("Mohr's circle, radius", circle.radius, STRAIN)
    along = sheet.by(plane.strain_along, state, values["along"])
    sheet.put(f"strain along {math.degrees(values['along']):.4g}°", along, STRAIN)
    sheet.warn(plane.principal_strains_notices(state))
    if values["modulus"] is not None:
        _stresses(sheet, values, state)
    if values["uncertainty"] is not None:
        _doubt(sheet, values)
    return sheet.answer()


def _stresses(sheet: Sheet, values: Values, state: plane.PlaneStrain) -> None:
    need(values, "poisson", why="with the modulus")
    if values["modulus_across"] is not None:
        need(values, "shear_modulus", why="with modulus_across")
        _layer_stresses(sheet, values, state)
        return
    constants = values["modulus"], values["poisson"]
    found = sheet.by(stress.isotropic_stress, state, *constants)
    ends = sheet.by(stress.principal_stresses, found)
    sheet.put("largest principal stress", ends.largest, STRESS, 4)
    sheet.put("smallest principal stress", ends.smallest, STRESS, 4)
    sheet.put("von Mises stress", sheet.by(stress.von_mises, found), STRESS, 4)
    turned = stress.isotropic_stress(plane.turned(state, values["along"]), *constants)
    place = f"{math.degrees(values['along']):.4g}°"
    sheet.put(f"stress along {place}", turned.x, STRESS, 4)
    sheet.put(f"shear stress at {place}", turned.shear, STRESS, 4)


def _layer_stresses(sheet: Sheet, values: Values, state: plane.PlaneStrain) -> None:
    """Stresses of an orthotropic layer, in its own axes."""
    own_axes = sheet.by(plane.turned, state, values["fibre"])
    found = sheet.by(
        stress.orthotropic_stress,
        *(own_axes, values["modulus"], values["modulus_across"]),
        *(values["poisson"], values["shear_modulus"]),
    )
    sheet.put("stress along the fibre", found.x, STRESS, 4)
    sheet.put("stress across the fibre", found.y, STRESS, 4)
    sheet.put("shear stress in the layer", found.shear, STRESS, 4)
    ends = sheet.by(stress.principal_stresses, found)
    sheet.put("largest principal stress", ends.largest, STRESS, 4)
    sheet.put("smallest principal stress", ends.smallest, STRESS, 4)
    direction = _ALIKE if ends.angle is None else ends.angle
    sheet.put("direction of the largest stress, from the fibre", direction, ANGLE, 4)


def _doubt(sheet: Sheet, values: Values) -> None:
    """Standard uncertainties of the principal values, the grids' errors going together or not."""
    angles = angles_of(values)
    strains = [normal(each, values["uncertainty"]) for each in corrected_readings(Sheet(), values)]
    names = principal_budget.grid_names(len(angles))
    together = {pair: float(values["correlation"]) for pair in combinations(names, 2)}
    found = sheet.by(principal_budget.principal_budgets, strains, angles, together)
    sheet.put("u of the largest", found.largest.uncertainty, STRAIN, 2)
    sheet.put("u of the smallest", found.smallest.uncertainty, STRAIN, 2)
    if found.angle is not None:
        sheet.put("u of the direction", found.angle.uncertainty, ANGLE, 2)
    sheet.warn(principal_budget.principal_budgets_notices(found))


def _check(values: Values) -> Answer:
    """Which grids are exchanged, from a load in a known direction."""
    sheet, angles, readings = Sheet(), angles_of(values), values["readings"]
    if len(readings) > _MOST_EXCHANGED:
        raise Faulty([Fault("readings", f"must be {_MOST_EXCHANGED} at most for a check.")])
    expected = sheet.by(
        checkload.uniaxial_readings,
        *(values["strain"], values["poisson"], angles, values["axis"]),
    )
    for number, strain in enumerate(expected, start=1):
        sheet.put(f"grid {number} should read", strain, STRAIN, 4)
    orders = sheet.by(checkload.explaining_orders, readings, expected, values["tolerance"])
    sheet.put("answer", checkload.order_sentence(orders))
    return sheet.answer()


def _arguments(*own: Argument) -> tuple[Argument, ...]:
    """What every kind asks of the grids, and then its own."""
    return (
        Argument("readings", "strain of each grid, in order", STRAINS, many=True),
        Argument("pattern", "of the grids", default="", choices=tuple(rosette.PATTERNS)),
        Argument("angles", "of the grids, for odd patterns", ANGLE, "", many=True),
        Argument(
            "numbering",
            "which way a pattern's grids are numbered",
            default="counter-clockwise",
            choices=("counter-clockwise", "clockwise"),
        ),
        Argument(
            "seen_from",
            "where the viewer stands",
            default="gauge side",
            choices=("gauge side", "other side"),
        ),
        *own,
    )


_POISSON = Argument("poisson", "Poisson's ratio of the article", POISSONS_RATIO, "", bound=POISSON)
_KINDS: dict[str, Subject] = {
    "strains": Subject(
        "rosette",
        "Principal strains and stresses from a rosette",
        _arguments(
            Argument("transverse", "sensitivity, one or each", SHARE, "", many=True, bound=SMALL),
            Argument(
                "beam_poisson",
                "Poisson's ratio of the beam that gave the gauge factor",
                POISSONS_RATIO,
                str(transverse.CALIBRATION_POISSON),
                bound=POISSON,
            ),
            Argument("along", "direction asked for, from grid 1", ANGLE, "0 deg"),
            Argument("modulus", "of elasticity, for stresses", MODULUS, "", bound=POSITIVE),
            _POISSON,
            Argument("modulus_across", "for an orthotropic layer", MODULUS, "", bound=POSITIVE),
            Argument("shear_modulus", "for an orthotropic layer", MODULUS, "", bound=POSITIVE),
            Argument("fibre", "direction of an orthotropic layer", ANGLE, "0 deg"),
            Argument("uncertainty", "standard, of each reading", STRAIN, "", bound=NOT_NEGATIVE),
            Argument("correlation", "between grids' errors", SHARE, "0", bound=_CORRELATION),
        ),
        _strains,
    ),
    "check": Subject(
        "rosette",
        "Grids exchanged or not, from a uniaxial check load",
        _arguments(
            Argument("strain", "expected along the load", STRAIN, bound=NOT_ZERO),
            replace(_POISSON, default=None),
            Argument("axis", "direction of the load, from grid 1", ANGLE, "0 deg"),
            Argument("tolerance", "how far readings may stray", STRAIN, "20 ue", bound=POSITIVE),
        ),
        _check,
    ),
}

SUBJECT = Family(
    "rosette",
    "Principal strains, direction and stresses of a rosette; grids exchanged by a check load",
    "what",
    _KINDS,
    default="strains",
)
