"""The connected circuit at the article, compared with what its resistances and reel predict."""

from __future__ import annotations

import pytest

from gaugelog.errors import Faulty, Refused
from gaugelog.ledger.readings import ReadingTaken
from tests.work.job import Job
from tests.work.walking import here, typed_here, walk_to

WIRE = 18 * 0.055
"""Ohm in one wire of point FB-1: 18 m of the reel's 0.055 Ω/m."""


def _read(job: Job, step: str, name: str, typed: str) -> ReadingTaken:
    if here(job) != step:
        walk_to(job, step)
    given = {**typed_here(job)[1], name: typed}
    kept = [each.reading for each in job.do("t.okoro", given, reason="looked again").readings]
    return next(reading for reading in kept if reading.typed == typed)


def _limits(reading: ReadingTaken) -> tuple[float, float]:
    (limit,) = reading.limits
    assert limit.at_least is not None
    assert limit.at_most is not None
    return limit.at_least.si(), limit.at_most.si()


def test_the_lead_loop_is_two_wires_of_the_reel(job: Job) -> None:
    reading = _read(job, "loop", "loop", "1.98 ohm")
    low, high = _limits(reading)
    assert 2 * WIRE == pytest.approx((low + high) / 2)
    assert 0.1 * 2 * WIRE == pytest.approx((high - low) / 2)  # the criteria's 10 %
    assert "pass" == reading.verdict.word


@pytest.mark.parametrize(("typed", "hint"), [("2.3 ohm", "bad joint"), ("1.7 ohm", "touch")])
def test_a_lead_loop_that_does_not_fit_blocks_with_a_hint(job: Job, typed: str, hint: str) -> None:
    reading = _read(job, "loop", "loop", typed)
    assert ("fail", True) == (reading.verdict.word, reading.verdict.blocks)
    assert hint in reading.verdict.reason
    assert "loop" == here(job)
    assert "non-conforming" == job.state()


def test_the_zero_follows_from_the_resistance_that_was_read(job: Job) -> None:
    # Half bridge of gauge arm and completion, a wire in each: 351.49/(351.49 + 350.99) − 1/2.
    gauge, other = 350.50 + WIRE, 350.0 + WIRE
    predicted = gauge / (gauge + other) - 0.5
    reading = _read(job, "zero", "zero", "0.36 mV/V")
    low, high = _limits(reading)
    assert predicted == pytest.approx((low + high) / 2, rel=1e-4)
    # k = 2 of the meter's ±(0.05 % + 0.1 Ω) and 0.01 Ω, far above the criteria's 0.05 mV/V.
    ohms = (((0.0005 * 350.5 + 0.1) ** 2) / 3 + 0.01**2 / 12) ** 0.5
    by_meter = 2 * ohms * other / (gauge + other) ** 2
    assert by_meter == pytest.approx((high - low) / 2, rel=2e-3)
    assert "pass" == reading.verdict.word


def test_a_zero_with_its_sign_changed_is_told_as_such(job: Job) -> None:
    reading = _read(job, "zero", "zero", "-0.36 mV/V")
    assert reading.verdict.blocks
    assert "sign changed" in reading.verdict.reason


def test_a_zero_far_off_tells_how_many_ohms_would_explain_it(job: Job) -> None:
    # 1 mV/V more is 4 · 351 · 0.001 = 1.4 Ω in the gauge arm, to first order.
    reading = _read(job, "zero", "zero", "1.36 mV/V")
    assert "fail" == reading.verdict.word
    assert "Ω too much in the gauge arm" in reading.verdict.reason
    ohms = float(reading.verdict.reason.partition("about ")[2].partition(" Ω")[0])
    assert 4 * 351 * 0.001 == pytest.approx(ohms, abs=0.05)


def test_a_shunt_reading_of_the_other_sign_blocks(job: Job) -> None:
    fitting = _read(job, "shunt", "shunt", "1696 um/m")
    assert fitting.verdict.blocks
    assert "pass" == _read(job, "shunt", "shunt", "-1696 um/m").verdict.word
    assert "polarity" == here(job)


def test_the_sign_of_a_push_in_a_known_direction_is_the_expected_one(job: Job) -> None:
    wrong = _read(job, "polarity", "pushed", "-31 um/m").verdict
    assert ("fail", True) == (wrong.word, wrong.blocks)
    assert "swapped arm or polarity" in wrong.reason
    # Twice the module's ±(0.05 % + 2 µm/m): 2.3 µm/m and less have no sign.
    assert "undecided" == _read(job, "polarity", "pushed", "2.2 um/m").verdict.word
    assert "pass" == _read(job, "polarity", "pushed", "2.4 um/m").verdict.word


def test_another_channel_that_answers_blocks(job: Job) -> None:
    wrong = _read(job, "polarity", "channel", "M1/2")
    assert ("channel", "M1/2", None) == (wrong.check, wrong.typed, wrong.value)
    assert ("fail", True) == (wrong.verdict.word, wrong.verdict.blocks)
    assert "M1/2 answered; planned is M1/1" in wrong.verdict.reason
    assert "pass" == _read(job, "polarity", "channel", "m1/1").verdict.word


def test_what_is_no_sign_is_refused(job: Job) -> None:
    walk_to(job, "polarity")
    with pytest.raises(Faulty, match="fault") as caught:
        job.do("t.okoro", {**typed_here(job)[1], "expected": "up"})
    assert "“up” is no sign." == caught.value.faults[0].what


def test_a_circuit_that_fails_keeps_its_point_from_being_submitted(job: Job) -> None:
    _read(job, "shunt", "shunt", "1696 um/m")
    with pytest.raises(Refused, match="shunt on channel of C-1 blocks"):
        job.submit()
