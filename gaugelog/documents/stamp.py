"""What a signature looks like on the page, drawn as a small PDF of the field's own size."""

from __future__ import annotations

from gaugelog.documents.fonts import Lettering
from gaugelog.documents.page import plain_environment
from gaugelog.documents.pango import need_pango
from gaugelog.documents.render import FieldBox, draw
from gaugelog.documents.wording import WallTime
from gaugelog.errors import Refused
from gaugelog.work.ports import Stamp

_SIZES = (7.6, 6.8, 6.0, 5.2, 4.4, 3.6, 2.8)
"""Sizes of type that are tried, largest first, in points."""


def render_stamp(stamp: Stamp, fingerprint: str, box: FieldBox) -> bytes:
    """The one-page PDF that shows who signed, what it means, when, and at which head.

    `fingerprint` is the SHA-256 of the signer's certificate. Long text is set smaller until all
    of it is seen (21 CFR 11.50 asks for name, time and meaning). Raises Refused when the meaning
    is longer than any size can hold.
    """
    need_pango()
    page = plain_environment(Lettering()).get_template("stamp.html")
    html = page.render(
        stamp=stamp,
        at=WallTime(stamp.moment.offset).exactly(stamp.moment.text),
        fingerprint=fingerprint,
    )
    for size in _SIZES:
        drawing = draw(html, _size_css(box, size), [])
        if drawing.pages == 1:
            return drawing.pdf
    raise Refused(
        "The meaning of the signature is too long for its field.", "Say it in fewer words."
    )


def _size_css(box: FieldBox, size: float) -> str:
    return f"@page {{ size: {box.width:.2f}pt {box.height:.2f}pt }} html {{ font-size: {size}pt }}"
