"""`gaugelog calc placement`: what turning, misplacing, averaging, stiffening and curvature do."""

from __future__ import annotations

from math import pi

from gaugelog.commands.calc.bounds import NOT_NEGATIVE, NOT_ZERO, POISSON, POSITIVE, SOLID
from gaugelog.commands.calc.choosing import need, only_one
from gaugelog.commands.calc.dimensions import (
    ANGLE,
    DIFFERENCE,
    EXPANSION,
    GRADIENT,
    LENGTH,
    MODULUS,
    PERCENT,
    RATIO,
    STRAIN,
    THICKNESS,
)
from gaugelog.commands.calc.model import Answer, Argument, Family, Subject, Values
from gaugelog.commands.calc.sheet import Sheet
from gaugelog.physics import averaging, curvature, holeedge, placement, plane, stiffening

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


def _wave(values: Values) -> Answer:
    sheet, length, wavelength = Sheet(), values["length"], values["wavelength"]
    share = sheet.by(averaging.sine_average, length, wavelength)
    sheet.put("part of the amplitude shown", share, PERCENT, 7)
    if values["loss"] is not None:
        longest = sheet.by(averaging.longest_grid, wavelength, values["loss"])
        sheet.put("longest grid for the permitted loss", longest, LENGTH)
    sheet.warn(averaging.sine_average_notices(length, wavelength))
    return sheet.answer()


def _peak(values: Values) -> Answer:
    sheet, length, reach = Sheet(), values["length"], values["reach"]
    if only_one(values, "reach", "distance") == "distance":
        need(values, "fallen", why="with distance")
        reach = sheet.by(averaging.reach_of_peak, values["distance"], values["fallen"])
        sheet.put("reach of the peak", reach, LENGTH)
    share = sheet.by(averaging.parabola_average, length, reach, values["off"])
    sheet.put("part of the peak shown", share, PERCENT, 7)
    if share:
        sheet.put("multiply readings by", 1 / share, RATIO, 6)
    sheet.warn(averaging.parabola_average_notices(length, reach))
    return sheet.answer()


def _hole(values: Values) -> Answer:
    sheet, radius, near = Sheet(), values["hole"] / 2, values["near"]
    poisson = values["poisson"]
    share = sheet.by(
        holeedge.hole_grid_average, radius, near, values["width"], values["length"], poisson
    )
    sheet.put("part of the edge's strain shown", share, PERCENT)
    middle = near + values["width"] / 2
    there = sheet.by(holeedge.hole_edge_strain, radius, middle, poisson)
    sheet.put("part at the grid's middle", there, PERCENT)
    sheet.put("multiply readings by", 1 / share, RATIO)
    return sheet.answer()


def _layer(values: Values) -> Answer:
    """What is left of the strain under a grid, its backing and its adhesive."""
    sheet = Sheet()
    part = values["modulus"], values["thickness"]
    layer = values["layer_modulus"], values["layer"]
    for name, formula in (
        ("strain left, pulled and kept straight", stiffening.held_tension_share),
        ("strain shown, pulled and free to bend", stiffening.free_tension_share),
        ("strain shown, bent", stiffening.bending_share),
    ):
        sheet.put(name, sheet.by(formula, *part, *layer), PERCENT)
    if values["permitted"] is not None:
        thinnest = sheet.by(stiffening.thinnest_part, part[0], *layer, values["permitted"])
        sheet.put("thinnest part for the permitted loss", thinnest, LENGTH)
    sheet.warn(stiffening.held_tension_share_notices(*part, *layer))
    return sheet.answer()


def _height(values: Values) -> Answer:
    """A grid that lies above a bent surface is strained more than the surface."""
    sheet, thickness, height = Sheet(), values["thickness"], values["height"]
    share = sheet.by(stiffening.height_share, thickness, height)
    sheet.put("strain of the grid over the surface's", share, RATIO, 6)
    if values["indicated"] is not None:
        strain = sheet.by(stiffening.surface_strain, values["indicated"], thickness, height)
        sheet.put("strain of the surface", strain, STRAIN, 6)
    return sheet.answer()


def _curved(values: Values) -> Answer:
    sheet, radius, height = Sheet(), values["radius"], values["height"]
    bonding = sheet.by(curvature.bonding_strain, radius, height)
    sheet.put("strain left by bending round", bonding, STRAIN)
    sheet.put(
        "strain of the grid over the surface's",
        sheet.by(curvature.height_over_curved, radius, values["layer"]),
        RATIO,
        7,
    )
    if values["layer_expansion"] is not None:
        need(values, "article", why="with layer_expansion")
        layers = curvature.Layer(values["layer"], values["layer_expansion"], values["poisson"])
        output = sheet.by(
            curvature.curved_thermal_strain, radius, (layers,), values["article"], values["rise"]
        )
        sheet.put("thermal output that curvature adds", output, STRAIN)
    sheet.warn(curvature.bonding_strain_notices(radius, height))
    return sheet.answer()


_LENGTH = Argument("length", "of the grid", LENGTH, bound=POSITIVE)
_THICKNESS = Argument("thickness", "of the part", LENGTH, bound=POSITIVE)
_KINDS = {
    "turned": Subject(
        "placement",
        "A grid turned from its direction",
        (
            Argument("off", "how far it is turned", ANGLE),
            Argument("intended", "direction meant, from the first principal", ANGLE, "0 deg"),
            Argument("poisson", "for uniaxial stress", RATIO, "", bound=POISSON),
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
    "wave": Subject(
        "placement",
        "A grid along a sine wave of strain",
        (
            _LENGTH,
            Argument("wavelength", "of the strain", LENGTH, bound=POSITIVE),
            Argument("loss", "of amplitude permitted", RATIO, "", bound=POSITIVE, example="1 %"),
        ),
        _wave,
    ),
    "peak": Subject(
        "placement",
        "A grid on a peak of strain",
        (
            _LENGTH,
            Argument("reach", "where the parabola comes to nothing", LENGTH, "", bound=POSITIVE),
            Argument("distance", "from the peak, where fallen is known", LENGTH, ""),
            Argument("fallen", "strain there over the peak's", RATIO, ""),
            Argument("off", "of the grid's middle from the peak", LENGTH, "0 mm"),
        ),
        _peak,
    ),
    "hole": Subject(
        "placement",
        "A grid beside a round hole in a pulled plate",
        (
            Argument("hole", "its diameter", LENGTH, bound=POSITIVE),
            Argument("near", "from edge to first strand", LENGTH, bound=NOT_NEGATIVE),
            Argument("width", "of the grid", LENGTH, bound=POSITIVE),
            _LENGTH,
            Argument("poisson", "Poisson's ratio", RATIO, bound=POISSON),
        ),
        _hole,
    ),
    "stiffening": Subject(
        "placement",
        "A thin or soft part that grid and adhesive stiffen",
        (
            Argument("modulus", "of the part", MODULUS, bound=POSITIVE),
            _THICKNESS,
            Argument("layer_modulus", "of grid, backing and adhesive", MODULUS, bound=POSITIVE),
            Argument("layer", "thickness of all of them", THICKNESS, bound=POSITIVE),
            Argument("permitted", "part of the strain lost", RATIO, "", bound=POSITIVE),
        ),
        _layer,
    ),
    "height": Subject(
        "placement",
        "A grid above a bent surface",
        (
            _THICKNESS,
            Argument("height", "of the grid above the surface", THICKNESS, bound=NOT_NEGATIVE),
            Argument("indicated", "strain indicated", STRAIN, ""),
        ),
        _height,
    ),
    "curved": Subject(
        "placement",
        "A grid bent round a surface",
        (
            Argument("radius", "of the surface, negative where hollow", LENGTH, bound=NOT_ZERO),
            Argument("height", "from the gauge's neutral line to the foil", THICKNESS),
            Argument("layer", "backing and adhesive under the grid", THICKNESS, bound=POSITIVE),
            Argument("layer_expansion", "of backing and adhesive", EXPANSION, ""),
            Argument("poisson", "Poisson's ratio of the layer", RATIO, "0.4", bound=SOLID),
            Argument("article", "expansion of the article", EXPANSION, ""),
            Argument("rise", "of temperature", DIFFERENCE, "10 K"),
        ),
        _curved,
    ),
}

SUBJECT = Family(
    "placement",
    "What a grid shows that is turned, misplaced, too long, on a thin or a curved part",
    "what",
    _KINDS,
)
