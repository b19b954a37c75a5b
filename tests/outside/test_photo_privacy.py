"""Foreign judges of what a client is handed: no place, camera or owner in record or export.

Poppler's pdfimages takes the pictures out; qpdf unpacks every stream, the attached data among
them. What a camera leaves is that of the Exif standard (CIPA DC-008), tags from memory.
"""

from __future__ import annotations

import io
import re
import subprocess
from pathlib import Path

import pikepdf
import pytest
from PIL import Image

from gaugelog.documents.maker import PdfRecordMaker
from gaugelog.intake.pictures import load_pictures
from gaugelog.work import photos, reviews
from gaugelog.work.history import export_journal
from tests.foreign import needs
from tests.outside.pdfa import troubles
from tests.pictures import SECRETS, camera_jpeg, camera_png, colour
from tests.work.job import Job, released_job

pytestmark = pytest.mark.xdist_group("record")

_EXIF, _XMP = b"Exif\0\0", b"http://ns.adobe.com/xap/1.0/\0"


@pytest.fixture(scope="module")
def job(tmp_path_factory: pytest.TempPathFactory) -> Job:
    """A point with three photos: lying on its side, upright, and a PNG; submitted and accepted."""
    home = tmp_path_factory.mktemp("photos")
    files = {"side.jpg": camera_jpeg(1600, 1200, 6), "up.jpg": camera_jpeg(), "c.png": camera_png()}
    for name, data in files.items():
        (home / name).write_bytes(data)
    job = released_job(home)
    job.walk()
    pictures = load_pictures([home / name for name in files])
    photos.add(job.book, job.keys["t.okoro"], pictures, point="FB-1", note="as left")
    maker = PdfRecordMaker()
    reviews.submit(job.book, job.keys["t.okoro"], maker, point="FB-1", meaning="I submit.")
    reviews.accept(job.book, job.keys["q.reyes"], maker, point="FB-1", meaning="I accept.")
    return job


@pytest.fixture(scope="module")
def record(job: Job, tmp_path_factory: pytest.TempPathFactory) -> Path:
    """The accepted record, as handed to the client."""
    path = tmp_path_factory.mktemp("record") / "record.pdf"
    path.write_bytes(reviews.record(job.book, point="FB-1").pdf)
    return path


def camera_data_in(data: bytes) -> list[bytes]:
    """What of a camera's data is in these bytes."""
    return [each for each in (*SECRETS, _EXIF, _XMP, b"GPS") if each in data]


def test_the_originals_do_hold_the_place(job: Job) -> None:
    kept = [job.book.evidence.get(photo.file) for _, photo in photos.kept(job.book)]
    assert 3 == len(kept)
    assert all(b"SECRETDATUM" in data and b"SECRETOWNER" in data for data in kept)
    assert "SECRETDATUM" == Image.open(io.BytesIO(kept[0])).getexif().get_ifd(0x8825)[18]


def test_no_byte_of_the_record_tells_where_it_was(record: Path) -> None:
    assert [] == camera_data_in(record.read_bytes())
    with pikepdf.open(record) as opened:
        streams = [each for each in opened.objects if isinstance(each, pikepdf.Stream)]
        assert len(streams) > 10
        for each in streams:
            raw = each.read_raw_bytes()
            plain = raw if each.get("/Filter") == "/DCTDecode" else each.read_bytes()
            assert [] == camera_data_in(plain) + camera_data_in(raw)
        data = opened.attachments["record.json"].get_file().read_bytes()
    assert b'"sha256"' in data
    assert [] == camera_data_in(data)


@needs("qpdf")
def test_qpdf_finds_none_either_with_every_stream_unpacked(record: Path, tmp_path: Path) -> None:
    plain = tmp_path / "plain.pdf"
    subprocess.run(["qpdf", "--qdf", "--decode-level=generalized", record, plain], check=True)
    assert b"as left" in plain.read_bytes()
    assert [] == camera_data_in(plain.read_bytes())


@needs("pdfimages")
def test_the_pictures_taken_out_by_poppler_are_bare_upright_and_sharp_enough(
    record: Path, tmp_path: Path
) -> None:
    listed = subprocess.run(
        ["pdfimages", "-list", record], check=True, capture_output=True, text=True
    ).stdout.splitlines()[2:]
    rows = [line.split() for line in listed]
    pictures = [row for row in rows if row[8] == "jpeg"]
    assert 3 == len(pictures)
    # Colour of three parts, not smoothed (ISO 19005-3, 6.2.8), 150 dots an inch or finer.
    assert all(("rgb", "no") == (row[5], row[9]) and int(row[12]) >= 150 for row in pictures)
    subprocess.run(["pdfimages", "-all", record, tmp_path / "out"], check=True)
    found = sorted(tmp_path.glob("out-*.jpg"))
    assert 3 == len(found)
    for path in found:
        assert [] == camera_data_in(path.read_bytes())
        assert {} == dict(Image.open(path).getexif())
    seen = {(image.size, colour(image, 0.9, 0.1)) for image in map(Image.open, found)}
    assert {((750, 1000), "red"), ((640, 480), "grey")} == seen


def test_a_record_with_photos_is_still_pdf_a(record: Path) -> None:
    assert [] == troubles(record.read_bytes())


def test_the_exported_journal_tells_no_place_unless_originals_are_asked_for(
    job: Job, tmp_path: Path
) -> None:
    def told(folder: Path) -> set[bytes]:
        files = (path for path in folder.rglob("*") if path.is_file())
        return {each for path in files for each in camera_data_in(path.read_bytes())}

    export_journal(job.book, tmp_path / "plain")
    assert set() == told(tmp_path / "plain")
    export_journal(job.book, tmp_path / "whole", photos=True)
    assert set(SECRETS) <= told(tmp_path / "whole")


def test_the_data_names_each_original_by_its_digest(job: Job, record: Path) -> None:
    with pikepdf.open(record) as opened:
        text = opened.attachments["record.json"].get_file().read_bytes().decode()
    digests = [photo.file for _, photo in photos.kept(job.book)]
    assert digests == re.findall(r'"sha256": "([0-9a-f]{64})"', text)
