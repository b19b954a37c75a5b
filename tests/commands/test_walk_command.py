"""Walking a point at the terminal: asked field by field, the passphrase once."""

from __future__ import annotations

import io
from collections.abc import Callable
from pathlib import Path

import pytest

from gaugelog.commands.walk import IDLE_SECONDS, Unlocked
from gaugelog.journal.keys import Signer
from tests.commands.conftest import Command, Outcome
from tests.commands.test_flow import WORD, job
from tests.work.job import start_job

__all__ = ["job"]

Walk = Callable[..., Outcome]
TO_THE_LAYOUT = ("yes", "", "K7-03/1", "RM-2", "350.2 ohm", "", "CL-301", "220 grit", "")


@pytest.fixture
def walk(job: Path, command: Command, monkeypatch: pytest.MonkeyPatch) -> Walk:
    """Walk FB-1 and type these answers, a line each; the passphrase is there once."""

    def typed(*answers: str, who: str = "t.okoro") -> Outcome:
        monkeypatch.setattr("sys.stdin", io.StringIO("".join(f"{line}\n" for line in answers)))
        return command("step", "walk", "FB-1", "--as", who, secrets=f"{WORD}\n")

    return typed


def test_several_steps_are_kept_with_one_unlock_up_to_the_hold(walk: Walk) -> None:
    told = walk(*TO_THE_LAYOUT, "0 mm", "0 mm", "0 deg", "burnished")
    assert 0 == told.code, told.err
    assert 4 == told.err.count("is done.")
    assert "resistance received 350.2 ohm: PASS" in told.out
    assert "Step 5 of 23, a HOLD: a second person decides" in told.out
    assert "--as ID; --refuse WHY sends it back." in told.out
    assert told.out.rstrip().endswith("Next: gaugelog step do FB-1")


def test_each_step_shows_instruction_cautions_and_fields_with_units(walk: Walk) -> None:
    told = walk(*TO_THE_LAYOUT)
    assert "Measure its resistance without touching the grid." in told.out
    assert "CAUTION: Solvents burn" in told.out
    assert "Grid resistance as received, in Ω:" in told.err


@pytest.mark.parametrize("answers", [("yes", "."), (".",), ("yes",), ()])
def test_leaving_keeps_nothing_half_entered(
    walk: Walk, command: Command, answers: tuple[str, ...]
) -> None:
    before = command("journal", "head").out
    told = walk(*answers)
    assert 0 == told.code
    assert "FB-1 stands at step 1 of 23" in told.err
    assert "Go on with: gaugelog step walk FB-1" in told.err
    assert before == command("journal", "head").out


def test_a_fault_is_told_and_the_other_answers_are_kept_by_enter(walk: Walk) -> None:
    told = walk("yes", "", "K7-03/1", "RM-2", "350", "", "", "350.2 ohm", "")
    assert "“350” has no unit." in told.err
    assert "Gauge, pack and number [K7-03/1]:" in told.err
    assert "resistance received 350.2 ohm: PASS" in told.out


def test_a_question_mark_reads_the_step_again(walk: Walk) -> None:
    told = walk("?", "yes", "", ".")
    assert 2 == told.out.count("Find the place from the drawing.")
    assert 1 == told.err.count("is done.")


def test_a_reading_that_fails_is_kept_and_asked_for_again_with_a_reason(walk: Walk) -> None:
    received = ("K7-03/1", "RM-2", "353 ohm", "")
    again = ("K7-03/1", "RM-2", "350.2 ohm", "", "probe slipped", "")
    told = walk("yes", "", *received, *again, ".")
    assert "resistance received 353 ohm: FAIL" in told.out
    assert 2 == told.err.count("Why it is measured again")  # an empty reason is asked for anew
    assert "resistance received 350.2 ohm: PASS" in told.out


def test_who_may_not_do_steps_is_told_before_anything_is_asked(walk: Walk) -> None:
    told = walk(*TO_THE_LAYOUT, who="q.reyes")
    assert 4 == told.code
    assert "technician" in told.err
    assert "Permits read" not in told.err


def test_a_key_is_asked_for_anew_only_when_nobody_typed_for_a_while(tmp_path: Path) -> None:
    signer = start_job(tmp_path).keys["c.ward"]
    now, opened = [0.0], list[float]()

    def opening() -> Signer:
        opened.append(now[0])
        return signer

    key = Unlocked(opening, lambda: now[0])
    for later in (0.0, IDLE_SECONDS, IDLE_SECONDS * 1.9):
        now[0] = later
        key.touch()
        key.signer()
    assert [0.0] == opened
    now[0] = IDLE_SECONDS * 3
    key.touch()  # typing comes too late
    key.signer()
    assert [0.0, IDLE_SECONDS * 3] == opened
