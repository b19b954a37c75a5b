from __future__ import annotations

import struct
import zlib
from pathlib import Path

import pytest
from PIL import ImageFile

from gaugelog.errors import Faulty
from gaugelog.intake.pictures import LARGEST_BYTES, load_pictures, read_picture
from tests.pictures import camera_jpeg, camera_png, encoded, scene


def fault(name: str, data: bytes) -> str:
    """The one sentence that these bytes are refused with."""
    with pytest.raises(Faulty) as caught:
        read_picture(name, data)
    (found,) = caught.value.faults
    assert found.where == name
    return f"{found.what} {found.remedy}"


def png_claiming(width: int, height: int) -> bytes:
    """A PNG whose heading claims this size, of no more than a few bytes."""

    def chunk(kind: bytes, data: bytes) -> bytes:
        return (
            struct.pack(">I", len(data)) + kind + data + struct.pack(">I", zlib.crc32(kind + data))
        )

    heading = struct.pack(">IIBBBBB", width, height, 8, 2, 0, 0, 0)
    body = chunk(b"IDAT", zlib.compress(b"\0" * 100))
    return b"\x89PNG\r\n\x1a\n" + chunk(b"IHDR", heading) + body + chunk(b"IEND", b"")


@pytest.mark.parametrize("kind", ["JPEG", "PNG", "WEBP", "TIFF"])
def test_a_picture_of_each_kind_is_read_with_its_size(kind: str) -> None:
    data = encoded(scene(321, 123), kind)
    found = read_picture("bond.x", data)
    assert (kind, 321, 123, data) == (found.format, found.width, found.height, found.data)


def test_the_size_is_the_files_own_before_it_is_turned_upright() -> None:
    found = read_picture("bond.jpg", camera_jpeg(640, 480, orientation=6))
    assert (640, 480) == (found.width, found.height)


def test_a_phones_jpeg_of_several_pictures_counts_as_jpeg() -> None:
    data = encoded(scene(), "MPO", save_all=True, append_images=[scene(320, 240)])
    assert "JPEG" == read_picture("phone.jpg", data).format


def test_what_is_no_picture_is_said_to_be_none() -> None:
    said = "is no picture that is read here. Give a photo as JPEG, PNG, WEBP or TIFF."
    for data in (b"lot,pack\nL-1,K7\n", b"%PDF-1.7 ...", b"<svg></svg>", b"GIF89a" + bytes(40)):
        assert said == fault("bond.jpg", data)


def test_a_phones_heic_is_named_for_what_it_is() -> None:
    data = b"\x00\x00\x00\x18ftypheic\x00\x00\x00\x00mif1heic" + bytes(100)
    assert fault("IMG_1.HEIC", data).startswith("is a HEIC or AVIF picture, which is not read")


@pytest.mark.parametrize("whole", [camera_jpeg(), camera_png(), encoded(scene(), "WEBP")])
def test_a_picture_that_is_cut_short_is_refused(whole: bytes) -> None:
    for share in (0.4, 0.8):
        assert "damaged or cut short" in fault("bond.jpg", whole[: int(len(whole) * share)])


def test_a_small_file_that_claims_a_huge_picture_is_not_unpacked() -> None:
    for width, height in (
        (9_000, 9_000),
        (12_000, 9_000),
        (60_000, 60_000),
        (2**31 - 1, 2**31 - 1),
    ):
        assert "pixels" in fault("bomb.png", png_claiming(width, height))


def test_a_text_that_unpacks_without_end_is_refused() -> None:
    data = encoded(scene(8, 8), "PNG")
    bomb = b"Comment\0\0" + zlib.compress(bytes(80_000_000))
    chunk = struct.pack(">I", len(bomb)) + b"zTXt" + bomb
    chunk += struct.pack(">I", zlib.crc32(b"zTXt" + bomb))
    assert "damaged" in fault("bomb.png", data[:33] + chunk + data[33:])


def test_several_pictures_in_one_file_are_refused() -> None:
    for kind in ("TIFF", "WEBP", "PNG"):
        data = encoded(scene(), kind, save_all=True, append_images=[scene().rotate(90)])
        assert "holds several pictures." in fault("pages.x", data)


def test_every_file_that_can_not_be_kept_is_named_at_once(tmp_path: Path) -> None:
    names = ("good.jpg", "words.jpg", "empty.jpg", "huge.jpg", "absent.jpg")
    good, words, empty, huge, _ = paths = [tmp_path / name for name in names]
    good.write_bytes(camera_jpeg())
    words.write_text("no picture")
    empty.write_bytes(b"")
    with huge.open("wb") as file:
        file.truncate(LARGEST_BYTES + 1)
    with pytest.raises(Faulty) as caught:
        load_pictures([*paths, tmp_path])
    assert [*names[1:], tmp_path.name] == [each.where for each in caught.value.faults]


def test_what_is_cut_short_is_refused_though_another_library_lets_it_pass() -> None:
    ImageFile.LOAD_TRUNCATED_IMAGES, before = True, ImageFile.LOAD_TRUNCATED_IMAGES
    try:
        assert "damaged or cut short" in fault("bond.jpg", camera_jpeg()[:2000])
        assert ImageFile.LOAD_TRUNCATED_IMAGES
    finally:
        ImageFile.LOAD_TRUNCATED_IMAGES = before
