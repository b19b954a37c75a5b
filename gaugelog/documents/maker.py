"""The maker of records that the deeds of `work` are handed: it draws, and it has signed."""

from __future__ import annotations

from typing import TYPE_CHECKING

from gaugelog.documents.content.build import build
from gaugelog.documents.content.model import RecordContent
from gaugelog.documents.content.workdone import PhotoShown
from gaugelog.documents.pictures import client_copy
from gaugelog.documents.render import Drawing, render_record
from gaugelog.documents.sign import sign_first, sign_second
from gaugelog.errors import StorageTrouble
from gaugelog.journal.evidence import Evidence, MemoryEvidence
from gaugelog.journal.keys import Signer
from gaugelog.ledger.campaign import Paper
from gaugelog.rules.pages import paper_of
from gaugelog.work.ports import RecordRequest, Stamp

if TYPE_CHECKING:
    from gaugelog.ledger.view import View


class PdfRecordMaker:
    """Implements `work.ports.RecordMaker` with PDF/A files.

    `paper` is their size; left out, it is the campaign's own.
    """

    def __init__(self, paper: Paper | None = None) -> None:
        self.paper = paper

    def draft(self, view: View, request: RecordRequest) -> bytes:
        """The record as it would be now, marked as a draft on every page; without signatures."""
        return self._drawn(view, build(view, request), request).pdf

    def submitted(self, view: View, request: RecordRequest, signer: Signer) -> bytes:
        """The record with the technician's signature and an empty field for the reviewer's.

        Raises MachineTrouble when pages can't be drawn here.
        """
        content = build(view, request, signer.person)
        name = view.name(signer.person)
        stamp = Stamp(signer.person, name, request.meaning, request.moment, request.head)
        return sign_first(self._drawn(view, content, request), stamp, signer)

    def accepted(self, pdf: bytes, stamp: Stamp, signer: Signer) -> bytes:
        """The submitted record with the reviewer's signature added; its first bytes stay."""
        return sign_second(pdf, stamp, signer)

    def _drawn(self, view: View, content: RecordContent, request: RecordRequest) -> Drawing:
        pictures = [_copy(photo, request.evidence) for photo in content.photos]
        return render_record(content, self.paper or paper_of(view), pictures)


def _copy(photo: PhotoShown, evidence: Evidence | None) -> bytes:
    """What the page shows of a photo. Raises StorageTrouble when its file is gone or altered."""
    try:
        data = (evidence or MemoryEvidence()).get(photo.sha256)
    except StorageTrouble as error:
        raise StorageTrouble(f"The photo {photo.name}: {error.message}", error.remedy) from error
    return client_copy(photo.name, data)
