"""A subject of the bench calculator: its arguments, and how an answer is computed and told."""

from __future__ import annotations

import inspect
import re
from collections.abc import Callable, Mapping, Sequence
from dataclasses import dataclass
from typing import Any

from gaugelog.commands.calc.quantities import Dimension, NotUnderstood, Understood, show, understand
from gaugelog.errors import Fault, Faulty, GaugelogError

_NOTHING = "nothing was worked out"


@dataclass(frozen=True)
class Argument:
    """One argument of a subject.

    With `dimension` None it is a word, one of `choices` where there are some. `many` takes a
    comma-separated list. `default` is used when it is left out; None makes it required.
    """

    name: str
    help: str
    dimension: Dimension | None = None
    default: str | None = None
    choices: tuple[str, ...] = ()
    many: bool = False


@dataclass(frozen=True)
class Figure:
    """One result: a value in the dimension's base unit, or a word."""

    name: str
    value: float | str
    dimension: Dimension | None = None
    digits: int = 5

    @property
    def shown(self) -> str:
        """The figure as people read it, with its unit."""
        if isinstance(self.value, str) or self.dimension is None:
            return f"{self.value:.{self.digits}g}" if isinstance(self.value, float) else self.value
        return show(self.value, self.dimension, self.digits)


@dataclass(frozen=True)
class Answer:
    """What a subject answers: figures, the formulas that gave them, warnings."""

    figures: tuple[Figure, ...]
    formulas: tuple[Formula, ...]
    warnings: tuple[str, ...] = ()


Formula = Callable[..., Any]
"""A public function of `physics/`."""

Values = Mapping[str, Any]
"""Argument name to float (base unit), tuple of floats, word, or None."""


@dataclass(frozen=True)
class Subject:
    """A subject of `gaugelog calc`."""

    name: str
    title: str
    arguments: tuple[Argument, ...]
    compute: Callable[[Values], Answer]


@dataclass(frozen=True)
class Worked:
    """An answer with the inputs as they were understood."""

    subject: Subject
    inputs: dict[str, str]
    answer: Answer

    def as_json(self) -> dict[str, Any]:
        """Inputs, figures (base unit and as shown), formulas, sources, warnings."""
        return {
            "subject": self.subject.name,
            "inputs": self.inputs,
            "results": [
                {
                    "name": figure.name,
                    "value": figure.value,
                    "unit": (figure.dimension.base or "1") if figure.dimension else "",
                    "shown": figure.shown,
                }
                for figure in self.answer.figures
            ],
            "formulas": [
                {"name": name_of(formula), "source": source_of(formula)}
                for formula in self.answer.formulas
            ],
            "warnings": list(self.answer.warnings),
        }


def work_out(subject: Subject, typed: Mapping[str, str], where: str = "") -> Worked:
    """Understand `typed` and compute. Raises Faulty with every fault of the input at once."""
    faults = [*_strangers(subject, typed, where)]
    values: dict[str, Any] = {}
    inputs: dict[str, str] = {}
    for argument in subject.arguments:
        place = f"{where}{argument.name}"
        text = typed.get(argument.name, "").strip() or argument.default
        if text is None:
            faults.append(Fault(place, "is missing.", f"It is {argument.help}."))
            continue
        try:
            values[argument.name], inputs[argument.name] = _read(argument, text)
        except NotUnderstood as error:
            faults.append(Fault(place, f"{error}."))
    if faults:
        raise Faulty(faults, _NOTHING)
    return Worked(subject, inputs, _computed(subject, values, where))


def _computed(subject: Subject, values: Values, where: str) -> Answer:
    try:
        return subject.compute(values)
    except Faulty:
        raise
    except GaugelogError as error:
        raise Faulty(
            [Fault(where.rstrip(", ") or subject.name, error.message, error.remedy)], _NOTHING
        ) from error


def _strangers(subject: Subject, typed: Mapping[str, str], where: str) -> list[Fault]:
    known = [argument.name for argument in subject.arguments]
    return [
        Fault(f"{where}{name}", "is no argument here.", f"Known: {', '.join(known)}.")
        for name in typed
        if name not in known
    ]


def _read(argument: Argument, text: str) -> tuple[Any, str]:
    if text == "" and argument.default == "":
        return None, "not given"
    if argument.dimension is None:
        return _word(argument, text)
    if not argument.many:
        found = understand(text, argument.dimension)
        return found.value, found.shown
    many = [_one_of_many(part, text, argument.dimension) for part in text.split(",")]
    return tuple(item.value for item in many), ", ".join(item.shown for item in many)


def _one_of_many(part: str, text: str, dimension: Dimension) -> Understood:
    # "400, 300, -200 ue": a unit at the end of the list serves every number before it.
    unit = re.sub(r"^[\s\d.eE+−-]*", "", text.rsplit(",", 1)[-1])
    bare = re.fullmatch(r"\s*[+−-]?[\d.]+(?:[eE][+-]?\d+)?\s*", part) is not None
    return understand(f"{part.strip()} {unit}" if bare else part, dimension)


def _word(argument: Argument, text: str) -> tuple[str, str]:
    if argument.choices and text not in argument.choices:
        raise NotUnderstood(f"“{text}” is not one of {', '.join(argument.choices)}")
    return text, text


def name_of(formula: Formula) -> str:
    """The formula's name with its module, `leads.three_wire_loss`."""
    return f"{formula.__module__.rsplit('.', 1)[-1]}.{formula.__qualname__}"


def source_of(formula: Formula) -> str:
    """The `Source:` paragraph of the formula's docstring on one line."""
    found = re.search(r"Source:\s*(.+?)(?:\n\s*\n|\Z)", inspect.getdoc(formula) or "", re.DOTALL)
    if found is None:
        return "see its docstring"
    text = " ".join(found[1].split())
    # "as `desensitisation`" sends the reader to a sibling: follow it.
    sibling = re.match(r"as `(\w+)`", text)
    other = getattr(inspect.getmodule(formula), sibling[1], None) if sibling else None
    return (
        text
        if other is None or sibling is None
        else source_of(other).rstrip(".") + text[sibling.end() :]
    )


def parse_pairs(pairs: Sequence[str]) -> dict[str, str]:
    """`name=value` words into a dict. Raises Faulty for each word that is none, or is double."""
    faults, typed = [], {}
    for pair in pairs:
        name, equals, value = pair.partition("=")
        if not equals or not name:
            faults.append(Fault(f"“{pair}”", "is not name=value.", 'Like resistance="350 ohm".'))
        elif name in typed:
            faults.append(Fault(name, "is given twice.", "Give it once."))
        else:
            typed[name] = value
    if faults:
        raise Faulty(faults, _NOTHING)
    return typed
