"""`circuits.csv`: a row a circuit, with its four arms, its leads and its channel."""

from __future__ import annotations

import re
from collections.abc import Callable, Mapping
from dataclasses import dataclass

from gaugelog.errors import Faulty
from gaugelog.intake.campaign import WIRES
from gaugelog.intake.fields import Fields, Gathered, distinct
from gaugelog.intake.tables import Columns, rows_of
from gaugelog.intake.texts import listed
from gaugelog.intake.typed import parse_quantity
from gaugelog.ledger.circuits import CircuitPlanned, Element, Leads
from gaugelog.physics.arrangements import ARRANGEMENTS as KNOWN
from gaugelog.physics.layouts import layout_for
from gaugelog.physics.validity import OutOfDomain

COLUMNS = Columns(
    needed=(
        "circuit",
        "arrangement",
        "arm1",
        "arm2",
        "arm3",
        "arm4",
        "wires",
        "length_m",
        "wire_ohm_per_m",
        "module",
        "channel",
    ),
    others=("cable", "marks"),
)

ARRANGEMENTS = tuple(KNOWN)
"""The arrangements that a circuit may have."""

_UNKNOWN = "-"
_PLUS = re.compile(r"\s\+\s")
_ARM_REMEDY = "Like: grid BR-1; module 350 ohm; completion 350 ohm + trim 0.5 ohm."


@dataclass(frozen=True, slots=True)
class Named:
    """Ids by label (casefolded) of what circuits name; None where that file could not be read."""

    grids: Mapping[str, str] | None
    channels: Mapping[tuple[str, str], str] | None
    """By the labels of module and channel."""


def read_circuits(
    name: str,
    data: bytes,
    campaign: str,
    named: Named,
    *,
    new_id: Callable[[], str],
    faults: Gathered,
) -> list[CircuitPlanned]:
    """Understand `circuits.csv`; faults are gathered, and then what is given means nothing."""
    rows = rows_of(name, data, COLUMNS, faults)
    found = [_circuit(row, campaign, named, new_id) for row in rows]
    distinct(rows, "circuit", [circuit.label for circuit in found])
    return found


def _circuit(row: Fields, campaign: str, named: Named, new_id: Callable[[], str]) -> CircuitPlanned:
    arms = (
        _arm(row, "arm1", named),
        _arm(row, "arm2", named),
        _arm(row, "arm3", named),
        _arm(row, "arm4", named),
    )
    used = [element.grid for arm in arms for element in arm if element.grid is not None]
    known = [grid for grid in used if grid != _UNKNOWN]
    if len(set(known)) != len(known):
        row.fault("arm1", "or another arm names a grid twice in one circuit.")
    arrangement, leads = row.choice("arrangement", ARRANGEMENTS), _leads(row)
    _fits(row, arrangement, leads)
    return CircuitPlanned(
        id=new_id(),
        label=row.label("circuit"),
        campaign=campaign,
        arrangement=arrangement,
        arms=arms,
        leads=leads,
        channel=_channel(row, named),
        grids=tuple(dict.fromkeys(known)),
    )


def _fits(row: Fields, arrangement: str, leads: Leads) -> None:
    if row.sound("arrangement", "wires"):
        try:
            layout_for(arrangement, leads.wires)
        except OutOfDomain as error:
            row.fault("wires", error.message.removeprefix("wires "))


def _channel(row: Fields, named: Named) -> str:
    module, channel = row.label("module"), row.label("channel")
    if named.channels is None or not module or not channel:
        return _UNKNOWN
    found = named.channels.get((module.casefold(), channel.casefold()))
    if found is None:
        known = listed([f"{one}/{two}" for one, two in named.channels])
        what = f"campaign.toml has no channel {module}/{channel}."
        row.fault("channel", what, f"It has {known}.")
    return found or _UNKNOWN


def _leads(row: Fields) -> Leads:
    return Leads(
        wires=row.whole("wires", 2, 8),
        length=row.number("length_m", "m", positive=True),
        resistance_per_length=row.number("wire_ohm_per_m", "ohm/m", positive=True),
        cable=row.label("cable", needed=False),
        marks=_marks(row),
    )


def _marks(row: Fields) -> dict[str, str]:
    """`signal+=W1; supply-=W2`: the user's own marks by the wire's function."""
    marks: dict[str, str] = {}
    for part in row.text("marks", needed=False).split(";"):
        if not part.strip():
            continue
        name, equals, mark = (piece.strip() for piece in part.partition("="))
        shown = part.strip()[:40]
        if not (equals and mark):
            row.fault("marks", f"“{shown}” is no wire=mark.", "Like: signal+=W1.")
        elif name not in WIRES:
            row.fault("marks", f"“{shown}” names no wire.", f"Wires: {', '.join(WIRES)}.")
        elif name in marks:
            row.fault("marks", f"{name} stands twice.")
        marks[name] = mark
    return marks


def _arm(row: Fields, name: str, named: Named) -> tuple[Element, ...]:
    return tuple(
        element
        for part in _PLUS.split(row.text(name))
        if (element := _element(row, name, part.strip(), named)) is not None
    )


def _element(row: Fields, name: str, text: str, named: Named) -> Element | None:
    if not text:
        return None
    kind, _, rest = text.partition(" ")
    kind, rest = kind.casefold().replace("gauge", "grid").replace("gage", "grid"), rest.strip()
    if kind in {"grid", "dummy"}:
        return _grid(row, name, kind, rest, named)
    if kind not in {"completion", "trim", "module"}:
        row.fault(name, f"“{text[:40]}” is no element of an arm.", _ARM_REMEDY)
        return None
    try:
        value = parse_quantity(rest, ("ohm", "kohm"))
    except Faulty as error:
        row.fault(name, error.faults[0].what, error.faults[0].remedy)
        return None
    if value.si() <= 0:
        row.fault(name, f"“{rest}” must be above 0.")
    inside = kind == "module"
    return Element(
        kind="trim" if kind == "trim" else "completion", resistance=value, inside_module=inside
    )


def _grid(row: Fields, name: str, kind: str, label: str, named: Named) -> Element | None:
    found = _UNKNOWN if named.grids is None else named.grids.get(label.casefold())
    if found is None:
        row.fault(name, f"grids.csv has no grid “{label[:40]}”.", _like(label, named))
        return None
    return Element(kind="dummy" if kind == "dummy" else "grid", grid=found)


def _like(label: str, named: Named) -> str:
    """What to write instead: the grids of that point where it has several."""
    shown = f"{label[:40]}."
    several = [each for each in named.grids or () if each.startswith(shown.casefold())]
    if not several or not label:
        return _ARM_REMEDY
    numbers = ", ".join(f"{shown}{each.removeprefix(shown.casefold())}" for each in several)
    return f"The grids of that point are {numbers}."
