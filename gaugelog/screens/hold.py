"""A hold: the second person signs on the same laptop, and lets the work go on or sends it back."""

from __future__ import annotations

from textual.content import Content

from gaugelog.rules.progress import NextStep
from gaugelog.screens.dialog import Dialog, Question
from gaugelog.screens.words import CALM, lines, plain
from gaugelog.work import steps
from gaugelog.work.doing import StepOutcome
from gaugelog.work.meanings import HOLD_MEANING


class HoldDialog(Dialog[StepOutcome]):
    """Asks the second person's id and secret. The person who works stays signed on."""

    heading = "Hold: a second person decides"
    doing = "Unlocking the key and signing"

    def __init__(self, found: NextStep) -> None:
        super().__init__()
        self._found = found

    def explained(self) -> Content:
        """What is held, and what signing means."""
        found = self._found
        step = found.step
        back = (
            f" Refused, work goes back to step {step.refused_to}."
            if step and step.refused_to
            else ""
        )
        return lines(
            plain(f"{found.point}: {found.title}", "bold"),
            plain(f"Signing says: {HOLD_MEANING}"),
            plain(f"To refuse, say why in the last field.{back}", CALM),
        )

    def questions(self) -> tuple[Question, ...]:
        """Who, the secret, and a reason where it is refused."""
        return (
            Question("person", "Second person (id)"),
            Question("secret", "Passphrase", secret=True),
            Question("refuse", "Refused because (empty: go on)", optional=True),
        )

    def answer(self, given: dict[str, str]) -> StepOutcome:
        """Sign the decision with the second person's key."""
        desk = self.full.desk
        second = desk.sign_on(given["person"], given["secret"])
        return steps.do(
            desk.logbook,
            second.signer,
            point=self._found.point,
            typed={},
            refuse=given["refuse"].strip(),
            seen=self._found,
        )
