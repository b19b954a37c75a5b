from __future__ import annotations

import io
import sys

import pikepdf
import pytest

from gaugelog.documents.render import UnfitPage, draw, render_record
from gaugelog.errors import ExitCode, MachineTrouble
from tests.documents.drawn import draft_drawing, drawing
from tests.documents.sample import readings, sample, steps

pytestmark = pytest.mark.xdist_group("record")
MM = 72 / 25.4


def _size(pdf: bytes) -> tuple[float, float]:
    with pikepdf.open(io.BytesIO(pdf)) as opened:
        _, _, width, height = (float(each) for each in opened.pages[0].MediaBox)
    return round(width / MM), round(height / MM)


def test_the_same_content_gives_the_same_bytes() -> None:
    assert drawing().pdf == render_record(sample()).pdf


def test_another_content_gives_another_identifier() -> None:
    other = render_record(sample(revision=2)).pdf
    with pikepdf.open(io.BytesIO(other)) as one, pikepdf.open(io.BytesIO(drawing().pdf)) as two:
        assert bytes(one.trailer.ID[0]) != bytes(two.trailer.ID[0])


def test_pages_are_a4_unless_letter_is_asked_for() -> None:
    assert (210, 297) == _size(drawing().pdf)
    assert (216, 279) == _size(render_record(sample(), "letter").pdf)


def test_both_signatures_have_a_box_on_the_last_page() -> None:
    boxes = drawing().boxes
    assert {"technician", "reviewer"} == set(boxes)
    for box in boxes.values():
        assert drawing().pages - 1 == box.page
        assert 80 * MM < box.width < 90 * MM
        assert 0 < box.bottom < box.top < 297 * MM
    assert boxes["technician"].right < boxes["reviewer"].left


def test_a_draft_has_no_box() -> None:
    assert {} == draft_drawing().boxes
    assert draft_drawing().pdf.startswith(b"%PDF-1.7")


def test_long_names_stay_inside_their_cells() -> None:
    long = "Überlandleitungsbaugesellschaftsvorstandsvorsitzendenstellvertreterin"
    campaign = {**sample().campaign.model_dump(), "client": long, "title": long * 3}
    drawn = render_record(sample(campaign=campaign))
    assert 3 <= drawn.pages <= 4


def test_many_readings_run_over_pages_and_the_boxes_stay_whole() -> None:
    many = [{**reading, "id": f"{n}-{reading['id']}"} for n in range(12) for reading in readings()]
    drawn = render_record(sample(readings=many, steps=steps() * 3))
    assert 5 < drawn.pages
    assert {drawn.pages - 1} == {box.page for box in drawn.boxes.values()}


def test_a_missing_glyph_is_never_passed_on() -> None:
    with pytest.raises(UnfitPage):
        draw("<p>\ue123</p>", "@page { size: A5 }", [])


def test_drawing_says_nothing_on_the_terminal(capfd: pytest.CaptureFixture[str]) -> None:
    draw("<p style='colour: 3'>x</p><img src='file:///x'>", "@page { size: A5 }", [])
    assert ("", "") == capfd.readouterr()


def test_without_pango_the_packages_to_install_are_named(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setitem(sys.modules, "weasyprint", None)
    with pytest.raises(MachineTrouble) as caught:
        render_record(sample())
    assert ExitCode.MACHINE == caught.value.exit_code
    for system in ("Debian", "Fedora", "macOS", "Windows"):
        assert system in caught.value.remedy
