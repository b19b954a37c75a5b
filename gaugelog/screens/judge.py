"""Accepting and returning a record: sign-offs of the reviewer, each asking the secret again."""

from __future__ import annotations

from textual.content import Content

from gaugelog.errors import Fault, Faulty, KeyTrouble
from gaugelog.journal.keys import Signer
from gaugelog.screens.desk import Desk
from gaugelog.screens.dialog import Dialog, Question
from gaugelog.screens.words import CALM, lines, plain
from gaugelog.work import reviews
from gaugelog.work.meanings import ACCEPT_MEANING
from gaugelog.work.reviewing import PointEvidence, StepTold


class AcceptDialog(Dialog[str]):
    """Adds the reviewer's signature; dismissed with a sentence of what was done."""

    heading = "Accept the record"
    doing = "Signing the record; this takes a few seconds"

    def __init__(self, point: str) -> None:
        super().__init__()
        self._point = point

    def explained(self) -> Content:
        """Which record, and what the signature means."""
        return lines(plain(self._point, "bold"), plain(f"Signing says: {ACCEPT_MEANING}"))

    def questions(self) -> tuple[Question, ...]:
        """The secret of who sits here."""
        return (secret_of(self.full.desk),)

    def answer(self, given: dict[str, str]) -> str:
        """Sign, keep."""
        desk = self.full.desk
        signer = unlocked_again(desk, given["secret"])
        done = reviews.accept(
            desk.logbook, signer, desk.maker(), point=self._point, meaning=ACCEPT_MEANING
        )
        return f"{self._point} is accepted: revision {done.revision}; head {done.head}."


class ReturnDialog(Dialog[str]):
    """Sends the point back with a reason, and if wanted to an earlier step."""

    heading = "Return the record"
    doing = "Keeping it"

    def __init__(self, found: PointEvidence) -> None:
        super().__init__()
        self._found = found

    def explained(self) -> Content:
        """What a return means."""
        note = (
            "The reason stands in the record. The step that you name and all after it are done "
            "again; name none, and the record is only signed anew."
        )
        about = f"{self._found.point}, revision {self._found.revision}"
        return lines(plain(about, "bold"), plain(note, CALM))

    def listed(self) -> Content:
        """The steps that are done, by number."""
        return lines(*(plain(f"{each.number:>3} {each.title}", CALM) for each in self._steps()))

    def _steps(self) -> list[StepTold]:
        return list({step.number: step for step in self._found.steps}.values())

    def questions(self) -> tuple[Question, ...]:
        """Why, from which step, and the secret."""
        return (
            Question("reason", "Why"),
            Question("number", "Redo from step (or empty)", optional=True),
            secret_of(self.full.desk),
        )

    def answer(self, given: dict[str, str]) -> str:
        """Return it."""
        desk, number = self.full.desk, given["number"].strip()
        step = next((each for each in self._steps() if str(each.number) == number), None)
        if number and step is None:
            raise Faulty([Fault("number", f"“{number}” is no step that is done.", "See above.")])
        signer = unlocked_again(desk, given["secret"])
        reviews.give_back(
            desk.logbook,
            signer,
            point=self._found.point,
            reason=given["reason"],
            redo_from=step.step if step is not None else "",
        )
        again = f"; work goes on from step {step.number}" if step is not None else ""
        return f"{self._found.point} is returned{again}."


def secret_of(desk: Desk) -> Question:
    """Asks the secret of who sits here."""
    whose = f"Passphrase of {desk.seat.person}" if desk.seat is not None else "Passphrase"
    return Question("secret", whose, secret=True)


def unlocked_again(desk: Desk, secret: str) -> Signer:
    """The key of who sits here, unlocked anew. Raises KeyTrouble for a wrong secret."""
    if desk.seat is None:
        raise KeyTrouble("Nobody is signed on.", "Sign on first.")
    return desk.sign_on(desk.seat.person, secret).signer
