"""Readings: each observation as typed, with the limit that ruled and the verdict."""

from __future__ import annotations

import json
from collections.abc import Iterator
from typing import ClassVar, Literal

from pydantic import ConfigDict
from sqlmodel import Field, SQLModel

from gaugelog.ledger.base import DecimalText, FactBody, Id, Part, Quantity, TimeText
from gaugelog.ledger.progress import mark, under_way
from gaugelog.ledger.rows import At, Change, Known, Put, Row, have
from gaugelog.ledger.sharing import sharers

Word = Literal["pass", "conditional pass", "conditional fail", "fail", "undecided"]
Qualifier = Literal["=", ">", "<", "overload"]


class LimitFound(Part):
    """One limit that applies to a reading; the strictest rules."""

    origin: Literal["criteria", "permitted error", "prediction"]
    at_least: Quantity | None = None
    at_most: Quantity | None = None
    source: str
    formula: str = ""
    rules: bool


class Verdict(Part):
    """The judgement of a reading, with the digits that decided."""

    word: Word
    blocks: bool
    """Whether the word keeps the work from going on, by the criteria."""
    probability: DecimalText | None = None
    """Probability of conformance (JCGM 106, flat prior); none where it can't be given."""
    standard_uncertainty: Quantity | None = None
    guard_band: Quantity | None = None
    coverage: DecimalText = "2"
    reason: str = ""
    flags: tuple[str, ...] = ()
    """What a person should look into though it does not rule: a fall between stages."""
    rule: str
    """Name and version of the rule, `insulation 1`."""


class ReadingTaken(FactBody):
    """One observation of one check at one stage; every attempt is kept."""

    kind: ClassVar[str] = "reading.taken"

    id: Id
    point: Id
    subject: Id
    step: str
    check: str
    stage: str
    attempt: int
    typed: str
    qualifier: Qualifier
    value: Quantity | None = None
    gauge: Id | None = None
    """The piece it was taken on; none in entries from before this was kept."""
    instrument: Id
    range: str
    test_voltage: Quantity | None = None
    conditions: dict[str, Quantity] = {}
    """What was entered beside it, by its type: a temperature, a bandwidth, the zero before."""
    observed_at: TimeText
    observed_by: Id
    reason: str = ""
    """Why it was measured again; empty at the first attempt."""
    repeats: Id | None = None
    """The attempt before this one."""
    compared_with: Id | None = None
    """The earlier reading that this one is held against."""
    shift_check: Id | None = None
    """The check of the meter that speaks for this reading."""
    result: Quantity | None = None
    """What was judged, where it is not the value itself: a change in per cent."""
    limits: tuple[LimitFound, ...] = ()
    verdict: Verdict


class VerdictSeen(Part):
    """Of a verdict, what the tables show in columns of their own."""

    model_config = ConfigDict(frozen=True, extra="ignore")

    word: Word
    blocks: bool


class ReadingSeen(FactBody):
    """Of a reading, what the tables show in columns of their own; the rest is read when asked for.

    A journal is mostly readings: not to build what nobody looks at is half the time of a replay.
    """

    kind: ClassVar[str] = ReadingTaken.kind
    model_config = ConfigDict(frozen=True, extra="ignore")

    id: Id
    point: Id
    subject: Id
    step: str
    check: str
    stage: str
    attempt: int
    typed: str
    instrument: Id
    observed_at: TimeText
    observed_by: Id
    repeats: Id | None = None
    verdict: VerdictSeen


class ReadingRow(SQLModel, table=True):
    """A reading and its verdict."""

    __tablename__ = "reading"

    id: str = Field(primary_key=True)
    point: str = Field(index=True)
    subject: str = Field(index=True)
    step: str
    check: str
    stage: str
    attempt: int
    latest: int
    """1 for the last attempt of this check at this stage on this subject, else 0."""
    typed: str
    word: str
    blocks: int
    instrument: str
    observed_at: str
    observed_by: str
    entered_at: str
    entered_by: str
    data: str
    """The whole of `ReadingTaken` as JSON."""
    seq: int


def apply_reading_taken(known: Known, at: At, fact: ReadingSeen) -> Iterator[Change]:
    """The reading is the latest of its check; one that blocks makes its grids non-conforming.

    What a reading that passes means for the state is told by the step that is done with it.
    """
    if fact.repeats is not None:
        yield Put("reading", {**have(known, "reading", fact.repeats), "latest": 0})
    yield Put(
        "reading",
        {
            "id": fact.id,
            "point": fact.point,
            "subject": fact.subject,
            "step": fact.step,
            "check": fact.check,
            "stage": fact.stage,
            "attempt": fact.attempt,
            "latest": 1,
            "typed": fact.typed,
            "word": fact.verdict.word,
            "blocks": int(fact.verdict.blocks),
            "instrument": fact.instrument,
            "observed_at": fact.observed_at,
            "observed_by": fact.observed_by,
            "entered_at": at.time,
            "entered_by": at.actor,
            "data": at.data,
            "seq": at.seq,
        },
    )
    yield from _marked(known, have(known, "point", fact.point), fact)
    for other in sharers(known, fact.point, fact.subject):
        point = have(known, "point", other)
        if under_way(known, point):
            yield from _marked(known, point, fact)


def _marked(known: Known, point: Row, fact: ReadingSeen) -> Iterator[Change]:
    blocked = _blocked(point["blocked"], fact)
    if blocked != point["blocked"]:
        point["blocked"] = blocked
        yield Put("point", point)
        yield from mark(known, point)


def _blocked(before: str, fact: ReadingSeen) -> str:
    key = f"{fact.subject}/{fact.check}/{fact.stage}"
    if fact.verdict.blocks == (f'"{key}"' in before):
        return before
    others = [each for each in json.loads(before) if each != key]
    return json.dumps([*others, key] if fact.verdict.blocks else others)
