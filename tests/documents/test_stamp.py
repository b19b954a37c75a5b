from __future__ import annotations

import io
from dataclasses import replace

import pikepdf
import pytest

from gaugelog.documents.render import FieldBox
from gaugelog.documents.stamp import render_stamp
from gaugelog.errors import Refused
from tests.documents.signers import reviewer_stamp

BOX = FieldBox(0, 0, 0, 232, 82)
FINGERPRINT = "ab" * 32


def test_a_stamp_is_one_page_of_the_size_of_its_field() -> None:
    with pikepdf.open(io.BytesIO(render_stamp(reviewer_stamp(), FINGERPRINT, BOX))) as opened:
        assert 1 == len(opened.pages)
        _, _, width, height = (float(each) for each in opened.pages[0].MediaBox)
    assert abs(BOX.width - width) < 0.5
    assert abs(BOX.height - height) < 0.5


def test_a_long_meaning_is_set_smaller_until_it_fits() -> None:
    long = replace(reviewer_stamp(), meaning="I reviewed and accept what is said here. " * 12)
    with pikepdf.open(io.BytesIO(render_stamp(long, FINGERPRINT, BOX))) as opened:
        assert 1 == len(opened.pages)


def test_a_meaning_no_size_can_hold_is_refused() -> None:
    endless = replace(reviewer_stamp(), meaning="I accept. " * 900)
    with pytest.raises(Refused, match="too long"):
        render_stamp(endless, FINGERPRINT, BOX)


def test_a_stamp_has_no_transparency_and_no_font_left_out() -> None:
    with pikepdf.open(io.BytesIO(render_stamp(reviewer_stamp(), FINGERPRINT, BOX))) as opened:
        fonts = [each for each in opened.objects if _is(each, "/FontDescriptor")]
        assert fonts
        assert all("/FontFile2" in font for font in fonts)


def _is(each: object, kind: str) -> bool:
    return isinstance(each, pikepdf.Dictionary) and str(each.get("/Type")) == kind
