"""CSV files: what is wrong with the table is told, and the cells are looked at all the same."""

from __future__ import annotations

import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.errors import Faulty
from gaugelog.intake.fields import Fields, Gathered
from gaugelog.intake.tables import Columns, rows_of
from gaugelog.intake.texts import tidied
from tests.intake.conftest import faults_of, lines_of

COLUMNS = Columns(needed=("lot", "gauge_factor"), others=("note",))


def read(text: str, faults: Gathered) -> list[Fields]:
    return rows_of("f.csv", text.encode(), COLUMNS, faults)


def lines(text: str) -> list[str]:
    """The faults of a table that has rows."""
    faults: Gathered = []
    for row in read(text, faults):
        row.text("lot")
        row.number("gauge_factor", "1", positive=True)
    return [str(fault) for fault in faults]


def test_a_row_is_named_by_its_place_in_the_spreadsheet() -> None:
    rows = read('lot,gauge_factor,note\nA,2,"two\nlines"\n\nB,2.1,x\n', [])
    assert ["f.csv, row 2", "f.csv, row 4"] == [row.place for row in rows]


def test_columns_may_stand_in_any_order_and_letter_case() -> None:
    (row,) = read("Gauge_Factor, LOT \n2.08,A\n", [])
    assert "A" == row.text("lot")
    assert "2.08" == row.number("gauge_factor", "1").value


def test_gage_is_read_as_gauge() -> None:
    assert [] == lines("lot,gage_factor\nA,2.08\n")


def test_a_missing_column_is_told_once_and_the_others_are_looked_at() -> None:
    assert [
        "f.csv, row 1: has no column lot. Add it; row 1 names the columns.",
        "f.csv, row 3, column gauge_factor: “-1” must be above 0.",
    ] == lines("gauge_factor\n2\n-1\n")


def test_unknown_double_and_empty_columns_are_told_with_their_cell() -> None:
    found = lines("lot,gauge_factor,colour,lot,\nA,2,red,B,\n")
    assert "f.csv, row 1, cell 3: “colour” is no column. Known: lot, gauge_factor, note." in found
    assert "f.csv, row 1, cell 4: lot stands twice." in found
    assert "f.csv, row 1, cell 5: an empty cell is no column." in found[2]


def test_a_decimal_comma_that_splits_a_cell_is_one_fault() -> None:
    (line,) = lines("lot,gauge_factor\nA,2,08\n")
    assert line.startswith("f.csv, row 2: has 3 cells, the heading 2.")
    assert "decimal point" in line


def test_empty_cells_beyond_the_heading_do_no_harm() -> None:
    assert [] == lines("lot,gauge_factor\nA,2,,\n")


def test_a_short_row_lacks_its_last_cells() -> None:
    assert ["f.csv, row 2, column gauge_factor: is missing."] == lines("lot,gauge_factor\nA\n")


@pytest.mark.parametrize(("sign", "word"), [(";", "semicolons"), ("\t", "tabs")])
def test_other_signs_between_cells_are_told(sign: str, word: str) -> None:
    (line,) = lines_of(lambda: read(f"lot{sign}gauge_factor\nA{sign}2\n", []))
    assert f"has {word} between cells. Save it with commas" in line


def test_a_heading_without_rows_is_told() -> None:
    assert (
        "has a heading but no row." == faults_of(lambda: read("lot,gauge_factor\n,\n", []))[0].what
    )


def test_a_quotation_mark_out_of_place_is_told_with_its_line() -> None:
    (fault,) = faults_of(lambda: read('lot,gauge_factor\nA,"2"x\n', []))
    assert "f.csv, line 2" == fault.where


def test_a_quotation_that_never_ends_is_told() -> None:
    (fault,) = faults_of(lambda: read('lot,gauge_factor\n"A,2\n', []))
    assert "is no CSV" in fault.what


cell_texts = st.text(st.characters(exclude_categories=["Cc", "Cs"]), max_size=12)


@given(
    st.lists(
        st.tuples(
            cell_texts,
            cell_texts,
        ),
        min_size=1,
        max_size=6,
    )
)
def test_cells_come_through_as_they_were_quoted(rows: list[tuple[str, str]]) -> None:
    def quoted(cell: str) -> str:
        return '"' + cell.replace('"', '""') + '"'

    text = "lot,note\n" + "".join(f"{quoted(lot)},{quoted(note)}\n" for lot, note in rows)
    kept = [(tidied(lot), tidied(note)) for lot, note in rows if (lot + note).strip()]
    columns = Columns(needed=("lot", "note"))
    try:
        read_rows = rows_of("f.csv", text.encode(), columns, [])
    except Faulty:
        read_rows = []
    taken = [(row.text("lot", needed=False), row.text("note", needed=False)) for row in read_rows]
    assert kept == taken
