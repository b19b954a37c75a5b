from __future__ import annotations

from collections.abc import Iterator
from pathlib import Path

import pytest

from gaugelog import __version__
from gaugelog.documents.content import RecordContent, build
from gaugelog.documents.page import record_html
from gaugelog.errors import Refused
from gaugelog.ledger.reviews import PointAccepted, PointReopened, PointSubmitted
from gaugelog.work.ports import RecordRequest
from tests.documents.joblog import POINT, Job, job, work
from tests.documents.signers import SUBMITTED


@pytest.fixture(scope="module")
def made(tmp_path_factory: pytest.TempPathFactory) -> Job:
    folder: Path = tmp_path_factory.mktemp("job")
    planned = job(folder)
    work(planned)
    return planned


@pytest.fixture(scope="module")
def content(made: Job) -> Iterator[RecordContent]:
    with made.logbook.reading() as view:
        yield build(view, made.request(), "t.okondo")


def test_the_record_is_numbered_by_campaign_point_and_revision(content: RecordContent) -> None:
    assert "FB7-P1-R1" == content.number


def test_the_record_says_when_and_from_which_head_it_was_drawn(
    made: Job, content: RecordContent
) -> None:
    assert made.logbook.head().printed == content.drawn.head
    assert SUBMITTED.text == content.drawn.at
    assert "+01:00" == content.drawn.offset
    assert f"Gaugelog {__version__}" == content.drawn.program


def test_the_gauge_in_place_carries_its_lots_figures(content: RecordContent) -> None:
    assert content.gauge is not None
    assert ("L42-A/3", "L42", 1) == (
        content.gauge.label,
        content.gauge.lot,
        content.gauge.generation,
    )
    assert "350 Ω" == str(content.gauge.nominal_resistance)
    assert "2.07" == content.gauge.grids[0].gauge_factor.value


def test_the_circuit_names_its_grid_its_resistors_and_its_channel(content: RecordContent) -> None:
    (circuit,) = content.circuits
    assert ["P1-1", "350 Ω", "350 Ω", "350 Ω"] == [arm[0].label for arm in circuit.arms]
    assert "M1/3" == circuit.channel.label
    assert ("eight-channel bridge module", "BM-2207") == (
        circuit.channel.module_type,
        circuit.channel.module_serial,
    )


def test_every_step_of_the_route_is_there_in_order(content: RecordContent) -> None:
    said = [(step.number, step.step, step.subject, step.outcome) for step in content.steps]
    assert [
        (1, "receive", "P1-1", "done"),
        (2, "received", "P1-1", "done"),
        (3, "layout-hold", "P1", "released"),
        (4, "bond", "P1-1", "done"),
        (5, "bonded", "P1-1", "done"),
        (6, "wire", "C1", "done"),
    ] == said


def test_inputs_are_shown_as_typed_with_what_they_mean(content: RecordContent) -> None:
    (gauge,), (adhesive,) = content.steps[0].inputs, content.steps[3].inputs
    assert ("Gauge", "l42-a/3", "L42-A/3") == (gauge.prompt, gauge.typed, gauge.means)
    assert "AD-19, Cyanoacrylate 2" == adhesive.means


def test_every_attempt_is_kept_and_only_the_last_is_latest(content: RecordContent) -> None:
    said = [(each.check, each.stage, each.attempt, each.latest) for each in content.readings]
    assert [
        ("resistance", "received", 1, True),
        ("resistance", "bonded", 1, True),
        ("insulation", "bonded", 1, False),
        ("insulation", "bonded", 2, True),
    ] == said


def test_a_reading_says_when_and_by_whom_it_was_entered(content: RecordContent) -> None:
    first = content.readings[0]
    assert "2026-12-01T08:12:00Z" == first.observed_at
    assert SUBMITTED.text == first.entered_at
    assert ("t.okondo", "t.okondo", "OM-1", "P1-1") == (
        first.observed_by,
        first.entered_by,
        first.instrument,
        first.subject,
    )


def test_instruments_are_listed_with_the_ranges_that_were_used(content: RecordContent) -> None:
    assert [("IM-2", ["20 GΩ"]), ("OM-1", ["1 kΩ"])] == [
        (each.label, [span.name for span in each.ranges]) for each in content.instruments
    ]


def test_materials_are_those_entered_and_the_cable_of_the_plan(content: RecordContent) -> None:
    assert ["AD-19", "CB-3"] == [each.label for each in content.consumables]


def test_people_are_listed_with_their_part(content: RecordContent) -> None:
    assert [
        ("t.okondo", "TO", ("steps", "readings", "submission")),
        ("w.brandt", "WB", ("holds",)),
    ] == [(each.id, each.initials, each.part) for each in content.people]


def test_cautions_of_article_and_route_stand_once(content: RecordContent) -> None:
    assert "Work at height: harness, and site permit WH-31." in content.cautions
    assert len(set(content.cautions)) == len(content.cautions)
    assert any("Cyanoacrylate" in each for each in content.cautions)


def test_without_a_signer_it_is_a_draft(made: Job) -> None:
    with made.logbook.reading() as view:
        draft = build(view, made.request())
    assert "draft" == draft.state
    assert draft.signing is None


def test_a_point_where_nothing_was_done_has_open_steps_and_no_gauge(tmp_path: Path) -> None:
    fresh = job(tmp_path)
    with fresh.logbook.reading() as view:
        draft = build(view, fresh.request())
    assert {"open"} == {step.outcome for step in draft.steps}
    assert draft.gauge is None
    assert () == draft.readings
    assert () == draft.people


def test_an_unknown_point_is_refused(made: Job) -> None:
    request = RecordRequest("nowhere", 1, "1:X", SUBMITTED, "")
    with made.logbook.reading() as view, pytest.raises(Refused, match="no such point"):
        build(view, request)


def test_a_first_record_without_turns_has_no_story(content: RecordContent) -> None:
    assert content.story == ()
    assert content.amends is None


def test_an_amended_record_names_the_revision_the_reason_and_the_story(
    tmp_path_factory: pytest.TempPathFactory,
) -> None:
    made = job(tmp_path_factory.mktemp("amended"))
    work(made)
    head, why = made.logbook.head().printed, "wrong cable lot"
    made.keep(made.technician, _submitted(head))
    made.keep(made.reviewer, _accepted(head))
    made.keep(
        made.technician,
        PointReopened(point=POINT, revision=1, reason=why, reopened_by="t.okondo"),
    )
    with made.logbook.reading() as view:
        shown = build(view, made.request(), "t.okondo")
    assert shown.amends is not None
    assert (1, why, "t.okondo") == (shown.amends.revision, shown.amends.reason, shown.amends.by)
    assert [("submitted", 1), ("accepted", 1), ("amendment", 1)] == [
        (turn.turn, turn.revision) for turn in shown.story
    ]
    assert "w.brandt" in {person.id for person in shown.people}
    page = record_html(shown)
    assert "takes the place of revision 1" in page
    assert page.count(why) == 2


def _submitted(head: str) -> PointSubmitted:
    return PointSubmitted(
        point=POINT, revision=1, file="0" * 64, head=head, meaning="M", submitted_by="t.okondo"
    )


def _accepted(head: str) -> PointAccepted:
    return PointAccepted(
        point=POINT, revision=1, file="1" * 64, head=head, meaning="M", accepted_by="w.brandt"
    )
