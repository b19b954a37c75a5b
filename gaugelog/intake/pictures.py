"""Photos as people give them: looked at whole before they are kept, and kept as they are."""

from __future__ import annotations

import io
import warnings
from collections.abc import Iterator, Sequence
from contextlib import contextmanager
from dataclasses import dataclass
from pathlib import Path
from typing import TYPE_CHECKING

from gaugelog.errors import Fault, Faulty
from gaugelog.intake.files import read_bytes

if TYPE_CHECKING:
    from PIL.Image import Image

LARGEST_BYTES = 40 * 1024 * 1024
"""Bytes beyond which a file is no photo of a technician's."""

LARGEST_PIXELS = 80_000_000
"""Pixels beyond which a picture is not unpacked: a small file can claim any number of them."""

FORMATS = ("JPEG", "PNG", "WEBP", "TIFF")
"""The kinds of picture that are read; a phone's several pictures in one JPEG count as JPEG."""

_HEIF = (b"ftypheic", b"ftypheix", b"ftypmif1", b"ftyphevc", b"ftypavif")
_GIVE = f"Give a photo as {', '.join(FORMATS[:-1])} or {FORMATS[-1]}."


@dataclass(frozen=True, slots=True)
class Picture:
    """A photo that can be kept: its bytes as they are, and what was seen of it."""

    name: str
    """The file's own name, without its folder."""
    data: bytes
    format: str
    width: int
    """In pixels as the file has them, before it is turned upright."""
    height: int


def load_pictures(paths: Sequence[Path]) -> list[Picture]:
    """Read photos. Raises Faulty naming what is wrong with any of them, all at once."""
    found: list[Picture] = []
    faults: list[Fault] = []
    for path in paths:
        try:
            found.append(read_picture(path.name, read_bytes(path, LARGEST_BYTES)))
        except Faulty as error:
            faults += error.faults
    if faults:
        raise Faulty(faults)
    return found


def read_picture(name: str, data: bytes) -> Picture:
    """Look at a photo's bytes, all of them. Raises Faulty when it is none, or can't be unpacked."""
    with opened(name, data) as image:
        width, height = image.size
        kind = "JPEG" if image.format == "MPO" else str(image.format)
        if kind != "JPEG" and getattr(image, "n_frames", 1) > 1:
            _refuse(name, "holds several pictures.", "Give one picture a file.")
        # A JPEG is unpacked at an eighth of its size: every byte is read, few are kept.
        image.draft("RGB", (1, 1))
        image.load()
    return Picture(name, data, kind, width, height)


@contextmanager
def opened(name: str, data: bytes) -> Iterator[Image]:
    """A picture that may be unpacked. Raises Faulty for what is none, or far too large."""
    from PIL import Image, UnidentifiedImageError

    with _strict():
        try:
            with Image.open(io.BytesIO(data), formats=FORMATS) as image:
                _demand_size(name, *image.size)
                yield image
        except Faulty:
            raise
        except UnidentifiedImageError:
            _refuse(name, _what_else(data), _GIVE)
        except (Image.DecompressionBombWarning, Image.DecompressionBombError):
            _refuse(name, f"has more pixels than {LARGEST_PIXELS}.", "Give a smaller one.")
        except Exception as error:  # a broken picture breaks its reader in many ways
            what = f"is damaged or cut short: {str(error)[:80] or type(error).__name__}."
            raise Faulty([Fault(name, what, "Copy it from the camera again.")]) from error


@contextmanager
def _strict() -> Iterator[None]:
    """Let the reader of pictures refuse what is cut short, or claims to be huge.

    The library that draws pages tells it to let cut pictures pass, for the whole program.
    """
    from PIL import Image, ImageFile

    before = ImageFile.LOAD_TRUNCATED_IMAGES
    with warnings.catch_warnings():
        warnings.simplefilter("ignore")
        warnings.simplefilter("error", Image.DecompressionBombWarning)
        ImageFile.LOAD_TRUNCATED_IMAGES = False
        try:
            yield
        finally:
            ImageFile.LOAD_TRUNCATED_IMAGES = before


def _demand_size(name: str, width: int, height: int) -> None:
    if width * height > LARGEST_PIXELS:
        what = f"has {width} × {height} pixels; {LARGEST_PIXELS} are unpacked at most."
        _refuse(name, what, "Give a smaller one.")


def _what_else(data: bytes) -> str:
    if any(data[4:].startswith(each) for each in _HEIF):
        return "is a HEIC or AVIF picture, which is not read here."
    return "is no picture that is read here."


def _refuse(name: str, what: str, remedy: str) -> None:
    raise Faulty([Fault(name, what, remedy)])
