"""`gaugelog step walk`: step after step of a point, asked one by one, the key unlocked once."""

from __future__ import annotations

import time
from collections.abc import Callable
from dataclasses import dataclass, field
from typing import TYPE_CHECKING

import typer

from gaugelog.commands.passphrases import Secrets
from gaugelog.commands.session import As, Point, SecretFd, open_logbook, unlock
from gaugelog.commands.steptext import describe, prompt_for, tell_outcome, tell_step
from gaugelog.commands.talk import ask, put, say, tell_error
from gaugelog.errors import Faulty, KeyTrouble, Refused

if TYPE_CHECKING:
    from gaugelog.journal.keys import Signer
    from gaugelog.rules.progress import NextStep
    from gaugelog.work.logbook import Logbook
    from gaugelog.work.steps import StepOutcome

IDLE_SECONDS = 15 * 60.0
"""How long the key stays unlocked while nobody types."""

_LEAVE, _AGAIN = ".", "?"


class _Left(Exception):
    """The person leaves the walk."""


@dataclass
class Unlocked:
    """The key of who walks: asked for at the start, and anew when nobody typed for a while."""

    open: Callable[[], Signer]
    ticks: Callable[[], float] = time.monotonic
    _key: Signer | None = field(default=None, repr=False)
    _touched: float = 0.0

    def signer(self) -> Signer:
        """The unlocked key. Raises KeyTrouble when the passphrase is wrong."""
        if self._key is not None and self._idle():
            say(f"Nobody typed for more than {IDLE_SECONDS / 60:.0f} min; the key was locked.")
            self._key = None
        if self._key is None:
            self._key = self.open()
        self._touched = self.ticks()
        return self._key

    def touch(self) -> None:
        """Somebody typed. A key that was idle too long stays to be unlocked anew."""
        if not self._idle():
            self._touched = self.ticks()

    def _idle(self) -> bool:
        return self.ticks() - self._touched > IDLE_SECONDS


def walk(
    ctx: typer.Context,
    point: Point,
    as_: As = "",
    secret_fd: SecretFd = None,
) -> None:
    """Work through a point step after step: each field is asked for, the passphrase once.

    Each step shows its instruction, cautions and times, then asks for its fields with their
    units; each step is signed and kept as it is done, with its verdict. Type . to leave and ? to
    read the step again. Stops at a hold, which a second person decides, and where a step is
    blocked. After 15 min without typing the passphrase is asked for again.
    """
    from gaugelog.work import steps

    logbook, secrets = open_logbook(ctx), Secrets(secret_fd)
    found = steps.next_step(logbook, point)
    key = Unlocked(lambda: unlock(logbook, as_, secrets, purpose=f"work at {found.point}"))
    if _is_open(found):
        _demand_technician(logbook, key.signer().person)
        say(f"Type {_LEAVE} to leave, {_AGAIN} to read the step again.")
    try:
        while _is_open(found):
            found = _one_step(logbook, key, found)
    except (_Left, typer.Abort):
        say("", f"{found.point} stands at step {found.number} of {found.count}: {found.title}.")
        say(f"Go on with: gaugelog step walk {found.point}")
        return
    put("")
    tell_step(found)


def _is_open(found: NextStep) -> bool:
    """Whether the next step can be done in a walk: a hold is another person's to decide."""
    return found.step is not None and not found.step.hold and not found.blocks


def _demand_technician(logbook: Logbook, person: str) -> None:
    from gaugelog.rules.who import demand_role

    with logbook.reading() as view:
        demand_role(view, person, "technician")


def _one_step(logbook: Logbook, key: Unlocked, found: NextStep) -> NextStep:
    """Ask for a step's fields until it is kept; returns what the point needs then.

    What is refused is told, and asked again with the earlier answers to keep by Enter.
    """
    from gaugelog.work import steps

    put("")
    describe(found)
    put("")
    typed: dict[str, str] = {}
    while True:
        try:
            outcome = _kept(logbook, key, found, typed)
        except (Faulty, Refused, KeyTrouble) as error:
            tell_error(error)
            now = steps.next_step(logbook, found.point)
            if not _is_open(now) or _same(now) != _same(found):
                return now
            continue
        tell_outcome(outcome)
        return steps.next_step(logbook, found.point)


def _same(found: NextStep) -> tuple[str, str]:
    return found.step.id if found.step is not None else "", found.subject


def _kept(logbook: Logbook, key: Unlocked, found: NextStep, typed: dict[str, str]) -> StepOutcome:
    """The outcome of a step once its fields, kept in `typed`, are asked for and signed."""
    from gaugelog.work import steps

    for item in found.step.inputs if found.step is not None else ():
        default = typed.get(item.name, "")
        typed[item.name] = _answer(prompt_for(item), key, found, default, item.required)
    again = "Why it is measured again"
    reason = _answer(again, key, found, "", needed=True) if found.again else ""
    steps.rehearse(logbook, point=found.point, typed=typed)
    note = _answer("A note, or Enter to sign and keep the step", key, found)
    return steps.do(
        logbook,
        key.signer(),
        point=found.point,
        typed=typed,
        note=note,
        reason=reason,
        seen=found,
    )


def _answer(
    prompt: str, key: Unlocked, found: NextStep, default: str = "", needed: bool = False
) -> str:
    while True:
        answer = ask(f"  {prompt}", default=default, needed=needed)
        key.touch()
        if answer == _LEAVE:
            raise _Left
        if answer != _AGAIN:
            return answer
        describe(found)
