"""Holds signed by a second person on the same machine, and the submission of a record."""

from __future__ import annotations

from gaugelog.ledger.steps import StepRow
from gaugelog.work import steps
from tests.screens.conftest import At
from tests.screens.pilot import LARGE, Seen, run_screen
from tests.work.job import WORD


async def _open(seen: Seen, *keys: str) -> None:
    await seen.sign_on()
    await seen.type("FB-1")
    await seen.keys(*keys)


def test_the_second_person_lets_the_work_go_on_and_the_first_stays_signed_on(at: At) -> None:
    async def play(seen: Seen) -> None:
        await _open(seen)
        assert "HOLD: a second person decides." in seen.text()
        assert "f5 Decide the hold" in seen.lines()[-1]
        await seen.keys("enter")
        assert "12/23" in seen.text()
        await seen.keys("f5")
        assert "Signing says: I looked at the work myself and let it go on." in seen.text()
        await seen.type("q.reyes")
        await seen.type(WORD)
        await seen.keys("enter")
        assert "is released." in seen.text()
        assert "13/23" in seen.text()
        assert "Tobe Okoro" in seen.lines()[0]

    job = at(11)
    run_screen(job.book, job.folder, play, size=LARGE)
    with job.book.reading() as view:
        (row,) = view.all(StepRow, step="coating-hold")
    assert ("released", "q.reyes") == (row.outcome, row.by)


def test_who_did_the_work_can_not_decide_the_hold(at: At) -> None:
    async def play(seen: Seen) -> None:
        await _open(seen, "f5")
        await seen.type("t.okoro")
        await seen.type(WORD)
        await seen.keys("enter")
        assert "t.okoro did a step of this point and can't decide this hold." in seen.text()
        await seen.keys("escape")
        assert "12/23" in seen.text()

    job = at(11)
    run_screen(job.book, job.folder, play, size=LARGE)


def test_a_wrong_secret_at_a_hold_is_said_and_decides_nothing(at: At) -> None:
    async def play(seen: Seen) -> None:
        await _open(seen, "f5")
        await seen.type("q.reyes")
        await seen.type("wrong words")
        await seen.keys("enter")
        assert "✗" in seen.text()
        await seen.keys("escape")
        assert "12/23" in seen.text()

    job = at(11)
    run_screen(job.book, job.folder, play, size=LARGE)


def test_a_refused_hold_sends_the_work_back_with_its_reason(at: At) -> None:
    async def play(seen: Seen) -> None:
        await _open(seen, "f5")
        await seen.type("q.reyes")
        await seen.type(WORD)
        await seen.type("cold joint")
        assert "is refused: cold joint." in seen.text()
        assert "10/23" in seen.text()

    job = at(11)
    run_screen(job.book, job.folder, play, size=LARGE)


def test_a_hold_that_was_decided_elsewhere_is_not_decided_twice(at: At) -> None:
    async def play(seen: Seen) -> None:
        await _open(seen, "f5")
        await seen.type("q.reyes")
        steps.do(job.book, job.keys["q.reyes"], point="FB-1", typed={})
        await seen.type(WORD)
        await seen.keys("enter")
        assert "FB-1 went on meanwhile" in seen.text()

    job = at(11)
    run_screen(job.book, job.folder, play, size=LARGE)
    with job.book.reading() as view:
        assert 0 == len(view.all(StepRow, step="coat"))


def test_a_technician_submits_the_record_with_the_secret_again(at: At) -> None:
    async def play(seen: Seen) -> None:
        await _open(seen)
        assert "Every step is done." in seen.text()
        await seen.keys("f5")
        assert "Signing says: I did or saw the work recorded here" in seen.text()
        await seen.type("wrong words")
        assert "✗" in seen.text()
        await seen.type(WORD)
        assert "record revision 1 is signed and submitted; head" in seen.text()
        assert "awaiting review" in seen.text()
        assert "f5" not in seen.lines()[-1]

    job = at(23)
    run_screen(job.book, job.folder, play, size=LARGE)
    assert "awaiting review" == job.state()


def test_who_is_no_technician_is_told_when_submitting(at: At) -> None:
    async def play(seen: Seen) -> None:
        await seen.sign_on("c.ward")
        await seen.type("FB-1")
        await seen.keys("f5")
        await seen.type(WORD)
        assert "c.ward does not have the role technician." in seen.text()

    job = at(23)
    run_screen(job.book, job.folder, play, size=LARGE)
