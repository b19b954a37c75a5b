"""The size of drawn pages, as a command is told it; left out, the campaign's own."""

from __future__ import annotations

from typing import TYPE_CHECKING, Annotated, cast

import typer

from gaugelog.errors import Fault, Faulty

if TYPE_CHECKING:
    from gaugelog.ledger.campaign import Paper

SIZES = ("a4", "letter")

PaperAsked = Annotated[
    str, typer.Option("--paper", help="Size of PDF pages: a4 or letter; default the plan's own.")
]


def demand_paper(asked: str) -> Paper | None:
    """The size that is asked for, None when none is. Raises Faulty when there is no such size."""
    if asked and asked not in SIZES:
        raise Faulty([Fault("paper", f"“{asked}” is neither a4 nor letter.")], "nothing is drawn")
    return cast("Paper | None", asked or None)
