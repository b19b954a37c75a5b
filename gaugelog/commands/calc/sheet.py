"""A sheet on which a subject works: what a formula gives goes down beside the formula's name."""

from __future__ import annotations

from collections.abc import Callable, Iterable
from typing import TYPE_CHECKING, ParamSpec, TypeVar

from gaugelog.commands.calc.dimensions import Dimension
from gaugelog.commands.calc.model import Answer, Figure
from gaugelog.commands.calc.sources import Formula

if TYPE_CHECKING:
    from gaugelog.physics.validity import Notice

P = ParamSpec("P")
T = TypeVar("T")


class Sheet:
    """Figures, formulas and warnings of an answer in the making."""

    def __init__(self) -> None:
        self._figures: list[Figure] = []
        self._formulas: list[Formula] = []
        self._warnings: list[str] = []

    def by(self, formula: Callable[P, T], *inputs: P.args, **named: P.kwargs) -> T:
        """What a formula gives; its name goes down, the value is for further work."""
        value = formula(*inputs, **named)
        if formula not in self._formulas:
            self._formulas.append(formula)
        return value

    def put(
        self, name: str, value: float | str, dimension: Dimension | None = None, digits: int = 5
    ) -> None:
        """Put a figure down, in the dimension's base unit, or a word."""
        told = value if isinstance(value, str) else float(value)
        self._figures.append(Figure(name, told, dimension, digits))

    def warn(self, notices: Iterable[Notice | str]) -> None:
        """Put warnings down, each once."""
        for notice in notices:
            text = notice if isinstance(notice, str) else notice.message
            if text not in self._warnings:
                self._warnings.append(text)

    def answer(self) -> Answer:
        """The finished answer."""
        return Answer(tuple(self._figures), tuple(self._formulas), tuple(self._warnings))
