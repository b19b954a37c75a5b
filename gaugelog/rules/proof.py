"""Proofs by attribute: the channel that answered is the planned one; the sign is the right one."""

from __future__ import annotations

from math import nan

from gaugelog.ledger.base import Quantity
from gaugelog.ledger.readings import LimitFound
from gaugelog.physics.conformity import Judgement, Words, undecided
from gaugelog.rules.digits import quantity
from gaugelog.rules.limits import Basis
from gaugelog.rules.verdicts import Judged, Taken, worded

PLUS = frozenset({"+", "plus", "positive", "tension"})
MINUS = frozenset({"-", "−", "minus", "negative", "compression"})
SIGNS = PLUS | MINUS
"""What may be typed as the sign that is expected."""

SOURCE = "the sign that the push must give; common practice"


def judge_polarity(basis: Basis, expected: str, taken: Taken) -> Judged:
    """Judge the sign of a reading while the article is pushed in a known direction.

    `expected` is one of `SIGNS`. Too small a reading has no sign: at least twice its standard
    uncertainty is asked for.
    """
    sign = 1.0 if expected.strip().casefold() in PLUS else -1.0
    found = _sign_seen(sign, taken)
    judged = worded(basis, "polarity", found)
    zero = Quantity(value="0", unit="um/m")
    limit = LimitFound(
        origin="prediction",
        at_least=zero if sign > 0 else None,
        at_most=zero if sign < 0 else None,
        source=SOURCE,
        rules=True,
    )
    return Judged((limit,), judged.verdict, None)


def _sign_seen(sign: float, taken: Taken) -> Judgement:
    if taken.value is None:
        return undecided("An overload has no sign. Push less, or look for an open circuit.")
    threshold = 2 * taken.on.uncertainty(taken.si)
    if abs(taken.si) <= threshold:
        least = quantity(threshold, "um/m", 2)
        return undecided(f"Too small to tell a sign: it takes more than {least}. Push harder.")
    word = "positive" if sign > 0 else "negative"
    if sign * taken.si > 0:
        return Judgement(Words.PASS, None, nan, nan, f"It is {word}, as the push must give.")
    why = (
        f"It is not {word}, as the push must give: look for a swapped arm or polarity, a gauge "
        "on the other side, another gauge on this channel."
    )
    return Judgement(Words.FAIL, None, nan, nan, why)


def judge_channel(basis: Basis, planned: str, answered: str) -> Judged:
    """Judge whether the channel that answered, by its label, is the planned one.

    `planned` is module and channel, `M1/3`; the channel's own label alone will do.
    """
    told = answered.strip().casefold()
    if told in {planned.casefold(), planned.rpartition("/")[2].casefold()}:
        return _worded(basis, Words.PASS, f"{planned} answered, as planned.")
    why = f"{answered} answered; planned is {planned}. Look for connectors or pins that are swapped"
    return _worded(basis, Words.FAIL, f"{why}.")


def _worded(basis: Basis, word: Words, why: str) -> Judged:
    return worded(basis, "channel", Judgement(word, None, nan, nan, why))
