"""What is in stock: what is left and wanted, what expires, what must not be used."""

from __future__ import annotations

from gaugelog.work.dispositions import withdraw
from gaugelog.work.standing import set_standing
from gaugelog.work.stocked import LotShown, stocked
from tests.work.job import Job


def lot(job: Job) -> LotShown:
    """The job's gauge lot."""
    return stocked(job.book).lots[0]


def test_what_is_left_of_a_lot_and_what_is_still_wanted(job: Job) -> None:
    assert (10, 2) == (lot(job).left, lot(job).wanted)
    job.walk(2)
    assert (9, 1) == (lot(job).left, lot(job).wanted)
    taken = lot(job).packs[0].gauges[0]
    assert ("K7-03/1", "in service", "FB-1") == (taken.label, taken.state, taken.point)


def test_a_pack_in_quarantine_is_not_left_to_use(job: Job) -> None:
    set_standing(
        job.book, job.keys["t.okoro"], label="K7-03", standing="quarantined", reason="torn"
    )
    pack = lot(job).packs[0]
    assert (0, "pack K7-03 is quarantined: torn") == (pack.left, pack.barred)
    assert (5, 10) == (lot(job).left, lot(job).count("on shelf"))


def test_a_scrapped_gauge_is_counted_as_such(job: Job) -> None:
    set_standing(job.book, job.keys["t.okoro"], label="K7-04/2", standing="scrapped", reason="bent")
    assert (9, 1) == (lot(job).left, lot(job).count("scrapped"))


def test_days_run_to_the_expiry_and_beyond(job: Job) -> None:
    found = {each.lot.label: each.days_left for each in stocked(job.book).consumables}
    # From 17 November 2026 to 31 March 2027: 13 + 31 + 31 + 28 + 31 days
    assert 134 == found["AD-612"]
    assert found["SO-17"] is None
    job.clock.advance(135 * 86400)
    found = {each.lot.label: each.days_left for each in stocked(job.book).consumables}
    assert -1 == found["AD-612"]


def test_an_instrument_shows_the_days_until_it_is_due(job: Job) -> None:
    found = {each.instrument.label: each.days_left for each in stocked(job.book).instruments}
    # From 17 November 2026 to 15 June 2027: 13 + 31 + 31 + 28 + 31 + 30 + 31 + 15 days
    assert 210 == found["RM-2"]


def test_a_withdrawn_point_wants_nothing(job: Job) -> None:
    withdraw(
        job.book, job.keys["c.ward"], point="FB-2", reason="no access", meaning="I withdraw it."
    )
    assert 1 == lot(job).wanted
