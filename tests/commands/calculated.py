"""What tests of the bench calculator share: figures by name, faults by place."""

from __future__ import annotations

from gaugelog.commands.calc.engine import work_out
from gaugelog.commands.calc.model import Answer
from gaugelog.commands.calc.subjects import SUBJECTS
from gaugelog.errors import Fault, Faulty


def answer(subject: str, **typed: str) -> Answer:
    """The answer to what was typed."""
    return work_out(SUBJECTS[subject], typed).answer


def shown(subject: str, **typed: str) -> dict[str, str]:
    """Each figure as people read it, by its name."""
    return {figure.name: figure.shown for figure in answer(subject, **typed).figures}


def value(figure: str, subject: str, **typed: str) -> float:
    """One figure in its base unit."""
    found = {each.name: each.value for each in answer(subject, **typed).figures}[figure]
    assert isinstance(found, float), found
    return found


def faults(subject: str, **typed: str) -> tuple[Fault, ...]:
    """The faults of what was typed; there must be some."""
    try:
        answer(subject, **typed)
    except Faulty as error:
        return error.faults
    raise AssertionError("no fault was found")


def places(subject: str, **typed: str) -> list[str]:
    """Where the faults of what was typed lie."""
    return [fault.where for fault in faults(subject, **typed)]
