"""The page of a point's evidence in words: checks by margin, attempts, skips, notes, people."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from textual.content import Content

from gaugelog.ledger.base import SYMBOLS, Quantity
from gaugelog.ledger.readings import ReadingTaken
from gaugelog.rules.margin import Margin
from gaugelog.screens.columns import Cell, Column, heading, line, widths
from gaugelog.screens.words import BAD, CALM, VERDICTS, WAIT, lines, plain, state_word
from gaugelog.work.reviewing import CheckFound, PhotoTold, PointEvidence, StepTold

_CHECKS = (
    Column("verdict"),
    Column("check", least=12),
    Column("on", least=4),
    Column("judged", number=True),
    Column(""),
    Column("margin", number=True),
    Column(""),
    Column("share", number=True),
    Column("tries", number=True),
)


_MOST_SHARE = 10.0


def parts(found: PointEvidence, room: int) -> dict[str, Content]:
    """Each part of the page by its name; empty where there is nothing to say."""
    return {
        "state": _head(found),
        "bars": _may(found),
        "checks": _checks(found.checks, room),
        "skipped": _steps("Steps left out", found.skipped, "none"),
        "photos": _photos(found.photos),
        "notes": _steps("Notes", found.noted, ""),
        "people": _who(found),
        "steps": _walked(found.steps, room),
        "story": _story(found),
    }


def _head(found: PointEvidence) -> Content:
    title = Content.assemble(plain(f"{found.point}: ", "bold"), state_word(found.state))
    if not found.revision:
        return lines(
            title, plain("No record was submitted yet; this is the evidence so far.", CALM)
        )
    record = f"Record revision {found.revision}, signed by {found.submitted_by} "
    return lines(
        title,
        plain(f"{record}{moment(found.submitted_at)}, {found.record_state}; head {found.head}"),
    )


def _may(found: PointEvidence) -> Content:
    """What keeps the person here from judging it, or anyone from accepting it."""
    told = [plain(f"! {each}", BAD) for each in found.blocks]
    told += [plain(f"! Look into: {each}", WAIT) for each in found.flags]
    if found.bar and found.record_state == "submitted":
        told.insert(0, plain(f"! You can't review this. {found.bar}", WAIT))
    return lines(*told) if told else plain("")


def _checks(checks: Sequence[CheckFound], room: int) -> Content:
    title = plain("Checks, the smallest margin first", "bold $secondary")
    if not checks:
        return lines(title, plain("  nothing was measured yet", CALM))
    rows = [_check(each) for each in checks]
    wide = widths(_CHECKS, rows, room)
    told = [title, heading(_CHECKS, wide)]
    for each, row in zip(checks, rows, strict=True):
        told.append(line(_CHECKS, row, wide))
        told += _beneath(each)
    return lines(*told)


def _check(check: CheckFound) -> tuple[Cell, ...]:
    last = check.last
    sign, style = VERDICTS.get(last.verdict.word, ("?", ""))
    margin = check.margin
    return (
        Cell(f"{sign} {last.verdict.word.upper()}", style),
        Cell(f"{last.check}, {last.stage}" if last.stage else last.check),
        Cell(check.subject),
        *_judged(last),
        *(_amount(margin.amount) if margin is not None else (Cell("–"), Cell(""))),
        Cell(_share(margin)),
        Cell(str(len(check.attempts)), WAIT if len(check.attempts) > 1 else ""),
    )


def _share(margin: Margin | None) -> str:
    """The margin as a part of the room, in per cent; beyond ten times the room it says no more."""
    if margin is None or margin.share is None:
        return ""
    return f"{margin.share:.0%}" if margin.share < _MOST_SHARE else f">{_MOST_SHARE:.0%}"


def _judged(reading: ReadingTaken) -> tuple[Cell, Cell]:
    """The value that was judged and its unit, apart so that the figures stand under each other."""
    judged = reading.result or reading.value
    if reading.qualifier == "overload" or judged is None:
        word = "overload" if reading.qualifier == "overload" else "–"
        return Cell(word), Cell("")
    number, unit = _amount(judged)
    sign = f"{reading.qualifier} " if reading.qualifier in {">", "<"} else ""
    return Cell(f"{sign}{number.text}", number.style), unit


def _amount(quantity: Quantity) -> tuple[Cell, Cell]:
    return Cell(quantity.value), Cell(SYMBOLS.get(quantity.unit, quantity.unit))


def _beneath(check: CheckFound) -> Iterator[Content]:
    """Under a check: the limit that ruled, why it is conditional, why it was read again."""
    last = check.last
    typed = f", typed {last.typed}" if last.result is not None else ""
    yield plain(f"    {_limits(last)}; {check.instrument}{typed}", CALM)
    if last.verdict.word != "pass":
        yield plain(f"    {last.verdict.reason}", WAIT)
    if check.earlier_gauge:
        yield plain(f"    {check.earlier_gauge} of the tries on a gauge that was replaced", CALM)
    for before, after in zip(check.attempts, check.attempts[1:], strict=False):
        told = f"    {before.attempt}. {before.typed}: {before.verdict.word.upper()}"
        yield plain(f"{told}; again because: {after.reason or 'the gauge was replaced'}", CALM)


def _limits(reading: ReadingTaken) -> str:
    rules = [each for each in reading.limits if each.rules]
    told = [f"{_bounds(each.at_least, each.at_most)} by {each.origin}" for each in rules]
    return f"limit {'; '.join(told)}" if told else "no limit"


def _bounds(low: Quantity | None, high: Quantity | None) -> str:
    if low is not None and high is not None:
        same = low.unit == high.unit
        return f"{low.value if same else low} to {high}"
    return f"at least {low}" if low is not None else f"at most {high}"


def _steps(title: str, steps: Sequence[StepTold], none: str) -> Content:
    if not steps and not none:
        return plain("")
    told = [
        plain(f"  {each.number:>2} {each.title} ({each.subject}), {each.by}: {each.note}")
        for each in steps
    ]
    return lines(plain(title, "bold $secondary"), *(told or [plain(f"  {none}", CALM)]))


def _photos(photos: Sequence[PhotoTold]) -> Content:
    if not photos:
        return plain("")
    told = []
    for number, each in enumerate(photos, start=1):
        note = f": {each.note}" if each.note else ""
        about = f"{each.step}, {each.by}, {moment(each.at)}, {each.size / 1000:.0f} kB"
        told.append(plain(f"  {number:>2} {each.name}{note}  ({about})"))
    title = Content.assemble(plain("Photos", "bold $secondary"), plain("  a digit opens one", CALM))
    return lines(title, *told)


def _who(found: PointEvidence) -> Content:
    told = [plain(f"  {name}: {', '.join(_gathered(did))}") for name, did in found.people]
    return lines(plain("Who did what", "bold $secondary"), *told) if told else plain("")


def _gathered(did: Sequence[str]) -> Iterator[str]:
    """Deeds of one kind together: `did 1, 2, 3`."""
    kinds: dict[str, list[str]] = {}
    for each in did:
        kind, _, number = each.rpartition(" ")
        kinds.setdefault(kind, []).append(number)
    for kind, numbers in kinds.items():
        if kind.isdecimal():  # `9 readings`
            yield from (f"{kind} {word}" for word in numbers)
        else:
            yield f"{kind} step{'s'[: len(numbers) > 1]} {_ranges(numbers)}"


def _ranges(numbers: Sequence[str]) -> str:
    """`1–4, 6` for 1, 2, 3, 4, 6."""
    runs: list[list[int]] = []
    for number in map(int, numbers):
        if runs and number == runs[-1][-1] + 1:
            runs[-1].append(number)
        else:
            runs.append([number])
    return ", ".join(f"{run[0]}–{run[-1]}" if len(run) > 1 else str(run[0]) for run in runs)


_STEPS = (
    Column("", number=True),
    Column("step", least=20),
    Column("on"),
    Column("outcome"),
    Column("by", least=8),
    Column("observed"),
)


def _walked(steps: Sequence[StepTold], room: int) -> Content:
    rows = [
        (
            Cell(str(each.number)),
            Cell(each.title),
            Cell(each.subject),
            Cell(each.outcome, "" if each.outcome in {"done", "released"} else WAIT),
            Cell(each.by),
            Cell(moment(each.at)[:16]),
        )
        for each in steps
    ]
    if not rows:
        return plain("")
    wide = widths(_STEPS, rows, room)
    title = plain("The steps, by their numbers (times UTC)", "bold $secondary")
    return lines(title, heading(_STEPS, wide), *(line(_STEPS, row, wide) for row in rows))


def _story(found: PointEvidence) -> Content:
    if not found.story:
        return plain("")
    told = []
    for each in found.story:
        revision = f" revision {each.revision}" if each.revision else ""
        why = f": {each.reason}" if each.reason else ""
        told.append(plain(f"  {moment(each.at)}  {each.turn}{revision}, {each.by}{why}"))
    return lines(plain("Its story", "bold $secondary"), *told)


def moment(text: str) -> str:
    """A time as facts carry it, for people: `2026-11-17 18:20 UTC`."""
    return f"{text[:10]} {text[11:16]} UTC"
