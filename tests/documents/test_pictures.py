"""What a client sees of a photo: upright, smaller, and nothing of the camera's data."""

from __future__ import annotations

import io
from typing import Any

import pytest
from PIL import Image, ImageCms

from gaugelog.documents.pictures import LONGEST, client_copy
from gaugelog.errors import Faulty
from tests.pictures import SECRETS, camera_jpeg, camera_png, colour, encoded, scene


def copy_of(data: bytes) -> Image.Image:
    """The client's copy, opened."""
    return Image.open(io.BytesIO(client_copy("bond.jpg", data)))


def test_a_copy_is_a_jpeg_of_the_same_scene_and_no_larger_than_the_page_needs() -> None:
    small, large = copy_of(camera_jpeg(640, 480)), copy_of(camera_jpeg(4000, 3000))
    assert ("JPEG", "RGB", (640, 480)) == (small.format, small.mode, small.size)
    assert (LONGEST, LONGEST * 3 // 4) == large.size
    for image in (small, large):
        seen = [colour(image, right, down) for right, down in [(0.1, 0.1), (0.9, 0.1), (0.9, 0.9)]]
        assert ["red", "grey", "blue"] == seen


@pytest.mark.parametrize("data", [camera_jpeg(), camera_png(), encoded(scene(), "TIFF")])
def test_nothing_but_pixels_goes_along(data: bytes) -> None:
    copy = copy_of(data)
    assert {} == dict(copy.getexif())
    assert {"jfif", "jfif_version", "jfif_unit", "jfif_density"} == set(copy.info)
    bare = client_copy("bond.jpg", data)
    assert not [secret for secret in SECRETS if secret in bare]


@pytest.mark.parametrize(
    ("orientation", "red", "turned"),
    [
        (1, (0.1, 0.1), False),
        (2, (0.9, 0.1), False),
        (3, (0.9, 0.9), False),
        (4, (0.1, 0.9), False),
        (5, (0.1, 0.1), True),
        (6, (0.9, 0.1), True),
        (7, (0.9, 0.9), True),
        (8, (0.1, 0.9), True),
    ],
)
def test_a_copy_is_turned_as_the_camera_was_held(
    orientation: int, red: tuple[float, float], turned: bool
) -> None:
    # EXIF 2.3, tag 274: where the first row and the first column of the file are to be seen.
    copy = copy_of(camera_jpeg(640, 480, orientation))
    assert ((480, 640) if turned else (640, 480)) == copy.size
    assert "red" == colour(copy, *red)


def test_data_of_the_camera_that_is_broken_does_not_keep_a_photo_from_being_shown() -> None:
    broken = encoded(scene(), exif=b"Exif\0\0II*\0\xff\xff\xff\xff rubbish")
    assert "red" == colour(copy_of(broken), 0.1, 0.1)


def test_what_is_clear_is_seen_on_white() -> None:
    clear = scene().convert("RGBA")
    clear.putalpha(0)
    copy = copy_of(encoded(clear, "PNG"))
    assert (255, 255, 255) == copy.getpixel((320, 240))


@pytest.mark.parametrize("mode", ["L", "1", "P", "CMYK", "LA"])
def test_pictures_of_every_kind_of_colour_are_copied(mode: str) -> None:
    kind = "TIFF" if mode == "CMYK" else "PNG"
    copy = copy_of(encoded(scene().convert(mode), kind))
    assert ("RGB", (640, 480)) == (copy.mode, copy.size)


def test_sixteen_bits_of_grey_keep_their_brightness() -> None:
    grey = Image.new("I;16", (64, 64), 0x8000)
    value: Any = copy_of(encoded(grey, "PNG")).getpixel((32, 32))
    assert (128, 128, 128) == pytest.approx(value, abs=2)


def test_colours_of_another_profile_are_turned_into_those_of_the_page() -> None:
    # In this profile the first number of a pixel is how blue it is, and the third how red.
    same = ImageCms.ImageCmsProfile(ImageCms.createProfile("sRGB")).tobytes()
    other = same.replace(b"rXYZ", b"????").replace(b"bXYZ", b"rXYZ").replace(b"????", b"bXYZ")
    assert "red" == colour(copy_of(encoded(scene(), icc_profile=same)), 0.1, 0.1)
    assert "blue" == colour(copy_of(encoded(scene(), icc_profile=other)), 0.1, 0.1)
    rubbish = encoded(scene(), icc_profile=b"no profile at all")
    assert "red" == colour(copy_of(rubbish), 0.1, 0.1)


def test_equal_photos_give_equal_copies() -> None:
    assert client_copy("a.jpg", camera_jpeg()) == client_copy("b.jpg", camera_jpeg())


def test_a_photo_that_can_not_be_unpacked_is_named() -> None:
    with pytest.raises(Faulty) as caught:
        client_copy("bond.jpg", camera_jpeg()[:900])
    assert "bond.jpg" == caught.value.faults[0].where
