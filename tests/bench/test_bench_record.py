"""A signed record against the drawing library alone on the same page, plus two signatures."""

from __future__ import annotations

import io
from collections.abc import Callable
from typing import Any

import pytest

from gaugelog.documents.fonts import font_faces
from gaugelog.documents.page import record_html
from gaugelog.documents.quiet import quiet
from gaugelog.documents.render import memory_fetcher, render_record
from gaugelog.documents.shipped import template_bytes
from gaugelog.documents.sign import sign_first, sign_second
from gaugelog.journal.keys import Signer
from tests.bench.compare import compare
from tests.documents.sample import sample
from tests.documents.signers import crew, reviewer_stamp, technician_stamp

pytestmark = [pytest.mark.bench, pytest.mark.xdist_group("bench")]


def _ours() -> Callable[[], object]:
    content, people = sample(), crew()

    def act() -> None:
        once = sign_first(render_record(content), technician_stamp(), people.technician)
        sign_second(once, reviewer_stamp(), people.reviewer)

    return act


def _floor() -> Callable[[], object]:
    """The same HTML drawn as the same kind of PDF, and signed twice without a look of its own."""
    html, people = record_html(sample()), crew()

    def act() -> None:
        from weasyprint import CSS, HTML

        fetcher = memory_fetcher()
        size = template_bytes("record-a4.css").decode()
        sheets = [CSS(string=text, url_fetcher=fetcher) for text in (font_faces(), size)]
        with quiet("weasyprint", "fontTools"):
            page = HTML(string=html, url_fetcher=fetcher)
            pdf: Any = page.write_pdf(stylesheets=sheets, pdf_variant="pdf/a-3u")
        for signer in (people.technician, people.reviewer):
            pdf = _signed(pdf, signer)

    return act


def _signed(pdf: bytes, signer: Signer) -> bytes:
    from pyhanko.pdf_utils.incremental_writer import IncrementalPdfFileWriter
    from pyhanko.sign.signers import PdfSignatureMetadata, sign_pdf

    from gaugelog.documents.hanko import KeySigner

    meta = PdfSignatureMetadata(field_name=signer.person, md_algorithm="sha256")
    with quiet():
        out = sign_pdf(IncrementalPdfFileWriter(io.BytesIO(pdf)), meta, KeySigner(signer))
    return bytes(out.getvalue())


def test_a_signed_record_takes_at_most_a_fifth_longer_than_drawing_and_signing(
    capsys: pytest.CaptureFixture[str],
) -> None:
    found = compare(_ours(), _floor(), repeats=9)
    with capsys.disabled():
        print("\n" + found.line("a record drawn and signed twice"))
    assert found.ratio <= 1.2
