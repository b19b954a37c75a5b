"""Deeds about certificates: keep the file of one, with what came or later."""

from __future__ import annotations

from collections.abc import Collection, Iterator

from gaugelog.errors import Refused
from gaugelog.intake.papers import Paper
from gaugelog.journal.entry import sha256
from gaugelog.journal.ids import new_id
from gaugelog.journal.keys import Signer
from gaugelog.ledger.instruments import InstrumentAdded
from gaugelog.ledger.papers import CertificateKept, CertificateRow, PaperOf
from gaugelog.ledger.view import View
from gaugelog.rules.who import demand_role
from gaugelog.work.kept import text_to_keep
from gaugelog.work.logbook import Deed, Logbook

Item = tuple[PaperOf, str, str, str]
"""What a certificate is of: its kind, id, label, and the certificate's number where it has one."""


def add(
    logbook: Logbook,
    signer: Signer,
    paper: Paper,
    *,
    label: str,
    kinds: Collection[PaperOf],
    note: str = "",
) -> CertificateKept:
    """Keep the certificate of the gauge lot, consumable lot or instrument with this label.

    `kinds` are those that are meant; an instrument's is that of the certificate in force. Raises
    Refused when nothing or several things are called so, or the very file is kept for it already.
    """
    with logbook.deed(signer) as deed:
        demand_role(deed.view, signer.person, "planner", "technician", "custodian")
        item = _item(deed.view, label, kinds)
        _, of, name, number = item
        digest = sha256(paper.data)
        if deed.view.all(CertificateRow, item=of, number=number, file=digest):
            raise Refused(f"This certificate of {name} is kept already.", "There is nothing to do.")
        return keep_paper(deed, item, paper, note)


def keep_paper(deed: Deed, item: Item, paper: Paper, note: str = "") -> CertificateKept:
    """Keep a certificate within a deed: its file as it is, and the fact that names it."""
    kind, of, label, number = item
    fact = CertificateKept(
        id=new_id(),
        item=of,
        item_kind=kind,
        label=label,
        number=number,
        file=deed.evidence.put(paper.data),
        name=text_to_keep(paper.name),
        size=len(paper.data),
        note=note,
        kept_by=deed.signer.person,
    )
    deed.keep(fact, [of], evidence=[fact.file])
    return fact


def _item(view: View, label: str, kinds: Collection[PaperOf]) -> Item:
    found = [item for item in _called(view, label) if item[0] in kinds]
    if not found:
        where = "instrument" if "instrument" in kinds else "stock"
        raise Refused(
            f"No {' or '.join(kinds)} is called {label}.", f"See `gaugelog {where} list`."
        )
    if len(found) > 1:
        several = " and ".join(kind for kind, *_ in found)
        raise Refused(
            f"{label} is a label of {several}.", "Give a new delivery a label of its own."
        )
    return found[0]


def _called(view: View, label: str) -> Iterator[Item]:
    lot, consumable = view.lot(label), view.consumable(label)
    if lot is not None:
        yield "lot", lot.id, lot.label, ""
    if consumable is not None:
        yield "consumable", consumable.id, consumable.label, ""
    meter = view.instrument(label)
    if meter is not None:
        number = InstrumentAdded.model_validate_json(meter.data).certificate_number
        yield "instrument", meter.id, meter.label, number
