"""Foreign text on the screen is text: no markup, no escape sequence, nothing turned round."""

from __future__ import annotations

import json
from pathlib import Path
from typing import Any

import pytest
from textual import events

from gaugelog.errors import Fault, Faulty, Refused
from gaugelog.screens.drafts import Draft, Drafts
from gaugelog.screens.step import StepScreen
from gaugelog.screens.words import Words, plain, told
from tests.screens.conftest import At
from tests.screens.pilot import LARGE, Seen, run_screen

HOSTILE = "[bold red]x[/] \x1b[31m \u202e :smile:"
SHOWN = "[bold red]x[/] ‹U+001B›[31m ‹U+202E› :smile:"


def test_markup_in_a_piece_of_text_stays_as_typed() -> None:
    assert SHOWN == Words(HOSTILE).text
    assert [] == list(plain(HOSTILE).spans)
    assert SHOWN in told(Refused(HOSTILE, HOSTILE)).plain
    assert SHOWN in told(Faulty([Fault(HOSTILE, HOSTILE)])).plain


def test_what_is_pasted_is_made_visible_where_it_stands(at: At) -> None:
    async def play(seen: Seen) -> None:
        await seen.sign_on()
        await seen.type(HOSTILE, enter=False)
        assert "[[bold red]x[/] ‹U+001B›[31m ‹U+202E› :smile:" in seen.text()
        await seen.keys("enter")
        assert f"No point is called “{SHOWN}”." in seen.text()
        await seen.keys("escape")
        await seen.type("FB-1")
        await seen.type(HOSTILE)
        assert "‹U+001B›" in seen.text()
        assert "\x1b" not in seen.text()

    job = at(1)
    run_screen(job.book, job.folder, play, size=LARGE)


def test_a_note_with_markup_is_told_as_it_was_typed(at: At) -> None:
    async def play(seen: Seen) -> None:
        await seen.sign_on()
        await seen.type("FB-1")
        await seen.keys("ctrl+l")
        await seen.type("[red]look[/] \\[here]")
        assert "[red]look[/] \\[here]" in seen.text()

    job = at(7)
    run_screen(job.book, job.folder, play, size=LARGE)


def test_a_secret_is_never_shown_and_never_changed(at: At) -> None:
    async def play(seen: Seen) -> None:
        await seen.type("t.okoro")
        focused = seen.app.screen.focused
        assert focused is not None
        focused.post_message(events.Paste("long enough"))
        await seen.rest()
        assert "long enough" not in seen.text()
        assert "•••••••••••" in seen.text()

    job = at(0)
    run_screen(job.book, job.folder, play)


@pytest.mark.parametrize(
    "data",
    [
        b"",
        b"\xff\xfe",
        b"[]",
        b"{}",
        b'{"point": 1}',
        json.dumps(
            {"point": "", "step": "", "open": True, "typed": [], "carried": {"a": ["b", "c"]}}
        ).encode(),
    ],
)
def test_a_damaged_draft_is_as_none(tmp_path: Path, data: bytes) -> None:
    (tmp_path / "t.okoro.json").write_bytes(data)
    assert Draft() == Drafts(tmp_path).load("t.okoro")


def test_a_draft_comes_back_as_it_was_and_only_its_owner_may_read_it(tmp_path: Path) -> None:
    drafts = Drafts(tmp_path / "drafts")
    kept = Draft("FB-1", "gauge/x", True, {"gauge": "K7"}, {"instrument/": ("RM-2", _WHEN)})
    assert drafts.save("t.okoro", kept)
    assert kept == drafts.load("t.okoro")
    assert Draft() == drafts.load("q.reyes")
    assert 0o600 == (tmp_path / "drafts" / "t.okoro.json").stat().st_mode & 0o777


def test_a_draft_that_can_not_be_written_is_said_and_stops_nothing(at: At, tmp_path: Path) -> None:
    async def play(seen: Seen) -> None:
        await seen.sign_on()
        await seen.type("FB-1")
        await seen.type("K7-03/1")
        await seen.pilot.pause(0.4)
        assert "What is half typed can't be put away" in seen.text()
        await seen.type("RM-2")
        await seen.type("350.12")
        assert isinstance(seen.room, StepScreen)
        assert "3/23" in seen.text()

    job = at(1)
    blocked = tmp_path / "file"
    blocked.write_text("in the way", encoding="utf-8")
    run_screen(job.book, job.folder, play, drafts=blocked / "drafts")


def test_a_defect_ends_the_screen_without_a_word_of_its_own(
    at: At, capsys: pytest.CaptureFixture[str]
) -> None:
    seen_app: list[Any] = []

    def slip() -> None:
        secret = "long enough"
        raise RuntimeError(f"a slip of {len(secret)}")

    async def play(seen: Seen) -> None:
        seen_app.append(seen.app)
        seen.app.call_later(slip)
        await seen.pilot.pause()

    job = at(0)
    with pytest.raises(RuntimeError, match="a slip of 11"):
        run_screen(job.book, job.folder, play)
    assert isinstance(seen_app[0].defect, RuntimeError)
    told_then = capsys.readouterr()
    assert "long enough" not in told_then.out + told_then.err


_WHEN = "2026-11-17T08:00:00+00:00"
