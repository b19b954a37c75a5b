"""`gaugelog replace` and `withdraw`: what becomes of a point that can't go on as it is."""

from __future__ import annotations

from typing import Annotated

import typer

from gaugelog.commands.passphrases import Secrets
from gaugelog.commands.session import As, Point, SecretFd, open_logbook, unlock
from gaugelog.commands.talk import say
from gaugelog.work.meanings import REPLACE_MEANING, WITHDRAW_MEANING

Reason = Annotated[str, typer.Option(help="Why; the record's story shows it.")]


def replace(
    ctx: typer.Context, point: Point, reason: Reason, as_: As = "", secret_fd: SecretFd = None
) -> None:
    """Give up the gauge in place: a new piece is taken, the place prepared anew. A sign-off."""
    from gaugelog.work import dispositions

    logbook = open_logbook(ctx)
    signer = unlock(logbook, as_, Secrets(secret_fd), purpose=f"replace the gauge of {point}")
    done = dispositions.replace(
        logbook, signer, point=point, reason=reason, meaning=REPLACE_MEANING
    )
    say(
        f"{point}: the gauge is removed; its readings stay with it.",
        f"Next, from the start: gaugelog step next {point}",
    )
    for other in dispositions.left_behind(logbook, done):
        say(f"{other} shares its circuit: its record tells of the old bridge. Amend or return it.")


def withdraw(
    ctx: typer.Context, point: Point, reason: Reason, as_: As = "", secret_fd: SecretFd = None
) -> None:
    """Withdraw a point: nothing more is done or measured there. A sign-off."""
    from gaugelog.work import dispositions

    logbook = open_logbook(ctx)
    signer = unlock(logbook, as_, Secrets(secret_fd), purpose=f"withdraw {point}")
    dispositions.withdraw(logbook, signer, point=point, reason=reason, meaning=WITHDRAW_MEANING)
    say(f"{point} is withdrawn; what was kept of it stays.")
