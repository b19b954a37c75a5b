"""Deeds that set the standing of stock: quarantine it, free it, scrap it."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

from gaugelog.errors import Refused
from gaugelog.journal.canonical import nfc
from gaugelog.journal.keys import Signer
from gaugelog.ledger.people import Role
from gaugelog.ledger.standing import Standing, StandingRow, StandingSet, StockKind
from gaugelog.ledger.stock import GaugeRow
from gaugelog.ledger.view import View
from gaugelog.rules.who import demand_role
from gaugelog.work.kept import demand_reason
from gaugelog.work.logbook import Logbook

_MAY: dict[Standing, tuple[Role, ...]] = {
    "quarantined": ("technician", "planner", "reviewer", "custodian"),
    "free": ("planner", "reviewer", "custodian"),
    "scrapped": ("technician", "planner", "reviewer", "custodian"),
}
"""Anyone may stop the use of stock; letting it be used again is not the technician's to say."""


@dataclass(frozen=True, slots=True)
class _Item:
    """A thing in stock; `gauges` are the pieces that it is or holds."""

    kind: StockKind
    id: str
    label: str
    gauges: tuple[GaugeRow, ...] = ()


def set_standing(
    logbook: Logbook, signer: Signer, *, label: str, standing: Standing, reason: str
) -> StandingSet:
    """Set the standing of the lot, pack, gauge or consumable lot with this label.

    Raises Faulty without a reason; Refused when nothing or several things are called so, when it
    stands so already, is scrapped, or is a gauge in service that should be scrapped.
    """
    demand_reason(reason)
    with logbook.deed(signer) as deed:
        demand_role(deed.view, signer.person, *_MAY[standing])
        item = _item(deed.view, label)
        _demand_change(deed.view, item, standing)
        scraps = _on_shelf(item) if standing == "scrapped" else ()
        body = StandingSet(
            item=item.id,
            item_kind=item.kind,
            label=item.label,
            standing=standing,
            reason=reason,
            scraps=scraps,
            set_by=signer.person,
        )
        deed.keep(body, [item.id, *(gauge.id for gauge in item.gauges)])
    return body


def _item(view: View, label: str) -> _Item:
    found = list(_called(view, label))
    if not found:
        raise Refused(f"Nothing in stock is called {label}.", "See `gaugelog stock list`.")
    if len(found) > 1:
        kinds = " and a ".join(item.kind for item in found)
        raise Refused(f"{label} is a {kinds}.", "Name a pack or a gauge, like K7-03 or K7-03/4.")
    return found[0]


def _called(view: View, label: str) -> Iterator[_Item]:
    lot, consumable, gauge = view.lot(label), view.consumable(label), view.gauge(label)
    if lot is not None:
        yield _Item("lot", lot.id, lot.label, tuple(view.all(GaugeRow, lot=lot.id)))
    if consumable is not None:
        yield _Item("consumable", consumable.id, consumable.label)
    if gauge is not None:
        yield _Item("gauge", gauge.id, gauge.label, (gauge,))
    wanted = nfc(label.strip()).casefold()
    pieces = [row for row in view.all(GaugeRow) if _pack_label(row).casefold() == wanted]
    for pack in dict.fromkeys(row.pack for row in pieces):
        held = tuple(row for row in pieces if row.pack == pack)
        yield _Item("pack", pack, _pack_label(held[0]), held)


def _pack_label(gauge: GaugeRow) -> str:
    return gauge.label.rpartition("/")[0]


def _on_shelf(item: _Item) -> tuple[str, ...]:
    return tuple(gauge.id for gauge in item.gauges if gauge.state == "on shelf")


def _demand_change(view: View, item: _Item, standing: Standing) -> None:
    row = view.get(StandingRow, item.id)
    now = row.standing if row is not None else "free"
    if now == standing:
        raise Refused(f"{item.kind} {item.label} is {now} already.", "See `gaugelog stock list`.")
    states = {gauge.state for gauge in item.gauges}
    if now == "scrapped" or states == {"scrapped"}:
        raise Refused(
            f"{item.kind} {item.label} is scrapped, and that is for good.", "Take another."
        )
    if standing == "scrapped" and item.kind == "gauge" and states == {"in service"}:
        raise Refused(f"{item.label} is in service.", "Replace it first: gaugelog replace POINT.")
