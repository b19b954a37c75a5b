"""`criteria.toml`: the acceptance criteria, each figure with its source."""

from __future__ import annotations

from collections.abc import Callable
from typing import Literal, cast, get_args

from gaugelog.intake.fields import Fields, Gathered, nothing_at
from gaugelog.intake.files import toml_of
from gaugelog.intake.instruments import QUANTITY_UNITS
from gaugelog.intake.typed import CHECK_UNITS
from gaugelog.ledger.campaign import CheckCriterion, Conditional, CriteriaAgreed, ShiftDemand
from gaugelog.ledger.checks import CHECKS

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


def read_criteria(
    name: str, data: bytes, campaign: str, new_id: Callable[[], str], faults: Gathered
) -> CriteriaAgreed:
    """Understand `criteria.toml`; faults are gathered, and then what is given means nothing."""
    top = Fields(name, toml_of(name, data), faults, joint=", ")
    decision = top.table("decision") or nothing_at(name)
    tables = top.tables("check")
    found = CriteriaAgreed(
        id=new_id(),
        campaign=campaign,
        title=top.text("title"),
        edition=top.text("edition"),
        agreed_by=top.text("agreed_by", needed=False),
        coverage=_coverage(decision),
        conditional_pass=_word(decision, "conditional_pass"),
        conditional_fail=_word(decision, "conditional_fail"),
        checks=tuple(_check(each) for each in tables),
        shift_check=_shift(top.table("shift_check", needed=False)),
    )
    decision.done()
    top.done()
    _twice(tables, found.checks)
    return found


def _coverage(decision: Fields) -> str:
    found = decision.number("coverage", "1")
    if decision.sound("coverage") and not 1 <= found.si() <= 3:
        decision.fault("coverage", f"“{found.value}” must be from 1 to 3.")
    return found.value


def _word(decision: Fields, name: str) -> Conditional:
    return cast("Conditional", decision.choice(name, get_args(Conditional)))


def _shift(each: Fields | None) -> ShiftDemand | None:
    """How often a meter is checked on a reference; None where the criteria do not ask for it."""
    if each is None:
        return None
    of = each.texts("of")
    for item in of:
        if item not in QUANTITY_UNITS:
            known = ", ".join(QUANTITY_UNITS)
            each.fault("of", f"“{item[:40]}” is nothing that a meter measures.", f"Known: {known}.")
    if not of and each.sound("of"):
        each.fault("of", "is missing.", 'Say what must be checked, like ["resistance"].')
    found = ShiftDemand(
        within=each.quantity("within", ("h", "min", "d"), positive=True),
        of=of,
        source=each.text("source"),
    )
    each.done()
    return found


def _check(each: Fields) -> CheckCriterion:
    kind = each.choice("kind", tuple(CHECK_UNITS))
    units = (*CHECK_UNITS[kind], *(("%",) if CHECKS[kind].relative else ()))
    where = ("laboratory", "field", "any")
    found = CheckCriterion(
        check=kind,
        stage=each.choice("stage", STAGES),
        surroundings=cast(
            "Literal['laboratory', 'field', 'any']", each.choice("surroundings", where, "any")
        ),
        at_least=each.maybe_quantity("at_least", units, positive=True),
        at_most=each.maybe_quantity("at_most", units, positive=True),
        physics=each.texts("physics"),
        expected=each.maybe_quantity("expected", units, positive=True),
        largest_test_voltage=each.maybe_quantity("largest_test_voltage", ("V",), positive=True),
        per=each.maybe_quantity("per", ("s", "min", "h", "d"), positive=True),
        bandwidth=each.maybe_quantity("bandwidth", ("Hz", "kHz"), positive=True),
        source=each.text("source"),
    )
    _sides(each, found)
    _counted(each, found)
    each.done()
    return found


def _sides(each: Fields, found: CheckCriterion) -> None:
    least, most = found.at_least, found.at_most
    given = any(each.has(name) for name in ("at_least", "at_most", "physics"))
    if not given:
        each.fault("at_least", "is missing, and so are at_most and physics.", "Give one of them.")
    if least is not None and most is not None:
        if "%" in {least.unit, most.unit} and least.unit != most.unit:
            each.fault("at_most", "mixes per cent with ohms.", "Give both in one unit.")
        elif least.si() > most.si():
            each.fault("at_most", "lies below at_least.")
    _expectation(each, found)
    for item in found.physics if each.sound("kind") else ():
        if item not in CHECKS[found.check].physics:
            known = ", ".join(CHECKS[found.check].physics) or "none"
            each.fault("physics", f"“{item[:60]}” adds nothing here.", f"Known: {known}.")


def _expectation(each: Fields, found: CheckCriterion) -> None:
    """What is expected lies on the good side of one limit, in its unit."""
    if found.expected is None or not each.sound("expected", "at_least", "at_most"):
        return
    limit = found.at_least or found.at_most
    if limit is None or (found.at_least is not None and found.at_most is not None):
        each.fault("expected", "stands beside one limit.", "Give at_least or at_most with it.")
    elif (limit.unit == "%") != (found.expected.unit == "%"):
        each.fault("expected", "mixes per cent with ohms.", "Give it in the limit's unit.")
    elif found.at_least is not None and found.expected.si() < limit.si():
        each.fault("expected", "lies below at_least.")
    elif found.at_most is not None and found.expected.si() > limit.si():
        each.fault("expected", "lies above at_most.")


def _counted(each: Fields, found: CheckCriterion) -> None:
    """A time or a bandwidth belongs to the checks whose figure is counted over it."""
    for name in ("per", "bandwidth") if each.sound("kind") else ():
        if each.has(name) and CHECKS[found.check].counted != name:
            kinds = ", ".join(kind.name for kind in CHECKS.values() if kind.counted == name)
            each.fault(name, f"says nothing of {found.check}.", f"It belongs to {kinds}.")


def _twice(tables: list[Fields], checks: tuple[CheckCriterion, ...]) -> None:
    seen: dict[tuple[str, str, str], str] = {}
    for each, item in zip(tables, checks, strict=True):
        if not each.sound("kind", "stage", "surroundings"):
            continue
        key = (item.check, item.stage, item.surroundings)
        if key in seen:
            each.fault("kind", "stands twice for this stage.", f"First at {seen[key]}.")
        seen.setdefault(key, each.place)
