"""Who may sign, as a fold over entries."""

from __future__ import annotations

from datetime import timedelta

import pytest

from gaugelog.journal.certificates import (
    Certificates,
    certificate_issued,
    certificate_revoked,
    certificates_of,
    read_certificate,
)
from gaugelog.journal.entry import BadEntry
from tests.journal.samples import START, SampleJournal, authority, note, signer


@pytest.fixture
def journal() -> SampleJournal:
    return SampleJournal().start()


def known(journal: SampleJournal) -> Certificates:
    with journal.storage.reading() as reader:
        return certificates_of(reader)


def test_the_authority_and_everyone_certified_are_known(journal: SampleJournal) -> None:
    journal.keep()
    certificates = known(journal)
    assert authority().certificate == certificates.authority
    assert ["custodian", "technician"] == [one.person for one in certificates.all()]
    (own,) = certificates.of_person("technician")
    assert signer("technician").certificate == own.der
    assert signer("technician").fingerprint == own.fingerprint
    assert own.trouble is None
    assert START.utc - timedelta(days=1) == own.since


def test_a_certificate_in_force_has_no_trouble(journal: SampleJournal) -> None:
    entry = journal.keep()[0]
    assert known(journal).valid(entry.header.certificate, entry) is None


def test_a_person_can_be_asked_about_before_they_sign(journal: SampleJournal) -> None:
    print_of = signer("technician").fingerprint
    now = START.utc
    certificates = known(journal)
    assert certificates.standing(print_of, "technician", now) is None
    assert "of technician, not of ann" in str(certificates.standing(print_of, "ann", now))
    assert "not issued" in str(certificates.standing("0" * 64, "technician", now))


def test_a_revocation_counts_after_its_own_deed(journal: SampleJournal) -> None:
    own = signer("technician")
    entry = journal.keep(certificate_revoked("technician", own.fingerprint, "left"))[0]
    certificates = known(journal)
    assert certificates.is_revoked(own.fingerprint)
    assert certificates.valid(own.fingerprint, entry) is None
    assert "revoked" in str(certificates.valid(own.fingerprint, journal.keep()[0]))
    assert "revoked" in str(certificates.standing(own.fingerprint, "technician", START.utc))


def test_issued_again_a_revoked_certificate_stays_revoked(journal: SampleJournal) -> None:
    own = signer("technician")
    journal.keep(certificate_revoked("technician", own.fingerprint, "left"), by=signer())
    journal.keep(certificate_issued("technician", own.certificate, "again"), by=signer())
    assert "revoked" in str(known(journal).standing(own.fingerprint, "technician", START.utc))


def test_entries_of_other_kinds_change_nothing(journal: SampleJournal) -> None:
    before = known(journal).all()
    journal.keep(note())
    assert before == known(journal).all()


def test_a_certificate_is_read_with_what_is_wrong_with_it() -> None:
    der = signer("technician").certificate
    assert read_certificate(der, "technician", authority().certificate).trouble is None
    assert "does not name ann" in str(read_certificate(der, "ann", authority().certificate).trouble)
    assert "named its authority" in str(read_certificate(der, "technician", None).trouble)
    with pytest.raises(BadEntry, match="can't be read"):
        read_certificate(b"junk", "technician", None)
