"""One attempt at a step: what was typed, done on another thread, with a look at what follows."""

from __future__ import annotations

from dataclasses import dataclass

from gaugelog.journal.keys import Signer
from gaugelog.rules.progress import NextStep
from gaugelog.work import looking, steps
from gaugelog.work.doing import StepOutcome
from gaugelog.work.logbook import Logbook
from gaugelog.work.looking import InHand


@dataclass(frozen=True, slots=True)
class Attempt:
    """A step as it is about to be kept. `deed` stays the same when it is tried again."""

    logbook: Logbook
    signer: Signer
    deed: str
    seen: NextStep
    typed: dict[str, str]
    reason: str = ""
    note: str = ""
    at: str = ""

    def __call__(self) -> tuple[StepOutcome, InHand]:
        """Keep it; returns what became of it and the step that is in hand then."""
        outcome = steps.do(
            self.logbook,
            self.signer,
            point=self.seen.point,
            typed=self.typed,
            note=self.note,
            reason=self.reason,
            at=self.at,
            deed=self.deed,
            seen=self.seen,
        )
        return outcome, looking.in_hand(self.logbook, self.seen.point)
