"""Values typed with what is doubtful about them: "2.05 ± 1 %", "350 ohm ± 0.5 ohm k=2"."""

from __future__ import annotations

import math
import re
from dataclasses import dataclass
from typing import TYPE_CHECKING

from gaugelog.commands.calc.dimensions import DIFFERENCE, PERCENT, Dimension
from gaugelog.commands.calc.model import Reader
from gaugelog.commands.calc.quantities import NotUnderstood, Understood, understand

if TYPE_CHECKING:
    from gaugelog.physics.estimates import Estimate

SHAPES = ("rectangular", "triangular", "arcsine", "normal")
HELP = (
    "What is uncertain is typed VALUE ± WIDTH, or ± WIDTH about what is planned; then the shape:\n"
    "rectangular (taken where nothing is said), triangular, arcsine, normal (one standard\n"
    "uncertainty) or k=2 (expanded); and dof=9 where few readings stand behind it."
)
_SIGN = re.compile(r"±|\+/?-")
_FACTOR = re.compile(r"(k|dof)=(\d+(?:\.\d+)?)")


@dataclass(frozen=True)
class Stated:
    """A value (None: as planned) and its width; a share of the value where `relative`."""

    value: float | None
    width: float = 0.0
    relative: bool = False
    shape: str = "rectangular"
    coverage: float = 1.0
    dof: float = math.inf

    def around(self, planned: float) -> Estimate:
        """The estimate, about the value or else about what is planned."""
        from gaugelog.physics import estimates

        value = planned if self.value is None else self.value
        width = self.width * abs(value) if self.relative and value else self.width
        if self.shape == "normal":
            return estimates.normal(value, width / self.coverage, self.dof)
        maker = {
            "rectangular": estimates.rectangular,
            "triangular": estimates.triangular,
            "arcsine": estimates.arcsine,
        }[self.shape]
        return maker(value, width, self.dof)


def stated(dimension: Dimension, width: Dimension | None = None) -> Reader:
    """A reader of values of `dimension`, whose widths are of `width` where that is another kind."""

    def read(text: str) -> tuple[Stated, str]:
        before, sign, after = _parted(text)
        value = understand(before, dimension) if before else None
        if not sign:
            if value is None:
                raise NotUnderstood("has neither a value nor a width")
            return Stated(value.value), value.shown
        return _with_width(value, before, after, width or dimension)

    return read


def _parted(text: str) -> tuple[str, str, str]:
    found = _SIGN.search(text)
    if found is None:
        return text.strip(), "", ""
    return text[: found.start()].strip(), found[0], text[found.end() :].strip()


def _with_width(
    value: Understood | None, before: str, after: str, dimension: Dimension
) -> tuple[Stated, str]:
    words = after.split()
    shape, coverage, dof = "rectangular", 1.0, math.inf
    while words and (words[-1].casefold() in SHAPES or _FACTOR.fullmatch(words[-1])):
        word = words.pop().casefold()
        if word in SHAPES:
            shape = word
            continue
        name, number = word.split("=")
        if float(number) <= 0:
            raise NotUnderstood(f"“{word}” must be greater than zero")
        shape, coverage = ("normal", float(number)) if name == "k" else (shape, coverage)
        dof = float(number) if name == "dof" else dof
    typed = " ".join(words)
    relative = dimension is not DIFFERENCE and typed.endswith("%") and "%" not in before
    width = understand(typed, PERCENT if relative else dimension)
    if width.value < 0:
        raise NotUnderstood(f"a width must not be negative, not {width.shown}")
    found = Stated(
        None if value is None else value.value, width.value, relative, shape, coverage, dof
    )
    return found, _shown(value, width, found)


def _shown(value: Understood | None, width: Understood, found: Stated) -> str:
    parts = [] if value is None else [value.shown]
    parts += ["±", width.shown]
    if found.relative and value is not None:
        parts.append("of it")
    parts.append(f"(k={found.coverage:g})" if found.coverage != 1 else f"({found.shape})")
    if math.isfinite(found.dof):
        parts.append(f"with {found.dof:g} degrees of freedom")
    return " ".join(parts)
