"""What a reviewer looks at: the queue, and a point's evidence in one look."""

from __future__ import annotations

from pathlib import Path

import pytest

from gaugelog.errors import Refused
from gaugelog.intake.pictures import load_pictures
from gaugelog.work import photos, reviews, steps
from gaugelog.work.reviewing import PointEvidence, evidence_of, waiting_for_review
from gaugelog.work.standing import set_standing
from tests.pictures import camera_jpeg
from tests.work.job import TYPED, WALK, Job, before

INSULATION, LOOP = before("insulation"), before("loop")
"""Steps before the first insulation, and before the lead loop, which may be skipped."""


def seen(job: Job, person: str = "q.reyes", point: str = "FB-1") -> PointEvidence:
    """The evidence of a point."""
    return evidence_of(job.book, point, person)


@pytest.fixture
def submitted(job: Job) -> Job:
    """A job whose first point waits for review; one check failed before, one step was skipped."""
    job.walk(INSULATION)
    first = WALK[INSULATION][1]
    job.do("t.okoro", {**first, "insulation": "0.2 GΩ"})
    job.do("t.okoro", first, reason="flux left; cleaned again", note="solvent twice")
    for who, typed in WALK[INSULATION + 1 : LOOP]:
        job.do(who, typed)
    steps.skip(job.book, job.keys["t.okoro"], point="FB-1", reason="connector is moulded")
    for who, typed in WALK[LOOP + 1 :]:
        job.do(who, typed)
    job.submit()
    return job


def test_the_queue_holds_what_is_submitted_and_says_for_whom_it_is_not(submitted: Job) -> None:
    (mine,) = waiting_for_review(submitted.book, "q.reyes")
    assert ("FB-1", 1, "Tobe Okoro (TO)", "") == (
        mine.point, mine.revision, mine.submitted_by, mine.bar,
    )  # fmt: skip
    (not_mine,) = waiting_for_review(submitted.book, "t.okoro")
    assert "t.okoro does not have the role reviewer." in not_mine.bar
    submitted.accept()
    assert [] == waiting_for_review(submitted.book, "q.reyes")


def test_who_did_a_step_may_not_judge_the_point(job: Job) -> None:
    assert "is not under review" in seen(job).bar
    assert () == seen(job).checks
    assert 0 == seen(job).revision


def test_checks_come_with_the_smallest_margin_first(submitted: Job) -> None:
    shares = [each.margin.share for each in seen(submitted).checks if each.margin is not None]
    known = [share for share in shares if share is not None]
    assert 10 == len(known)
    # What has no limit to lie near to, such as a sign that is seen or not, comes last.
    assert sorted(known) == shares[: len(known)]


def test_a_check_that_blocks_comes_before_all_others(job: Job) -> None:
    job.walk(INSULATION)
    job.do("t.okoro", {**WALK[INSULATION][1], "insulation": "0.2 GΩ"})
    first = seen(job).checks[0]
    assert ("insulation", True) == (first.last.check, first.last.verdict.blocks)
    assert first.margin is not None
    assert first.margin.share is not None
    assert first.margin.share < 0


def test_every_attempt_is_there_with_its_reason(submitted: Job) -> None:
    found = next(each for each in seen(submitted).checks if len(each.attempts) > 1)
    assert ["fail", "pass"] == [each.verdict.word for each in found.attempts]
    assert "flux left; cleaned again" == found.last.reason
    assert ("IT-5", "FB-1") == (found.instrument, found.subject)


def test_skipped_steps_and_notes_are_told_with_who(submitted: Job) -> None:
    (skipped,) = seen(submitted).skipped
    assert (15, "connector is moulded", "Tobe Okoro (TO)") == (
        skipped.number, skipped.note, skipped.by,
    )  # fmt: skip
    assert ["solvent twice"] == [each.note for each in seen(submitted).noted]


def test_who_did_what_is_told_for_each_person(submitted: Job) -> None:
    did = dict(seen(submitted).people)
    assert ("let go on at 5", "let go on at 12") == did["Quilla Reyes (QR)"]
    assert "skipped 15" in did["Tobe Okoro (TO)"]
    assert "13 readings" == did["Tobe Okoro (TO)"][-1]


def test_what_keeps_a_record_from_being_accepted_is_named(submitted: Job) -> None:
    assert () == seen(submitted).blocks
    set_standing(
        submitted.book, submitted.keys["q.reyes"], label="K7-03", standing="quarantined",
        reason="recall",
    )  # fmt: skip
    (block,) = seen(submitted).blocks
    assert "pack K7-03 is quarantined: recall" in block
    with pytest.raises(Refused, match="K7-03 is quarantined"):
        submitted.accept()


def test_the_story_tells_of_returns(submitted: Job) -> None:
    reviews.give_back(
        submitted.book, submitted.keys["q.reyes"], point="FB-1", reason="photo is blurred"
    )
    told = [(each.turn, each.reason, each.by) for each in seen(submitted).story]
    assert ("returned", "photo is blurred", "Quilla Reyes (QR)") == told[-1]
    assert "returned" == seen(submitted).state


def test_photos_are_told_with_their_step_and_note(job: Job, tmp_path: Path) -> None:
    (tmp_path / "bond.jpg").write_bytes(camera_jpeg())
    job.walk(2)
    photos.add(
        job.book, job.keys["t.okoro"], load_pictures([tmp_path / "bond.jpg"]),
        point="FB-1", step="gauge", note="through the glass",
    )  # fmt: skip
    (photo,) = seen(job).photos
    assert ("bond.jpg", "through the glass") == (photo.name, photo.note)
    assert camera_jpeg() == job.book.evidence.get(photo.file)


def test_there_is_no_evidence_of_a_point_that_is_not_there(job: Job) -> None:
    with pytest.raises(Refused, match="no point FB-9"):
        seen(job, point="FB-9")


def test_what_was_flagged_stands_before_the_reviewer(job: Job) -> None:
    job.walk(before("insulation"))
    for step, value in (("insulation", "18 GΩ"), ("wires", ""), ("cabled", "1.2 GΩ")):
        who, typed = TYPED[step]
        job.do(who, {**typed, "insulation": value} if value else typed)
    assert any("1.2 GΩ" in flag or "fell" in flag for flag in seen(job).flags)
