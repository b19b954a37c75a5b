"""Foreign judges of the record as a file: qpdf, Poppler's tools, and a check of PDF/A-3u."""

from __future__ import annotations

import io
import json
import re
import subprocess
from collections.abc import Callable
from pathlib import Path

import pikepdf
import pytest
from jsonschema import Draft202012Validator

from gaugelog.documents.render import render_record
from gaugelog.documents.schema import shipped_schema
from gaugelog.ledger.campaign import Paper
from tests.documents.drawn import accepted, draft, drawing, submitted
from tests.documents.sample import HEAD, sample
from tests.foreign import needs
from tests.outside.pdfa import troubles

pytestmark = pytest.mark.xdist_group("record")
STAGES: dict[str, Callable[[], bytes]] = {
    "unsigned": lambda: drawing().pdf,
    "draft": draft,
    "submitted": submitted,
    "accepted": accepted,
}
each_stage = pytest.mark.parametrize("stage", STAGES)


def _file(folder: Path, pdf: bytes) -> Path:
    path = folder / "record.pdf"
    path.write_bytes(pdf)
    return path


def _run(*arguments: str | Path) -> str:
    done = subprocess.run(arguments, capture_output=True, text=True, check=False)
    assert 0 == done.returncode, done.stdout + done.stderr
    return done.stdout


@needs("qpdf")
@each_stage
def test_qpdf_finds_no_fault(stage: str, tmp_path: Path) -> None:
    said = _run("qpdf", "--check", _file(tmp_path, STAGES[stage]()))
    assert "No syntax or stream encoding errors found" in said
    assert "WARNING" not in said


@each_stage
def test_the_record_meets_our_check_of_pdf_a(stage: str) -> None:
    assert [] == troubles(STAGES[stage]())


def test_our_check_of_pdf_a_finds_a_font_left_out_and_a_doubled_attachment() -> None:
    with pikepdf.open(io.BytesIO(submitted())) as opened:
        opened.Root.AF = pikepdf.Array([*opened.Root.AF, *opened.Root.AF])
        for each in opened.objects:
            if isinstance(each, pikepdf.Dictionary) and each.get("/Type") == "/FontDescriptor":
                del each["/FontFile2"]
        del opened.Root["/OutputIntents"]
        broken = io.BytesIO()
        opened.save(broken)
    said = " ".join(troubles(broken.getvalue()))
    assert "is not embedded" in said
    assert "listed twice" in said
    assert "output intent" in said


@needs("pdffonts")
@each_stage
def test_every_font_is_embedded_as_a_subset_with_unicode(stage: str, tmp_path: Path) -> None:
    rows = _run("pdffonts", _file(tmp_path, STAGES[stage]())).splitlines()[2:]
    assert rows
    for row in rows:
        assert ["yes", "yes", "yes"] == row.split()[-5:-2], row
    names = [row.split()[0] for row in rows]
    assert sorted(set(names)) == sorted(names)


@needs("pdfdetach")
def test_the_data_comes_back_and_fits_its_schema(tmp_path: Path) -> None:
    out = tmp_path / "record.json"
    _run("pdfdetach", "-save", "1", "-o", out, _file(tmp_path, accepted()))
    data = json.loads(out.read_text("utf-8"))
    assert [] == list(Draft202012Validator(shipped_schema()).iter_errors(data))
    assert json.loads(sample().model_dump_json()) == data


@needs("pdfdetach")
def test_there_is_one_attachment_and_it_is_data(tmp_path: Path) -> None:
    said = _run("pdfdetach", "-list", _file(tmp_path, accepted()))
    assert ["1 embedded files", "1: record.json"] == said.split("\n")[:2]
    with pikepdf.open(io.BytesIO(accepted())) as opened:
        assert ["/Data"] == [str(each.AFRelationship) for each in opened.Root.AF]


@needs("pdftotext")
def test_each_page_bears_its_number_the_record_and_the_head(tmp_path: Path) -> None:
    pages = _pages(tmp_path, accepted())
    for number, page in enumerate(pages, start=1):
        assert f"Page {number} of {len(pages)}" in page
        assert "Record FB7-P1-R1" in page
        assert f"Journal head {HEAD}" in page
        assert "Valid only with both signatures" in page


@needs("pdftotext")
def test_each_page_of_a_draft_is_marked(tmp_path: Path) -> None:
    for page in _pages(tmp_path, draft()):
        # Once as the watermark, once in words at the head of the page.
        assert page.count("DRAFT") >= 2
        assert "not signed" in page


@needs("pdftotext")
def test_both_stamps_show_name_time_meaning_and_head(tmp_path: Path) -> None:
    last = " ".join(_pages(tmp_path, accepted())[-1].split())
    for words in (
        "Tamsin Okondo-Havlíčková t.okondo I did the work recorded here",
        "2026-12-01 15:42:10 UTC+01:00",
        "Wiebke Brandt-Ilesanmi w.brandt I reviewed this record",
        "2026-12-02 09:15:00 UTC+01:00",
        "Journal head 147:Q3M7XK2ZB4WA5N6RTYC2DHEJPL",
    ):
        assert words in last


@needs("pdftotext")
def test_a_submitted_record_has_an_empty_box_for_the_reviewer(tmp_path: Path) -> None:
    last = _pages(tmp_path, submitted())[-1]
    assert "Tamsin Okondo-Havlíčková" in last
    assert "w.brandt I reviewed" not in " ".join(last.split())


@needs("pdftotext")
def test_no_word_runs_over_the_margins(tmp_path: Path) -> None:
    campaign = {**sample().campaign.model_dump(), "client": _LONG, "title": _LONG * 2}
    people = [{**person.model_dump(), "name": _LONG} for person in sample().people]
    readings = [
        {**each.model_dump(), "reason": _LONG, "typed": "12.34567890123 Gohm"}
        for each in sample().readings
    ]
    content = sample(campaign=campaign, people=people, readings=readings, number="X-" * 14 + "R1")
    papers: tuple[tuple[Paper, float], ...] = (("a4", 595.3), ("letter", 612.0))
    for paper, width in papers:
        path = _file(tmp_path, render_record(content, paper).pdf)
        words = _run("pdftotext", "-bbox", path, "-")
        spans = re.findall(r'<word xMin="([\d.-]+)" yMin="[\d.-]+" xMax="([\d.-]+)"', words)
        assert 300 < len(spans)
        assert _MARGIN - 1 <= min(float(left) for left, _ in spans)
        assert width - _MARGIN + 1 >= max(float(right) for _, right in spans)


_LONG = "Überlandleitungsbaugesellschaftsvorstandsvorsitzendenstellvertreterin"
_MARGIN = 16 * 72 / 25.4


def _pages(folder: Path, pdf: bytes) -> list[str]:
    said = _run("pdftotext", "-raw", _file(folder, pdf), "-")
    return said.rstrip("\f").split("\f")
