from __future__ import annotations

import pytest
from markupsafe import escape

from gaugelog.documents.fonts import FONTS, TEXT, WIDE, Lettering, drawable
from gaugelog.documents.render import draw
from gaugelog.documents.shipped import templates
from gaugelog.ledger.base import SYMBOLS

OURS = "ΩµνεαΔ°±≥≤×·−–—“”’‘…²³‹›→\u00a0\u202f"


def test_every_letter_of_our_own_can_be_drawn() -> None:
    texts = [OURS, *SYMBOLS.values()]
    texts += [(templates() / name).read_text("utf-8") for name in ("record.html", "stamp.html")]
    assert set() == {char for text in texts for char in text if char != "\n"} - {
        chr(point) for point in drawable()
    }


def test_european_names_can_be_drawn() -> None:
    lettering = Lettering()
    for name in ("Łukasz Żółć", "Þóra Ægisdóttir", "Γεωργία", "Дмитро Їжак", "Đặng Ngọc Hân"):
        assert name == lettering(name)
    assert set() == lettering.missing


def test_a_letter_no_font_has_is_shown_by_its_code_point_and_remembered() -> None:
    lettering = Lettering()
    assert "‹U+6F22› lot" == lettering("漢 lot")
    assert {"漢"} == lettering.missing


def test_unseen_and_turning_characters_become_visible() -> None:
    lettering = Lettering()
    assert "a‹U+202E›b‹U+200B›c‹U+001B›" == lettering("a\u202eb\u200bc\x1b")
    assert set() == lettering.missing


def test_each_font_has_its_licence_beside_it() -> None:
    for font in FONTS:
        family = font.file.partition("-")[0].removesuffix(".ttf")
        licence = templates() / "fonts" / f"{family}-LICENSE.txt"
        assert "Permission is hereby granted" in licence.read_text("utf-8") or "OFL" in (
            licence.read_text("utf-8")
        )


@pytest.mark.parametrize("style", ["font-style: italic", "font-weight: 500", "font-weight: 600"])
def test_every_letter_that_is_called_drawable_is_drawn(style: str) -> None:
    letters = " ".join(Lettering()(chr(point)) for point in sorted(drawable()))
    page = f'<p style="font-family: {TEXT}, {WIDE}; {style}">{escape(letters)}</p>'
    assert 1 <= draw(page, "@page { size: A4 }", []).pages
