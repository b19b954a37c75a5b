"""The step in hand: cautions, fields, faults, verdicts, attempts, and what happens meanwhile."""

from __future__ import annotations

from gaugelog.ledger.readings import ReadingRow
from gaugelog.screens.step import StepScreen
from gaugelog.screens.worklist import WorklistScreen
from gaugelog.work import looking, steps
from tests.screens.conftest import At
from tests.screens.pilot import LARGE, Job, Seen, run_screen

FAILING = ("yes", "yes", "yes", "IT-5", "yes", "0.4 GΩ", "yes")


def _step(seen: Seen) -> StepScreen:
    assert isinstance(seen.room, StepScreen)
    return seen.room


async def _open(seen: Seen, *keys: str) -> None:
    await seen.sign_on()
    await seen.type("FB-1")
    await seen.keys(*keys)


def test_fields_open_only_after_the_cautions_were_acknowledged(at: At) -> None:
    async def play(seen: Seen) -> None:
        await _open(seen)
        assert "CAUTION" in seen.text()
        assert "space Cautions read" in seen.lines()[-1]
        await seen.keys("y", "enter", "enter")
        await seen.rest()
        assert "1/23" in seen.text()
        await seen.keys("space")
        assert "cautions read: 1" in seen.text()
        await seen.type("yes")
        assert "2/23" in seen.text()

    job = at(0)
    run_screen(job.book, job.folder, play)


def test_enter_goes_from_field_to_field_and_the_last_keeps_the_step(at: At) -> None:
    async def play(seen: Seen) -> None:
        await _open(seen)
        await seen.type("K7-03/1")
        await seen.type("RM-2")
        await seen.type("350.12")
        text = seen.text()
        assert "✓ PASS  resistance received 350.12 Ω" in text
        assert "limit at least 348.95 Ω and at most 351.05 Ω, ruled by prediction" in text
        assert "margin 0.93 Ω" in text
        assert "3/23" in text

    job = at(1)
    run_screen(job.book, job.folder, play, size=LARGE)
    with job.book.reading() as view:
        assert ["350.12 Ω"] == [row.typed for row in view.all(ReadingRow)]


def test_units_stand_beside_the_fields_before_anything_is_typed(at: At) -> None:
    async def play(seen: Seen) -> None:
        await _open(seen)
        assert "] °C" in seen.text()
        assert "] % RH" in seen.text()

    job = at(6)
    run_screen(job.book, job.folder, play, size=LARGE)


def test_an_insulation_needs_its_unit_typed(at: At) -> None:
    async def play(seen: Seen) -> None:
        await _open(seen, "space")
        for typed in ("yes", "yes", "yes", "IT-5", "yes", "18"):
            await seen.type(typed)
        assert "“18” has no unit." in seen.text()
        assert "11/23" in seen.text()

    job = at(10)
    run_screen(job.book, job.folder, play, size=LARGE)
    with job.book.reading() as view:
        assert [] == view.all(ReadingRow, check="insulation", stage="cabled")


def test_a_wrong_label_is_told_at_once_beside_its_field(at: At) -> None:
    async def play(seen: Seen) -> None:
        await _open(seen)
        await seen.type("K9-99/9")
        assert "✗ no gauge is called “K9-99/9”." in seen.text()
        assert _step(seen).entry.live[0].input.has_focus
        await seen.keys(*["backspace"] * 7)
        await seen.type("K7-03/1")
        assert "no gauge" not in seen.text()
        assert _step(seen).entry.live[1].input.has_focus

    job = at(1)
    run_screen(job.book, job.folder, play, size=LARGE)


def test_a_field_left_empty_is_named(at: At) -> None:
    async def play(seen: Seen) -> None:
        await _open(seen)
        await seen.keys("enter")
        assert "✗ is missing." in seen.text()

    job = at(1)
    run_screen(job.book, job.folder, play, size=LARGE)


def test_a_failed_reading_stays_and_measuring_again_asks_why(at: At) -> None:
    async def play(seen: Seen) -> None:
        await _open(seen, "space")
        for typed in FAILING:
            await seen.type(typed)
        text = seen.text()
        assert "✗ FAIL  insulation cabled 0.4 GΩ" in text
        assert "margin -0.6 GΩ" in text
        assert "1. insulation 0.4 GΩ  ✗ FAIL" in text
        assert "Why is it measured again?" in text
        assert "" == _step(seen).entry.live[-1].input.value
        await seen.type("tab was damp; dried it")
        for typed in ("yes", "yes", "yes", "yes", "18 GΩ", "yes"):
            await seen.type(typed)
        assert "✓ PASS  insulation cabled 18 GΩ" in seen.text()
        assert "12/23" in seen.text()

    job = at(10)
    run_screen(job.book, job.folder, play, size=LARGE)
    with job.book.reading() as view:
        kept = view.all(ReadingRow, check="insulation", stage="cabled")
    assert [("0.4 GΩ", 1), ("18 GΩ", 2)] == [(row.typed, row.attempt) for row in kept]


def test_a_reading_is_never_filled_in_but_a_meter_is_carried_with_its_age(at: At) -> None:
    async def play(seen: Seen) -> None:
        await _open(seen, "space")
        for typed in FAILING:
            await seen.type(typed)
        assert "carried, 0 min old; no longer offered in 8 h" in seen.text()
        job.clock.advance(9 * 3600)
        seen.room.facts_changed()
        await seen.rest()
        assert "what was carried is too old" in seen.text()

    job = at(10)
    run_screen(job.book, job.folder, play, size=LARGE)


def test_what_blocks_a_step_is_said_and_its_fields_are_shut(at: At) -> None:
    async def play(seen: Seen) -> None:
        await _open(seen)
        assert "10 min to wait" in seen.text()
        assert all(row.disabled for row in _step(seen).entry.live)
        assert "space Cautions read" not in seen.lines()[-1]
        job.clock.advance(11 * 60)
        seen.room.facts_changed()
        await seen.rest()
        assert not any(row.disabled for row in _step(seen).entry.live)

    job = at(7)
    run_screen(job.book, job.folder, play, size=LARGE)


def test_another_process_that_did_the_step_is_noticed_and_nothing_is_kept_twice(at: At) -> None:
    async def play(seen: Seen) -> None:
        await _open(seen, "space")
        await seen.type("ye", enter=False)
        steps.do(job.book, job.keys["t.okoro"], point="FB-1", typed={"safe": "yes"})
        seen.app.tick()
        await seen.rest()
        assert "FB-1 was changed elsewhere meanwhile" in seen.text()
        assert "2/23" in seen.text()

    job = at(0)
    run_screen(job.book, job.folder, play)


def test_enter_on_a_step_that_was_done_meanwhile_keeps_nothing(at: At) -> None:
    async def play(seen: Seen) -> None:
        await _open(seen, "space")
        assert isinstance(seen.room, StepScreen)
        for typed in ("CL-301", "220 grit"):
            await seen.type(typed, enter=False)
            await seen.keys("down")
        steps.redo(job.book, job.keys["t.okoro"], point="FB-1", step="access", reason="again")
        seen.room.action_do()
        await seen.rest()
        assert "1/23" in seen.text()

    job = at(2)
    run_screen(job.book, job.folder, play)
    assert "access" == _open_step(job)


def _open_step(job: Job) -> str:
    found = looking.in_hand(job.book, "FB-1").next.step
    assert found is not None
    return found.id


def test_a_half_typed_field_is_restored_to_its_person_on_the_same_step(at: At) -> None:
    async def begin(seen: Seen) -> None:
        await _open(seen)
        await seen.type("K7-03/1")
        await seen.type("RM", enter=False)
        await seen.pilot.pause(0.4)  # no farewell: as when the terminal is lost

    async def again(seen: Seen) -> None:
        await seen.sign_on()
        assert ["K7-03/1", "RM", ""] == [row.input.value for row in _step(seen).entry.live]

    async def other(seen: Seen) -> None:
        await seen.sign_on("q.reyes")
        assert isinstance(seen.room, WorklistScreen)

    job = at(1)
    run_screen(job.book, job.folder, begin)
    run_screen(job.book, job.folder, other)
    run_screen(job.book, job.folder, again)


def test_a_note_and_a_time_are_added_on_demand_and_kept(at: At) -> None:
    async def play(seen: Seen) -> None:
        await _open(seen, "space", "ctrl+n")
        await seen.type("gantry wet", enter=False)
        await seen.keys("ctrl+o")
        await seen.type("08:00", enter=False)
        await seen.keys("up", "up")
        await seen.type("yes")
        assert "2/23" in seen.text()

    job = at(0)
    job.clock.advance(3600)
    run_screen(job.book, job.folder, play, size=LARGE)
    from gaugelog.ledger.steps import StepRow

    with job.book.reading() as view:
        (row,) = view.all(StepRow)
    assert ("gantry wet", "2026-11-17T08:00:00Z") == (row.note, row.observed_at)


def test_a_time_that_is_none_is_told(at: At) -> None:
    async def play(seen: Seen) -> None:
        await _open(seen, "space", "ctrl+o")
        await seen.type("noon", enter=False)
        await seen.keys("up")
        await seen.type("yes")
        assert "“noon” is no time." in seen.text()

    job = at(0)
    run_screen(job.book, job.folder, play, size=LARGE)


def test_going_back_asks_which_step_and_why(at: At) -> None:
    async def play(seen: Seen) -> None:
        await _open(seen, "f7")
        await seen.type("12")
        await seen.type("cable renamed")
        assert "“12” is no step that is done." in seen.text()
        await seen.keys("escape", "f7")
        await seen.type("1")
        await seen.type("gantry moved")
        assert "Work goes on from “Make the place safe to work at”." in seen.text()
        assert "1/23" in seen.text()

    job = at(2)
    run_screen(job.book, job.folder, play)


def test_a_step_is_skipped_only_where_its_rule_lets_it(at: At) -> None:
    async def play(seen: Seen) -> None:
        await _open(seen)
        assert "f9" in seen.lines()[-1]
        await seen.keys("f9")
        await seen.type("three-wire, no two end at one tab")
        assert "is skipped" in seen.text()
        assert "16/23" in seen.text()
        assert "f9" not in seen.lines()[-1]

    job = at(14)
    run_screen(job.book, job.folder, play)


def test_someone_without_the_role_is_told_when_keeping(at: At) -> None:
    async def play(seen: Seen) -> None:
        await seen.sign_on("q.reyes")
        await seen.type("FB-1")
        await seen.keys("space")
        await seen.type("yes")
        assert "q.reyes does not have the role technician." in seen.text()
        assert "1/23" in seen.text()

    job = at(0)
    run_screen(job.book, job.folder, play)
