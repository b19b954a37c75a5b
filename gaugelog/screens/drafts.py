"""Half-typed fields: kept in a small file for each person, never a fact, never a secret."""

from __future__ import annotations

import json
from dataclasses import dataclass, field
from datetime import UTC, datetime, timedelta
from pathlib import Path
from typing import Any

from gaugelog.journal.files import write_whole
from gaugelog.ledger.routes import StepInput
from gaugelog.rules.carried import carried_as, carries_for

_PRIVATE = 0o600


@dataclass(frozen=True, slots=True)
class Carried:
    """A value offered again: as typed, how old it is, and how long it is still offered."""

    typed: str
    age: timedelta
    left: timedelta


@dataclass
class Draft:
    """Where a person is, what is half typed there, and what is carried from step to step."""

    point: str = ""
    step: str = ""
    open: bool = False
    """Whether the step's screen was open: then it opens there again."""
    typed: dict[str, str] = field(default_factory=dict)
    carried: dict[str, tuple[str, str]] = field(default_factory=dict)
    """As typed and when (UTC text), by `rules.carried.carried_as`."""

    def at(self, point: str, step: str) -> dict[str, str]:
        """What is half typed at a step of a point; nothing for any other."""
        return dict(self.typed) if (self.point, self.step) == (point, step) else {}

    def carry(self, item: StepInput, typed: str, now: datetime) -> None:
        """Remember what was entered, where it may be offered again."""
        if carries_for(item) is not None:
            self.carried[carried_as(item)] = (typed, now.isoformat())

    def offered(self, item: StepInput, now: datetime) -> Carried | None:
        """What was entered before for such an input, while it is still good."""
        longest, kept = carries_for(item), self.carried.get(carried_as(item))
        if longest is None or kept is None:
            return None
        age = now - datetime.fromisoformat(kept[1]).astimezone(UTC)
        if not timedelta() <= age < longest:
            return None
        return Carried(kept[0], age, longest - age)


class Drafts:
    """The folder of drafts. What can't be written or read is as if it had not been kept."""

    def __init__(self, folder: Path) -> None:
        self._folder = folder

    def load(self, person: str) -> Draft:
        """The draft of a person; an empty one when there is none or it is damaged."""
        try:
            data = json.loads(self._file(person).read_bytes())
            return _draft(data)
        except (OSError, ValueError, TypeError, KeyError, AttributeError):
            return Draft()

    def save(self, person: str, draft: Draft) -> bool:
        """Keep the draft of a person. Returns whether it could be written."""
        data = json.dumps(vars(draft), ensure_ascii=True).encode()
        try:
            self._folder.mkdir(parents=True, exist_ok=True, mode=0o700)
            write_whole(self._file(person), data, mode=_PRIVATE)
        except OSError:
            return False
        return True

    def _file(self, person: str) -> Path:
        return self._folder / f"{person}.json"


def _draft(data: dict[str, Any]) -> Draft:
    carried = {str(name): (str(kept[0]), str(kept[1])) for name, kept in data["carried"].items()}
    for _typed, when in carried.values():
        datetime.fromisoformat(when)
    typed = {str(name): str(value) for name, value in data["typed"].items()}
    return Draft(str(data["point"]), str(data["step"]), bool(data["open"]), typed, carried)
