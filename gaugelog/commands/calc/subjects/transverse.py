"""`gaugelog calc transverse`: transverse sensitivity taken off readings."""

from __future__ import annotations

from collections.abc import Sequence

from gaugelog.commands.calc.bounds import POISSON, SMALL
from gaugelog.commands.calc.choosing import one_each
from gaugelog.commands.calc.dimensions import (
    ANGLE,
    PERCENT,
    POISSONS_RATIO,
    RATIO,
    SHARE,
    STRAIN,
    STRAINS,
)
from gaugelog.commands.calc.model import Answer, Argument, Family, Subject, Values
from gaugelog.commands.calc.sheet import Sheet
from gaugelog.errors import Fault, Faulty
from gaugelog.physics import transverse
from gaugelog.physics.rosette import PATTERNS

_MOST_GRIDS = 12


def _readings(values: Values, count: int) -> tuple[float, ...]:
    readings: tuple[float, ...] = values["readings"]
    if len(readings) != count:
        raise Faulty([Fault("readings", f"must be {count}, not {len(readings)}.")])
    return readings


def _own(values: Values, count: int) -> tuple[float, ...]:
    return one_each("transverse", values["transverse"], count)


def _put(sheet: Sheet, readings: Sequence[float], corrected: Sequence[float]) -> Answer:
    """Each grid's strain, and how far its reading was out."""
    for number, strain in enumerate(corrected, start=1):
        sheet.put(f"grid {number}, corrected", strain, STRAIN, 6)
    for number, (reading, strain) in enumerate(zip(readings, corrected, strict=True), start=1):
        sheet.put(f"grid {number}, error if left", reading - strain, STRAIN, 4)
    return sheet.answer()


def _single(values: Values) -> Answer:
    sheet, beam = Sheet(), values["beam_poisson"]
    sensitivity, biaxiality = values["transverse"], values["biaxiality"]
    error = sheet.by(transverse.uncorrected_error, sensitivity, biaxiality, beam)
    sheet.put("error if left, of the strain", error, PERCENT)
    if values["reading"] is not None:
        strain = sheet.by(
            transverse.single_grid_strain, values["reading"], sensitivity, biaxiality, beam
        )
        sheet.put("strain along the grid", strain, STRAIN, 6)
    return sheet.answer()


def _tee(values: Values) -> Answer:
    sheet = Sheet()
    one, two = _readings(values, 2)
    first, second = _own(values, 2)
    corrected = sheet.by(
        transverse.tee_strains, (one, two), (first, second), values["beam_poisson"]
    )
    return _put(sheet, (one, two), corrected)


def _three(values: Values, formula: str, angles: tuple[float, ...]) -> Answer:
    """By the closed form where one sensitivity serves all grids, else by the general one."""
    sheet, beam = Sheet(), values["beam_poisson"]
    one, two, three = readings = _readings(values, 3)
    own = _own(values, 3)
    closed = {"rectangular": transverse.rectangular_strains, "delta": transverse.delta_strains}
    if len(set(own)) == 1:
        return _put(sheet, readings, sheet.by(closed[formula], (one, two, three), own[0], beam))
    return _put(
        sheet, readings, sheet.by(transverse.corrected_strains, readings, angles, own, beam)
    )


def _rectangular(values: Values) -> Answer:
    return _three(values, "rectangular", PATTERNS["rectangular"])


def _delta(values: Values) -> Answer:
    return _three(values, "delta", PATTERNS["delta"])


def _general(values: Values) -> Answer:
    count = len(values["angles"])
    if count > _MOST_GRIDS:
        raise Faulty([Fault("angles", f"must be {_MOST_GRIDS} at most, not {count}.")])
    sheet, readings = Sheet(), _readings(values, count)
    corrected = sheet.by(
        transverse.corrected_strains,
        *(readings, values["angles"], _own(values, count), values["beam_poisson"]),
    )
    return _put(sheet, readings, corrected)


def _shear(values: Values) -> Answer:
    sheet = Sheet()
    factor = sheet.by(transverse.shear_pair_factor, values["transverse"], values["beam_poisson"])
    sheet.put("multiply the shear by", factor, RATIO, 7)
    if values["shear"] is not None:
        sheet.put("shear strain, corrected", factor * values["shear"], STRAIN, 6)
    return sheet.answer()


_BEAM = Argument(
    "beam_poisson",
    "Poisson's ratio of the beam that gave the gauge factor",
    POISSONS_RATIO,
    str(transverse.CALIBRATION_POISSON),
    bound=POISSON,
)
_ONE = Argument("transverse", "sensitivity of the grid", SHARE, bound=SMALL, example="0.6 %")
_MANY = Argument(
    "transverse", "sensitivity, one for all or one each", SHARE, many=True, bound=SMALL
)
_READ = Argument("readings", "strain of each grid, in order", STRAINS, many=True)

_KINDS = {
    "single": Subject(
        "transverse",
        "One grid in a field of known biaxiality",
        (
            _ONE,
            Argument("biaxiality", "strain across over strain along", RATIO, example="-0.3"),
            Argument("reading", "strain it reads", STRAIN, ""),
            _BEAM,
        ),
        _single,
    ),
    "tee": Subject("transverse", "Two grids at right angles", (_READ, _MANY, _BEAM), _tee),
    "rectangular": Subject(
        "transverse", "Grids at 0, 45 and 90°", (_READ, _MANY, _BEAM), _rectangular
    ),
    "delta": Subject("transverse", "Grids at 0, 60 and 120°", (_READ, _MANY, _BEAM), _delta),
    "general": Subject(
        "transverse",
        "Three or more grids at any angles",
        (_READ, Argument("angles", "of the grids", ANGLE, many=True), _MANY, _BEAM),
        _general,
    ),
    "shear pair": Subject(
        "transverse",
        "Two grids at ±45° that measure shear",
        (_ONE, Argument("shear", "shear strain read", STRAIN, ""), _BEAM),
        _shear,
    ),
}

SUBJECT = Family(
    "transverse",
    "Transverse sensitivity: readings corrected, or the error left when they are not",
    "grids",
    _KINDS,
)
