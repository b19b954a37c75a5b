"""Tables are read as RFC 4180 describes them, section 2, rule by rule; and as spreadsheets save."""

from __future__ import annotations

import pytest

from gaugelog.intake.fields import Gathered
from gaugelog.intake.tables import Columns, rows_of

COLUMNS = Columns(needed=("aaa", "bbb", "ccc"))

# RFC 4180 (October 2005), section 2, rules 1 to 7; each example with the row it must give.
RFC_4180 = {
    "rule 1, lines end in CRLF": ("aaa,bbb,ccc\r\nzzz,yyy,xxx\r\n", ("zzz", "yyy", "xxx")),
    "rule 2, the last line may lack its end": (
        "aaa,bbb,ccc\r\nzzz,yyy,xxx",
        ("zzz", "yyy", "xxx"),
    ),
    "rule 5, fields may be quoted": (
        '"aaa","bbb","ccc"\r\n"zzz","yyy","xxx"\r\n',
        ("zzz", "yyy", "xxx"),
    ),
    "rule 6, quoted line breaks": (
        'aaa,bbb,ccc\r\n"zzz","y\r\nyy","xxx"\r\n',
        ("zzz", "y\nyy", "xxx"),
    ),
    "rule 6, quoted commas": ('aaa,bbb,ccc\r\n"z,z",yyy,xxx\r\n', ("z,z", "yyy", "xxx")),
    "rule 7, doubled quotation marks": (
        'aaa,bbb,ccc\r\n"z""zz",yyy,xxx\r\n',
        ('z"zz', "yyy", "xxx"),
    ),
}


@pytest.mark.parametrize("rule", RFC_4180)
def test_each_rule_of_the_rfc(rule: str) -> None:
    text, expected = RFC_4180[rule]
    faults: Gathered = []
    (row,) = rows_of("f.csv", text.encode(), COLUMNS, faults)
    assert expected == (row.text("aaa"), row.text("bbb"), row.text("ccc"))
    assert [] == faults


def test_spaces_about_a_cell_are_no_part_of_it() -> None:
    # RFC 4180 rule 4 keeps them; people who fill tables by hand never mean them: common practice
    (row,) = rows_of("f.csv", b"aaa, bbb ,ccc\n zzz ,yyy,xxx\n", COLUMNS, [])
    assert ("zzz", "yyy") == (row.text("aaa"), row.text("bbb"))


@pytest.mark.parametrize("end", ["\n", "\r\n", "\r"])
def test_line_ends_of_every_system_are_read(end: str) -> None:
    # LF, CRLF and CR: Unicode Standard, section 5.8, newline functions (from memory)
    rows = rows_of("f.csv", end.join(["aaa,bbb,ccc", "1,2,3", "4,5,6"]).encode(), COLUMNS, [])
    assert ["1", "4"] == [row.text("aaa") for row in rows]
