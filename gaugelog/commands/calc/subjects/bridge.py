"""`gaugelog calc bridge`: output of an arrangement under strain, and strain from an output."""

from __future__ import annotations

from gaugelog.commands.calc.engine import Answer, Argument, Figure, Subject, Values
from gaugelog.commands.calc.quantities import OUTPUT, RATIO, STRAIN
from gaugelog.errors import Fault, Faulty

ARRANGEMENTS = (
    "quarter two-wire",
    "quarter three-wire",
    "half with dummy",
    "half bending",
    "half Poisson",
    "opposite arms",
    "full bending",
    "full torsion",
    "full Poisson",
)


def _compute(values: Values) -> Answer:
    given = [name for name in ("strain", "output") if values[name] is not None]
    if len(given) != 1:
        raise Faulty([Fault("strain, output", "give one of the two; the other is worked out.")])
    return _from_strain(values) if given == ["strain"] else _from_output(values)


def _from_strain(values: Values) -> Answer:
    from gaugelog.physics import arrangements, bridge

    strain, factor = values["strain"], values["factor"]
    name, poisson, initial = values["arrangement"], values["poisson"], values["initial"]
    output = bridge.strain_output(strain, factor, name, poisson, initial)
    shown = bridge.indicated_strain(output - initial, factor, name, poisson)
    notices = bridge.indicated_strain_notices(strain, factor, name, poisson)
    return Answer(
        (
            Figure("output", output, OUTPUT, 7),
            Figure("bridge factor", arrangements.bridge_factor(name, poisson), RATIO),
            Figure("strain a linear scale shows", shown, STRAIN),
        ),
        (bridge.strain_output, arrangements.bridge_factor, bridge.indicated_strain),
        tuple(notice.message for notice in notices),
    )


def _from_output(values: Values) -> Answer:
    from gaugelog.physics import bridge

    output, factor = values["output"], values["factor"]
    name, poisson, initial = values["arrangement"], values["poisson"], values["initial"]
    shown = bridge.indicated_strain(output - initial, factor, name, poisson)
    actual = bridge.actual_strain(output, factor, name, poisson, initial)
    notices = bridge.indicated_strain_notices(actual, factor, name, poisson)
    return Answer(
        (
            Figure("strain a linear scale shows", shown, STRAIN),
            Figure("actual strain", actual, STRAIN),
        ),
        (bridge.indicated_strain, bridge.actual_strain),
        tuple(notice.message for notice in notices),
    )


SUBJECT = Subject(
    "bridge",
    "Bridge output of an arrangement under strain, or strain from an output",
    (
        Argument("arrangement", "how the grids lie in the bridge", choices=ARRANGEMENTS),
        Argument("factor", "gauge factor", RATIO, "2.0"),
        Argument("strain", "strain along the grid", STRAIN, ""),
        Argument("output", "measured output", OUTPUT, ""),
        Argument("poisson", "Poisson's ratio, for Poisson arms", RATIO, "0"),
        Argument("initial", "output before loading", OUTPUT, "0 mV/V"),
    ),
    _compute,
)
