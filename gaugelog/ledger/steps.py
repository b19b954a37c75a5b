"""Steps done, skipped and held: how a point walks along its route."""

from __future__ import annotations

from typing import ClassVar, Literal

from sqlmodel import Field, SQLModel

from gaugelog.ledger.base import FactBody, Id, Part, Quantity, TimeText


class Entered(Part):
    """What was entered for one input: as typed, and what it was understood to be."""

    typed: str
    id: Id | None = None
    """The gauge, consumable, instrument or reading meant."""
    quantity: Quantity | None = None


class StepDone(FactBody):
    """A step was done on a subject of a point."""

    kind: ClassVar[str] = "step.done"

    point: Id
    subject: Id
    """A grid or circuit; the point itself for a step on the place."""
    step: str
    inputs: dict[str, Entered] = {}
    observed_at: TimeText
    done_by: Id
    note: str = ""


class StepSkipped(FactBody):
    """A step was left out, with a reason, by someone its skip rule allows."""

    kind: ClassVar[str] = "step.skipped"

    point: Id
    subject: Id
    step: str
    reason: str
    skipped_by: Id


class HoldDecided(FactBody):
    """A second person let the work go on at a hold step, or sent it back."""

    kind: ClassVar[str] = "hold.decided"

    point: Id
    subject: Id
    step: str
    outcome: Literal["released", "refused"]
    reason: str = ""
    decided_by: Id
    observed_at: TimeText
    meaning: str


class StepRow(SQLModel, table=True):
    """The latest outcome of a step on a subject."""

    __tablename__ = "step"

    id: str = Field(primary_key=True)
    """`point/step/subject`."""
    point: str = Field(index=True)
    subject: str
    step: str
    outcome: str
    """`done`, `skipped`, `released`, `refused`, or `reopened` when it must be done again."""
    by: str
    observed_at: str
    entered_at: str
    note: str
    """The note, or the reason of a skip or refusal."""
    data: str
    """The inputs as JSON."""
    seq: int
