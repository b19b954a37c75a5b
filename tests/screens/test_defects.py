"""An error that nobody foresaw is said plainly; the screen stays, and it can be tried again."""

from __future__ import annotations

import pytest

from gaugelog.screens.desk import Desk
from gaugelog.screens.evidence import EvidenceScreen
from gaugelog.screens.worklist import WorklistScreen
from gaugelog.work.reviewing import evidence_of
from tests.screens.conftest import At
from tests.screens.pilot import LARGE, Seen, run_screen
from tests.work.job import WORD


def _full(*_: object, **__: object) -> None:
    raise OSError(28, "No space left on device")


def test_a_dialog_is_not_stuck_by_an_error_of_the_machine(
    at: At, monkeypatch: pytest.MonkeyPatch
) -> None:
    whole = Desk.sign_on

    async def play(seen: Seen) -> None:
        monkeypatch.setattr(Desk, "sign_on", _full)
        await seen.sign_on()
        assert "This is a defect of Gaugelog (OSError" in seen.text()
        assert "Unlocking your key" not in seen.text()
        monkeypatch.setattr(Desk, "sign_on", whole)
        await seen.type(WORD)
        assert isinstance(seen.room, WorklistScreen)

    job = at(0)
    run_screen(job.book, job.folder, play)


def test_a_look_that_fails_is_told_and_the_next_one_shows(
    at: At, monkeypatch: pytest.MonkeyPatch
) -> None:
    async def play(seen: Seen) -> None:
        monkeypatch.setattr("gaugelog.screens.evidence.evidence_of", _full)
        await seen.sign_on("q.reyes")
        assert isinstance(seen.room, EvidenceScreen)
        assert "This is a defect of Gaugelog (OSError" in seen.text()
        monkeypatch.setattr("gaugelog.screens.evidence.evidence_of", evidence_of)
        seen.room.facts_changed()
        await seen.rest()
        assert "Checks, the smallest margin first" in seen.text()

    job = at(2)
    run_screen(job.book, job.folder, play, place="review", point="FB-1", size=LARGE)
