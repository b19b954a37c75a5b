"""A step in words at the terminal: what to do, beware of and enter; and what became of it."""

from __future__ import annotations

import textwrap
from typing import TYPE_CHECKING

from gaugelog.commands.talk import put, say

if TYPE_CHECKING:
    from gaugelog.ledger.routes import StepInput
    from gaugelog.rules.progress import NextStep
    from gaugelog.work.steps import StepOutcome

_WIDTH = 78


def tell_step(found: NextStep) -> None:
    """What a point needs now, and the command that does it."""
    describe(found)
    if found.step is None:
        put(*(["Next: gaugelog submit " + found.point] if found.title != "none" else []))
        return
    if found.step.inputs:
        put("", "To enter:", *(_input_line(item) for item in found.step.inputs))
    if found.step.hold:
        put(
            "",
            *wrapped(
                "The second person names themselves with --as ID; --refuse WHY sends it back."
            ),
        )
    put("", *([] if found.blocks else [f"Next: {_command(found)}"]), *_ways_back(found))


def describe(found: NextStep) -> None:
    """The step in hand: why it was sent back, instruction, cautions, plan, times, blocks."""
    put(f"{found.point}, zone {found.zone}: {found.state}")
    put(*(line for told in found.sent_back for line in wrapped(told, "READ FIRST: ")))
    if found.step is not None:
        _describe(found, found.step.hold)
    put(*([""] if found.blocks and found.step else []))
    put(*(line for block in found.blocks for line in _blocked(found, block)))


def _describe(found: NextStep, hold: bool) -> None:
    step = found.step
    if step is None:
        return
    second = ", a HOLD: a second person decides" if hold else ""
    put(f"Step {found.number} of {found.count}{second}: {step.title} [{step.id}]", "")
    put(*wrapped(step.instruction))
    put(*(line for caution in step.cautions for line in wrapped(caution, "CAUTION: ")))
    if found.facts:
        put(
            "",
            "From the plan:",
            *(line for fact in found.facts for line in wrapped(fact, hang=True)),
        )
    times = [window.sentence for window in found.windows if window.open]
    put(*([""] if times else []), *(line for time in times for line in wrapped(time, "Time: ")))
    put(*(line for flag in found.flags for line in wrapped(flag, "LOOK INTO: ")))


def _blocked(found: NextStep, block: str) -> list[str]:
    return wrapped(block, "BLOCKED: ") if found.step is not None else [block]


def _ways_back(found: NextStep) -> list[str]:
    """Where a window is over, the step to go back to."""
    if found.step is None:
        return []
    pairs = zip(found.step.windows, found.windows, strict=False)
    return [
        f"Next: gaugelog step redo {found.point} {planned.after} --reason WHY"
        for planned, window in pairs
        if not window.open and planned.bound == "within"
    ]


def wrapped(text: str, lead: str = "", *, hang: bool = False) -> list[str]:
    """Text in lines that fit a narrow terminal, indented by two more than it is.

    Behind a lead, or with `hang`, the lines that follow are indented once more.
    """
    indent = " " * (len(text) - len(text.lstrip()) + 2)
    hanging = f"{indent}  " if lead or hang else indent
    return textwrap.wrap(
        lead + text.strip(), _WIDTH, initial_indent=indent, subsequent_indent=hanging
    )


def prompt_for(item: StepInput) -> str:
    """What is asked for one input: its prompt, with its unit where the prompt names none."""
    unit = f", in {item.unit}" if item.unit else ""
    left_out = "" if item.required else ", may be left out"
    return f"{item.prompt}{unit}{left_out}"


def _input_line(item: StepInput) -> str:
    return f"  {item.name} = {prompt_for(item)}"


def _command(found: NextStep) -> str:
    names = " ".join(f"{item.name}=…" for item in found.step.inputs) if found.step else ""
    again = " --reason WHY" if found.again else ""
    return " ".join(f"gaugelog step do {found.point} {names}{again}".split())


def tell_outcome(outcome: StepOutcome) -> None:
    """The verdict of each reading with what it rests on, and what became of the step."""
    for shown in outcome.readings:
        reading = shown.reading
        put(f"{reading.check} {reading.stage} {reading.typed}: {reading.verdict.word.upper()}")
        put(*(line for told in shown.explained for line in wrapped(told, hang=True)))
    say(*outcome.lines)


def tell_what_follows(found: NextStep, outcome: StepOutcome) -> None:
    """What comes after a step that is settled."""
    if not outcome.settled:
        return
    if found.step is None:
        say(f"Next: {found.title} of {found.point}: gaugelog submit {found.point}")
        return
    hold = ", a hold for a second person" if found.step.hold else ""
    say(f"Next, {found.number} of {found.count}{hold}: {found.step.title}")
