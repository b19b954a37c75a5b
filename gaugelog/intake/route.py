"""Routes from TOML: shipped ones by their label, a planner's own by their path."""

from __future__ import annotations

import hashlib
from collections.abc import Callable
from importlib import resources
from pathlib import Path
from typing import Literal, cast, get_args

from gaugelog.errors import Fault, Faulty
from gaugelog.intake.fields import Fields, Gathered, distinct
from gaugelog.intake.files import read_bytes, toml_of
from gaugelog.intake.typed import CHECK_UNITS
from gaugelog.ledger.base import UNITS
from gaugelog.ledger.routes import (
    InputKind,
    RouteAdopted,
    RouteStep,
    SkipRule,
    StepInput,
    StepSubject,
    Window,
)
from gaugelog.ledger.stock import ConsumableKind

_TIMES = ("s", "min", "h", "d")
_LONG = 4000


def shipped_routes() -> dict[str, bytes]:
    """The routes that come with Gaugelog: file bytes by label."""
    folder = resources.files("gaugelog.intake") / "routes"
    return {
        item.name.removesuffix(".toml"): item.read_bytes()
        for item in sorted(folder.iterdir(), key=lambda each: each.name)
        if item.name.endswith(".toml")
    }


def load_route(
    named: str, folder: Path, new_id: Callable[[], str]
) -> tuple[RouteAdopted, str, bytes]:
    """The route called `named`, with its file's name and bytes.

    A name that ends in .toml is a file of the planner's in `folder`; any other is shipped. Raises
    Faulty naming every fault of the file.
    """
    if named.endswith(".toml"):
        path = folder / named
        if Path(named).is_absolute() or ".." in Path(named).parts:
            raise Faulty([Fault(named, "lies outside the plan's folder.", "Copy it into it.")])
        name, data = path.name, read_bytes(path)
    else:
        shipped = shipped_routes()
        if named not in shipped:
            known = ", ".join(shipped)
            remedy = f"Shipped: {known}; a file of your own ends in .toml."
            raise Faulty([Fault("route", f"no route is called “{named}”.", remedy)])
        name, data = f"{named}.toml", shipped[named]
    return read_route(name, data, new_id), name, data


def read_route(name: str, data: bytes, new_id: Callable[[], str]) -> RouteAdopted:
    """Understand a route file. Raises Faulty naming every fault at once."""
    faults: Gathered = []
    top = Fields(name, toml_of(name, data), faults, joint=", ")
    tables = top.tables("step")
    steps = tuple(_step(each) for each in tables)
    distinct(tables, "id", [step.id for step in steps])
    _check_references(tables, steps)
    route = RouteAdopted(
        id=new_id(),
        label=top.label("label"),
        title=top.text("title"),
        edition=top.text("edition"),
        family=top.text("family"),
        basis=top.text("basis", longest=_LONG),
        steps=steps,
        file=hashlib.sha256(data).hexdigest(),
    )
    top.done()
    if faults:
        raise Faulty(faults)
    return route


def _step(each: Fields) -> RouteStep:
    inputs = each.tables("input", needed=False)
    read = tuple(_input(item) for item in inputs)
    distinct(inputs, "name", [item.name for item in read])
    step = RouteStep(
        id=each.label("id"),
        title=each.text("title"),
        subject=cast("StepSubject", each.choice("subject", get_args(StepSubject))),
        stage=each.text("stage", needed=False),
        instruction=each.text("instruction", longest=_LONG),
        cautions=each.texts("cautions"),
        inputs=read,
        hold=each.flag("hold", False),
        refused_to=each.text("refused_to", needed=False),
        windows=tuple(_window(item) for item in each.tables("window", needed=False)),
        skip=cast("SkipRule", each.choice("skip", get_args(SkipRule), "never")),
        reaches=cast(
            "Literal['', 'ready to coat']", each.choice("reaches", ("", "ready to coat"), "")
        ),
    )
    _check_step(each, step)
    each.done()
    return step


def _check_step(each: Fields, step: RouteStep) -> None:
    readings = [item for item in step.inputs if item.kind == "reading"]
    meters = [item for item in step.inputs if item.kind == "instrument"]
    if step.hold and step.inputs:
        each.fault(
            "input", "is asked for at a hold.", "A hold is decided; ask in a step before it."
        )
    if step.hold and not step.refused_to:
        each.fault("refused_to", "is missing.", "Name the step that a refusal goes back to.")
    if step.hold and step.skip != "never":
        each.fault("skip", "must be never at a hold.")
    if readings and not step.stage:
        each.fault("stage", "is missing.", "A step with a reading names its stage.")
    if readings and not meters:
        each.fault("input", "has a reading but no instrument.", "Ask for the instrument too.")


def _input(item: Fields) -> StepInput:
    kind = cast("InputKind", item.choice("kind", get_args(InputKind)))
    check = item.choice("check", tuple(CHECK_UNITS), "")
    unit = item.text("unit", needed=False)
    if kind == "reading" and not check:
        item.fault("check", "is missing.", f"Checks: {', '.join(CHECK_UNITS)}.")
    if kind == "quantity" and unit not in UNITS:
        item.fault("unit", f"“{unit}” is no unit.", f"Units: {', '.join(UNITS)}.")
    type_ = item.text("type", needed=False)
    if kind == "consumable" and type_ and type_ not in get_args(ConsumableKind):
        known = ", ".join(get_args(ConsumableKind))
        item.fault("type", f"“{type_}” is no kind of consumable.", f"Kinds: {known}.")
    found = StepInput(
        name=item.label("name"),
        kind=kind,
        prompt=item.text("prompt"),
        unit=unit,
        check=check,
        type=type_,
        required=item.flag("required", True),
    )
    item.done()
    return found


def _window(item: Fields) -> Window:
    found = Window(
        bound=cast(
            "Literal['not before', 'within']", item.choice("bound", ("not before", "within"))
        ),
        duration=item.quantity("duration", _TIMES),
        after=item.text("after"),
    )
    item.done()
    return found


def _check_references(tables: list[Fields], steps: tuple[RouteStep, ...]) -> None:
    places = {step.id: place for place, step in enumerate(steps)}
    for place, (each, step) in enumerate(zip(tables, steps, strict=True)):
        named = [("refused_to", step.refused_to)] if step.refused_to else []
        named += [("window", window.after) for window in step.windows]
        for name, other in named:
            if places.get(other, place) >= place:
                each.fault(name, f"“{other}” is no earlier step.", "Name a step that comes before.")
