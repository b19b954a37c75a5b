"""HTML into PDF/A-3u with its data attached: the same bytes for the same content and machine.

WeasyPrint draws; it may load the shipped fonts and stylesheets, the pictures it is handed, and
nothing else.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from datetime import datetime
from typing import TYPE_CHECKING, Any

from gaugelog.documents.content import RecordContent
from gaugelog.documents.finish import finished
from gaugelog.documents.fonts import FONTS, font_faces
from gaugelog.documents.page import record_html
from gaugelog.documents.pango import need_pango
from gaugelog.documents.quiet import quiet
from gaugelog.documents.shipped import template_bytes
from gaugelog.errors import GaugelogError
from gaugelog.ledger.campaign import Paper

if TYPE_CHECKING:
    from gaugelog.documents.fetcher import MemoryFetcher

ATTACHMENT = "record.json"
_POINTS_PER_PX = 0.75


class UnfitPage(GaugelogError):
    """The drawn page would not be valid PDF/A; a defect of Gaugelog."""


@dataclass(frozen=True, slots=True)
class FieldBox:
    """Where a signature goes: page from 0, corners in points from the lower left."""

    page: int
    left: float
    bottom: float
    right: float
    top: float

    @property
    def whole(self) -> tuple[int, int, int, int]:
        """The corners in whole points, as the signing library has them."""
        return round(self.left), round(self.bottom), round(self.right), round(self.top)

    @property
    def width(self) -> float:
        """Width in points."""
        return self.right - self.left

    @property
    def height(self) -> float:
        """Height in points."""
        return self.top - self.bottom


@dataclass(frozen=True, slots=True)
class Drawing:
    """A drawn document and the boxes of its signature fields, by name."""

    pdf: bytes
    pages: int
    boxes: dict[str, FieldBox]


def render_record(
    content: RecordContent, paper: Paper = "a4", pictures: Sequence[bytes] = ()
) -> Drawing:
    """Draw a record with its data attached.

    `pictures` are what is shown of the content's photos, in their order, as JPEG.

    Raises MachineTrouble when the libraries that draw pages are missing.
    """
    need_pango()
    from weasyprint import Attachment

    at = datetime.fromisoformat(content.drawn.at)
    attachment = Attachment(
        string=content.model_dump_json(indent=1),
        name=ATTACHMENT,
        description="The data of this record (gaugelog-record 1)",
        created=at,
        modified=at,
        relationship="Data",
    )
    paper_css = template_bytes(f"record-{paper}.css").decode()
    return draw(record_html(content), paper_css, [attachment], pictures)


def draw(
    html: str, size_css: str, attachments: list[Any], pictures: Sequence[bytes] = ()
) -> Drawing:
    """Draw a page of our own as PDF/A-3u. `size_css` says how large its pages are.

    `pictures` are JPEG, known to the page as `gaugelog:photo-1` and on.
    """
    from weasyprint import CSS, HTML
    from weasyprint.text.fonts import FontConfiguration

    fetcher, fonts = memory_fetcher(pictures), FontConfiguration()
    with quiet("weasyprint", "fontTools") as complaints:
        sheets = [
            CSS(string=text, url_fetcher=fetcher, font_config=fonts)
            for text in (font_faces(), size_css)
        ]
        document = HTML(string=html, url_fetcher=fetcher).render(
            stylesheets=sheets, font_config=fonts
        )
        document.metadata.attachments = attachments
        pdf: bytes = document.write_pdf(pdf_variant="pdf/a-3u")
    _refuse_missing_glyphs(complaints)
    return Drawing(finished(pdf), len(document.pages), _boxes(document))


def memory_fetcher(pictures: Sequence[bytes] = ()) -> MemoryFetcher:
    """The fetcher that knows the shipped fonts and stylesheets, these pictures, nothing else."""
    from gaugelog.documents.fetcher import MemoryFetcher

    served = {font.address: (template_bytes(f"fonts/{font.file}"), "font/ttf") for font in FONTS}
    for name in ("record.css", "stamp.css", "wiring.css"):
        served[f"gaugelog:{name}"] = (template_bytes(name), "text/css")
    for number, picture in enumerate(pictures, start=1):
        served[f"gaugelog:photo-{number}"] = (picture, "image/jpeg")
    return MemoryFetcher(served)


def _boxes(document: Any) -> dict[str, FieldBox]:
    """Boxes of named elements; WeasyPrint gives px from the upper left."""
    return {
        name: FieldBox(
            number,
            left * _POINTS_PER_PX,
            (page.height - bottom) * _POINTS_PER_PX,
            right * _POINTS_PER_PX,
            (page.height - top) * _POINTS_PER_PX,
        )
        for number, page in enumerate(document.pages)
        for name, (left, top, right, bottom) in page.anchors.items()
    }


def _refuse_missing_glyphs(complaints: list[str]) -> None:
    if any("notdef" in complaint.lower() for complaint in complaints):
        raise UnfitPage("A character of the record could not be drawn.", "Please report this.")
