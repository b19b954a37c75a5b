"""The maker of records that the deeds of `work` are handed: it draws, and it has signed."""

from __future__ import annotations

from typing import TYPE_CHECKING

from gaugelog.documents.content.build import build
from gaugelog.documents.render import Paper, render_record
from gaugelog.documents.sign import sign_first, sign_second
from gaugelog.journal.keys import Signer
from gaugelog.work.ports import RecordRequest, Stamp

if TYPE_CHECKING:
    from gaugelog.ledger.view import View


class PdfRecordMaker:
    """Implements `work.ports.RecordMaker` with PDF/A files; `paper` is their size."""

    def __init__(self, paper: Paper = "a4") -> None:
        self.paper: Paper = paper

    def draft(self, view: View, request: RecordRequest) -> bytes:
        """The record as it would be now, marked as a draft on every page; without signatures."""
        return render_record(build(view, request), self.paper).pdf

    def submitted(self, view: View, request: RecordRequest, signer: Signer) -> bytes:
        """The record with the technician's signature and an empty field for the reviewer's.

        Raises MachineTrouble when pages can't be drawn here.
        """
        content = build(view, request, signer.person)
        name = view.name(signer.person)
        stamp = Stamp(signer.person, name, request.meaning, request.moment, request.head)
        return sign_first(render_record(content, self.paper), stamp, signer)

    def accepted(self, pdf: bytes, stamp: Stamp, signer: Signer) -> bytes:
        """The submitted record with the reviewer's signature added; its first bytes stay."""
        return sign_second(pdf, stamp, signer)
