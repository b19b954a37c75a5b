"""Start-of-shift checks: kept with their verdict; without one a meter is not read, if so agreed."""

from __future__ import annotations

from pathlib import Path

import pytest

from gaugelog.documents.content.build import build
from gaugelog.documents.page import record_html
from gaugelog.errors import ExitCode, Faulty, Refused
from gaugelog.ledger.readings import ReadingRow, ReadingTaken
from gaugelog.work import shift, steps
from gaugelog.work.history import check_logbook, entries_about
from gaugelog.work.ports import RecordRequest
from gaugelog.work.telling import what_line
from tests.work.job import WALK, Job, changed_files, released_job

REFERENCE = """
[[instrument]]
label = "RB-1"
type = "decade resistor"
maker = "Corriemoor Instruments"
serial = "11-2001"
certificate_number = "CAL-26-0700"
calibrated_by = "Dunmarrow Calibration Laboratory"
calibrated_on = 2026-06-15
due = 2027-06-15
  [[instrument.value]]
  quantity = "resistance"
  value = "350 ohm"
  uncertainty = "0.02 ohm"
  [[instrument.value]]
  quantity = "resistance"
  value = "120 ohm"
  uncertainty = "0.03 ohm"
  coverage = 3
  [[instrument.value]]
  quantity = "insulation"
  value = "1 Gohm"
  uncertainty = "20 Mohm"

[[instrument]]
label = "IT-5\""""
DEMAND = """[shift_check]
within = "12 h"
of = ["resistance", "insulation"]
source = "common practice"

[decision]"""
WITH_REFERENCE = ("instruments.toml", '[[instrument]]\nlabel = "IT-5"', REFERENCE)
METER, GAUGE = "RM-2", 1
"""The meter, and the steps before it is first read."""


@pytest.fixture
def plain(tmp_path: Path) -> Job:
    """A job with a reference whose criteria ask for no check."""
    return released_job(tmp_path, changed_files(tmp_path, WITH_REFERENCE))


@pytest.fixture
def strict(tmp_path: Path) -> Job:
    """A job whose criteria ask for a check within 12 h."""
    demand = ("plan/criteria.toml", "[decision]", DEMAND)
    job = released_job(tmp_path, changed_files(tmp_path, WITH_REFERENCE, demand))
    job.walk(GAUGE)
    return job


def check(job: Job, reads: str, value: str = "350 ohm", **more: str) -> shift.Checked:
    """Check the resistance meter, or the one named, a minute later."""
    job.clock.advance(60)
    typed = {"meter": METER, "reference": "RB-1", "reads": reads, "value": value, **more}
    return shift.check(job.book, job.keys["t.okoro"], **typed)


def fault_of(job: Job, **typed: str) -> str:
    """The one fault that a check with these words has."""
    with pytest.raises(Faulty) as caught:
        check(job, **{"reads": "350 ohm", **typed})
    (found,) = caught.value.faults
    return f"{found.where}: {found.what} {found.remedy}"


def take_gauge(job: Job, minutes: float = 35) -> steps.StepOutcome:
    """Read the gauge as received."""
    who, typed = WALK[GAUGE]
    return job.do(who, typed, minutes=minutes)


def refusal(job: Job, minutes: float = 35) -> str:
    """Why the gauge may not be read."""
    with pytest.raises(Faulty) as caught:
        take_gauge(job, minutes)
    (found,) = caught.value.faults
    assert "point FB-1, step gauge, meter" == found.where
    return found.what


def test_a_meter_agrees_as_far_as_its_accuracy_and_the_reference_allow(plain: Job) -> None:
    # By hand: RM-2 is ±(0.05 % + 0.1 Ω), steps of 0.01 Ω; at 350.2 Ω a = 0.2751 Ω, so u² =
    # a²/3 + 0.01²/12, U = 0.31772 Ω; with 0.02 Ω of the reference 0.31835 Ω.
    fact = check(plain, "350.2 ohm").fact
    assert ("0.2", "ohm") == (fact.off.value, fact.off.unit)
    assert pytest.approx(0.31835, abs=5e-5) == fact.at_most.si()
    assert pytest.approx(0.2 / 0.31835, abs=5e-4) == float(fact.score)
    assert "pass" == fact.outcome
    assert "pass" == check(plain, "350.31 ohm").fact.outcome
    failed = check(plain, "349.6 ohm")
    assert ("fail", ExitCode.TROUBLE) == (failed.fact.outcome, failed.exit_code)


def test_a_certificate_of_another_coverage_is_brought_to_two(plain: Job) -> None:
    fact = check(plain, "120.1 ohm", "120 ohm").fact
    assert pytest.approx(0.02) == fact.value_uncertainty.si()


def test_an_insulation_tester_is_checked_on_a_known_gigaohm(plain: Job) -> None:
    fact = check(plain, "1.02 Gohm", "", meter="IT-5").fact
    assert ("insulation", "1 GΩ", "pass") == (fact.quantity, str(fact.value), fact.outcome)


def test_every_slip_is_said_plainly(plain: Job) -> None:
    assert "meter: no instrument is called “RM-9”" in fault_of(plain, meter="RM-9")
    assert "reference: no instrument is called “RB-9”" in fault_of(plain, reference="RB-9")
    assert "reference: is the meter itself" in fault_of(plain, reference=METER)
    assert "reference: IT-5 has no known value" in fault_of(plain, reference="IT-5")
    assert "Known of RB-1: 350 Ω; 120 Ω" in fault_of(plain, value="")
    assert "“300 ohm” is none of them" in fault_of(plain, value="300 ohm")
    assert "reads: “350” has no unit" in fault_of(plain, reads="350")
    assert "has no range that reaches" in fault_of(plain, reads="4000 ohm")
    assert "meter: QB-1 does not measure" in fault_of(plain, meter="QB-1")
    assert "at:" in fault_of(plain, at="2027-01-01 09:00")
    with pytest.raises(Refused, match="does not have the role"):
        shift.check(plain.book, plain.keys["q.reyes"], meter=METER, reference="RB-1", reads="1 ohm")
    assert [] == shift.checks(plain.book)


def test_a_reference_or_meter_out_of_date_checks_nothing(plain: Job) -> None:
    plain.clock.advance(300 * 86400)
    with pytest.raises(Faulty) as caught:
        check(plain, "350 ohm")
    assert ["meter", "reference"] == [fault.where for fault in caught.value.faults]


def test_without_a_check_the_meter_is_not_read_where_it_is_asked_for(strict: Job) -> None:
    assert (
        "RM-2 has no start-of-shift check of resistance; "
        "the criteria ask for one within 12 h (common practice)." == refusal(strict)
    )
    check(strict, "350.1 ohm")
    assert take_gauge(strict).settled


def test_a_check_speaks_for_twelve_hours_and_no_longer(strict: Job) -> None:
    check(strict, "350.1 ohm")
    assert "RM-2 was checked for resistance 12.0 h before" in refusal(strict, 12 * 60 + 1)
    check(strict, "350.1 ohm")
    assert take_gauge(strict, 12 * 60).settled


def test_a_meter_that_failed_is_not_read_until_it_passes(strict: Job) -> None:
    check(strict, "350.1 ohm")
    check(strict, "351 ohm")
    assert refusal(strict).startswith("RM-2 failed its check of resistance on RB-1 at 2026-11-17 ")
    check(strict, "350.05 ohm")
    assert take_gauge(strict).settled


def test_a_check_after_the_reading_does_not_speak_for_it(strict: Job) -> None:
    check(strict, "350.1 ohm")
    who, typed = WALK[GAUGE]
    with pytest.raises(Faulty):
        strict.do(who, typed, at="2026-11-17 08:35")


def test_what_the_criteria_do_not_name_needs_no_check(plain: Job, tmp_path: Path) -> None:
    assert plain.do(*WALK[0]).settled
    assert take_gauge(plain).settled


def test_the_reading_names_the_check_that_speaks_for_it(strict: Job) -> None:
    passed = check(strict, "350.1 ohm").fact
    take_gauge(strict)
    with strict.book.reading() as view:
        (row,) = view.all(ReadingRow)
    assert passed.id == ReadingTaken.model_validate_json(row.data).shift_check


def test_a_failed_check_names_what_was_read_since_it_passed(strict: Job) -> None:
    check(strict, "350.1 ohm")
    take_gauge(strict)
    told = check(strict, "352 ohm").lines
    assert "RM-2 on RB-1, 350 Ω: reads 352 Ω, 2 Ω off; at most 0.319 Ω either way" in told[0]
    assert told[1].startswith("In doubt: 1 reading taken with it since it passed at 2026-11-17 ")
    assert "of FB-1. Measure again." in told[1]


def test_the_record_names_the_check_with_its_figures(strict: Job) -> None:
    passed = check(strict, "350.1 ohm").fact
    take_gauge(strict)
    with strict.book.reading() as view:
        row = view.point("FB-1")
        assert row is not None
        head = strict.book.head().printed
        content = build(view, RecordRequest(row.id, 1, head, strict.clock.now(), ""))
    (meter,) = content.instruments
    assert (
        [passed.id]
        == [each.id for each in meter.checks]
        == [reading.shift_check for reading in content.readings]
    )
    page = " ".join(record_html(content).split())
    assert "on RB-1, 350 Ω ± 0.02 Ω: read 350.1 Ω, 0.1 Ω off, at most 0.318" in page
    assert "meter checks" in page


def test_every_check_is_kept_and_told(strict: Job) -> None:
    check(strict, "350.1 ohm")
    check(strict, "351 ohm", note="loose clip")
    found = shift.checks(strict.book, "rm-2")
    assert ["pass", "fail"] == [fact.outcome for fact in found]
    assert "loose clip" == found[1].note
    told = what_line(entries_about(strict.book, "RB-1")[-1])
    assert "meter.checked: RM-2 on RB-1 reads 351 Ω, FAIL" == told
    strict.book.rebuild()
    assert found == shift.checks(strict.book)
    assert check_logbook(strict.book).ok
