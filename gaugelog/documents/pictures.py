"""A photo as a client gets it: upright, smaller, in sRGB, and with nothing of the camera's data.

The original stays among the evidence. The copy is drawn anew from the pixels alone, so that no
place, time, serial number, comment or small preview goes with it.
"""

from __future__ import annotations

import io
from typing import TYPE_CHECKING

from gaugelog.intake.pictures import opened

if TYPE_CHECKING:
    from PIL.Image import Image

LONGEST = 1000
"""Pixels of the longer side of a copy: about 300 an inch at the size it has on the page."""

_QUALITY = 82
_DEEP = ("I", "F", "I;16", "I;16B", "I;16L")
"""Greys of more than eight bits."""


def client_copy(name: str, data: bytes) -> bytes:
    """The photo as a JPEG of at most `LONGEST` pixels, without metadata.

    Equal bytes give an equal copy. Raises Faulty, naming the file, when it can't be unpacked.
    """
    with opened(name, data) as image:
        image.draft("RGB", (2 * LONGEST, 2 * LONGEST))
        plain = _plain(_upright(image))
        plain.thumbnail((LONGEST, LONGEST))
        out = io.BytesIO()
        _pixels_only(plain).save(out, format="JPEG", quality=_QUALITY)
    return out.getvalue()


def _upright(image: Image) -> Image:
    """The picture turned as its camera was held (EXIF 2.3, tag 274); as it is where that is broken.

    Cameras write much that is no proper EXIF; it must not keep a picture from being shown.
    """
    from PIL import ImageOps

    try:
        return ImageOps.exif_transpose(image)
    except Exception:
        return image


def _plain(image: Image) -> Image:
    """The picture in sRGB, eight bits a colour, on white where it is clear."""
    from PIL import Image

    if image.mode in _DEEP:
        return _shallow(image).convert("RGB")
    if image.has_transparency_data:
        image = image.convert("RGBA")
        white = Image.new("RGBA", image.size, "white")
        return _srgb(Image.alpha_composite(white, image).convert("RGB"), image.info)
    return _srgb(image, image.info)


def _shallow(image: Image) -> Image:
    """Greys of sixteen bits in eight; others are taken to be in eight already."""
    if image.mode in {"I", "F"}:
        return image.convert("L")
    return image.convert("I").point(lambda grey: grey * (1 / 256)).convert("L")


def _srgb(image: Image, info: dict[str | tuple[int, int], object]) -> Image:
    """The picture in sRGB, by the colour profile it came with where that can be followed."""
    from PIL import ImageCms

    profile = info.get("icc_profile")
    if isinstance(profile, bytes) and image.mode in {"RGB", "L", "CMYK"}:
        try:
            ours = ImageCms.createProfile("sRGB")
            theirs = ImageCms.ImageCmsProfile(io.BytesIO(profile))
            turned = ImageCms.profileToProfile(image, theirs, ours, outputMode="RGB")
        except (ImageCms.PyCMSError, OSError):
            pass
        else:
            return turned if turned is not None else image.convert("RGB")
    return image.convert("RGB")


def _pixels_only(image: Image) -> Image:
    """A new picture of the same pixels: what hung on the old one is left behind."""
    from PIL import Image

    return Image.frombytes("RGB", image.size, image.tobytes())
