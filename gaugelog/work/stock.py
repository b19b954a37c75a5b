"""Deeds about stock: receive gauge lots, more packs of them, and consumables."""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass
from types import MappingProxyType
from typing import Protocol

from gaugelog.errors import Fault, Faulty
from gaugelog.intake.lots import unlike
from gaugelog.intake.papers import Paper
from gaugelog.journal.entry import sha256
from gaugelog.journal.keys import Signer
from gaugelog.ledger.papers import CertificateRow
from gaugelog.ledger.standing import StandingRow
from gaugelog.ledger.stock import (
    ConsumableReceived,
    ConsumableRow,
    GaugeRow,
    LotReceived,
    LotRow,
    PacksReceived,
)
from gaugelog.ledger.view import View
from gaugelog.rules.who import demand_role
from gaugelog.work.logbook import Deed, Logbook
from gaugelog.work.papers import Item, keep_paper


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


@dataclass(frozen=True, slots=True)
class Received:
    """How much was received: new lots, packs of lots that were there, consumables, certificates."""

    lots: int
    packs: int
    consumables: int
    certificates: int


def receive(
    logbook: Logbook,
    signer: Signer,
    facts: StockFacts,
    papers: Mapping[str, Sequence[Paper]] = MappingProxyType({}),
) -> Received:
    """Receive gauge lots and consumables with their certificates, all or none.

    A lot that is there already gets more packs, if its certificate's figures are the same.
    `papers` are the certificates' files by the id of the lot. Raises Faulty naming everything
    that is there already or differs, Refused without a fitting role.
    """
    with logbook.deed(signer) as deed:
        demand_role(deed.view, signer.person, "planner", "technician", "custodian")
        faults = [*_doubles(deed.view, facts)]
        if faults:
            raise Faulty(faults)
        there = {row.label.casefold(): row for row in deed.view.all(LotRow)}
        more = [lot for lot in facts.lots if lot.label.casefold() in there]
        kept = 0
        for lot in facts.lots:
            known = there.get(lot.label.casefold())
            of = _keep_packs(deed, lot, known) if known is not None else _keep_lot(deed, lot)
            kept += _keep_papers(deed, ("lot", of, lot.label, ""), papers.get(lot.id, ()))
        for consumable in facts.consumables:
            deed.keep(consumable, [consumable.id])
            item: Item = ("consumable", consumable.id, consumable.label, "")
            kept += _keep_papers(deed, item, papers.get(consumable.id, ()))
    new = len(facts.lots) - len(more)
    packs = sum(len(lot.packs) for lot in more)
    return Received(new, packs, len(facts.consumables), kept)


def _keep_lot(deed: Deed, lot: LotReceived) -> str:
    evidence = [lot.certificate] if lot.certificate else []
    packs = [pack.id for pack in lot.packs]
    pieces = [piece for pack in lot.packs for piece in pack.pieces]
    deed.keep(lot, [lot.id, *packs, *pieces], evidence=evidence)
    return lot.id


def _keep_packs(deed: Deed, lot: LotReceived, known: LotRow) -> str:
    body = PacksReceived(
        lot=known.id, label=known.label, received_on=lot.received_on, packs=lot.packs
    )
    packs = [pack.id for pack in lot.packs]
    pieces = [piece for pack in lot.packs for piece in pack.pieces]
    deed.keep(body, [known.id, *packs, *pieces])
    return known.id


def _keep_papers(deed: Deed, item: Item, papers: Sequence[Paper]) -> int:
    there = {row.file for row in deed.view.all(CertificateRow, item=item[1])}
    new = [paper for paper in papers if sha256(paper.data) not in there]
    for paper in new:
        keep_paper(deed, item, paper)
    return len(new)


def _doubles(view: View, facts: StockFacts) -> Iterable[Fault]:
    lots = {row.label.casefold(): row for row in view.all(LotRow)}
    for lot in facts.lots:
        yield from _double_packs(view, lot)
        if lot.label.casefold() in lots:
            yield from _unlike(view, lot, lots[lot.label.casefold()])
    consumables = {row.label.casefold() for row in view.all(ConsumableRow)}
    for consumable in facts.consumables:
        if consumable.label.casefold() in consumables:
            yield Fault(
                f"lot {consumable.label}",
                "was received before.",
                "Give a new delivery its own label.",
            )


def _unlike(view: View, lot: LotReceived, row: LotRow) -> Iterable[Fault]:
    """More packs of a lot are of the same certificate, and of one that may be used at all."""
    standing = view.get(StandingRow, row.id)
    if standing is not None and standing.standing == "scrapped":
        yield Fault(f"lot {row.label}", f"is scrapped: {standing.reason.rstrip('.')}.")
    for column in unlike(lot, LotReceived.model_validate_json(row.data)):
        yield Fault(
            f"lot {lot.label}, {column}",
            "differs from what was received before of this lot.",
            "One lot has one certificate: give another delivery its own label, or mend the figure.",
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
