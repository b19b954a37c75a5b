"""Entries told in a line: what was kept, about which labels."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from typing import Any

from gaugelog.journal.entry import Entry
from gaugelog.ledger.base import Quantity
from gaugelog.ledger.circuits import CircuitRow
from gaugelog.ledger.instruments import InstrumentRow
from gaugelog.ledger.points import PointRow
from gaugelog.ledger.stock import ConsumableRow, GaugeRow, LotRow
from gaugelog.ledger.view import View

Fact = Mapping[str, Any]


def labels(view: View) -> dict[str, str]:
    """Every label by its id: points, lots, gauges, meters, consumables, circuits."""
    models = (PointRow, LotRow, GaugeRow, InstrumentRow, ConsumableRow, CircuitRow)
    return {
        row.id: row.label  # type: ignore[attr-defined]
        for model in models
        for row in view.all(model)
    }


def about_line(entry: Entry, names: Mapping[str, str], most: int = 4) -> str:
    """The labels an entry concerns; ids without a label, such as a reading's own, are left out."""
    if entry.body_bytes is None:
        return "body withheld"
    found = [names[each] for each in entry.body.about if each in names]
    more = f" and {len(found) - most} more" if len(found) > most else ""
    return ", ".join(found[:most]) + more


def what_line(entry: Entry) -> str:
    """What an entry keeps, in a few words; the kind's own name where nothing more is known."""
    kind = entry.header.kind
    if entry.body_bytes is None or kind not in _TELL:
        return kind
    try:
        return f"{kind}: {_TELL[kind](entry.body.fact)}"
    except (LookupError, TypeError, ValueError):  # as a newer program wrote it
        return kind


def _reading(fact: Fact) -> str:
    again = f", attempt {fact['attempt']}" if fact["attempt"] > 1 else ""
    word = str(fact["verdict"]["word"]).upper()
    return f"{fact['check']} {fact['stage']} {fact['typed']}, {word}{again}"


def _shown(value: Any) -> str:
    return str(Quantity.model_validate(value))


_TELL: dict[str, Callable[[Fact], str]] = {
    "journal.begun": lambda fact: str(fact.get("name", "")),
    "certificate.issued": lambda fact: f"{fact['person']}, {fact['reason']}",
    "certificate.revoked": lambda fact: f"{fact['person']}, {fact['reason']}",
    "sheet.erased": lambda fact: str(fact["reason"]),
    "person.enrolled": lambda fact: f"{fact['person']} as {', '.join(fact['roles'])}",
    "person.left": lambda fact: f"{fact['person']}, {fact['reason']}",
    "lot.received": lambda fact: f"{fact['label']}, {_shown(fact['nominal_resistance'])}",
    "packs.received": lambda fact: f"{fact['label']}, {len(fact['packs'])} packs more",
    "meter.checked": lambda fact: (
        f"{fact['label']} on {fact['reference_label']} reads {_shown(fact['reads'])}, "
        f"{fact['outcome'].upper()}"
    ),
    "certificate.kept": lambda fact: f"{fact['label']}, {fact['name']}",
    "consumable.received": lambda fact: f"{fact['label']}, {fact['type']}",
    "instrument.added": lambda fact: f"{fact['label']}, due {fact['due']}",
    "campaign.planned": lambda fact: str(fact["label"]),
    "criteria.agreed": lambda fact: f"{fact['title']}, edition {fact['edition']}",
    "route.adopted": lambda fact: f"{fact['label']}, edition {fact['edition']}",
    "point.planned": lambda fact: f"{fact['label']}, zone {fact['zone']}",
    "circuit.planned": lambda fact: f"{fact['label']}, {fact['arrangement']}",
    "plan.loaded": lambda fact: f"revision {fact['revision']}, {len(fact['points'])} points",
    "plan.released": lambda fact: f"revision {fact['revision']}",
    "step.done": lambda fact: str(fact["step"]),
    "step.skipped": lambda fact: f"{fact['step']}, {fact['reason']}",
    "step.reopened": lambda fact: f"from {fact['step']}, {fact['reason']}",
    "note.left": lambda fact: f"{fact['step']}, {fact['note']}",
    "hold.decided": lambda fact: f"{fact['step']} {fact['outcome']}",
    "reading.taken": _reading,
    "logbook.restored": lambda fact: f"from a backup at {fact['head']}, {fact['reason']}",
    "point.submitted": lambda fact: f"revision {fact['revision']}",
    "point.accepted": lambda fact: f"revision {fact['revision']}",
    "point.returned": lambda fact: f"revision {fact['revision']}, {fact['reason']}",
    "plan.revised": lambda fact: f"draft of revision {fact['revision']}, {fact['reason']}",
    "change.seen": lambda fact: f"plan revision {fact['revision']}, {fact['remark']}",
    "standing.set": lambda fact: f"{fact['label']} {fact['standing']}, {fact['reason']}",
    "photo.kept": lambda fact: f"{fact['name']}, {fact['width']} × {fact['height']} pixels",
    "disposition.made": lambda fact: f"{fact['disposition']}, {fact['reason']}",
    "point.reopened": lambda fact: f"revision {fact['revision']} amended, {fact['reason']}",
}
