"""`criteria.toml`: the acceptance criteria, each figure with its source."""

from __future__ import annotations

from collections.abc import Callable
from typing import Literal, cast, get_args

from gaugelog.intake.fields import Fields, Gathered
from gaugelog.intake.files import toml_of
from gaugelog.intake.typed import CHECK_UNITS
from gaugelog.ledger.campaign import CheckCriterion, Conditional, CriteriaAgreed

STAGES = (
    "received",
    "bonded",
    "jumpered",
    "cabled",
    "coated",
    "on channel",
    "before load",
    "after load",
    "periodic",
)
PHYSICS: dict[str, tuple[str, ...]] = {
    "resistance": ("lot tolerance",),
    "insulation": ("permitted error",),
}
"""What physics may add to a check's limit."""


def read_criteria(
    name: str, data: bytes, campaign: str, new_id: Callable[[], str], faults: Gathered
) -> CriteriaAgreed:
    """Understand `criteria.toml`; faults are gathered, and then what is given means nothing."""
    top = Fields(name, toml_of(name, data), faults, joint=", ")
    decision = top.table("decision") or Fields(f"{name}, decision", {}, [])
    tables = top.tables("check")
    found = CriteriaAgreed(
        id=new_id(),
        campaign=campaign,
        title=top.text("title"),
        edition=top.text("edition"),
        agreed_by=top.text("agreed_by", needed=False),
        coverage=str(decision.whole("coverage", 1, 3)),
        conditional_pass=_word(decision, "conditional_pass"),
        conditional_fail=_word(decision, "conditional_fail"),
        checks=tuple(_check(each) for each in tables),
    )
    decision.done()
    top.done()
    _twice(tables, found.checks)
    return found


def _word(decision: Fields, name: str) -> Conditional:
    return cast("Conditional", decision.choice(name, get_args(Conditional)))


def _check(each: Fields) -> CheckCriterion:
    kind = each.choice("kind", tuple(CHECK_UNITS))
    units = (*CHECK_UNITS[kind], "%") if kind == "resistance" else CHECK_UNITS[kind]
    where = ("laboratory", "field", "any")
    found = CheckCriterion(
        check=kind,
        stage=each.choice("stage", STAGES),
        surroundings=cast(
            "Literal['laboratory', 'field', 'any']", each.choice("surroundings", where, "any")
        ),
        at_least=each.maybe_quantity("at_least", units),
        at_most=each.maybe_quantity("at_most", units),
        physics=each.texts("physics"),
        expected=each.maybe_quantity("expected", units),
        largest_test_voltage=each.maybe_quantity("largest_test_voltage", ("V",)),
        source=each.text("source"),
    )
    _sides(each, found)
    each.done()
    return found


def _sides(each: Fields, found: CheckCriterion) -> None:
    if found.at_least is None and found.at_most is None and not found.physics:
        each.fault("at_least", "is missing, and so are at_most and physics.", "Give one of them.")
    if found.at_least is not None and found.at_most is not None:
        if ("%" in {found.at_least.unit, found.at_most.unit}) and (
            found.at_least.unit != found.at_most.unit
        ):
            each.fault("at_most", "mixes per cent with ohms.", "Give both in one unit.")
        elif found.at_least.si() > found.at_most.si():
            each.fault("at_most", "lies below at_least.")
    for item in found.physics:
        if item not in PHYSICS[found.check]:
            known = ", ".join(PHYSICS[found.check])
            each.fault("physics", f"“{item}” adds nothing here.", f"Known: {known}.")


def _twice(tables: list[Fields], checks: tuple[CheckCriterion, ...]) -> None:
    seen: dict[tuple[str, str, str], str] = {}
    for each, item in zip(tables, checks, strict=True):
        key = (item.check, item.stage, item.surroundings)
        if key in seen:
            each.fault("kind", "stands twice for this stage.", f"First at {seen[key]}.")
        seen.setdefault(key, each.place)
