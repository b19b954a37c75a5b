"""A gauged part as a load cell: its sensitivity, and the fit of a comparison run."""

from __future__ import annotations

from gaugelog.commands.calc.bounds import NOT_ZERO, POISSON
from gaugelog.commands.calc.choosing import only_one
from gaugelog.commands.calc.dimensions import (
    FACTOR,
    FORCE,
    OUTPUT,
    PERCENT,
    POISSONS_RATIO,
    STRAIN,
)
from gaugelog.commands.calc.lists import Pair, pair
from gaugelog.commands.calc.model import Answer, Argument, Subject, Values
from gaugelog.commands.calc.sheet import Sheet
from gaugelog.physics import loadcell
from gaugelog.physics.arrangements import ARRANGEMENTS

Runs = tuple[tuple[Pair, ...], ...]


def _sensitivity(values: Values) -> Answer:
    sheet = Sheet()
    bridge = values["factor"], values["arrangement"], values["poisson"]
    if only_one(values, "strain", "output") == "strain":
        output = sheet.by(loadcell.sensitivity, values["strain"], *bridge)
        sheet.put("output, linear form", output, OUTPUT, 6)
    else:
        strain = sheet.by(loadcell.strain_for_sensitivity, values["output"], *bridge)
        sheet.put("strain that it needs", strain, STRAIN, 6)
    return sheet.answer()


def _runs(text: str) -> tuple[Runs, str]:
    """Runs parted by semicolons, each of pairs of load and output."""
    found = [[pair(each, FORCE, OUTPUT) for each in run.split(",")] for run in text.split(";")]
    runs = tuple(tuple((load.value, out.value) for load, out in run) for run in found)
    shown = "; ".join(
        ", ".join(f"{load.shown} = {out.shown}" for load, out in run) for run in found
    )
    return runs, shown


def points_of(runs: Runs) -> list[loadcell.RunPoint]:
    """The points of runs: rising up to each run's largest load, falling after it."""
    points = []
    for number, run in enumerate(runs, start=1):
        top = max(range(len(run)), key=lambda place: abs(run[place][0]))
        points += [
            loadcell.RunPoint(load, output, rising=place <= top, run=number)
            for place, (load, output) in enumerate(run)
        ]
    return points


def _run(values: Values) -> Answer:
    sheet = Sheet()
    fit = sheet.by(
        loadcell.fit_run,
        points_of(values["run"]),
        through_zero=values["through_zero"] == "yes",
    )
    sheet.put("statement", fit.statement)
    sheet.put("output per kN", fit.slope * 1000, OUTPUT, 7)
    sheet.put("output at no load", fit.intercept, OUTPUT)
    sheet.put("full scale", fit.full_scale, OUTPUT, 7)
    for name, part in (
        ("non-linearity, of full scale", fit.nonlinearity),
        ("hysteresis, of full scale", fit.hysteresis),
        ("repeatability, of full scale", fit.repeatability),
    ):
        sheet.put(name, "the run can't tell" if part is None else part, PERCENT, 4)
    sheet.warn([fit.statement])
    return sheet.answer()


KINDS = {
    "cell": Subject(
        "load",
        "A load cell: output of a strain, or the strain that an output needs",
        (
            Argument("strain", "at the grids", STRAIN, ""),
            Argument("output", "wanted", OUTPUT, ""),
            Argument("factor", "gauge factor", FACTOR, "2.0", bound=NOT_ZERO),
            Argument("arrangement", "of the bridge", choices=tuple(ARRANGEMENTS)),
            Argument("poisson", "Poisson's, for Poisson arms", POISSONS_RATIO, "0", bound=POISSON),
        ),
        _sensitivity,
        renamed={"ratio": "output"},
    ),
    "run": Subject(
        "load",
        "The best straight line of a comparison run; not a calibration",
        (
            Argument(
                "run",
                "loads and outputs as they came; runs parted by semicolons",
                read=_runs,
                example="0 kN = 0 mV/V, 5 kN = 1.0 mV/V, 10 kN = 2.0 mV/V, 5 kN = 1.001 mV/V",
            ),
            Argument(
                "through_zero", "the line has no intercept", choices=("no", "yes"), default="no"
            ),
        ),
        _run,
        renamed={"points": "run"},
    ),
}
