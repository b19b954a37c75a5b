"""What every part of the record is built from."""

from __future__ import annotations

from typing import Annotated

from pydantic import BaseModel, ConfigDict, StringConstraints

OffsetText = Annotated[str, StringConstraints(pattern=r"^[+-]\d\d:\d\d$")]
"""A local time's offset from UTC, `+01:00`."""


class Shown(BaseModel):
    """A part of the record. Frozen; a field that is not known is refused."""

    model_config = ConfigDict(frozen=True, extra="forbid")
