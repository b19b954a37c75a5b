"""Foreign text is shown, never obeyed."""

from __future__ import annotations

import unicodedata

import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.visible import visible


@pytest.mark.parametrize(
    ("typed", "shown"),
    [
        ("plain Ω µm/m 工程", "plain Ω µm/m 工程"),
        ("\x1b[31mred", "‹U+001B›[31mred"),
        ("\x9b31m", "‹U+009B›31m"),
        ("right\u202eleft", "right‹U+202E›left"),
        ("zero\u200bwidth", "zero‹U+200B›width"),
        ("line\u2028end", "line‹U+2028›end"),
        ("tab\tbell\a", "tab‹U+0009›bell‹U+0007›"),
        ("lone\ud800", "lone‹U+D800›"),
        ("", ""),
    ],
)
def test_characters_that_could_act_are_named(typed: str, shown: str) -> None:
    assert shown == visible(typed)


def test_a_line_feed_stays_only_when_asked() -> None:
    assert visible("a\nb", keep_newlines=True) == "a\nb"
    assert visible("a\nb") == "a‹U+000A›b"


@given(st.text())
def test_nothing_unseen_is_ever_left(text: str) -> None:
    unseen = {"Cc", "Cf", "Cs", "Co", "Cn", "Zl", "Zp"}
    assert not any(unicodedata.category(char) in unseen for char in visible(text))


@given(st.text())
def test_showing_twice_changes_nothing(text: str) -> None:
    assert visible(text) == visible(visible(text))
