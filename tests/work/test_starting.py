"""Starting a logbook under its own authority or an organisation's; failing leaves no trace."""

from __future__ import annotations

from pathlib import Path

import pytest
from cryptography import x509
from cryptography.hazmat.primitives.serialization import BestAvailableEncryption, pkcs12

from gaugelog.errors import Faulty, KeyTrouble, Refused, StorageTrouble
from gaugelog.journal.authority import Authority
from gaugelog.journal.certificates import certificates_of
from gaugelog.journal.clock import Moment, SetClock
from gaugelog.journal.ids import new_id
from gaugelog.journal.keys import KeyFolder
from gaugelog.ledger.people import PersonRow
from gaugelog.work import people
from gaugelog.work.history import check_logbook
from gaugelog.work.logbook import Logbook, find_logbook
from gaugelog.work.people import Newcomer
from tests.work.job import CHEAP_ROUNDS, PEOPLE, START, WORD, Job, start_job

SECRET = "the organisation's own"


def _organisation_file() -> bytes:
    """An organisation's authority, certificate and key, as the PKCS#12 file it would hand over."""
    clock = SetClock(Moment(START, 0, new_id(), 0))
    authority = Authority.create("an organisation", clock)
    certificate = x509.load_der_x509_certificate(authority.certificate)
    sealing = BestAvailableEncryption(SECRET.encode())
    return pkcs12.serialize_key_and_certificates(
        b"authority", authority.private_key, certificate, None, sealing
    )


def _start(home: Path, keys: Path, **more: object) -> Logbook:
    given: dict[str, object] = {"custodian": PEOPLE[0], "passphrase": WORD, "name": "Job", **more}
    return people.start(
        home,
        keys_of=lambda _id: KeyFolder(keys, CHEAP_ROUNDS),
        clock=SetClock(Moment(START, 0, new_id(), 0)),
        **given,  # type: ignore[arg-type]
    )


def test_a_start_that_fails_leaves_an_empty_folder_to_start_in_again(tmp_path: Path) -> None:
    blocked = tmp_path / "keys"
    blocked.write_text("a file where the folder should be", encoding="utf-8")
    with pytest.raises(KeyTrouble):
        _start(tmp_path / "book", blocked)
    assert [] == list((tmp_path / "book").iterdir())
    book = _start(tmp_path / "book", tmp_path / "other-keys")
    assert check_logbook(book).ok


def test_a_folder_that_holds_something_is_left_as_it_is(tmp_path: Path) -> None:
    (tmp_path / "notes.txt").write_text("mine", encoding="utf-8")
    with pytest.raises(StorageTrouble, match="is not empty"):
        _start(tmp_path, tmp_path / "keys")
    assert ["notes.txt"] == [path.name for path in tmp_path.iterdir()]


def test_nothing_is_laid_down_for_a_custodian_with_faults(tmp_path: Path) -> None:
    odd = Newcomer("", "", "", ("boss",))
    with pytest.raises(Faulty) as caught:
        _start(tmp_path / "book", tmp_path / "keys", custodian=odd)
    assert 4 == len(caught.value.faults)
    with pytest.raises(KeyTrouble):
        _start(tmp_path / "book", tmp_path / "keys", passphrase="short")
    assert not (tmp_path / "book").exists()


def test_an_organisations_authority_certifies_everyone(tmp_path: Path) -> None:
    data = _organisation_file()
    book = _start(tmp_path / "book", tmp_path / "keys", authority=(data, SECRET))
    keys = KeyFolder(tmp_path / "keys", CHEAP_ROUNDS)
    custodian = keys.unlock("c.ward", WORD)
    people.enrol(
        book,
        custodian,
        keys.unlock_authority(WORD),
        keys,
        newcomer=PEOPLE[1],
        passphrase=WORD,
    )
    expected = Authority.from_pkcs12(data, SECRET).certificate
    with book.storage.reading() as reader:
        known = certificates_of(reader)
    assert expected == known.authority
    authority = x509.load_der_x509_certificate(expected)
    for issued in known.all():
        x509.load_der_x509_certificate(issued.der).verify_directly_issued_by(authority)
    assert check_logbook(book).ok


def test_a_file_that_is_no_authority_starts_nothing(tmp_path: Path) -> None:
    with pytest.raises(KeyTrouble):
        _start(tmp_path / "book", tmp_path / "keys", authority=(b"no PKCS#12", SECRET))
    assert not (tmp_path / "book").exists()


def test_nobody_is_enrolled_under_another_authority(tmp_path: Path) -> None:
    job = start_job(tmp_path)
    stranger = Authority.create("another logbook", job.clock)
    newcomer = Newcomer("n.ew", "Nia Ew", "NE", ("technician",))
    with pytest.raises(Refused, match="not the one this logbook began with"):
        people.enrol(
            job.book, job.keys["c.ward"], stranger, job.folder, newcomer=newcomer, passphrase=WORD
        )
    with job.book.reading() as view:
        assert view.get(PersonRow, "n.ew") is None
    assert "n.ew" not in job.folder.people()


def _names_kept(job: Job) -> list[bytes]:
    with job.book.storage.reading() as reader:
        return [reader.sheet(digest) or b"" for digest in reader.sheets()]


def test_erasing_a_name_erases_every_sheet_that_holds_it(tmp_path: Path) -> None:
    job = start_job(tmp_path)
    authority = job.folder.unlock_authority(WORD)
    for name in ("Tobe Okoro", "Tobe Okoro-Hale"):
        again = Newcomer("t.okoro", name, "TO", ("technician",))
        people.enrol(
            job.book, job.keys["c.ward"], authority, job.folder, newcomer=again, passphrase=WORD
        )
    people.revoke(job.book, job.keys["c.ward"], person="t.okoro", reason="asked", erase_name=True)
    assert not [sheet for sheet in _names_kept(job) if b"Okoro" in sheet]
    assert 2 == len(_names_kept(job))
    report = check_logbook(job.book)
    assert report.ok
    assert 3 == sum("erased the identity sheet" in notice.what for notice in report.notices)


def test_an_erased_name_is_in_no_file_of_the_logbook(tmp_path: Path) -> None:
    job = start_job(tmp_path)
    people.revoke(job.book, job.keys["c.ward"], person="t.okoro", reason="asked", erase_name=True)
    job.book.storage.close()
    files = [path for path in job.book.folder.rglob("*") if path.is_file()]
    assert files
    assert not [path.name for path in files if b"Okoro" in path.read_bytes()]


def test_a_logbook_is_found_from_any_folder_below_it(tmp_path: Path) -> None:
    job = start_job(tmp_path)
    below = job.book.folder / "photos" / "today"
    below.mkdir(parents=True)
    assert job.book.folder == find_logbook(below, None)
    assert job.book.folder == find_logbook(tmp_path, job.book.folder)
    with pytest.raises(StorageTrouble, match="in any folder above"):
        find_logbook(tmp_path, None)
    with pytest.raises(StorageTrouble, match="no logbook in"):
        find_logbook(below, tmp_path)


@pytest.mark.parametrize(
    ("text", "told"),
    [
        ("", "damaged"),
        ("format = 1\n", "damaged"),
        ("not toml", "damaged"),
        ('format = "one"\nid = "a"\nname = "b"\nchain = "c"\n', "damaged"),
        ('format = 2\nid = "a"\nname = "b"\nchain = "c"\n', "newer Gaugelog"),
    ],
)
def test_a_spoiled_logbook_file_is_told(tmp_path: Path, text: str, told: str) -> None:
    job = start_job(tmp_path)
    (job.book.folder / "logbook.toml").write_text(text, encoding="utf-8")
    with pytest.raises(StorageTrouble, match=told):
        Logbook.open(job.book.folder)


def test_a_name_with_quotes_and_line_breaks_comes_back_as_it_was(tmp_path: Path) -> None:
    name = 'Bridge "A" \\ 1\nsecond line \u007f'
    book = _start(tmp_path / "book", tmp_path / "keys", name=name)
    assert name == Logbook.open(book.folder).name


@pytest.mark.parametrize("name", ["Prüfstand für große Brückenträger und Übergänge Süd", "桥" * 60])
def test_a_long_name_of_letters_beyond_ascii_starts_a_logbook(tmp_path: Path, name: str) -> None:
    book = _start(tmp_path / "book", tmp_path / "keys", name=name)
    assert name == book.name
    assert check_logbook(book).ok
