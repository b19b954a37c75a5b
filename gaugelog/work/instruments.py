"""Deeds about instruments: add them, enter their new certificates."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from datetime import date
from types import MappingProxyType

from gaugelog.errors import Fault, Faulty
from gaugelog.intake.papers import Paper
from gaugelog.journal.keys import Signer
from gaugelog.ledger.instruments import InstrumentAdded, InstrumentRow
from gaugelog.rules.who import demand_role
from gaugelog.work.logbook import Logbook
from gaugelog.work.papers import Item, keep_paper


def add(
    logbook: Logbook,
    signer: Signer,
    facts: Iterable[InstrumentAdded],
    papers: Mapping[str, Paper] = MappingProxyType({}),
) -> None:
    """Add instruments; one whose label is known keeps its id and gets the new certificate.

    `papers` are the certificates' files by the id in `facts`. Raises Faulty for a calibration in
    the future, Refused without a fitting role.
    """
    facts = tuple(facts)
    with logbook.deed(signer) as deed:
        demand_role(deed.view, signer.person, "planner", "technician", "custodian")
        _demand_calibrated(facts, deed.moment.local.date())
        known = {row.label.casefold(): row.id for row in deed.view.all(InstrumentRow)}
        for fact in facts:
            there = known.get(fact.label.casefold(), fact.id)
            instrument = fact.model_copy(update={"id": there})
            evidence = [fact.certificate] if fact.certificate else []
            deed.keep(instrument, [instrument.id], evidence=evidence)
            if fact.id in papers:
                number = instrument.certificate_number
                item: Item = ("instrument", instrument.id, instrument.label, number)
                keep_paper(deed, item, papers[fact.id])


def _demand_calibrated(facts: Iterable[InstrumentAdded], today: date) -> None:
    faults = [
        Fault(
            f"instrument {fact.label}",
            f"was calibrated on {fact.calibrated_on}, which lies in the future.",
            "Give the date on its certificate.",
        )
        for fact in facts
        if date.fromisoformat(fact.calibrated_on) > today
    ]
    if faults:
        raise Faulty(faults)
