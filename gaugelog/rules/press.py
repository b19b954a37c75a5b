"""Press: a bonded gauge is pressed lightly; the reading must move, and come back to its zero."""

from __future__ import annotations

from dataclasses import dataclass

from gaugelog.physics.change import Accuracy, difference_uncertainty
from gaugelog.physics.conformity import Judgement, Words, undecided
from gaugelog.rules.digits import quantity
from gaugelog.rules.limits import Basis, limits_for, strictest
from gaugelog.rules.verdicts import Judged, Taken, Worked, judge_worked, only_a_bound, worded

CHECK = "press"
VOID = (
    "A void or a soft spot under the grid shows as a zero that does not come back (common practice)"
)


@dataclass(frozen=True, slots=True)
class Pressed:
    """Strain before the gauge was pressed and while it was, as ratios."""

    before: float
    while_pressed: float

    @property
    def response(self) -> float:
        """How far the reading moved under the finger."""
        return self.while_pressed - self.before


def judge_press(basis: Basis, stage: str, seen: Pressed, after: Taken) -> Judged:
    """Judge how far the zero comes back after pressing, once the gauge has answered at all.

    No answer fails: another gauge is on this channel, or none. An answer no larger than the
    permitted return proves nothing.
    """
    if only_a_bound(after):
        return worded(basis, CHECK, undecided("A zero that comes back needs a value."))
    left = after.si - seen.before
    result = quantity(left, "um/m", 4)
    if abs(seen.response) <= 2 * _spread(after.on.accuracy, seen.before, seen.while_pressed):
        why = "It did not answer the pressing: look whether this gauge is on this channel."
        return worded(
            basis, CHECK, Judgement(Words.FAIL, None, float("nan"), float("nan"), why), result
        )
    allowed = strictest(limits_for(basis, CHECK, stage))
    if allowed is not None and allowed.upper is not None and abs(seen.response) <= allowed.upper:
        why = (
            f"It moved by {quantity(seen.response, 'um/m', 3)}, no more than it may stay away "
            "from zero: press again, a little harder."
        )
        return worded(basis, CHECK, undecided(why), result)
    spread = _spread(after.on.accuracy, seen.before, after.si)
    told = f"Pressed, it moved by {quantity(seen.response, 'um/m', 3)}."
    judged = judge_worked(basis, CHECK, stage, Worked(left, spread, "um/m", told))
    if judged.verdict.word in {"pass", "conditional pass"}:
        return judged
    reason = f"{judged.verdict.reason} {VOID}."
    return Judged(
        judged.limits, judged.verdict.model_copy(update={"reason": reason}), judged.result
    )


def _spread(accuracy: Accuracy, before: float, after: float) -> float:
    """Standard uncertainty of a difference read on one range of one module."""
    return float(
        difference_uncertainty(
            before,
            after,
            True,
            accuracy.gain_fraction,
            accuracy.offset,
            accuracy.resolution,
        )
    )
