"""Signatures on the record: two fields, the technician's first, the reviewer's as an increment.

The first signature certifies the file and permits nothing but filling the second field. Both are
PAdES (ETSI EN 319 142-1) with ECDSA P-256; the key never leaves its `Signer`. No network is used.
"""

from __future__ import annotations

import asyncio
import io
from collections.abc import Coroutine
from concurrent.futures import ThreadPoolExecutor
from typing import TYPE_CHECKING, Any, TypeVar

from gaugelog.documents.quiet import quiet
from gaugelog.documents.render import Drawing, FieldBox
from gaugelog.documents.stamp import render_stamp
from gaugelog.errors import Refused
from gaugelog.journal.keys import Signer
from gaugelog.work.ports import Stamp

if TYPE_CHECKING:
    from pyhanko.pdf_utils.incremental_writer import IncrementalPdfFileWriter

TECHNICIAN, REVIEWER = "technician", "reviewer"
_T = TypeVar("_T")


def sign_first(drawing: Drawing, stamp: Stamp, signer: Signer) -> bytes:
    """The drawn record with both fields made and the technician's filled.

    The signature certifies the file: from here on only the reviewer's field may be filled.
    """
    writer = _writer(_with_fields(drawing))
    return _sign(writer, TECHNICIAN, drawing.boxes[TECHNICIAN], stamp, signer)


def sign_second(pdf: bytes, stamp: Stamp, signer: Signer) -> bytes:
    """The record with the reviewer's field filled as an increment; the first bytes stay.

    Raises Refused when the file has no such field, it is filled already, or it is no PDF.
    """
    box = open_field(pdf, REVIEWER)
    return _sign(_writer(pdf), REVIEWER, box, stamp, signer)


def open_field(pdf: bytes, name: str) -> FieldBox:
    """Where the empty signature field `name` is. Raises Refused when there is none to fill."""
    with quiet():
        for found, value, rectangle in _fields(pdf):
            if found == name and value is None:
                left, bottom, right, top = rectangle
                return FieldBox(0, left, bottom, right, top)
    raise Refused(
        f"The record has no empty field for the {name}'s signature.",
        "Ask for the signed record; a file is never signed twice in one place.",
    )


def _fields(pdf: bytes) -> list[tuple[str, object, list[float]]]:
    """Name, value and rectangle of each signature field. Foreign bytes may break the reader."""
    from pyhanko.pdf_utils.reader import PdfFileReader
    from pyhanko.sign.fields import enumerate_sig_fields

    try:
        reader = PdfFileReader(io.BytesIO(pdf))
        return [
            (name, value, [float(each) for each in reference.get_object()["/Rect"]])
            for name, value, reference in enumerate_sig_fields(reader)
        ]
    except Exception as error:
        raise Refused(
            "The file is not a PDF that can be signed.", "Ask for the signed record again."
        ) from error


def _with_fields(drawing: Drawing) -> bytes:
    from pyhanko.sign.fields import SigFieldSpec, append_signature_field

    writer = _writer(drawing.pdf)
    for name in (TECHNICIAN, REVIEWER):
        box = drawing.boxes[name]
        append_signature_field(
            writer,
            SigFieldSpec(
                name,
                on_page=box.page,
                box=box.whole,
                readable_field_name=f"Signature of the {name}",
            ),
        )
    out = io.BytesIO()
    writer.write(out)  # type: ignore[no-untyped-call]
    return out.getvalue()


def _writer(pdf: bytes) -> IncrementalPdfFileWriter:
    from pyhanko.pdf_utils.incremental_writer import IncrementalPdfFileWriter

    return IncrementalPdfFileWriter(io.BytesIO(pdf))


def _sign(
    writer: IncrementalPdfFileWriter, field: str, box: FieldBox, stamp: Stamp, signer: Signer
) -> bytes:
    from pyhanko.sign.fields import MDPPerm, SigSeedSubFilter
    from pyhanko.sign.signers import PdfSignatureMetadata

    from gaugelog.documents.hanko import KeySigner, TimedPdfSigner, stamp_style

    meta = PdfSignatureMetadata(
        field_name=field,
        md_algorithm="sha256",
        reason=stamp.meaning,
        name=stamp.name,
        subfilter=SigSeedSubFilter.PADES,
        certify=field == TECHNICIAN,
        docmdp_permissions=MDPPerm.FILL_FORMS,
    )
    look = stamp_style(render_stamp(stamp, signer.fingerprint, box))
    hand = TimedPdfSigner(meta, KeySigner(signer), stamp_style=look, at=stamp.moment.local)
    with quiet():
        signed = _apart(hand.async_sign_pdf(writer, existing_fields_only=True))
    return bytes(signed.getvalue())


def _apart(work: Coroutine[Any, Any, _T]) -> _T:
    """Run a coroutine in a thread of its own, so that a running event loop does not mind."""
    with ThreadPoolExecutor(max_workers=1) as pool:
        return pool.submit(asyncio.run, work).result()
