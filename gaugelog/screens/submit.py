"""Submitting: the technician signs the record; a sign-off asks the secret again."""

from __future__ import annotations

from textual.content import Content

from gaugelog.screens.dialog import Dialog, Question
from gaugelog.screens.judge import secret_of, unlocked_again
from gaugelog.screens.words import lines, plain
from gaugelog.work import reviews
from gaugelog.work.meanings import SUBMIT_MEANING


class SubmitDialog(Dialog[str]):
    """Signs and submits the record of a point; dismissed with a sentence of what was done."""

    heading = "Submit the record"
    doing = "Drawing and signing the record; this takes a few seconds"

    def __init__(self, point: str) -> None:
        super().__init__()
        self._point = point

    def explained(self) -> Content:
        """Which record, and what the signature means."""
        return lines(plain(self._point, "bold"), plain(f"Signing says: {SUBMIT_MEANING}"))

    def questions(self) -> tuple[Question, ...]:
        """The secret of who sits here."""
        return (secret_of(self.full.desk),)

    def answer(self, given: dict[str, str]) -> str:
        """Draw, sign, keep."""
        desk = self.full.desk
        signer = unlocked_again(desk, given["secret"])
        done = reviews.submit(
            desk.logbook, signer, desk.maker(), point=self._point, meaning=SUBMIT_MEANING
        )
        return (
            f"{self._point}: record revision {done.revision} is signed and submitted; "
            f"head {done.head}."
        )
