"""Which of several arguments were given: one of them, at least one, all of them."""

from __future__ import annotations

from gaugelog.commands.calc.model import Values
from gaugelog.errors import Fault, Faulty

_NUMBERS = {2: "two", 3: "three", 4: "four"}


def given(values: Values, *names: str) -> list[str]:
    """Those of the arguments that have a value."""
    return [name for name in names if values[name] is not None]


def only_one(values: Values, *names: str) -> str:
    """The one that was given. Raises Faulty where none was, or more than one."""
    found = given(values, *names)
    if len(found) != 1:
        count = _NUMBERS[len(names)]
        raise Faulty([Fault(", ".join(names), f"give one of the {count}, and only one.")])
    return found[0]


def at_least_one(values: Values, *names: str) -> list[str]:
    """Those that were given. Raises Faulty where none was."""
    found = given(values, *names)
    if not found:
        count = _NUMBERS[len(names)]
        raise Faulty([Fault(", ".join(names), f"give at least one of the {count}.")])
    return found


def one_each(name: str, given: tuple[float, ...], count: int) -> tuple[float, ...]:
    """A value for each of `count` grids, from one for all or one for each."""
    if len(given) not in (1, count):
        raise Faulty([Fault(name, f"give one for all grids, or {count}.")])
    return given if len(given) == count else given * count


def need(values: Values, *names: str, why: str) -> None:
    """Raises Faulty with each argument that has no value; `why` ends "it is needed"."""
    faults = [
        Fault(name, "is missing.", f"It is needed {why}.") for name in names if values[name] is None
    ]
    if faults:
        raise Faulty(faults)
