"""Resistances between pins as people type them: "supply+ to signal+ = 350.2 ohm"."""

from __future__ import annotations

import re
from dataclasses import dataclass

from gaugelog.commands.calc.dimensions import INSULATION, RESISTANCE
from gaugelog.commands.calc.quantities import NotUnderstood, understand
from gaugelog.commands.calc.stated import Stated, stated
from gaugelog.physics.layouts import LAYOUTS
from gaugelog.physics.pin_network import ARTICLE, SHIELD

_OVERLOAD = re.compile(r"(?:ol|o\.l\.?|overload|open|>\s*(?P<bound>.+))", re.IGNORECASE)
_MOST_READINGS = 60


@dataclass(frozen=True)
class TypedReading:
    """A resistance typed between two terminals; `width` is its own doubt, if it was typed."""

    between: tuple[str, str]
    stated: Stated | None
    bound: float | None = None


def _terminals() -> dict[str, str]:
    """Every terminal of every layout by its name in lower case."""
    wires = {pin for each in LAYOUTS.values() for pin in each.wires}
    tabs = {tab for each in LAYOUTS.values() for tab in each.wires.values()}
    return {name.casefold(): name for name in (*sorted(wires | tabs), ARTICLE, SHIELD)}


def readings(text: str) -> tuple[tuple[TypedReading, ...], str]:
    """Readings such as "supply+ to signal+ = 350.2 ohm", parted by commas or semicolons."""
    parts = [part.strip() for part in re.split(r"[,;]", text) if part.strip()]
    if not 0 < len(parts) <= _MOST_READINGS:
        raise NotUnderstood(f"must hold 1 to {_MOST_READINGS} resistances")
    found = [_reading(part) for part in parts]
    return tuple(each for each, _ in found), "; ".join(shown for _, shown in found)


def _reading(part: str) -> tuple[TypedReading, str]:
    # "signal+ to ARTICLE > 20 Mohm" needs no equals sign.
    places, equals, figure = (part if "=" in part else part.replace(">", "= >", 1)).partition("=")
    ends = [" ".join(end.split()) for end in re.split(r"\s+to\s+", places.strip())]
    if not equals or len(ends) != 2:
        raise NotUnderstood(f"“{part}” is no reading; type it like supply+ to signal+ = 350.2 ohm")
    known = _terminals()
    for end in ends:
        if end.casefold() not in known:
            raise NotUnderstood(f"“{end}” is no terminal; known: {', '.join(known.values())}")
    one, other = (known[end.casefold()] for end in ends)
    if one == other:
        raise NotUnderstood(f"“{part}” names one terminal twice")
    over = _OVERLOAD.fullmatch(figure.strip())
    if over is None:
        value, shown = stated(RESISTANCE)(figure.strip())
        if value.value is None or value.value < 0:
            raise NotUnderstood(f"“{part}” needs a resistance that is not negative")
        return TypedReading((one, other), value), f"{one} to {other} = {shown}"
    bound = understand(over["bound"], INSULATION) if over["bound"] else None
    told = f"{one} to {other} {f'> {bound.shown}' if bound else 'overload'}"
    return TypedReading((one, other), None, bound.value if bound else None), told
