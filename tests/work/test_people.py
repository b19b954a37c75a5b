"""People: enrolled, enrolled anew, gone; a logbook never loses its last custodian."""

from __future__ import annotations

from pathlib import Path

import pytest

from gaugelog.errors import Faulty, KeyTrouble, Refused, StorageTrouble
from gaugelog.ledger.people import PersonRow
from gaugelog.work import people, steps
from gaugelog.work.history import check_logbook
from gaugelog.work.people import Newcomer
from tests.work.job import WORD, Job, start_job

SECOND = Newcomer("d.two", "Dara Two", "DT", ("custodian",))


def _enrol(job: Job, newcomer: Newcomer, by: str = "c.ward") -> None:
    job.keys[newcomer.person] = people.enrol(
        job.book,
        job.keys[by],
        job.folder.unlock_authority(WORD),
        job.folder,
        newcomer=newcomer,
        passphrase=WORD,
    )


@pytest.fixture
def staff(tmp_path: Path) -> Job:
    """A logbook with its three people."""
    return start_job(tmp_path)


def test_the_only_custodian_can_neither_leave_nor_give_up_the_role(staff: Job) -> None:
    with pytest.raises(Refused, match="only custodian"):
        people.revoke(staff.book, staff.keys["c.ward"], person="c.ward", reason="leaves")
    with pytest.raises(Refused, match="only custodian"):
        _enrol(staff, Newcomer("c.ward", "Cleo Ward", "CW", ("planner",)))
    _enrol(staff, Newcomer("n.ew", "Nia Ew", "NE", ("technician",)))


def test_a_custodian_leaves_once_there_is_another(staff: Job) -> None:
    _enrol(staff, SECOND)
    people.revoke(staff.book, staff.keys["d.two"], person="c.ward", reason="left the firm")
    with pytest.raises(Refused, match="revoked"):
        _enrol(staff, Newcomer("n.ew", "Nia Ew", "NE", ("technician",)))
    _enrol(staff, Newcomer("n.ew", "Nia Ew", "NE", ("technician",)), by="d.two")
    assert check_logbook(staff.book).ok


def test_a_custodian_who_left_does_not_count(staff: Job) -> None:
    _enrol(staff, SECOND)
    people.revoke(staff.book, staff.keys["c.ward"], person="d.two", reason="left the firm")
    with pytest.raises(Refused, match="only custodian"):
        people.revoke(staff.book, staff.keys["c.ward"], person="c.ward", reason="leaves too")


def test_enrolling_anew_gives_a_fresh_key_and_other_roles(staff: Job) -> None:
    before = staff.keys["t.okoro"].fingerprint
    _enrol(staff, Newcomer("t.okoro", "Tobe Okoro", "TO", ("technician", "planner")))
    assert before != staff.keys["t.okoro"].fingerprint
    with staff.book.reading() as view:
        row = view.get(PersonRow, "t.okoro")
    assert row is not None
    assert row.roles == '["planner", "technician"]'


def test_a_name_typed_with_marks_apart_is_kept_in_one_form(staff: Job) -> None:
    _enrol(staff, Newcomer("j.u", "Ju\u0308rg", "JU", ("technician",)))
    with staff.book.reading() as view:
        assert view.name("j.u") == "Jürg (JU)"


def test_every_fault_of_a_newcomer_is_named_at_once(staff: Job) -> None:
    odd = Newcomer("no spaces", "", "x" * 300, ("boss",), ("bonding until 20270501", "until 5"))
    with pytest.raises(Faulty) as caught:
        _enrol(staff, odd)
    named = [fault.where for fault in caught.value.faults]
    assert named[1:] == ["name", "initials", "role", "qualification"]
    assert "no spaces" in caught.value.faults[0].what + caught.value.faults[0].where


def test_only_a_custodian_enrols_and_revokes(staff: Job) -> None:
    with pytest.raises(Refused, match="role custodian"):
        _enrol(staff, SECOND, by="q.reyes")
    with pytest.raises(Refused, match="role custodian"):
        people.revoke(staff.book, staff.keys["q.reyes"], person="t.okoro", reason="x")


def test_a_short_passphrase_enrols_nobody(staff: Job) -> None:
    with pytest.raises(KeyTrouble):
        people.enrol(
            staff.book,
            staff.keys["c.ward"],
            staff.folder.unlock_authority(WORD),
            staff.folder,
            newcomer=SECOND,
            passphrase="short",
        )
    with staff.book.reading() as view:
        assert view.get(PersonRow, "d.two") is None


def test_a_reason_is_asked_for_and_an_unknown_person_told(staff: Job) -> None:
    with pytest.raises(Faulty):
        people.revoke(staff.book, staff.keys["c.ward"], person="t.okoro", reason="  ")
    with pytest.raises(Refused, match="Nobody is enrolled as"):
        people.revoke(staff.book, staff.keys["c.ward"], person="nobody", reason="x")


def test_a_name_is_erased_once(staff: Job) -> None:
    custodian = staff.keys["c.ward"]
    people.revoke(staff.book, custodian, person="t.okoro", reason="asked", erase_name=True)
    with pytest.raises(Refused, match="erased already"):
        people.revoke(staff.book, custodian, person="t.okoro", reason="again", erase_name=True)
    assert steps.worklist(staff.book) == []


def test_enrolled_anew_the_earlier_key_signs_no_more(staff: Job) -> None:
    old = staff.keys["t.okoro"]
    _enrol(staff, Newcomer("t.okoro", "Tobe Okoro", "TO", ("technician",)))
    with pytest.raises(Refused, match="revoked"), staff.book.deed(old):
        pass
    with staff.book.deed(staff.keys["t.okoro"]):
        pass
    assert check_logbook(staff.book).ok


def test_a_custodian_enrolls_herself_anew_with_the_key_that_ends_there(staff: Job) -> None:
    _enrol(staff, Newcomer("c.ward", "Cleo Ward", "CW", ("custodian", "planner")))
    _enrol(staff, SECOND)
    assert check_logbook(staff.book).ok


def test_an_id_that_differs_by_capitals_alone_is_refused(staff: Job) -> None:
    with pytest.raises(Faulty) as raised:
        _enrol(staff, Newcomer("T.Okoro", "Another", "AO", ("technician",)))
    assert "differs from t.okoro only by capital" in raised.value.faults[0].what


def test_a_key_that_cannot_be_kept_is_told_with_what_was_kept(
    staff: Job, monkeypatch: pytest.MonkeyPatch
) -> None:
    def full(*_: object) -> None:
        raise StorageTrouble("The disk is full.", "Make room.")

    monkeypatch.setattr(people, "_save", full)
    with pytest.raises(KeyTrouble, match="was enrolled, but the key was not kept") as raised:
        _enrol(staff, Newcomer("n.ew", "Nia Ew", "NE", ("technician",)))
    assert "enrol the person anew" in raised.value.remedy
    monkeypatch.undo()
    _enrol(staff, Newcomer("n.ew", "Nia Ew", "NE", ("technician",)))
