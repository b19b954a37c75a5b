"""Photos on the record's page: numbered, told of, shown where they belong, hostile names too."""

from __future__ import annotations

from pathlib import Path

import pytest

from gaugelog.documents.content import RecordContent
from gaugelog.documents.content.build import build
from gaugelog.documents.maker import PdfRecordMaker
from gaugelog.documents.page import record_html
from gaugelog.errors import StorageTrouble
from gaugelog.intake.instruments import load_instruments
from gaugelog.intake.pictures import read_picture
from gaugelog.intake.route import shipped_routes
from gaugelog.intake.stock import load_stock
from gaugelog.journal.ids import new_id
from gaugelog.work import dispositions, instruments, photos, plan, stock
from gaugelog.work.ports import RecordRequest
from tests.pictures import camera_jpeg
from tests.work.arranged import LOTS, Walker, write_plan
from tests.work.job import DEMO, Job, released_job, start_job
from tests.work.test_sharing import BENDING
from tests.work.walking import here

JOIN = '  name = "solder"\n'
ASKED = '  name = "shot"\n  kind = "photo"\n  prompt = "Photo of the joints"\n  [[step.input]]\n'


def content_of(job: Job, point: str = "FB-1") -> RecordContent:
    """The record of a point as it would be drawn now."""
    with job.book.reading() as view:
        row = view.point(point)
        assert row is not None
        head = job.book.head().printed
        return build(view, RecordRequest(row.id, 1, head, job.clock.now(), ""))


def add(job: Job, name: str, note: str = "", step: str = "", point: str = "FB-1") -> None:
    """Keep a photo."""
    job.clock.advance(60)
    picture = read_picture(name, camera_jpeg())
    signer = job.keys["t.okoro"]
    photos.add(job.book, signer, [picture], point=point, step=step, note=note)


@pytest.fixture
def job(tmp_path: Path) -> Job:
    """A job whose first point has its gauge bonded."""
    made = released_job(tmp_path)
    made.walk(8)
    return made


def shared_job(home: Path) -> Job:
    """A half bridge of points A and B whose route asks for a photo of the joints."""
    made = start_job(home)
    planner = made.keys["c.ward"]
    (home / "lots.csv").write_text(LOTS, encoding="utf-8")
    received = load_stock([home / "lots.csv", DEMO / "consumables.csv"], new_id=new_id)
    stock.receive(made.book, planner, received)
    meters = load_instruments(DEMO / "instruments.toml", new_id=new_id)
    instruments.add(made.book, planner, meters)
    folder = write_plan(home / "plan", BENDING)
    route = shipped_routes()["room-temperature-bond-metal"].decode()
    (folder / "own.toml").write_text(route.replace(JOIN, ASKED + JOIN), encoding="utf-8")
    grids = folder / "grids.csv"
    text = grids.read_text(encoding="utf-8").replace("room-temperature-bond-metal", "own.toml")
    grids.write_text(text, encoding="utf-8")
    plan.load(made.book, planner, plan.understand(made.book, folder))
    plan.release(made.book, planner, meaning="I release.")
    return made


def test_each_photo_is_numbered_and_told_of(job: Job) -> None:
    add(job, "IMG_1.jpg", "grid whole", "gauge")
    add(job, "IMG_2.jpg")
    page = " ".join(record_html(content_of(job)).split())
    assert "<b>Photo 1.</b> Take the gauge and read it as received: " in page
    assert "<b>Photo 2.</b> The point" in page
    assert 'src="gaugelog:photo-1"' in page
    assert 'src="gaugelog:photo-2"' in page
    assert "IMG_1.jpg, JPEG, 640 × 480 px" in page
    assert "photos" in content_of(job).people[0].part


def test_a_page_without_photos_does_not_speak_of_them(job: Job) -> None:
    assert "gaugelog:photo" not in record_html(content_of(job))


def test_hostile_names_and_notes_are_text(job: Job) -> None:
    add(job, "<img src=x onerror=alert(1)>.jpg", "{{ 7 * 7 }} <script>\u202e=1+1 " + "x" * 1900)
    content = content_of(job)
    page = record_html(content)
    assert "<script>" not in page
    assert "<img src=x" not in page
    assert "{{ 7 * 7 }}" in page
    with job.book.reading() as view:
        row = view.point("FB-1")
        assert row is not None
        moment, head = job.clock.now(), job.book.head().printed
        request = RecordRequest(row.id, 1, head, moment, "", job.book.evidence)
        assert PdfRecordMaker().draft(view, request).startswith(b"%PDF-")
        blind = RecordRequest(row.id, 1, head, moment, "")
        with pytest.raises(StorageTrouble, match="The photo "):
            PdfRecordMaker().draft(view, blind)


def test_a_photo_of_the_earlier_gauge_says_so(job: Job) -> None:
    add(job, "torn.jpg", "grid torn")
    dispositions.replace(
        job.book, job.keys["t.okoro"], point="FB-1", reason="grid torn", meaning="I decided it."
    )
    (photo,) = content_of(job).photos
    assert "K7-03/1" == photo.earlier_gauge
    assert "Shows K7-03/1, which is no longer at this place." in record_html(content_of(job))


def test_the_photo_of_a_step_on_a_shared_circuit_stands_on_each_points_record(
    tmp_path: Path,
) -> None:
    made = shared_job(tmp_path)
    walker = Walker(made)
    for _ in walker.points:
        for point in walker.points:
            walker.to(point, "wires")
    shot = tmp_path / "joints.jpg"
    shot.write_bytes(camera_jpeg())
    typed = {"solder": "SO-17", "flux-removed": "yes", "shot": str(shot)}
    assert "wires" == here(made, "A")
    made.do("t.okoro", typed, "A")
    first, second = content_of(made, "A"), content_of(made, "B")
    assert [each.id for each in first.photos] == [each.id for each in second.photos]
    assert ["joints.jpg", "C-1"] == [second.photos[0].name, second.photos[0].subject]
    assert "(photo 1)" in record_html(second)
