"""Going another way along the route: back to an earlier step, or past one that may be skipped."""

from __future__ import annotations

from collections.abc import Sequence

from textual.content import Content

from gaugelog.errors import Fault, Faulty
from gaugelog.ledger.progress import SETTLED
from gaugelog.rules.progress import NextStep
from gaugelog.screens.dialog import Dialog, Question
from gaugelog.screens.words import CALM, lines, plain
from gaugelog.work import steps
from gaugelog.work.doing import StepOutcome
from gaugelog.work.looking import StepWalked
from gaugelog.work.noting import leave_note


class RedoDialog(Dialog[StepOutcome]):
    """Asks to which step, by its number, and why."""

    heading = "Go back to an earlier step"
    doing = "Keeping it"

    def __init__(self, point: str, route: Sequence[StepWalked]) -> None:
        super().__init__()
        self._point = point
        self._done = {each.number: each for each in route if each.outcome in SETTLED}

    def explained(self) -> Content:
        """The steps that are done, by number."""
        done = [plain(f"{number:>3} {each.title}") for number, each in self._done.items()]
        note = plain("That step and all after it are done again. What was kept stays kept.", CALM)
        return lines(plain(self._point, "bold"), *done, note)

    def questions(self) -> tuple[Question, ...]:
        """The number and the reason."""
        return (Question("number", "Number of the step"), Question("reason", "Why"))

    def answer(self, given: dict[str, str]) -> StepOutcome:
        """Reopen the step."""
        desk, typed = self.full.desk, given["number"].strip()
        wanted = self._done.get(int(typed)) if typed.isdecimal() else None
        if wanted is None:
            raise Faulty([Fault("number", f"“{typed}” is no step that is done.", "See above.")])
        return steps.redo(
            desk.logbook, desk.signer, point=self._point, step=wanted.id, reason=given["reason"]
        )


class NoteDialog(Dialog[StepOutcome]):
    """Asks what is to be known of a step that stays open."""

    heading = "Leave the step open, with a note"
    doing = "Keeping it"

    def __init__(self, found: NextStep) -> None:
        super().__init__()
        self._found = found

    def explained(self) -> Content:
        """Which step, and where the note is told."""
        note = plain("It is told here until the step is done, and stands in the record.", CALM)
        return lines(plain(f"{self._found.point}: {self._found.title}", "bold"), note)

    def questions(self) -> tuple[Question, ...]:
        """The note."""
        return (Question("note", "Note"),)

    def answer(self, given: dict[str, str]) -> StepOutcome:
        """Keep it."""
        desk = self.full.desk
        return leave_note(desk.logbook, desk.signer, point=self._found.point, note=given["note"])


class SkipDialog(Dialog[StepOutcome]):
    """Asks why the step is left out."""

    heading = "Skip this step"
    doing = "Keeping it"

    def __init__(self, found: NextStep) -> None:
        super().__init__()
        self._found = found

    def explained(self) -> Content:
        """Which step."""
        note = plain("The reason stands in the record.", CALM)
        return lines(plain(f"{self._found.point}: {self._found.title}", "bold"), note)

    def questions(self) -> tuple[Question, ...]:
        """The reason."""
        return (Question("reason", "Why"),)

    def answer(self, given: dict[str, str]) -> StepOutcome:
        """Skip it."""
        desk = self.full.desk
        return steps.skip(
            desk.logbook,
            desk.signer,
            point=self._found.point,
            reason=given["reason"],
            seen=self._found,
        )
