"""Columns: numbers to the right, nothing wider than the terminal."""

from __future__ import annotations

from hypothesis import given
from hypothesis import strategies as st

from gaugelog.screens.columns import Cell, Column, heading, line, widths

COLUMNS = (Column("what", least=6), Column("left", number=True), Column("state"))


def drawn(rows: list[tuple[str, str, str]], room: int) -> list[str]:
    """A heading and its lines as plain text."""
    cells = [[Cell(text) for text in row] for row in rows]
    wide = widths(COLUMNS, cells, room)
    return [str(heading(COLUMNS, wide)), *(str(line(COLUMNS, row, wide)) for row in cells)]


def test_numbers_stand_under_one_another() -> None:
    assert ["what  left  state", "a        9  ✓    ", "b      120  ✗    "] == drawn(
        [("a", "9", "✓"), ("b", "120", "✗")], 40
    )


def test_what_is_too_wide_is_cut_where_it_may_be() -> None:
    (_, cut) = drawn([("adhesive for gauges", "9", "expired")], 26)
    assert "adhesive f…     9  expired" == cut


def test_a_wide_sign_takes_its_two_cells() -> None:
    head, row = drawn([("漢字", "9", "ok")], 40)
    assert head.index("left") == row.index("9") - 3 + 2  # two characters in four cells


def test_what_can_not_be_seen_is_made_visible() -> None:
    (_, row) = drawn([("a\u202eb", "1", "")], 40)
    assert "\u202e" not in row


@given(st.lists(st.tuples(*[st.text(max_size=40)] * 3), max_size=5), st.integers(60, 140))
def test_every_line_is_as_wide_as_its_columns(rows: list[tuple[str, str, str]], room: int) -> None:
    cells = [[Cell(text) for text in row] for row in rows]
    wide = widths(COLUMNS, cells, room)
    for row in cells:
        assert sum(wide) + 4 == line(COLUMNS, row, wide).cell_length
