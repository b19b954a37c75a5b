"""A grid on a thin, bent, curved part or on a carrier of its own."""

from __future__ import annotations

from gaugelog.commands.calc.bounds import NOT_NEGATIVE, NOT_ZERO, POSITIVE, SOLID
from gaugelog.commands.calc.choosing import need, only_one
from gaugelog.commands.calc.dimensions import (
    DIFFERENCE,
    EXPANSION,
    FACTOR,
    LENGTH,
    MODULUS,
    PERCENT,
    POISSONS_RATIO,
    RATIO,
    SHARE,
    STIFFNESS,
    STRAIN,
    THICKNESS,
)
from gaugelog.commands.calc.model import Answer, Argument, Subject, Values
from gaugelog.commands.calc.sheet import Sheet
from gaugelog.physics import curvature, stiffening, weldable

_LENGTH = Argument("length", "of the grid", LENGTH, bound=POSITIVE)


_THICKNESS = Argument("thickness", "of the part", LENGTH, bound=POSITIVE)


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


def _welded(values: Values) -> Answer:
    """A weldable grid: how much of the part's strain comes across its carrier's joint."""
    sheet, length, carrier = Sheet(), values["length"], values["carrier"]
    if only_one(values, "spot", "shear_modulus") == "spot":
        need(values, "pitch", "rows", why="with spot")
        spots = values["spot"], values["pitch"], values["rows"]
        joint = sheet.by(weldable.spot_joint_stiffness, *spots)
    else:
        need(values, "bond", why="with shear_modulus")
        joint = sheet.by(weldable.bond_stiffness, values["shear_modulus"], values["bond"])
    lag = sheet.by(weldable.lag_length, joint, values["modulus"], values["thickness"])
    transfer = sheet.by(weldable.grid_transfer, length, carrier, lag)
    sheet.put("length over which strain comes across", lag, LENGTH)
    sheet.put("part of the strain that the grid takes", transfer, PERCENT, 6)
    factor = sheet.by(weldable.factor_on_part, values["factor"], transfer)
    sheet.put("factor for the part's strain", factor, RATIO, 6)
    sheet.warn(weldable.grid_transfer_notices(length, carrier, lag))
    return sheet.answer()


KINDS = {
    "stiffening": Subject(
        "placement",
        "A thin or soft part that grid and adhesive stiffen",
        (
            Argument("modulus", "of the part", MODULUS, bound=POSITIVE),
            _THICKNESS,
            Argument("layer_modulus", "of grid, backing and adhesive", MODULUS, bound=POSITIVE),
            Argument("layer", "thickness of all of them", THICKNESS, bound=POSITIVE),
            Argument("permitted", "part of the strain lost", SHARE, "", bound=POSITIVE),
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
            Argument("poisson", "Poisson's ratio of the layer", POISSONS_RATIO, "0.4", bound=SOLID),
            Argument("article", "expansion of the article", EXPANSION, ""),
            Argument("rise", "of temperature", DIFFERENCE, "10 K"),
        ),
        _curved,
    ),
    "welded": Subject(
        "placement",
        "A weldable grid: what of the part's strain its carrier takes up",
        (
            _LENGTH,
            Argument("carrier", "its length", LENGTH, bound=POSITIVE),
            Argument("modulus", "of the carrier", MODULUS, bound=POSITIVE),
            Argument("thickness", "of the carrier", THICKNESS, bound=POSITIVE),
            Argument("factor", "of the bare grid", FACTOR, "2.0", bound=NOT_ZERO),
            Argument("spot", "stiffness of one weld", STIFFNESS, "", bound=POSITIVE),
            Argument("pitch", "from weld to weld along", LENGTH, "", bound=POSITIVE),
            Argument("rows", "from row to row across", LENGTH, "", bound=POSITIVE),
            Argument("shear_modulus", "of a bond instead", MODULUS, "", bound=POSITIVE),
            Argument("bond", "its thickness", THICKNESS, "", bound=POSITIVE),
        ),
        _welded,
        renamed={"grid": "length"},
    ),
}
