"""A check of PDF/A-3u of our own, for the points that a drawn and signed record could miss.

By ISO 19005-3:2012: an output intent (6.2.3), XMP that claims part 3 level U (6.6.4), every font
embedded with a map to Unicode (6.2.11.4, 6.2.11.7), pictures not smoothed (6.2.8),
widgets printed and with an appearance (6.3.2, 6.3.3), attachments with a relationship and listed
once (6.8), no encryption, no script (6.1.3, 6.5.1). Clause numbers are from memory.
"""

from __future__ import annotations

import io
from collections.abc import Iterator
from typing import Any

import pikepdf

_PRINT, _HIDDEN, _INVISIBLE, _NO_VIEW = 4, 2, 1, 32
_FORBIDDEN = ("/JavaScript", "/Launch", "/Sound", "/Movie", "/ImportData", "/ResetForm")


def troubles(pdf: bytes) -> list[str]:
    """What in the file breaks the points above; empty when all is well."""
    with pikepdf.open(io.BytesIO(pdf)) as opened:
        return [
            *_intent(opened),
            *_claim(opened),
            *_fonts(opened),
            *_widgets(opened),
            *_attachments(opened),
            *_actions(opened),
            *_pictures(opened),
        ]


def _intent(opened: pikepdf.Pdf) -> Iterator[str]:
    intents = list(opened.Root.get("/OutputIntents", []))
    if ["/GTS_PDFA1"] != [str(each.S) for each in intents]:
        yield "there is not one PDF/A output intent"
    elif intents[0].DestOutputProfile.read_bytes()[36:40] != b"acsp":
        yield "the output intent has no colour profile"
    if opened.is_encrypted:
        yield "the file is encrypted"


def _claim(opened: pikepdf.Pdf) -> Iterator[str]:
    with opened.open_metadata() as xmp:
        claim = (xmp.get("pdfaid:part"), xmp.get("pdfaid:conformance"))
    if claim != ("3", "U"):
        yield f"the metadata claim {claim}"
    if "/Filter" in opened.Root.Metadata:
        yield "the metadata stream is compressed"


def _dictionaries(opened: pikepdf.Pdf) -> Iterator[Any]:
    for each in opened.objects:
        if isinstance(each, pikepdf.Dictionary | pikepdf.Stream):
            yield each


def _fonts(opened: pikepdf.Pdf) -> Iterator[str]:
    tags: dict[str, bytes] = {}
    for each in _dictionaries(opened):
        if each.get("/Type") == "/FontDescriptor":
            program = each.get("/FontFile2", each.get("/FontFile3"))
            name = str(each.FontName)
            if program is None:
                yield f"font {name} is not embedded"
            elif tags.setdefault(name, program.read_bytes()) != program.read_bytes():
                yield f"two subsets bear the name {name}"
        if each.get("/Type") == "/Font":
            if each.Subtype not in {"/Type0", "/CIDFontType2", "/CIDFontType0"}:
                yield f"font {each.get('/BaseFont')} is of type {each.Subtype}"
            if each.Subtype == "/Type0" and "/ToUnicode" not in each:
                yield f"font {each.BaseFont} has no map to Unicode"


def _widgets(opened: pikepdf.Pdf) -> Iterator[str]:
    for page in opened.pages:
        for note in page.get("/Annots", []):
            if note.Subtype != "/Widget":
                continue
            flags = int(note.get("/F", 0))
            if not flags & _PRINT or flags & (_HIDDEN | _INVISIBLE | _NO_VIEW):
                yield f"field {note.T} is not printed (flags {flags})"
            if "/AP" not in note or list(note.AP.keys()) != ["/N"]:
                yield f"field {note.T} has no plain appearance"
            if "/A" in note or "/AA" in note:
                yield f"field {note.T} acts"
    if "/AcroForm" in opened.Root and bool(opened.Root.AcroForm.get("/NeedAppearances", False)):
        yield "appearances are left to the viewer"


def _attachments(opened: pikepdf.Pdf) -> Iterator[str]:
    listed = [each.objgen for each in opened.Root.get("/AF", [])]
    if len(set(listed)) != len(listed):
        yield "an attachment is listed twice"
    for each in _dictionaries(opened):
        if each.get("/Type") == "/Filespec":
            if each.objgen not in listed:
                yield f"attachment {each.UF} is not among the associated files"
            if "/AFRelationship" not in each or "/UF" not in each or "/F" not in each:
                yield "an attachment lacks its relationship or name"
            if "/Subtype" not in each.EF.F:
                yield f"attachment {each.UF} has no media type"


def _actions(opened: pikepdf.Pdf) -> Iterator[str]:
    for each in _dictionaries(opened):
        if str(each.get("/S")) in _FORBIDDEN or "/JS" in each:
            yield f"the file acts: {each.get('/S')}"
        if each.get("/Type") == "/ExtGState" and str(each.get("/TR", "")):
            yield "a transfer function is used"


def _pictures(opened: pikepdf.Pdf) -> Iterator[str]:
    for each in _dictionaries(opened):
        if each.get("/Subtype") == "/Image" and each.get("/Interpolate", False):
            yield "a picture is smoothed"
