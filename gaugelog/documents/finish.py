"""Last touches on a drawn PDF that the drawing library leaves out."""

from __future__ import annotations

import io


def finished(pdf: bytes) -> bytes:
    """The file with each attachment listed once among the catalog's associated files.

    WeasyPrint lists them twice. The file's identifier is made from its content, so that equal
    content gives equal bytes.
    """
    import pikepdf

    with pikepdf.open(io.BytesIO(pdf)) as opened:
        catalog = opened.Root
        if "/AF" in catalog:
            once = {each.objgen: each for each in catalog.AF}
            catalog.AF = pikepdf.Array(list(once.values()))
        out = io.BytesIO()
        opened.save(out, deterministic_id=True, object_stream_mode=pikepdf.ObjectStreamMode.disable)
    return out.getvalue()
