"""A grid in strain that changes along it: waves, peaks, the edge of a hole."""

from __future__ import annotations

from gaugelog.commands.calc.bounds import NOT_NEGATIVE, POISSON, POSITIVE
from gaugelog.commands.calc.choosing import need, only_one
from gaugelog.commands.calc.dimensions import (
    LENGTH,
    PERCENT,
    POISSONS_RATIO,
    RATIO,
    SHARE,
)
from gaugelog.commands.calc.model import Answer, Argument, Subject, Values
from gaugelog.commands.calc.sheet import Sheet
from gaugelog.physics import averaging, holeedge

_LENGTH = Argument("length", "of the grid", LENGTH, bound=POSITIVE)


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


KINDS = {
    "wave": Subject(
        "placement",
        "A grid along a sine wave of strain",
        (
            _LENGTH,
            Argument("wavelength", "of the strain", LENGTH, bound=POSITIVE),
            Argument("loss", "of amplitude permitted", SHARE, "", bound=POSITIVE, example="1 %"),
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
            Argument("fallen", "strain there over the peak's", SHARE, ""),
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
            Argument("poisson", "Poisson's ratio", POISSONS_RATIO, bound=POISSON),
        ),
        _hole,
    ),
}
