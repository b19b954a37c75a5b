"""Stock is received once, meters are calibrated anew under their own id; who uses which is held."""

from __future__ import annotations

from dataclasses import dataclass

import pytest

from gaugelog.errors import Faulty, Refused
from gaugelog.intake.instruments import load_instruments
from gaugelog.intake.stock import load_stock
from gaugelog.journal.ids import new_id
from gaugelog.ledger.base import Quantity
from gaugelog.ledger.instruments import InstrumentAdded, InstrumentRow
from gaugelog.ledger.stock import ConsumableReceived, LotReceived, LotRow
from gaugelog.work import instruments, plan, steps, stock
from gaugelog.work.history import check_logbook
from gaugelog.work.standing import set_standing
from tests.work.job import DEMO, WALK, Job
from tests.work.walking import typed_here, walk_to


@dataclass(frozen=True)
class Delivery:
    """What was received."""

    lots: tuple[LotReceived, ...] = ()
    consumables: tuple[ConsumableReceived, ...] = ()


def _lot(label: str, pack: str) -> LotReceived:
    lot = load_stock([DEMO / "lots.csv"], new_id=new_id).lots[0]
    packs = (lot.packs[0].model_copy(update={"label": pack}),)
    return lot.model_copy(update={"label": label, "packs": packs})


def _consumable(label: str, **changed: object) -> ConsumableReceived:
    received = load_stock([DEMO / "consumables.csv"], new_id=new_id).consumables
    adhesive = next(each for each in received if each.type == "adhesive")
    return adhesive.model_copy(update={"label": label, "id": new_id(), **changed})


def _faults(caught: pytest.ExceptionInfo[Faulty]) -> str:
    return "\n".join(str(fault) for fault in caught.value.faults)


def test_what_was_received_before_is_told_all_at_once(job: Job) -> None:
    again = load_stock([DEMO / "lots.csv", DEMO / "consumables.csv"], new_id=new_id)
    with pytest.raises(Faulty) as caught:
        stock.receive(job.book, job.keys["c.ward"], again)
    packs = sum(len(lot.packs) for lot in again.lots)
    assert packs + len(again.consumables) == len(caught.value.faults)


def test_one_that_is_there_keeps_the_whole_delivery_out(job: Job) -> None:
    delivery = Delivery((_lot("L-9", "P9"),), (_consumable("ad-612"),))
    with pytest.raises(Faulty):
        stock.receive(job.book, job.keys["c.ward"], delivery)
    with job.book.reading() as view:
        assert ["L-3504"] == [row.label for row in view.all(LotRow)]


def test_two_packs_of_one_label_are_refused(job: Job) -> None:
    with pytest.raises(Faulty) as caught:
        stock.receive(job.book, job.keys["c.ward"], Delivery((_lot("L-9", "k7-03"),)))
    assert "lot L-9, pack k7-03: has the label of a pack that is in stock" in _faults(caught)


def test_packs_that_come_later_join_their_lot(job: Job) -> None:
    later = _lot("l-3504", "K7-09").model_copy(update={"received_on": "2026-11-16"})
    done = stock.receive(job.book, job.keys["c.ward"], Delivery((later,)))
    assert (0, 1, 0) == (done.lots, done.packs, done.consumables)
    with job.book.reading() as view:
        (lot,) = view.all(LotRow)
        gauge = view.gauge("K7-09/5")
    assert gauge is not None
    assert (lot.id, "on shelf", "2026-11-16") == (gauge.lot, gauge.state, gauge.received_on)
    job.walk(1)
    assert job.do("t.okoro", {**WALK[1][1], "gauge": "K7-09/5"}).settled
    assert check_logbook(job.book).ok


def test_packs_of_another_certificate_are_no_packs_of_the_lot(job: Job) -> None:
    lot = _lot("L-3504", "K7-09")
    grids = (lot.grids[0].model_copy(update={"gauge_factor": Quantity(value="2.10", unit="1")}),)
    other = lot.model_copy(update={"grids": grids, "expires": "2030-01-01"})
    with pytest.raises(Faulty) as caught:
        stock.receive(job.book, job.keys["c.ward"], Delivery((other,)))
    assert ["lot L-3504, gauge_factor", "lot L-3504, expires"] == [
        fault.where for fault in caught.value.faults
    ]
    with job.book.reading() as view:
        assert view.gauge("K7-09/1") is None


def test_a_figure_written_otherwise_is_the_same_figure(job: Job) -> None:
    lot = _lot("L-3504", "K7-09")
    same = lot.model_copy(update={"nominal_resistance": Quantity(value="350.0", unit="ohm")})
    assert 1 == stock.receive(job.book, job.keys["c.ward"], Delivery((same,))).packs


def test_a_lot_that_is_scrapped_gets_no_more_packs_and_one_in_quarantine_lends_none(
    job: Job,
) -> None:
    planner = job.keys["c.ward"]
    set_standing(job.book, planner, label="L-3504", standing="quarantined", reason="recalled")
    stock.receive(job.book, planner, Delivery((_lot("L-3504", "K7-09"),)))
    job.walk(1)
    with pytest.raises(Faulty) as taken:
        job.do("t.okoro", {**WALK[1][1], "gauge": "K7-09/1"})
    assert "lot L-3504 is quarantined: recalled" in _faults(taken)
    set_standing(job.book, planner, label="L-3504", standing="scrapped", reason="recalled.")
    with pytest.raises(Faulty) as caught:
        stock.receive(job.book, planner, Delivery((_lot("L-3504", "K7-10"),)))
    assert "lot L-3504: is scrapped: recalled." in _faults(caught)


def test_a_gauge_of_another_lot_than_planned_is_refused(job: Job) -> None:
    stock.receive(job.book, job.keys["c.ward"], Delivery((_lot("L-9", "P9"),)))
    walk_to(job, "gauge")
    with pytest.raises(Faulty) as caught:
        job.do("t.okoro", {**typed_here(job)[1], "gauge": "P9/1"})
    assert "P9/1 is not of lot L-3504, which is planned here" in _faults(caught)


@pytest.mark.parametrize(
    ("label", "changed", "told"),
    [
        ("AD-1", {"expires": "2026-11-16"}, "AD-1 expired on 2026-11-16"),
        ("CT-088", {}, "CT-088 is a lot of coating, not of adhesive"),
        ("AD-99", {}, "no consumable lot is called “AD-99”"),
    ],
)
def test_a_consumable_that_does_not_fit_is_refused(
    job: Job, label: str, changed: dict[str, object], told: str
) -> None:
    if changed:
        new = _consumable(label, **changed)
        stock.receive(job.book, job.keys["c.ward"], Delivery((), (new,)))
    walk_to(job, "bond")
    with pytest.raises(Faulty) as caught:
        job.do("t.okoro", {**typed_here(job)[1], "adhesive": label})
    assert told in _faults(caught)


def test_a_lot_may_be_used_on_its_last_day(job: Job) -> None:
    new = _consumable("AD-2", expires="2026-11-17")
    stock.receive(job.book, job.keys["c.ward"], Delivery((), (new,)))
    walk_to(job, "bond")
    assert job.do("t.okoro", {**typed_here(job)[1], "adhesive": "ad-2"}).settled


def _meter(**changed: object) -> InstrumentAdded:
    meters = load_instruments(DEMO / "instruments.toml", new_id=new_id)
    meter = next(each for each in meters if each.label == "RM-2")
    return meter.model_copy(update={"id": new_id(), **changed})


def _meters(job: Job) -> dict[str, str]:
    with job.book.reading() as view:
        return {row.label: row.id for row in view.all(InstrumentRow)}


def test_a_meter_calibrated_anew_keeps_its_id(job: Job) -> None:
    before = _meters(job)
    anew = _meter(label="rm-2", calibrated_on="2026-11-16", due="2027-11-16")
    instruments.add(job.book, job.keys["c.ward"], [anew])
    assert set(before.values()) == set(_meters(job).values())
    walk_to(job, "gauge")
    job.clock.advance(300 * 86400)  # beyond the first certificate's due date
    assert job.do("t.okoro", typed_here(job)[1]).settled


def test_a_meter_that_is_overdue_is_refused(job: Job) -> None:
    instruments.add(job.book, job.keys["c.ward"], [_meter(due="2026-11-16")])
    walk_to(job, "gauge")
    with pytest.raises(Faulty) as caught:
        job.do("t.okoro", typed_here(job)[1])
    assert "was due for calibration on 2026-11-16" in _faults(caught)


def test_a_meter_is_not_used_before_the_day_it_was_calibrated(job: Job) -> None:
    walk_to(job, "gauge")
    job.clock.advance(86400)
    instruments.add(job.book, job.keys["c.ward"], [_meter(calibrated_on="2026-11-18")])
    with pytest.raises(Faulty) as caught:
        job.do("t.okoro", typed_here(job)[1], at="2026-11-17 10:00")
    assert "was calibrated only on 2026-11-18" in _faults(caught)


def test_a_calibration_in_the_future_is_refused(job: Job) -> None:
    meters = [_meter(calibrated_on="2026-11-18"), _meter(label="RM-9", calibrated_on="2027-01-01")]
    with pytest.raises(Faulty) as caught:
        instruments.add(job.book, job.keys["c.ward"], meters)
    assert (
        "instrument RM-2: was calibrated on 2026-11-18, which lies in the future. Give the date on "
        "its certificate.\ninstrument RM-9: was calibrated on 2027-01-01"
    ) in _faults(caught)
    assert "RM-9" not in _meters(job)


def test_a_calibration_of_today_is_taken(job: Job) -> None:
    instruments.add(job.book, job.keys["c.ward"], [_meter(calibrated_on="2026-11-17")])


def test_a_value_beyond_every_range_of_the_meter_is_refused(job: Job) -> None:
    walk_to(job, "insulation")
    with pytest.raises(Faulty) as caught:
        job.do("t.okoro", {**typed_here(job)[1], "insulation": ">50 GΩ"})
    assert "has no range that reaches 50 GΩ" in _faults(caught)


def test_a_tester_with_too_high_a_voltage_is_refused_at_the_step(job: Job) -> None:
    meters = load_instruments(DEMO / "instruments.toml", new_id=new_id)
    tester = next(each for each in meters if each.label == "IT-5")
    ranges = tuple(
        each.model_copy(update={"test_voltage": Quantity(value="500", unit="V")})
        for each in tester.ranges
    )
    harsh = tester.model_copy(update={"id": new_id(), "label": "IT-500", "ranges": ranges})
    instruments.add(job.book, job.keys["c.ward"], [harsh])
    walk_to(job, "insulation")
    with pytest.raises(Faulty) as caught:
        job.do("t.okoro", {**typed_here(job)[1], "tester": "IT-500"})
    assert "tests at 500 V; lot L-3504 allows 50 V at most" in _faults(caught)
    assert job.do("t.okoro", typed_here(job)[1]).settled


@pytest.mark.parametrize("step", ["gauge", "bond"])
def test_a_gauge_of_an_expired_lot_is_refused(job: Job, step: str) -> None:
    walk_to(job, step)
    job.clock.advance(3 * 365 * 86400)  # past the lot's last day, 2029-09-01
    anew = [_meter(calibrated_on="2029-06-01", due="2030-06-01")]
    instruments.add(job.book, job.keys["c.ward"], anew)
    stock.receive(job.book, job.keys["c.ward"], Delivery((), (_consumable("AD-3", expires=None),)))
    if step == "bond":
        steps.redo(job.book, job.keys["t.okoro"], point="FB-1", step="condition", reason="late")
        job.do("t.okoro", {"clean": "yes"})
    typed = typed_here(job)[1]
    with pytest.raises(Faulty) as caught:
        job.do("t.okoro", {**typed, **({"adhesive": "AD-3"} if "adhesive" in typed else {})})
    assert ["L-3504 expired on 2029-09-01."] == [fault.what for fault in caught.value.faults]


def test_the_plan_check_refuses_a_lot_that_has_expired(job: Job) -> None:
    assert not [each for each in plan.check(job.book) if "expired" in each.figure]
    job.clock.advance(3 * 365 * 86400)
    found = [each for each in plan.check(job.book) if "expired" in each.figure]
    assert [("refusal", "lot L-3504", "expired on 2029-09-01")] == [
        (each.level, each.subject, each.figure) for each in found
    ]


def test_a_reviewer_alone_receives_nothing_and_adds_no_meter(job: Job) -> None:
    with pytest.raises(Refused, match="role planner or technician or custodian"):
        stock.receive(job.book, job.keys["q.reyes"], Delivery((_lot("L-9", "P9"),)))
    with pytest.raises(Refused, match="role planner or technician or custodian"):
        instruments.add(job.book, job.keys["q.reyes"], [_meter()])
