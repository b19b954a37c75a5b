"""What the step screen shows in words: the route, the instruction, the plan, verdicts."""

from __future__ import annotations

from collections.abc import Sequence

from textual.content import Content

from gaugelog.ledger.base import Quantity
from gaugelog.ledger.readings import LimitFound, ReadingTaken
from gaugelog.rules.margin import margin_of
from gaugelog.rules.progress import NextStep
from gaugelog.screens.words import BAD, CALM, GOOD, WAIT, lines, plain, state_word, verdict_word
from gaugelog.visible import visible
from gaugelog.work.doing import ReadingShown, StepOutcome
from gaugelog.work.looking import InHand, StepWalked

_OUTCOMES = {
    "done": ("✓", GOOD),
    "released": ("✓", GOOD),
    "skipped": ("–", WAIT),
    "refused": ("✗", BAD),
    "reopened": ("↺", WAIT),
}

_TAIL = 0.0001


def route_text(hand: InHand, width: int, height: int) -> Content:
    """The route, a line a step: sign, number, title; the step in hand is marked and in view."""
    here = next(
        (
            place
            for place, each in enumerate(hand.route)
            if hand.next.step is not None
            and (each.id, each.subject) == (hand.next.step.id, hand.next.subject)
        ),
        len(hand.route),
    )
    first = max(0, min(here - height // 2, len(hand.route) - height))
    shown = hand.route[first : first + max(height, 1)]
    repeated = len({each.id for each in hand.route}) < len(hand.route)
    return lines(
        *(
            _route_line(each, first + place == here, width, repeated)
            for place, each in enumerate(shown)
        )
    )


def _route_line(each: StepWalked, here: bool, width: int, repeated: bool) -> Content:
    sign, style = _OUTCOMES.get(each.outcome, ("‖" if each.hold else "·", ""))
    label = f" {each.subject_label}" if repeated else ""
    text = visible(f"{'▸' if here else sign} {each.number:>2} {each.title}{label}")
    cut = Content(text).truncate(width, ellipsis=True, pad=here)
    if here:
        return plain(str(cut), "bold $primary")
    return plain(str(cut), style or CALM)


def title_text(found: NextStep) -> Content:
    """Number and title of the step in hand, or the end of the route."""
    if found.step is None:
        return Content.assemble(plain("End of the route: ", "bold"), state_word(found.state))
    other = found.subject_label not in {"", found.point}
    on = f"  ({found.step.subject} {found.subject_label})" if other else ""
    hold = "HOLD: a second person decides. " if found.step.hold else ""
    return Content.assemble(
        plain(f"{found.number}/{found.count} ", CALM),
        plain(hold, f"bold {WAIT}"),
        plain(found.step.title, "bold"),
        plain(on, CALM),
    )


def cautions_text(found: NextStep, waiting: bool) -> Content:
    """The cautions of a step: in full until they are acknowledged, then a line that they were."""
    step = found.step
    if step is None or not step.cautions or found.blocks:
        return plain("")
    if not waiting and not step.hold:
        return plain(f"✓ cautions read: {len(step.cautions)}", CALM)
    told = [
        Content.assemble(plain("⚠ CAUTION ", f"bold {WAIT}"), plain(each)) for each in step.cautions
    ]
    ask = [plain("Space: I have read this and act by it.", "bold")] if waiting else []
    return lines(*told, *ask)


def facts_text(facts: Sequence[str]) -> Content:
    """What the plan and the drawing say of the step."""
    if not facts:
        return plain("")
    return lines(plain("The plan says", "bold $secondary"), *(plain(f"  {each}") for each in facts))


def holding_text(found: NextStep) -> Content:
    """What blocks the step, and what runs."""
    shut = {window.sentence for window in found.windows if not window.open}
    told = [plain(f"← {reason}", f"bold {BAD}") for reason in found.sent_back]
    told += [
        plain(f"◷ {window.sentence}", WAIT if not window.open else "") for window in found.windows
    ]
    told += [plain(f"! {block}", BAD) for block in found.blocks if block not in shut]
    told += [plain(f"! Look into: {flag}", WAIT) for flag in found.flags]
    return lines(*told) if told else plain("")


def outcome_text(outcome: StepOutcome) -> Content:
    """What became of a deed: each verdict with limits and margin, then what to do."""
    told = [reading_text(each) for each in outcome.readings]
    told += [plain(line) for line in outcome.lines if not line.startswith("Find the cause")]
    if not outcome.settled and outcome.readings:
        told.append(plain("Find the cause (F6), then measure again: it asks why."))
    return lines(*told) if told else plain("")


def attempts_text(attempts: Sequence[ReadingShown]) -> Content:
    """Readings kept at this step, oldest first, each with its verdict and why it was repeated."""
    if not attempts:
        return plain("")
    told = []
    for each in attempts:
        reading = each.reading
        why = f"  again because: {reading.reason}" if reading.reason else ""
        told.append(
            Content.assemble(
                plain(f"  {reading.attempt}. {reading.check} {reading.typed}  "),
                verdict_word(reading.verdict.word),
                plain(why, CALM),
            )
        )
    return lines(plain("Kept so far", "bold $secondary"), *told)


def reading_text(shown: ReadingShown) -> Content:
    """One reading: word, value, the limit that ruled, the margin; then why."""
    reading = shown.reading
    changed = f", change {reading.result}" if reading.result is not None else ""
    head = Content.assemble(
        verdict_word(reading.verdict.word),
        plain(f"  {reading.check} {reading.stage} {reading.typed}{changed}", "bold"),
    )
    ruling = [_limit(limit) for limit in reading.limits if limit.rules]
    margin = _margin(reading)
    told = [plain("   " + "; ".join([*ruling, *margin]))] if ruling or margin else []
    return lines(head, *told, plain(f"   {reading.verdict.reason}", CALM))


def _limit(limit: LimitFound) -> str:
    sides: list[tuple[str, Quantity | None]] = [
        ("at least", limit.at_least),
        ("at most", limit.at_most),
    ]
    told = " and ".join(f"{word} {side}" for word, side in sides if side is not None)
    return f"limit {told}, ruled by {limit.origin}"


def _margin(reading: ReadingTaken) -> list[str]:
    margin = margin_of(reading)
    if margin is None:
        return []
    probability = reading.verdict.probability
    chance = [] if probability is None else [f"conforms with probability {_chance(probability)}"]
    return [f"margin {margin.amount}", *chance]


def _chance(probability: str) -> str:
    """A probability as people read it; its far tails are named by their bound."""
    value = float(probability)
    if value < _TAIL:
        return f"below {_TAIL}"
    return f"above {1 - _TAIL}" if value > 1 - _TAIL else f"{value:.4f}"


def step_key(hand: InHand) -> str:
    """What is in hand at a point: the step and its subject, or the end and the state there."""
    step = hand.next.step
    return f"{step.id}/{hand.next.subject}" if step is not None else f"end/{hand.next.state}"


def same(one: InHand, other: InHand) -> bool:
    """Whether the same is asked for: the same step, on the same subject, for the same reason."""
    return step_key(one) == step_key(other) and one.next.again == other.next.again


def at_the_end(state: str) -> str:
    """What stands in place of an instruction when the route is walked."""
    return _ENDS.get(
        state, "Every step is done. Submit the record: you sign it, a reviewer signs it after you."
    )


_ENDS = {
    "awaiting review": "The record is signed once and waits for a reviewer.",
    "accepted": "The record carries both signatures.",
    "withdrawn": "Nothing more is done here.",
}
