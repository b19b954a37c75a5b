"""The grids of a typed rosette: their angles, their readings corrected, the state they tell."""

from __future__ import annotations

from collections.abc import Sequence

from gaugelog.commands.calc.choosing import one_each, only_one
from gaugelog.commands.calc.dimensions import STRAIN
from gaugelog.commands.calc.model import Values
from gaugelog.commands.calc.sheet import Sheet
from gaugelog.errors import Fault, Faulty
from gaugelog.physics import plane, rosette, transverse

_MOST_GRIDS = 12


def angles_of(values: Values) -> tuple[float, ...]:
    """The grids' angles, radians, for the viewer of the gauges."""
    if only_one(values, "pattern", "angles") == "angles":
        angles: tuple[float, ...] = values["angles"]
    else:
        angles = rosette.grid_angles(values["pattern"], values["numbering"], values["seen_from"])
    count, readings = len(angles), len(values["readings"])
    if count != readings:
        raise Faulty([Fault("readings", f"are {readings}, the grids are {count}.")])
    if count > _MOST_GRIDS:
        raise Faulty([Fault("readings", f"must be {_MOST_GRIDS} at most, not {count}.")])
    return angles


def state_of(values: Values, sheet: Sheet | None = None) -> plane.PlaneStrain:
    """The state of strain at the rosette, axes from grid 1."""
    sheet = sheet or Sheet()
    readings, angles = corrected_readings(sheet, values), angles_of(values)
    if values["pattern"] == "tee":
        return sheet.by(rosette.tee_state, *readings)
    fitted = sheet.by(rosette.fit_rosette, readings, angles)
    if values.get("uncertainty") is not None:
        sheet.warn(rosette.fit_rosette_notices(fitted, 2 * values["uncertainty"]))
    if fitted.scatter is not None:
        for number, residual in enumerate(fitted.residuals, start=1):
            sheet.put(f"reading {number} less the fit", residual, STRAIN, 4)
        sheet.put("scatter of the readings", fitted.scatter, STRAIN, 4)
    return fitted.state


def corrected_readings(sheet: Sheet, values: Values) -> Sequence[float]:
    """Readings with the grids' transverse sensitivity taken off, where it is given."""
    readings: tuple[float, ...] = values["readings"]
    if values["transverse"] is None:
        return readings
    own = one_each("transverse", values["transverse"], len(readings))
    angles, beam = angles_of(values), values["beam_poisson"]
    if values["pattern"] == "tee":
        corrected: Sequence[float] = sheet.by(
            transverse.tee_strains, (readings[0], readings[1]), (own[0], own[1]), beam
        )
    else:
        corrected = sheet.by(transverse.corrected_strains, readings, angles, own, beam)
    for number, strain in enumerate(corrected, start=1):
        sheet.put(f"grid {number}, transverse corrected", strain, STRAIN)
    return corrected
