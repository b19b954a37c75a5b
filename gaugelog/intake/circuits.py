"""`circuits.csv`: a row a circuit, with its four arms, its leads and its channel."""

from __future__ import annotations

from collections.abc import Callable, Mapping

from gaugelog.errors import Faulty
from gaugelog.intake.fields import Fields, Gathered, distinct
from gaugelog.intake.files import rows_of
from gaugelog.intake.typed import parse_quantity
from gaugelog.ledger.circuits import CircuitPlanned, Element, Leads

COLUMNS = (
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
)
OPTIONAL = ("cable", "marks")

ARRANGEMENTS = ("quarter three-wire",)
"""The arrangements that this version plans."""

_ARM_REMEDY = "Like: grid BR-1; module 350 ohm; completion 350 ohm + trim 0.5 ohm."


def read_circuits(
    name: str,
    data: bytes,
    campaign: str,
    grids: Mapping[str, str],
    channels: Mapping[tuple[str, str], str],
    *,
    new_id: Callable[[], str],
    faults: Gathered,
) -> list[CircuitPlanned]:
    """Understand `circuits.csv`; `grids` and `channels` give ids by label (casefolded).

    Faults are gathered, and then what is given means nothing.
    """
    rows = [
        Fields(f"{name}, row {number}", cells, faults, joint=", column ")
        for number, cells in rows_of(name, data, COLUMNS, OPTIONAL)
    ]
    found = [_circuit(row, campaign, grids, channels, new_id) for row in rows]
    distinct(rows, "circuit", [circuit.label for circuit in found])
    return found


def _circuit(
    row: Fields,
    campaign: str,
    grids: Mapping[str, str],
    channels: Mapping[tuple[str, str], str],
    new_id: Callable[[], str],
) -> CircuitPlanned:
    arms = (
        _arm(row, "arm1", grids),
        _arm(row, "arm2", grids),
        _arm(row, "arm3", grids),
        _arm(row, "arm4", grids),
    )
    used = tuple(element.grid for arm in arms for element in arm if element.grid is not None)
    if len(set(used)) != len(used):
        row.fault("arm1", "names a grid twice in one circuit.")
    return CircuitPlanned(
        id=new_id(),
        label=row.label("circuit"),
        campaign=campaign,
        arrangement=row.choice("arrangement", ARRANGEMENTS),
        arms=arms,
        leads=_leads(row),
        channel=_channel(row, channels),
        grids=tuple(dict.fromkeys(used)),
    )


def _channel(row: Fields, channels: Mapping[tuple[str, str], str]) -> str:
    module, channel = row.label("module"), row.label("channel")
    found = channels.get((module.casefold(), channel.casefold()))
    if found is None and module and channel:
        known = ", ".join(f"{one}/{two}" for one, two in channels) or "none"
        row.fault(
            "channel", f"campaign.toml has no channel {module}/{channel}.", f"It has {known}."
        )
    return found or "-"


def _leads(row: Fields) -> Leads:
    return Leads(
        wires=row.whole("wires", 2, 8),
        length=row.positive("length_m", "m"),
        resistance_per_length=row.positive("wire_ohm_per_m", "ohm/m"),
        cable=row.label("cable", needed=False),
        marks=_marks(row),
    )


def _marks(row: Fields) -> dict[str, str]:
    """`signal+=white; supply-=blue`: the user's own marks by the wire's function."""
    marks: dict[str, str] = {}
    for part in row.text("marks", needed=False).split(";"):
        if not part.strip():
            continue
        name, equals, mark = (piece.strip() for piece in part.partition("="))
        if not (name and equals and mark):
            row.fault("marks", f"“{part.strip()[:40]}” is no wire=mark.", "Like: signal+=white.")
            continue
        marks[name] = mark
    return marks


def _arm(row: Fields, name: str, grids: Mapping[str, str]) -> tuple[Element, ...]:
    return tuple(
        element
        for part in row.text(name).split(" + ")
        if (element := _element(row, name, part.strip(), grids)) is not None
    )


def _element(row: Fields, name: str, text: str, grids: Mapping[str, str]) -> Element | None:
    if not text:
        return None
    kind, _, rest = text.partition(" ")
    kind, rest = kind.casefold(), rest.strip()
    if kind in {"grid", "dummy"}:
        return _grid(row, name, kind, rest, grids)
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


def _grid(
    row: Fields, name: str, kind: str, label: str, grids: Mapping[str, str]
) -> Element | None:
    found = grids.get(label.casefold())
    if found is None:
        row.fault(name, f"grids.csv has no grid “{label[:40]}”.", _ARM_REMEDY)
        return None
    return Element(kind="dummy" if kind == "dummy" else "grid", grid=found)
