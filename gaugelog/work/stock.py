"""Deeds about stock: receive gauge lots and consumables."""

from __future__ import annotations

from collections.abc import Iterable
from typing import Protocol

from gaugelog.errors import Fault, Faulty
from gaugelog.journal.keys import Signer
from gaugelog.ledger.stock import ConsumableReceived, ConsumableRow, GaugeRow, LotReceived, LotRow
from gaugelog.ledger.view import View
from gaugelog.rules.who import demand_role
from gaugelog.work.logbook import Deed, Logbook


class StockFacts(Protocol):
    """What was received, as understood from people's files."""

    @property
    def lots(self) -> tuple[LotReceived, ...]:
        """Gauge lots with their packs."""
        ...

    @property
    def consumables(self) -> tuple[ConsumableReceived, ...]:
        """Consumable lots."""
        ...


def receive(logbook: Logbook, signer: Signer, facts: StockFacts) -> None:
    """Receive gauge lots and consumables, all or none.

    Raises Faulty naming every lot that is there already, Refused without a fitting role.
    """
    with logbook.deed(signer) as deed:
        demand_role(deed.view, signer.person, "planner", "technician", "custodian")
        faults = [*_doubles(deed.view, facts)]
        if faults:
            raise Faulty(faults)
        for lot in facts.lots:
            _keep_lot(deed, lot)
        for consumable in facts.consumables:
            deed.keep(consumable, [consumable.id])


def _keep_lot(deed: Deed, lot: LotReceived) -> None:
    evidence = [lot.certificate] if lot.certificate else []
    packs = [pack.id for pack in lot.packs]
    pieces = [piece for pack in lot.packs for piece in pack.pieces]
    deed.keep(lot, [lot.id, *packs, *pieces], evidence=evidence)


def _doubles(view: View, facts: StockFacts) -> Iterable[Fault]:
    lots = {row.label.casefold() for row in view.all(LotRow)}
    for lot in facts.lots:
        if lot.label.casefold() in lots:
            yield Fault(
                f"lot {lot.label}",
                "was received before.",
                "Receive a lot once, with all its packs.",
            )
        else:
            yield from _double_packs(view, lot)
    consumables = {row.label.casefold() for row in view.all(ConsumableRow)}
    for consumable in facts.consumables:
        if consumable.label.casefold() in consumables:
            yield Fault(
                f"lot {consumable.label}",
                "was received before.",
                "Give a new delivery its own label.",
            )


def _double_packs(view: View, lot: LotReceived) -> Iterable[Fault]:
    """Two gauges of one label could never be told apart."""
    packs = {row.label.rpartition("/")[0].casefold() for row in view.all(GaugeRow)}
    for pack in lot.packs:
        if pack.label.casefold() in packs:
            yield Fault(
                f"lot {lot.label}, pack {pack.label}",
                "has the label of a pack that is in stock.",
                "Give the pack a label of its own, with the lot's before it.",
            )
