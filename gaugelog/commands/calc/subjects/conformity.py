"""`gaugelog calc conformity`: the word for a value against its limits, and its probability."""

from __future__ import annotations

from gaugelog.commands.calc.engine import Answer, Argument, Figure, Subject, Values
from gaugelog.commands.calc.quantities import RATIO
from gaugelog.errors import Fault, Faulty


def _compute(values: Values) -> Answer:
    from gaugelog.physics import conformity

    lower, upper = values["at_least"], values["at_most"]
    if lower is None and upper is None:
        raise Faulty([Fault("at_least, at_most", "give at least one of the two.")])
    found = conformity.judge(
        values["value"],
        values["uncertainty"],
        conformity.Limits(lower, upper),
        qualifier=values["qualifier"],
        coverage=values["coverage"],
    )
    chance = "none" if found.probability is None else f"{found.probability:.4f}"
    return Answer(
        (
            Figure("verdict", found.word.value),
            Figure("probability of conformance", chance),
            Figure("margin to the limit", found.margin, RATIO),
            Figure("guard band", found.guard_band, RATIO),
            Figure("why", found.reason),
        ),
        (conformity.judge, conformity.probability_of_conformance),
    )


SUBJECT = Subject(
    "conformity",
    "Verdict of a value against its limits, in the words of ILAC-G8",
    (
        Argument("value", "the value, all in one unit of your choice", RATIO),
        Argument("uncertainty", "its standard uncertainty, same unit", RATIO),
        Argument("at_least", "lower limit, same unit", RATIO, ""),
        Argument("at_most", "upper limit, same unit", RATIO, ""),
        Argument("qualifier", "= or > or <", choices=("=", ">", "<"), default="="),
        Argument("coverage", "coverage factor k of the guard band", RATIO, "2"),
    ),
    _compute,
)
