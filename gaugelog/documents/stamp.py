"""What a signature looks like on the page, drawn as a small PDF of the field's own size."""

from __future__ import annotations

from gaugelog.documents.fonts import Lettering
from gaugelog.documents.page import plain_environment
from gaugelog.documents.pango import need_pango
from gaugelog.documents.render import FieldBox, draw
from gaugelog.documents.wording import WallTime
from gaugelog.work.ports import Stamp


def render_stamp(stamp: Stamp, fingerprint: str, box: FieldBox) -> bytes:
    """The one-page PDF that shows who signed, what it means, when, and at which head.

    `fingerprint` is the SHA-256 of the signer's certificate. Text too long for the field is cut
    off at its lower edge; the whole of it is in the signature and in the journal.
    """
    need_pango()
    page = plain_environment(Lettering()).get_template("stamp.html")
    html = page.render(
        stamp=stamp,
        at=WallTime(stamp.moment.offset).exactly(stamp.moment.text),
        fingerprint=fingerprint,
    )
    return draw(html, f"@page {{ size: {box.width:.2f}pt {box.height:.2f}pt }}", []).pdf
