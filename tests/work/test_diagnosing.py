"""Diagnosis at a point: planted defects are named by the pins people measure at."""

from __future__ import annotations

from pathlib import Path

import pytest

from gaugelog.errors import Faulty, Refused
from gaugelog.work.diagnosing import PinsFound, circuits_of, diagnose_point
from tests.work.job import Job, released_job

SOUND = (
    "supply- to signal+ = 352.1 ohm",
    "completion to signal+ = 1.98 ohm",
    "completion to supply- = 352.1 ohm",
    "signal+ to ARTICLE > 20 Gohm",
)


@pytest.fixture
def job(tmp_path: Path) -> Job:
    """A released job, its first gauge taken and read, bonded and wired."""
    job = released_job(tmp_path)
    job.walk(13)
    return job


def found(job: Job, *typed: str, meter: str = "RM-2") -> PinsFound:
    """The diagnosis of FB-1."""
    return diagnose_point(job.book, "FB-1", typed, meter=meter)


def test_without_readings_it_gives_the_table_to_measure_against(job: Job) -> None:
    table = diagnose_point(job.book, "FB-1")
    assert {("supply-", "signal+"), ("supply-", "completion"), ("signal+", "completion")} == {
        pair.between for pair in table.pairs
    }
    wires = 2 * 18 * 0.055
    assert pytest.approx(wires) == min(pair.expected for pair in table.pairs)
    assert () == table.answers


def test_a_sound_circuit_is_called_sound(job: Job) -> None:
    answers = found(job, *SOUND[:3]).answers
    assert answers[0].sentence.startswith("nothing wrong")


def test_an_open_wire_is_named_alone(job: Job) -> None:
    told = found(job, SOUND[0], "completion to signal+ = OL", "completion to supply- = OL")
    assert "open circuit in completion wire" == told.answers[0].sentence
    assert told.answers[0].means.startswith("no current passes")
    assert "" == told.next
    assert told.explained


def test_a_leak_to_bare_metal_is_named_with_its_size(job: Job) -> None:
    told = found(
        job, *SOUND[:3], "signal+ to ARTICLE = 2.10 Mohm", "supply- to ARTICLE = 2.10 Mohm",
        meter="IT-5",
    )  # fmt: skip
    assert "leak of 2.1 MΩ" in told.answers[0].sentence


def test_a_wrong_gauge_is_named(job: Job) -> None:
    told = found(job, "supply- to signal+ = 121.9 ohm", SOUND[1], "completion to supply- = 121.9 Ω")
    assert "instead of the planned value in FB-1" in told.answers[0].sentence


def test_pins_may_be_called_as_the_connector_labels_them(job: Job) -> None:
    labels = {each.name: each.pin for each in diagnose_point(job.book, "FB-1").terminals}
    one, other = labels["supply-"], labels["signal+"]
    told = found(job, f"{one} to {other} = 352.1 ohm")
    assert ("supply-", "signal+") == told.pairs[0].between


def test_what_stays_open_names_the_next_measurement(job: Job) -> None:
    told = found(job, "supply- to signal+ = OL")
    assert "completion" in told.next


def test_every_fault_of_every_reading_is_told_at_once(job: Job) -> None:
    with pytest.raises(Faulty) as raised:
        found(
            job,
            "supply- to signal+ = 352,1 ohm",
            "supply- to nowhere = 1 ohm",
            "supply- signal+",
            "supply- to SUPPLY- = 1 ohm",
            "supply- to signal+ = 5",
        )
    faults = raised.value.faults
    assert ["supply- to signal+", "nowhere", "supply- signal+"] == [
        fault.where for fault in faults[:3]
    ]
    assert 5 == len(faults)
    assert "nothing was diagnosed" in raised.value.message


@pytest.mark.parametrize("meter", ["", "XX-1"])
def test_a_meter_must_be_named_and_known(job: Job, meter: str) -> None:
    with pytest.raises(Faulty, match="nothing was diagnosed"):
        found(job, SOUND[0], meter=meter)


def test_before_a_gauge_is_taken_there_is_nothing_to_diagnose(job: Job) -> None:
    with pytest.raises(Refused, match="no gauge yet"):
        diagnose_point(job.book, "FB-2", SOUND, meter="RM-2")


def test_only_a_point_of_the_plan_and_its_own_circuits_are_known(job: Job) -> None:
    assert ["C-1"] == circuits_of(job.book, "FB-1")
    with pytest.raises(Refused, match="No point is called"):
        circuits_of(job.book, "FB-99")
    with pytest.raises(Faulty):
        diagnose_point(job.book, "FB-1", circuit="C-2")


def test_nothing_of_it_is_kept(job: Job) -> None:
    head = job.book.head()
    found(job, *SOUND[:3])
    assert head == job.book.head()
