"""Last touches on a drawn PDF that the drawing library leaves out."""

from __future__ import annotations

import hashlib
import io
from typing import TYPE_CHECKING, Any

if TYPE_CHECKING:
    import pikepdf

_LETTERS = 26
_TAG_LENGTH = 6


def finished(pdf: bytes) -> bytes:
    """The file with its attachments and font subsets named as the standards ask.

    Each attachment is listed once among the catalog's associated files (ISO 19005-3, 6.8), and
    each subset of a font has a tag of its own (ISO 32000-1, 9.6.4). The file's identifier is
    made from its content, so that equal content gives equal bytes.
    """
    import pikepdf

    with pikepdf.open(io.BytesIO(pdf)) as opened:
        _list_once(opened)
        for each in opened.objects:
            if isinstance(each, pikepdf.Dictionary) and "/DescendantFonts" in each:
                _tag_subset(each)
        out = io.BytesIO()
        opened.save(out, deterministic_id=True, object_stream_mode=pikepdf.ObjectStreamMode.disable)
    return out.getvalue()


def _list_once(opened: pikepdf.Pdf) -> None:
    import pikepdf

    if "/AF" in opened.Root:
        once = {each.objgen: each for each in opened.Root.AF}
        opened.Root.AF = pikepdf.Array(list(once.values()))


def _tag_subset(font: Any) -> None:
    """Name a composite font by the content of its subset: a stamp's font differs from a page's."""
    import pikepdf

    descendant = font.DescendantFonts[0]
    descriptor = descendant.FontDescriptor
    program = next(descriptor[name] for name in ("/FontFile2", "/FontFile3") if name in descriptor)
    plain = str(font.BaseFont).partition("+")[2] or str(font.BaseFont).lstrip("/")
    name = pikepdf.Name(f"/{_tag(bytes(program.read_bytes()))}+{plain}")
    font.BaseFont = descendant.BaseFont = descriptor.FontName = name


def _tag(data: bytes) -> str:
    digest = hashlib.sha256(data).digest()
    return "".join(chr(ord("A") + byte % _LETTERS) for byte in digest[:_TAG_LENGTH])
