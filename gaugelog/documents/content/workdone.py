"""What was done and found: steps and readings as the record has them."""

from __future__ import annotations

from pydantic import Field

from gaugelog.documents.content.base import Shown
from gaugelog.ledger.base import Id, Quantity, TimeText
from gaugelog.ledger.readings import LimitFound, Qualifier, Verdict
from gaugelog.ledger.routes import Window


class InputShown(Shown):
    """What was entered for one input of a step."""

    prompt: str
    typed: str
    means: str = ""
    """Label of the gauge, consumable or instrument meant, where it is not as typed."""
    photo: Id | None = None
    """The photo that was given; one of the record's."""


class StepShown(Shown):
    """A step of the route on one subject, and what became of it."""

    number: int
    """Place in the route, from 1."""
    step: str
    title: str
    subject: str
    """Label of the grid or circuit; of the point for a step on the place."""
    hold: bool
    instruction: str
    windows: tuple[Window, ...] = ()
    outcome: str
    """`done`, `skipped`, `released`, `refused`, `reopened`, or `open`: not reached."""
    by: str = ""
    """Id of the person; empty while open."""
    observed_at: TimeText | None = None
    entered_at: TimeText | None = None
    note: str = ""
    """The note, or the reason of a skip or refusal."""
    inputs: tuple[InputShown, ...] = ()
    flags: tuple[str, ...] = ()
    """What the program saw and could not judge, for the reviewer's eye."""


class AmendsShown(Shown):
    """The accepted record that this one takes the place of, and why."""

    revision: int
    reason: str
    by: Id
    """Who took the point up again."""


class TurnShown(Shown):
    """One turn in the story of the point, before this record was drawn."""

    at: TimeText
    turn: str
    """`submitted`, `returned`, `accepted`, `amendment`, `hold refused`, `step reopened` …"""
    revision: int = 0
    """The revision of the record it concerns, or 0."""
    step: str = ""
    """Title of the step it concerns or goes back to."""
    by: Id
    reason: str = ""


class PhotoShown(Shown):
    """A photo as it was given; the record shows a smaller copy without the camera's data."""

    id: Id
    step: str = ""
    """Title of the step that it shows; empty for the point as a whole."""
    subject: str = ""
    """Label of the grid or circuit."""
    readings: tuple[Id, ...] = ()
    """The readings that it was given with."""
    earlier_gauge: str = ""
    """Label of the piece that it shows, where that is not the one in place now."""
    name: str
    format: str
    width: int
    """Pixels of the original as its file has them, before it is turned upright."""
    height: int
    size: int
    """Bytes of the original."""
    sha256: str
    """Of the original, which stays with who keeps the logbook."""
    note: str = ""
    observed_at: TimeText
    kept_by: Id
    entered_at: TimeText


class ReadingShown(Shown):
    """One attempt of a check, with every limit it was held to and the verdict."""

    id: Id
    check: str
    stage: str
    subject: str
    attempt: int
    latest: bool
    """Whether it is the last attempt of its check at its stage."""
    earlier_gauge: str = ""
    """Label of the piece it was taken on, where that is not the one in place now."""
    typed: str
    qualifier: Qualifier
    value: Quantity | None = None
    result: Quantity | None = None
    """What was judged, where it is not the value itself: a change in per cent."""
    compared_with: Id | None = None
    shift_check: Id | None = None
    """The check of the instrument that speaks for it; one of the instrument's."""
    instrument: str
    """Label of the instrument."""
    range: str
    test_voltage: Quantity | None = None
    conditions: dict[str, Quantity] = Field(default_factory=dict)
    observed_at: TimeText
    observed_by: Id
    entered_at: TimeText
    entered_by: Id
    reason: str = ""
    """Why it was measured again."""
    limits: tuple[LimitFound, ...] = ()
    verdict: Verdict
