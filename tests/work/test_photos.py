"""Photos as evidence: with the step that asks for one, or by themselves."""

from __future__ import annotations

import json
from pathlib import Path

import pytest

from gaugelog.errors import Faulty, Refused
from gaugelog.intake.pictures import load_pictures
from gaugelog.journal.entry import sha256
from gaugelog.ledger.photos import PhotoKept, PhotoRow
from gaugelog.ledger.steps import StepRow
from gaugelog.work import photos, steps
from gaugelog.work.backup import backup, opened, restore
from gaugelog.work.history import check_logbook, entries_about, export_journal
from tests.pictures import camera_jpeg, camera_png
from tests.work.job import WALK, Job, changed_files, released_job

ROUTE = "plan/room-temperature-bond-metal.toml"
ASKED = """
  [[step.input]]
  name = "photo"
  kind = "photo"
  prompt = "Photo of the gauge through the glass"
"""
MOUNTED = '  prompt = "Grid resistance as received"\n'
TAKES = 1
"""Steps before the one that takes the gauge."""


@pytest.fixture
def asking(tmp_path: Path) -> Job:
    """A job whose planner demands a photo of the gauge as received."""
    named = ("plan/grids.csv", "room-temperature-bond-metal", "room-temperature-bond-metal.toml")
    job = released_job(tmp_path, changed_files(tmp_path, named, (ROUTE, MOUNTED, MOUNTED + ASKED)))
    job.walk(TAKES)
    return job


@pytest.fixture
def photo(tmp_path: Path) -> Path:
    """A photo as it comes from the camera."""
    path = tmp_path / "IMG_2041.jpg"
    path.write_bytes(camera_jpeg())
    return path


def add(job: Job, *paths: Path, who: str = "t.okoro", **more: str) -> list[PhotoKept]:
    """Keep photos of FB-1, or of the point named."""
    job.clock.advance(60)
    pictures = load_pictures(paths)
    return photos.add(job.book, job.keys[who], pictures, **{"point": "FB-1", **more})


def test_a_photo_that_the_planner_demands_is_kept_with_the_step(asking: Job, photo: Path) -> None:
    who, typed = WALK[TAKES]
    assert asking.do(who, {**typed, "photo": str(photo)}, note="grid whole").settled
    ((_, kept),) = photos.kept(asking.book, "FB-1")
    assert photo.read_bytes() == asking.book.evidence.get(kept.file)
    assert (sha256(photo.read_bytes()), "IMG_2041.jpg", "JPEG") == (
        kept.file,
        kept.name,
        kept.format,
    )
    assert (640, 480, "gauge", "grid whole") == (kept.width, kept.height, kept.step, kept.note)
    with asking.book.reading() as view:
        (row,) = view.all(StepRow, step="gauge")
        (reading,) = kept.readings
        (gauge,) = (each.id for each in [view.gauge("K7-03/1")] if each)
    entered = json.loads(row.data)["photo"]
    assert ("IMG_2041.jpg", kept.id) == (entered["typed"], entered["id"])
    assert {kept.id, kept.gauge, reading} <= set(entries_about(asking.book, "FB-1")[-2].body.about)
    assert gauge == kept.gauge


def test_a_step_whose_photo_is_missing_is_refused(asking: Job) -> None:
    who, typed = WALK[TAKES]
    with pytest.raises(Faulty) as caught:
        asking.do(who, typed)
    (fault,) = caught.value.faults
    assert "point FB-1, step gauge, photo" == fault.where
    assert "is missing." == fault.what
    assert "Enter: Photo of the gauge through the glass." == fault.remedy


@pytest.mark.parametrize(
    ("name", "said"), [("notes.txt", "is no picture"), ("absent.jpg", "can't be read")]
)
def test_what_is_no_photo_does_not_do_for_one(
    asking: Job, tmp_path: Path, name: str, said: str
) -> None:
    (tmp_path / "notes.txt").write_text("it looked fine")
    who, typed = WALK[TAKES]
    before = asking.book.evidence.digests()
    with pytest.raises(Faulty) as caught:
        asking.do(who, {**typed, "photo": str(tmp_path / name)})
    assert [("point FB-1, step gauge, photo", True)] == [
        (fault.where, said in fault.what) for fault in caught.value.faults
    ]
    assert before == asking.book.evidence.digests()


def test_the_photo_of_a_reading_that_fails_is_kept_with_it(asking: Job, photo: Path) -> None:
    who, typed = WALK[TAKES]
    failed = asking.do(who, {**typed, "resistance": "352.9 ohm", "photo": str(photo)})
    assert not failed.settled
    ((_, kept),) = photos.kept(asking.book)
    assert (failed.readings[0].reading.id,) == kept.readings
    again = {**typed, "photo": str(photo)}
    assert asking.do(who, again, reason="loose clip").settled
    assert 2 == len(photos.kept(asking.book))


def test_photos_are_added_to_a_point_and_to_a_step_that_was_come_to(
    job: Job, photo: Path, tmp_path: Path
) -> None:
    job.walk(3)
    png = tmp_path / "close.png"
    png.write_bytes(camera_png())
    found = add(job, photo, png, step="clean", note="abraded", at="2026-11-17 09:30")
    assert ["clean", "clean"] == [each.step for each in found]
    assert ["2026-11-17T09:30:00Z"] * 2 == [each.observed_at for each in found]
    assert "" == add(job, photo)[0].step
    assert "layout" == add(job, photo, step="layout")[0].step  # the step in hand
    assert [("FB-1", each) for each in found] == photos.kept(job.book)[:2]
    with pytest.raises(Refused, match="lies ahead; the work is at “Lay out the gauge lines”"):
        add(job, photo, step="bond")
    with pytest.raises(Refused, match="has no step glue"):
        add(job, photo, step="glue")


def test_nothing_is_added_to_a_record_that_is_under_review_or_accepted(
    job: Job, photo: Path
) -> None:
    job.walk()
    job.submit()
    with pytest.raises(Refused, match="is awaiting review; no photo can be added now"):
        add(job, photo)
    job.accept()
    with pytest.raises(Refused, match="is accepted; no photo"):
        add(job, photo)


def test_only_a_technician_adds_photos_and_is_then_no_reviewer(job: Job, photo: Path) -> None:
    job.walk(2)
    with pytest.raises(Refused, match=r"q\.reyes does not have the role technician"):
        add(job, photo, who="q.reyes")
    add(job, photo, point="FB-2")
    with job.book.reading() as view:
        row = view.point("FB-2")
    assert row is not None
    assert ["t.okoro"] == json.loads(row.workers)


def test_a_photo_at_a_time_to_come_or_of_no_point_is_refused(job: Job, photo: Path) -> None:
    with pytest.raises(Faulty):
        add(job, photo, at="2027-01-01 10:00")
    with pytest.raises(Refused, match="no point FB-9"):
        add(job, photo, point="FB-9")
    assert [] == photos.kept(job.book)


def test_a_note_that_no_page_could_hold_is_refused(job: Job, photo: Path) -> None:
    with pytest.raises(Faulty) as caught:
        add(job, photo, note="x" * 100_000)
    assert "has 100000 characters; 2000 are kept at most." == caught.value.faults[0].what
    assert [] == photos.kept(job.book)
    assert "x" * 2000 == add(job, photo, note="x" * 2000)[0].note


def test_a_missing_or_altered_photo_is_named_by_the_check(job: Job, photo: Path) -> None:
    (kept,) = add(job, photo)
    assert check_logbook(job.book).ok
    place = job.book.folder / "evidence" / kept.file[:2] / kept.file
    place.write_bytes(photo.read_bytes()[:-1] + b"x")
    (altered,) = check_logbook(job.book).troubles
    assert kept.file in f"{altered.where} {altered.what}"
    place.unlink()
    (missing,) = check_logbook(job.book).troubles
    assert kept.file in f"{missing.where} {missing.what}"
    assert missing.what != altered.what


def test_a_backup_takes_the_photos_along(job: Job, photo: Path, tmp_path: Path) -> None:
    (kept,) = add(job, photo)
    backup(job.book, tmp_path / "book.zip")
    with opened(tmp_path / "book.zip") as archive:
        restore(archive, tmp_path / "again", job.keys["c.ward"], reason="tried", clock=job.clock)
    there = type(job.book).open(tmp_path / "again", clock=job.clock)
    assert photo.read_bytes() == there.evidence.get(kept.file)
    assert kept == photos.kept(there)[0][1]


def test_an_export_leaves_originals_out_and_says_so_unless_asked(
    job: Job, photo: Path, tmp_path: Path
) -> None:
    (kept,) = add(job, photo)
    export_journal(job.book, tmp_path / "plain")
    assert not (tmp_path / "plain" / "evidence" / kept.file).exists()
    assert "originals of photos (1)" in (tmp_path / "plain" / "READ ME.txt").read_text()
    export_journal(job.book, tmp_path / "whole", photos=True)
    assert photo.read_bytes() == (tmp_path / "whole" / "evidence" / kept.file).read_bytes()
    assert "Left out" not in (tmp_path / "whole" / "READ ME.txt").read_text()


def test_the_ledger_is_rebuilt_with_its_photos(job: Job, photo: Path) -> None:
    add(job, photo)
    with job.book.reading() as view:
        before = view.all(PhotoRow)
    job.book.rebuild()
    with job.book.reading() as view:
        assert before == view.all(PhotoRow)
    assert steps.next_step(job.book, "FB-1").number == 1
