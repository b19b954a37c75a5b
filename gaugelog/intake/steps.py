"""One step of a route card: what is entered, the windows it keeps, the rules of a hold."""

from __future__ import annotations

from typing import Literal, cast, get_args

from gaugelog.intake.criteria import STAGES
from gaugelog.intake.fields import Fields, distinct
from gaugelog.intake.instruments import QUANTITY_UNITS
from gaugelog.intake.typed import CHECK_UNITS
from gaugelog.intake.units import unit_of
from gaugelog.ledger.base import UNITS
from gaugelog.ledger.checks import CHECKS
from gaugelog.ledger.routes import (
    AIR,
    AXIS,
    BANDWIDTH,
    BOND_LINE,
    EXPECTED_SIGN,
    FIRST_WIRE,
    GAUGE_TEMPERATURE,
    HUMIDITY,
    LEAD_TEMPERATURE,
    MIXED,
    PLACE_X,
    PLACE_Y,
    PRESSED,
    SURFACE,
    ZERO_BEFORE,
    ZERO_SEEN,
    InputKind,
    RouteStep,
    SkipRule,
    StepInput,
    StepSubject,
    Window,
)
from gaugelog.ledger.stock import ConsumableKind

LONG = 4000
"""Characters of an instruction."""

_TIMES = ("s", "min", "h", "d")
_Bound = Literal["not before", "within"]
_TYPES: dict[str, tuple[str, ...]] = {
    "quantity": (
        *(AIR, HUMIDITY, SURFACE, BOND_LINE, MIXED, PLACE_X, PLACE_Y, AXIS),
        *(FIRST_WIRE, ZERO_BEFORE, PRESSED, ZERO_SEEN, GAUGE_TEMPERATURE, LEAD_TEMPERATURE),
        BANDWIDTH,
    ),
    "text": (EXPECTED_SIGN,),
    "consumable": get_args(ConsumableKind),
    "instrument": tuple(QUANTITY_UNITS),
}
"""What the type of an input may be, by its kind."""


def read_step(each: Fields) -> RouteStep:
    """Understand one step; faults are gathered, and then what is given means nothing."""
    inputs = each.tables("input", needed=False)
    read = tuple(_input(item) for item in inputs)
    distinct(inputs, "name", [item.name for item in read])
    step = RouteStep(
        id=each.label("id"),
        title=each.text("title"),
        subject=cast("StepSubject", each.choice("subject", get_args(StepSubject))),
        stage=each.choice("stage", STAGES, ""),
        instruction=each.text("instruction", longest=LONG),
        cautions=each.texts("cautions"),
        inputs=read,
        hold=each.flag("hold", False),
        refused_to=each.text("refused_to", needed=False),
        windows=tuple(_window(item) for item in each.tables("window", needed=False)),
        skip=cast("SkipRule", each.choice("skip", get_args(SkipRule), "never")),
        qualification=each.text("qualification", needed=False),
        reaches=cast(
            "Literal['', 'ready to coat']", each.choice("reaches", ("", "ready to coat"), "")
        ),
    )
    _check_hold(each, step)
    _check_readings(each, step)
    _check_windows(each, step)
    each.done()
    return step


def _check_hold(each: Fields, step: RouteStep) -> None:
    if step.hold and step.inputs:
        remedy = "A hold is decided; ask in a step before it."
        each.fault("input", "is asked for at a hold.", remedy)
    if step.hold and not each.has("refused_to"):
        each.fault("refused_to", "is missing.", "Name the step that a refusal goes back to.")
    if step.hold and step.skip != "never":
        each.fault("skip", "must be never at a hold.")
    if each.has("refused_to") and not step.hold:
        each.fault("refused_to", "belongs to a hold only.")


def _check_readings(each: Fields, step: RouteStep) -> None:
    readings = [item for item in step.inputs if item.kind == "reading"]
    meters = [item for item in step.inputs if item.kind == "instrument"]
    if not readings:
        return
    if not each.has("stage"):
        each.fault("stage", "is missing.", "A step with a reading names its stage.")
    if len(meters) != 1:
        what = f"has a reading and {len(meters)} instruments."
        each.fault("input", what, "A step with a reading asks for the one meter it is read on.")
    checks = [item.check for item in readings if item.check]
    if len(set(checks)) != len(checks):
        each.fault("input", "has two readings of one check.", "Give each a step of its own.")
    _check_beside(each, step, checks)


def _check_beside(each: Fields, step: RouteStep, checks: list[str]) -> None:
    """What a check works its result out of is asked for in the same step."""
    types = {item.type for item in step.inputs if item.required}
    for check in checks if each.sound("input") else ():
        wanted = (EXPECTED_SIGN,) if check == "polarity" else CHECKS[check].beside
        for missing in (item for item in wanted if item not in types):
            kind = "text input" if missing == EXPECTED_SIGN else "quantity"
            what = f"has a reading of {check} without {missing}."
            each.fault("input", what, f"Ask for it: {kind} of that type.")


def _check_windows(each: Fields, step: RouteStep) -> None:
    if not each.sound("window"):
        return
    earliest = {item.after: item for item in step.windows if item.bound == "not before"}
    for item in step.windows:
        other = earliest.get(item.after)
        if item.bound == "within" and other and item.duration.si() <= other.duration.si():
            what = f"closes {item.duration} after {item.after}, before it opens at {other.duration}"
            each.fault("window", f"{what}.")


def _input(item: Fields) -> StepInput:
    kind = cast("InputKind", item.choice("kind", get_args(InputKind)))
    found = StepInput(
        name=item.label("name"),
        kind=kind,
        prompt=item.text("prompt"),
        unit=item.text("unit", needed=False),
        check=item.choice("check", tuple(CHECK_UNITS), ""),
        type=item.text("type", needed=False),
        required=item.flag("required", True),
    )
    if item.sound("kind"):
        _check_unit(item, found)
        _check_type(item, found)
    item.done()
    return found


def _check_unit(item: Fields, found: StepInput) -> None:
    if found.kind == "reading" and not item.has("check"):
        item.fault("check", "is missing.", f"Checks: {', '.join(CHECK_UNITS)}.")
    elif found.kind != "reading" and found.check:
        item.fault("check", "belongs to a reading only.")
    if found.kind == "quantity" and found.unit not in UNITS:
        item.fault("unit", f"“{found.unit[:40]}” is no unit.", f"Units: {', '.join(UNITS)}.")
    units = CHECK_UNITS.get(found.check, ())
    if found.kind == "reading" and found.check and found.unit and unit_of(found.unit) not in units:
        item.fault("unit", f"“{found.unit[:40]}” is no unit of it.", f"Units: {', '.join(units)}.")


def _check_type(item: Fields, found: StepInput) -> None:
    types = _TYPES.get(found.kind, ())
    if found.kind == "consumable" and not item.has("type"):
        item.fault("type", "is missing.", f"Kinds: {', '.join(types)}.")
    elif found.type and not types:
        item.fault("type", "belongs to a consumable, an instrument, a quantity or a text only.")
    elif found.type == MIXED and found.unit not in _TIMES:
        item.fault("unit", "is no unit of time.", f"Units: {', '.join(_TIMES)}.")
    elif found.type and found.type not in types:
        item.fault("type", f"“{found.type[:40]}” is not one of {', '.join(types)}.")


def _window(item: Fields) -> Window:
    found = Window(
        bound=cast("_Bound", item.choice("bound", get_args(_Bound))),
        duration=item.quantity("duration", _TIMES, positive=True),
        after=item.text("after"),
        cure_of=item.text("cure_of", needed=False),
    )
    item.done()
    return found
