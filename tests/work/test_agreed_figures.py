"""The agreed figures, typed at the article: each reading with its word, probability and change.

Floor 10 GΩ, meter ±10 % of reading; a change of at most 0.3 %, meter ±(0.05 % + 0.1 Ω) with steps
of 0.01 Ω; k = 2. Expected values: JCGM 106:2012 (7.3, normal distribution) and GUM 4.3.7, by hand.
"""

from __future__ import annotations

from dataclasses import replace
from pathlib import Path

import pytest

from gaugelog.errors import Faulty
from gaugelog.intake.instruments import load_instruments
from gaugelog.intake.stock import load_stock
from gaugelog.journal.ids import new_id
from gaugelog.ledger.readings import ReadingRow, ReadingTaken
from gaugelog.ledger.steps import StepRow
from gaugelog.work import instruments, plan, stock
from gaugelog.work.steps import StepOutcome
from tests.work.job import DEMO, Job, start_job
from tests.work.walking import here, typed_here, walk_to


@pytest.fixture
def indoors(tmp_path: Path) -> Job:
    """The demo's plan in a laboratory, where the floor is 10 GΩ; two resistance meters alike."""
    job = start_job(tmp_path)
    planner = job.keys["c.ward"]
    received = load_stock([DEMO / "lots.csv", DEMO / "consumables.csv"], new_id=new_id)
    stock.receive(job.book, planner, received)
    meters = load_instruments(DEMO / "instruments.toml", new_id=new_id)
    first = next(meter for meter in meters if meter.label == "RM-2")
    second = first.model_copy(update={"id": new_id(), "label": "RM-3"})
    instruments.add(job.book, planner, [*meters, second])
    facts = plan.understand(job.book, DEMO / "plan")
    inside = facts.campaign.model_copy(update={"surroundings": "laboratory"})
    plan.load(job.book, planner, replace(facts, campaign=inside))
    plan.release(job.book, planner, meaning="I release.")
    return job


def _insulation(job: Job, typed: str) -> StepOutcome:
    walk_to(job, "insulation")
    return job.do("t.okoro", {**typed_here(job)[1], "insulation": typed})


@pytest.mark.parametrize(
    ("typed", "word", "probability", "settled"),
    [
        ("12.0 GΩ", "pass", 0.998, True),
        ("11.0 GΩ", "conditional pass", 0.942, True),
        ("9.5 GΩ", "conditional fail", 0.181, False),
        ("8.9 GΩ", "fail", 0.016, False),
        (">20 GΩ", "pass", None, True),
        (">5 GΩ", "undecided", None, False),
    ],
)
def test_insulation_typed_at_the_article(
    indoors: Job, typed: str, word: str, probability: float | None, settled: bool
) -> None:
    outcome = _insulation(indoors, typed)
    verdict = outcome.readings[0].reading.verdict
    assert (word, settled) == (verdict.word, outcome.settled)
    if probability is None:
        assert verdict.probability is None
    else:
        assert probability == pytest.approx(float(verdict.probability or "nan"), abs=5e-4)
    assert ("wires" if settled else "insulation") == here(indoors)


def test_milli_is_refused_before_it_is_a_reading(indoors: Job) -> None:
    with pytest.raises(Faulty) as caught:
        _insulation(indoors, "12.5 mohm")
    assert "insulation" in caught.value.faults[0].where
    with indoors.book.reading() as view:
        assert [] == view.all(ReadingRow, check="insulation")


def test_a_conditional_pass_goes_on_and_is_flagged(indoors: Job) -> None:
    _insulation(indoors, "11.0 GΩ")
    with indoors.book.storage.reading() as reader:
        done = list(reader.entries())[-1].body.fact
    assert [
        "insulation bonded: conditional pass",
        "insulation bonded: 11.0 GΩ falls short of the 20 GΩ expected "
        "(common practice, laboratory).",
    ] == done["flags"]


def _bonded(job: Job, meter: str) -> ReadingTaken:
    walk_to(job, "gauge")
    job.do("t.okoro", {**typed_here(job)[1], "resistance": "350.4 ohm"})
    walk_to(job, "bonded")
    typed = {**typed_here(job)[1], "meter": meter, "resistance": "351.2 ohm"}
    return job.do("t.okoro", typed).readings[0].reading


@pytest.mark.parametrize(
    ("meter", "u_ohm", "word", "probability"),
    [("RM-2", 0.004, "pass", None), ("RM-3", 0.225, "conditional pass", 0.868)],
)
def test_a_change_of_resistance_typed_at_the_article(
    indoors: Job, meter: str, u_ohm: float, word: str, probability: float | None
) -> None:
    reading = _bonded(indoors, meter)
    assert reading.result is not None
    assert 0.228 == pytest.approx(float(reading.result.value), abs=5e-4)
    assert reading.verdict.standard_uncertainty is not None
    u_found = reading.verdict.standard_uncertainty.si() * 350.4
    assert u_ohm == pytest.approx(u_found, abs=5e-4)
    assert word == reading.verdict.word
    if probability is not None:
        assert probability == pytest.approx(float(reading.verdict.probability or "nan"), abs=5e-4)


@pytest.mark.parametrize("typed", ["35.12 ohm", "120 ohm", "3.512 kohm", "0.3512 ohm"])
def test_what_is_no_reading_of_this_gauge_is_not_kept(indoors: Job, typed: str) -> None:
    walk_to(indoors, "gauge")
    head = indoors.book.head()
    with pytest.raises(Faulty) as caught:
        indoors.do("t.okoro", {**typed_here(indoors)[1], "resistance": typed})
    assert "can't be a gauge of lot L-3504, nominally 350 Ω" in caught.value.faults[0].what
    assert head == indoors.book.head()
    with indoors.book.reading() as view:
        assert ["access"] == [row.step for row in view.all(StepRow)]
