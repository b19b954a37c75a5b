"""What a reviewer looks at: a point's evidence in one look, the smallest margin first."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from itertools import groupby

from gaugelog.errors import Refused
from gaugelog.ledger.instruments import InstrumentRow
from gaugelog.ledger.photos import PhotoKept, PhotoRow
from gaugelog.ledger.points import PointRow
from gaugelog.ledger.readings import ReadingRow, ReadingTaken
from gaugelog.ledger.reviews import RecordRow
from gaugelog.ledger.steps import StepRow
from gaugelog.ledger.story import StoryRow
from gaugelog.ledger.view import View
from gaugelog.rules.flagged import flags_at
from gaugelog.rules.margin import Margin, margin_of
from gaugelog.rules.progress import route_for, state_of, subject_label
from gaugelog.rules.taken import readings_at
from gaugelog.work.doing import point_row
from gaugelog.work.logbook import Logbook
from gaugelog.work.reviews import under_review, unfit


@dataclass(frozen=True, slots=True)
class Waiting:
    """A point whose record waits for a second signature."""

    point: str
    zone: str
    revision: int
    submitted_by: str
    submitted_at: str
    bar: str
    """Why the person who looks may not judge it; empty when they may."""


@dataclass(frozen=True, slots=True)
class CheckFound:
    """A check at a stage on a subject: every attempt, oldest first, and the margin of the last."""

    title: str
    """Title of the step that it was read at."""
    subject: str
    attempts: tuple[ReadingTaken, ...]
    earlier_gauge: int
    """How many of the attempts were on a gauge that was replaced since."""
    instrument: str
    margin: Margin | None

    @property
    def last(self) -> ReadingTaken:
        """The attempt that counts."""
        return self.attempts[-1]


@dataclass(frozen=True, slots=True)
class StepTold:
    """What became of a step on a subject, by whom and when; the note or the reason with it."""

    number: int
    step: str
    title: str
    subject: str
    outcome: str
    by: str
    at: str
    note: str


@dataclass(frozen=True, slots=True)
class PhotoTold:
    """A photo: the step that it shows, its note, by whom and when; its file among the evidence."""

    name: str
    step: str
    note: str
    by: str
    at: str
    file: str
    size: int


@dataclass(frozen=True, slots=True)
class TurnTold:
    """A turn in the point's story: what, by whom, when, why."""

    turn: str
    revision: int
    by: str
    at: str
    reason: str


@dataclass(frozen=True, slots=True)
class PointEvidence:
    """Everything a reviewer judges a point by."""

    point: str
    zone: str
    state: str
    revision: int
    """The newest revision of its record, or 0."""
    record_state: str
    submitted_by: str
    submitted_at: str
    head: str
    checks: tuple[CheckFound, ...]
    """What blocks first, then by the margin, the smallest first; then what has none."""
    steps: tuple[StepTold, ...]
    people: tuple[tuple[str, tuple[str, ...]], ...]
    """Each person with what they did: numbers of steps, holds, readings."""
    photos: tuple[PhotoTold, ...]
    story: tuple[TurnTold, ...]
    bar: str
    """Why the person who looks may not judge it; empty when they may."""
    blocks: tuple[str, ...]
    """What keeps the record from being accepted, whoever looks."""
    flags: tuple[str, ...] = ()
    """What was flagged at steps and readings and is for the reviewer to weigh."""

    @property
    def skipped(self) -> tuple[StepTold, ...]:
        """The steps that were left out, each with its reason."""
        return tuple(each for each in self.steps if each.outcome == "skipped")

    @property
    def noted(self) -> tuple[StepTold, ...]:
        """The steps that somebody left a note at."""
        return tuple(each for each in self.steps if each.note and each.outcome != "skipped")


def waiting_for_review(logbook: Logbook, person: str) -> list[Waiting]:
    """Points under review, oldest submission first, each with why `person` may not judge it."""
    with logbook.reading() as view:
        submitted = view.all(RecordRow, state="submitted")
        labels = {row.id: row for row in view.all(PointRow)}
        return [_waiting(view, labels[row.point], row, person) for row in submitted]


def evidence_of(logbook: Logbook, point: str, person: str) -> PointEvidence:
    """Everything kept of a point, for `person` to judge. Raises Refused when there is none."""
    with logbook.reading() as view:
        row = point_row(view, point)
        records = view.all(RecordRow, point=row.id)
        last = records[-1] if records else None
        return PointEvidence(
            row.label,
            row.zone,
            state_of(view, row),
            last.revision if last else 0,
            last.state if last else "",
            view.name(last.submitted_by) if last else "",
            last.submitted_at if last else "",
            (last.accepted_head or last.submitted_head) if last else "",
            tuple(_checks(view, row)),
            tuple(_steps(view, row)),
            tuple(_people(view, row)),
            tuple(_photos(view, row)),
            tuple(_story(view, row)),
            _bar(view, row.label, person),
            tuple(_blocks(logbook, view, row, last)),
            flags_at(view, row),
        )


def _waiting(view: View, point: PointRow, record: RecordRow, person: str) -> Waiting:
    return Waiting(
        point.label,
        point.zone,
        record.revision,
        view.name(record.submitted_by),
        record.submitted_at,
        _bar(view, point.label, person),
    )


def _bar(view: View, point: str, person: str) -> str:
    try:
        under_review(view, point, person, "review it")
    except Refused as error:
        return _sentence(error)
    return ""


def _blocks(logbook: Logbook, view: View, point: PointRow, record: RecordRow | None) -> list[str]:
    if record is None or record.state != "submitted":
        return []
    with logbook.storage.reading() as reader:
        return [_sentence(each) for each in unfit(view, reader, logbook.chain, point, record)]


def _sentence(refused: Refused) -> str:
    """What a rule says against it, with the way out."""
    return f"{refused.message} {refused.remedy}".strip()


def _checks(view: View, point: PointRow) -> list[CheckFound]:
    rows = sorted(readings_at(view, point.id), key=_same_check)
    meters = {row.id: row.label for row in view.all(InstrumentRow)}
    titles = {step.id: step.title for step in route_for(view, point).steps}
    found = []
    for _key, group in groupby(rows, key=_same_check):
        taken = sorted(group, key=lambda row: row.seq)
        attempts = tuple(ReadingTaken.model_validate_json(row.data) for row in taken)
        found.append(_check(view, point, attempts, titles, meters))
    return sorted(found, key=_worst_first)


def _same_check(row: ReadingRow) -> tuple[str, str, str]:
    return row.subject, row.check, row.stage


def _check(
    view: View,
    point: PointRow,
    attempts: Sequence[ReadingTaken],
    titles: dict[str, str],
    meters: dict[str, str],
) -> CheckFound:
    last = attempts[-1]
    earlier = [each for each in attempts if each.gauge not in {None, last.gauge}]
    return CheckFound(
        titles.get(last.step, last.step),
        subject_label(view, last.subject) or point.label,
        tuple(attempts),
        len(earlier),
        meters.get(last.instrument, last.instrument),
        margin_of(last),
    )


def _worst_first(check: CheckFound) -> tuple[bool, bool, float]:
    share = check.margin.share if check.margin is not None else None
    return not check.last.verdict.blocks, share is None, share or 0.0


def _steps(view: View, point: PointRow) -> Iterator[StepTold]:
    kept = view.all(StepRow, point=point.id)
    for number, step in enumerate(route_for(view, point).steps, start=1):
        for row in kept:
            if row.step == step.id:
                label = subject_label(view, row.subject) or point.label
                by = view.name(row.by)
                yield StepTold(
                    number, step.id, step.title, label, row.outcome, by, row.observed_at, row.note
                )


def _people(view: View, point: PointRow) -> Iterator[tuple[str, tuple[str, ...]]]:
    """Each person with what they did, in the order they came."""
    did: dict[str, list[str]] = {}
    for step in _steps(view, point):
        word = {"released": "let go on at", "done": "did"}.get(step.outcome, step.outcome)
        told = did.setdefault(step.by, [])
        text = f"{word} {step.number}"
        if text not in told:
            told.append(text)
    read: dict[str, int] = {}
    for row in readings_at(view, point.id):
        read[row.observed_by] = read.get(row.observed_by, 0) + 1
    for person, count in read.items():
        did.setdefault(view.name(person), []).append(f"{count} reading{'s'[: count > 1]}")
    for name, told in did.items():
        yield name, tuple(told)


def _photos(view: View, point: PointRow) -> Iterator[PhotoTold]:
    titles = {step.id: step.title for step in route_for(view, point).steps}
    for row in view.all(PhotoRow, point=point.id):
        kept = PhotoKept.model_validate_json(row.data)
        step = titles.get(kept.step, "the point")
        by = view.name(kept.kept_by)
        yield PhotoTold(kept.name, step, kept.note, by, kept.observed_at, kept.file, kept.size)


def _story(view: View, point: PointRow) -> Iterator[TurnTold]:
    for row in view.all(StoryRow, point=point.id):
        yield TurnTold(row.turn, row.revision, view.name(row.by), row.at, row.reason)
