"""What was kept past the program, by people who had no right to it, shows in the check."""

from __future__ import annotations

from pathlib import Path

import pytest

from gaugelog.ledger.base import FactBody
from gaugelog.ledger.campaign import PlanReleased
from gaugelog.ledger.reviews import PointAccepted, PointReturned
from gaugelog.ledger.rights import RIGHTS
from gaugelog.ledger.steps import StepSkipped
from gaugelog.work import people
from gaugelog.work.history import check_logbook
from gaugelog.work.people import Newcomer
from tests.work.job import TYPED, WALK, WORD, Job, before, released_job


@pytest.fixture
def submitted(tmp_path: Path) -> Job:
    """FB-1 under review."""
    job = released_job(tmp_path)
    job.walk()
    job.submit()
    return job


def kept(job: Job, who: str, body: FactBody) -> list[str]:
    """Keep a fact past every rule; what the check then says."""
    with job.book.deed(job.keys[who]) as deed:
        deed.keep(body, [])
    return [trouble.what for trouble in check_logbook(job.book).troubles]


def accepted_by(job: Job, person: str) -> PointAccepted:
    """FB-1 accepted in somebody's name."""
    with job.book.reading() as view:
        row = view.point("FB-1")
    assert row is not None
    file = job.book.evidence.put(b"%PDF-")
    return PointAccepted(
        point=row.id, revision=1, file=file, head="1:A", meaning="I accept.", accepted_by=person
    )


def test_nobody_accepts_in_the_name_of_another(submitted: Job) -> None:
    found = kept(submitted, "t.okoro", accepted_by(submitted, "q.reyes"))
    assert "It names q.reyes as the one who acted, but t.okoro signed it." in found
    assert "t.okoro did not have the role reviewer then." in found
    assert any("second person" in what for what in found)
    assert any("two signatures are of two people" in what for what in found)


def test_a_reviewer_may_accept(submitted: Job) -> None:
    assert [] == kept(submitted, "q.reyes", accepted_by(submitted, "q.reyes"))


def test_a_role_is_asked_as_it_was_then(submitted: Job) -> None:
    with submitted.book.reading() as view:
        row = view.point("FB-1")
    assert row is not None
    returned = PointReturned(
        point=row.id, revision=1, reason="dirt", redo_from="", returned_by="c.ward"
    )
    assert ["c.ward did not have the role reviewer then."] == kept(submitted, "c.ward", returned)


def test_who_only_measured_is_no_second_person(tmp_path: Path) -> None:
    job = released_job(tmp_path)
    newcomer = Newcomer("b.oth", "Bo Oth", "BO", ("technician", "reviewer"))
    job.keys["b.oth"] = people.enrol(
        *(job.book, job.keys["c.ward"], job.folder.unlock_authority(WORD), job.folder),
        newcomer=newcomer,
        passphrase=WORD,
    )
    job.walk(before("insulation"))
    typed = TYPED["insulation"][1]
    job.do("b.oth", {**typed, "insulation": "0.2 GΩ"})
    job.do("t.okoro", typed, reason="dried")
    for who, more in WALK[before("insulation") + 1 :]:
        job.do(who, more)
    job.submit()
    found = kept(job, "b.oth", accepted_by(job, "b.oth"))
    assert ["b.oth did a step of this point, which asks for a second person."] == found


def test_a_plan_is_released_by_a_planner(submitted: Job) -> None:
    with submitted.book.reading() as view:
        row = view.point("FB-1")
    assert row is not None
    body = PlanReleased(campaign=row.campaign, revision=1, meaning="I release.")
    assert ["q.reyes did not have the role planner then."] == kept(submitted, "q.reyes", body)


def test_every_field_that_names_who_acted_is_one_of_the_fact() -> None:
    kinds = {each.kind: each for each in FactBody.__subclasses__() if hasattr(each, "kind")}
    for kind, right in RIGHTS.items():
        assert kind in kinds
        if right.named:
            assert right.named in kinds[kind].model_fields
    assert StepSkipped.kind in RIGHTS
