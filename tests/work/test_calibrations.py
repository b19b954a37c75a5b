"""A meter calibrated anew: what was read before stays under the certificate it was read under."""

from __future__ import annotations

import pytest

from gaugelog.documents.content import RecordContent, build
from gaugelog.errors import Refused
from gaugelog.intake.instruments import load_instruments
from gaugelog.journal.ids import new_id
from gaugelog.ledger.base import Quantity
from gaugelog.ledger.circuits import CircuitPlanned, CircuitRow
from gaugelog.ledger.instruments import InstrumentAdded
from gaugelog.ledger.readings import ReadingRow, ReadingTaken
from gaugelog.rules.budget import PointBudget, point_budget
from gaugelog.rules.certificate import certificate_at
from gaugelog.rules.wired import wired
from gaugelog.work import instruments, steps
from gaugelog.work.ports import RecordRequest
from tests.work.job import DEMO, Job
from tests.work.walking import walk_to


def calibrate(job: Job, label: str, offset: str) -> InstrumentAdded:
    """The meter calibrated anew: its ranges now err by `offset`, in their own unit."""
    meters = load_instruments(DEMO / "instruments.toml", new_id=new_id)
    meter = next(each for each in meters if each.label == label)
    ranges = tuple(
        each.model_copy(update={"offset": Quantity(value=offset, unit=each.offset.unit)})
        for each in meter.ranges
    )
    changed = {"certificate_number": "CAL-NEW", "calibrated_on": "2026-11-17", "ranges": ranges}
    anew = meter.model_copy(update=changed)
    instruments.add(job.book, job.keys["c.ward"], [anew])
    return anew


def _resistances(job: Job) -> list[tuple[ReadingRow, ReadingTaken]]:
    with job.book.reading() as view:
        rows = view.all(ReadingRow, check="resistance")
    return [(row, ReadingTaken.model_validate_json(row.data)) for row in rows]


def _content(job: Job) -> RecordContent:
    with job.book.reading() as view:
        row = view.point("FB-1")
        assert row is not None
        request = RecordRequest(row.id, 1, job.book.head().printed, job.clock.now(), "I submit.")
        return build(view, request, "t.okoro")


def test_each_reading_keeps_the_certificate_that_was_in_force(job: Job) -> None:
    walk_to(job, "bonded")
    calibrate(job, "RM-2", "0.2")
    walk_to(job, "wires")
    with job.book.reading() as view:
        found = [
            certificate_at(view, row.instrument, row.seq).certificate_number
            for row, _taken in _resistances(job)
        ]
    assert ["CAL-26-0719", "CAL-NEW"] == found


def test_no_certificate_is_in_force_before_the_first(job: Job) -> None:
    with job.book.reading() as view:
        meter = view.instrument("RM-2")
        assert meter is not None
        with pytest.raises(Refused, match="is not known"):
            certificate_at(view, meter.id, meter.seq)


def test_the_record_shows_a_meter_under_each_certificate_it_was_used_under(job: Job) -> None:
    walk_to(job, "bonded")
    calibrate(job, "RM-2", "0.2")
    walk_to(job, "wires")
    content = _content(job)
    assert [("CAL-26-0719", "0.1"), ("CAL-NEW", "0.2")] == [
        (each.certificate_number, each.ranges[0].offset.value)
        for each in content.instruments
        if each.label == "RM-2"
    ]
    assert ["RM-2 (CAL-26-0719)", "RM-2 (CAL-NEW)"] == [
        each.instrument for each in content.readings if each.instrument.startswith("RM-2")
    ]


def test_a_certificate_that_came_after_the_last_reading_is_not_on_the_record(job: Job) -> None:
    walk_to(job, "wires")
    before = _content(job)
    calibrate(job, "RM-2", "0.2")
    after = _content(job)
    assert before.instruments == after.instruments
    assert before.readings == after.readings


def test_a_change_across_a_calibration_counts_both_errors(job: Job) -> None:
    """350 Ω within ±(0.05 % + 0.1 Ω) before and after, steps of 0.01 Ω: nothing cancels.

    By hand (JCGM 100:2008, 4.3.7 and 5.1): u² = 2 (0.275² + 0.005²)/3 Ω², u = 0.2246 Ω, which is
    0.0641 % of 350.12 Ω.
    """
    walk_to(job, "bonded")
    calibrate(job, "RM-2", "0.1")
    walk_to(job, "wires")
    spread = _resistances(job)[1][1].verdict.standard_uncertainty
    assert spread is not None
    assert 0.0641 == pytest.approx(float(spread.value), rel=5e-3)


def test_a_prediction_uses_the_uncertainty_of_the_reading_as_it_was_taken(job: Job) -> None:
    walk_to(job, "wires")
    with job.book.reading() as view:
        circuit = next(each for each in view.all(CircuitRow) if each.label == "C-1")
        planned = CircuitPlanned.model_validate_json(circuit.data)
        before = wired(view, planned)
    calibrate(job, "RM-2", "20")
    with job.book.reading() as view:
        assert before == wired(view, planned)


def _budget(job: Job) -> PointBudget:
    with job.book.reading() as view:
        row = view.point("FB-1")
        assert row is not None
        found = point_budget(view, row)
    assert found is not None
    return found


def _input(found: PointBudget, name: str) -> tuple[float, float]:
    part = next(each for each in found.budget.parts if each.name == name)
    return part.estimate.value, part.estimate.uncertainty


def test_leakage_lies_between_none_and_all_across_the_grid(job: Job) -> None:
    """18 GΩ: 0 to 55.6 pS is 27.8 pS ± 27.8 pS, rectangular (JCGM 100:2008, 4.3.7)."""
    walk_to(job, "")
    middle, spread = _input(_budget(job), "leak")
    assert 27.78e-12 == pytest.approx(middle, rel=1e-3)
    assert 27.78e-12 / 3**0.5 == pytest.approx(spread, rel=1e-3)


def test_the_middle_of_the_leakage_is_told_among_the_corrections(job: Job) -> None:
    """−350/(2.08 · 36 GΩ) = −0.0047 µm/m: parallel resistance, worked by hand."""
    walk_to(job, "")
    told = {each.name: each.value for each in _budget(job).corrections}
    assert "-0.0047 µm/m" == next(value for name, value in told.items() if "leakage" in name)


def test_the_budget_takes_the_last_shunt_reading_and_its_certificate(job: Job) -> None:
    walk_to(job, "polarity")
    assert 2e-6 / 3**0.5 == pytest.approx(_input(_budget(job), "zero")[1])
    calibrate(job, "QB-1", "4")
    assert 2e-6 / 3**0.5 == pytest.approx(_input(_budget(job), "zero")[1])
    steps.redo(job.book, job.keys["t.okoro"], point="FB-1", step="shunt", reason="again")
    walk_to(job, "polarity")
    assert 4e-6 / 3**0.5 == pytest.approx(_input(_budget(job), "zero")[1])
