from __future__ import annotations

import io
import json
from pathlib import Path
from typing import Any

import pikepdf
import pytest

from gaugelog.documents.content import RecordContent
from gaugelog.documents.maker import PdfRecordMaker
from gaugelog.errors import GaugelogError
from gaugelog.work import reviews
from gaugelog.work.ports import RecordMaker, Stamp
from tests.documents.joblog import Job, job, work
from tests.documents.signers import ACCEPTED

pytestmark = pytest.mark.xdist_group("record")


@pytest.fixture(scope="module")
def made(tmp_path_factory: pytest.TempPathFactory) -> Job:
    planned = job(tmp_path_factory.mktemp("job"))
    work(planned)
    return planned


def attached(pdf: bytes) -> dict[str, Any]:
    """The data attached to a record."""
    with pikepdf.open(io.BytesIO(pdf)) as opened:
        data: dict[str, Any] = json.loads(opened.attachments["record.json"].get_file().read_bytes())
    return data


def fields(pdf: bytes) -> dict[str, bool]:
    """The signature fields of a record and whether each is filled."""
    with pikepdf.open(io.BytesIO(pdf)) as opened:
        if "/AcroForm" not in opened.Root:
            return {}
        return {str(each.T): "/V" in each for each in opened.Root.AcroForm.Fields}


def _stamp(made: Job) -> Stamp:
    head = made.logbook.head().printed
    return Stamp("w.brandt", "Wiebke Brandt-Ilesanmi (WB)", "I accept it.", ACCEPTED, head)


def test_a_record_goes_from_draft_to_submitted_to_accepted(made: Job) -> None:
    maker: RecordMaker = PdfRecordMaker()
    with made.logbook.reading() as view:
        draft = maker.draft(view, made.request())
        submitted = maker.submitted(view, made.request(), made.technician)
    accepted = maker.accepted(submitted, _stamp(made), made.reviewer)
    assert {} == fields(draft)
    assert {"technician": True, "reviewer": False} == fields(submitted)
    assert {"technician": True, "reviewer": True} == fields(accepted)
    assert accepted.startswith(submitted)


def test_the_attached_data_is_the_content_of_the_ledger(made: Job) -> None:
    with made.logbook.reading() as view:
        pdf = PdfRecordMaker().draft(view, made.request())
    content = RecordContent.model_validate(attached(pdf))
    assert ("draft", "P1", 4) == (content.state, content.point.label, len(content.readings))


def test_a_name_that_was_erased_is_not_made_up(tmp_path: Path) -> None:
    made = job(tmp_path)
    work(made)
    with made.logbook.storage.writing() as writer:
        for sheet in list(writer.sheets()):
            writer.erase_sheet(sheet)
    with made.logbook.reading() as view:
        people = attached(PdfRecordMaker().draft(view, made.request()))["people"]
    assert ["name erased", "name erased"] == [person["name"] for person in people]


def test_letter_paper_is_used_when_asked_for(made: Job) -> None:
    with made.logbook.reading() as view:
        pdf = PdfRecordMaker("letter").draft(view, made.request())
    with pikepdf.open(io.BytesIO(pdf)) as opened:
        assert 612 == round(float(opened.pages[0].MediaBox[2]))


def test_foreign_bytes_are_not_accepted(made: Job) -> None:
    with pytest.raises(GaugelogError, match="not a PDF"):
        PdfRecordMaker().accepted(b"nothing", _stamp(made), made.reviewer)


def test_the_deeds_of_review_end_in_a_record_with_both_signatures(tmp_path: Path) -> None:
    made = job(tmp_path)
    work(made)
    maker = PdfRecordMaker()
    reviews.submit(made.logbook, made.technician, maker, point="P1", meaning="They are mine.")
    reviews.accept(made.logbook, made.reviewer, maker, point="P1", meaning="I accept it.")
    handed_out = reviews.record(made.logbook, point="P1")
    assert {"technician": True, "reviewer": True} == fields(handed_out.pdf)
    assert "both signatures" in handed_out.description
    assert "submitted" == attached(handed_out.pdf)["state"]
