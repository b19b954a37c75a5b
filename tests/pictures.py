"""Photos for tests: drawn here, with the data that a camera would leave in them."""

from __future__ import annotations

import io
from typing import Any

from PIL import Image, ImageDraw
from PIL.PngImagePlugin import PngInfo

SECRETS = (b"SECRETDATUM", b"SECRETCAMERA", b"SECRETOWNER", b"SECRETCOMMENT", b"SECRETXMP")
"""What the camera wrote; none of it may reach a client."""

_GPS, _ORIENTATION, _MAKE, _ARTIST = 0x8825, 0x0112, 0x010F, 0x013B
_XMP = (
    b'<x:xmpmeta xmlns:x="adobe:ns:meta/"><rdf:RDF xmlns:rdf="http://www.w3.org/1999/02/22-rdf-'
    b'syntax-ns#"><rdf:Description note="SECRETXMP"/></rdf:RDF></x:xmpmeta>'
)


def scene(width: int = 640, height: int = 480) -> Image.Image:
    """A gauge on steel, more or less: red at the upper left, blue at the lower right."""
    image = Image.new("RGB", (width, height), (150, 155, 160))
    draw = ImageDraw.Draw(image)
    draw.rectangle((0, 0, width // 4, height // 4), fill=(200, 30, 30))
    draw.rectangle((width * 3 // 4, height * 3 // 4, width, height), fill=(30, 30, 200))
    for place in range(width // 3, width * 2 // 3, max(width // 60, 2)):
        draw.line((place, height // 3, place, height * 2 // 3), fill=(90, 60, 20), width=2)
    return image


def camera_exif(orientation: int = 1) -> Image.Exif:
    """What a camera with satellite navigation leaves in a photo (EXIF 2.3 tags, from memory)."""
    exif = Image.Exif()
    exif[_MAKE], exif[_ARTIST], exif[_ORIENTATION] = "SECRETCAMERA", "SECRETOWNER", orientation
    exif[_GPS] = {1: "N", 2: (51.0, 30.0, 12.5), 3: "W", 4: (0.0, 7.0, 39.5), 18: "SECRETDATUM"}
    return exif


def encoded(image: Image.Image, kind: str = "JPEG", **how: Any) -> bytes:
    """The picture as a file of this kind."""
    out = io.BytesIO()
    image.save(out, format=kind, **how)
    return out.getvalue()


def camera_jpeg(width: int = 640, height: int = 480, orientation: int = 1) -> bytes:
    """A JPEG with place, camera, owner, comment and XMP."""
    exif = camera_exif(orientation)
    return encoded(scene(width, height), exif=exif, comment=b"SECRETCOMMENT", xmp=_XMP)


def camera_png() -> bytes:
    """A PNG with place, owner and comment."""
    texts = PngInfo()
    texts.add_text("Comment", "SECRETCOMMENT")
    texts.add_itxt("XML:com.adobe.xmp", _XMP.decode())
    return encoded(scene(), "PNG", exif=camera_exif(), pnginfo=texts)


def colour(image: Image.Image, right: float, down: float) -> str:
    """`red`, `green`, `blue` or `grey`: what is seen at this share of width and height."""
    spot = (int(image.width * right), int(image.height * down))
    red, green, blue = image.convert("RGB").getpixel(spot)  # type: ignore[misc]
    if max(red, green, blue) - min(red, green, blue) < 60:
        return "grey"
    return {red: "red", green: "green", blue: "blue"}[max(red, green, blue)]
