"""A released plan is revised: changes are told, work is kept, touched points await a reviewer."""

from __future__ import annotations

import shutil
from pathlib import Path

import pytest

from gaugelog.errors import Faulty, Refused
from gaugelog.ledger.campaign import CampaignRow
from gaugelog.ledger.points import PointRow
from gaugelog.ledger.revisions import PlanRevised
from gaugelog.ledger.story import StoryRow
from gaugelog.work import people, plan, reviews, revising, steps
from gaugelog.work.history import check_logbook
from gaugelog.work.people import Newcomer
from gaugelog.work.reviewing import evidence_of
from tests.work.job import DEMO, WALK, WORD, Job

WHY = "drawing revision C"
SHIFT = ("150,220,outside", "180,220,outside")


class Planner:
    """The planner's folder, and what is done with it."""

    def __init__(self, job: Job, folder: Path) -> None:
        self.job, self.folder = job, folder
        shutil.copytree(DEMO / "plan", folder)

    def edit(self, file: str, before: str, now: str) -> Planner:
        """Change a text of a file that stands there once."""
        path = self.folder / file
        text = path.read_text(encoding="utf-8")
        assert 1 == text.count(before), text
        path.write_text(text.replace(before, now), encoding="utf-8")
        return self

    def drop(self, file: str, start: str) -> Planner:
        """Take a line out of a file."""
        path = self.folder / file
        lines = path.read_text(encoding="utf-8").splitlines(keepends=True)
        path.write_text(
            "".join(line for line in lines if not line.startswith(start)), encoding="utf-8"
        )
        return self

    def add_channel(self) -> Planner:
        """Give the module a third channel like the others."""
        path = self.folder / "campaign.toml"
        head, mark, last = path.read_text(encoding="utf-8").rpartition("  [[module.channel]]")
        third = last.replace('"2"\n', '"3"\n', 1).replace("J2", "J3")
        path.write_text(f"{head}{mark}{last}\n{mark}{third}", encoding="utf-8")
        return self

    def rewire(self) -> Planner:
        """Wire the first circuit to the third channel."""
        return self.edit("circuits.csv", "M1,1,", "M1,3,")

    def draft(self, reason: str = WHY) -> PlanRevised:
        """Load the folder as a revision."""
        facts = plan.understand(self.job.book, self.folder)
        return revising.revise(self.job.book, self.job.keys["c.ward"], facts, reason=reason)

    def release(self) -> int:
        """Release the draft; returns its number."""
        done = plan.release(self.job.book, self.job.keys["c.ward"], meaning="I release.")
        assert check_logbook(self.job.book).ok
        return done.revision


@pytest.fixture
def planner(job: Job, tmp_path: Path) -> Planner:
    """The planner of a job whose plan is released."""
    return Planner(job, tmp_path / "plan")


def _told(revised: PlanRevised) -> list[tuple[str, str, str, tuple[str, ...]]]:
    return [(each.subject, each.label, each.what, each.lines) for each in revised.changes]


def _points(job: Job) -> dict[str, PointRow]:
    with job.book.reading() as view:
        return {row.label: row for row in view.all(PointRow)}


def _see(job: Job, redo_from: str = "", who: str = "q.reyes") -> None:
    revising.see(
        job.book,
        job.keys[who],
        point="FB-1",
        remark="moved before bonding",
        meaning="I looked.",
        redo_from=redo_from,
    )


def test_a_changed_place_is_told_and_the_rest_recognised(planner: Planner) -> None:
    revised = planner.edit("grids.csv", *SHIFT).draft()
    assert 2 == revised.revision
    assert [("point", "FB-2", "changed", ("place x: 150 mm → 180 mm",))] == _told(revised)
    assert (None, None, (), ()) == (
        revised.job,
        revised.criteria,
        revised.routes,
        revised.circuits,
    )


def test_a_draft_changes_nothing_until_it_is_released(planner: Planner) -> None:
    before = _points(planner.job)
    planner.edit("grids.csv", *SHIFT).draft()
    assert {label: row.data for label, row in before.items()} == {
        label: row.data for label, row in _points(planner.job).items()
    }
    assert planner.job.do("t.okoro", {"safe": "yes"}).settled
    assert 2 == planner.release()
    after = _points(planner.job)
    assert before["FB-2"].id == after["FB-2"].id
    assert before["FB-2"].data != after["FB-2"].data
    assert before["FB-1"].data == after["FB-1"].data


def test_a_later_draft_replaces_an_earlier_one(planner: Planner) -> None:
    planner.edit("grids.csv", *SHIFT).draft()
    planner.edit("grids.csv", "180,220", "150,220").edit("circuits.csv", "3,18,", "3,28,").draft()
    assert ["circuit"] == [change.subject for change in revising.changes(planner.job.book).changes]
    planner.release()
    assert '"value":"150"' in _points(planner.job)["FB-2"].data.replace(" ", "")


def test_the_same_files_are_no_revision(planner: Planner) -> None:
    with pytest.raises(Refused, match="say what revision 1 says already"):
        planner.draft()


def test_a_revision_needs_a_reason_and_a_planner(planner: Planner) -> None:
    facts = plan.understand(planner.job.book, planner.edit("grids.csv", *SHIFT).folder)
    with pytest.raises(Faulty):
        revising.revise(planner.job.book, planner.job.keys["c.ward"], facts, reason=" ")
    with pytest.raises(Refused, match="role planner"):
        revising.revise(planner.job.book, planner.job.keys["t.okoro"], facts, reason=WHY)
    with pytest.raises(Refused, match="is released"):
        plan.load(planner.job.book, planner.job.keys["c.ward"], facts)


def test_the_draft_is_checked_as_if_it_stood_and_a_refusal_keeps_it_back(planner: Planner) -> None:
    planner.edit("circuits.csv", "M1,2,", "M1,1,").draft()
    refused = [each for each in plan.check(planner.job.book) if each.level == "refusal"]
    assert refused
    with pytest.raises(Refused, match="The plan check refuses"):
        planner.release()


def test_an_untouched_point_goes_on_and_a_touched_one_waits_for_a_reviewer(
    planner: Planner,
) -> None:
    job = planner.job
    job.walk(6)
    planner.edit("grids.csv", 'centre line",0,0,', 'centre line",40,0,').draft()
    planner.release()
    line = "plan revision 2: place x: 0 mm → 40 mm"
    found = steps.next_step(job.book, "FB-1")
    assert line in found.blocks[0]
    shown = {row.point: row.touched for row in plan.overview(job.book)}
    assert {"FB-1": (line,), "FB-2": ()} == shown
    with pytest.raises(Refused, match="A reviewer looks first"):
        job.do("t.okoro", WALK[6][1])
    _see(job, "layout")
    found = steps.next_step(job.book, "FB-1")
    assert found.step is not None
    assert ("layout", ()) == (found.step.id, found.blocks)


def test_only_a_reviewer_who_did_no_step_sees_a_change_and_only_once(planner: Planner) -> None:
    planner.job.walk(6)
    with pytest.raises(Refused, match="No change of the plan waits"):
        _see(planner.job)
    planner.edit("grids.csv", ",0,0,underside", ",40,0,underside").draft()
    planner.release()
    with pytest.raises(Refused, match="role reviewer"):
        _see(planner.job, who="c.ward")
    _see(planner.job)
    with pytest.raises(Refused, match="No change of the plan waits"):
        _see(planner.job)


def test_criteria_touch_every_point_with_work_and_no_other(planner: Planner) -> None:
    planner.job.walk(2)
    planner.edit("criteria.toml", "coverage = 2", "coverage = 2.5").draft()
    planner.release()
    touched = {label: row.touched != "[]" for label, row in _points(planner.job).items()}
    assert {"FB-1": True, "FB-2": False} == touched


def test_a_circuit_on_another_channel_touches_its_point(planner: Planner) -> None:
    planner.job.walk(2)
    revised = planner.add_channel().rewire().draft()
    assert [
        ("channel", "M1/3", "added", ()),
        ("circuit", "C-1", "changed", ("channel: M1/1 → M1/3",)),
    ] == _told(revised)
    planner.release()
    assert "circuit C-1 channel: M1/1" in _points(planner.job)["FB-1"].touched


def test_an_accepted_point_keeps_its_record_and_its_state(planner: Planner) -> None:
    job = planner.job
    job.walk()
    job.submit()
    job.accept()
    before = reviews.record(job.book, point="FB-1").pdf
    planner.edit("grids.csv", ",0,0,underside", ",40,0,underside").draft()
    planner.release()
    assert "accepted" == job.state()
    assert before == reviews.record(job.book, point="FB-1").pdf
    with pytest.raises(Refused, match="accepted; no step can be done again") as caught:
        _see(job, "layout")
    assert "gaugelog amend FB-1" in caught.value.remedy
    _see(job)
    assert "accepted" == job.state()
    with job.book.reading() as view:
        turns = [row.turn for row in view.all(StoryRow)]
    assert ["submitted", "accepted", "plan changed", "change seen"] == turns


def test_a_point_under_review_whose_plan_changed_is_submitted_anew(planner: Planner) -> None:
    job = planner.job
    job.walk()
    job.submit()
    planner.edit("grids.csv", ",0,0,underside", ",40,0,underside").draft()
    planner.release()
    with pytest.raises(Refused, match="The plan changed under FB-1"):
        job.accept()
    _see(job)
    # The record tells what the plan said before; nobody signs that, and a reviewer is told at once.
    assert any(
        "changed since its record was submitted" in each
        for each in evidence_of(job.book, "FB-1", "q.reyes").blocks
    )
    with pytest.raises(Refused, match="changed since its record was submitted"):
        job.accept()
    reviews.give_back(job.book, job.keys["q.reyes"], point="FB-1", reason="the plan changed")
    job.submit()
    assert 2 == job.accept().revision


def test_who_released_a_revision_does_not_look_at_its_changes(planner: Planner) -> None:
    job = planner.job
    job.walk(3)
    planner.edit("grids.csv", ",0,0,underside", ",40,0,underside").draft()
    people.enrol(
        *(job.book, job.keys["c.ward"], job.folder.unlock_authority(WORD), job.folder),
        newcomer=Newcomer("r.both", "Ro Both", "RB", ("planner", "reviewer")),
        passphrase=WORD,
    )
    job.keys["r.both"] = job.folder.unlock("r.both", WORD)
    plan.release(job.book, job.keys["r.both"], meaning="I release.")
    with pytest.raises(Refused, match="released this revision"):
        _see(job, who="r.both")
    _see(job)


def test_a_dropped_point_goes_where_nothing_was_done_and_else_is_withdrawn(
    planner: Planner,
) -> None:
    job = planner.job
    planner.drop("grids.csv", "FB-2").drop("circuits.csv", "C-2").draft()
    planner.release()
    assert ["FB-1"] == list(_points(job))
    job.walk(2)
    line = next(
        row
        for row in (DEMO / "plan" / "grids.csv").read_text(encoding="utf-8").splitlines()
        if row.startswith("FB-2")
    )
    grids = planner.folder / "grids.csv"
    grids.write_text(grids.read_text(encoding="utf-8") + line + "\n", encoding="utf-8")
    planner.edit("circuits.csv", "grid FB-1", "grid FB-2").drop("grids.csv", "FB-1").draft()
    assert 3 == planner.release()
    assert {"FB-1": "withdrawn", "FB-2": "released"} == {
        row.point: row.state for row in plan.overview(job.book)
    }
    with pytest.raises(Refused, match="withdrawn"):
        job.do("t.okoro", WALK[2][1])


def test_an_added_point_is_released_with_the_revision(planner: Planner) -> None:
    row = (planner.folder / "grids.csv").read_text(encoding="utf-8").splitlines()[2]
    grids = planner.folder / "grids.csv"
    more = row.replace("FB-2", "FB-3").replace("150,220", "150,420")
    grids.write_text(grids.read_text(encoding="utf-8") + more + "\n", encoding="utf-8")
    wire = (planner.folder / "circuits.csv").read_text(encoding="utf-8").splitlines()[2]
    circuits = planner.folder / "circuits.csv"
    more = wire.replace("C-2", "C-3").replace("FB-2", "FB-3").replace("M1,2", "M1,3")
    circuits.write_text(circuits.read_text(encoding="utf-8") + more + "\n", encoding="utf-8")
    assert [
        ("channel", "M1/3", "added", ()),
        ("point", "FB-3", "added", ()),
        ("circuit", "C-3", "added", ()),
    ] == _told(planner.add_channel().draft())
    planner.release()
    assert planner.job.do("t.okoro", {"safe": "yes"}, "FB-3").settled
    with planner.job.book.reading() as view:
        (campaign,) = view.all(CampaignRow)
    assert (2, "released") == (campaign.revision, campaign.state)


def test_a_revised_logbook_is_replayed_to_the_same_tables(planner: Planner) -> None:
    planner.job.walk(3)
    planner.edit("grids.csv", *SHIFT).add_channel().rewire().draft()
    planner.release()
    before = plan.overview(planner.job.book)
    planner.job.book.rebuild()
    assert before == plan.overview(planner.job.book)
