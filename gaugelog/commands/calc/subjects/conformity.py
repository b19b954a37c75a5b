"""`gaugelog calc conformity`: the word for a value against its limits, and its probability."""

from __future__ import annotations

from gaugelog.commands.calc.bounds import NOT_NEGATIVE, POSITIVE
from gaugelog.commands.calc.choosing import at_least_one
from gaugelog.commands.calc.dimensions import RATIO
from gaugelog.commands.calc.model import Answer, Argument, Subject, Values
from gaugelog.commands.calc.sheet import Sheet
from gaugelog.physics import conformity
from gaugelog.rules.digits import probability_text


def _compute(values: Values) -> Answer:
    at_least_one(values, "at_least", "at_most")
    sheet = Sheet()
    limits = conformity.Limits(values["at_least"], values["at_most"])
    found = sheet.by(
        conformity.judge,
        *(values["value"], values["uncertainty"], limits),
        qualifier=values["qualifier"],
        coverage=values["coverage"],
    )
    sheet.put("verdict", found.word.value)
    if found.probability is not None:
        sheet.put("probability of conformance", probability_text(repr(found.probability), 4))
        sheet.by(
            conformity.probability_of_conformance, values["value"], values["uncertainty"], limits
        )
        sheet.put("prior", conformity.PRIOR)
    sheet.put("margin to the limit", found.margin, RATIO)
    sheet.put("guard band", found.guard_band, RATIO)
    sheet.put("why", found.reason)
    return sheet.answer()


SUBJECT = Subject(
    "conformity",
    "Verdict of a value against its limits, in the words of ILAC-G8",
    (
        Argument("value", "the value, all in one unit of your choice", RATIO),
        Argument("uncertainty", "its standard uncertainty, same unit", RATIO, bound=NOT_NEGATIVE),
        Argument("at_least", "lower limit, same unit", RATIO, ""),
        Argument("at_most", "upper limit, same unit", RATIO, ""),
        Argument("qualifier", "= or > or <", choices=("=", ">", "<"), default="="),
        Argument("coverage", "coverage factor k of the guard band", RATIO, "2", bound=POSITIVE),
    ),
    _compute,
    renamed={"standard_uncertainty": "uncertainty", "lower": "at_least", "upper": "at_most"},
)
