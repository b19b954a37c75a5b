"""`gaugelog submit`, `accept`, `return`, `amend`: the sign-offs of a record, and its revision."""

from __future__ import annotations

from typing import Annotated

import typer

from gaugelog.commands.paper import PaperAsked, demand_paper
from gaugelog.commands.passphrases import Secrets
from gaugelog.commands.session import As, Point, SecretFd, open_logbook, unlock
from gaugelog.commands.talk import say
from gaugelog.work.meanings import ACCEPT_MEANING, SUBMIT_MEANING


def _flagged(flags: tuple[str, ...]) -> list[str]:
    return [f"LOOK INTO: {flag}" for flag in flags]


def submit(
    ctx: typer.Context,
    point: Point,
    meaning: Annotated[str, typer.Option(help="What the signature means.")] = SUBMIT_MEANING,
    paper: PaperAsked = "",
    as_: As = "",
    secret_fd: SecretFd = None,
) -> None:
    """Sign a point's record and hand it to review. A sign-off: asks the passphrase."""
    from gaugelog.documents.maker import PdfRecordMaker
    from gaugelog.work import reviews

    maker = PdfRecordMaker(demand_paper(paper))
    logbook = open_logbook(ctx)
    signer = unlock(logbook, as_, Secrets(secret_fd), purpose=f"submit {point}")
    done = reviews.submit(logbook, signer, maker, point=point, meaning=meaning)
    say(
        *_flagged(done.flags),
        f"{point}: record revision {done.revision} signed and submitted; head {done.head}.",
        f"Next, by a reviewer: gaugelog accept {point} --as ID",
    )


def accept(
    ctx: typer.Context,
    point: Point,
    meaning: Annotated[str, typer.Option(help="What the signature means.")] = ACCEPT_MEANING,
    as_: As = "",
    secret_fd: SecretFd = None,
) -> None:
    """Add the reviewer's signature; the point is accepted. A sign-off: asks the passphrase."""
    from gaugelog.documents.maker import PdfRecordMaker
    from gaugelog.work import reviews

    logbook = open_logbook(ctx)
    signer = unlock(logbook, as_, Secrets(secret_fd), purpose=f"accept {point}")
    done = reviews.accept(logbook, signer, PdfRecordMaker(), point=point, meaning=meaning)
    say(*_flagged(done.flags))
    say(f"{point} is accepted; head {done.head}. Next: gaugelog record {point}")


def give_back(
    ctx: typer.Context,
    point: Point,
    reason: Annotated[str, typer.Option(help="Why; the technician and the record show it.")],
    redo_from: Annotated[
        str, typer.Option(help="Step to go on from; left out: nothing is done again.")
    ] = "",
    as_: As = "",
    secret_fd: SecretFd = None,
) -> None:
    """Return a submitted point with a reason. A sign-off: asks the passphrase."""
    from gaugelog.work import reviews

    logbook = open_logbook(ctx)
    signer = unlock(logbook, as_, Secrets(secret_fd), purpose=f"return {point}")
    reviews.give_back(logbook, signer, point=point, reason=reason, redo_from=redo_from)
    say(f"{point} is returned. Next: gaugelog step next {point}")


def amend(
    ctx: typer.Context,
    point: Point,
    reason: Annotated[str, typer.Option(help="Why; the next record names it.")],
    redo_from: Annotated[
        str, typer.Option(help="Step to go on from; left out: nothing is done again.")
    ] = "",
    as_: As = "",
    secret_fd: SecretFd = None,
) -> None:
    """Take up an accepted point again. Its record stays; the next one revises it, with reason."""
    from gaugelog.work.amend import amend as take_up_again

    logbook = open_logbook(ctx)
    signer = unlock(logbook, as_, Secrets(secret_fd), purpose=f"amend {point}")
    done = take_up_again(logbook, signer, point=point, reason=reason, redo_from=redo_from)
    say(
        f"{point} is in work again; record revision {done.revision} stays as it is.",
        f"Next: gaugelog step next {point}",
    )
