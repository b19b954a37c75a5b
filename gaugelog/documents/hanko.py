"""What the signing library needs of us: our key, our clock, our look. Loaded when signing only."""

from __future__ import annotations

import binascii
import io
import uuid
from datetime import datetime
from typing import Any

from asn1crypto import x509
from pyhanko.pdf_utils.content import PdfContent
from pyhanko.pdf_utils.layout import AxisAlignment, BoxConstraints, Margins, SimpleBoxLayoutRule
from pyhanko.pdf_utils.reader import PdfFileReader
from pyhanko.sign.signers import PdfSigner
from pyhanko.sign.signers.pdf_cms import Signer as CmsSigner
from pyhanko.stamp import StaticStampStyle
from pyhanko_certvalidator.registry import SimpleCertificateStore

from gaugelog.journal.keys import Signer

_P256_SIGNATURE_LIMIT = 72
"""Longest DER of an ECDSA P-256 signature."""


class KeySigner(CmsSigner):
    """Signs with a `Signer`, which keeps its key to itself."""

    def __init__(self, signer: Signer) -> None:
        store = SimpleCertificateStore()  # type: ignore[no-untyped-call]
        store.register_multiple(x509.Certificate.load(each) for each in signer.chain)
        super().__init__(
            signing_cert=x509.Certificate.load(signer.certificate),
            cert_registry=store,
            embed_roots=True,
        )
        self._signer = signer

    async def async_sign_raw(
        self, data: bytes, digest_algorithm: str, dry_run: bool = False
    ) -> bytes:
        """The signature over `data`; in a dry run as many bytes as it may take."""
        if dry_run:
            return bytes(_P256_SIGNATURE_LIMIT)
        if digest_algorithm != "sha256":
            raise ValueError(f"A person's key signs with SHA-256, not {digest_algorithm}.")
        return self._signer.sign(data)


class TimedPdfSigner(PdfSigner):
    """Signs at a moment that is handed in, not at the machine's own time."""

    def __init__(self, *arguments: Any, at: datetime, **named: Any) -> None:
        super().__init__(*arguments, **named)
        self._at = at

    def init_signing_session(self, *arguments: Any, **named: Any) -> Any:
        """The library's session with its time set."""
        session = super().init_signing_session(*arguments, **named)
        session.system_time = self._at
        return session


class _Page(PdfContent):
    """The first page of a PDF in memory, to be put into another."""

    def __init__(self, pdf: bytes) -> None:
        super().__init__()
        self._reader = PdfFileReader(io.BytesIO(pdf))

    def render(self) -> bytes:
        """The operator that paints the page."""
        page = self._ensure_writer.import_page_as_xobject(self._reader)
        name = f"/Stamp{binascii.hexlify(uuid.uuid4().bytes).decode()}"
        self.resources.xobject[name] = page
        left, bottom, right, top = page.get_object()["/BBox"]
        self.box = BoxConstraints(width=right - left, height=top - bottom)
        return name.encode() + b" Do"


def stamp_style(pdf: bytes) -> StaticStampStyle:
    """A stamp that shows the page as it is: no border, no transparency, no font of its own."""
    return StaticStampStyle(
        border_width=0,
        background=_Page(pdf),
        background_opacity=1.0,
        background_layout=SimpleBoxLayoutRule(
            x_align=AxisAlignment.ALIGN_MIN, y_align=AxisAlignment.ALIGN_MIN, margins=Margins()
        ),
    )
