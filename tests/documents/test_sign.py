from __future__ import annotations

import asyncio
import io
import threading
from typing import Any

import pytest
from asn1crypto import x509
from pyhanko.pdf_utils.reader import PdfFileReader
from pyhanko.sign.validation import validate_pdf_signature
from pyhanko_certvalidator import ValidationContext

from gaugelog.documents.quiet import quiet
from gaugelog.documents.sign import open_field, sign_first, sign_second
from gaugelog.errors import Refused
from tests.documents.drawn import accepted, drawing, people, submitted
from tests.documents.signers import (
    ACCEPTED,
    SUBMITTED,
    crew,
    reviewer_stamp,
    technician_stamp,
)

pytestmark = pytest.mark.xdist_group("record")


def statuses(pdf: bytes) -> list[Any]:
    """What the signing library's own validator says of each signature, trusting our authority."""
    root = x509.Certificate.load(people().authority.certificate)
    context = ValidationContext(trust_roots=[root], allow_fetching=False, moment=ACCEPTED.utc)
    with quiet():
        reader = PdfFileReader(io.BytesIO(pdf))
        return [
            validate_pdf_signature(each, signer_validation_context=context)
            for each in reader.embedded_signatures
        ]


def test_both_signatures_are_intact_trusted_and_cover_the_file() -> None:
    first, second = statuses(accepted())
    assert first.bottom_line
    assert second.bottom_line
    assert "ENTIRE_FILE" == second.coverage.name
    assert "ENTIRE_REVISION" == first.coverage.name
    assert "FORM_FILLING" == first.modification_level.name


def test_each_signature_names_its_person_by_id() -> None:
    names = [each.signing_cert.subject.native["common_name"] for each in statuses(accepted())]
    assert ["t.okondo", "w.brandt"] == names


def test_signing_times_are_those_of_the_journal() -> None:
    reader = PdfFileReader(io.BytesIO(accepted()))
    times = [each.self_reported_timestamp for each in reader.embedded_signatures]
    assert [SUBMITTED.utc.replace(microsecond=0), ACCEPTED.utc] == times


def test_the_meaning_is_the_reason_of_the_signature() -> None:
    reader = PdfFileReader(io.BytesIO(accepted()))
    reasons = [str(each.sig_object["/Reason"]) for each in reader.embedded_signatures]
    assert [technician_stamp().meaning, reviewer_stamp().meaning] == reasons


def test_acceptance_only_adds_bytes() -> None:
    assert accepted().startswith(submitted())


def test_the_first_signature_permits_form_filling_and_nothing_else() -> None:
    reader = PdfFileReader(io.BytesIO(submitted()))
    first = reader.embedded_signatures[0]
    assert "FILL_FORMS" == first.docmdp_level.name


def test_a_submitted_record_keeps_an_empty_field_for_the_reviewer() -> None:
    box = open_field(submitted(), "reviewer")
    meant = drawing().boxes["reviewer"]
    assert abs(meant.width - box.width) <= 1
    assert abs(meant.height - box.height) <= 1


def test_a_record_is_never_signed_twice_in_one_place() -> None:
    with pytest.raises(Refused, match="no empty field"):
        sign_second(accepted(), reviewer_stamp(), people().reviewer)


def test_a_file_without_fields_is_refused() -> None:
    with pytest.raises(Refused, match="reviewer"):
        sign_second(drawing().pdf, reviewer_stamp(), people().reviewer)


@pytest.mark.parametrize("junk", [b"", b"%PDF-1.7\nnothing", b"\x00" * 400])
def test_what_is_no_record_is_refused_plainly(junk: bytes) -> None:
    with pytest.raises(Refused, match="not a PDF"):
        sign_second(junk, reviewer_stamp(), people().reviewer)


def test_a_stranger_with_another_authority_is_not_trusted() -> None:
    strange = sign_first(drawing(), technician_stamp(), crew().technician)
    (status,) = statuses(strange)
    assert status.intact
    assert not status.trusted


def test_a_changed_byte_in_the_page_breaks_the_first_signature() -> None:
    place = accepted().index(b"stream") + 40
    changed = bytearray(accepted())
    changed[place] ^= 1
    first, _ = statuses(bytes(changed))
    assert not first.intact


def test_signing_works_inside_a_running_event_loop() -> None:
    async def within() -> bytes:
        return sign_second(submitted(), reviewer_stamp(), people().reviewer)

    assert asyncio.run(within()).startswith(submitted())


def test_signing_leaves_no_thread_behind() -> None:
    before = threading.active_count()
    sign_second(submitted(), reviewer_stamp(), people().reviewer)
    assert before == threading.active_count()


def test_signing_says_nothing_on_the_terminal(capfd: pytest.CaptureFixture[str]) -> None:
    sign_second(submitted(), reviewer_stamp(), people().reviewer)
    assert ("", "") == capfd.readouterr()
