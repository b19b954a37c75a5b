"""The wiring map on screen, as CSV, XLSX and PDF: every wire, what is used twice, what is spare."""

from __future__ import annotations

import csv
import io
import json
import re
import shutil
import subprocess
from collections.abc import Callable
from pathlib import Path
from typing import Any

import openpyxl
import pikepdf
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from gaugelog.documents.spreadsheet import csv_bytes, guarded, xlsx_bytes
from gaugelog.documents.wiring_map import wiring_html
from gaugelog.intake.stock import load_stock
from gaugelog.journal.ids import new_id
from gaugelog.work import plan, stock
from gaugelog.work.wiring import wiring_map
from tests.commands.conftest import Command
from tests.foreign import needs
from tests.outside import pdfa
from tests.work.job import DEMO, START, Job, start_job

pytestmark = pytest.mark.xdist_group("wiring")

Change = tuple[str, str, str]
Wired = Callable[..., Job]

SPARE = """
  [[module.channel]]
  label = "10"
  connector = "J3"
  pins = { "supply-" = "7", "signal+" = "8" }
  excitation = "2.5 V"
  range = "10 mV/V"
  completion = "350 ohm"

  [[module.channel]]
  label = "3"
  excitation = "2.5 V"
  range = "10 mV/V"
  completion = "350 ohm"
"""
ONE_CHANNEL: Change = ("circuits.csv", ",M1,2,", ",M1,1,")
ONE_CONNECTOR: Change = ("campaign.toml", 'connector = "J2"', 'connector = "J1"')
ONE_CABLE: Change = ("circuits.csv", ",CB-19,", ",MC-7,")
ONE_MARK: Change = ("circuits.csv", "W2; completion=W3", "W2; completion=w2")


@pytest.fixture
def wired(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> Wired:
    """A logbook with the demo's plan, changed by (file, old, new); it is the current folder."""

    def made(*changes: Change, more: str = "") -> Job:
        job, files = start_job(tmp_path), tmp_path / "plan"
        shutil.copytree(DEMO / "plan", files)
        for name, old, new in changes:
            text = (files / name).read_text(encoding="utf-8")
            assert old in text, old
            (files / name).write_text(text.replace(old, new), encoding="utf-8")
        with (files / "campaign.toml").open("a", encoding="utf-8") as file:
            file.write(more)
        planner = job.keys["c.ward"]
        received = load_stock([DEMO / "lots.csv", DEMO / "consumables.csv"], new_id=new_id)
        stock.receive(job.book, planner, received)
        plan.load(job.book, planner, plan.understand(job.book, files))
        monkeypatch.chdir(job.book.folder)
        return job

    return made


def _table(text: str) -> list[dict[str, str]]:
    return list(csv.DictReader(io.StringIO(text.removeprefix("\ufeff"))))


def _exported(command: Command, name: str, *words: str) -> bytes:
    told = command("wiring", "export", name, *words)
    assert told.code == 0, told.err
    assert f"{name}\n" == told.out
    return Path(name).read_bytes()


def test_each_wire_stands_with_its_pin_and_mark(demo: Path, command: Command) -> None:
    told = command("wiring", "show")
    assert told.code == 0
    assert "girder midspan: x 0 mm, y 0 mm, underside" in told.out
    wire = next(line for line in told.out.splitlines() if line.strip().startswith("C-1   "))
    assert ["C-1", "J1", "supply-", "1", "W1", "CB-19", "18"] == wire.split()


def test_the_screen_table_fits_eighty_columns(demo: Path, command: Command) -> None:
    told = command("wiring", "show")
    assert max(len(line.rstrip()) for line in told.out.splitlines()) <= 80


def test_the_map_is_given_as_json(demo: Path, command: Command) -> None:
    told = json.loads(command("wiring", "show", "--json").out)
    first = told["circuits"][0]
    assert ("C-1", "M1/1", "J1", 18.0) == (
        first["circuit"],
        first["channel"],
        first["connector"],
        first["length_m"],
    )
    assert [{"arm": 1, "grid": "FB-1"}] == [
        {"arm": grid["arm"], "grid": grid["grid"]} for grid in first["grids"]
    ]
    assert {"function": "signal+", "pin": "2", "mark": "W2", "conflict": ""} in first["wires"]
    assert ([], []) == (told["spare"], told["conflicts"])


def test_spare_channels_are_named_in_their_order(wired: Wired, command: Command) -> None:
    wired(more=SPARE)
    told = command("wiring", "show")
    assert "Spare channels: M1/3, M1/10" in told.out
    rows = [row for row in _table(_exported(command, "w.csv").decode()) if row["use"] == "spare"]
    assert [("M1/3", ""), ("M1/10", "supply-"), ("M1/10", "signal+")] == [
        (row["channel"], row["function"]) for row in rows
    ]


def test_a_reels_marks_are_each_circuits_own(wired: Wired, command: Command) -> None:
    wired()
    assert command("wiring", "show").code == 0


CONFLICTS: dict[str, tuple[Change, str]] = {
    "a channel": (ONE_CHANNEL, "channel M1/1: is used by C-1, C-2"),
    "a pin": (ONE_CONNECTOR, "M1, connector J1: pin 2 serves 2 functions, of channel M1/1, M1/2"),
    "a mark in one cable": (ONE_CABLE, "MC-7: the mark W2 stands on C-1 signal+, C-2 signal+"),
    "a mark in one circuit": (
        ONE_MARK,
        "circuit C-1: the mark w2 stands on C-1 completion, C-1 signal+",
    ),
}


@pytest.mark.parametrize("what", CONFLICTS)
def test_what_is_used_twice_is_named(what: str, wired: Wired, command: Command) -> None:
    change, sentence = CONFLICTS[what]
    wired(change)
    told = command("wiring", "show")
    assert told.code == 1
    assert f"✗ {sentence}" in told.out
    rows = _table(_exported(command, "w.csv").decode())
    assert any(sentence in row["conflict"] for row in rows)
    assert sentence in command("wiring", "export", "x.csv").err


def test_only_the_wire_in_question_bears_its_conflict(wired: Wired) -> None:
    job = wired(ONE_MARK)
    first = wiring_map(job.book).circuits[0]
    assert {"signal+", "completion"} == {wire.function for wire in first.wires if wire.conflict}
    assert "" == first.conflict


def test_channels_with_a_common_supply_may_share_its_pin(wired: Wired) -> None:
    job = wired(
        ONE_CONNECTOR,
        ("campaign.toml", 'balance_range = "4 mV/V"', 'supply = "common"'),
    )
    found = wiring_map(job.book).conflicts
    assert ["pin 2", "pin 3"] == sorted(re.findall(r"pin \d", " ".join(found)))


def test_without_a_plan_the_next_command_is_named(
    tmp_path: Path, command: Command, monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.chdir(start_job(tmp_path).book.folder)
    told = command("wiring", "show")
    assert told.code == 4
    assert "gaugelog plan load" in told.err


def test_an_unknown_ending_and_paper_are_named_at_once(demo: Path, command: Command) -> None:
    told = command("wiring", "export", "map.ods", "--paper", "a3")
    assert told.code == 3
    assert "map.ods" in told.err
    assert "a3" in told.err


def test_a_place_that_cannot_be_written_is_told(demo: Path, command: Command) -> None:
    told = command("wiring", "export", "nowhere/map.csv")
    assert told.code == 6
    assert "No such file" in told.err


# CSV and XLSX

HOSTILE = (
    '=HYPERLINK("http://127.0.0.1/x")',
    "@SUM(1+1)",
    "-2+3",
    "+1+1",
    "[bold]x[/bold]",
    "{{7*7}}",
)


@pytest.mark.parametrize("text", HOSTILE)
def test_hostile_text_stays_text_in_every_output(text: str, wired: Wired, command: Command) -> None:
    cell = text.replace('"', '""')
    job = wired(("circuits.csv", "supply-=W1; signal+=W2; completion=W3", f'"supply-={cell}"'))
    shown = command("wiring", "show").out
    assert text in shown
    marks = [row["mark"] for row in _table(_exported(command, "w.csv").decode())]
    assert guarded(text) in marks
    assert text.lstrip("'") == guarded(text).lstrip("'")
    sheet = openpyxl.load_workbook(io.BytesIO(_exported(command, "w.xlsx"))).active
    cells = [each for row in sheet.iter_rows() for each in row]
    assert text in [each.value for each in cells]
    assert {"s", "n", "inlineStr"} >= {each.data_type for each in cells}
    html = wiring_html(wiring_map(job.book), job.clock.now())
    assert "<script" not in html


@given(st.text(max_size=30))
def test_no_csv_cell_is_a_formula(text: str) -> None:
    # The characters a spreadsheet takes for the start of a formula: common practice
    (row,) = csv.reader(io.StringIO(csv_bytes([[text, "end"]]).decode("utf-8-sig")))
    assert "end" == row[1]
    number = re.fullmatch(r"[+-]?(\d+\.?\d*|\.\d+)([eE][+-]?\d+)?", row[0], re.ASCII)
    assert number or not row[0].lstrip().startswith(("=", "+", "-", "@"))
    assert not set(row[0]) & set("\t\r\n\x00\u202e")


@settings(max_examples=30)
@given(st.lists(st.text(max_size=20), min_size=1, max_size=4))
def test_no_xlsx_cell_is_a_formula(texts: list[str]) -> None:
    data = xlsx_bytes("T", [["heading"] * len(texts), texts], START)
    sheet = openpyxl.load_workbook(io.BytesIO(data)).active
    assert all(cell.data_type != "f" for row in sheet.iter_rows() for cell in row)


def test_a_spreadsheet_reads_the_map_back(demo: Path, command: Command) -> None:
    book = openpyxl.load_workbook(io.BytesIO(_exported(command, "w.xlsx")))
    assert ["Wiring"] == book.sheetnames
    heading, *rows = book["Wiring"].iter_rows(values_only=True)
    first = dict(zip(heading, rows[0], strict=True))
    assert ("C-1", "1", "W1", 18) == (
        first["circuit"],
        first["pin"],
        first["mark"],
        first["length_m"],
    )
    assert 6 == len(rows)
    text = _table(_exported(command, "w.csv").decode())
    assert [row["pin"] for row in text] == [row[list(heading).index("pin")] for row in rows]


def test_a_pin_with_a_leading_nought_stays_as_it_is(wired: Wired, command: Command) -> None:
    wired(("campaign.toml", '"supply-" = "1"', '"supply-" = "01"'))
    sheet = openpyxl.load_workbook(io.BytesIO(_exported(command, "w.xlsx"))).active
    assert "01" in [cell.value for row in sheet.iter_rows() for cell in row]


# PDF


def _size(pdf: bytes) -> tuple[int, int]:
    with pikepdf.open(io.BytesIO(pdf)) as opened:
        box: Any = opened.pages[0].MediaBox
        return round(float(box[2]) / 72 * 25.4), round(float(box[3]) / 72 * 25.4)


@pytest.mark.parametrize(("paper", "size"), [("a4", (210, 297)), ("letter", (216, 279))])
def test_the_pages_are_valid_in_both_sizes(
    paper: str, size: tuple[int, int], demo: Path, command: Command
) -> None:
    pdf = _exported(command, "w.pdf", "--paper", paper)
    assert size == _size(pdf)
    assert [] == pdfa.troubles(pdf)


def test_the_pages_carry_their_data(demo: Path, command: Command) -> None:
    with pikepdf.open(io.BytesIO(_exported(command, "w.pdf"))) as opened:
        data = json.loads(opened.attachments["wiring.json"].get_file().read_bytes())
    shown = json.loads(command("wiring", "show", "--json").out)
    assert shown == data


@needs("pdftotext")
def test_a_foreign_reader_finds_every_wire_on_the_page(wired: Wired, command: Command) -> None:
    wired(ONE_CHANNEL, more=SPARE)
    Path("w.pdf").write_bytes(_exported(command, "w.pdf"))
    text = subprocess.run(
        ["pdftotext", "-layout", "w.pdf", "-"], check=True, capture_output=True, text=True
    ).stdout
    for word in ("TARN-BRIDGE", "C-1", "C-2", "FB-1", "completion", "W3", "M1/10", "CB-19"):
        assert word in text
    assert "DRAFT plan, not released" in text
    assert "channel M1/1: is used by C-1, C-2" in text
    assert re.search(r"signal\+\s+2\s+W2", text)
