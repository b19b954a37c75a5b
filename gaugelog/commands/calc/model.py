"""A subject of the bench calculator: its arguments, its kinds, and what an answer holds."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from dataclasses import dataclass, field
from typing import Any

from gaugelog.commands.calc.bounds import Bound
from gaugelog.commands.calc.dimensions import Dimension
from gaugelog.commands.calc.quantities import show
from gaugelog.commands.calc.sources import Formula, name_of, source_of

Values = Mapping[str, Any]
"""Argument name to float (base unit), tuple of floats, word, what a reader made, or None."""

Reader = Callable[[str], tuple[Any, str]]
"""Makes a value of a text that is no plain quantity, and shows it; raises NotUnderstood."""


@dataclass(frozen=True)
class Argument:
    """One argument of a subject.

    With neither `dimension` nor `read` it is a word, one of `choices` where there are some. `many`
    takes a comma-separated list. `default` is used when it is left out: None makes it required,
    an empty text leaves it without a value. `bound` is asked of each value.
    """

    name: str
    help: str
    dimension: Dimension | None = None
    default: str | None = None
    choices: tuple[str, ...] = ()
    many: bool = False
    bound: Bound | None = None
    read: Reader | None = None
    example: str = ""

    @property
    def like(self) -> str:
        """How it is typed."""
        if self.example or self.dimension is None:
            return self.example or ", ".join(self.choices)
        return self.dimension.example


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
        if isinstance(self.value, str):
            return self.value
        if self.dimension is None:
            return f"{self.value:.{self.digits}g}"
        return show(self.value, self.dimension, self.digits)


@dataclass(frozen=True)
class Answer:
    """What a subject answers: figures, the formulas that gave them, warnings."""

    figures: tuple[Figure, ...]
    formulas: tuple[Formula, ...]
    warnings: tuple[str, ...] = ()


@dataclass(frozen=True)
class Subject:
    """A subject of `gaugelog calc`, or one kind of a family's.

    `renamed` tells which argument a formula means by a name of its own; `note` is told below the
    list of arguments.
    """

    name: str
    title: str
    arguments: tuple[Argument, ...]
    compute: Callable[[Values], Answer]
    renamed: Mapping[str, str] = field(default_factory=dict)
    note: str = ""


@dataclass(frozen=True)
class Family:
    """A subject of several kinds with arguments of their own; `by` names the kind."""

    name: str
    title: str
    by: str
    kinds: Mapping[str, Subject]
    default: str | None = None

    @property
    def chooser(self) -> Argument:
        """The argument that names the kind."""
        return Argument(
            self.by, "one of its kinds", default=self.default, choices=tuple(self.kinds)
        )

    @property
    def arguments(self) -> tuple[Argument, ...]:
        """Every argument of every kind by its name, the chooser first."""
        all_of_them = [each for kind in self.kinds.values() for each in kind.arguments]
        by_name = {each.name: each for each in reversed(all_of_them)}
        return (self.chooser, *reversed(by_name.values()))


@dataclass(frozen=True)
class Worked:
    """An answer with the inputs as they were understood: those given or taken by default."""

    subject: Subject
    inputs: dict[str, str]
    values: Values
    answer: Answer

    def as_json(self) -> dict[str, Any]:
        """Inputs, figures (base unit and as shown), formulas, sources, warnings."""
        return {
            "subject": self.subject.name,
            "inputs": self.inputs,
            "results": [_figure_as_json(figure) for figure in self.answer.figures],
            "formulas": [
                {"name": name_of(formula), "source": source_of(formula)}
                for formula in self.answer.formulas
            ],
            "warnings": list(self.answer.warnings),
        }


def _figure_as_json(figure: Figure) -> dict[str, Any]:
    unit = (figure.dimension.base or "1") if figure.dimension else ""
    return {
        "name": figure.name,
        "value": figure.value,
        "unit": unit,
        "shown": figure.shown,
    }
