"""Routes from TOML: shipped ones by their label, a planner's own by their file."""

from __future__ import annotations

import hashlib
from collections.abc import Callable, Iterator
from importlib import resources
from pathlib import Path, PurePosixPath

from gaugelog.errors import Fault, Faulty
from gaugelog.intake.fields import Fields, Gathered, distinct
from gaugelog.intake.files import read_bytes, toml_of
from gaugelog.intake.steps import LONG, read_step
from gaugelog.ledger.routes import RouteAdopted, RouteStep, StepInput

NewId = Callable[[], str]
_Pair = tuple[Fields, RouteStep]


def shipped_routes() -> dict[str, bytes]:
    """The routes that come with Gaugelog: file bytes by label."""
    folder = resources.files("gaugelog.intake") / "routes"
    return {
        item.name.removesuffix(".toml"): item.read_bytes()
        for item in sorted(folder.iterdir(), key=lambda each: each.name)
        if item.name.endswith(".toml")
    }


def route_file(named: str, folder: Path) -> tuple[str, bytes]:
    """Name and bytes of the file of the route called `named`.

    A name that ends in .toml is a file of the planner's in `folder`; any other is shipped. Raises
    Faulty when there is none, or it lies outside the folder.
    """
    if not named.casefold().endswith(".toml"):
        return _shipped(named)
    own = PurePosixPath(named)
    if own.is_absolute() or ".." in own.parts or "\\" in named or ":" in named:
        remedy = "Copy it into the plan's folder and name it from there."
        raise Faulty([Fault("route", f"“{named}” lies outside the plan's folder.", remedy)])
    return str(own), read_bytes(folder / own)


def _shipped(named: str) -> tuple[str, bytes]:
    for label, data in shipped_routes().items():
        if label.casefold() == named.casefold():
            # Told apart from a planner's own copy of the same name.
            return f"{label}.toml (shipped)", data
    known = ", ".join(shipped_routes())
    remedy = f"Shipped: {known}; a file of your own ends in .toml."
    raise Faulty([Fault("route", f"no route is called “{named}”.", remedy)])


def load_route(named: str, folder: Path, new_id: NewId) -> tuple[RouteAdopted, str, bytes]:
    """The route called `named`, with its file's name and bytes. Raises Faulty with every fault."""
    name, data = route_file(named, folder)
    return read_route(name, data, new_id), name, data


def read_route(name: str, data: bytes, new_id: NewId) -> RouteAdopted:
    """Understand a route file. Raises Faulty naming every fault at once."""
    faults: Gathered = []
    top = Fields(name, toml_of(name, data), faults, joint=", ")
    tables = top.tables("step")
    steps = tuple(read_step(each) for each in tables)
    distinct(tables, "id", [step.id for step in steps])
    _check_order(list(zip(tables, steps, strict=True)))
    route = RouteAdopted(
        id=new_id(),
        label=top.label("label"),
        title=top.text("title"),
        edition=top.text("edition"),
        family=top.text("family"),
        basis=top.text("basis", longest=LONG),
        steps=steps,
        process_temperature=top.maybe_quantity("process_temperature", ("degC",)),
        abrades=top.flag("abrades", True),
        file=hashlib.sha256(data).hexdigest(),
    )
    _check_gauge(top, route)
    top.done()
    if faults:
        raise Faulty(faults)
    return route


def _check_order(pairs: list[_Pair]) -> None:
    """What a step names must come before it; what it reads must not have been read before."""
    earlier: set[str] = set()
    read: dict[tuple[str, str], str] = {}
    for each, step in pairs:
        for name, other in _named(step):
            if each.sound(name) and other not in earlier:
                each.fault(name, f"“{other[:40]}” is no earlier step.", "Name one before this.")
        for item in _readings(step):
            key = (item.check, step.stage)
            if item.check and step.stage and key in read:
                what = f"reads {item.check} at the stage {step.stage} again after step {read[key]}."
                each.fault("stage", what, "Give it a stage of its own.")
            read.setdefault(key, step.id)
        earlier.add(step.id)


def _named(step: RouteStep) -> Iterator[tuple[str, str]]:
    if step.refused_to:
        yield "refused_to", step.refused_to
    for window in step.windows:
        if window.after:
            yield "window", window.after


def _readings(step: RouteStep) -> list[StepInput]:
    return [item for item in step.inputs if item.kind == "reading"]


def _check_gauge(top: Fields, route: RouteAdopted) -> None:
    """One step takes the gauge, before anything is read on it."""
    if not route.steps:
        return
    takes = [
        place
        for place, step in enumerate(route.steps)
        for item in step.inputs
        if item.kind == "gauge"
    ]
    if len(takes) != 1:
        what = f"asks for the gauge {len(takes)} times."
        top.fault("step", what, 'One step has one input of kind "gauge", so it is known which.')
        return
    if route.steps[takes[0]].subject not in {"grid", "gauge"}:
        top.fault(f"step[{takes[0] + 1}].subject", "takes the gauge, so it must be grid or gauge.")
    for place, step in enumerate(route.steps[: takes[0]], start=1):
        if _readings(step):
            top.fault(f"step[{place}].input", "has a reading before the gauge is taken.")
